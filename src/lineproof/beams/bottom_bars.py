"""Bars in the section: fit within the layer, distance of layers, effective depth."""

from __future__ import annotations

from lineproof.beams.bars import BarLayers, bars_text, in_line, of_one_size, spaced
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import bars, development

BARS = "bars"
COMPRESSION_BARS = "compression-bars"
NOT_IN_LINE = (
    "The bars of the second layer do not all stand in line with those of the first, as A23.1 asks."
)
TWO_SIZES = "The distance between them is taken as if all of a layer had the larger size."


def record_bars(sheet: Sheet, layers: BarLayers, *, stirrup: str, chosen: bool) -> None:
    """Record bottom bars in one or two layers and the effective depth.

    ``chosen`` tells whether the bars were proposed here or given by the designer. Whether they
    fit is the last check of each layer.
    """
    origin = "chosen: few sizes, one layer before two, then least mass" if chosen else "given"
    with sheet.part(BARS, "Bottom bars and effective depth"):
        bars_inside(sheet, layers, stirrup=stirrup, origin=origin)


def bars_inside(sheet: Sheet, layers: BarLayers, *, stirrup: str, origin: str) -> Entry:
    """Record bottom bars inside the open part; return the effective depth.

    Of layers with bars of two sizes only whether they fit, as if all were of the thicker size, and
    the depth of each layer to its thicker bars: area and depth of all have a part of their own.
    """
    text = f"Bottom bars: {bars_text(layers)}, {origin}.{placed(layers)}"
    sheet.note("bars-text", text, title="Bars")
    first = layers[0]
    sheet.lookup("d_bs", bars.BARS, stirrup, "d_b")
    sheet.lookup("r_s", bars.STIRRUP_BENDS, stirrup)
    d_b = sheet.lookup("d_b", bars.BARS, first.size)
    A_b = sheet.lookup("A_b", bars.BARS, first.size)
    n_1 = sheet.given("n_1", str(first.count), source=origin)
    s_min = sheet.line(bars.LEAST_CLEAR)
    s_c = sheet.line(bars.CLEAR, n_b=for_distance(sheet, "n_b", first.count, n_1))
    sheet.check(bars.FITS)
    if not of_one_size(layers):
        d_1 = sheet.line(bars.DEPTH_FIRST)
        return d_1 if len(layers) == 1 else record_fit_above(sheet, layers, origin, d_b)
    A_s1 = sheet.line(bars.AREA_OF_BARS, symbol="A_s1" if len(layers) > 1 else "", n_b=n_1)
    if len(layers) == 1:
        return sheet.line(bars.DEPTH_ONE_LAYER)
    d_1 = sheet.line(bars.DEPTH_FIRST)
    return _record_second_layer(sheet, layers, origin, (d_b, A_b, s_min, s_c, A_s1, d_1))


def placed(layers: BarLayers) -> str:
    """Say how bars of two sizes are taken, and that given bars do not stand in line."""
    said = [] if of_one_size(layers) else [TWO_SIZES]
    if not in_line(layers[0].count, layers[-1].count):
        said.append(NOT_IN_LINE)
    return "".join(f" {text}" for text in said)


def for_distance(sheet: Sheet, symbol: str, number: int, given: Entry) -> Entry:
    """Return the number of bars that their clear distance rests on; one bar stands as of two."""
    if spaced(number) == number:
        return given
    return sheet.given(symbol, str(spaced(number)), source="one bar: distance as of two")


def _record_second_layer(
    sheet: Sheet, layers: BarLayers, origin: str, first: tuple[Entry, ...]
) -> Entry:
    record_fit_above(sheet, layers, origin, first[0])
    made = sheet.part_entries
    sheet.line(bars.AREA_OF_BARS, symbol="A_s2", n_b=made["n_2"], A_b=made["A_b2"])
    sheet.line(bars.TOTAL_AREA)
    return sheet.line(bars.DEPTH_TWO_LAYERS)


def record_fit_above(sheet: Sheet, layers: BarLayers, origin: str, d_b: Entry) -> Entry:
    """Record that a second layer fits, over bars of diameter d_b; return its depth.

    Needs d_1, the depth of the first layer, in the open part.
    """
    second = layers[1]
    d_b2 = sheet.lookup("d_b2", bars.BARS, second.size, "d_b")
    sheet.lookup("A_b2", bars.BARS, second.size, "A_b", title="area of one bar, layer 2")
    n_2 = sheet.given("n_2", str(second.count), source=origin)
    thicker = d_b2 if second.diameter > layers[0].diameter else d_b
    least = sheet.line(bars.LEAST_CLEAR, symbol="s_min2", d_b=d_b2)
    n_b = for_distance(sheet, "n_b2", second.count, n_2)
    clear = sheet.line(bars.CLEAR, symbol="s_c2", n_b=n_b, d_b=d_b2)
    sheet.check(bars.FITS_SECOND, s_min2=least, s_c2=clear)
    sheet.line(bars.LAYER_DISTANCE, d_b=thicker)
    return sheet.line(bars.DEPTH_SECOND)


def record_fit_overhang(steps: Steps, d_b: Entry) -> None:
    """Record that top bars of diameter d_b spread over an overhang stand far enough apart."""
    steps.line(bars.LEAST_CLEAR, symbol="s_mino", d_b=d_b)
    steps.line(development.CLEAR_OVERHANG, symbol="s_co", d_b=d_b)
    steps.check(bars.FITS_OVERHANG)


def refuse_unfit(sheet: Sheet, layers: BarLayers, name: str, part: str = BARS) -> None:
    """Raise :class:`UserError` if the given bars of a part do not fit into the web."""
    entries = sheet.entries_of(part)
    for key, layer in zip(("bars-fit", "bars-fit-2"), layers, strict=False):
        check = entries[key]
        if not check:
            least, clear = check.value
            width = sheet.entry("given/b_w").value
            two = "two layers such as '4-25M / 2-25M', " if part == BARS else ""
            raise UserError(
                f"{name}: {bars_text(layers)!r}: {layer} do not fit into a web of {width:g} mm "
                f"(clear distance {clear:.0f} mm, at least {least:.0f} mm); write fewer or larger "
                f"bars, {two}or a wider web"
            )
