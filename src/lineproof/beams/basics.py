"""The parts every beam calc starts with: what is given, materials, cover."""

from __future__ import annotations

from typing import Protocol

from lineproof.beams.bottom_bars import BARS
from lineproof.beams.flexure import YIELD_CLAUSE, confirmed_value
from lineproof.beams.inputs import FloorBeamInputs
from lineproof.beams.steel import record_yield_strength
from lineproof.beams.steps import Steps
from lineproof.formula import Criterion
from lineproof.quantity import Typed
from lineproof.record.build import EARLIER_EDITION
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import cover, materials, stress_block
from lineproof.standards.codes import CodePair
from lineproof.standards.nbc import loads

GIVEN = "given"
MATERIALS = "materials"
COVER = "cover"


def record_given(sheet: Sheet, inputs: FloorBeamInputs) -> None:
    """Record the inputs as typed."""
    waived = ", waived at the ends where 10.5.1.3 lets it" if inputs.waive_minimum_at_ends else ""
    with sheet.part(GIVEN, "Given"):
        sheet.given("l", inputs.span)
        record_tributary(sheet, inputs.spacing, inputs.tributary_width)
        sheet.given("b_w", inputs.b_w)
        sheet.given("h", inputs.h)
        if inputs.h_f is not None:
            sheet.given("h_f", inputs.h_f)
        sheet.given("f_c", inputs.f_c)
        sheet.given("gamma_c", inputs.gamma_c)
        sheet.given("q_SD", inputs.superimposed)
        if inputs.floor_weight is not None:
            sheet.given("q_fl", inputs.floor_weight)
        sheet.given("c_c", inputs.cover)
        sheet.given("a_max", inputs.aggregate)
        sheet.note(
            "choices",
            f"Section {inputs.shape}; reinforcement {inputs.grade}; {inputs.density}-density "
            f"concrete; use: {inputs.use}; exposure class {inputs.exposure}; fire-resistance "
            f"rating {inputs.fire_rating}, type {inputs.fire_aggregate} concrete; stirrups "
            f"{inputs.stirrup}; ends: {inputs.ends}; minimum reinforcement by "
            f"{inputs.minimum_rule}{waived}.",
            title="Choices",
        )


def record_tributary(sheet: Sheet, spacing: Typed, width: Typed | None) -> None:
    """Record inside the open part the spacing of the beams and the tributary width.

    Without a ``width`` as typed it is calculated from the spacing.
    """
    sheet.given("s_b", spacing)
    if width is None:
        sheet.line(loads.TRIBUTARY)
    else:
        sheet.given("b_tr", width)


def record_materials(
    sheet: Sheet, density: str, grade: str, pair: CodePair, *, whole_beam: bool = False
) -> None:
    """Record the material factors, the stress block and the modulus of rupture.

    For a ``whole_beam`` those of shear, anchorage and deflection count among the changed clauses.
    """
    with sheet.part(MATERIALS, "Materials"):
        sheet.lookup("phi_c", materials.RESISTANCE_FACTORS, "cast in place")
        sheet.lookup("phi_s", materials.RESISTANCE_FACTORS, "cast in place")
        record_yield_strength(sheet, grade)
        sheet.lookup("E_s", materials.CONSTANTS, "reinforcement")
        sheet.lookup("eps_cu", materials.CONSTANTS, "concrete")
        sheet.lookup("lambda_", materials.DENSITY_FACTORS, density)
        _record_modulus(sheet, density)
        sheet.line(materials.F_R)
        sheet.line(stress_block.ALPHA_1)
        sheet.line(stress_block.BETA_1)
        for clause, what in (*pair.changed, *(pair.changed_beyond if whole_beam else ())):
            _record_change(sheet, pair, clause, what)


def _record_change(sheet: Sheet, pair: CodePair, clause: str, what: str) -> None:
    """Record that an edition's text of a clause is not known here, and what is used instead."""
    code = pair.building if clause.startswith("NBC") else pair.concrete
    used = "the rule known before is used until the office confirms this one in its own copy."
    if clause == YIELD_CLAUSE and confirmed_value(sheet.project, pair) is not None:
        used = "the value that the office confirmed in its own copy is used."
    sheet.note(
        f"changed-{clause.replace('.', '-').replace(' ', '-')}",
        f"Clause {clause}: {what}. Its text in {code} is not known here: {used}",
        title=f"Clause {clause} of {code}",
        clause=clause,
        basis=f"from memory of {EARLIER_EDITION}; to be read in {code}",
    )


def _record_modulus(sheet: Sheet, density: str) -> None:
    if density == "normal" and sheet.decide(materials.E_C_RULE):
        sheet.line(materials.E_C_NORMAL)
    else:
        sheet.line(materials.E_C_GENERAL)


class Exposed(Protocol):
    """What cover rests on: exposure class, fire rating and type of concrete, a slab or none."""

    @property
    def exposure(self) -> str:
        """Exposure class."""

    @property
    def fire_rating(self) -> str:
        """Row of the fire tables."""

    @property
    def fire_aggregate(self) -> str:
        """Type of concrete in the fire tables."""

    @property
    def slab(self) -> bool:
        """Whether the beam has a flange."""


def record_cover(sheet: Sheet, inputs: FloorBeamInputs) -> None:
    """Record cover for durability and for fire of the stirrups and the bottom bars."""
    with sheet.part(COVER, "Cover for durability and fire"):
        bars_entries = sheet.entries_of(BARS)
        diameters = [bars_entries[n] for n in ("d_b", "d_b2") if n in bars_entries]
        thickest = max(diameters, key=lambda entry: entry.value)
        cover_inside(Steps(sheet, {"d_bs": bars_entries["d_bs"], "d_b": thickest}), inputs)


def cover_inside(steps: Steps, inputs: Exposed) -> None:
    """Record cover inside the open part; d_bs and d_b stand for stirrup and thickest bar."""
    sheet = steps.sheet
    steps.line(cover.COVER_TO_BARS)
    for column in ("f_cmin", "c_min", "r_cb", "r_ca"):
        sheet.lookup(column, cover.EXPOSURES, inputs.exposure)
    steps.check(cover.STRONG_ENOUGH)
    steps.line(cover.COVER_REQUIRED_STIRRUP)
    steps.check(cover.DURABLE)
    steps.line(cover.COVER_REQUIRED_BAR)
    steps.check(cover.DURABLE_BAR)
    sheet.lookup("c_fire", cover.FIRE_COVER, inputs.fire_rating)
    steps.check(cover.FIRE_SAFE)
    steps.check(_width_for_fire(float(inputs.fire_rating.split()[0])))
    if inputs.slab:
        sheet.lookup("h_fire", cover.FIRE_SLAB, inputs.fire_rating, inputs.fire_aggregate)
        steps.check(cover.FIRE_SAFE_SLAB)


def record_bar_cover(steps: Steps) -> None:
    """Record inside the open part that other bars inside the stirrup are covered as well."""
    cover_part = {n: steps.sheet.entry(f"{COVER}/{n}") for n in ("c_min", "r_cb", "r_ca", "c_b1")}
    steps.bind(**cover_part)
    steps.line(cover.COVER_REQUIRED_BAR)
    steps.check(cover.DURABLE_BAR)


def _width_for_fire(hours: float) -> Criterion:
    if hours > 3:  # noqa: PLR2004 - D-2.9
        return cover.WIDE_ENOUGH_THREE_HOURS
    return cover.WIDE_ENOUGH_TWO_HOURS if hours > 2 else cover.WIDE_ENOUGH  # noqa: PLR2004 - D-2.9
