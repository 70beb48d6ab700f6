"""Which sections of a span are printed: each check at the case and place where it is used most."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, replace
from typing import Any, Literal

import numpy as np

from lineproof.beams.continuous.forces import Demand, End, Forces
from lineproof.beams.continuous.shear_check import SpanCheck, Spot, at_bearing
from lineproof.beams.continuous.shear_numbers import SpanEnd
from lineproof.beams.continuous.shear_resistance import LEAST_AREA
from lineproof.beams.continuous.shear_state import loads_near

Place = Literal["d_v", "face", "station"]
_MORE = 1 + 1e-9
"""A further section is printed only where it is used more than those printed already."""
_WORTH = 0.5
"""Bars, or a resistance beside a strain that is used more, used less than this are not printed for
a further case."""


@dataclass(frozen=True, eq=False, slots=True)
class ShearSection:
    """One section to be printed, with the numbers it was chosen by.

    ``end`` is the nearer support, ``distance`` [mm] is from its axis. ``place`` tells how it was
    found: at d_v from the face, at the face (``reason`` says why), or along the span. V_pl and
    ``near_loads`` are the point loads within d_v. ``tension`` is the face in tension; ``mixed``:
    the moment changes sign near the section, so that ``d`` is the smaller of both faces. ``A_s``
    lies on the face in tension, ``A_sp`` on the other. ``torques`` holds load type, torque per
    length and factor of the case where a torque acts. ``cap`` is the area for the largest moment
    alone where it limits the force in the bars. ``values`` holds V_s, V_r, F_lt and the like by
    symbol, ``use`` demand over resistance.
    """

    key: str
    title: str
    span: int
    end: End
    demand: Demand
    distance: float
    place: Place
    reason: str
    V_pl: float
    near_loads: str
    tension: Literal["bottom", "top"]
    mixed: bool
    d: float
    A_s: float
    A_sp: float
    spacing: float
    spot: Spot
    counts: bool
    torques: tuple[tuple[str, float, float], ...]
    compatibility: bool
    cantilever: bool
    cap: float | None
    bearing: SpanEnd | None
    values: Mapping[str, float]
    use: Mapping[str, float]

    @property
    def plain(self) -> bool:
        """Whether no stirrups count here."""
        return self.spot.counted == 0


def sections(check: SpanCheck, forces: Forces) -> tuple[ShearSection, ...]:
    """Return the sections of a span to be printed, from left to right.

    The critical sections of both ends, and further ones wherever a check is used more: by another
    case at that end, or along a zone of stirrups.
    """
    found: dict[tuple[int, int], None] = {}
    last = check.effective.shape[1] - 1
    for column, support in ((0, check.state.numbers.left), (last, check.state.numbers.right)):
        if support.held != "free":
            found |= dict.fromkeys(_at_end(check, column))
    for band in range(len(check.bands)):
        found |= dict.fromkeys(_along(check, band, list(found)))
    ordered = sorted(found, key=lambda each: (check.state.v["x"][each], each[1]))
    names = _Names()
    return tuple(_section(check, forces, row, column, names) for row, column in ordered)


def section_at(check: SpanCheck, forces: Forces, row: int, column: int, key: str) -> ShearSection:
    """Return the section of a case at a column, to be printed under a key of its own."""
    made = _section(check, forces, row, column, _Names())
    further = "" if made.place == "station" else ", another load case"
    return replace(made, key=key, title=f"{made.title}{further}")


def _at_end(check: SpanCheck, column: int) -> Iterator[tuple[int, int]]:
    """Give the cases to print at an end.

    That of the shear, of its strain or resistance, and others where resistance or bars are used
    more.
    """
    rows = [int(check.ranked[:, column].argmax())]
    uses = (check.resisted, *(check.bars[n] for n in ("tension", "compression", "bearing")))
    for use in uses:
        here = use[:, column]
        if here.max() > max(_WORTH, max(here[rows]) * _MORE):
            rows.append(int(here.argmax()))
    yield from ((row, column) for row in rows)


def _along(check: SpanCheck, band: int, known: list[tuple[int, int]]) -> Iterator[tuple[int, int]]:
    """Give the section of a zone that is used most, where none printed is used as much."""
    state, owners = check.state, check.owners
    inside = owners == band
    inside[0] = inside[-1] = False
    here = inside & ~state.nearer
    if not here.any():
        return
    places = [at for at in known if check.owner(*at) == band]
    uses = [(check.ranked, 0.0), (check.resisted, _WORTH), (check.spacing, 0.0)]
    if state.v["counts"].any():
        counts = state.v["counts"]
        uses += [
            (np.where(counts, check.bars[name], 0.0), _WORTH) for name in ("tension", "compression")
        ]
    for use, worth in uses:
        masked = np.where(here, use, -1.0)
        worst = float(masked.max())
        if worst >= worth and worst > max((float(use[at]) for at in places), default=-1.0) * _MORE:
            row, column = np.unravel_index(int(masked.argmax()), masked.shape)
            places.append((int(row), int(column)))
            yield places[-1]


class _Names:
    """Keys and titles: the first section at an end is the end's own, others are numbered."""

    def __init__(self) -> None:
        self.used: dict[str, int] = {}

    def take(self, key: str) -> str:
        self.used[key] = self.used.get(key, 0) + 1
        number = self.used[key]
        return key if number == 1 else f"{key}-{number}"


