"""The load that imported forces carry on every span, beside that of the load take-down."""

from __future__ import annotations

import math

from lineproof.beams.analysis.arrangements import Combination, LoadCase, factored_combinations
from lineproof.beams.continuous.imported_case import printed, typed
from lineproof.beams.continuous.imported_forces import ImportedForces
from lineproof.beams.continuous.model import Model, SingleLoad
from lineproof.beams.continuous.symbols import notation, numbered, stated, stated_check
from lineproof.errors import FaultList

_COLUMNS = ["Span", "File, kN", "Case", "Load take-down, kN", "Combination", "Ratio"]
_TAKE_DOWN = (
    "The load of a case on a span is the change of V from its left to its right end. A file of "
    "this beam carries what its take-down asks for; a tenth is left for loads that the frame "
    "analysis takes more closely. A ratio far above 1 asks for a reason as well."
)
_MOST = 50.0
"""Ratio of a file's load to that of the take-down from which on its units are taken for wrong."""
_LEAST = 0.9
"""Part of the load take-down that a file must carry on every span at least, in its largest case."""


def record_take_down(model: Model, forces: ImportedForces) -> None:
    """Record the load on each span by the file, and that it is not below that of the take-down.

    Raises :class:`UserError` where it is so far above that the file must be of other units.
    """
    _refuse_other_units(model, forces)
    rows = []
    for span in range(1, model.spans + 1):
        load, case = _largest_of_file(forces, span)
        most, combination = _largest(model, span)
        ours = _record_load(model, span, combination, most)
        model.sheet.given(f"W_f{span}", typed(load, "kN"), source=f"{forces.source.name}, {case}")
        _check_load(model, span)
        rows.append([
            str(span), printed(load, "kN"), str(case), printed(ours, "kN"), combination.name,
            f"{load / ours:.2f}" if ours > 0 else "–",
        ])  # fmt: skip
    model.sheet.table(
        "imported-loads", _COLUMNS, rows,
        title="Largest load on each span, by the file and by the load take-down",
    )  # fmt: skip
    model.sheet.note("imported-loads-text", _TAKE_DOWN, title="Loads of the file")


def _refuse_other_units(model: Model, forces: ImportedForces) -> None:
    faults = FaultList()
    for span in range(1, model.spans + 1):
        (load, case), (most, combination) = _largest_of_file(forces, span), _largest(model, span)
        if 0 < _MOST * most < load:
            faults.add(
                f"forces_csv: span {span}: the load of {case} is {printed(load, 'kN')} kN, "
                f"{load / most:.0f} times the {printed(most, 'kN')} kN of the load take-down "
                f"({combination.name}); name the units of the file in its header, such as "
                "'M (N.m)' and 'V (N)', or write M in kN.m and V in kN"
            )
    faults.raise_if_any()


def _largest_of_file(forces: ImportedForces, span: int) -> tuple[float, LoadCase]:
    """Return the largest load of the file on a span [N], what V falls by along it, and its case."""
    V, pieces = forces.source.imported.envelope.V, forces.pieces[span - 1]
    loads = V[:, pieces[0].i] - V[:, pieces[-1].j]
    row = int(loads.argmax())
    return float(loads[row]), forces.cases[row]


def _largest(model: Model, span: int) -> tuple[float, Combination]:
    """Return the largest factored load on a span by the load take-down, and its combination."""
    total: dict[str, float] = {}
    for (kind, k), entry in model.uniform.items():
        if k == span:
            total[kind] = entry.value * model.lengths[span - 1].value
    for load in model.on_span(span):
        total[load.kind] = total.get(load.kind, 0.0) + load.total
    sums = [
        (sum(factor * total.get(kind, 0.0) for kind, factor in combination.factors), combination)
        for combination in factored_combinations(total)
    ]
    return max(sums, key=lambda each: each[0])


def _record_load(model: Model, span: int, combination: Combination, chosen: float) -> float:
    """Record and return the load of a combination on a span, ``chosen`` as the largest [N]."""
    what = f"largest load on span {span}"
    made = numbered(f"W_f{span}", "W", f"f{span}", f"{what}, by the file")
    taken = numbered(f"W_d{span}", "W", f"d{span}", f"{what}, by the load take-down")
    model.sheet.notation = model.sheet.notation | notation((made, taken))
    terms = []
    for kind, factor in combination.factors:
        uniform = model.uniform.get((kind, span))
        whole = [] if uniform is None else [f"{uniform.symbol}*l_{span}"]
        single = [_load_of(load) for load in model.on_span(span) if load.kind == kind]
        terms += [f"{factor:g}*{each}" for each in (*whole, *single)]
    line = stated(
        f"W_d{span} = {' + '.join(terms)}", clause="NBC 4.1.3.2",
        title=f"Largest load on span {span} by the load take-down: {combination.name}",
    )  # fmt: skip
    load: float = model.sheet.line(line).value
    if not math.isclose(load, chosen, rel_tol=1e-9, abs_tol=1e-3):
        msg = f"span {span}: {load!r} on the sheet, {chosen!r} in the choice of {combination.name}"
        raise AssertionError(msg)
    return load


def _load_of(load: SingleLoad) -> str:
    """Return the whole of a single load as a term."""
    n = load.number
    return load.name if load.start is None else f"{load.name}*(e_x{n} - s_x{n})"


def _check_load(model: Model, span: int) -> None:
    """Record that the largest load of the file on a span is that of the take-down, or nearly."""
    model.sheet.check(
        stated_check(
            f"{_LEAST}*W_d{span} <= W_f{span}", "kN", key=f"imported-load-{span}",
            title=f"Load of the file on span {span} against the load take-down",
            yes="The file carries the load of the take-down, or nearly.",
            no="The file does NOT carry the load of the take-down: its loads are not factored, or "
            "of another beam, or a combination is left out.",
        )
    )  # fmt: skip
