"""Values that the validation finds: frame solutions, shear strength, an axis; how they close.

The frame solutions are those of the analysis itself; by hand they are closed by statics and by the
three-moment equation.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from functools import partial
from typing import TYPE_CHECKING

from lineproof.beams.validation.notation import notation_for
from lineproof.formula import Formula, criterion
from lineproof.record import Procedure, procedure
from lineproof.standards.a23_3 import shear, shear_factors, strain
from lineproof.standards.references import MECHANICS

if TYPE_CHECKING:
    from lineproof.beams.analysis.solve import Solution

_criterion = partial(criterion, notation=notation_for(frozenset()), basis=MECHANICS)
_STIFFNESS = 1e12
"""Any constant stiffness [N.mm2]: moments and reactions do not depend on it."""
_HALVINGS = 200

# -- bending ------------------------------------------------------------------------------------


@procedure(
    "neutral axis, displaced concrete neglected", 1, "bisection on equilibrium of layers",
    ("alpha_1", "beta_1", "phi_c", "f_c", "eps_cu", "b", "phi_s", "f_y", "E_s", "A_s", "d",
     "A_sp", "d_p"),
)  # fmt: skip
def _axis_neglecting(*args: float) -> float:
    alpha_1, beta_1, phi_c, f_c, eps_cu, b, phi_s, f_y, E_s, A_s, d, A_sp, d_p = args
    strips = strain.block_strips(strain.Section(b, b, d), alpha_1 * phi_c * f_c, beta_1)
    layers = [strain.Layer(d, A_s), strain.Layer(d_p, A_sp)]
    return strain.neutral_axis(strips, layers, strain.Steel(E_s, f_y, phi_s), eps_cu)


AXIS_NEGLECTING: Procedure = _axis_neglecting
AXIS_NEGLECTING_CLOSES = _criterion(
    "abs(alpha_1*phi_c*f_c*b*beta_1*c + phi_s*A_sp*min(f_y, E_s*eps_cu*(c - d_p)/c)"
    " - phi_s*A_s*f_y) <= 0.001*phi_s*A_s*f_y",
    unit="kN",
    clause="10.1.1",
    title="Equilibrium of the section, displaced concrete neglected",
    yes="Compression and tension balance at this depth.",
    key="equilibrium",
)

# -- shear --------------------------------------------------------------------------------------

_SHEAR = ("b_w", "d_v", "f_c", "phi_c", "lambda_", "E_s", "A_s", "l_v")
_STIRRUPS = ("phi_s", "A_v", "f_yt", "s", "V_rmax")


def _value(formula: Formula, values: Mapping[str, float]) -> float:
    return formula.function(*[values[name] for name in formula.names])


def _balanced(resistance: Callable[[float], float]) -> float:
    """Return the shear that is its own resistance; the resistance falls with the shear."""
    low, high = 0.0, resistance(0.0)
    for _ in range(_HALVINGS):
        middle = (low + high) / 2
        if middle in (low, high):
            break
        low, high = (middle, high) if resistance(middle) > middle else (low, middle)
    return (low + high) / 2


def _strained(values: Mapping[str, float], V_f: float) -> dict[str, float]:
    """Add the strain that a shear causes at d_v from the load."""
    x = {**values, "V_f": V_f, "M_f": V_f * (values["l_v"] - values["d_v"])}
    x["eps_x"] = _value(shear_factors.EPS_X, x)
    return x


@procedure(
    "shear strength, general method, with stirrups", 1,
    "bisection on the shear that is its own resistance", (*_SHEAR, *_STIRRUPS),
)  # fmt: skip
def _strength_with_stirrups(*args: float) -> float:
    values = dict(zip((*_SHEAR, *_STIRRUPS), args, strict=True))
    values["f_y"] = values["f_yt"]

    def resistance(V_f: float) -> float:
        x = _strained(values, V_f)
        for made in (
            shear_factors.BETA_STIRRUPS,
            shear_factors.THETA,
            shear.V_C,
            shear.V_S,
            shear.V_R,
        ):
            x[made.symbol] = _value(made, x)
        return x["V_r"]

    return _balanced(resistance)


@procedure(
    "shear strength, general method, without stirrups", 1,
    "bisection on the shear that is its own resistance", (*_SHEAR, "s_ze"),
)  # fmt: skip
def _strength_without(*args: float) -> float:
    values = dict(zip((*_SHEAR, "s_ze"), args, strict=True))

    def resistance(V_f: float) -> float:
        x = _strained(values, V_f)
        for made in (shear_factors.BETA_GENERAL, shear.V_C):
            x[made.symbol] = _value(made, x)
        return x["V_c"]

    return _balanced(resistance)


STRENGTH: Mapping[bool, Procedure] = {True: _strength_with_stirrups, False: _strength_without}
"""Shear strength by the general method, with stirrups or without."""
BELOW_CRUSHING = _criterion(
    "V_n <= V_rmax",
    clause="11.3.3",
    title="Bound: below the crushing of the web; the lines below confirm the value",
    yes="The shear found lies below the crushing of the web.",
    key="below-crushing",
)
STRENGTH_CLOSES = _criterion(
    "abs(V_r - V_n) <= 0.001*V_n",
    unit="kN",
    clause="11.3.6.4",
    title="Shear found and resistance for the strain that it causes",
    yes="The shear found is the resistance for the strain that it causes.",
    no="The shear found is NOT the resistance for the strain that it causes.",
    key="shear-closes",
    proof=True,
)

# -- frames -------------------------------------------------------------------------------------


def _equal_spans(w: float, l: float, spans: float) -> Solution:
    from lineproof.beams.analysis.model import SIMPLE, Beam, Span, UniformLoad  # noqa: PLC0415
    from lineproof.beams.analysis.solve import solve  # noqa: PLC0415 - numpy, 0.1 s

    count = round(spans)
    beam = Beam((Span(l, _STIFFNESS),) * count, (SIMPLE,) * (count + 1))
    return solve(beam, [UniformLoad("D", n, w) for n in range(1, count + 1)]).total()


def _of_equal_spans(name: str, title: str, value: Callable[[Solution, int], float]) -> Procedure:
    """Register a value of equal spans under one uniform load; settings: spans, number."""

    def function(w: float, l: float, *, spans: float, number: float) -> float:
        return float(value(_equal_spans(w, l, spans), round(number)))

    return procedure(f"equal spans, {name}", 1, f"direct stiffness; {title}", ("w", "l"))(function)


SUPPORT_MOMENT = _of_equal_spans(
    "support moment", "moment over an interior support", lambda s, n: s.span(n).end_moment[0]
)
SPAN_MOMENT = _of_equal_spans(
    "span moment", "largest moment in a span", lambda s, n: s.span(n).moment_extremes().largest[0]
)
PLACE = _of_equal_spans(
    "place of the span moment", "place of the largest moment in a span",
    lambda s, n: s.span(n).moment_extremes().x_largest[0],
)  # fmt: skip
SHEAR_LEFT = _of_equal_spans(
    "shear left", "shear at the left end of a span", lambda s, n: s.span(n).V0[0]
)
SHEAR_RIGHT = _of_equal_spans(
    "shear right", "shear at the right end of a span", lambda s, n: -s.span(n).end_shear[0]
)
NO_MOMENT = _of_equal_spans(
    "point of no moment", "first point of no moment in a span",
    lambda s, n: s.span(n).inflections()[0],
)  # fmt: skip
REACTION = _of_equal_spans("reaction", "reaction at a support", lambda s, n: s.reactions[0, n - 1])


def _two_spans(P: float, w: float, l: float) -> Solution:
    from lineproof.beams.analysis.model import (  # noqa: PLC0415
        SIMPLE,
        Beam,
        PointLoad,
        Span,
        UniformLoad,
    )
    from lineproof.beams.analysis.solve import solve  # noqa: PLC0415 - numpy, 0.1 s

    beam = Beam((Span(l, _STIFFNESS),) * 2, (SIMPLE,) * 3)
    return solve(beam, [PointLoad("D", 1, P, l / 2), UniformLoad("D", 2, w)]).total()


@procedure(
    "two spans, support moment", 1, "direct stiffness; moment over the middle support",
    ("P", "w", "l"),
)  # fmt: skip
def _two_spans_moment(P: float, w: float, l: float) -> float:
    return float(_two_spans(P, w, l).span(1).end_moment[0])


@procedure("two spans, reaction", 1, "direct stiffness; reaction at a support", ("P", "w", "l"))
def _two_spans_reaction(P: float, w: float, l: float, *, number: float) -> float:
    return float(_two_spans(P, w, l).reactions[0, round(number) - 1])


TWO_SPANS_MOMENT: Procedure = _two_spans_moment
TWO_SPANS_REACTION: Procedure = _two_spans_reaction

_PARTIAL = ("w", "x_p1", "x_p2", "l", "E_c", "I_k")


def _partial(w: float, x_p1: float, x_p2: float, l: float, E_c: float, I_k: float) -> Solution:
    from lineproof.beams.analysis.model import SIMPLE, Beam, PartialLoad, Span  # noqa: PLC0415
    from lineproof.beams.analysis.solve import solve  # noqa: PLC0415 - numpy, 0.1 s

    beam = Beam((Span.of(l, E_c, I_k),), (SIMPLE, SIMPLE))
    return solve(beam, [PartialLoad("D", 1, w, x_p1, x_p2)]).total()


@procedure("partial load, reaction", 1, "direct stiffness; reaction at a support", _PARTIAL)
def _partial_reaction(*args: float, number: float) -> float:
    return float(_partial(*args).reactions[0, round(number) - 1])


@procedure("partial load, slope", 1, "direct stiffness; slope at the left end", _PARTIAL)
def _partial_slope(*args: float) -> float:
    return float(_partial(*args).rotations[0, 0])


PARTIAL_REACTION: Procedure = _partial_reaction
PARTIAL_SLOPE: Procedure = _partial_slope
