"""Clause 9.8.2 by stages of loading: deflections from moments, local loads, roots of cantilevers.

A point load or a part of a uniform load bends a span otherwise than a uniform load with the same
moment at midspan. The difference is a moment to be added there, so that one formula gives the
deflection: with a to the nearer support, P a (3 l^2 - 4 a^2)/48 = 5 l^2/48 (P a/2 + M_P). The same
is done at the root of a cantilever (P a^2 (3 l - a)/6 = l^2/4 (P a + M_P)), and for the rotation at
a support of the span behind it, b from its far end (P b (l^2 - b^2)/(6 l) = l/3 (P a/2 + M_P)).
"""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc.notation import NOTATION as NBC
from lineproof.standards.references import DEFLECTION_QUOTED, MECHANICS

_formula = partial(formula, notation=A23_3 | NBC)
_criterion = partial(criterion, notation=A23_3 | NBC)

LARGEST_SO_FAR = _formula(
    "M_a = max(M_s, M_ae)",
    clause="9.8.2.3",
    title="Largest moment up to the stage",
    basis=FROM_MEMORY,
    system="kN-m",
)
HOGGING_SIZE = _formula(
    "M_a = abs(M_s)",
    clause="9.8.2.3",
    title="Size of the negative moment",
    basis=MECHANICS,
    system="kN-m",
)
CRACKING_WEB = _formula(
    "M_crdn = f_rd*b_w*h**2/6",
    clause="9.8.2.3",
    title="Cracking moment for deflections, negative bending, web alone",
    basis=DEFLECTION_QUOTED,
)
UNCRACKED = _criterion(
    "M_a <= M_crd",
    clause="9.8.2.3",
    title="Whether the section has cracked, positive bending",
    basis=DEFLECTION_QUOTED,
    yes="Not cracked: the gross section counts.",
    no="Cracked: the effective moment of inertia counts.",
    key="uncracked",
)
UNCRACKED_TOP = _criterion(
    "M_a <= M_crdn",
    clause="9.8.2.3",
    title="Whether the section has cracked, negative bending",
    basis=DEFLECTION_QUOTED,
    yes="Not cracked: the gross section counts.",
    no="Cracked: the effective moment of inertia counts.",
    key="uncracked-top",
)
WHOLE = _criterion(
    "M_a - M_crd <= 0",
    unit="kN.m",
    clause="9.8.2.3",
    title="Positive moment beyond that of cracking where no bars count",
    basis=MECHANICS,
    yes="The section is not cracked.",
    no="The section cracks and no bars count in it: it has NO stiffness, no deflection is given.",
    key="deflection-whole",
)
WHOLE_TOP = _criterion(
    "M_a - M_crdn <= 0",
    unit="kN.m",
    clause="9.8.2.3",
    title="Negative moment beyond that of cracking where no bars count",
    basis=MECHANICS,
    yes="The section is not cracked.",
    no="The section cracks and no bars count in it: it has NO stiffness, no deflection is given.",
    key="deflection-whole-top",
)
NO_STIFFNESS = (WHOLE, WHOLE_TOP)
"""Checks that fail where a section without bars cracks: it has no stiffness."""
GROSS = _formula(
    "I_e = I_g", clause="9.8.2.3", title="Effective moment of inertia, not cracked", basis=MECHANICS
)

SIMPLE_SPAN = _formula(
    "delta_i = 5*l**2/(48*E_c*I_e)*M_m",
    clause="9.8.2.2",
    title="Immediate deflection at midspan from the moment, simple span",
    basis=MECHANICS,
)
ONE_END_SPAN = _formula(
    "delta_i = 5*l**2/(48*E_c*I_ea)*(M_m - 0.1*M_h)",
    clause="9.8.2.2",
    title="Immediate deflection at midspan from moments, one end continuous",
    basis=MECHANICS,
)
CANTILEVER_BENDING = _formula(
    "delta_b = M_h*l**2/(4*E_c*I_e)",
    clause="9.8.2.2",
    title="Deflection of the tip by bending of the cantilever",
    basis=MECHANICS,
)
ROOT_ROTATION = _formula(
    "theta_r = l_bk*(M_hb - 2*M_mb)/(6*E_c*I_bk)",
    clause="9.8.2.2",
    title="Rotation of the root by bending of the span behind, positive where the tip sinks",
    basis=MECHANICS,
)
TIP = _formula(
    "delta_i = delta_b + theta_r*l",
    clause="9.8.2.2",
    title="Immediate deflection of the tip, rotation of the root counted",
    basis=MECHANICS,
)
TIP_FIXED = _formula(
    "delta_i = delta_b",
    clause="9.8.2.2",
    title="Immediate deflection of the tip, root fixed",
    basis=MECHANICS,
)

