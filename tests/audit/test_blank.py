"""Blank tables: which lines a quick check asks for, and that none of our values is in them."""

from __future__ import annotations

import csv
import io
import re

import pytest
from tests.audit.hand import beam
from tests.beams import gallery, tee_study
from tests.beams.continuous import flow

from lineproof.audit.claims.blank import HEADINGS, blank_table, quick_lines
from lineproof.audit.graph import Graph
from lineproof.errors import UserError
from lineproof.record.entry import GIVEN, LOOKUP


@pytest.fixture(scope="module")
def spans() -> Graph:
    return Graph(flow.record_of())


def rows_of(content: bytes) -> list[dict[str, str]]:
    return list(csv.DictReader(io.StringIO(content.decode("utf-8-sig"))))


def test_three_spans_are_asked_for_inputs_and_what_governs(spans: Graph) -> None:
    """Loads, moments, depth, steel, shear, anchorage, deflection, reactions; inputs before them."""
    quick = quick_lines(spans)
    inputs = ["given/l_2", "given/h", "given/b_w", "given/f_c", "loads/q_SD", "loads/q_L",
              "materials/f_y", "sag-2/n_1", "sag-2/d_b", "stirrups/n_v",
              "shear-2-left/s"]  # fmt: skip
    results = ["sag-2/w_f", "sag-2/M_f", "sag-2/d", "sag-2/A_s", "sag-2/M_r", "hog-2-left/M_f",
               "hog-2-left/M_r", "shear-2-left/V_f", "shear-2-left/V_r", "anchorage-bar-1/l_d",
               "deflection-2/delta_at", "support-2/R_f", "analysis/R_2D",
               "analysis/R_2L"]  # fmt: skip
    assert set(inputs + results) <= set(quick)
    assert not [i for i in quick if re.match(r"coverage|interface|anchorage-(top|bottom)", i)]
    per_span = [i for i in quick if re.match(r"(sag|shear|deflection|span)-2", i)]
    assert 15 <= len(per_span) <= 25


def test_a_single_span_is_asked_for_some_twenty_inputs() -> None:
    graph = Graph(gallery.record_of())
    quick = quick_lines(graph)
    inputs = [i for i in quick if graph[i].kind in (GIVEN, LOOKUP)]
    assert 18 <= len(inputs) <= 24
    results = {"loads/w_f", "loads/M_f", "loads/V_f", "bars/A_s", "bars/d", "flexure/M_r",
               "loads/R_D", "loads/R_L", "top-steel/M_r"}  # fmt: skip
    assert results <= set(quick)
    assert len(quick) - len(inputs) <= 22


def test_a_section_study_and_lines_of_ones_own() -> None:
    study = quick_lines(Graph(tee_study.study()))
    assert {"given/b_f", "bars/A_s", "bars/d", "flexure/M_r", "section/M_cr"} <= set(study)
    own = quick_lines(Graph(beam()))
    assert {"given/b", "given/w_f", "beam/d", "beam/A_s", "strength/M_r"} <= set(own)


@pytest.mark.parametrize("full", [False, True])
def test_a_blank_prints_none_of_our_values(spans: Graph, full: bool) -> None:  # noqa: FBT001
    rows = rows_of(blank_table(spans, ".csv", full=full))
    assert tuple(rows[0]) == HEADINGS
    assert len(rows) == (sum(n.has_value for n in spans) if full else len(quick_lines(spans)))
    for row in rows:
        node = spans[row["id"]]
        assert (row["claimed"], row["where"]) == ("", "")
        assert (row["symbol"], row["unit"], row["label"]) == (node.symbol, node.unit, node.label)
        printed = str(node.entry["printed"]["result"])
        words = re.findall(r"[\d.]+", f"{row['place']} {row['title']}")
        # A number of four digits or a fraction would be a value; 1.25D and span 2 are none.
        assert not (len(printed) > 3 and printed in words), row


def test_blanks_in_both_formats_hold_the_same_and_no_other_is_made(spans: Graph) -> None:
    assert blank_table(spans, ".XLSX")[:2] == b"PK"
    with pytest.raises(UserError, match=r"write a name in .csv or .xlsx"):
        blank_table(spans, ".txt")
