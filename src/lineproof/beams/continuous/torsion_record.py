"""Torsion as recorded lines: section and threshold of a span, torsion and legs at a section."""

from __future__ import annotations

from typing import Any, Protocol

from lineproof.beams.continuous.shear_numbers import ShearBasis
from lineproof.beams.continuous.symbols import KINDS, code
from lineproof.beams.continuous.torsion import AREAS, SpanTorsion
from lineproof.beams.inputs import Shape
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.formula import FROM_MEMORY
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import bars
from lineproof.standards.a23_3 import torsion as clause

_HELD = (
    "The ends of the span are held against turning at the faces of the supports: the torque of "
    "each half goes to the nearer support, and the torsion is zero at midspan."
)
_HELD_ONCE = (
    "The span is held against turning at the face of its support only: the torque beyond a section "
    "passes through it, and the torsion is zero at the free end."
)
_EQUILIBRIUM = "The torsion is needed for equilibrium: all of it is designed for."
_COMPATIBILITY = (
    "The torsion arises from compatibility: the frame can redistribute what exceeds 0.67 times the "
    "torsion that cracks the section. Members that take up the rest must be designed for it."
)
_IMPORTED = (
    "The torsion of every case is that of the frame analysis, on the straight line between two of "
    "its stations."
)


def record_span_torsion(
    steps: Steps, torsion: SpanTorsion, shape: Shape, corner: str, *, cantilever: bool = False
) -> dict[str, Entry]:
    """Record inside the open part torques and section of a span; return what sections need.

    Needs b_w, ``h``, c_c, d_bs, and with a flange h_f and b_o in place. ``corner`` is the size of
    the thinnest bar in a corner of the stirrups.
    """
    sheet = steps.sheet
    made = {}
    for kind, torque in torsion.torques.items():
        name = torque_symbol(kind)
        made[name] = sheet.given(
            name, f"{torque / 1000:.12g} kN.m/m", f"torque per length by {KINDS[kind]}",
            source="torques of the inputs",
        )  # fmt: skip
    held = _HELD_ONCE if cantilever else _HELD
    sheet.note(
        "held",
        held if torsion.torques else _IMPORTED,
        title="Torsion along the span",
        clause="statics",
    )
    text = _COMPATIBILITY if torsion.compatibility else _EQUILIBRIUM
    sheet.note("kind-of-torsion", text, title="Torsion", clause="11.2.9.2", basis=FROM_MEMORY)
    steps.lines(clause.AREA_RECTANGLE, clause.PERIMETER_RECTANGLE, clause.T_CR)
    made["T_cr"] = made["T_crd"] = steps.entry("T_cr")
    if torsion.compatibility and shape in AREAS:
        steps.lines(clause.OVERHANG, *AREAS[shape])
        made["T_crd"] = steps.line(clause.T_CR_FLANGE)
    steps.lines(clause.AREA_OF_STIRRUP, clause.PERIMETER_OF_STIRRUP, clause.A_O)
    made["d_bc"] = sheet.lookup("d_bc", bars.BARS, corner, "d_b", title="diameter, corner bar")
    return made | {name: steps.entry(name) for name in ("A_oh", "p_h", "A_o")}


def section_of_torsion(sheet: Sheet, span: int, torsion: SpanTorsion) -> dict[str, Entry]:
    """Return what :func:`record_span_torsion` recorded in the part of a span."""
    entries = sheet.entries_of(f"torsion-{span}")
    names = ("T_cr", "A_oh", "p_h", "A_o", *(torque_symbol(kind) for kind in torsion.torques))
    made = {name: entries[name] for name in names}
    whole = torsion.compatibility and clause.T_CR_FLANGE.symbol in entries
    return made | {"T_crd": entries[clause.T_CR_FLANGE.symbol if whole else "T_cr"]}


def torque_symbol(kind: str) -> str:
    """Return the symbol of the torque per length by a load type."""
    return f"t_{code(kind)}"


class Turned(Protocol):
    """A section with what its torsion rests on, as :class:`ShearSection` has it."""

    @property
    def torques(self) -> tuple[tuple[str, float, float], ...]:
        """Load type, torque per length and factor of the case."""

    @property
    def compatibility(self) -> bool:
        """Whether the frame can redistribute the torsion."""

    @property
    def cantilever(self) -> bool:
        """Whether the span is held against turning at one end only."""

    @property
    def place(self) -> str:
        """At d_v from the face, at the face, or a station along the span."""


def record_torsion(steps: Steps, basis: ShearBasis, section: Turned) -> None:
    """Record inside the open part the torsion at a section and whether it counts.

    Needs what :func:`record_span_torsion` returns in place, and l_n, x_f, d_v, b_sn.
    """
    if section.torques:
        T_f = _record_torque(steps, section)
    elif "T_f" in steps.place:  # imported
        T_f = steps.entry("T_f")
    else:
        return
    if not steps.decide(clause.COUNTS):
        return
    if not basis.closed:
        raise UserError(
            "stirrups: torsion counts here, but the stirrups are open; write closed stirrups"
        )
    if section.compatibility:
        T_f = steps.line(clause.COMPATIBILITY, T_cr=steps.entry("T_crd"))
    steps.bind(T_f=T_f)


def _record_torque(steps: Steps, section: Turned) -> Entry:
    """Record the torsion at a section by the torques along its span."""
    factors = [(torque_symbol(kind), torque, factor) for kind, torque, factor in section.torques]
    terms = " + ".join(f"{factor:.12g}*{name}" for name, _, factor in factors)
    if any(torque * factor < 0 for _, torque, factor in factors):
        terms = f"abs({terms})"
    bound: dict[str, Any] = {name: steps.entry(name) for name, _, _ in factors}
    t_f = steps.sheet.line(f"t_f = {terms}", title="Torque per length of this load case", **bound)
    steps.bind(t_f=t_f)
    if section.place == "station":
        steps.line(clause.FROM_FACE)
    elif section.place == "d_v":
        steps.bind(x_n=steps.entry("d_v"))
    else:
        steps.bind(x_n=steps.sheet.given("x_n", "0 mm", source="at the face"))
    return steps.line(clause.TORQUE_CANTILEVER if section.cantilever else clause.TORQUE)


def record_torsion_legs(steps: Steps) -> None:
    """Record inside the open part the closed stirrups for shear and torsion together.

    What torsion leaves of the legs stands for A_v from here on.
    """
    steps.lines(clause.LEG_FOR_TORSION, clause.LEGS_FOR_SHEAR, clause.LEGS)
    steps.check(clause.LEGS_PROVIDED)
    steps.check(clause.SECTION)
    steps.bind(A_v=steps.line(clause.LEGS_LEFT))
