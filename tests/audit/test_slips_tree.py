"""Formulas taken apart: the same numbers as the compiled formulas, one place changed."""

from __future__ import annotations

from collections.abc import Callable

import pytest
from tests.audit.slip_sheet import beam
from tests.beams.continuous.flow import analysed, record_so_far

from lineproof.audit.graph import Graph, evaluated
from lineproof.audit.slips.tree import Places, places_of, text_of
from lineproof.formula import parse_expression, parse_line
from lineproof.formula.compiled import NOT_COMPUTED


def places(text: str, **named: float) -> Places:
    return Places(places_of(parse_expression(text)), {n: (v, 0.0) for n, v in named.items()})


def analysis() -> Graph:
    return Graph(record_so_far(analysed()))


@pytest.mark.parametrize("made_by", [beam, analysis])
def test_every_line_has_the_value_of_the_compiled_formula_to_the_last_bit(
    made_by: Callable[[], Graph],
) -> None:
    graph = made_by()
    lines = [node for node in graph if node.tree is not None]
    assert len(lines) > 20

    for node in lines:
        assert node.tree is not None
        named = graph.named(node, graph.stored)
        made = Places(places_of(node.tree), {name: (v, 0.0) for name, v in named.items()})
        assert made.values[0] == evaluated(node.tree, named), node.id


@pytest.mark.parametrize(
    ("text", "at", "value", "result"),
    [
        ("a - b", "a", 5.0, 5.0 - 3.0),
        ("a - b", "b", 5.0, 2.0 - 5.0),
        ("a/b", "b", 4.0, 0.5),
        ("min(7, a, b)", "b", 1.0, 1.0),
        ("max(b, 7, a)", "b", 9.0, 9.0),
        ("-sqrt(a + b)", "b", 14.0, -4.0),
        ("b**3", "b", 2.0, 8.0),
    ],
)
def test_one_place_changed(text: str, at: str, value: float, result: float) -> None:
    made = places(text, a=2.0, b=3.0)

    assert made.with_place(made.uses(at)[0], value) == result
    assert made.with_value(tuple(made.uses(at)), value) == result


def test_a_quantity_changed_wherever_it_stands() -> None:
    made = places("b*h**3/12 + b*h", b=2.0, h=3.0)

    # 4*27/12 + 4*3 = 9 + 12
    assert made.with_value(tuple(made.uses("b")), 4.0) == 21.0


def test_widths_add_up_to_first_order() -> None:
    made = Places(places_of(parse_expression("a*b - c/2")), {
        "a": (10.0, 0.5), "b": (4.0, 0.1), "c": (6.0, 0.2),
    })  # fmt: skip

    # 10*0.1 + 4*0.5 for the product, half of 0.2 for the rest
    assert made.halves[0] == pytest.approx(1.0 + 2.0 + 0.1)
    value, half = made.with_places({made.uses("b")[0]: (5.0, 0.0)})
    assert (value, half) == pytest.approx((47.0, 2.5 + 0.1))


@pytest.mark.parametrize("text", ["a/b", "sqrt(b - 1)", "(b - 1)**0.5", "cbrt(b - 1)", "1/b"])
def test_what_has_no_real_value_is_refused(text: str) -> None:
    made = places(text, a=2.0, b=3.0)

    with pytest.raises(NOT_COMPUTED):
        made.with_place(made.uses("b")[0], 0.0)


@pytest.mark.parametrize(
    "text",
    ["a*(b + 2)", "a - (b - c)", "a/(b*c)", "-(a + b)", "(a + b)**2", "min(a, b/2)", "a*b/c"],
)
def test_text_has_the_brackets_it_needs(text: str) -> None:
    assert text_of(parse_line(f"x = {text}")[1]) == text
