"""Moments with the opposite sign throughout are another convention; a single one is a slip."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from functools import cache

from tests.audit.hand import sheet_of, typed
from tests.beams.continuous import flow

from lineproof.audit.audit import audit_claims
from lineproof.audit.claims.conventions import convention_of
from lineproof.audit.data import Audit, Judged, Verdict
from lineproof.audit.graph import Graph, Node
from lineproof.audit.report import report_record
from lineproof.cli.audit_output import as_data, as_text
from lineproof.quantity.digits import rounded_text
from lineproof.quantity.units import internal_factor

SUPPORT = ("M_sn", "M_sf")


@cache
def spans() -> Graph:
    """Return three spans: support moments negative, hogging moments at faces positive."""
    return Graph(flow.record_of())


def text_of(graph: Graph, node: Node, sign: int = 1) -> str:
    return rounded_text(sign * graph.stored[node.id] / internal_factor(node.unit), 3)


def audited(turned: Callable[[Node], bool], also: Iterable[str] = ()) -> Audit:
    """Audit all moments and shears at supports with three digits, some with the sign turned."""
    graph = spans()
    wanted = [
        node
        for node in graph
        if node.has_value
        and (node.symbol in (*SUPPORT, "V_sn") or node.part == "analysis" or node.id in also)
    ]
    claims = [typed(graph, n.id, text_of(graph, n, -1 if turned(n) else 1)) for n in wanted]
    return audit_claims(graph.record, claims, graph)


def is_support_moment(node: Node) -> bool:
    return node.symbol in SUPPORT or (node.part == "analysis" and node.symbol.startswith("M_"))


def said(audit: Audit) -> dict[str, Judged]:
    return {each.id: each for each in audit.judged if each.claim is not None}


def test_all_support_moments_positive_are_told_once_as_a_note() -> None:
    """Those that pattern loads turn positive in the calc are claimed negative: of one kind too.

    V_sn = w_f l/2 + (M_sf - M_sn)/l follows from the moments in the calc's own signs.
    """
    audit = audited(is_support_moment)

    assert audit.findings == ()
    assert {each.verdict for each in said(audit).values()} == {Verdict.AGREES}
    (note,) = audit.notes
    count = sum(is_support_moment(spans()[i]) for i in said(audit))
    assert note.startswith(f"{count} claimed moments (")
    assert "another sign convention" in note


def test_the_note_is_printed_and_the_claim_stays_as_typed() -> None:
    audit = audited(is_support_moment)
    graph = spans()

    assert f"note: {audit.notes[0]}" in as_text(audit, graph)
    data = as_data(audit, graph)
    assert data["notes"] == list(audit.notes)
    row = next(r for r in data["judged"] if r["id"] == "analysis/M_2D")
    assert graph.stored["analysis/M_2D"] < 0
    assert float(row["claimed"].split()[0]) > 0
    first = report_record(audit, graph.record).parts[0]["entries"]
    assert [e["text"] for e in first if e["title"] == "How claims were read"] == list(audit.notes)


def test_a_single_one_of_opposite_sign_is_an_origin() -> None:
    audit = audited(lambda node: node.id == "hog-2-left/M_sn")

    found = said(audit)["hog-2-left/M_sn"]
    assert found.verdict is Verdict.ORIGIN
    assert found.slips[0].kind == "sign"
    assert audit.notes == ()


def test_one_moment_alone_says_nothing_of_a_convention() -> None:
    graph = spans()
    claim = typed(graph, "analysis/M_2D", text_of(graph, graph["analysis/M_2D"], -1))

    (finding,) = audit_claims(graph.record, [claim], graph).findings
    assert "sign" in finding.advice


def test_an_error_beside_the_convention_is_still_found() -> None:
    """All signs turned, and one moment half as large: an origin, in the sign it was typed in."""
    graph = spans()
    wrong = "hog-2-left/M_sn"
    claims = [
        typed(graph, n.id, text_of(graph, n, -1)) for n in graph if n.symbol == "M_sn"
    ]  # fmt: skip
    half = rounded_text(-graph.stored[wrong] / internal_factor(graph[wrong].unit) / 2, 3)
    claims = [typed(graph, wrong, half) if c.id == wrong else c for c in claims]

    (finding,) = audit_claims(graph.record, claims, graph).findings
    assert finding.ids[0] == wrong
    assert f"{half} kN·m does not follow" in finding.what


def test_hogging_moments_written_negative_are_a_kind_of_their_own() -> None:
    """M_f at faces is positive in the calc; negative in all of them, while spans stay positive."""
    graph = spans()
    hog, sag = (
        [n for n in graph if n.symbol == "M_f" and n.part.startswith(part)]
        for part in ("hog-", "sag-")
    )
    claims = [typed(graph, n.id, text_of(graph, n, -1)) for n in hog]
    claims += [typed(graph, n.id, text_of(graph, n)) for n in sag]

    assert convention_of(graph, claims).ids == {n.id for n in hog}
    assert audit_claims(graph.record, claims, graph).findings == ()


def test_only_moments_have_a_convention() -> None:
    """Two lengths claimed negative are two slips."""
    sheet = sheet_of({"d = h - c_c": "mm", "d_v = 0.9*d": "mm"}, {"h": "600 mm", "c_c": "60 mm"})
    record = sheet.close()
    graph = Graph(record)
    claims = [typed(graph, "beam/d", "-540"), typed(graph, "beam/d_v", "-486")]

    assert convention_of(graph, claims).ids == frozenset()


def test_one_moment_that_stands_in_two_parts_is_no_convention() -> None:
    """The moment at the far end, in the part of flexure and of shear: one slip, told as such."""
    graph = spans()
    ids = ("hog-2-right/M_sf", "shear-2-left/M_sf")
    assert graph.stored[ids[0]] == graph.stored[ids[1]]
    claims = [typed(graph, i, text_of(graph, graph[i], -1)) for i in ids]

    audit = audit_claims(graph.record, claims, graph)

    assert audit.notes == ()
    assert [f.ids[0] for f in audit.findings] == list(ids)


def test_one_symbol_turned_beside_others_in_our_sign_is_no_convention() -> None:
    """All moments at the far ends turned, those at the near ends not: each turned one is told."""
    audit = audited(lambda node: node.symbol == "M_sf")

    assert audit.notes == ()
    assert audit.findings


def test_signs_that_a_line_below_carries_on_are_no_convention() -> None:
    """40 x 6^2/8 = 180 and 20 x 6^2/8 = 90 kN.m, both claimed negative.

    F_1 = M_1/d = 180/0.5 = 360 kN: -360 is worked of the wrong sign, 360 of another convention.
    """
    graph = Graph(
        sheet_of(
            {"M_1 = w_1*l**2/8": "kN.m", "M_2 = w_2*l**2/8": "kN.m", "F_1 = M_1/d": "kN"},
            {"w_1": "40 kN/m", "w_2": "20 kN/m", "l": "6 m", "d": "500 mm"},
        ).close()
    )
    moments = [typed(graph, "beam/M_1", "-180"), typed(graph, "beam/M_2", "-90")]

    assert convention_of(graph, moments).ids == {"beam/M_1", "beam/M_2"}
    assert convention_of(graph, [*moments, typed(graph, "beam/F_1", "360")]).ids
    assert not convention_of(graph, [*moments, typed(graph, "beam/F_1", "-360")]).ids
