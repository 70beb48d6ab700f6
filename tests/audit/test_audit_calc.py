"""The calc that audits the gallery floor beam: the slips in its figures, and no others."""

from __future__ import annotations

from functools import cache

from lineproof.audit.claims.judge import judge
from lineproof.audit.data import Audit, Claim, Interval, Severity, Verdict
from lineproof.audit.graph import Graph
from lineproof.audit.slips.search import searching
from lineproof.notebook.audited import audited
from lineproof.notebook.read import read_calc
from lineproof.resources import folder

CALCS = folder("calcs")
SLIPS = {
    "hog-2-left/M_f": "support axis",  # 361 at the axis for 311 at the face
    "sag-1/a": "b_w",  # 0.85 1500 400/(0.802 0.65 32 380) = 80.5 with the web for the flange
    "sag-2/w_f": "specified loads for factored ones",  # 20.37 + 14.88 = 35.3
    "deflection-2-sections/f_rd": "0.5",  # 0.6 sqrt(32) = 3.39, not halved
    "shear-1-right/V_s": "half of the legs",  # 143/2 = 71.6 with one leg for two
    "anchorage-bar-4/l_d": "",  # 645/1.3 = 496 without the factor of top bars
}
"""Lines at which the figures go wrong, and what their first slip names."""
DRAWN = {
    "Bars, B03: drawn 1-20M, 2-20M in the calc (S-501, revision B).",
    "Stirrup spacing, span 2, zone 1: drawn 400 mm, 350 mm in the calc (S-501, revision B).",
    "The calc rests on revision A of S-501, the drawing is revision B.",
}


@cache
def _audit() -> Audit:
    record = read_calc(CALCS / "floor-beam.ipynb").record
    return audited(
        Graph(record),
        CALCS / "floor-beam.ipynb",
        CALCS / "audit-claims.csv",
        CALCS / "audit-drawing.csv",
    )


def test_every_slip_is_found_at_its_origin_and_no_other() -> None:
    judged = {each.id: each for each in _audit().judged if each.claim is not None}
    origins = {name for name, each in judged.items() if each.verdict is Verdict.ORIGIN}
    assert origins == set(SLIPS)
    rest = {each.verdict for name, each in judged.items() if name not in origins}
    assert rest == {Verdict.AGREES, Verdict.CARRIED}
    for name, word in SLIPS.items():
        assert word in judged[name].slips[0].sentence, judged[name].slips


def test_top_bars_without_their_factor_are_among_the_slips() -> None:
    judged = next(each for each in _audit().judged if each.id == "anchorage-bar-4/l_d")
    assert any("k_1" in slip.sentence for slip in judged.slips), judged.slips


def test_what_the_drawing_shows_otherwise() -> None:
    """One bar for two fails the span; 400 mm is more than 0.7 d_v = 0.7 512 = 358."""
    found = {f.what: f for f in _audit().findings if f.source == "drawing"}
    assert set(found) == DRAWN
    critical = [what for what, f in found.items() if f.severity is Severity.CRITICAL]
    assert len(critical) == 2


def test_the_calc_prints_these_findings() -> None:
    record = read_calc(CALCS / "audit-of-a-beam.ipynb").record
    heads = [
        entry["title"]
        for part in record.parts if part["key"].startswith("findings-")
        for entry in part["entries"] if entry["kind"] == "note" and entry["title"]
    ]  # fmt: skip
    assert [head.partition(",")[0] for head in heads] == [f"Finding {n}" for n in range(1, 10)]


def test_a_second_path_is_no_effect() -> None:
    """The depth of the block claimed with the web makes the proof of M_r fail: not of the beam."""
    finding = next(f for f in _audit().findings if "sag-1/a" in f.ids)
    assert {effect.check for effect in finding.effects} == {"sag-1/yield", "sag-1/strength"}


def test_a_claim_is_not_explained_by_itself() -> None:
    """580 for 496 and for 645: no factor, row or constant gives it; it was said to be copied."""
    graph = Graph(read_calc(CALCS / "floor-beam.ipynb").record)
    for line in ("anchorage-bar-1/l_d", "anchorage-bar-4/l_d"):
        claim = Claim(line, "580", "mm", 580.0, Interval(579.5, 580.5))
        judged = next(each for each in judge(graph, [claim], searching()) if each.claim)
        assert (judged.verdict, judged.slips) == (Verdict.ORIGIN, ())
