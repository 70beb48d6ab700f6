"""Effective flange, gross section, cracking moments."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Literal

from lineproof.beams.inputs import Shape
from lineproof.formula import Formula
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import bars, flange, minimum

SECTION = "section"
_TITLES = {
    "T": "Effective flange and gross section",
    "L": "Effective flange and gross section",
    "rectangular": "Gross section",
}
SPREAD_AREAS: Mapping[Shape, Formula] = {
    "T": bars.TOP_AREA_T,
    "L": bars.TOP_AREA_L,
    "rectangular": bars.TOP_AREA_RECTANGULAR,
}
"""Area of top bars, those in the overhangs too."""
TENSION_WIDTHS: Mapping[Shape, Formula] = {
    "T": minimum.WIDTH_FLANGE_T,
    "L": minimum.WIDTH_FLANGE_L,
    "rectangular": minimum.WIDTH_WEB,
}
"""Width in tension at the top, by which minimum reinforcement counts."""


def record_section(sheet: Sheet, shape: Shape) -> None:
    """Record the effective width, the gross properties and both cracking moments."""
    with sheet.part(SECTION, _TITLES[shape]):
        if shape != "rectangular":
            _record_flange(sheet, shape)
        record_gross(sheet, shape)


def _record_flange(sheet: Sheet, shape: Literal["T", "L"]) -> None:
    sheet.line(flange.CLEAR_DISTANCE)
    if shape == "T":
        sheet.line(flange.OVERHANG_T_SIMPLE)
        sheet.line(flange.WIDTH_T)
    else:
        sheet.line(flange.OVERHANG_L)
        sheet.line(flange.WIDTH_L)


def record_gross(sheet: Sheet, shape: Shape) -> None:
    """Record gross area, centroid, inertia and cracking moments inside the open part."""
    if shape == "rectangular":
        lines = (flange.AREA_RECTANGLE, flange.CENTROID_RECTANGLE, flange.INERTIA_RECTANGLE)
    else:
        lines = (flange.AREA_TEE, flange.CENTROID_TEE, flange.INERTIA_TEE)
    for line in (*lines, flange.CENTROID_TOP, flange.CRACKING_BOTTOM, flange.CRACKING_TOP):
        sheet.line(line)


def zone_of(shape: Shape) -> str:
    """Return the compression zone of a shape with compression at the top: tee or rectangle."""
    return "rectangle" if shape == "rectangular" else "tee"


def compression_zone(sheet: Sheet, shape: Shape) -> dict[str, Entry]:
    """Return what b, b_w and h_f stand for with compression at the top; a rectangle has no h_f."""
    b_w = sheet.find("b_w")
    if shape == "rectangular":
        return {"b": b_w, "b_w": b_w}
    return {"b": sheet.find("b_f"), "b_w": b_w, "h_f": sheet.find("h_f")}
