"""What the cases come to: tables of agreement, mean and scatter of the tests, the figure."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from decimal import Decimal
from typing import Any

from lineproof.beams.validation.case_steps import words_in
from lineproof.beams.validation.data import Case, Published, cases, shown
from lineproof.beams.validation.figure import RatioPoint, ratio_figure
from lineproof.beams.validation.flexure_cases import FLEXURE_CASES
from lineproof.beams.validation.frame_cases import FRAME_CASES
from lineproof.beams.validation.notation import PUBLISHED
from lineproof.beams.validation.section_cases import SECTION_CASES
from lineproof.beams.validation.strength_tests import WITH, WITHOUT
from lineproof.drawing import to_json
from lineproof.quantity.digits import digits_in
from lineproof.record import Entry
from lineproof.record.printing import in_unit
from lineproof.sheet import Sheet

AGREEMENT, TESTS = "agreement", "tests"
BENDING = ("T1", "T2", "T3")
_GROUPS = (
    ("all", WITHOUT + WITH, "all twelve beams in shear"),
    ("pl", WITHOUT, "beams without stirrups"),
    ("st", WITH, "beams with stirrups"),
    ("M", BENDING, "bending tests"),
)
_COLUMNS = ["Case", "Quantity", "Published", "Predicted", "Ratio", "Source", "Basis"]
_WIDTHS = (12.0, 52.0, 25.0, 26.0, 14.0, 23.0, 22.0)
_SOURCE_COLUMNS = ["Short", "Source", "Cases", "Basis"]
_SOURCE_WIDTHS = (24.0, 84.0, 38.0, 28.0)
_ONE_MORE = 1


def record_agreement(sheet: Sheet) -> None:
    """Record the table of every published value that a prediction must meet."""
    with sheet.part(AGREEMENT, "Predicted against published"):
        rows, on = [], []
        for name in (*FLEXURE_CASES, *SECTION_CASES, *FRAME_CASES):
            case = cases()[name]
            entries = sheet.entries_of(case.key)
            for symbol, published in case.published.items():
                meaning = sheet.notation[symbol].meaning
                rows.append(_row(case, published, entries[symbol], meaning))
                on += [entries[symbol], entries[f"{symbol}{PUBLISHED}"]]
        sheet.table(
            "agreement", _COLUMNS, rows, title=f"Predicted against published: {len(rows)} values",
            rests_on=on, widths=_WIDTHS, front=5,
        )  # fmt: skip
        sheet.table(
            "sources", _SOURCE_COLUMNS, _sources(), title="Sources", widths=_SOURCE_WIDTHS, front=6
        )


def _sources() -> list[list[str]]:
    """Return a row for each source: the cases it holds, how it is called, what it is."""
    held: dict[tuple[str, str, str], list[str]] = {}
    for case in cases().values():
        held.setdefault((case.short, case.source, case.basis), []).append(case.id)
    return [[short, source, ", ".join(ids), basis] for (short, source, basis), ids in held.items()]


def _row(case: Case, published: Published, predicted: Entry, quantity: str) -> list[str]:
    number, unit = published.number, published.unit
    value = in_unit(predicted.value, unit, min(digits_in(number) + _ONE_MORE, 8))
    ratio = Decimal(value) / Decimal(number)
    return [
        case.id, quantity, published.shown, shown(value, unit),
        f"{ratio:.4f}", case.short, case.basis,
    ]  # fmt: skip


def record_tests(sheet: Sheet) -> None:
    """Record mean and scatter of test over prediction, the table of the tests and the figure."""
    with sheet.part(TESTS, "Test over prediction"):
        for group, names, what in _GROUPS:
            _record_statistics(sheet, group, names, what)
        _record_scatter(sheet)
        _record_table(sheet)
        _record_figure(sheet)


def _ratio(sheet: Sheet, name: str) -> Entry:
    part = f"case-c4-{name[1]}" if name in BENDING else f"case-g2-{name.lower()}"
    return sheet.entry(f"{part}/r_{name}")


def _record_statistics(sheet: Sheet, group: str, names: Sequence[str], what: str) -> None:
    """Record the mean and the coefficient of variation (of a sample) of a group of ratios."""
    ratios = {f"r_{name}": _ratio(sheet, name) for name in names}
    made = _line(sheet, f"s_{group} = {' + '.join(ratios)}", f"Sum, {what}", ratios)
    made |= _line(sheet, f"m_{group} = s_{group}/{len(names)}", f"Mean, {what}", made)
    squares = " + ".join(f"({name} - m_{group})**2" for name in ratios)
    made |= _line(
        sheet, f"q_{group} = {squares}", f"Sum of the squared differences, {what}", ratios | made
    )
    _line(
        sheet, f"v_{group} = sqrt(q_{group}/{len(names) - 1})/m_{group}",
        f"Coefficient of variation, {what}", made,
    )  # fmt: skip


def _line(sheet: Sheet, text: str, title: str, bound: Mapping[str, Entry]) -> dict[str, Entry]:
    """Record a line of plain numbers from the entries it names."""
    symbol, _, right = text.partition(" = ")
    used: dict[str, Any] = {name: entry for name, entry in bound.items() if name in words_in(right)}
    return {symbol: sheet.line(text, unit="", title=title, **used)}


def _record_scatter(sheet: Sheet) -> None:
    """Record the table of means and scatter."""
    columns = ["Test over prediction", "Tests", "Mean", "Coefficient of variation"]
    rows, on = [], []
    for group, names, what in _GROUPS:
        mean, scatter = (sheet.entry(f"{TESTS}/{letter}_{group}") for letter in "mv")
        rows.append([what, str(len(names)), f"{mean.value:.3f}", in_unit(scatter.value, "", 3)])
        on += [mean, scatter]
    sheet.table("scatter", columns, rows, title="Mean and scatter", rests_on=on, front=2)


def _record_table(sheet: Sheet) -> None:
    columns = ["Beam", "V_n, kN", "V_m, kN", "V_p, kN", "V_te, kN", "Ratio"]
    rows, on = [], []
    for name in WITHOUT + WITH:
        entries = sheet.entries_of(f"case-g2-{name.lower()}")
        made = [entries[symbol] for symbol in ("V_n", "V_m", "V_p", "V_te", f"r_{name}")]
        *shears, ratio = made
        rows.append([name, *(in_unit(e.value, "kN", 4) for e in shears), f"{ratio.value:.3f}"])
        on += made
    sheet.table(
        "shear-tests", columns, rows, rests_on=on, front=3,
        title="Beams of Vecchio and Shim, from memory: no text with their loads was opened",
    )  # fmt: skip
    columns = ["Pair", "M_r, kN.m", "M_te, kN.m", "Ratio"]
    rows, on = [], []
    for name in BENDING:
        entries = sheet.entries_of(f"case-c4-{name[1]}")
        made = [entries[symbol] for symbol in ("M_r", "M_te", f"r_{name}")]
        rows.append(
            [f"C4-{name[1]}", *(in_unit(e.value, "kN.m", 4) for e in made[:2]),
             f"{made[2].value:.3f}"]
        )  # fmt: skip
        on += made
    sheet.table(
        "bending-tests",
        columns,
        rows,
        rests_on=on,
        front=4,
        title="Doubly reinforced beams in bending",
    )


def _record_figure(sheet: Sheet) -> None:
    groups = (
        (WITHOUT, "shear, no stirrups", "pl"), (WITH, "shear, with stirrups", "st"),
        (BENDING, "bending", "M"),
    )  # fmt: skip
    ratios = {name: _ratio(sheet, name) for names, _, _ in groups for name in names}
    points = [
        RatioPoint(f"C4-{name[1]}" if name in BENDING else name, ratios[name].value, title)
        for names, title, _ in groups
        for name in names
    ]
    means = [sheet.entry(f"{TESTS}/m_{group}") for _, _, group in groups]
    figure = ratio_figure(
        points, [(title, m.value) for (_, title, _), m in zip(groups, means, strict=True)]
    )
    sheet.figure(
        "ratios", to_json(figure), title=figure.caption, alt=figure.alt,
        rests_on=[*ratios.values(), *means], front=1,
    )  # fmt: skip
