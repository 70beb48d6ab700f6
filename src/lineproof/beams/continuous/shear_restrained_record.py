"""Recorded: the shear at an end with the assumed moment of restraint, in a part of its own."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace

from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.model import GIVEN, Model
from lineproof.beams.continuous.shear_numbers import ShearBasis
from lineproof.beams.continuous.shear_record import record_method
from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.beams.continuous.torsion_record import record_torsion_legs
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.record import Entry
from lineproof.standards.a23_3 import shear, shear_bars, torsion

_RESTRAINT = (
    "The moment of restraint assumed for the top bars at this end adds to the shear and the "
    "reaction here what holds it in balance over the span; at the far support it takes as much "
    "away, which is not counted. The top is in tension then, by the moment of the face, which is "
    "the largest."
)

_NO_RESISTANCE = (
    "The section has no resistance in its own load case, and that check fails: with the restraint "
    "nothing more is checked."
)


def restrained_key(section: ShearSection) -> str:
    """Return the key of the part that holds a section at an end with its restraint."""
    return f"{section.key}-restraint"


def record_restrained(
    model: Model,
    basis: ShearBasis,
    section: ShearSection,
    more: Mapping[str, Entry],
    d: Entry | None,
) -> None:
    """Record the shear and the top bars of a section at an end with its restraint, in a part.

    ``more`` are the stirrups and the torsion of the span, ``d`` the depth of the top bars, None
    where none stand: then it is that of the face. Needs the part of the section.
    """
    sheet, span = model.sheet, section.span
    hog = sheet.entries_of(f"hog-{span}-right" if section.end == "left" else f"hog-{span + 1}-left")
    own = sheet.entries_of(section.key)
    title = f"{section.title}: with the restraint assumed"
    with sheet.part(restrained_key(section), title):
        sheet.note("restraint", _RESTRAINT, title="Restraint", basis=COMMON_PRACTICE)
        below = section.tension == "bottom"
        top = own["A_sp"] if below else own["A_s"]
        place = span_place(sheet, model.inputs, span) | dict(more)
        place |= {n: own[n] for n in ("V_f", "T_f", "T_fr") if n in own}
        place |= {n: hog[n] for n in ("M_f", "d", "A_sr") if n in hog}
        place |= {} if d is None else {"d": d}
        place |= {"b_w": sheet.entry(f"{GIVEN}/b_w"), "A_s": top}
        sheet.stand_for(place)
        steps = Steps(sheet, place)
        steps.bind(V_f=steps.line(shear.WITH_RESTRAINT))
        if "T_fr" in own:
            steps.bind(T_f=own["T_fr"])
        steps.line(shear.D_V)
        if not {"s", "V_s"} & own.keys():
            sheet.note("no-resistance", _NO_RESISTANCE, title="Resistance")
            return
        turned = replace(section, A_s=section.A_sp) if below else section
        if record_method(steps, basis, turned):
            _record_strength(steps, section, own)
            _record_bars(steps, section)


def _record_strength(steps: Steps, section: ShearSection, own: Mapping[str, Entry]) -> None:
    steps.lines(shear.V_C, shear.V_R_MAX)
    if section.plain:
        steps.bind(V_s=own["V_s"])
        steps.line(shear.V_R_PLAIN)
    else:
        steps.bind(s=own.get("s_x", own["s"]))
        if section.counts:
            record_torsion_legs(steps)
        steps.lines(shear.V_S, shear.V_R)
    steps.check(shear.RESTRAINT_STRENGTH)


def _record_bars(steps: Steps, section: ShearSection) -> None:
    """Record the force in the top bars; a support from below caps it at that of the moment."""
    if section.counts:
        steps.lines(torsion.SHEAR_IN_BARS, torsion.TENSION_SIDE)
    else:
        steps.line(shear_bars.TENSION_SIDE)
    steps.bind(A_sd=steps.entry("A_s"))
    if section.counts or section.reason:
        steps.check(shear_bars.TENSION_SIDE_HOLDS)
        return
    steps.line(shear_bars.TENSION_SIDE_CAPPED)
    steps.check(shear_bars.CAPPED_HOLDS)
