"""The chapter on shear: stirrups, every section that is printed, supports, flange and web."""

from __future__ import annotations

import math
from collections.abc import Mapping

from lineproof.beams.continuous.anchorage_record import plain
from lineproof.beams.continuous.bars_counted import record_area
from lineproof.beams.continuous.bearing import (
    hangers_needed,
    record_bearing,
    record_hangers,
)
from lineproof.beams.continuous.case_forces import record_forces
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.developed import Developed, bars_of, record_lengths
from lineproof.beams.continuous.faces import Face as FaceOfSupport
from lineproof.beams.continuous.faces import faces_of, has_sag, hogging
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.imported_torsion import record_imported_torsion
from lineproof.beams.continuous.interface import (
    beside_hog,
    beside_sag,
    record_interface,
    record_interface_top,
    record_length,
    record_restrained_length,
)
from lineproof.beams.continuous.layout import Face
from lineproof.beams.continuous.model import GIVEN, Model
from lineproof.beams.continuous.reaction_record import record_reaction
from lineproof.beams.continuous.restraint import SHARES
from lineproof.beams.continuous.shear_depths import (
    depth_of_bars,
    depth_of_layers,
    depth_with_restraint,
)
from lineproof.beams.continuous.shear_record import record_place, record_section
from lineproof.beams.continuous.shear_restrained_record import record_restrained
from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.beams.continuous.shear_stretches import BarsOver, bars_over
from lineproof.beams.continuous.stirrups_record import record_stirrups
from lineproof.beams.continuous.support_turning import record_support_torques
from lineproof.beams.continuous.torsion_inputs import corner_bar
from lineproof.beams.continuous.torsion_record import record_span_torsion
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.record import Entry
from lineproof.sheet import Sheet

STIRRUPS = "stirrups"
MORE_BARS = "More bars than the moments ask for: {}."
AT_GIRDER = (
    "Where a girder carries the beam from the side, the bars carry moment and shear together at "
    "its face."
)
AT_TIP = "So they do near a free end, as far as they are developed there."
_SAME = 1e-9
THROUGH = (
    "Torsion counts: all bottom bars of the web run from support to support, the top bars reach as "
    "far as moment, shear and torsion together ask for, and the bars in the corners of the "
    "stirrups run through the beam."
)


def _faces_with_overhang(model: Model) -> list[tuple[FaceOfSupport, Mapping[str, Entry]]]:
    """Return the faces with tension in bars of the overhang, each with its M_f and what takes it.

    The milder face of a support has the section of the other; its moment may fall off faster.
    """
    made: list[tuple[FaceOfSupport, Mapping[str, Entry]]] = []
    parts = {part.key: part.entries for part in model.sheet.parts}
    for face in faces_of(model):
        own = parts.get(face.key, {})
        held = own if "M_r" in own else parts.get(face.across, {})
        if "M_f" in own and "n_o" in held and held["n_o"].value > 0:
            made.append((face, {**held, "M_f": own["M_f"]}))
    return made


def record_shear(design: Design) -> None:
    """Record stirrups, torsion, the sections of every span, supports and the flange."""
    model, choice = design.model, design.stirrups
    sheet = model.sheet
    with sheet.part(STIRRUPS, "Stirrups"):
        ties = [zone for zone in design.detailing.stirrups if zone.around_hooks]
        alike = record_stirrups(Steps(sheet, {}), choice, design.outline, ties, design.runs)
        if design.raised and not design.designed.torsion:
            tips = any(not design.designed.held(n) for n in (1, model.spans + 1))
            text = f"{MORE_BARS.format('; '.join(design.raised))} {AT_GIRDER}"
            text = f"{text} {AT_TIP}" if tips else text
            sheet.note("more-bars", text, title="Bars along the beam", clause="11.3.9")
    torsion = _record_torsion(design, alike)
    record_support_torques(model, next(iter(torsion.values()), {}))
    for row in choice.sections:
        for section in row:
            more = alike | torsion.get(section.span, {})
            record_one_section(design, section, more)
            support = section.span if section.end == "left" else section.span + 1
            restrained = support in design.designed.restrained
            if restrained and section.key == f"shear-{section.span}-{section.end}":
                d = depth_with_restraint(design, section)
                record_restrained(model, choice.basis, section, more, d)
    _record_supports(design, alike)
    if model.inputs.slab_bars is not None and model.inputs.slab:
        _record_interfaces(design)


