"""The sections of the working that the envelopes show, with the values of their lines."""

from __future__ import annotations

from collections.abc import Iterator

from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.developed import bars_of
from lineproof.beams.continuous.faces import faces_of, has_sag, nominally_simple, sagging_spans
from lineproof.beams.continuous.figure_envelope import RESTRAINED, Section
from lineproof.beams.continuous.summary_tables import bars_at, printed_sides
from lineproof.standards.a23_3 import flexure, shear


def moment_sections(design: Design) -> Iterator[Section]:
    """Give the section of every span and face of a support with its M_f and M_r [N.mm]."""
    model, axes = design.model, design.outline.axes
    for span in sagging_spans(model):
        if has_sag(model, span):
            key = f"sag-{span}"
            found = model.sheet.entries_of(key) | bars_of(model.sheet, key)
            x = axes[span - 1] + model.forces.sag(span).x
            shown = printed_sides(found[flexure.STRENGTH.key], "kN.m")
            yield Section(x, found["M_f"].value, found["M_r"].value, shown=shown)
    for face in faces_of(model):
        own = model.sheet.entries_of(face.key)
        if flexure.STRENGTH.key in own:
            x = design.outline.faces(face.span)[0 if face.near == "left" else 1]
            words = RESTRAINED if nominally_simple(model, face) else ""
            M_r = bars_at(model, face)["M_r"].value
            shown = printed_sides(own[flexure.STRENGTH.key], "kN.m")
            yield Section(x, -own["M_f"].value, M_r, words, shown)


def shear_sections(design: Design) -> Iterator[Section]:
    """Give every section of shear that is printed with its V_f and V_r [N]."""
    axes = design.outline.axes
    for section in (each for row in design.stirrups.sections for each in row):
        entries = design.model.sheet.entries_of(section.key)
        V_f, V_r = entries["V_f"].value, entries.get("V_r")
        check = entries.get(shear.STRENGTH.key)
        shown = printed_sides(check, "kN") if check is not None else None
        signed = V_f if section.demand.V >= 0 else -V_f
        x = axes[section.span - 1] + section.demand.x
        yield Section(x, signed, None if V_r is None else V_r.value, shown=shown)
