"""Published cases of continuous beams: K1 to K4, K8, K12, N1, N2."""

from __future__ import annotations

from collections.abc import Mapping
from functools import partial

from lineproof.beams.validation import procedures as found
from lineproof.beams.validation.case_steps import CaseSteps, Predict
from lineproof.beams.validation.notation import notation_for
from lineproof.formula import Criterion, criterion
from lineproof.record import Procedure
from lineproof.sheet.finding import Wanted
from lineproof.standards.a23_3 import analysis
from lineproof.standards.references import MECHANICS

_THREE = 3
_ROWS = (
    "positive, end span, unrestrained end",
    "positive, end span, end built in",
    "positive, interior span",
    "negative, first interior support, two spans",
    "negative, first interior support, three spans or more",
    "negative, other interior supports",
    "negative, exterior support on a spandrel",
    "negative, exterior support on a column",
)
_criterion = partial(
    criterion, clause="statics", basis=MECHANICS, system="kN-m", notation=notation_for(frozenset())
)


# -- equal spans ----------------------------------------------------------------------------------


def _equal_spans(steps: CaseSteps, spans: int) -> None:
    _support_moments(steps, spans)
    for kind, made in _VALUES.items():
        for symbol in steps.case.published:
            if symbol[:-1] == kind:
                number = int(symbol[-1])
                steps.find(
                    symbol, made, _closing(kind, number, spans),
                    settings={"spans": spans, "number": number},
                )  # fmt: skip


def _support_moments(steps: CaseSteps, spans: int) -> None:
    """Record all support moments together: the three-moment equations close them."""
    args = {name: steps.place[name] for name in found.SUPPORT_MOMENT.names or ()}
    wanted = [
        Wanted(
            f"M_s{number}", _three_moments(number, spans), "kN.m", args,
            {"spans": spans, "number": number}, f"Moment over interior support {number}",
            "statics", bound=args,
        )
        for number in range(1, spans)
    ]  # fmt: skip
    steps.bind(**steps.sheet.found_set(found.SUPPORT_MOMENT, wanted))


def _end(number: int, spans: int) -> str:
    """Return the moment over a support as a term; nothing at the ends of the beam."""
    return f"M_s{number}" if 0 < number < spans else ""


def _three_moments(number: int, spans: int) -> Criterion:
    terms = (_end(number - 1, spans), f"4*M_s{number}", _end(number + 1, spans), "w*l**2/2")
    return _criterion(
        f"abs({' + '.join(filter(None, terms))}) <= 0.0001*w*l**2",
        unit="kN.m",
        title=f"Three-moment equation of interior support {number}, over the span",
        yes="The slope is the same on both sides of the support.",
        key=f"three-moments-{number}",
    )


def _closing(kind: str, number: int, spans: int) -> Criterion:
    """Return what closes a value of a span by statics from its support moments."""
    left, right = _end(number - 1, spans), _end(number, spans)
    fall = f"({right or '0'} - {left})/l" if left else f"{right}/l"
    start = f"{left} + " if left else ""
    text, unit = {
        "V_l": (f"abs(V_l{number} - (w*l/2 + {fall})) <= 0.0001*w*l", "kN"),
        "V_r": (f"abs(V_r{number} - (w*l/2 - {fall})) <= 0.0001*w*l", "kN"),
        "x_m": (f"abs(x_m{number} - V_l{number}/w) <= 0.0001*l", "m"),
        "M_x": (
            f"abs(M_x{number} - ({start}V_l{number}**2/(2*w))) <= 0.0001*w*l**2", "kN.m"
        ),
        "x_i": (
            f"abs({start}V_l{number}*x_i{number} - w*x_i{number}**2/2) <= 0.0001*w*l**2", "kN.m"
        ),
    }[kind]  # fmt: skip
    return _criterion(
        text, unit=unit, title=_CLOSED[kind],
        yes="Statics of the span gives the same.", key="statics",
    )  # fmt: skip


