"""Slips planted into random beams: every origin is found, none is invented, the slip is told."""

from __future__ import annotations

import ast
import math
import sys
from pathlib import Path
from random import Random

import pytest

from lineproof.audit.graph import evaluated

from . import planting_rows as rows
from .planting import claim, reach, tells
from .planting_beams import BEAMS, beam
from .planting_measure import Tally, measured, report
from .planting_slips import Planted, all_slips, changed_digits, from_rows, three_digits, tree_of

LEAST = {rows.SIMPLE: 30, rows.SIDE: 60, rows.CLEAR: 70, rows.LEG: 70, rows.COUNT: 290}
"""Slips of a kind that must have been planted, so that an empty search proves nothing."""


@pytest.fixture(scope="module")
def tallies() -> tuple[Tally, Tally]:
    """The counts of all random beams; ``pytest -s`` shows them."""
    made = measured(range(BEAMS))
    sys.stdout.write(report(*made))
    return made


def test_slips_of_every_kind_were_planted(tallies: tuple[Tally, Tally]) -> None:
    full, quick = tallies

    assert BEAMS == 300
    assert {kind for kind in rows.KINDS if not full.planted[kind]} == set()
    assert {k: full.planted[k] for k, n in LEAST.items() if full.planted[k] < n} == {}
    assert full.planted.total() > 4000
    assert quick.planted.total() > 150
    assert full.untouched > 100_000


def test_every_origin_is_found(tallies: tuple[Tally, Tally]) -> None:
    """In 100 % of the slips, but for those that give the number of another valid reading."""
    assert [line for tally in tallies for line in tally.missed] == []


def test_no_slip_is_swallowed_by_another_reading(tallies: tuple[Tally, Tally]) -> None:
    """A slip that gives by chance what another valid way gives is doubtful, with the slip named.

    Only a round number near the right one may be called that, as no mistake known by name gives it.
    """
    full, _ = tallies

    assert full.not_told == []


def test_in_quick_tables_nine_of_ten_slips_are_told_as_errors_or_doubtful(
    tallies: tuple[Tally, Tally],
) -> None:
    """Their slips lie above the claims, where nothing tells them from a reading that fits."""
    _, quick = tallies

    told = quick.found.total() + len(quick.doubtful)
    assert told >= 0.9 * quick.planted.total(), quick.not_told


def test_no_untouched_line_is_called_wrong(tallies: tuple[Tally, Tally]) -> None:
    assert [line for tally in tallies for line in tally.false] == []


def test_the_true_slip_is_among_the_first_three(tallies: tuple[Tally, Tally]) -> None:
    full, quick = tallies

    assert full.share_told >= 0.9, full.untold
    assert quick.share_told >= 0.9, quick.untold


def test_every_kind_of_slip_is_told(tallies: tuple[Tally, Tally]) -> None:
    """Nine in ten of each kind; a digit misread in an argument alone has as many ways as digits."""
    full, _ = tallies
    shares = {kind: full.told[kind] / full.found[kind] for kind in rows.KINDS}

    assert {k: s for k, s in shares.items() if s < 0.9 and k != rows.DIGIT_IN} == {}


# The planting itself, by hand ---------------------------------------------------------------------


def test_planting_knows_nothing_of_the_search() -> None:
    """Only the measure calls the search; what is planted is written out without it."""
    folder = Path(__file__).parent
    for name in ("planting", "planting_rows", "planting_slips", "planting_beams", "planting_quick"):
        tree = ast.parse((folder / f"{name}.py").read_text(encoding="utf-8"))
        named = {
            f"{node.module}.{alias.name}"
            for node in ast.walk(tree)
            if isinstance(node, ast.ImportFrom) and node.module and not node.level
            for alias in node.names
        }
        assert {n for n in named if "slip" in n or "judge" in n} == set(), name


def planted_as(what: str, part: str = "") -> Planted:
    """Return a slip of the first single beam by what was worked."""
    graph = beam(0)
    return next(
        slip
        for node in graph
        if node.kind == "line" and node.part.startswith(part)
        for slip in from_rows(graph, node)
        if slip.what == what
    )


