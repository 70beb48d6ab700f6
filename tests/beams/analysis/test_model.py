"""Beams that cannot stand and loads that are not on them: refused, all faults at once."""

from __future__ import annotations

import math

import pytest

from lineproof.beams.analysis.model import (
    FIXED,
    FREE,
    SIMPLE,
    Beam,
    Column,
    Load,
    PartialLoad,
    PointLoad,
    Span,
    Support,
    UniformLoad,
    check_loads,
)
from lineproof.errors import UserError

EI = 8e13
GOOD = Beam((Span(8000, EI), Span(6000, EI)), (SIMPLE, Support("simple", 400), SIMPLE))


def refused(spans: list[Span], supports: list[Support]) -> tuple[str, ...]:
    with pytest.raises(UserError) as caught:
        Beam(tuple(spans), tuple(supports))
    return caught.value.faults


@pytest.mark.parametrize("length", [0.0, -7600.0, 500_000.0, 7.6, math.nan, math.inf])
def test_an_absurd_span_is_named(length: float) -> None:
    faults = refused([Span(8000, EI), Span(length, EI)], [SIMPLE] * 3)
    assert len(faults) == 1
    assert faults[0].startswith("span 2: length")
    assert "outside 100 to 60000 mm" in faults[0]


@pytest.mark.parametrize("stiffness", [0.0, -1.0, math.nan, math.inf])
def test_an_absurd_stiffness_is_named(stiffness: float) -> None:
    (fault,) = refused([Span(8000, stiffness)], [SIMPLE] * 2)
    assert fault.startswith("span 1: EI")


def test_a_slip_of_units_in_one_stiffness_is_found() -> None:
    (fault,) = refused([Span(8000, EI), Span(8000, EI * 1e6)], [SIMPLE] * 3)
    assert "times apart" in fault


@pytest.mark.parametrize(
    ("supports", "words"),
    [
        ([FREE, FREE], "it has no support; both its ends are free"),
        ([SIMPLE, FREE], "turns about support 1, its only support"),
        ([FREE, SIMPLE], "turns about support 2, its only support"),
        ([FREE, SIMPLE, FREE], "turns about support 2, its only support"),
        ([SIMPLE, FREE, SIMPLE], "support 2: 'free' between two spans"),
        ([SIMPLE], "supports: 1 given for 1 spans; write 2"),
    ],
)
def test_an_unstable_support_set_says_which(supports: list[Support], words: str) -> None:
    spans = [Span(8000, EI)] * max(len(supports) - 1, 1)
    assert any(words in fault for fault in refused(spans, supports))


def test_what_stands_by_a_column_alone_is_stable() -> None:
    two = Beam((Span(2000, EI), Span(2000, EI)), (FREE, Support("elastic", 400, 1e11), FREE))
    one = Beam((Span(2000, EI),), (FREE, FIXED))
    assert (len(two.spans), len(one.spans)) == (2, 1)


@pytest.mark.parametrize(
    ("supports", "words"),
    [
        ([Support("simple", 9000), SIMPLE], "support 1: width 9000 mm is wider than span 1"),
        ([Support("simple", 4000), Support("simple", 4000)], "leave no clear length"),
        ([Support("simple", -1), SIMPLE], "support 1: width -1 mm"),
        ([Support("simple", math.nan), SIMPLE], "support 1: width nan mm"),
        ([FIXED, Support("free", 300)], "support 2: a free end has no width"),
        ([Support("elastic"), SIMPLE], "support 1: stiffness 0 N.mm"),
        ([Support("simple", 0, 1e9), SIMPLE], "the support is simple; write 'elastic'"),
        ([Support("pinned"), SIMPLE], "support 1: 'pinned'; write one of"),  # type: ignore[arg-type]
    ],
)
def test_wrong_supports_are_named(supports: list[Support], words: str) -> None:
    assert any(words in fault for fault in refused([Span(4000, EI)], supports))


def test_all_faults_come_at_once() -> None:
    assert len(refused([Span(0, EI), Span(5e5, 0)], [FREE, Support("simple", -4), FREE])) == 5


def test_columns_are_checked() -> None:
    with pytest.raises(UserError) as caught:
        Support.columns([Column(0, 1e13), Column(3000, -1), Column(3000, 1e13, "hinged")])  # type: ignore[arg-type]
    assert [fault[:9] for fault in caught.value.faults] == ["column 1:", "column 2:", "column 3:"]
    with pytest.raises(UserError, match="none given"):
        Support.columns([])


@pytest.mark.parametrize(
    ("load", "words"),
    [
        (PointLoad("D", 1, 1e3, 8001), "at 8001 mm is outside span 1 of 8000 mm"),
        (PointLoad("D", 1, 1e3, -1), "at -1 mm is outside"),
        (PointLoad("D", 1, 1e3, math.nan), "at nan mm is outside"),
        (PartialLoad("L", 2, 5, 4000, 6500), "from 4000 to 6500 mm is not inside span 2"),
        (PartialLoad("L", 2, 5, 4000, 3000), "write 0 <= start < end <= length"),
        (UniformLoad("S", 3, 5), "span 3 does not exist; the beam has 2"),
        (UniformLoad("S", 0, 5), "span 0 does not exist"),
        (UniformLoad("S", 1, math.inf), "size inf"),
        (UniformLoad("", 1, 5), "load type ''"),
    ],
)
def test_a_load_off_the_beam_is_named(load: Load, words: str) -> None:
    with pytest.raises(UserError) as caught:
        check_loads(GOOD, [UniformLoad("D", 1, 5), load])
    assert all(fault.startswith("load 2 (") for fault in caught.value.faults)
    assert any(words in fault for fault in caught.value.faults)


def test_no_load_at_all_is_refused() -> None:
    with pytest.raises(UserError, match="none given"):
        check_loads(GOOD, [])


def test_clear_lengths_and_faces() -> None:
    assert GOOD.axes == (0, 8000, 14000)
    assert GOOD.faces(1) == (0, 7800)
    assert GOOD.faces(2) == (200, 6000)
    assert GOOD.clear(2) == 5800
    assert not GOOD.cantilever(1)
