"""Inputs that are set and used nowhere."""

from __future__ import annotations

import pytest

from lineproof.notebook.cells import Cell
from lineproof.notebook.unused import unused_inputs

CALL = "beam = beams.continuous_beam(sheet, spans=spans, h=h)"


def cells(inputs: str, *others: str) -> list[Cell]:
    codes = [Cell(1, "code", inputs, ("parameters",), ())]
    return codes + [Cell(n, "code", source, (), ()) for n, source in enumerate(others, 2)]


def test_an_input_that_the_call_does_not_name_is_found() -> None:
    """The comment names it, and so does a text: neither uses it."""
    inputs = (
        'spans = ["7 m"]\nh = "600 mm"  # reactions_csv\nreactions_csv = "r.csv"\nload: str = ""'
    )
    assert unused_inputs(cells(inputs, CALL, "'load'")) == ("reactions_csv", "load")


@pytest.mark.parametrize(
    "use",
    [
        "print(x)", "f'{x}'", "x += 1\nx", "[x for _ in range(2)]", "%timeit 1\nx", "del x",
        "def f():\n    return x", "globals()", "this is no Python but x",
    ],
)  # fmt: skip
def test_an_input_that_any_code_uses_is_none(use: str) -> None:
    assert unused_inputs(cells("x = 1", use)) == ()
    assert unused_inputs(cells("x = 1\ny = 2", use))[-1:] == (() if "globals" in use else ("y",))


def test_an_input_may_serve_another_one() -> None:
    inputs = 'bay = "7 m"\nspans = [bay, bay]\n_note = "of the bay"\nh = "600 mm"'
    assert unused_inputs(cells(inputs, CALL)) == ()


def test_only_the_cell_of_inputs_is_looked_at() -> None:
    assert unused_inputs([Cell(1, "code", "x = 1", (), ())]) == ()
    assert unused_inputs([Cell(1, "markdown", "x = 1", ("parameters",), ())]) == ()
    assert unused_inputs(cells("x = (", "print(1)")) == ()
