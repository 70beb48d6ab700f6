"""Figures of the beam from recorded entries."""

from __future__ import annotations

from lineproof.beams.bars import BarLayers
from lineproof.beams.bottom_bars import COMPRESSION_BARS
from lineproof.beams.figures import (
    BarRow,
    Force,
    MomentLevel,
    SectionShape,
    SkinBars,
    SlabBars,
    StressState,
    capacity_figure,
    section_figure,
    strain_stress_figure,
    stress_strain_figure,
)
from lineproof.beams.flexure import block_of, record_state
from lineproof.beams.inputs import Shape
from lineproof.drawing import Dash, Figure, Runs, symbol, to_json
from lineproof.record import Entry
from lineproof.record.printing import in_unit
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import strain

_CURVE_POINTS = 35
_NOT_YIELDING = (
    "The bars do not all yield: the closed form of the resistance and a figure of it do not apply."
)
LEVER_ARM: Runs = (*symbol("d"), (" − ", "roman"), *symbol("a"), ("/2", "roman"))
LEVER_ARM_FLANGE: Runs = (*symbol("d"), (" − ", "roman"), *symbol("h", "f"), ("/2", "roman"))
LEVER_ARM_BARS: Runs = (*symbol("d"), (" − ", "roman"), *symbol("d", "", "′"))


def section_shape(sheet: Sheet, shape: Shape) -> SectionShape:
    """Return the concrete outline from the recorded sizes [mm]."""
    b_w, h = sheet.find("b_w").value, sheet.find("h").value
    if shape == "rectangular":
        return SectionShape("rectangle", b_w, h)
    return SectionShape(shape, b_w, h, sheet.find("b_f").value, sheet.find("h_f").value)


def bottom_rows(bars: dict[str, Entry], layers: BarLayers) -> list[BarRow]:
    """Return the rows of bottom bars, outermost first."""
    depths = [bars[name].value for name in ("d_1", "d_2") if name in bars] or [bars["d"].value]
    return [
        BarRow(layer.number, layer.diameter, depth, str(layer))
        for layer, depth in zip(layers, depths, strict=False)
    ]


def record_section_figure(
    sheet: Sheet, shape: Shape, layers: BarLayers, stirrup: str, top: dict[str, Entry]
) -> None:
    """Record the section to scale with its bars inside the open part.

    ``top`` holds the entries of the part on top bars; without bars in it none are drawn.
    """
    bars = sheet.entries_of("bars")
    cover, d_bs = sheet.entry("given/c_c"), bars["d_bs"]
    edge = cover.value + d_bs.value
    counted = _entries(sheet, COMPRESSION_BARS)
    rows, slab, caption = _top_bars(
        sheet, counted or top, edge, "beside" if shape == "L" else "each side"
    )
    skin = _skin_bars(_entries(sheet, "crack-control"), sheet.find("h").value, bars["d"].value)
    figure = section_figure(
        section_shape(sheet, shape),
        d=bars["d"].value,
        cover=cover.value,
        stirrup_diameter=d_bs.value,
        stirrup_label=f"{stirrup} stirrups",
        bottom=bottom_rows(bars, layers),
        top=rows,
        slab=slab,
        skin=skin,
        caption=caption,
    )
    _record(sheet, "section", figure, [cover, *bars.values(), *(counted or top).values()])


def _entries(sheet: Sheet, key: str) -> dict[str, Entry]:
    """Return the entries of a part, none if it has not been recorded."""
    return next((dict(part.entries) for part in sheet.parts if part.key == key), {})


def _top_bars(
    sheet: Sheet, top: dict[str, Entry], edge: float, where: str
) -> tuple[list[BarRow], SlabBars | None, str]:
    """Return compression bars at midspan, or else the bars of the ends, and the caption."""
    number = top.get("n_c", top.get("n_t"))
    if number is None:
        return [], None, "Section at midspan"
    count, diameter, size = round(number.value), top["d_b"].value, top["d_b"].source.row
    depth = edge + diameter / 2
    if "n_c" in top:
        row = BarRow(count, diameter, depth, f"{count}-{size}, compression")
        return [row], None, "Section at midspan"
    beside = round(top["n_o"].value) if "n_o" in top else 0
    label = f"{count}-{size}" + (f" + {beside}-{size} {where}" if beside else "")
    slab = SlabBars(beside, diameter, depth, sheet.find("b_ot").value) if beside else None
    caption = "Section: bottom bars at midspan, top bars at the ends"
    return [BarRow(count, diameter, depth, label)], slab, caption


def _skin_bars(cracks: dict[str, Entry], h: float, d: float) -> SkinBars | None:
    if "n_k" not in cracks:
        return None
    count, size = round(cracks["n_k"].value), cracks["d_bk"].source.row
    return SkinBars(
        count, cracks["d_bk"].value, cracks["d_sk"].value, 2 * (h - d), cracks["h_sk"].value,
        f"{count}-{size} each face",
    )  # fmt: skip