_VALUES: dict[str, Procedure] = {
    "V_l": found.SHEAR_LEFT, "V_r": found.SHEAR_RIGHT, "x_m": found.PLACE,
    "M_x": found.SPAN_MOMENT, "x_i": found.NO_MOMENT,
}  # fmt: skip
"""The values of a span, those that close others first."""
_CLOSED = {
    "V_l": "Statics: half the load, and the fall of the support moments over the span",
    "V_r": "Statics: half the load, less the fall of the support moments over the span",
    "x_m": "Statics: the shear is nought where the moment is largest",
    "M_x": "Statics: the moment where the shear is nought",
    "x_i": "Statics: the moment is nought at this place",
}


def _n1(steps: CaseSteps) -> None:
    _support_moments(steps, _THREE)
    for symbol, number, text in (
        ("R_1", 1, "abs(R_1 - (w*l/2 + M_s1/l)) <= 0.0001*w*l"),
        ("R_2", 2, "abs(2*R_1 + 2*R_2 - 3*w*l) <= 0.0001*w*l"),
    ):
        steps.find(
            symbol, found.REACTION, _statics(text), settings={"spans": _THREE, "number": number}
        )


def _statics(text: str, title: str = "Equilibrium", unit: str = "kN") -> Criterion:
    return _criterion(
        text, unit=unit, title=title,
        yes="The value is confirmed by statics.", key="statics",
    )  # fmt: skip


# -- other beams --------------------------------------------------------------------------------


def _k8(steps: CaseSteps) -> None:
    steps.find(
        "M_s1", found.TWO_SPANS_MOMENT,
        _statics(
            "abs(4*M_s1 + 3*P*l/8 + w*l**2/4) <= 0.0001*w*l**2",
            "Three-moment equation of the middle support, over the span", "kN.m",
        ),
    )  # fmt: skip
    for number, (symbol, text) in enumerate(
        (
            ("R_A", "abs(R_A - (P/2 + M_s1/l)) <= 0.0001*P"),
            ("R_B", "abs(R_B - (P/2 + w*l/2 - 2*M_s1/l)) <= 0.0001*P"),
            ("R_C", "abs(R_C - (w*l/2 + M_s1/l)) <= 0.0001*P"),
        ),
        start=1,
    ):
        steps.find(symbol, found.TWO_SPANS_REACTION, _statics(text), settings={"number": number})


def _n2(steps: CaseSteps) -> None:
    steps.find(
        "R_2", found.PARTIAL_REACTION,
        _statics(
            "abs(R_2*l - w*(x_p2 - x_p1)*(x_p1 + x_p2)/2) <= 0.0001*w*l**2",
            "Moments about the left support", "kN.m",
        ),
        settings={"number": 2},
    )  # fmt: skip
    steps.find(
        "R_1", found.PARTIAL_REACTION, _statics("abs(R_1 + R_2 - w*(x_p2 - x_p1)) <= 0.0001*w*l"),
        settings={"number": 1},
    )  # fmt: skip
    steps.find(
        "theta_0", found.PARTIAL_SLOPE,
        _statics(
            "abs(theta_0 - (R_1*l**2/6 - w*((l - x_p1)**4 - (l - x_p2)**4)/(24*l))/(E_c*I_k))"
            " <= 0.0001*theta_0",
            "No deflection at the right support", "",
        ),
    )  # fmt: skip


def _k12(steps: CaseSteps) -> None:
    for number, row in enumerate(_ROWS, start=1):
        steps.lookup(f"k_M{number}", analysis.MOMENT_DIVISORS, row, "k_M", title=row)
    for number, row in enumerate(analysis.SHEAR_FACTORS.rows, start=1):
        steps.lookup(f"k_V{number}", analysis.SHEAR_FACTORS, row, "k_V", title=row)


FRAME_CASES: Mapping[str, Predict] = {
    "K1": partial(_equal_spans, spans=2),
    "K2": partial(_equal_spans, spans=3),
    "K3": partial(_equal_spans, spans=4),
    "K4": partial(_equal_spans, spans=5),
    "K8": _k8,
    "N1": _n1,
    "N2": _n2,
    "K12": _k12,
}
"""How every case is predicted, by its id."""
