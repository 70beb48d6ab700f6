"""Effects of other values on the checks downstream, both numbers by hand."""

from __future__ import annotations

import pytest

from lineproof.audit.effects import (
    CLAIMED,
    DRAWN,
    RECORDED,
    effects_of,
    effects_of_right,
    place_of,
    turned_decisions,
    turned_sentence,
)
from lineproof.audit.graph import Graph
from lineproof.formula import criterion
from lineproof.record import Record
from lineproof.sheet import Sheet

RATIO = pytest.approx


@pytest.fixture(scope="module")
def graph() -> Graph:
    """A section by hand: M_r = 0.85 x 1000 x 400 x 500 = 170 kN.m against M_f = 180 kN.m."""
    return Graph(_record())


def _record() -> Record:
    sheet = Sheet("B1")
    with sheet.part("data", "Data"):
        sheet.given("f_y", "400 MPa", "yield strength")
        sheet.given("A_smin", "800 mm2", "least steel")
        sheet.given("M_f", "180 kN.m", "factored moment")
        sheet.given("w_f", "40 kN/m", "factored load")
        sheet.given("w_r", "50 kN/m", "load that the slab brings at most")
    with sheet.part("sag-2", "Span 2: positive moment"):
        sheet.given("A_s", "1000 mm2", "steel")
        sheet.given("z_a", "500 mm", "lever arm")
        sheet.line("M_r = 0.85*A_s*f_y*z_a", unit="kN.m", title="Moment resistance")
        sheet.check("w_f <= w_r", title="Load", key="load")
        sheet.decide("A_s <= A_smin", title="Only the least steel", key="least")
        sheet.check("A_smin <= A_s", title="Minimum reinforcement", key="minimum")
        sheet.check("M_f <= M_r", title="Moment resistance", key="strength")
    return sheet.close()


def test_a_claim_that_hides_a_failing_check_comes_first_with_both_numbers(graph: Graph) -> None:
    # 1200 mm2 claimed: M_r = 204 kN.m, 180/204 = 0.882; right 180/170 = 1.059.
    # Least steel: 800/1200 = 0.667 claimed, 800/1000 = 0.8 right.
    strength, minimum = effects_of(graph, {"sag-2/A_s": 1200.0})

    assert strength.check == "sag-2/strength"
    assert strength.claimed == RATIO(180 / 204)
    assert strength.right == RATIO(180 / 170)
    assert (strength.holds_as_claimed, strength.holds) == (True, False)
    assert strength.sentence == (
        "Moment resistance, span 2 (2.7): utilisation from 0.88 as claimed to 1.06 with the right "
        "value, no longer holds"
    )
    assert minimum.sentence == (
        "Minimum reinforcement, span 2 (2.6): utilisation from 0.67 as claimed to 0.80 with the "
        "right value, still holds"
    )


def test_a_drawing_is_told_from_the_calc_to_what_is_drawn(graph: Graph) -> None:
    # 700 mm2 drawn: M_r = 119 kN.m, 180/119 = 1.513; 800/700 = 1.143.
    minimum, strength = effects_of(graph, {"sag-2/A_s": 700.0}, DRAWN)

    assert minimum.sentence == (
        "Minimum reinforcement, span 2 (2.6): utilisation from 0.80 in the calc to 1.14 as drawn, "
        "no longer holds"
    )
    assert strength.sentence.endswith(
        "utilisation from 1.06 in the calc to 1.51 as drawn, does not hold either way"
    )


def test_a_record_that_is_wrong_is_told_from_what_it_says(graph: Graph) -> None:
    # The steel should be 1200 mm2: 180/204 = 0.882 put right, 180/170 = 1.059 as recorded.
    strength, _ = effects_of_right(graph, {"sag-2/A_s": 1200.0})

    assert (strength.holds_as_claimed, strength.holds) == (False, True)
    assert strength.sentence.endswith(
        "utilisation from 1.06 as recorded to 0.88 put right, holds after all"
    )


def test_a_check_that_turns_to_hold_says_so(graph: Graph) -> None:
    # 900 mm2 of least steel claimed for 800: 0.9 and 0.8; the strength has no part in it.
    # 1100 claimed: 1.1 does not hold, 0.8 does.
    (effect,) = effects_of(graph, {"data/A_smin": 1100.0})

    assert not effect.holds_as_claimed
    assert effect.holds
    assert effect.sentence.endswith("from 1.10 as claimed to 0.80 with the right value, holds "
                                    "after all")  # fmt: skip


def test_a_utilisation_just_over_one_is_not_printed_as_one(graph: Graph) -> None:
    # M_r = 0.85 x 1000 x 400 x 529.2 = 179.928 kN.m: 180/179.928 = 1.0004.
    (effect,) = effects_of(graph, {"sag-2/z_a": 529.2})

    assert "from 1.0004 as claimed to 1.0588 with" in effect.sentence


