"""What supports take besides their reactions, unfactored: moments of the frame, and torques.

Columns and walls that hold the ends of the spans take the difference of the moments on their two
sides. Every support takes the torque of the halves of the spans beside it, of an overhang all.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence

from lineproof.beams.analysis.arrangements import LIVE
from lineproof.beams.continuous.groups import Group, ends_at, moment_name, named, where
from lineproof.beams.continuous.model import Model
from lineproof.beams.continuous.resistance_demand import NOTHING
from lineproof.beams.continuous.symbols import KINDS, code, notation, numbered, stated, subscript
from lineproof.beams.continuous.torsion_record import torque_symbol
from lineproof.formula import Symbol
from lineproof.record import Entry

TORQUES = "torques-supports"
"""Key of the part with the torques of the supports."""
_SIGN = (
    "A support that holds the ends of the spans against rotation takes the moment to its left less "
    "that to its right: positive clockwise, as the elevation is drawn."
)
_TO_SUPPORTS = (
    "The torque of each half of a span goes to the nearer support, that of an overhang to its own. "
    "Live load stands on the spans on both sides. Nothing is redistributed here."
)


def holding(model: Model) -> tuple[int, ...]:
    """Return the supports that take moments: columns with stiffness, and fixed ends."""
    supports = enumerate(model.inputs.supports, start=1)
    return tuple(j for j, support in supports if support.kind not in ("simple", "free"))


def symbols_of_moments(model: Model, groups: Sequence[Group]) -> Iterator[Symbol]:
    """Give the symbols of the moments that supports take."""
    for j in holding(model):
        for group in groups:
            meaning = f"moment on support {j}, {where(group)}, unfactored"
            yield numbered(f"M_c{j}{group.code}", "M", f"c{j},{group.subscript}", meaning)
        for kind in dict.fromkeys(group.kind for group in groups if group.kind in LIVE):
            sub = f"{j},{subscript(kind)}"
            for mark, most in (("", "largest"), ("m", "smallest")):
                meaning = f"{most} moment on support {j}, {KINDS[kind]}, unfactored"
                yield numbered(f"M_c{mark}{j}{code(kind)}", "M", f"c{mark}{sub}", meaning)


def record_support_moments(model: Model, scopes: Mapping[Group, Mapping[str, Entry]]) -> None:
    """Record inside the open part of the analysis the moments that supports take, by group.

    Of live load the largest has it on the spans that raise the moment, the smallest on the others.
    """
    held = holding(model)
    if not held:
        return
    model.sheet.note("sign-on-supports", _SIGN, title="Moments on the supports")
    for group, scope in scopes.items():
        for j in held:
            _record_moment(model, group, scope, j)
    for kind in dict.fromkeys(group.kind for group in scopes if group.kind in LIVE):
        for j in held:
            _record_extremes(model, kind, scopes, j)


def _record_moment(model: Model, group: Group, scope: Mapping[str, Entry], support: int) -> None:
    names = {end: moment_name(model, group, span, end) for span, end in ends_at(model, support)}
    left, right = names.get("right", ""), names.get("left", "")
    if not (left or right):
        return
    difference = f"{left} - {right}" if left and right else left or f"-{right}"
    text = f"M_c{support}{group.code} = {difference}"
    title = f"Moment on support {support}, {where(group)}, unfactored"
    model.sheet.line(stated(text, title=title), **named(scope, text))


def _record_extremes(model: Model, kind: str, scopes: Mapping[Group, object], support: int) -> None:
    entries = model.sheet.part_entries
    names = [f"M_c{support}{group.code}" for group in scopes if group.kind == kind]
    for mark, sign, most in (("", 1.0, "Largest"), ("m", -1.0, "Smallest")):
        terms = [n for n in names if n in entries and sign * entries[n].value > NOTHING]
        if terms:
            text = f"M_c{mark}{support}{code(kind)} = {' + '.join(terms)}"
            title = f"{most} moment on support {support}, {KINDS[kind]}, unfactored"
            model.sheet.line(stated(text, title=title))


def record_support_torques(model: Model, torques: Mapping[str, Entry]) -> None:
    """Record in a part the torque of every support by load type; ``torques`` [kN.m/m] by symbol.

    Does nothing without torques among the inputs.
    """
    kinds = [kind for kind in KINDS if torque_symbol(kind) in torques]
    if not kinds:
        return
    supports = model.inputs.held
    sheet = model.sheet
    sheet.notation = sheet.notation | notation(_symbols_of_torques(supports, kinds))
    with sheet.part(TORQUES, "Torques of the supports"):
        sheet.note("torques", _TO_SUPPORTS, title="Torque to the supports", clause="statics")
        for kind in kinds:
            for j in supports:
                lengths = " + ".join(_length(model, span) for span, _ in ends_at(model, j))
                text = f"T_c{j}{code(kind)} = {torque_symbol(kind)}*({lengths})"
                title = f"Torque of support {j}, {KINDS[kind]}, unfactored"
                sheet.line(stated(text, title=title), **named(torques, text))


def _symbols_of_torques(supports: Sequence[int], kinds: Sequence[str]) -> Iterator[Symbol]:
    for j in supports:
        for kind in kinds:
            meaning = f"torque of support {j}, {KINDS[kind]}, unfactored"
            yield numbered(f"T_c{j}{code(kind)}", "T", f"c{j},{subscript(kind)}", meaning)


def _length(model: Model, span: int) -> str:
    """Return the length of a span whose torque goes to one support."""
    return f"l_{span}" if model.forces.beam.cantilever(span) else f"l_{span}/2"
