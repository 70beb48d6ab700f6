"""Bars as an engineer writes them: ``4-25M``, two layers ``4-25M / 2-25M``."""

from __future__ import annotations

import re
from dataclasses import dataclass

from lineproof.errors import UserError
from lineproof.quantity import echo
from lineproof.standards.a23_3.bars import BARS

_GROUP = re.compile(r"\s*(\d{1,2})\s*-\s*([0-9A-Za-z]{1,6})\s*\Z")
MOST_LAYERS = 2


@dataclass(frozen=True, slots=True)
class BarLayer:
    """Bars of one size in one layer."""

    number: int
    size: str

    @property
    def diameter(self) -> float:
        """Diameter of one bar [mm]."""
        return BARS.number(self.size, "d_b")

    @property
    def area(self) -> float:
        """Area of the layer [mm2]."""
        return self.number * BARS.number(self.size, "A_b")

    def __str__(self) -> str:
        return f"{self.number}-{self.size}"


def in_line(first: int, second: int) -> bool:
    """Tell whether bars of a second layer can stand in line with those of the first.

    They stand over the outer bars, the same number at each side, and one over the middle bar.
    """
    return second <= first and (second % 2 == 0 or first % 2 == 1)


def spaced(number: int) -> int:
    """Return the number of bars whose clear distance counts: that of one bar is as of two."""
    return max(number, 2)


BarLayers = tuple[BarLayer, ...]
"""Layers from the tension face inward."""


def bars_text(layers: BarLayers) -> str:
    """Return the layers as typed: ``4-25M / 2-25M``."""
    return " / ".join(str(layer) for layer in layers)


def read_bars(name: str, text: object) -> BarLayers:
    """Read bars; raises :class:`UserError` that says how to write them.

    >>> bars_text(read_bars("bottom_bars", "4-25M / 2-25M"))
    '4-25M / 2-25M'
    """
    layers = tuple(_read_layer(name, text, group) for group in str(text).split("/"))
    if len(layers) > MOST_LAYERS:
        raise UserError(
            f"{name}: {echo(text)} has {len(layers)} layers; write at most {MOST_LAYERS}"
        )
    if not in_line(layers[0].number, layers[-1].number):
        raise UserError(
            f"{name}: {echo(text)}: the bars of the second layer cannot stand in line with the "
            f"first; write for example '{layers[0]} / 2-{layers[-1].size}'"
        )
    return layers


def read_one_layer(name: str, text: object) -> BarLayers:
    """Read bars that stand in one layer; raises :class:`UserError`."""
    layers = read_bars(name, text)
    if len(layers) > 1:
        raise UserError(f"{name}: {echo(text)} has two layers; write one, such as '{layers[0]}'")
    return layers


def _read_layer(name: str, text: object, group: str) -> BarLayer:
    match = _GROUP.match(group)
    if match is None:
        raise UserError(
            f"{name}: {echo(text)} is not understood; write '4-25M', or '4-25M / 2-25M' for "
            "two layers from the bottom up"
        )
    number, size = int(match[1]), match[2].upper()
    BARS.row(size, name)
    if number < 2:  # noqa: PLR2004 - one bar in each corner
        raise UserError(
            f"{name}: {echo(text)} has a layer of {number}; write at least 2 bars a layer"
        )
    return BarLayer(number, size)