def test_a_change_that_would_not_print_is_no_effect(graph: Graph) -> None:
    # 180/170.034 differs from 180/170 by 0.0002.
    assert effects_of(graph, {"sag-2/z_a": 500.1}) == ()


def test_a_utilisation_that_is_lost_is_told(graph: Graph) -> None:
    # No lever arm: M_r = 0, and a share of nothing is no number; the comparison is still false.
    (effect,) = effects_of(graph, {"sag-2/z_a": 0.0})

    assert effect.claimed is None
    assert effect.sentence == (
        "Moment resistance, span 2 (2.7): utilisation from none as claimed to 1.06 with the right "
        "value, does not hold either way"
    )


def test_a_check_that_cannot_be_worked_is_told() -> None:
    sheet = Sheet("B1")
    with sheet.part("data", "Data"):
        sheet.given("a", "2 mm", "depth of the block")
        sheet.given("d", "3 mm", "depth")
        sheet.check("a/d <= 0.5", title="Depth of the block", key="depth")

    (effect,) = effects_of(Graph(sheet.close()), {"data/d": 0.0})

    assert not effect.holds_as_claimed
    assert effect.sentence == "Depth of the block, data (1.3): cannot be worked as claimed"


def test_a_decision_that_turns_is_named(graph: Graph) -> None:
    assert turned_decisions(graph, {"sag-2/A_s": 700.0}) == ("sag-2/least",)
    assert turned_decisions(graph, {"sag-2/A_s": 900.0}) == ()


def test_the_sentence_on_a_decision_that_turns_names_the_branch_recorded(graph: Graph) -> None:
    """A_s 1000 <= 800 does not hold in the calc; with 700 it would, with 900 it does not."""
    assert turned_sentence(graph, {"sag-2/A_s": 900.0}) == ""
    assert turned_sentence(graph, {"sag-2/A_s": 700.0}) == (
        "As claimed, a decision of the calc would turn: Only the least steel, span 2 (2.5), where "
        "A_s <= A_smin would hold. Effects are told along the recorded branch only; the lines of "
        "the other are not in the calc."
    )
    assert turned_sentence(graph, {"sag-2/A_s": 700.0}, DRAWN).startswith("As drawn, a decision")
    assert turned_sentence(graph, {"sag-2/A_s": 700.0}, RECORDED).startswith(
        "Put right, a decision"
    )


def test_a_decision_says_what_was_concluded_and_many_are_counted() -> None:
    """a = 90 turns a <= 80, a <= 85 and a <= 88, of which two are named."""
    sheet = Sheet("B2")
    with sheet.part("block", "Span 1: block"):
        sheet.given("a", "60 mm", "depth of the block")
        for number, limit in enumerate((80, 85, 88), 1):
            test = criterion(
                f"a <= {limit}", title="Where the block ends", numbers={str(limit): "mm"},
                yes="The block lies in the flange.", no="The block reaches the web.",
            )  # fmt: skip
            sheet.decide(test, key=f"flange-{number}")

    said = turned_sentence(Graph(sheet.close()), {"block/a": 90.0})

    assert said.startswith(
        "As claimed, 3 decisions of the calc would turn: Where the block ends, span 1 (1.2), where "
        'a <= 80 would not hold (recorded: "The block lies in the flange."); Where the block ends'
    )
    assert "; and 1 more. Effects are told" in said


@pytest.mark.parametrize(
    ("title", "place"),
    [
        ("Support 2, left face: negative moment", "support 2, left face"),
        ("Bottom bars of span 3: end in the tension zone", "span 3"),
        ("Stirrups", "stirrups"),
    ],
)
def test_the_place_of_a_part(title: str, place: str) -> None:
    assert place_of(title) == place


def test_what_is_told_last_decides_the_order() -> None:
    assert CLAIMED.claimed_first
    assert not DRAWN.claimed_first


def test_a_check_that_fails_when_put_right_comes_before_one_that_holds_after_all(
    graph: Graph,
) -> None:
    # Strength 0.882 hides 1.059, by 0.18; load 100/50 = 2 is really 0.8, by 1.2: it moves more.
    found = effects_of(graph, {"sag-2/A_s": 1200.0, "data/w_f": 100.0})
    assert [effect.check for effect in found] == ["sag-2/strength", "sag-2/load", "sag-2/minimum"]


def test_a_check_that_only_proves_the_calc_is_no_effect() -> None:
    agree = criterion("a <= b", title="Both ways agree", key="agree", proof=True)
    sheet = Sheet("B2")
    with sheet.part("data", "Data"):
        sheet.given("a", "2 m", "first way")
        sheet.given("b", "2 m", "second way")
        sheet.check(agree)
        sheet.check("a <= b", title="Room", key="room")
    found = effects_of(Graph(sheet.close()), {"data/a": 3000.0})
    assert [effect.check for effect in found] == ["data/room"]
