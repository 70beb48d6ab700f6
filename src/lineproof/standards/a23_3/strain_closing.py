"""Closing criteria of strain compatibility: how a reader confirms a found value by hand."""

from __future__ import annotations

from collections.abc import Mapping
from functools import partial

from lineproof.formula import Criterion, criterion
from lineproof.record import Procedure
from lineproof.standards.a23_3 import strain
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS

_criterion = partial(criterion, notation=NOTATION, basis=MECHANICS)

_BLOCK = {
    True: "alpha_1*phi_c*f_c*b*beta_1*c_l",
    False: "alpha_1*phi_c*f_c*((b - b_w)*h_f + b_w*beta_1*c_l)",
}
_BLOCK_MOMENT = {
    True: "alpha_1*phi_c*f_c*b*beta_1*c_l*(d - beta_1*c_l/2)",
    False: "alpha_1*phi_c*f_c*((b - b_w)*h_f*(d - h_f/2) + b_w*beta_1*c_l*(d - beta_1*c_l/2))",
}
_AT_YIELD = "phi_s*A_s*f_y"
_BY_STRAINS = {
    "one layer": "phi_s*A_s*min(f_y, E_s*eps_cu*(d - c_l)/c_l)",
    "two layers": "phi_s*(A_s1*min(f_y, E_s*eps_cu*(d_1 - c_l)/c_l)"
    " + A_s2*min(f_y, E_s*eps_cu*(d_2 - c_l)/c_l))",
}
_INNERMOST = {
    "one layer": "d",
    "two layers": "d_2",
    "compression bars": "d",
    "compression bars, two layers": "d_2",
}
LAYERED = tuple(_BY_STRAINS)
"""Cases whose axis is found a second time; with compression bars it is found in the first path."""
_BALANCED = "Compression and tension balance at this depth."
_BOUND = "The value stays within its bound; it is not confirmed by hand."


def _axis(concrete: str, bars: str) -> Criterion:
    return _criterion(
        f"abs({concrete} - {bars}) <= 0.001*{_AT_YIELD}",
        unit="kN",
        clause="10.1.1",
        title="Equilibrium of the section at the neutral axis found",
        yes=_BALANCED,
        key="equilibrium",
    )


AXES = {
    (case, in_flange, yields): _axis(_BLOCK[in_flange], _AT_YIELD if yields else _BY_STRAINS[case])
    for case in _BY_STRAINS
    for in_flange in (True, False)
    for yields in (True, False)
}
"""Equilibrium at the axis found: by case, block in the flange or not, all bars at yield or not."""

MOMENTS = {
    in_flange: _criterion(
        f"abs(M_l - {arm}) <= 0.001*M_l",
        unit="kN.m",
        clause="10.1.1",
        title="Moment of the block about the bars",
        yes="The block at this depth gives the same moment about the bars.",
        key="moment-of-block",
    )
    for in_flange, arm in _BLOCK_MOMENT.items()
}
MOMENTS_DOUBLY = {
    in_flange: _criterion(
        f"abs(M_l - ({concrete} + C_s*(d - d_p))) <= 0.001*M_l",
        unit="kN.m",
        clause="10.1.1",
        title="Moment of the block and the compression bars about the tension bars",
        yes="Block and compression bars give the same moment about the tension bars.",
        key="moment-of-block",
    )
    for in_flange, concrete in {
        True: "C_c*(d - a/2)",
        False: "alpha_1*phi_c*f_c*((b - b_w)*h_f*(d - h_f/2) + b_w*a*(d - a/2))",
    }.items()
}
MOMENT_BOUND = _criterion(
    "M_l <= phi_s*A_s*f_y*d",
    unit="kN.m",
    clause="10.1",
    title="Bound: the lever arm is shorter than d",
    yes=_BOUND,
    key="lever-arm-bound",
)
# With eps_cu = 0.0035 and the peak at 0.002 the mean of the curve over the depth is
# 1 - 0.002/(3 x 0.0035) = 0.8095 of its peak, and its resultant lies 0.416 c below the top.
AXIS_PARABOLA = _criterion(
    "abs(0.9*phi_c*f_c*0.8095*b*c_p - phi_s*A_s*f_y) <= 0.001*phi_s*A_s*f_y",
    unit="kN",
    clause="10.1.1",
    title="Equilibrium of the section, parabolic curve",
    yes=_BALANCED,
    key="equilibrium",
)
MOMENT_PARABOLA = _criterion(
    "abs(M_p - phi_s*A_s*f_y*(d - 0.416*c_p)) <= 0.001*M_p",
    unit="kN.m",
    clause="10.1.1",
    title="Moment of the curve about the bars",
    yes="The curve at this depth gives the same moment about the bars.",
    key="moment-of-curve",
)
AXIS_BOUND_PARABOLA = _criterion(
    "c_p <= d",
    unit="mm",
    clause="10.1",
    title="Bound: the bars are in tension",
    yes=_BOUND,
    key="bars-in-tension",
)
MOMENT_BOUND_PARABOLA = _criterion(
    "M_p <= phi_s*A_s*f_y*d",
    unit="kN.m",
    clause="10.1",
    title="Bound: the lever arm is shorter than d",
    yes=_BOUND,
    key="lever-arm-bound",
)


def closings(key: strain.Key, values: Mapping[str, float]) -> tuple[Criterion, Criterion]:
    """Return what closes the axis and the moment by layers, as short as these values allow.

    ``values`` holds the arguments of ``strain.AXIS[key]`` in internal units.
    """
    zone, case = key
    axis = _value(strain.AXIS[key], values)
    in_flange = zone == "rectangle" or values["beta_1"] * axis <= values["h_f"]
    yields = _yields(case, axis, values)
    moment = MOMENT_BOUND
    if case == "one layer" or (case == "two layers" and yields):
        moment = MOMENTS[in_flange]
    elif case not in LAYERED and yields:
        moment = MOMENTS_DOUBLY[in_flange]
    return AXES.get((case, in_flange, yields), MOMENT_BOUND), moment


def parabola_closings(key: strain.Key, values: Mapping[str, float]) -> tuple[Criterion, Criterion]:
    """Return what closes axis and moment of the parabolic curve; bounds where it is in the web."""
    zone, case = key
    axis = _value(strain.AXIS_PARABOLA[key], values, strain.PARABOLA_SETTINGS)
    in_flange = zone == "rectangle" or axis <= values["h_f"]
    if in_flange and case in LAYERED and _yields(case, axis, values):
        return AXIS_PARABOLA, MOMENT_PARABOLA
    return AXIS_BOUND_PARABOLA, MOMENT_BOUND_PARABOLA


def _value(
    made: Procedure, values: Mapping[str, float], settings: Mapping[str, float] | None = None
) -> float:
    return float(made.function(*[values[name] for name in made.names], **(settings or {})))


def _yields(case: str, axis: float, values: Mapping[str, float]) -> bool:
    strain_there = values["eps_cu"] * (values[_INNERMOST[case]] - axis) / axis
    return strain_there >= values["f_y"] / values["E_s"] * (1 - 1e-6)


CRITERIA = (
    *AXES.values(),
    *MOMENTS.values(),
    *MOMENTS_DOUBLY.values(),
    MOMENT_BOUND,
    AXIS_PARABOLA,
    MOMENT_PARABOLA,
    AXIS_BOUND_PARABOLA,
    MOMENT_BOUND_PARABOLA,
)
