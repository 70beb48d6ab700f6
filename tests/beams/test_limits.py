"""Limits and tables a beam is held to: exposure, fire, live load, concrete; units of both kinds."""

from __future__ import annotations

import pytest

from lineproof.record import recompute

from .gallery import RECTANGULAR, holds, number, record_of
from .pocket import faults


@pytest.mark.parametrize(
    ("exposure", "cover", "f_c", "kind"),
    [("F-1", 40, 30, "exterior"), ("C-1", 60, 35, "exterior"), ("C-XL", 60, 50, "exterior"),
     ("N", 30, 20, "interior")],
)  # fmt: skip
def test_exposure(exposure: str, cover: int, f_c: int, kind: str) -> None:
    """Least cover and strength by class; z 25 000 N/mm outside, 30 000 inside."""
    record = record_of(
        exposure=exposure, cover=f"{cover} mm", f_c=f"{max(f_c, 25)} MPa", ends="free",
        bottom_bars="4-25M", span="6 m",
    )  # fmt: skip
    assert number(record, "cover/c_min") == cover
    assert number(record, "cover/f_cmin") == f_c
    assert holds(record, "cover/cover-stirrup")
    assert holds(record, "cover/strength-for-exposure")
    assert number(record, "crack-control/z_max") == (30000 if kind == "interior" else 25000)
    if exposure != "N":
        thin = record_of(
            exposure=exposure, cover=f"{cover - 5} mm", f_c=f"{f_c - 1} MPa", ends="free",
            bottom_bars="4-25M", span="6 m",
        )  # fmt: skip
        assert {"cover/cover-stirrup", "cover/strength-for-exposure"} <= set(thin.failed)


@pytest.mark.parametrize(
    ("rating", "cover", "slab", "width"),
    [
        ("45 min", 20, 77, "100 <= b_w"),
        ("1 h", 20, 90, "100 <= b_w"),
        ("2 h", 25, 130, "100 <= b_w"),
        ("3 h", 39, 158, "140 <= b_w"),
        ("4 h", 50, 180, "165 <= b_w"),
    ],
)
def test_fire(rating: str, cover: float, slab: float, width: str) -> None:
    """NBC Appendix D, D-2.9: cover 41.3 and slab 140 of the gallery beam against the tables."""
    record = record_of(fire_rating=rating, bottom_bars="4-25M", ends="free")
    assert number(record, "cover/c_fire") == cover
    assert number(record, "cover/h_fire") == slab
    assert holds(record, "cover/cover-fire") == (cover <= 41.3)
    assert holds(record, "cover/slab-fire") == (slab <= 140)
    assert record.entries["cover/width-fire"]["formula"] == width


def test_narrow_web_and_long_rating() -> None:
    """3 h needs 140 mm of web: 135 mm fails, though 2 h passes (cover 10 mm fails by itself)."""
    narrow = {**RECTANGULAR, "b_w": "135 mm", "bottom_bars": "2-15M", "span": "3 m",
              "spacing": "0.5 m", "ends": "free", "cover": "10 mm"}  # fmt: skip
    assert "cover/width-fire" not in record_of(**narrow).failed
    assert "cover/width-fire" in record_of(**narrow, fire_rating="3 h").failed


def test_live_load_below_the_use_fails() -> None:
    """3 kPa given for an assembly area of 4.8 kPa."""
    record = record_of(live_load="3 kPa")
    assert record.failed == ["loads/live-load"]
    assert record_of(live_load="6 kPa").failed == []


def test_high_strength_takes_the_general_modulus() -> None:
    """f'c 60, 2400 kg/m3: (3300 x 7.74597 + 6900) x 1.06592 = 34 602 MPa."""
    record = record_of(f_c="60 MPa")
    assert not holds(record, "materials/short-E_c")
    assert number(record, "materials/E_c") == pytest.approx(34602, abs=1)


def test_light_concrete() -> None:
    """lambda 0.75: f_r = 0.6 x 0.75 x sqrt(32) = 2.5456 MPa; no short modulus to decide on."""
    record = record_of(density="low", gamma_c="1800 kg/m3")
    assert number(record, "materials/f_r") == pytest.approx(2.5456, abs=0.0001)
    assert "materials/short-E_c" not in record.entries


def test_us_units_go_through() -> None:
    """15 in = 381 mm, 24 in = 609.6 mm; every printed line still follows."""
    record = record_of(b_w="15 in", h="24 in", superimposed="37 psf")
    assert number(record, "given/b_w") == pytest.approx(381)
    assert number(record, "given/h") == pytest.approx(609.6)
    assert list(faults(record.data)) == []
    assert recompute(record) == []


def test_cover_of_the_thickest_bars_in_either_layer() -> None:
    """Class C-1: 2.0 x 35.7 = 71.4 mm over 35M above 25M, against 60 + 11.3 = 71.3 mm."""
    record = record_of(
        bottom_bars="3-25M / 3-35M", exposure="C-1", cover="60 mm", f_c="35 MPa", ends="free"
    )
    assert number(record, "cover/c_rb") == pytest.approx(71.4)
    assert "cover/cover-bars" in record.failed
