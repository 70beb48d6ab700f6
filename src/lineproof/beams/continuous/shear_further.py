"""Sections of shear that another chapter rests on, recorded where the one on shear has not."""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.shear_chapter import STIRRUPS, record_one_section
from lineproof.beams.continuous.shear_sections import ShearSection, section_at
from lineproof.beams.continuous.torsion_record import section_of_torsion
from lineproof.record import Entry

_NEAR = 1e-3
"""Distance [mm] up to which two sections stand at one place."""


def record_further(design: Design, span: int, at: tuple[int, int], key: str) -> Mapping[str, Entry]:
    """Return the entries of the section of a case and column, recorded in a part if not yet.

    Needs the chapter on shear: run it first.
    """
    check, sheet = design.stirrups.checks[span - 1], design.model.sheet
    made = section_at(check, design.model.forces, *at, key)
    printed = (s for s in design.stirrups.sections[span - 1] if _same(s, made))
    known = next(printed, None)
    if known is not None:
        return sheet.entries_of(known.key)
    alike = {n: sheet.entries_of(STIRRUPS)[n] for n in ("A_t", "d_bs", "A_v")}
    acting = check.state.numbers.torsion
    if acting is not None:
        alike |= section_of_torsion(sheet, span, acting)
        alike["d_bc"] = sheet.entries_of(f"torsion-{span}")["d_bc"]
    record_one_section(design, made, alike)
    return sheet.entries_of(key)


def _same(one: ShearSection, other: ShearSection) -> bool:
    """Tell whether two sections are of one case and place, at the same depth and bars.

    A station may stand at the face, but for the last bits of both.
    """
    alike = (one.demand.row, one.d, one.A_s, one.A_sp) == (
        other.demand.row, other.d, other.A_s, other.A_sp,
    )  # fmt: skip
    return alike and abs(one.demand.x - other.demand.x) < _NEAR
