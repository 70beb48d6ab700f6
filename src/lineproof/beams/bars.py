"""Bars as an engineer writes them: ``4-25M``, two layers ``4-25M / 2-25M``.

Two sizes in a layer, ``2-25M + 2-20M``, come of bars that are given along a beam.
"""

from __future__ import annotations

import re
from collections import Counter
from collections.abc import Iterable
from dataclasses import dataclass, replace

from lineproof.errors import UserError
from lineproof.quantity import echo
from lineproof.standards.a23_3.bars import BARS

_IMPERIAL = re.compile(r"#\s*\d|\bNo\.?\s*\d", re.IGNORECASE)
"""Sizes in eighths of an inch."""
_BUNDLE = re.compile(r"bundle", re.IGNORECASE)
_GROUP = re.compile(r"\s*(\d{1,2})\s*-\s*([0-9A-Za-z]{1,6})\s*\Z")
MOST_LAYERS = 2


@dataclass(frozen=True, slots=True)
class BarLayer:
    """Bars in one layer: of one size, or with ``thinner`` ones beside them."""

    number: int
    size: str
    thinner: BarLayer | None = None

    @property
    def diameter(self) -> float:
        """Diameter of one bar, the thickest [mm]."""
        return BARS.number(self.size, "d_b")

    @property
    def groups(self) -> tuple[BarLayer, ...]:
        """The bars by size, the thickest first."""
        if self.thinner is None:
            return (self,)
        return (replace(self, thinner=None), *self.thinner.groups)

    @property
    def count(self) -> int:
        """Number of bars of all sizes."""
        return sum(group.number for group in self.groups)

    @property
    def area(self) -> float:
        """Area of the layer [mm2]."""
        return sum(group.number * BARS.number(group.size, "A_b") for group in self.groups)

    def __str__(self) -> str:
        return " + ".join(f"{group.number}-{group.size}" for group in self.groups)


def layer_of(groups: Iterable[BarLayer]) -> BarLayer:
    """Return the layer in which bars of several sizes stand beside each other; at least one.

    >>> str(layer_of([BarLayer(1, "20M"), BarLayer(2, "25M"), BarLayer(2, "20M")]))
    '2-25M + 3-20M'
    """
    numbers: Counter[str] = Counter()
    for group in groups:
        numbers[group.size] += group.number
    made: BarLayer | None = None
    for size in sorted(numbers, key=lambda size: BARS.number(size, "d_b")):
        made = BarLayer(numbers[size], size, made)
    assert made is not None  # noqa: S101 - as told above
    return made


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


def centre_of(groups: Iterable[tuple[float, float]]) -> tuple[float, float]:
    """Return the area of bars [mm2] and the depth of their centre [mm], from both of each group.

    >>> centre_of([(1000.0, 540.0), (500.0, 480.0)])
    (1500.0, 520.0)
    """
    kept = tuple(groups)
    area = sum(each for each, _ in kept)
    return area, sum(each * depth for each, depth in kept) / area


def of_one_size(layers: BarLayers) -> bool:
    """Tell whether every layer has bars of one size."""
    return all(layer.thinner is None for layer in layers)


@dataclass(frozen=True, slots=True)
class TopBars:
    """Top bars of a section: a layer within the web, and how many bars stand in each overhang.

    Those of the overhangs have the size of the web's but for ``overhang_size``. Given bars may have
    a second layer, ``upper``, within the web.
    """

    web: BarLayer
    overhang: int
    sides: int
    overhang_size: str = ""
    upper: BarLayer | None = None

    @property
    def layers(self) -> BarLayers:
        """The layers within the web, from the top inward."""
        return (self.web,) if self.upper is None else (self.web, self.upper)

    @property
    def spread_size(self) -> str:
        """Size of the bars in the overhangs."""
        return self.overhang_size or self.web.size

    @property
    def of_one_size(self) -> bool:
        """Tell whether all of them have one size and stand in one layer."""
        one = self.upper is None and self.web.thinner is None
        return one and self.spread_size == self.web.size

    @property
    def outer_groups(self) -> tuple[BarLayer, ...]:
        """The bars of the first layer by size, those of the overhangs last."""
        spread = self.sides * self.overhang
        return (*self.web.groups, *((BarLayer(spread, self.spread_size),) if spread else ()))

    @property
    def groups(self) -> tuple[BarLayer, ...]:
        """All bars by size, those of a second layer last."""
        return (*self.outer_groups, *(() if self.upper is None else self.upper.groups))

    @property
    def area(self) -> float:
        """Area of all of them [mm2]."""
        return sum(group.area for group in self.groups)

    def __str__(self) -> str:
        """Show as written: ``4-20M, 2-20M in each overhang``."""
        inside = bars_text(self.layers)
        if not self.overhang:
            return inside
        where = "each overhang" if self.sides > 1 else "the overhang"
        return f"{inside}, {self.overhang}-{self.spread_size} in {where}"


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


def refuse_other_bars(name: str, text: object) -> None:
    """Raise :class:`UserError` about imperial and about bundled bars.

    >>> refuse_other_bars("bottom_bars", "4-25M")
    """
    if _IMPERIAL.search(str(text)):
        raise UserError(
            f"{name}: {echo(text)} has imperial bars, which are outside the method: no size of CSA "
            "G30.18 has both their area and their diameter; calculate them by hand, or write "
            "metric bars such as '4-25M'"
        )
    if _BUNDLE.search(str(text)):
        raise UserError(
            f"{name}: {echo(text)} has bundled bars, which are outside the method (their clear "
            "distance and development differ); write single bars, in two layers such as "
            "'4-25M / 2-25M'"
        )


def _read_layer(name: str, text: object, group: str) -> BarLayer:
    refuse_other_bars(name, text)
    match = _GROUP.match(group)
    if "+" in group:
        raise UserError(
            f"{name}: {echo(text)} has two sizes in one layer; write one, such as '4-25M' (bars "
            "along a beam, bar_runs, may have two)"
        )
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
