"""Section study: cracking moment, balanced steel and moment, capacity curve of one section."""

from __future__ import annotations

from typing import Any

from lineproof.beams.bars import BarLayers, bars_text, read_bars
from lineproof.beams.basics import GIVEN, MATERIALS, record_materials
from lineproof.beams.bottom_bars import BARS, record_bars, refuse_unfit
from lineproof.beams.capacity import SHARES, record_capacity
from lineproof.beams.flexure import (
    BALANCED,
    FLEXURE,
    midspan,
    record_balanced,
    record_yield,
    resistance,
)
from lineproof.beams.floor_beam import prepare
from lineproof.beams.inputs import (
    SHAPES,
    InputReader,
    Shape,
    check_density,
    one_of,
    read_grade,
    read_input,
    row_of,
)
from lineproof.beams.record_figures import moment_level, record_section_figure, record_strain_figure
from lineproof.beams.second_path import SECOND_PATH, record_second_path
from lineproof.beams.section import SECTION, record_gross
from lineproof.errors import inputs_named
from lineproof.quantity import QuantityInput
from lineproof.sheet import Sheet
from lineproof.standards.a23_3.bars import STIRRUP_BENDS
from lineproof.standards.a23_3.materials import DENSITY_FACTORS
from lineproof.standards.codes import CodePair

SCOPE = "preliminary: section study, no loads"
NOT_COVERED = (
    {"check": "Loads and the moment they cause", "clause": "8.3"},
    {"check": "Minimum reinforcement and crack control", "clause": "10.5, 10.6"},
    {"check": "Cover for durability and fire", "clause": "7.9"},
    {"check": "Shear, deflection, development of bars", "clause": "9.8, 11.3, 12"},
)
_CALLS = {
    GIVEN: "section_study(...)",
    MATERIALS: "section_study(...)",
    SECTION: "study.cracking()",
    BARS: "study.bars()",
    BALANCED: "study.balanced()",
    FLEXURE: "study.resistance()",
    SECOND_PATH: "study.second_path()",
    f"{SECOND_PATH}-balanced": "study.second_path()",
    "summary": "study.capacity()",
    **{f"capacity-{share}": "study.capacity()" for share, _ in SHARES},
    "capacity": "study.capacity()",
}
_SIZES = ("b_w", "h", "f_c", "gamma_c", "cover", "aggregate")


class SectionStudy:
    """One section on a sheet; like a beam it keeps nothing but the sheet and its choices."""

    def __init__(
        self, sheet: Sheet, shape: Shape, layers: BarLayers, stirrup: str, pair: CodePair
    ) -> None:
        self.sheet, self.shape, self.layers = sheet, shape, layers
        self.stirrup, self.pair = stirrup, pair

    def cracking(self) -> None:
        """Record the gross section and the cracking moments, bottom and top in tension."""
        with self.sheet.part(SECTION, "Gross section and cracking moments"):
            record_gross(self.sheet, self.shape)

    def bars(self) -> None:
        """Record the bars, their fit and the effective depth."""
        record_bars(self.sheet, self.layers, stirrup=self.stirrup, chosen=False)
        refuse_unfit(self.sheet, self.layers, "bars")

    def balanced(self) -> None:
        """Record the balanced condition: neutral axis, steel and moment."""
        record_balanced(self.sheet, self.shape)

    def resistance(self) -> None:
        """Record the resistance of the bars and that they yield."""
        steps = midspan(self.sheet, self.shape)
        with self.sheet.part(FLEXURE, "Moment resistance with the bars chosen"):
            resistance(steps, self.shape)
            record_yield(steps, self.pair)

    def second_path(self) -> None:
        """Record the proofs of the resistances by layers and strains."""
        record_second_path(self.sheet, self.shape)

    def capacity(self) -> None:
        """Record the figures, the resistance at shares of the balanced steel and the curve."""
        sheet, shape = self.sheet, self.shape
        M_r = sheet.entry(f"{FLEXURE}/M_r")
        with sheet.part("summary", "Section and state at the resistance"):
            record_section_figure(sheet, shape, self.layers, self.stirrup, {})
            record_strain_figure(sheet, shape, self.layers)
        levels = [moment_level(sheet.entry(f"{SECTION}/M_cr"), "cr", "cracking moment", "dotted")]
        A_s = midspan(sheet, shape).place["A_s"]
        record_capacity(sheet, shape, (A_s, M_r), bars_text(self.layers), levels, tabulate=True)


@inputs_named
def section_study(
    sheet: Sheet,
    *,
    b_w: QuantityInput,
    h: QuantityInput,
    f_c: QuantityInput,
    grade: str,
    bars: str,
    cover: QuantityInput,
    b_f: QuantityInput | None = None,
    h_f: QuantityInput | None = None,
    shape: str = "T",
    stirrup: str = "10M",
    density: str = "normal",
    gamma_c: QuantityInput = "2400 kg/m3",
    aggregate: QuantityInput = "20 mm",
) -> SectionStudy:
    """Start the study of one section: check all inputs, record them and the materials.

    Raises :class:`UserError` with every fault at once, before anything is recorded.
    """
    given: dict[str, Any] = dict(locals())
    reader = InputReader(given)
    pair = reader.code_pair(sheet.project)
    section: Shape = reader.take("shape", one_of, SHAPES)
    read = {name: reader.take(name, read_input) for name in _SIZES}
    for name in ("b_f", "h_f"):
        if (given[name] is None) != (shape == "rectangular"):
            reader.faults.add(
                f"{name}: give it for a T or an L section, leave it out for a rectangle"
            )
        read[name] = reader.take_if_given(name, read_input)
    layers = reader.take("bars", read_bars)
    for name, table in (
        ("stirrup", STIRRUP_BENDS),
        ("density", DENSITY_FACTORS),
    ):
        reader.take(name, row_of, table)
    grade = reader.take("grade", read_grade)
    check_density({**read, "density": density}, given, reader.faults)
    reader.smaller("b_w", "b_f", read)
    reader.smaller("h_f", "h", read)
    reader.smaller("cover", "h_f", read)
    reader.faults.raise_if_any()
    return _start(sheet, section, layers, stirrup, pair, read, density, grade)


def _start(
    sheet: Sheet,
    shape: Shape,
    layers: BarLayers,
    stirrup: str,
    pair: CodePair,
    read: dict[str, Any],
    density: str,
    grade: str,
) -> SectionStudy:
    prepare(sheet, pair)
    sheet.member = f"section study, {shape} section"
    sheet.scope = SCOPE
    sheet.not_covered = [dict(row) for row in NOT_COVERED]
    sheet.expect(_CALLS)
    symbols = {"cover": "c_c", "aggregate": "a_max"}
    with sheet.part(GIVEN, "Given"):
        for name in ("b_f", "h_f", "b_w", "h", "f_c", "gamma_c", "cover", "aggregate"):
            if read[name] is not None:
                sheet.given(symbols.get(name, name), read[name])
    record_materials(sheet, density, grade, pair)
    return SectionStudy(sheet, shape, layers, stirrup, pair)
