"""Steel of a section: which bars and stirrups stand at a station, and where they lie [mm].

The web reaches from x = 0 to b_w, the soffit lies at y = 0.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from functools import cached_property
from itertools import groupby, pairwise

from lineproof.beams.bars import centre_of
from lineproof.beams.continuous.bending import BentShape, stirrup_radius
from lineproof.beams.continuous.figure_chain import ahead, outlines
from lineproof.beams.continuous.figure_cross_section_places import (
    Place,
    Strings,
    places_of,
    strings_of,
)
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Detailing, Face, StirrupZone
from lineproof.beams.continuous.schedule_stirrups import stirrup_set
from lineproof.beams.figure_section_concrete import Shown
from lineproof.beams.section_shape import SectionShape
from lineproof.drawing import THIN, Circle, Shape
from lineproof.standards.a23_3.bars import BARS, LAYER_DISTANCE, LEAST_CLEAR

STROKE = THIN * 1.3


@dataclass(frozen=True)
class Steel:
    """What stands at a station of a span: runs, the zone of stirrups, the concrete around.

    ``bars`` are all bars of the beam, which tell how strings run on.
    """

    outline: BeamOutline
    span: int
    runs: tuple[BarRun, ...]
    zone: StirrupZone | None
    stirrup: float
    bend: float
    aggregate: float
    bars: tuple[BarRun, ...]

    @cached_property
    def strings(self) -> Strings:
        """The strings of the beam's bars; only a section that is drawn needs them."""
        return strings_of(self.outline, self.bars)

    @property
    def depth(self) -> float:
        """Overall depth of the span [mm]."""
        return self.outline.depths[self.span - 1]

    @property
    def cover(self) -> float:
        """Clear cover to the stirrups [mm]."""
        return self.outline.cover

    @property
    def signature(self) -> tuple[object, ...]:
        """What makes two sections alike."""
        runs = sorted((r.face, r.layer, r.place, r.size, r.mark, r.number) for r in self.runs)
        zone = self.zone
        stirrups = (zone.size, zone.legs, zone.closed, zone.spacing) if zone else None
        return (self.depth, self.outline.widths[self.span - 1], tuple(runs), stirrups)

    def layers(self, face: Face) -> list[list[BarRun]]:
        """Return the runs within the web by layer, nearest the face first."""
        mine = [run for run in self.runs if run.face == face and run.place == "web"]
        mine.sort(key=lambda run: run.layer)
        return [list(runs) for _, runs in groupby(mine, key=lambda run: run.layer)]

    def places_of(self, layer: Sequence[BarRun]) -> tuple[Place, ...]:
        """Return the places of the runs of a layer from side to side."""
        present = [i for i, run in enumerate(self.bars) if any(run is each for each in layer)]
        return places_of(self.bars, present, self.strings)

    def rests(self, face: Face) -> list[float]:
        """Return how far from the face the outer side of each layer lies [mm]."""
        places: list[float] = []
        at, below = self.cover + self.stirrup, 0.0
        for layer in self.layers(face):
            thick = max(run.diameter for run in layer)
            if below:  # as the depth has it, by the thicker of both layers
                at += below + LAYER_DISTANCE.function(max(below, thick), self.aggregate)
            places.append(at)
            below = thick
        return places

    def effective_depth(self, tension: Face) -> float | None:
        """Depth to the centroid of the bars of a face, those of the overhangs too [mm].

        None without bars in the web.
        """
        layers = zip(self.layers(tension), self.rests(tension), strict=True)
        placed = [(run, rest) for layer, rest in layers for run in layer]
        if placed:
            outer = self.cover + self.stirrup
            beside = (r for r in self.runs if (r.face, r.place) == (tension, "overhang"))
            placed += [(run, outer) for run in beside]
        parts = [(run.area, self.depth - rest - run.diameter / 2) for run, rest in placed]
        return centre_of(parts)[1] if parts else None