FROM_NEARER = _formula(
    "a_s = min(x_P, l - x_P)",
    clause="geometry",
    title="Distance of the load from the nearer support",
    basis=MECHANICS,
)
FROM_RIGHT = _formula(
    "a_s = l - x_P",
    clause="geometry",
    title="Distance of the load from the support on the right",
    basis=MECHANICS,
)
POINT_LOAD = _formula(
    "M_P = 0.1*P_s*a_s*(1 - 8*a_s**2/l**2)",
    clause="9.8.2.2",
    title="Addition to the moment at midspan for a point load",
    basis=MECHANICS,
    system="kN-m",
)
POINT_LOAD_CANTILEVER = _formula(
    "M_P = P_s*a_s*(2*a_s/l - 2*a_s**2/(3*l**2) - 1)",
    clause="9.8.2.2",
    title="Addition to the moment at the root for a point load",
    basis=MECHANICS,
    system="kN-m",
)
POINT_LOAD_BEHIND = _formula(
    "M_P = 0.5*P_s*(b_s*(1 - b_s**2/l_bk**2) - a_s)",
    clause="9.8.2.2",
    title="Addition to the moment at midspan of the span behind for a point load",
    basis=MECHANICS,
    system="kN-m",
)
WITH_LOCAL_LOADS = _formula(
    "M_q = M_s + M_P",
    clause="9.8.2.2",
    title="Moment at which uniform load gives the same deflection",
    basis=MECHANICS,
    system="kN-m",
)
HALF_OF_PARTIAL = _formula(
    "P_s = w_p*(x_2 - x_1)/2",
    clause="statics",
    title="Half of the load between the two stations",
    basis=MECHANICS,
    system="kN-m",
)
FIRST_POINT = _formula(
    "x_P = (x_1 + x_2)/2 - (x_2 - x_1)/sqrt(12)",
    clause="statics",
    title="Where the first half acts as a point load that deflects the beam alike",
    basis=MECHANICS,
)
SECOND_POINT = _formula(
    "x_P = (x_1 + x_2)/2 + (x_2 - x_1)/sqrt(12)",
    clause="statics",
    title="Where the second half acts as a point load that deflects the beam alike",
    basis=MECHANICS,
)
MIDDLE = _formula("x_m = l/2", clause="geometry", title="Middle of the span", basis=MECHANICS)

LONG_TERM_PLAIN = _formula(
    "zeta_s = 1 + S_t",
    clause="9.8.2.5",
    title="Total over immediate deflection under sustained load, no compression bars counted",
    basis=FROM_MEMORY,
)
LONG_TERM_ATTACHED_PLAIN = _formula(
    "zeta_sa = 1 + S_ta",
    clause="9.8.2.5",
    title="Total over immediate deflection at attachment, no compression bars counted",
    basis=FROM_MEMORY,
)
RISE = _formula(
    "delta_up = delta_D - delta_R",
    clause="9.8.2.6",
    title="Immediate rise due to live load",
    basis=MECHANICS,
)
RISE_ATTACHED = _formula(
    "delta_up = delta_D - delta_R + max((zeta_sa - zeta_s)*min(delta_D, delta_sus), 0)",
    clause="9.8.2.6",
    title="Rise after attachment of the parts carried",
    basis=FROM_MEMORY,
)
RISE_SMALL = _criterion(
    "delta_up <= delta_max",
    clause="9.8.2.6",
    title="Rise due to load on other spans",
    basis=FROM_MEMORY,
    yes="The rise stays within the limit.",
    no="The rise EXCEEDS the limit.",
    key="deflection-rise",
)
CAMBER = _formula(
    "delta_cb = zeta_s*delta_sus",
    clause="9.8.2.6",
    title="Camber that would level the beam under sustained load in the end",
    basis=MECHANICS,
)

_WITHIN = "The value stays within its bound; it is not confirmed by hand."
_BOUND = partial(
    _criterion,
    unit="mm",
    clause="9.8.2",
    title="Bound: the largest moment there can be, the least moment of inertia, all along",
    basis=MECHANICS,
    yes=_WITHIN,
    no="The value lies OUTSIDE its bound.",
)
BOUND_SIMPLE = _BOUND(
    "abs(delta_k) <= l**2*abs(M_m)/(4*E_c*min(I_crm, I_g))", key="curvature-bound-simple"
)
BOUND_ONE_END = _BOUND(
    "abs(delta_k) <= l**2*(abs(M_m) + abs(M_h))/(4*E_c*min(I_crm, I_cre, I_gw))",
    key="curvature-bound-one-end",
)
BOUND_BOTH_ENDS = _BOUND(
    "abs(delta_k) <= l**2*(abs(M_m) + abs(M_h1) + abs(M_h2))"
    "/(4*E_c*min(I_crm, I_cr1, I_cr2, I_gw))",
    key="curvature-bound-both-ends",
)

FORMULAS = (
    LARGEST_SO_FAR, HOGGING_SIZE, CRACKING_WEB, GROSS, SIMPLE_SPAN,
    ONE_END_SPAN, CANTILEVER_BENDING, ROOT_ROTATION, TIP, TIP_FIXED, FROM_NEARER, FROM_RIGHT,
    POINT_LOAD, POINT_LOAD_CANTILEVER, POINT_LOAD_BEHIND, WITH_LOCAL_LOADS, HALF_OF_PARTIAL,
    FIRST_POINT, SECOND_POINT, MIDDLE, LONG_TERM_PLAIN, LONG_TERM_ATTACHED_PLAIN, RISE,
    RISE_ATTACHED, CAMBER,
)  # fmt: skip
CRITERIA = (
    UNCRACKED,
    UNCRACKED_TOP,
    *NO_STIFFNESS,
    RISE_SMALL,
    BOUND_SIMPLE,
    BOUND_ONE_END,
    BOUND_BOTH_ENDS,
)
