"""Findings of judged claims: sentences, clause, advice, severity by what happens to the checks."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace

import pytest
from tests.audit import hand
from tests.audit.hand import beam, typed
from tests.beams.gallery import record_of

from lineproof.audit.audit import audit_claims
from lineproof.audit.data import Cause, Effect, Finding, Interval, Judged, Severity, Slip, Verdict
from lineproof.audit.findings import findings_of, importance
from lineproof.audit.graph import Graph
from lineproof.audit.review.data import Review, Reviewer
from lineproof.audit.review.findings import with_findings
from lineproof.record import Record

AT = "2026-12-01T15:05:33Z"


def found(record: Record, claims: Mapping[str, str]) -> tuple[Finding, ...]:
    graph = Graph(record)
    return audit_claims(record, [typed(graph, i, t) for i, t in claims.items()], graph).findings


def test_no_finding_where_claims_agree_or_go_another_way() -> None:
    """209 by K_r 1.8, d 535 rounded down: remarks, no findings."""
    assert found(beam(), {"strength/M_r": "209", "strength/M_f": "180"}) == ()
    assert found(beam(), {"beam/d": "535"}) == ()


def test_an_origin_is_one_finding_with_the_lines_that_carry_it() -> None:
    """A_s 900: M_r = 157.46 < 180: as claimed the check fails, with 206.64 it holds."""
    (finding,) = found(beam(), {"beam/A_s": "900", "strength/M_r": "157.5"})
    assert finding.ids == ("beam/A_s", "strength/M_r")
    assert finding.what.endswith(
        "900 mm² does not follow from the values that the claim uses; 1200 mm² does; "
        "1 claimed line carries it"
    )
    assert finding.severity is Severity.MAJOR
    assert [(e.holds_as_claimed, e.holds) for e in finding.effects] == [(False, True)]
    assert finding.effects[0].claimed == pytest.approx(180 / 157.46, rel=1e-3)
    assert finding.advice


def test_what_was_written_wrongly_and_used_rightly_moves_no_check() -> None:
    """d 593 for 539: M_r = 408 000 x (538.95 - 32.49) = 206.6 was worked with the right one.

    With 593 it would be 228.7, a utilisation of 0.79; nobody has claimed that.
    """
    (finding,) = found(beam(), {"beam/d": "593", "strength/M_r": "206.6"})
    assert finding.effects == ()
    assert finding.severity is Severity.MINOR
    assert "follows from what it should be: it was written wrongly and used rightly" in (
        finding.advice
    )
    (used,) = found(beam(), {"beam/d": "593", "strength/M_r": "228.7"})
    (effect,) = used.effects
    assert effect.claimed == pytest.approx(180 / 228.7, rel=1e-3)
    assert effect.right == pytest.approx(180 / 206.636, rel=1e-3)


def test_where_another_factor_is_from_is_said() -> None:
    """A23.3-94 had 0.60 for phi_c, 8.4.2 of the later editions 0.65."""
    (finding,) = found(record_of(), {"materials/phi_c": "0.60"})
    assert finding.advice.startswith("0.60 is known from: A23.3-94. Settle which input is right")
    (other,) = found(record_of(), {"materials/phi_c": "0.61"})
    assert other.advice.startswith("Settle which input is right")


def test_a_digit_mistyped_may_be_chance_unless_it_was_used_rightly() -> None:
    """M_f 188 for 180, and nothing shows what was used; d 593 with the M_r of 539 shows it."""
    (alone,) = found(beam(), {"strength/M_f": "188"})
    assert "the result 180 written as 188" in alone.advice
    assert "may fit by chance" in alone.advice
    (shown,) = found(beam(), {"beam/d": "593", "strength/M_r": "206.6"})
    assert "the result 539 written as 593" in shown.advice
    assert "may fit by chance" not in shown.advice


def test_a_demand_written_wrongly_stands_in_its_own_check() -> None:
    """A_s 900 written, 1200 used for M_r; the check of A_s itself compares what is written."""
    sheet = hand.sheet_of()
    with sheet.part("checks", "Span 1: checks"):
        sheet.given("A_smin", "657 mm2")
        sheet.check("A_smin <= A_s", key="least", title="Minimum reinforcement")
        sheet.check("M_f <= M_r", key="strength", title="Moment resistance")
    (finding,) = found(sheet.close(), {"beam/A_s": "900", "beam/a": "65.0", "beam/M_r": "206.6"})
    # 657/900 = 0.73, 657/1200 = 0.5475
    (effect,) = finding.effects
    assert effect.check == "checks/least"
    assert effect.claimed == pytest.approx(657 / 900, rel=1e-3)
    assert effect.right == pytest.approx(657 / 1200, rel=1e-3)


def test_severity_goes_by_the_checks() -> None:
    """With w_f 60 M_f = 270 > 206.6 fails: a claim that makes it hold is critical."""
    sheet = hand.sheet_of(givens=hand.GIVENS | {"w_f": "60 kN/m"})
    with sheet.part("checks", "Span 1: checks"):
        sheet.check("M_f <= M_r", key="strength", title="Moment resistance")
    failing = sheet.close()
    cases = [
        (failing, {"beam/M_r": "300"}, Severity.CRITICAL),  # holds as claimed, fails when right
        (failing, {"beam/M_r": "230"}, Severity.MAJOR),  # 270/230 hides 270/206.6: fails either way
        (beam(), {"strength/M_f": "150"}, Severity.MAJOR),  # 150/206.6 hides 180/206.6
        (beam(), {"strength/M_f": "178"}, Severity.MINOR),  # 178/206.6 = 0.861 hides 0.871
        (beam(), {"strength/M_f": "193"}, Severity.MINOR),  # asks for more than it needs
        (beam(), {"given/w_f": "45 kN/m"}, Severity.MINOR),  # the same by an input
        (beam(), {"given/h_f": "120 mm"}, Severity.OBSERVATION),  # nothing rests on it
        (beam(), {"beam/d": "540"}, Severity.MINOR),  # a rounding that is not conservative
    ]
    for record, claims, severity in cases:
        (finding,) = found(record, claims)
        assert finding.severity is severity, claims


def test_findings_come_the_gravest_first() -> None:
    """h_f moves nothing; M_f 150 for 180 hides 0.87; d 500 asks for more."""
    said = found(beam(), {"given/h_f": "120 mm", "strength/M_f": "150", "beam/d": "500"})
    assert [f.ids[0] for f in said] == ["strength/M_f", "beam/d", "given/h_f"]


def test_of_equal_severity_what_turns_a_check_comes_before_what_only_moves_one() -> None:
    """A check from 1.02 to 0.98 turns; one from 0.40 to 0.90 moves more and holds all along."""
    turning = Effect("a", 1.02, 0.98, holds_as_claimed=False, holds=True, sentence="")
    moving = Effect("b", 0.40, 0.90, holds_as_claimed=True, holds=True, sentence="")
    little = replace(moving, claimed=0.85)
    turns, moves, least = (
        Finding("claims", Severity.MAJOR, "", (), effects=(effect,))
        for effect in (turning, moving, little)
    )
    assert sorted([least, moves, turns], key=importance) == [turns, moves, least]


def test_a_line_not_changed_with_its_input_says_so() -> None:
    said = found(beam(), {"given/n_b": "5", "beam/A_s": "1200"})
    assert [f.ids[0] for f in said] == ["given/n_b", "beam/A_s"]
    assert "1200 mm² does not follow from the values that the claim uses" in said[1].what
    assert "1500 mm² does, and 1200 mm² is right; it is the value for other inputs" in said[1].what


def test_a_line_that_cannot_be_judged_is_not_carried_as_well() -> None:
    """With a of 110 the decision a <= h_f of 100 turns: M_r has a finding of its own."""
    graph = Graph(beam("a <= h_f"))
    claims = [typed(graph, "beam/a", "110"), typed(graph, "strength/M_r", "150")]

    first, second = audit_claims(graph.record, claims, graph).findings

    assert {first.ids, second.ids} == {("beam/a",), ("strength/M_r",)}
    assert "carries it" not in first.what + second.what


def test_a_slip_of_units_is_told_as_one() -> None:
    (finding,) = found(beam(), {"strength/M_f": "180 N.mm"})
    assert "180 N·mm claimed; reproduced exactly with N·mm in place of kN·m" in finding.what


def test_a_finding_names_the_page_of_the_others_calculation() -> None:
    """M_r with h for d: 408 000 x (600 - 32.489) = 231.54 kN.m."""
    graph = Graph(beam())
    claim = replace(typed(graph, "strength/M_r", "231.5"), where="p. 3")
    (finding,) = audit_claims(graph.record, [claim], graph).findings
    assert ": 231.5 kN·m (p. 3) does not follow from" in finding.what


def test_a_finding_that_changes_no_check_says_so() -> None:
    """Nothing rests on h_f; M_f is compared with M_r."""
    said = {f.ids[0]: f.advice for f in found(beam(), {"given/h_f": "120 mm", "beam/d": "540"})}
    assert said["given/h_f"].endswith(" No check of the calc changes by it.")
    assert "No check" not in said["beam/d"]


def test_a_finding_says_where_a_wrong_value_turns_a_decision() -> None:
    """a = 65 <= h_f = 100 in the calc; 110 is claimed: M_r was worked by the branch recorded."""
    (finding,) = found(beam("a <= h_f"), {"beam/a": "110"})
    assert "would turn: Which branch, span 1 (3.1), where a <= h_f would not hold." in (
        finding.advice
    )
    assert "As claimed" not in found(beam("a <= h_f"), {"beam/a": "76.4"})[0].advice


def test_lambda_is_written_without_the_underscore_of_its_formula() -> None:
    """lambda_ 0.75 left out of 10 x 0.75: the claim is 10."""
    sheet = hand.sheet_of({}, {"k": "10 mm", "lambda_": "0.75"})
    with sheet.part("work", "Span 1: by hand"):
        sheet.line("x = k*lambda_", unit="mm")
    (finding,) = found(sheet.close(), {"work/x": "10.0"})
    assert "lambda (1.2" in finding.advice
    assert "lambda_" not in finding.advice


def test_a_line_without_a_title_is_named_by_its_symbol() -> None:
    """Givens of the beam by hand have no title; w_f is the 14th of them."""
    (finding,) = found(beam(), {"given/w_f": "45 kN/m"})
    assert finding.what.startswith("w_f, given (1.14): 45 kN/m claimed")


def test_a_finding_raised_in_a_review_starts_with_a_capital() -> None:
    """Titles of inputs start small; in a list of findings each is a sentence of its own."""
    sheet = hand.sheet_of({}, {})
    with sheet.part("work", "Span 1: by hand"):
        sheet.given("h", "600 mm", "overall depth")
    record = sheet.close()
    audit = audit_claims(record, [typed(Graph(record), "work/h", "650")])
    made = with_findings(Review(record.calc_id), audit, record, Reviewer("Ana Bell", "AB"), AT)
    assert [raised.text.partition(":")[0] for raised in made.findings] == [
        "Overall depth, span 1 (3.1)"
    ]


def test_a_slip_that_another_claim_speaks_against_comes_later_and_says_so() -> None:
    """By hand: w = 5 x 4 = 20 kN/m, R = 20 x 8/2 = 80 kN, M = 20 x 8^2/8 = 160 kN.m.

    M of 320 is w l^2/4; or w = 5 x 8 with l for s, but then R were 160 kN as well.
    """
    lines = {"w = q*s": "kN/m", "R = w*l/2": "kN", "M = w*l**2/8": "kN.m"}
    record = hand.sheet_of(lines, {"q": "5 kPa", "s": "4 m", "l": "8 m"}).close()
    (alone,) = found(record, {"beam/R": "80.0", "beam/M": "320"})
    assert alone.advice.startswith("Reproduced exactly with w*l**2/4 (coefficient)")
    assert "carries on to the claim, though R (2.2) rests on it as well and is right" in (
        alone.advice
    )
    both = found(record, {"beam/R": "160", "beam/M": "320"})
    moment = next(finding for finding in both if finding.ids == ("beam/M",))
    assert moment.advice.startswith("Reproduced exactly with l (1.3) = 8 m in place of s")
    assert "though" not in moment.advice


def test_an_unlikely_slip_is_told_as_chance_where_two_may_stand_behind_it() -> None:
    """phi_s left out and d measured to the underside of the bars, two slips in one line.

    1200 x 400 x (600 - 40 - 11.3 - 64.98/2) = 247.8 kN.m; f_y read as 480 gives, by chance,
    0.85 x 1200 x 480 x (538.95 - 64.98/2) = 248.0 kN.m. One slip, phi_s left out, gives
    1200 x 400 x (538.95 - 64.98/2) = 243.1 kN.m, and needs no such remark.
    """
    right = {"beam/d": "539", "beam/a": "65.0"}
    (two,) = found(beam(), {**right, "strength/M_r": "248"})
    assert "typed as 480 in place of 400" in two.advice
    assert "It may fit by chance: see whether two slips were made in this line." in two.advice
    (one,) = found(beam(), {**right, "strength/M_r": "243"})
    assert "by chance" not in one.advice


@pytest.mark.parametrize(
    ("likely", "usual", "by_chance"),
    [
        (0.11, True, False),
        (0.09, True, True),
        (0.09, False, False),
        (0.02, False, True),
    ],
)
def test_a_mistake_known_by_name_may_fit_by_chance_as_well(
    likely: float, *, usual: bool, by_chance: bool
) -> None:
    """The shares are set here; a slip of 0.02 that is none known by name fits many a number."""
    advice = advice_on(slip("phi_s", likely, usual=usual))
    assert advice.startswith("With phi_s left out.")
    assert ("may fit by chance" in advice) is by_chance


@pytest.mark.parametrize(("second", "told"), [(0.41, True), (0.39, False)])
def test_a_slip_as_likely_as_the_first_is_told_with_it(second: float, *, told: bool) -> None:
    """0.8 x 0.5 = 0.4: from so much on the second is told beside the first."""
    advice = advice_on(slip("phi_s", 0.5), slip("A_s", second))
    said = "With phi_s left out. Nearly as likely: With A_s left out."
    assert advice.startswith(said) is told


def slip(name: str, likely: float, *, usual: bool = True) -> Slip:
    cause = Cause("", usual=usual)
    return Slip("factor left out", f"with {name} left out.", 243e6, likely, causes=(cause,))


def advice_on(*slips: Slip) -> str:
    """Return the advice on a resistance of 243 for 206.6 kN.m with these slips behind it."""
    graph = Graph(beam())
    claim = typed(graph, "strength/M_r", "243")
    judged = Judged(claim.id, Verdict.ORIGIN, claim, Interval(206e6, 207e6), 206.6e6, slips=slips)
    (finding,) = findings_of(graph, [judged])
    return finding.advice
