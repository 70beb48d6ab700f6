"""The coefficients of 9.3.3 beside the analysis, as a cross-check where they apply."""

from __future__ import annotations

from lineproof.beams.analysis.coefficients import CrossCheck, End, Row, cross_check
from lineproof.beams.continuous.model import Model
from lineproof.record.printing import in_unit
from lineproof.standards.nbc.combinations import CASES

COEFFICIENTS = "coefficients"
_ENDS: dict[str, End] = {"girder": "spandrel", "column": "column", "wall": "unrestrained"}
_COLUMNS = [
    "Span", "Place", "Coefficient", "M, by coefficient, kN.m", "M, by analysis, kN.m", "Ratio",
]  # fmt: skip


def record_coefficients(model: Model) -> None:
    """Record moments by the approximate coefficients beside the analysis, or why they do not apply.

    For information: no check rests on them.
    """
    checked = _cross_check(model)
    with model.sheet.part(COEFFICIENTS, "Approximate coefficients beside the analysis"):
        if checked.failed:
            reasons = "; ".join(checked.failed)
            model.sheet.note(
                "not-applicable", f"The coefficients of 9.3.3 do not apply: {reasons}.",
                title="For information", clause="9.3.3", basis="from memory",
            )  # fmt: skip
            return
        model.sheet.note(
            "coefficients-text",
            "Moments by the approximate coefficients, of the clear spans, beside the analysis with "
            "live load on the spans that are worst. They are a cross-check only; at an end support "
            "the coefficient counts on a restraint that the analysis may not.",
            title="For information", clause="9.3.3", basis="from memory",
        )  # fmt: skip
        rows = [_cells(row) for row in checked.rows if row.what != "shear"]
        model.sheet.table("coefficients", _COLUMNS, rows, title="Moments by coefficients")


def _cross_check(model: Model) -> CrossCheck:
    if model.inputs.redistribution:
        return CrossCheck(("they are not for redistributed moments",), ())
    live = CASES[1]
    factors = {"D": float(live.dead[0]), "L": 1.5, "L_st": 1.5, "S": 1.0}
    return cross_check(model.forces.solved, model.forces.loads, factors, _ends(model))


def _ends(model: Model) -> tuple[End, End]:
    first, last = model.inputs.supports[0].carrier, model.inputs.supports[-1].carrier
    return _ENDS.get(first, "unrestrained"), _ENDS.get(last, "unrestrained")


def _cells(row: Row) -> list[str]:
    place = {"positive": "in the span"}.get(row.what, str(row.place))
    return [
        str(row.span), place, row.coefficient, in_unit(row.by_coefficient, "kN.m", 3),
        in_unit(row.by_analysis, "kN.m", 3), f"{row.ratio:.2f}",
    ]  # fmt: skip
