"""The package model: summary, loads, values to confirm, facts."""

from __future__ import annotations

import copy
from typing import Any

import pytest

from lineproof.errors import UserError
from lineproof.formula import Notation
from lineproof.formula.grammar import parse_expression
from lineproof.package import build_package
from lineproof.package.calc import PartBlock
from lineproof.package.facts import project_facts
from lineproof.package.layout import WORKING_WIDTH, cut, fitted
from lineproof.typeset import formula_math, plain
from lineproof.typeset.chains import Chain
from lineproof.typeset.measure import width

Record = dict[str, Any]


def test_summary_names_demand_and_resistance(whole_record: Record) -> None:
    """Where a criterion asks for "at least", demand is its right side."""
    rows = {row.title: row for row in build_package([whole_record]).calcs[0].summary}

    assert plain(rows["Moment resistance"].demand).startswith("M_f = ")
    assert plain(rows["Moment resistance"].resistance).startswith("M_r = ")
    assert plain(rows["Minimum steel"].demand).startswith("A_s,min = ")
    assert all(row.holds for row in rows.values())


def test_figures_in_front_are_known(whole_record: Record) -> None:
    """Loading and section stand before the working."""
    calc = build_package([whole_record]).calcs[0]

    assert calc.in_front == {"loads/loading", "section/section"}
    assert [row.title for row in calc.loads] == [
        "Slab over the tributary width", "Web below the slab", "Dead load", "Live load",
        "Factored load, cases 1 and 2", "Factored moment at midspan",
    ]  # fmt: skip


def test_values_to_confirm_name_their_lines(whole_record: Record) -> None:
    """The one that the office has confirmed says by whom."""
    items = build_package([whole_record]).calcs[0].confirm
    confirmed = {item.what: item.confirmed for item in items if item.confirmed}

    assert confirmed == {"Resistance factor for steel": "A.V., 2026-11-18"}
    assert all(anchor and label for item in items for anchor, label in item.lines)


def test_without_a_walk_all_parts_come_in_order(whole_record: Record) -> None:
    """Parts as the record holds them."""
    blocks = build_package([whole_record]).calcs[0].blocks

    assert [b.key for b in blocks if isinstance(b, PartBlock)] == [
        part["key"] for part in whole_record["parts"]
    ]


def test_two_calcs_have_anchors_of_their_own(whole_record: Record) -> None:
    """The calc's id stands before the entry's id."""
    other = copy.deepcopy(whole_record)
    other["calc"] = {"id": "B8 <x>", "title": ""}
    package = build_package([whole_record, other])

    assert [calc.anchor for calc in package.calcs] == ["B7/", "B8--x-/"]
    assert package.calcs[1].summary[0].anchor.startswith("B8--x-/flexure/")


def test_nothing_to_print_is_an_error() -> None:
    """A package has at least one calc."""
    with pytest.raises(UserError, match="no record"):
        build_package([])


def test_facts_survive_a_project_of_another_shape() -> None:
    """Odd TOML content prints as what it is or as an empty line."""
    facts = project_facts(
        {
            "project": "x",
            "drawings": {"number": 201},
            "issue": {"superseded": ["a", 1]},
            "firm": None,
        },
        {"pair": "NBC 2015 + A23.3-14"},
    )

    assert facts.name == ""
    assert facts.drawings[0].number == "201"
    assert facts.superseded == "a, 1"
    assert [fact.value for fact in facts.facts if fact.label == "Codes"] == ["NBC 2015 + A23.3-14"]


def test_codes_that_are_no_locked_pair_are_not_printed() -> None:
    """A sheet of own lines alone meets no beam that would refuse them."""
    with pytest.raises(UserError, match=r"'NBC 2015 \+ A23\.3:19' is not a locked code pair"):
        project_facts({"codes": {"pair": "NBC 2015 + A23.3:19"}}, {})


def test_every_calculation_says_where_its_beam_stands() -> None:
    """A row of ``locations`` for each; the place of the project where there are no rows.

    Where none is named a blank is left, to be filled in by hand.
    """
    rows = {"locations": [{"calc": "B7", "grid": "C/2-5", "level": "2"},
                          {"calc": "B12", "grid": "A/2-4"}]}  # fmt: skip

    def said(project: Record, *calcs: str) -> dict[str, str]:
        facts = project_facts(project, {}, calcs).facts
        return {
            f.label: f.value for f in facts if f.label.startswith(("Location", "Grid", "Level"))
        }

    assert said(rows, "B7") == {"Grid": "C/2-5", "Level": "2"}
    assert said(rows, "B7", "B12", "B9") == {
        "Location of B7": "C/2-5; 2", "Location of B12": "A/2-4", "Location of B9": "",
    }  # fmt: skip
    assert said(rows, "B9") == {"Grid": "", "Level": ""}
    assert said({"location": {"grid": "D"}}, "B7") == {"Grid": "D", "Level": ""}


def test_running_heads_are_cut() -> None:
    """An ellipsis shows that something is missing."""
    assert cut("short", 10) == "short"
    assert cut("a" * 20, 10) == "a" * 9 + "…"
    assert cut("梁" * 3, 10) == "<U+6881>…"  # as long as it is printed
    assert cut("e\u0301", 10) == "e\u0301"
    assert len(cut("W" * 60, 56)) < 34


def test_long_chains_break_and_keep_their_text() -> None:
    """No piece is wider than the working column."""
    long = formula_math(parse_expression(" + ".join(["alpha_1*b_wide*(c - d)"] * 8)), Notation([]))
    chain = Chain(formula_math(parse_expression("M_r"), Notation([])), (long,))
    laid = fitted(chain)

    assert "".join(plain(p.math) for p in laid.pieces) == plain(long)
    assert all(width(p.math) <= WORKING_WIDTH for p in laid.pieces)
    assert all(p.scale == "1" for p in laid.pieces)
