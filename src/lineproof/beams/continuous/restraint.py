"""Moment at an end support that is analysed as simple but cast with what carries the beam.

The restraint that exists is assumed by the coefficients of 9.3.3 for an exterior support: 1/24 of
w l^2 with a girder (a spandrel), 1/16 with a column. On a wall the beam rests freely.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping

import numpy as np

from lineproof.beams.continuous.case_forces import FACTORED, SPECIFIED, Names, factor_text
from lineproof.beams.continuous.groups import named
from lineproof.beams.continuous.imported_restraint import record_load_terms, span_loads
from lineproof.beams.continuous.model import Model
from lineproof.beams.continuous.symbols import code, stated
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.record import Entry
from lineproof.standards.nbc import loads

SHARES: Mapping[str, float] = {"girder": 24.0, "column": 16.0}
_FORMULAS = {"girder": loads.MOMENT_END_GIRDER, "column": loads.MOMENT_END_COLUMN}
_TEXT = (
    "The beam is analysed as simply supported here but cast with a {carrier} that restrains its "
    "end; the restraint is assumed by the coefficient of clause 9.3.3 for an exterior support."
)
_TEXT_IMPORTED = (
    "The beam is cast with a {carrier} that restrains its end. The frame analysis gives no larger "
    "moment here than the coefficient of clause 9.3.3 for an exterior support, which is taken."
)


def left_out(supports: Iterable[int]) -> str:
    """Say of envelopes that the moment of restraint at these supports is not among them."""
    numbers = sorted(supports)
    many = "s" * (len(numbers) > 1)
    return (
        f"The moment of restraint at support{many} {' and '.join(map(str, numbers))} is of no load "
        "case and is left out here; the part of that face has it with its resistance."
    )


def worst_case(model: Model, span: int) -> tuple[float, int]:
    """Return the largest load on a span [N/mm], single loads smeared, and the row of its case."""
    if model.imported is not None:
        loads = span_loads(model.imported, span)
        row = int(loads.argmax())
        return float(loads[row]), row
    sizes = _loads(model, span)
    row = max(range(len(sizes)), key=lambda n: (round(sizes[n], 9), -n))
    return sizes[row], row


def _loads(model: Model, span: int) -> list[float]:
    """Return the load of every case on a span [N/mm], single loads smeared."""
    length = model.lengths[span - 1].value
    forces = model.forces
    columns = zip(forces.solution.rows, forces.factors.T, strict=True)
    factors = {kind: column for (kind, k), column in columns if k == span}
    total = np.zeros(len(forces.cases))
    for kind, column in factors.items():
        if (kind, span) in model.uniform:
            total += column * model.uniform[kind, span].value
    for load in model.on_span(span):
        if load.kind in factors:
            total += 2 * factors[load.kind] * load.total / length
    made: list[float] = total.tolist()
    return made


def _factors(model: Model, span: int, row: int) -> dict[str, float]:
    """Return the load factors of a case on a span, by load type."""
    return {kind: f for (kind, k), f in model.forces.factors_of(row).items() if k == span}


def restraint_moment(model: Model, support: int, span: int) -> float:
    """Return the moment of restraint [N.mm]; zero where the beam rests freely."""
    share = SHARES.get(model.inputs.supports[support - 1].carrier)
    if share is None:
        return 0.0
    w_f, _ = worst_case(model, span)
    length: float = model.lengths[span - 1].value
    return w_f * length * length / share


def held_in_frame(model: Model, support: int, span: int) -> bool:
    """Tell whether an imported frame analysis gives an end a larger moment than the restraint."""
    if model.imported is None:
        return False
    hogging = -model.imported.hog(support, "right" if span == support else "left").M
    return hogging > restraint_moment(model, support, span)


def record_restraint(steps: Steps, model: Model, support: int, span: int) -> None:
    """Record the load and the moment of restraint inside the open part; bind M_f."""
    sheet = model.sheet
    carrier = model.inputs.supports[support - 1].carrier
    text = _TEXT if model.imported is None else _TEXT_IMPORTED
    sheet.note("restraint", text.format(carrier=carrier), title="Restraint", basis=COMMON_PRACTICE)
    _record_moment(steps, model, support, span, FACTORED)


def record_specified_restraint(steps: Steps, model: Model, support: int, span: int) -> None:
    """Record inside the open part M_s of the same restraint, ``model`` under specified loads."""
    _record_moment(steps, model, support, span, SPECIFIED)


def _record_moment(steps: Steps, model: Model, support: int, span: int, of: Names) -> None:
    _, row = worst_case(model, span)
    case = str(model.forces.cases[row])
    terms, bound = _terms(model, span, row)
    bound["l"] = model.lengths[span - 1]
    text = f"{of.w} = {' + '.join(terms)}"
    smeared = ", single loads smeared" if model.on_span(span) else ""
    load = model.sheet.line(
        stated(text), title=f"Load on span {span}{smeared}: {case}", **named(bound, text)
    )
    steps.bind(**{of.w: load, "l": model.lengths[span - 1]})
    formula = _FORMULAS[model.inputs.supports[support - 1].carrier]
    if of is FACTORED:
        steps.line(formula)
        return
    title = f"{formula.title}, specified loads"
    made = model.sheet.line(formula, symbol=of.M, title=title, w_f=load, l=steps.entry("l"))
    steps.bind(**{of.M: made})


def _terms(model: Model, span: int, row: int) -> tuple[list[str], dict[str, Entry]]:
    if model.imported is not None:
        return record_load_terms(model.sheet, model.imported, span, row)
    factors = _factors(model, span, row)
    terms, bound = [], {}
    for kind, factor in factors.items():
        if (kind, span) in model.uniform:
            name = f"w_{code(kind)}{span}"
            bound[name] = model.uniform[kind, span]
            terms.append(f"{factor_text(factor)}*{name}")
    for load in model.on_span(span):
        if load.kind in factors:
            n, times = load.number, factor_text(factors[load.kind])
            bound |= load.entries
            size = f"P_x{n}" if load.at is not None else f"w_x{n}*(e_x{n} - s_x{n})"
            terms.append(f"2*{times}*{size}/l")
    return terms, bound
