"""What a second checker found: layers with compression bars, cover of top bars, confirmations."""

from __future__ import annotations

import pytest
from scipy.optimize import brentq

from .gallery import holds, number, record_of

# A rectangle 400 x 600 mm of 25 MPa, 4-30M / 4-30M, and 3-20M counted in compression.
HEAVY = {
    "shape": "rectangular", "h_f": None, "floor_weight": "3 kPa", "spacing": "5 m", "span": "8 m",
    "b_w": "400 mm", "h": "600 mm", "f_c": "25 MPa", "bottom_bars": "4-30M / 4-30M",
    "compression_bars": "3-20M",
}  # fmt: skip
# d_1 = 600 - 30 - 11.3 - 29.9/2 = 543.75; layers 1.4 x 29.9 = 41.86 mm apart, centres 71.76;
# d' = 30 + 11.3 + 19.5/2 = 51.05.
LAYERS = ((2800.0, 543.75), (2800.0, 471.99), (900.0, 51.05))
BLOCK = (0.85 - 0.0015 * 25) * 0.65 * 25
BETA = 0.97 - 0.0025 * 25


def forces(c: float) -> list[tuple[float, float]]:
    """Return (tension, depth) of block and bars, each layer at its own strain [N, mm]."""
    made = [(-BLOCK * 400 * BETA * c, BETA * c / 2)]
    for area, depth in LAYERS:
        strain = 0.0035 * (depth - c) / c
        stress = 0.85 * max(-400.0, min(400.0, 200_000 * strain))
        made.append((area * (stress + (BLOCK if strain < 0 else 0.0)), depth))
    return made


def test_each_layer_stands_at_its_own_strain_with_compression_bars() -> None:
    """Lumped at their centroid the bars would carry 1.4 % more; scipy's root, layer by layer."""
    c = brentq(lambda x: sum(force for force, _ in forces(x)), 50, 540)
    moment = sum(force * depth for force, depth in forces(c)) / 1e6
    record = record_of(**HEAVY)

    assert number(record, "second-path/M_l") == pytest.approx(moment, rel=1e-4)
    assert number(record, "flexure/M_r") > 1.01 * moment
    assert not holds(record, "second-path/second-path")
    assert not holds(record, "flexure/yield-upper")
    assert "summary/strains" not in record.entries


def test_top_bars_need_cover_for_their_size() -> None:
    """Exposure F-1: 1.5 x 35.7 = 53.55 mm, but 40 + 11.3 = 51.3 mm."""
    record = record_of(top_bars="3-35M", exposure="F-1", cover="40 mm", f_c="35 MPa")

    assert number(record, "top-steel/c_rb") == pytest.approx(53.55)
    assert record.failed == ["top-steel/cover-bars"]


def test_compression_bars_are_named_and_their_ties_not_covered() -> None:
    """On the summary, beside the balanced state that leaves them out, and on the cover."""
    record = record_of(**HEAVY | {"bottom_bars": "4-30M", "spacing": "3 m"})

    assert record.entries["compression-bars/bars-text"]["text"].endswith("3-20M.")
    assert "balanced/compression-bars-left-out" in record.entries
    checks = {row["check"] for row in record.data["status"]["not_covered"]}
    assert "Ties of the compression bars" in checks


def test_a_waiver_says_on_what_it_rests() -> None:
    """In the choices, and beside the check."""
    record = record_of(waive_minimum_at_ends=True, top_bars="2-15M")

    assert "waived at the ends" in record.entries["given/choices"]["text"]
    assert holds(record, "top-steel/waiver")
    assert "assumed" in record.entries["top-steel/waiver-rests-on"]["text"]
