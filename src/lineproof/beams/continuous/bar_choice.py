"""Choosing bars alike over the beam: one size for all bottom bars, one for all top bars.

The order, for bottom and for top bars apart: one size for the whole beam where one can do; as few
sections with a second layer as can be; least mass; fewest bars. Sizes from 15M to 35M are tried
(common practice). Where no size does for all sections, each section takes its own best.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass

from lineproof.beams.bars import MOST_LAYERS, BarLayer, BarLayers, TopBars, bars_text, in_line
from lineproof.beams.choice import MOST_BARS, SIZES, bars_for
from lineproof.beams.continuous.numbers import Numbers, value
from lineproof.beams.continuous.section_checks import (
    Checks,
    Rules,
    bottom_checks,
    fails,
    top_checks,
)
from lineproof.beams.inputs import OVERHANGS
from lineproof.errors import FaultList
from lineproof.standards.a23_3 import crack_control, minimum
from lineproof.standards.a23_3.bars import (
    BARS,
    FITS,
    FITS_OVERHANG,
    FITS_SECOND,
    LEAST_CLEAR,
)
from lineproof.standards.catalogue import criteria

ANCHORAGE = "anchorage in the support"
_ROOM = frozenset((FITS.key, FITS_SECOND.key, FITS_OVERHANG.key))
_LOWER_GRADES = 400.0
"""Yield stress [MPa] of the grades below 500R and 500W."""
_CRACKS = frozenset({crack_control.CRACKS.key})
FOR_SHEAR = "the bars that shear and torsion ask for (11.3.9, 11.3.10.6)"


@dataclass(frozen=True, slots=True)
class Section:
    """A section whose bars are chosen: its name, its numbers, the length its bars run over [mm].

    Several sets of numbers stand for the faces that the same bars serve. ``least`` is the area that
    torsion asks of the bars within the web, ``least_all`` that which shear asks of all [mm2].
    """

    name: str
    numbers: tuple[Numbers, ...]
    length: float
    least: float = 0.0
    least_all: float = 0.0


Bars = BarLayers | TopBars


@dataclass(frozen=True, slots=True)
class Chosen:
    """Bars chosen for one section and the utilisation of every check of its worst face."""

    section: str
    bars: Bars
    checks: Checks

    @property
    def governing(self) -> tuple[str, float]:
        """The check that comes nearest to its limit."""
        key = max(self.checks, key=lambda k: self.checks[k])
        return key, self.checks[key]


@dataclass(frozen=True, slots=True)
class Stopped:
    """What stopped bars: the utilisation of every check that fails, and the bars or their size.

    Of several, ``nearest`` is first that of bars that fit: more bars than fit are always there to
    be tried, and that they do not fit says nothing of what stops those that do.
    """

    fails: Mapping[str, float]
    bars: Bars | str

    @property
    def nearest(self) -> tuple[bool, float]:
        """What is least for the bars that come nearest."""
        return bool(_ROOM & self.fails.keys()), max(self.fails.values())


Trial = Callable[[Section, str, int], tuple[Chosen | None, Stopped | None]]
"""Find the best bars of one size in so many layers, or say what stopped those nearest to it."""


def choose(sections: Sequence[Section], trial: Trial, what: str) -> tuple[Chosen, ...]:
    """Return bars for every section by the stated order; raises :class:`UserError` if none do."""
    found: dict[str, list[Chosen | None]] = {size: [None] * len(sections) for size in SIZES}
    stopped: dict[str, list[Stopped]] = {section.name: [] for section in sections}
    # A second layer is worse than any bars in one: none is tried where one layer does everywhere.
    for layers in range(1, MOST_LAYERS + 1):
        for size, row in found.items():
            for place, section in enumerate(sections):
                if row[place] is None:
                    row[place], why = trial(section, size, layers)
                    if why:
                        stopped[section.name].append(why)
        alike = [[c for c in row if c is not None] for row in found.values()]
        whole = [row for row in alike if len(row) == len(sections)]
        if whole:
            return tuple(min(whole, key=lambda row: order(row, sections)))
    return tuple(_each_its_own(sections, found, stopped, what))


def order(row: Iterable[Chosen], sections: Iterable[Section]) -> tuple[int, float, int]:
    """Return what is least in the best choice: second layers, mass, bars."""
    pairs = list(zip(row, sections, strict=True))
    second = sum(len(_layers(c.bars)) > 1 for c, _ in pairs)
    mass = sum(_area(c.bars) * s.length for c, s in pairs)
    return second, round(mass, 3), sum(_number(c.bars) for c, _ in pairs)


def _layers(bars: Bars) -> BarLayers:
    return bars.layers if isinstance(bars, TopBars) else bars


def _area(bars: Bars) -> float:
    return bars.area if isinstance(bars, TopBars) else sum(layer.area for layer in bars)


def _number(bars: Bars) -> int:
    beside = bars.sides * bars.overhang if isinstance(bars, TopBars) else 0
    return sum(layer.number for layer in _layers(bars)) + beside


def _each_its_own(
    sections: Sequence[Section],
    found: dict[str, list[Chosen | None]],
    stopped: dict[str, list[Stopped]],
    what: str,
) -> Iterable[Chosen]:
    faults = FaultList()
    for place, section in enumerate(sections):
        own = [row[place] for row in found.values()]
        able = [chosen for chosen in own if chosen is not None]
        if able:
            yield min(able, key=lambda c: order([c], [section]))
            continue
        faults.add(
            f"{what}: no bars pass every check at {section.name}: "
            + _stopped_and_cure(section, stopped[section.name])
        )
    faults.raise_if_any()


def _stopped_and_cure(section: Section, stopped: Sequence[Stopped]) -> str:
    """Say what stops the bars that come nearest, and what would let some pass.

    Concrete does not move the stress of the crack control, and where that is a part of the yield
    stress, as no moment under specified loads is known, nor does depth. Where no bars fit at all,
    width alone makes room.
    """
    anchored = [each for each in stopped if ANCHORAGE in each.fails]
    near = min(anchored or stopped, key=lambda each: each.nearest)
    keys = sorted(near.fails, key=lambda key: -near.fails[key])
    said = ", ".join(_said(key) for key in keys)
    support = "a wider support, " if anchored else ""
    beam = "a deeper or wider beam, or stronger concrete"
    if _CRACKS.issuperset(keys) and "M_s" in section.numbers[0]:
        beam = "a deeper or wider beam"
    elif _CRACKS.issuperset(keys):
        lower = section.numbers[0]["f_y"] > _LOWER_GRADES
        beam = "a wider beam" + (", or grade = '400R' or '400W'" if lower else "")
    elif _ROOM & near.fails.keys():
        beam = "a wider beam"
    bars = bars_text(near.bars) if isinstance(near.bars, tuple) else near.bars
    return f"stopped by: {said}; {bars} come nearest; write {support}{beam}"


def _said(key: str) -> str:
    """Return the title of a check by its key, as it stands on the page; else what is given."""
    return next((test.title for _, test in criteria() if test.key == key), key)


def bottom_trial(rules: Rules, stirrup: str) -> Trial:
    """Return the search for the least bottom bars of one size."""

    def trial(section: Section, size: str, number: int) -> tuple[Chosen | None, Stopped | None]:
        why: list[Stopped] = []
        few = []
        for layers in _layouts(size, number):
            if _area(layers) < section.least:
                few.append(layers)
                continue
            checks = bottom_checks(dict(section.numbers[0]), rules, layers, stirrup)
            if not fails(checks):
                return Chosen(section.name, layers, checks), None
            why.append(Stopped(_failing(checks), layers))
        for layers in few:
            checks = bottom_checks(dict(section.numbers[0]), rules, layers, stirrup)
            lack = {FOR_SHEAR: section.least / _area(layers)}
            why.append(Stopped(_failing(checks) | lack, layers))
        return None, min(why, key=lambda each: each.nearest)

    return trial


def _layouts(size: str, layers: int) -> list[BarLayers]:
    """Return the bars of one size within the web in one layer or in two, least bars first."""
    first = range(2, MOST_BARS + 1)
    if layers == 1:
        return [(BarLayer(n, size),) for n in first]
    two = [
        (BarLayer(n, size), BarLayer(m, size))
        for n in first
        for m in range(2, n + 1)
        if in_line(n, m)
    ]
    return sorted(two, key=lambda pair: (pair[0].number + pair[1].number, pair[1].number))


Part = Callable[[str, TopBars], float]
"""Give the part of the area of top bars that counts at the faces of a section, by its name."""


def top_trial(rules: Rules, stirrup: str, part: Part) -> Trial:
    """Return the search for the least top bars of one size; each face must pass."""
    sides = OVERHANGS[rules.shape]

    def trial(section: Section, size: str, layers: int) -> tuple[Chosen | None, Stopped | None]:
        why: list[Stopped] = []
        few: list[tuple[TopBars, float]] = []
        for bars in _top_layouts(section, size, sides, layers):
            within = sum(layer.area for layer in bars.layers)
            if within < section.least or bars.area < section.least_all:
                few.append((bars, max(section.least / within, section.least_all / bars.area)))
                continue
            counted = part(section.name, bars)
            faces = [top_checks(dict(at), rules, bars, stirrup, counted) for at in section.numbers]
            checks = max(faces, key=lambda face: max(face.values()))
            if not fails(checks):
                return Chosen(section.name, bars, checks), None
            whole = (top_checks(dict(at), rules, bars, stirrup) for at in section.numbers)
            by_anchorage = counted < 1 and not any(map(fails, whole))
            failing = {ANCHORAGE: max(checks.values())} if by_anchorage else _failing(checks)
            why.append(Stopped(failing, bars))
        for bars, lack in few:
            faces = [top_checks(dict(at), rules, bars, stirrup) for at in section.numbers]
            checks = max(faces, key=lambda face: max(face.values()))
            why.append(Stopped(_failing(checks) | {FOR_SHEAR: lack}, bars))
        anchored = [each for each in why if ANCHORAGE in each.fails]
        return None, min(anchored or why, key=lambda each: each.nearest)

    return trial


def _top_layouts(section: Section, size: str, sides: int, layers: int) -> list[TopBars]:
    """Return layouts of one size, least area first, then most bars within the web.

    Of the same area, those with the fewest bars in a second layer come first.
    """
    least = most = 0
    if sides:
        least = max(bars_for(_spread(at), size) for at in section.numbers)
        most = min(_most_beside(at, size) for at in section.numbers)
    made = [
        TopBars(web[0], beside, sides, upper=web[1] if layers > 1 else None)
        for web in _layouts(size, layers)
        for beside in range(least, max(least, most) + 1)
    ]
    return sorted(made, key=lambda bars: (bars.area, _number(bars) - bars.web.number))


def _most_beside(at: Numbers, size: str) -> int:
    """Return how many bars of a size stand side by side in an overhang."""
    d_b = BARS.number(size, "d_b")
    least = value(LEAST_CLEAR, at | {"d_b": d_b})
    return int(value(minimum.SPREAD_WIDTH, at) / (least + d_b) + 1e-9)


def _spread(at: Numbers) -> float:
    """Return the area that an overhang needs [mm2], from the clause itself."""
    width = value(minimum.SPREAD_WIDTH, at)
    return value(minimum.SPREAD_AREA, at | {"b_ot": width})


def _failing(checks: Checks) -> Checks:
    return {key: used for key, used in checks.items() if used > 1}
