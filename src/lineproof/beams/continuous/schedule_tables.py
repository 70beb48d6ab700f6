"""The schedule and the quantities as printed tables: columns and rows of text."""

from __future__ import annotations

from dataclasses import dataclass

from lineproof.beams.continuous.bending import BentShape
from lineproof.beams.continuous.layout import StirrupZone
from lineproof.beams.continuous.quantities import Quantities
from lineproof.beams.continuous.schedule import BarItem, Schedule

DASH = "–"
STIRRUP_NOTE = (
    "First and last stirrup are measured from the left end of the clear length of the span (the "
    "right face of its left support, or the free end); ties around hooks within an end support lie "
    "outside that length and are no hanger stirrups. Sizes are outside to outside, width × "
    "height; open stirrups have 90° hooks turned inward, closed ones 135° hooks at one corner."
)


@dataclass(frozen=True, slots=True)
class PrintedTable:
    """What ``sheet.table`` prints: title, columns and rows of text."""

    title: str
    columns: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]


def bar_table(bars: Schedule, *, coated: bool = False) -> PrintedTable:
    """Return the bar schedule, its total mass in the last row, which names ``coated`` bars."""
    columns = (
        "Mark", "Size", "Number", "Cut length, mm", "Shape", "Code", "Legs, mm", "For",
        "kg each", "kg",
    )  # fmt: skip
    rows = [_bar_row(item) for item in bars.items]
    kind = "all coated with epoxy" if coated else ""
    rows.append(("Total", "", "", "", kind, *[""] * (len(columns) - 6), f"{bars.mass:.1f}"))
    return PrintedTable("Bar schedule", columns, tuple(rows))


def _bar_row(item: BarItem) -> tuple[str, ...]:
    shape = item.shape
    return (
        item.mark, item.size, str(item.number), f"{shape.cut:.0f}", shape.words,
        shape.code or DASH, shape.legs_text or DASH, "; ".join(item.serves) or DASH,
        f"{shape.mass:.3f}", f"{item.mass:.1f}",
    )  # fmt: skip


def stirrup_table(bars: Schedule) -> PrintedTable:
    """Return the stirrups by span and zone, distances from the left end of the clear length."""
    columns = (
        "Span", "Mark", "Stirrups", "Legs", "Spacing, mm", "Number", "First, mm from left face",
        "Last, mm from left face", "Form", "Outside, mm", "Cut length, mm", "kg",
    )  # fmt: skip
    rows: list[tuple[str, ...]] = []
    for each in bars.sets:
        zone = each.zone
        rows.append((
            str(zone.span), zone.mark, zone.size, str(zone.legs), _spacing(zone),
            str(zone.number), _place(each.first), _place(each.last),
            _form(zone),
            " + ".join(_outside(shape) for shape, _ in each.pieces),
            " + ".join(f"{_times(count)}{shape.cut:.0f}" for shape, count in each.pieces),
            f"{each.mass:.1f}",
        ))  # fmt: skip
    if not rows:
        rows.append((DASH, DASH, "none", *[DASH] * (len(columns) - 3)))
    return PrintedTable("Stirrup schedule", columns, tuple(rows))


def _form(zone: StirrupZone) -> str:
    form = "closed" if zone.closed else "open"
    return f"{form}, ties around hooks" if zone.around_hooks else form


def _times(count: int) -> str:
    return f"{count} × " if count > 1 else ""


def _spacing(zone: StirrupZone) -> str:
    return _place(zone.spacing) if zone.number > 1 else DASH


def _place(distance: float) -> str:
    """Print a distance [mm], half a millimetre too: first, spacings and last add up as printed."""
    return f"{round(distance, 1):.10g}"


def _outside(shape: BentShape) -> str:
    """Width by height of a stirrup; the height of a single leg."""
    sizes = dict(shape.legs)
    match shape.form:
        case "open stirrup":
            return f"{sizes['C']:.0f} × {sizes['B']:.0f}"
        case "closed stirrup":
            return f"{sizes['B']:.0f} × {sizes['A']:.0f}"
        case "single leg":
            return f"{sizes['B']:.0f}"
    return f"{sizes['A']:.0f}"


def quantity_table(amounts: Quantities) -> PrintedTable:
    """Return concrete, formwork and steel with their totals."""
    rows = [
        ("Concrete, stem below the slab between faces", f"{amounts.stem:.2f}", "m³"),
        ("Concrete, stem over the supports", f"{amounts.over_supports:.2f}", "m³"),
        ("Concrete, slab over the web", f"{amounts.slab_over_web:.2f}", "m³"),
        ("Concrete of the beam", f"{amounts.concrete:.2f}", "m³"),
        ("Slab in the effective overhangs (not of the beam)",
         f"{amounts.slab_overhangs:.2f}", "m³"),
        ("Formwork, soffit", f"{amounts.soffit:.1f}", "m²"),
        ("Formwork, sides", f"{amounts.sides:.1f}", "m²"),
        ("Formwork, free ends", f"{amounts.ends:.1f}", "m²"),
        ("Formwork", f"{amounts.formwork:.1f}", "m²"),
        *((f"Steel {size}", f"{mass:.1f}", "kg") for size, mass in amounts.steel.items()),
        ("Steel", f"{amounts.mass:.1f}", "kg"),
        ("Steel in the concrete of the beam", f"{amounts.density:.0f}", "kg/m³"),
    ]  # fmt: skip
    return PrintedTable("Quantities", ("Quantity", "Amount", "Unit"), tuple(rows))