def steel_at(
    outline: BeamOutline, detailing: Detailing, x: float, aggregate: float, stirrup: str = ""
) -> Steel:
    """Return the steel at a station; the stirrups beside it where it lies between zones.

    Ties around hooks are none of them: they stand within the support. ``stirrup`` is the size that
    bars are placed for in a span without any.
    """
    span = span_of(outline, x)
    runs = tuple(run for run in detailing.bars if run.start <= x <= run.end)
    zones = [zone for zone in detailing.stirrups if zone.span == span and not zone.around_hooks]
    zone = min(zones, key=lambda each: _beyond(each, x), default=None)
    size = zone.size if zone else stirrup
    diameter = BARS.number(size, "d_b") if size else 0.0
    bend = stirrup_radius(size) if size else 0.0
    return Steel(outline, span, runs, zone, diameter, bend, aggregate, detailing.bars)


def span_of(outline: BeamOutline, x: float) -> int:
    """Return the span of a station; at an axis, the one to its right."""
    return 1 + sum(axis <= x for axis in outline.axes[1:-1])


def _beyond(zone: StirrupZone, x: float) -> float:
    return max(zone.start - x, x - zone.end, 0.0)


Placed = list[tuple[BarRun, Circle]]


def web_circles(steel: Steel) -> Placed:
    """Place the bars of each layer over the width: corner bars in the corners, lapped in contact.

    Where there is no room beside it, a lapped bar lies one above the other.
    """
    placed: Placed = []
    for face in ("bottom", "top"):
        outer: list[float] = []
        way = 1.0 if face == "bottom" else -1.0
        for layer, rest in zip(steel.layers(face), steel.rests(face), strict=True):
            places = steel.places_of(layer)
            across = _across(steel, places, outer)
            outer = outer or across
            beside = _beside(steel, places, across)
            for place, x in zip(places, across, strict=True):
                inset = rest + place.run.diameter / 2
                y = inset if face == "bottom" else steel.depth - inset
                placed.append((place.run, Circle((x, y), place.run.diameter / 2, "bars")))
                if place.mate is not None:
                    apart = (place.run.diameter + place.mate.diameter) / 2
                    at = (_inward(steel, x, apart), y) if beside else (x, y + way * apart)
                    placed.append((place.mate, Circle(at, place.mate.diameter / 2, "bars")))
    return placed


def _inward(steel: Steel, x: float, distance: float) -> float:
    """Return the place so far towards the middle of the web."""
    return x + distance if x <= steel.outline.b_w / 2 else x - distance


def _beside(steel: Steel, places: Sequence[Place], across: Sequence[float]) -> bool:
    """Tell whether lapped bars leave the least clear distance beside them."""
    edges: list[tuple[float, float]] = []
    for place, x in zip(places, across, strict=True):
        sides = [x - place.run.diameter / 2, x + place.run.diameter / 2]
        if place.mate is not None:
            far = _inward(steel, x, place.run.diameter / 2 + place.mate.diameter)
            sides.append(far)
        edges.append((min(sides), max(sides)))
    least = LEAST_CLEAR.function(
        max((place.diameter for place in places), default=0.0), steel.aggregate
    )
    return all(b[0] - a[1] >= least for a, b in pairwise(edges))


