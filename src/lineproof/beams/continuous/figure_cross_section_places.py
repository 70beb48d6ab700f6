"""Which bars stand where across a layer: corner bars stay in the corners along the whole beam.

Bars that are lapped are one string. The string that reaches furthest along the beam stands in
the corners; where two of its bars are lapped they lie in contact.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

from lineproof.beams.continuous.layout import BarRun, BeamOutline
from lineproof.beams.continuous.resistance import level_pairs


@dataclass(frozen=True, slots=True)
class Place:
    """One place across a layer: the bar that stands there and the one lapped with it, if any."""

    run: BarRun
    mate: BarRun | None = None

    @property
    def diameter(self) -> float:
        """Diameter of the thicker bar [mm]."""
        return max(run.diameter for run in (self.run, self.mate) if run is not None)


@dataclass(frozen=True, slots=True)
class Strings:
    """The laps of a beam and how far along it the string of every run reaches [mm].

    Runs are known by their places in the list of bars.
    """

    laps: tuple[tuple[int, int], ...]
    reach: Mapping[int, float]


def strings_of(outline: BeamOutline, runs: Sequence[BarRun]) -> Strings:
    """Return the strings of a beam, which end where the soffit steps."""
    laps = level_pairs(outline, runs)
    after, first = dict(laps), {j for _, j in laps}
    reach: dict[int, float] = {}
    for start in (i for i in range(len(runs)) if i not in first):
        members = [start]
        while members[-1] in after:
            members.append(after[members[-1]])
        reach |= dict.fromkeys(members, runs[members[-1]].end - runs[start].start)
    return Strings(laps, reach)


def places_of(
    runs: Sequence[BarRun], present: Sequence[int], strings: Strings
) -> tuple[Place, ...]:
    """Return the places of a layer from side to side.

    ``present`` are the bars of the layer that stand at the station, by their places in ``runs``.
    Strings stand from the corners inwards, the furthest reaching first, of like ones the thickest;
    an odd bar stands in the middle.
    """
    mates = {i: j for i, j in strings.laps if i in present and j in present}
    lapped = set(mates.values())
    order = sorted(
        (i for i in present if i not in lapped),
        key=lambda i: (-strings.reach[i], -runs[i].diameter, i),
    )
    side: list[Place] = []
    middle: list[Place] = []
    for i in order:
        place = Place(runs[i], runs[mates[i]] if i in mates else None)
        side += [place] * (runs[i].number // 2)
        middle += [place] * (runs[i].number % 2)
    return (*side, *middle, *reversed(side))