def _section(
    check: SpanCheck, forces: Forces, row: int, column: int, names: _Names
) -> ShearSection:
    state, v = check.state, check.state.v
    span = state.numbers.span
    x, length = float(v["x"][row, column]), forces.beam.spans[span - 1].length
    at_end = column in (0, len(check.u) - 1)
    end = _nearer_end(check, x)
    distance = x if end == "left" else length - x
    critical = check.critical(end)
    support = state.numbers.left if end == "left" else state.numbers.right
    reason = critical.reason[row] if at_end else ""
    of_face = reason or support.held == "free"
    place: Place = "station" if not at_end else ("face" if of_face else "d_v")
    key = names.take(f"shear-{span}-{end if at_end else 'along'}")
    bottom, acting = bool(v["bottom"][row, column]), state.numbers.torsion
    M, V = float(v["M"][row, column]), float(v["V"][row, column])
    return ShearSection(
        key=key,
        title=_title(span, end, key, distance, at_end=at_end),
        span=span,
        end=end,
        demand=Demand(span, x, state.sides[column], row, forces.cases[row], M, V),
        distance=distance,
        place=place,
        reason=reason,
        V_pl=float(critical.V_pl[row]) if at_end else 0.0,
        near_loads=_near_loads(check, forces, end, row, column) if at_end else "",
        tension="bottom" if bottom else "top",
        mixed=at_end and bool(critical.mixed[row]),
        d=float(v["d"][row, column]),
        A_s=_area(float(v["A_s"][row, column])),
        A_sp=float(v["A_sp"][row, column]),
        spacing=check.bands[check.owner(row, column)].spacing,
        spot=check.at(row, column),
        counts=bool(v["counts"][row, column]),
        torques=torques_of(check, forces, row),
        compatibility=acting is not None and acting.compatibility,
        cantilever="free" in (state.numbers.left.held, state.numbers.right.held),
        cap=check.cap(end, row) if at_end and not v["counts"][row, column] else None,
        bearing=support if at_end and bottom and at_bearing(support) else None,
        values=_values(check, row, column),
        use=_use(check, row, column),
    )


def _use(check: SpanCheck, row: int, column: int) -> dict[str, float]:
    """Return how far the section uses strength, spacing and its bars: demand over resistance."""
    shares = {"strength": check.strength, "spacing": check.spacing}
    shares |= {name: check.bars[name] for name in ("tension", "compression", "bearing")}
    return {name: float(share[row, column]) for name, share in shares.items()}


def _area(A_s: float) -> float:
    """Return the area of the bars in tension; 0 where the smallest area stands for none."""
    return A_s if A_s > LEAST_AREA else 0.0


def _near_loads(check: SpanCheck, forces: Forces, end: End, row: int, column: int) -> str:
    """Write the point loads within d_v of a face with their factors: ``1.25 x 60 kN (D)``."""
    state = check.state
    face = state.faces[0] if end == "left" else state.faces[1]
    factors = forces.factors_of(row)
    d_v = float(state.v["d_v"][row, column])
    return " + ".join(
        f"{factors[load.kind, load.span]:.12g} x {size / 1000:.6g} kN ({load.kind})"
        for load, size in loads_near(forces, state.numbers.span, end, face, d_v)
        if (load.kind, load.span) in factors
    )


def torques_of(check: SpanCheck, forces: Forces, row: int) -> tuple[tuple[str, float, float], ...]:
    """Return load type, torque per length and factor of the torques that act in a case."""
    acting, span = check.state.numbers.torsion, check.state.numbers.span
    if acting is None:
        return ()
    factors = forces.factors_of(row)
    return tuple(
        (kind, torque, factors[kind, span])
        for kind, torque in acting.torques.items()
        if (kind, span) in factors
    )


def _nearer_end(check: SpanCheck, x: float) -> End:
    """Return the nearer end; that which is held where the other is free."""
    numbers, (start, end) = check.state.numbers, check.state.faces
    if numbers.left.held == "free":
        return "right"
    return "left" if numbers.right.held == "free" or x - start <= end - x else "right"


def _title(span: int, end: End, key: str, distance: float, *, at_end: bool) -> str:
    if not at_end:
        return f"Shear of span {span}, {distance / 1000:.2f} m from the axis of its {end} support"
    further = ", another load case" if key[-1].isdigit() else ""
    return f"Shear of span {span} at its {end} support{further}"


def _values(check: SpanCheck, row: int, column: int) -> dict[str, float]:
    v: Mapping[str, Any] = check.state.v
    plain = bool(check.plain[row, column])
    names = ["d_v", "V_c", "V_rmax", "s_max", "M_f", "V_f", "T_f", "a_t"]
    made = {name: float(v[name][row, column]) for name in names}
    if check.state.basis.method == "general":
        made["eps_x"] = float(v["eps_asked"][row, column])
    made["beta"] = float(v["beta_plain" if plain else "beta"][row, column])
    made["theta"] = float(v["theta"][row, column])
    if not v["counts"][row, column]:
        made["T_f"] = float(v["T_all"][row, column])
    if plain:
        made["V_c"] = float(v["V_plain"][row, column])
    made |= {n: float(check.bars[n][row, column]) for n in ("V_s", "F_lt", "F_lc", "F_le")}
    made["V_r"] = made["V_c"] if plain else min(made["V_c"] + made["V_s"], made["V_rmax"])
    return made