def _record_torsion(design: Design, alike: Mapping[str, Entry]) -> dict[int, dict[str, Entry]]:
    model, made = design.model, {}
    for check in design.stirrups.checks:
        acting, span = check.state.numbers.torsion, check.state.numbers.span
        if acting is None:
            continue
        with model.sheet.part(f"torsion-{span}", f"Torsion of span {span}"):
            place = span_place(model.sheet, model.inputs, span)
            model.sheet.stand_for(place)
            steps = Steps(model.sheet, place | dict(alike))
            corner = corner_bar(model, design.designed, span, design.runs)
            made[span] = record_span_torsion(
                steps, acting, design.outline.shape, corner,
                cantilever=design.designed.cantilever(span),
            )  # fmt: skip
            if span in design.designed.torsion:
                _note_bars(steps, design)
    return made


def _note_bars(steps: Steps, design: Design) -> None:
    """Say what torsion does to the bars along the beam, where they are chosen here."""
    if design.model.inputs.bar_runs is not None:
        return
    text = THROUGH
    if design.raised:
        text = f"{text} {MORE_BARS.format('; '.join(design.raised))}"
    steps.sheet.note(
        "bars-with-torsion", text, title="Bars along the beam", clause="11.3.10.6",
        basis=COMMON_PRACTICE,
    )  # fmt: skip


def record_one_section(design: Design, section: ShearSection, more: Mapping[str, Entry]) -> None:
    """Record a section of shear in a part; ``more``: the stirrups and the torsion of its span."""
    model = design.model
    sheet, span = model.sheet, section.span
    support = span if section.end == "left" else span + 1
    d = depth_of_layers(design, section)
    with sheet.part(section.key, section.title):
        place = span_place(sheet, model.inputs, span)
        width = sheet.entries_of(GIVEN).get(f"b_s{support}")
        place |= {} if width is None else {"b_sn": width}
        place |= {"b_w": sheet.entry(f"{GIVEN}/b_w"), **more}
        sheet.stand_for(place)
        steps = Steps(sheet, place)
        steps.bind(d=depth_of_bars(design, steps, section) if d is None else d)
        _record_bars(design, steps, section)
        x = record_place(steps, section)
        record_forces(steps, model, section.demand, section.end, x=x)
        if model.imported is not None and model.imported.has_torsion(span):
            record_imported_torsion(steps, model.imported, section.demand, section.end)
        record_section(steps, design.stirrups.basis, section)


def _record_bars(design: Design, steps: Steps, section: ShearSection) -> None:
    """Record the bars that count on both faces, and those for the largest moment alone."""
    other: Face = "top" if section.tension == "bottom" else "bottom"
    for symbol, face, area in (
        ("A_s", section.tension, section.A_s),
        ("A_sp", other, section.A_sp),
    ):
        record_area(steps, symbol, _counted(design, section, face, area))
    if section.cap is not None:
        steps.bind(A_sr=_needed(design.model, section))


def _counted(design: Design, section: ShearSection, face: Face, area: float) -> BarsOver:
    """Return the bars of a face whose area the section was chosen by."""
    x = design.outline.axes[section.span - 1] + section.demand.x
    standing = design.standing
    for over in bars_over(design.designed, standing, face, section.span):
        met = over.start - 1 <= x <= over.end + 1
        if met and abs(over.area - area) <= _SAME * max(area, 1.0):
            return over
    msg = f"{section.key}: the bars of the {face} have another area than {area!r}"
    raise AssertionError(msg)