def record_strain_figure(sheet: Sheet, shape: Shape, layers: BarLayers) -> None:
    """Record strains and stresses at the resistance inside the open part."""
    bars, flexure = sheet.entries_of("bars"), sheet.entries_of("flexure")
    if not all(flexure[key] for key in ("yield", "yield-upper") if key in flexure):
        sheet.note("no-strains", _NOT_YIELDING, title="No figure of strains")
        return
    state = record_state(sheet, shape)
    block = block_of(flexure)
    c, d, a, eps_s = flexure["c"].value, bars["d"].value, block.value, state["eps_s"].value
    forces = []
    if "C_s" in state:
        d_p = sheet.entry(f"{COMPRESSION_BARS}/d_p").value
        forces.append(Force(_force_label("C", "s", state["C_s"]), d_p, LEVER_ARM_BARS))
    if "C_f" in state:
        h_f = sheet.find("h_f").value
        forces.append(Force(_force_label("C", "f", state["C_f"]), h_f / 2, LEVER_ARM_FLANGE))
    web_or_all = "w" if "C_w" in state else "c"
    whole = state[f"C_{web_or_all}"]
    forces.append(Force(_force_label("C", web_or_all, whole), a / 2, LEVER_ARM))
    figure = strain_stress_figure(
        section_shape(sheet, shape),
        StressState(d, c, a, sheet.find("eps_cu").value, eps_s, in_unit(eps_s, "", 3)),
        compression=forces,
        tension=Force(_force_label("T", "s", state["T_s"]), d),
        rows=[*bottom_rows(bars, layers), *_compression_row(sheet)],
        edge=sheet.entry("given/c_c").value + bars["d_bs"].value,
    )
    rests_on = [flexure["c"], block, flexure["M_r"], bars["A_s"], bars["d"], *state.values()]
    _record(sheet, "strains", figure, rests_on)


def _compression_row(sheet: Sheet) -> list[BarRow]:
    counted = _entries(sheet, COMPRESSION_BARS)
    if not counted:
        return []
    count, diameter = round(counted["n_c"].value), counted["d_b"].value
    return [BarRow(count, diameter, counted["d_p"].value, "")]


def _force_label(base: str, sub: str, force: Entry) -> Runs:
    return (*symbol(base, sub), (f" = {in_unit(force.value, 'kN', 3)} kN", "roman"))


def record_curve_figure(sheet: Sheet) -> None:
    """Record the parabolic concrete curve of the comparison inside the open part."""
    phi_c, f_c, eps_cu = (sheet.find(name) for name in ("phi_c", "f_c", "eps_cu"))
    peak = strain.PEAK_OF_PARABOLA * phi_c.value * f_c.value
    strains = [eps_cu.value * n / _CURVE_POINTS for n in range(_CURVE_POINTS + 1)]
    points = [(1000 * e, strain.parabola_stress(e, peak, strain.STRAIN_AT_PEAK)) for e in strains]
    figure = stress_strain_figure(
        points,
        peak=(1000 * strain.STRAIN_AT_PEAK, peak),
        peak_label=((f"{in_unit(peak, 'MPa', 3)} MPa", "roman"),),
        caption="Concrete curve of the comparison",
    )
    _record(sheet, "curve", figure, [phi_c, f_c, eps_cu])


def moment_level(M: Entry, sub: str, name: str, dash: Dash) -> MomentLevel:
    """Return a recorded moment as a level of the capacity figure."""
    label = (*symbol("M", sub), (f" = {in_unit(M.value, 'kN.m', 3)} kN·m", "roman"))
    return MomentLevel(M.value / 1e6, label, name, dash)


def record_capacity_figure(
    sheet: Sheet,
    points: list[tuple[float, float]],
    chosen: tuple[float, float],
    label: str,
    levels: list[MomentLevel],
    rests_on: list[Entry],
) -> None:
    """Record the capacity curve inside the open part; moments of the points in N.mm."""
    figure = capacity_figure(
        [(ratio, value / 1e6) for ratio, value in points],
        (chosen[0], chosen[1] / 1e6),
        ((f"{label}: {in_unit(chosen[1], 'kN.m', 3)} kN·m", "roman"),),
        levels,
        caption="Moment resistance against reinforcement, as a share of the balanced reinforcement",
    )
    _record(sheet, "capacity", figure, rests_on)


def _record(sheet: Sheet, key: str, figure: Figure, rests_on: list[Entry]) -> None:
    values = [
        entry
        for entry in rests_on
        if entry.value is not None and not isinstance(entry.value, tuple)
    ]
    sheet.figure(key, to_json(figure), title=figure.caption, alt=figure.alt, rests_on=values)
