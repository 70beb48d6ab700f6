"""What torsion asks of the bars of a beam: forces along its spans, and more bars where they lack.

Where torsion counts, the bars of both faces carry it together with moment and shear (11.3.10.6).
Bars are laid for that force first; only where the bars of a section cannot carry it however long
they are, the section gets more.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from collections.abc import Set as AbstractSet
from dataclasses import dataclass, field, replace

import numpy as np

from lineproof.beams.choice import SIZES
from lineproof.beams.continuous.anchorage import hook_part
from lineproof.beams.continuous.detailing_bottom import face_demand, face_tension
from lineproof.beams.continuous.detailing_data import Designed, SectionBars, TorsionForces
from lineproof.beams.continuous.detailing_tips import tip_lacks
from lineproof.beams.continuous.forces import ENDS
from lineproof.beams.continuous.layout import Face
from lineproof.beams.continuous.resistance import Standing, yield_force
from lineproof.beams.continuous.shear_check import SpanCheck
from lineproof.errors import UserError
from lineproof.standards.a23_3 import torsion
from lineproof.standards.a23_3.bars import BARS

HOLDERS = "15M"
"""Size of the two bars that hold the stirrups where no other top bars do (common practice)."""
RESERVE = 0.997
"""Part of the bars that torsion may use: the layout of bars keeps two thousandths itself."""
MORE_ANCHORED = 1.1
"""By how much more is asked where bars chosen for an area are not anchored in that area."""
STEPS = 4
"""Steps in which bars are counted over their development length for shear (shear_stretches)."""


@dataclass(frozen=True, slots=True)
class Asked:
    """What the sections must have beyond what their moments ask for.

    Least areas [mm2] of the bottom bars by span and of the top bars by support: within the web for
    torsion (``top``), of all for shear (``all_top``); the size of the bars that hold the stirrups,
    and the area of bottom bars that must be anchored in the end supports, by span [mm2].
    """

    bottom: Mapping[int, float] = field(default_factory=dict)
    top: Mapping[int, float] = field(default_factory=dict)
    all_top: Mapping[int, float] = field(default_factory=dict)
    holders: str = HOLDERS
    anchored: Mapping[int, float] = field(default_factory=dict)


@dataclass(frozen=True, slots=True)
class Lack:
    """Bars that a face lacks at a station from the left axis of a span: their area [mm2].

    ``needed`` is the area that torsion, moment and shear need there; ``turned`` tells whether
    torsion counts.
    """

    span: int
    face: Face
    x: float
    near: int
    needed: float
    area: float
    turned: bool


@dataclass(frozen=True, slots=True)
class Open:
    """The spans and supports whose bars are open to choose."""

    spans: AbstractSet[int]
    supports: AbstractSet[int]


def torsion_forces(
    checks: Sequence[SpanCheck], bars: SectionBars, standing: Iterable[Standing]
) -> dict[int, TorsionForces]:
    """Return what torsion asks of the bars, by span, where it counts.

    At the sections of shear a bar counts in steps over its development length: it must be long
    enough up to a step away from each station. No more is asked of the length of top bars than all
    bars of their support carry: what lacks beyond that is no matter of length.
    """
    made = {}
    step = max((max(bars.rise_start, bars.rise_end) for bars in standing), default=0.0) / STEPS
    for check in checks:
        state, span = check.state, check.state.numbers.span
        acting = state.numbers.torsion
        if acting is None or not state.v["counts"].any():
            continue
        x, bottom, top = check.bar_forces()
        force = state.basis.phi_s * state.basis.f_y * RESERVE
        whole = np.array([force * _whole(bars, support) for support in _nearest(check).tolist()])
        top = np.minimum(top, whole)
        at, place = np.unique(x, return_inverse=True)
        forces = np.zeros((2, len(at)))
        for row, each in zip(forces, (bottom, top), strict=True):
            np.maximum.at(row, place, each)
        beside = np.abs(at[:, None] - at) <= step
        forces = np.where(beside, forces[:, None, :], 0.0).max(axis=2)
        limit = acting.values["T_cr"]
        ends = [np.where(_counts(T, limit), check.designed_torsion(T), 0.0)
                for T in (state.v["T_all"][:, 1], state.v["T_all"][:, -2])]  # fmt: skip
        made[span] = TorsionForces(
            at, forces[0], forces[1], (ends[0], ends[1]), acting.values["p_h"],
            acting.values["A_o"], *check.turned_forces(),
        )  # fmt: skip
    return made


def _whole(bars: SectionBars, support: int) -> float:
    """Return the area of all top bars of a support, or of those that hold the stirrups [mm2]."""
    top = bars.top[support - 1]
    if not top.web:
        return 2 * BARS.number(bars.holders, "A_b")
    return sum(layer.area for layer in (*top.web, *top.spread))


def _nearest(check: SpanCheck) -> np.ndarray:
    """Return the support whose top bars belong to each column: of a cantilever, the one it has."""
    state, span = check.state, check.state.numbers.span
    if state.numbers.left.held == "free":
        return np.full(len(state.columns), span + 1)
    if state.numbers.right.held == "free":
        return np.full(len(state.columns), span)
    return np.where(state.columns < sum(state.faces) / 2, span, span + 1)


def _counts(T: np.ndarray, T_cr: float) -> np.ndarray:
    """Tell in which cases a torsion counts."""
    return np.array([torsion.COUNTS.holds(t, 0.25 * T_cr) for t in T.tolist()])


def lacks(checks: Sequence[SpanCheck]) -> Iterator[Lack]:
    """Give the stations at which bars lack for torsion, or for shear at a critical section.

    The worst of each half of a span.
    """
    for check in checks:
        state, span = check.state, check.state.numbers.span
        near = _nearest(check)
        faces: tuple[Face, Face] = ("bottom", "top")
        for face, (needed, area) in zip(faces, check.bar_areas(), strict=True):
            lack = np.where(needed > 0, needed / RESERVE - area, 0.0)
            for support in np.unique(near).tolist():
                here = np.where(near == support, lack, 0.0)
                at = np.unravel_index(int(here.argmax()), here.shape)
                if here[at] > 0:
                    yield Lack(
                        span, face, float(state.columns[at[1]]), support,
                        float(needed[at]) / RESERVE, float(here[at]),
                        bool(state.v["counts"][at]),
                    )  # fmt: skip


def more(
    asked: Asked,
    checks: Sequence[SpanCheck],
    designed: Designed,
    standing: Sequence[Standing],
    free: Open,
) -> Asked | None:
    """Return what must be asked beyond ``asked``; None where the bars carry everything."""
    made = asked
    for lack in lacks(checks):
        made = _with(made, asked, lack, designed.bars, free)
    for span, area in end_lacks(designed, standing):
        if span in free.spans:
            before = asked.anchored.get(span, 0.0)
            least = area if area > before else before * MORE_ANCHORED
            least = max(least, made.anchored.get(span, 0.0))
            made = replace(made, anchored={**made.anchored, span: least})
    for support, area in (*top_end_lacks(designed, standing), *tip_lacks(designed, standing)):
        if support in free.supports:
            made = _with_top(made, support, area)
    return None if made == asked else made


def top_end_lacks(designed: Designed, standing: Sequence[Standing]) -> Iterator[tuple[int, float]]:
    """Give the end supports whose top bars lack anchorage for moment and shear at the inner face.

    With each the area of all its top bars [mm2] that would hold as much, developed as they are.
    """
    last = len(designed.outline.supports)
    for near, support, span in zip(ENDS, (1, last), (1, last - 1), strict=True):
        layers = (*designed.bars.top[support - 1].web, *designed.bars.top[support - 1].spread)
        if not designed.exterior(support) or not layers:
            continue
        counted = _anchored_area(designed, standing, "top", support)
        needed = face_demand(designed, span, near).top.F[0] / yield_force(designed) / RESERVE
        if 0 < counted < needed:
            yield support, sum(layer.area for layer in layers) * float(needed) / counted


def _anchored_area(
    designed: Designed, standing: Iterable[Standing], face: Face, support: int
) -> float:
    """Return the area of bars that counts at the inner face of an end support [mm2]."""
    span = 1 if support == 1 else support - 1
    x = np.array([designed.outline.faces(span)[0 if support == 1 else 1]])
    own = (bars for bars in standing if bars.run.face == face)
    return sum(bars.run.area * float(bars.developed(x)[0]) for bars in own)


def end_lacks(designed: Designed, standing: Sequence[Standing]) -> Iterator[tuple[int, float]]:
    """Give the end spans whose bottom bars lack anchorage at the face of the end support.

    By 11.3.9.5, and by the tension of moment and shear there.
    With each the area that must be anchored there [mm2].
    """
    last = len(designed.outline.supports)
    for near, support, span in zip(ENDS, (1, last), (1, last - 1), strict=True):
        if not designed.exterior(support):
            continue
        there = [bars for bars in standing if bars.run.face == "bottom"]
        area = _anchored_area(designed, there, "bottom", support)
        needed = face_tension(designed, span, near) / yield_force(designed)
        hooked = {bars.run.size for bars in there if bars.run.bent_at(support)}
        if area < needed or not all(hook_part(designed, support, size) for size in hooked):
            yield span, needed


def _with(made: Asked, before: Asked, lack: Lack, bars: SectionBars, free: Open) -> Asked:
    if lack.face == "bottom" and lack.span in free.spans:
        own = sum(layer.area for layer in bars.bottom[lack.span - 1])
        most = max(made.bottom.get(lack.span, 0.0), own + lack.area)
        return replace(made, bottom={**made.bottom, lack.span: most})
    if lack.face == "top":
        top = bars.top[lack.near - 1]
        web = top.web
        if web and lack.near in free.supports:
            own = sum(layer.area for layer in (web if lack.turned else (*web, *top.spread)))
            if not lack.turned:
                return _with_top(made, lack.near, own + lack.area)
            most = max(made.top.get(lack.near, 0.0), own + lack.area)
            return replace(made, top={**made.top, lack.near: most})
        if web:
            return made  # given bars fail their check
    elif not _held_alone(bars, lack):
        return made  # given bars fail their check
    return replace(made, holders=_thicker(before.holders, lack))


def _with_top(made: Asked, support: int, area: float) -> Asked:
    """Return what is asked with an area of all top bars of a support [mm2]."""
    most = max(made.all_top.get(support, 0.0), area)
    return replace(made, all_top={**made.all_top, support: most})


def _held_alone(bars: SectionBars, lack: Lack) -> bool:
    """Tell whether only the bars that hold the stirrups stand at the bottom: a cantilever."""
    return all(layer.size == bars.holders for layer in bars.bottom[lack.span - 1])


def _thicker(size: str, lack: Lack) -> str:
    """Return the next size of the two bars that hold the stirrups."""
    sizes = sorted(SIZES, key=lambda each: BARS.number(each, "d_b"))
    later = sizes[sizes.index(size) + 1 :]
    if not later:
        raise UserError(
            f"torques: span {lack.span} needs {lack.needed:.0f} mm2 of {lack.face} bars at "
            f"{lack.x / 1000:.2f} m from its left axis, more than two bars in the corners give; "
            "write a wider or deeper beam, or a smaller torque"
        )
    return later[0]
