"""A slip that several origins have in common is told once; each of them stays a finding."""

from __future__ import annotations

from tests.audit.hand import beam, typed

from lineproof.audit.audit import audit_claims
from lineproof.audit.data import Audit
from lineproof.audit.graph import Graph
from lineproof.audit.report import report_record
from lineproof.audit.shared import shared_slips
from lineproof.cli.audit_output import as_text


def audited(**claims: str) -> Audit:
    graph = Graph(beam())
    made = [typed(graph, i.replace("__", "/"), text) for i, text in claims.items()]
    return audit_claims(graph.record, made, graph)


def test_one_wrong_constant_in_two_lines_is_told_once() -> None:
    """phi_s = 0.9 for 0.85 in a and in M_r, each wrong by itself.

    a = 0.9 x 480 000/6279 = 68.80; M_r = 432 000 x (538.95 - 34.40) = 217.97 kN.m, where the
    claimed a gives 408 000 x 504.55 = 205.86.
    """
    audit = audited(beam__a="68.80", strength__M_r="217.97")

    assert [f.ids[0] for f in audit.findings] == ["strength/M_r", "beam/a"]
    (said,) = shared_slips(audit)
    assert said.startswith(
        "One slip reproduces findings 1 and 2 alike: phi_s (1.11) = 0.9 (member "
    )
    assert "= 0.9 (member factor of ACI 318M) in place of 0.85" in said
    assert said in as_text(audit, Graph(beam()))
    entries = report_record(audit, beam()).entries
    assert entries["compared/shared-1"]["text"] == said


def test_slips_of_their_own_are_not_shared() -> None:
    """d with 2 c_c left: 538.95 + 40; M_f = 40 x 36/4 = 360, the 8 halved."""
    assert shared_slips(audited(beam__d="578.95", strength__M_f="360.0")) == ()


def test_a_sign_turned_in_two_results_is_no_slip_in_common() -> None:
    assert shared_slips(audited(beam__d="-538.95", beam__a="-64.98")) == ()