def _needed(model: Model, section: ShearSection) -> Entry:
    """Return the recorded area that the largest moment alone asks for."""
    if section.tension == "bottom":
        return model.sheet.entry(f"sag-{section.span}/A_sr")
    support = section.span if section.end == "left" else section.span + 1
    faces = [face for face in faces_of(model) if face.support == support]
    worst = max(faces, key=lambda face: hogging(model, face))
    return model.sheet.entry(f"{worst.key}/A_sr")


def _record_supports(design: Design, alike: Mapping[str, Entry]) -> None:
    model = design.model
    for number, support in enumerate(model.inputs.supports, start=1):
        if support.kind == "free":
            continue
        hung = support.carrier == "girder"
        title = "hanger stirrups" if hung else "bearing"
        with model.sheet.part(f"support-{number}", f"Support {number}: {title}"):
            steps = Steps(model.sheet, dict(alike))
            restrained = number in design.designed.restrained
            R_f = record_reaction(steps, model, number, restrained=restrained)
            if hung:
                record_hangers(steps, hangers_needed(design.stirrups.basis, R_f.value))
            else:
                steps.bind(l_b=model.sheet.entry(f"{GIVEN}/b_s{number}"))
                breadth = design.designed.breadths.get(number, math.inf)
                narrow = breadth < design.outline.b_w
                if narrow:
                    across = plain(breadth, "mm")
                    steps.bind(b_col=model.sheet.given("b_col", across, source="column"))
                record_bearing(steps, narrow=narrow)


def _record_interfaces(design: Design) -> None:
    """Record the plane between flange and web in every span and at the supports."""
    model = design.model
    slab = model.inputs.slab_bars
    assert slab is not None  # asked for before  # noqa: S101
    sheet = model.sheet
    for span in (k for k in design.bottom if has_sag(model, k)):
        entries = sheet.entries_of(f"sag-{span}") | bars_of(sheet, f"sag-{span}")
        with sheet.part(f"interface-{span}", f"Span {span}: flange and web, positive moment"):
            steps = _flange_steps(sheet, model, span)
            steps.bind(**{n: entries[n] for n in ("A_s", "C_f") if n in entries})
            record_length(steps, beside_sag(model.forces, span))
            record_interface(steps, slab, block_in_web="C_f" in entries)
    for face, held in _faces_with_overhang(model):
        with sheet.part(
            f"interface-{face.key}", f"{face.name.capitalize()}: flange and web, negative moment"
        ):
            steps = _flange_steps(sheet, model, face.span)
            steps.bind(n_o=held["n_o"], A_b=held.get("A_bo", held["A_b"]))
            steps.bind(M_f=held["M_f"], M_r=held["M_r"])
            _record_to_inflection(steps, design, face)
            short = _overhang_in_part(design, face)
            if short is not None:
                l_av, l_d = record_lengths(steps, short, "the face")
                steps.bind(l_av=l_av, l_d=l_d)
            record_interface_top(steps, slab, in_part=short is not None)


def _overhang_in_part(design: Design, face: FaceOfSupport) -> Developed | None:
    """Return the top bars of the overhang with most of their area, if that counts in part only."""
    counted = [each for each in design.top_counted(face) if each.run.place == "overhang"]
    most = max(counted, key=lambda each: each.part, default=None)
    return None if most is None or most.whole else most


def _flange_steps(sheet: Sheet, model: Model, span: int) -> Steps:
    place = span_place(sheet, model.inputs, span)
    place |= {n: sheet.entry(f"{GIVEN}/{n}") for n in ("b_w", "h_f")}
    place["b"] = place["b_f"]
    return Steps(sheet, place)


def _record_to_inflection(steps: Steps, design: Design, face: FaceOfSupport) -> None:
    """Record the length from a face to where the moment of its governing case is zero."""
    model, support = design.model, face.support
    if support not in design.designed.restrained:
        record_length(steps, beside_hog(model.forces, support, face.side))
        return
    steps.bind(b_sp=model.sheet.entry(f"{GIVEN}/b_s{support}"), l=model.lengths[face.span - 1])
    record_restrained_length(steps, SHARES[model.inputs.supports[support - 1].carrier])