def _across(steel: Steel, places: Sequence[Place], outer: Sequence[float]) -> list[float]:
    """Return the x of each place; a second layer stands in line with the first where it can."""
    count, width = len(places), steel.outline.b_w
    if count == 1:
        return [width / 2]
    if len(outer) >= count and (count % 2 == 0 or len(outer) % 2 == 1):
        half = count // 2
        middle = [outer[len(outer) // 2]] if count % 2 else []
        return [*outer[:half], *middle, *outer[len(outer) - half :]]
    edge = steel.cover + steel.stirrup
    first = edge + max(steel.bend, places[0].run.diameter / 2)
    last = width - edge - max(steel.bend, places[-1].run.diameter / 2)
    return [first + (last - first) * number / (count - 1) for number in range(count)]


def overhang_circles(steel: Steel, shape: SectionShape, shown: Shown) -> Placed:
    """Spread the bars in the overhangs evenly over what is drawn of them, half at each side.

    Bars of all runs stand beside each other, lapped ones in contact.
    """
    sides = [
        (face, way, reach)
        for face, way, reach in ((0.0, -1.0, shown.left), (shape.b_w, 1.0, shown.right))
        if reach > 0.0
    ]
    runs = [run for run in steel.runs if run.place == "overhang"]
    first, mates = _lapped(steel, runs)
    placed: Placed = []
    for index, (face, way, reach) in enumerate(sides):
        bars = [run for run in first for _ in range(_share(run, index, len(sides)))]
        left = {run: _share(run, index, len(sides)) for run in mates.values()}
        for number, run in enumerate(bars):
            x = face + way * (number + 0.5) * reach / len(bars)
            placed.append((run, _beside_web(steel, shape, run, x)))
            mate = mates.get(run)
            if mate is not None and left[mate]:
                left[mate] -= 1
                apart = way * (run.diameter + mate.diameter) / 2
                placed.append((mate, _beside_web(steel, shape, mate, x + apart)))
    return placed


def _share(run: BarRun, index: int, sides: int) -> int:
    """Return how many bars of a run stand in one of the overhangs."""
    return run.number // sides + (index < run.number % sides)


def _lapped(steel: Steel, runs: Sequence[BarRun]) -> tuple[list[BarRun], dict[BarRun, BarRun]]:
    """Return the runs that have a place of their own, and to each the one lapped with it."""
    laps = ((steel.bars[i], steel.bars[j]) for i, j in steel.strings.laps)
    mates = {one: two for one, two in laps if one in runs and two in runs}
    return [run for run in runs if run not in mates.values()], mates


def _beside_web(steel: Steel, shape: SectionShape, run: BarRun, x: float) -> Circle:
    inset = steel.cover + steel.stirrup + run.diameter / 2
    y = shape.h - inset if run.face == "top" else shape.h - shape.h_f + inset
    return Circle((x, y), run.diameter / 2, "bars")


def side_circles(steel: Steel) -> Placed:
    """Place the bars of the side faces, half at each, evenly between the outer layers."""
    placed: Placed = []
    inset = steel.cover + steel.stirrup
    low, high = inset, steel.depth - max(inset, steel.outline.h_f)
    for run in steel.runs:
        if run.place != "side face":
            continue
        for index, way in enumerate((0, 1)):
            share = run.number // 2 + (index < run.number % 2)
            edge = inset + run.diameter / 2
            x = edge if way == 0 else steel.outline.b_w - edge
            for number in range(share):
                y = low + (high - low) * (number + 1) / (share + 1)
                placed.append((run, Circle((x, y), run.diameter / 2, "bars")))
    return placed


def stirrup_shapes(steel: Steel) -> list[Shape]:
    """Draw the pieces of the stirrups with both edges and their true bends."""
    if steel.zone is None:
        return []
    width, diameter = steel.outline.b_w - 2 * steel.cover, steel.stirrup
    shapes: list[Shape] = []
    spacing = (width - diameter) / (steel.zone.legs - 1)
    leg = 1
    for index, (piece, count) in enumerate(stirrup_set(steel.outline, steel.zone).pieces):
        for _ in range(count):
            left = steel.cover if index == 0 else steel.cover + leg * spacing
            shapes.extend(_piece(piece, left, steel.cover))
            leg += 0 if index == 0 else 2
    return shapes


def _piece(piece: BentShape, left: float, bottom: float) -> Iterable[Shape]:
    """Draw a piece whose outer lower left corner lies at (left, bottom)."""
    diameter = piece.diameter
    centre = piece.radius + diameter / 2
    sizes = dict(piece.legs)
    height = max(sizes["A"], sizes.get("B", 0.0)) if piece.form != "closed stirrup" else sizes["A"]
    axis, top = left + diameter / 2, bottom + height - diameter / 2
    if piece.form in {"open stirrup", "single leg"}:
        start, heading = (axis + centre + piece.straights[0], top), 180.0
    else:
        corner = (axis + centre, top - centre)
        start = ahead(ahead(corner, 45.0, centre), 135.0, -piece.straights[0])
        heading = 135.0
    return outlines(
        start, heading, piece.straights, piece.bends, piece.radius, diameter, "stirrups", STROKE
    )
