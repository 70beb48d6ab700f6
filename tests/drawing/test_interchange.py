"""Figures as plain data: complete round trip, and nothing hostile gets in."""

from __future__ import annotations

import copy
import json
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from lineproof.drawing import (
    Arc,
    Arrow,
    Circle,
    Dimension,
    Figure,
    Line,
    Polyline,
    Text,
    from_json,
    svg,
    symbol,
    to_json,
    words,
)
from lineproof.errors import UserError

FIGURE = Figure(
    120.0,
    80.0,
    0.08,
    (15.0, 12.0),
    (
        Polyline(((0.0, 0.0), (380.0, 0.0), (380.0, 620.0)), closed=True, fill="hatch"),
        Line((0.0, 310.0), (380.0, 310.0), "centre", 0.13, "chain"),
        Circle((63.9, 63.9), 12.6),
        Arc((63.9, 63.9), 23.9, 180.0, 270.0, "stirrups", 0.2),
        Arrow((-80.0, 200.0), (40.0, 200.0), "text", 0.13, 1.3),
        Text((190.0, 700.0), (*symbol("b", "f"), (" = 3040", "bold")), anchor="start"),
        Dimension((0.0, 0.0), (380.0, 0.0), "horizontal", -7.0, symbol("b", "w"), "380"),
    ),
    "A section.",
    "Section",
)


def plain() -> dict[str, Any]:
    """Return the figure as data that a test may spoil."""
    return copy.deepcopy(to_json(FIGURE))


def spoiled(number: int, /, **changes: Any) -> dict[str, Any]:
    """Return the data with fields of one shape changed."""
    data = plain()
    data["shapes"][number].update(changes)
    return data


def test_round_trip_through_json_text() -> None:
    """A figure written to JSON text and read back is equal, and so is its SVG."""
    back = from_json(json.loads(json.dumps(to_json(FIGURE))))

    assert back == FIGURE
    assert svg(back) == svg(FIGURE)


def test_usual_values_are_left_out() -> None:
    """Only what differs from the usual value is written, so records stay small."""
    assert to_json(FIGURE)["shapes"][2] == {
        "shape": "circle",
        "centre": [63.9, 63.9],
        "radius": 12.6,
    }


def test_computed_noise_is_not_recorded() -> None:
    """The last bits of a float, which differ between processors, do not reach the record."""
    noisy = Figure(10.0, 10.0, 1.0, (0.0, -0.0), (Circle((0.1 + 0.2, 1.0), 1.0),), "a")

    text = json.dumps(to_json(noisy))

    assert "[0.3, 1.0]" in text
    assert "-0.0" not in text


@pytest.mark.parametrize(
    ("data", "fault"),
    [
        ([], "must be an object"),
        (spoiled(2, radius=float("nan")), "shape 3 (circle): radius must be a number"),
        (spoiled(2, radius=float("inf")), "radius must be a number"),
        (spoiled(2, radius=10**400), "radius must be a number"),
        (spoiled(2, radius="12"), "radius must be a number"),
        (spoiled(2, radius=True), "radius must be a number"),
        (spoiled(2, radius=-1), "radius must be a number"),
        (spoiled(2, centre=[1]), "centre must be two numbers"),
        (spoiled(2, layer="../x"), "layer must be one of"),
        (spoiled(2, shape="script"), "shape 3 must be an object whose 'shape' is one of"),
        (spoiled(2, shape=["circle"]), "shape 3 must be an object"),
        (spoiled(2, onload="x"), "unknown field 'onload'"),
        (spoiled(0, points=[[0, 0]]), "points must be a list of 2"),
        (spoiled(0, points=[[0, 0]] * 10_001), "points must be a list of 2"),
        (spoiled(0, fill="url(#x)"), "fill must be one of"),
        (spoiled(0, closed="yes"), "closed must be true or false"),
        (spoiled(1, weight=50), "weight must be a number from 0 to 5"),
        (spoiled(1, end=[1e6, 0]), "lies far outside the field of paper"),
        (spoiled(5, runs=[["a", "style='x'"]]), "runs must be one of"),
        (spoiled(5, runs=[["a\x00", "roman"]]), "runs must be text"),
        (spoiled(5, runs=[["\ud800", "roman"]]), "runs must be text"),
        (spoiled(5, runs=[["a" * 401, "roman"]]), "runs must be text"),
        (spoiled(5, runs="abc"), "runs must be a list"),
        (spoiled(5, runs=["ab"]), "runs must hold pairs"),
        (spoiled(5, size=0.0), "size must be a number from 1 to 10"),
        (plain() | {"alt": " "}, "alt must be text of 1 to"),
        (plain() | {"width": 0}, "width must be a number from 1 to 400"),
        (plain() | {"scale": 0}, "scale must be a number"),
        (plain() | {"shapes": {}}, "shapes must be a list"),
        (plain() | {"shapes": [{}] * 4001}, "at most 4000"),
        (plain() | {"shapes": [plain()["shapes"][0]] * 134}, "hatch with 402 corners"),
        (plain() | {"script": 1}, "unknown field 'script'"),
    ],
    ids=range(32),
)
def test_hostile_data_is_refused(data: object, fault: str) -> None:
    """Every spoiled value is refused with a sentence that names its place."""
    with pytest.raises(UserError) as caught:
        from_json(data)

    assert fault in str(caught.value)


def test_missing_field_is_named() -> None:
    """A shape without a needed field is refused."""
    data = plain()
    del data["shapes"][1]["end"]

    with pytest.raises(UserError, match=r"shape 2 \(line\): end must be two numbers"):
        from_json(data)


def test_all_faults_come_at_once() -> None:
    """Two spoiled shapes give two faults."""
    data = spoiled(2, radius="x")
    data["shapes"][3]["layer"] = "x"

    with pytest.raises(UserError) as caught:
        from_json(data)

    assert len(caught.value.faults) == 2


def test_long_lists_of_faults_are_cut() -> None:
    """Thousands of bad shapes do not give thousands of faults."""
    with pytest.raises(UserError) as caught:
        from_json(plain() | {"shapes": [{}] * 3000})

    assert len(caught.value.faults) == 20


@given(
    st.recursive(
        st.none() | st.booleans() | st.floats() | st.integers() | st.text(max_size=5),
        lambda inner: st.lists(inner, max_size=3) | st.dictionaries(st.text(), inner, max_size=3),
        max_leaves=8,
    ),
    st.sampled_from(["width", "shapes", "origin", "alt"]),
    st.sampled_from(["points", "fill", "shape", "weight", "dash", "layer"]),
)
def test_any_junk_gives_a_figure_or_a_user_error(junk: object, top: str, field: str) -> None:
    """Whatever stands in a field, reading ends in a drawable figure or in UserError."""
    for data in (plain() | {top: junk}, spoiled(0, **{field: junk})):
        try:
            figure = from_json(data)
        except UserError:
            continue
        assert svg(figure).endswith("</svg>\n")


def test_words_and_symbol_runs() -> None:
    """Runs are written as the trade prints symbols: italic letter, upright marks."""
    assert symbol("A", "s,b") == (("A", "italic"), ("s,b", "sub"))
    assert symbol("f", "c", "′")[1] == ("\u2009′", "roman")
    assert words("5-25M") == (("5-25M", "roman"),)