def test_a_factor_left_out_and_one_twice() -> None:
    """Without phi_s = 0.85 the resistance is larger by 1/0.85, with it twice smaller by 0.85."""
    stored = dict(beam(0).stored)
    out = planted_as("A_s*f_y*(d - a/2)")
    twice = planted_as("phi_s*phi_s*A_s*f_y*(d - a/2)")

    assert out.work(stored) == pytest.approx(stored[out.id] / 0.85)
    assert twice.work(stored) == pytest.approx(stored[twice.id] * 0.85)


def test_a_name_that_the_line_does_not_use_is_looked_up_on_the_sheet() -> None:
    """h - a/2 in place of d - a/2: more by phi_s x A_s x f_y x (h - d)."""
    stored = dict(beam(0).stored)
    slip = planted_as("phi_s*A_s*f_y*(h - a/2)", "flexure")
    force = 0.85 * stored["bars/A_s"] * stored["materials/f_y"]

    more = force * (stored["given/h"] - stored["bars/d"])
    assert slip.work(stored) - stored["flexure/M_r"] == pytest.approx(more)


def test_a_square_forgotten_in_kn_and_m() -> None:
    """40 kN/m and 6 m: 40 x 6/8 = 30, read as kN.m."""
    found = evaluated(tree_of("1000*w_f*l/8"), {"w_f": 40.0, "l": 6000.0})

    assert found == pytest.approx(30e6)


def test_degrees_given_to_a_function_of_radians() -> None:
    """cot of 35 radians: 1/tan(35) = 1/0.4738 = 2.1105; of 35 degrees it is 1.428."""
    text = "1/tan(theta*57.29577951308)"

    assert evaluated(tree_of(text), {"theta": 35.0}) == pytest.approx(1 / math.tan(35), rel=1e-6)
    assert math.tan(35) == pytest.approx(0.47381, abs=1e-5)


def test_what_is_written_has_three_digits() -> None:
    assert [three_digits(x) for x in (1.25, 28.52304, 616400, -0.00412345, 0.0)] == [
        "1.25", "28.5", "616000", "-0.00412", "0",
    ]  # fmt: skip


def test_exchanged_or_mistyped_digits_differ_in_one_place_or_two() -> None:
    for seed in range(200):
        text = three_digits(changed_digits(47.787, "kN/m", str(seed)))
        wrong = [i for i, (a, b) in enumerate(zip("47.8", text, strict=True)) if a != b]

        assert len(wrong) == 1 or (len(wrong) == 2 and sorted(text) == sorted("47.8")), text


def test_reach_goes_to_the_ends_of_what_claims_stand_for() -> None:
    """w_f1 = 1.4 w_D with w_D claimed 20.4: 1.4 x 20.35 = 28.49 to 1.4 x 20.45 = 28.63."""
    graph = beam(0)
    found = reach(graph["loads/w_f1"], {"loads/w_D": claim(graph["loads/w_D"], 20.4)})

    assert (found.low, found.high) == pytest.approx((28.49, 28.63))


@pytest.mark.parametrize(
    ("kind", "says", "text", "told"),
    [
        (rows.LEFT_OUT, ("phi_s",), "factor left out; reproduced with phi_s left out", True),
        (rows.LEFT_OUT, ("phi_s",), "factor twice; reproduced with phi_s taken twice", False),
        (rows.LEFT_OUT, ("phi_s",), "factor left out; reproduced with phi_c left out", False),
        (rows.SYMBOL, ("d & d_v",), "other symbol; d in place of d_v", True),
        (rows.SYMBOL, ("d & d_v",), "other symbol; d_v in place of h", False),
        (rows.DIAMETER, ("d_b",), "diameter; diameter d_bs in place of its radius", False),
        (rows.LEG, ("~leg",), "one leg; one leg of 2", True),
        (rows.EDITION, ("0.6", "phi_c"), "constant; 0.60 in place of 0.65", False),
    ],
)
def test_a_sentence_tells_a_slip_by_its_kind_and_its_symbols(
    kind: str,
    says: tuple[str, ...],
    text: str,
    told: bool,  # noqa: FBT001 - the expected answer
) -> None:
    slip = Planted(kind, "flexure/M_r", "", lambda _: 0.0, says)

    assert tells(slip, text) is told


def test_every_kind_has_words_and_something_to_plant() -> None:
    assert set(rows.WORDS) == set(rows.KINDS)
    whole = all_slips(beam(BEAMS - 1), Random(1))  # noqa: S311 - the same slips every time
    assert [kind for kind, slips in whole.items() if not slips] == []
