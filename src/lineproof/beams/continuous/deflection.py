"""Deflections of one span in numbers: cracked sections, effective inertia, long-term parts, limits.

The compiled formulas of the catalogue, in the order in which ``deflection_record`` records them: a
recorded value is the number of the design. N, mm, MPa; deflections positive downward.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

from lineproof.beams.continuous.deflection_service import (
    STAGES,
    FreeEnd,
    Point,
    Stage,
    StageMoments,
)
from lineproof.errors import UserError
from lineproof.standards.a23_3 import deflection as clause
from lineproof.standards.a23_3 import deflection_stages as stages
from lineproof.standards.a23_3 import flange

FINAL = "5 years or more"
ATTACHED = "3 months"
DAMAGED = "roof or floor with parts attached that deflection damages"
NO_STIFFNESS = (
    "a section in which no bars count has no stiffness once it cracks: no deflection is computed"
)
LIVE_LIMITS = (
    "flat roof, nothing attached that deflection damages",
    "floor, nothing attached that deflection damages",
)
"""Rows of Table 9.3 that limit the deflection due to live load alone."""


@dataclass(frozen=True, slots=True)
class Place:
    """A section: width of the compression zone, depth to the tension bars, their area.

    Compression bars (``A_sp`` at ``d_p``) are counted if given.
    """

    b: float
    d: float
    A_s: float
    A_sp: float = 0.0
    d_p: float = 0.0


@dataclass(frozen=True, slots=True)
class Behind:
    """The span behind a cantilever: length [mm] and effective inertia [mm4] at every stage."""

    l: float
    I_ea: Mapping[Stage, float]

    @classmethod
    def of(cls, l: float, found: Deflections) -> Behind:
        """Return a span of length l [mm], as its deflections have been found."""
        return cls(l, {stage: found.stages[stage].I_ea for stage in STAGES})


@dataclass(frozen=True, slots=True)
class SpanSection:
    """What bends: sizes and materials of one span, its sections at midspan and at both axes.

    N, mm, MPa. ``left`` or ``right`` is None at a simple end and at a free end; ``midspan`` is None
    in a cantilever. ``top`` is the web with the top bars at midspan, for spans that hog there.
    ``h_f`` is 0 without a flange.
    """

    l: float
    l_n: float
    h: float
    b_w: float
    h_f: float
    I_g: float
    y_b: float
    f_r: float
    E_c: float
    E_s: float
    midspan: Place | None
    left: Place | None
    right: Place | None
    free: FreeEnd = ""
    behind: Behind | None = None
    top: Place | None = None

    @property
    def places(self) -> tuple[Place | None, ...]:
        """The sections that bend; one without bars has the area 0."""
        return self.midspan, self.left, self.right, self.top


@dataclass(frozen=True, slots=True)
class History:
    """When parts are attached and for how long load is sustained: rows of the table of S."""

    attached: str = ATTACHED
    final: str = FINAL


@dataclass(frozen=True, slots=True)
class Cracked:
    """A cracked section: depth of its neutral axis, whether in the flange, moment of inertia."""

    kd: float
    in_flange: bool
    I_cr: float


@dataclass(frozen=True, slots=True)
class StageResult:
    """Effective inertia at midspan and ends (None where there is none), average, deflection."""

    I_em: float | None
    I_e1: float | None
    I_e2: float | None
    I_ea: float
    theta_r: float
    delta: float


@dataclass(frozen=True)
class Deflections:
    """Deflections of one span [mm] and the limit that counts for what it carries."""

    M_crd: float
    M_crdn: float
    I_gw: float
    cracked: Mapping[str, Cracked]
    stages: Mapping[Stage, StageResult]
    zeta_s: float
    zeta_sa: float
    live: float
    rest_of_live: float
    total: float
    attached: float
    allowed: float
    by_live: bool
    rise: float | None = None

    @property
    def utilisation(self) -> float:
        """The deflection that is limited, or the rise where that may govern, over the limit."""
        return max(self.sag_used, self.rise_used)

    @property
    def sag_used(self) -> float:
        """The deflection that is limited, over the limit."""
        return (self.live if self.by_live else self.attached) / self.allowed

    @property
    def rise_used(self) -> float:
        """The rise over the limit; no more than the deflection where it cannot govern."""
        return self.sag_used if self.rise is None else self.rise / self.allowed


def continuity(free: FreeEnd, *ends: object | None) -> str:
    """Return the row of the span-depth table that a span belongs to.

    ``ends`` are its sections at continuous ends, None for a simple or free end.
    """
    if free:
        return "beam, cantilever"
    return (
        "beam, simply supported",
        "beam, one end continuous",
        "beam, both ends continuous",
    )[sum(end is not None for end in ends)]


def cracked(place: Place, section: SpanSection) -> Cracked:
    """Return a cracked section; compression bars count where the axis lies in the flange."""
    n_E = clause.MODULAR_RATIO.function(section.E_s, section.E_c)
    p, bars = place, (place.A_s, place.d)
    if p.A_sp:
        kd = clause.AXIS_COMPRESSION_BARS.function(n_E, p.A_s, p.A_sp, p.b, p.d, p.d_p)
    else:
        kd = clause.AXIS.function(n_E, p.A_s, p.b, p.d)
    if flanged(p, section) and kd > section.h_f:
        kd = clause.AXIS_IN_WEB.function(p.b, section.b_w, section.h_f, n_E, *bars)
        tee = clause.CRACKED_TEE.function(p.b, section.b_w, section.h_f, kd, n_E, *bars)
        return Cracked(kd, in_flange=False, I_cr=tee)
    if p.A_sp:
        I_cr = clause.CRACKED_COMPRESSION_BARS.function(p.b, kd, n_E, *bars, p.A_sp, p.d_p)
    else:
        I_cr = clause.CRACKED.function(p.b, kd, n_E, *bars)
    return Cracked(kd, in_flange=True, I_cr=I_cr)


def flanged(place: Place, section: SpanSection) -> bool:
    """Whether the compression zone is wider than the web."""
    return place.b > section.b_w


def deflections(
    section: SpanSection,
    moments: Mapping[Stage, StageMoments],
    *,
    carries: str,
    history: History | None = None,
) -> Deflections:
    """Return all deflections of a span; ``carries`` is a row of Table 9.3.

    Raises :class:`UserError` for sections without bars, and where a place cracks for which there
    is no section.
    """
    if any(place is not None and place.A_s <= 0 for place in section.places):
        raise UserError(NO_STIFFNESS)
    history = history or History()
    divisor = float(clause.LIMITS.row(carries, "carries")["k_D"])
    f_rd = clause.F_R_DEFLECTION.function(section.f_r)
    M_crd = clause.CRACKING_BOTTOM.function(f_rd, section.I_g, section.y_b)
    M_crdn = stages.CRACKING_WEB.function(f_rd, section.b_w, section.h)
    I_gw = flange.INERTIA_RECTANGLE.function(section.b_w, section.h)
    made = {
        name: cracked(place, section)
        for name in ("midspan", "left", "right", "top")
        if (place := getattr(section, name)) is not None
    }
    bent = _Bent(section, M_crd, M_crdn, I_gw, made)
    results = {stage: bent.stage(stage, each) for stage, each in moments.items()}
    zeta_s, zeta_sa = long_term(section, history)
    dead, sustained, total = (results[stage].delta for stage in STAGES)
    by_live, rise = carries in LIVE_LIMITS, None
    if "rise" in results:
        lifted = results["rise"].delta
        rise = stages.RISE.function(dead, lifted)
        if not by_live:
            rise = stages.RISE_ATTACHED.function(dead, lifted, zeta_sa, zeta_s, sustained)
    rest = clause.REST_OF_LIVE.function(total, sustained)
    return Deflections(
        M_crd, M_crdn, I_gw, made, results, zeta_s, zeta_sa,
        clause.LIVE.function(total, dead),
        rest,
        clause.TOTAL.function(zeta_s, sustained, rest),
        clause.AFTER_ATTACHMENT.function(zeta_s, zeta_sa, sustained, rest),
        clause.LARGEST.function(section.l_n, divisor),
        by_live, rise,
    )  # fmt: skip


def long_term(section: SpanSection, history: History) -> tuple[float, float]:
    """Return zeta_s in the end and at attachment; compression bars at midspan (root)."""
    final, attached = (
        float(clause.DURATIONS.row(name, "history")["S_t"])
        for name in (history.final, history.attached)
    )
    place = section.midspan or section.left or section.right
    if place is None or not place.A_sp:
        plain = stages.LONG_TERM_PLAIN.function
        return plain(final), plain(attached)
    rho_p = clause.COMPRESSION_RATIO.function(place.A_sp, place.b, place.d)
    both = clause.LONG_TERM.function
    return both(final, rho_p), both(attached, rho_p)


@dataclass(frozen=True)
class _Bent:
    """One span with its cracked sections, to be bent stage by stage."""

    section: SpanSection
    M_crd: float
    M_crdn: float
    I_gw: float
    cracked: Mapping[str, Cracked]

    def stage(self, stage: Stage, moments: StageMoments) -> StageResult:
        if self.section.free:
            return self._cantilever(stage, moments)
        m, (e_m, e_1, e_2) = moments, moments.earlier
        I_em = self._at_midspan(m.M_m, e_m)
        I_e1 = self._hogging("left", stages.LARGEST_SO_FAR.function(m.M_h1, e_1))
        I_e2 = self._hogging("right", stages.LARGEST_SO_FAR.function(m.M_h2, e_2))
        M_q = with_points(m.M_m, self.section.l, m.points)
        l, E_c = self.section.l, self.section.E_c
        if I_e1 is not None and I_e2 is not None:
            I_ea = clause.BOTH_ENDS.function(I_em, I_e1, I_e2)
            delta = clause.CONTINUOUS_SPAN.function(l, E_c, I_ea, M_q, m.M_h1, m.M_h2)
        elif I_e1 is not None or I_e2 is not None:
            I_ea = clause.ONE_END.function(I_em, I_e2 if I_e1 is None else I_e1)
            M_h = m.M_h2 if I_e1 is None else m.M_h1
            delta = stages.ONE_END_SPAN.function(l, E_c, I_ea, M_q, M_h)
        else:
            I_ea = I_em
            delta = stages.SIMPLE_SPAN.function(l, E_c, I_em, M_q)
        return StageResult(I_em, I_e1, I_e2, I_ea, 0.0, delta)

    def _cantilever(self, stage: Stage, moments: StageMoments) -> StageResult:
        section, m = self.section, moments
        root = "right" if section.free == "left" else "left"
        largest = stages.LARGEST_SO_FAR.function(m.M_h1, m.earlier[1])
        I_e = self._hogging(root, largest)
        if I_e is None:
            raise UserError(f"{root} support: no top bars are given for the root of the cantilever")
        l, E_c = section.l, section.E_c
        M_q = m.M_h1
        for point in from_root(section, m.points):
            M_q += stages.POINT_LOAD_CANTILEVER.function(point.P, point.x, l)
        delta_b = stages.CANTILEVER_BENDING.function(M_q, l, E_c, I_e)
        if section.behind is None:
            return StageResult(None, I_e, None, I_e, 0.0, delta_b)
        behind = section.behind
        M_mb = m.M_mb
        for point in from_far_end(section, m.behind):
            near = min(point.x, behind.l - point.x)
            M_mb += stages.POINT_LOAD_BEHIND.function(point.P, point.x, behind.l, near)
        # Live load that lifts the tip lies on the span behind: it is as cracked as under all load.
        I_bk = behind.I_ea["all" if stage == "rise" else stage]
        theta = stages.ROOT_ROTATION.function(behind.l, m.M_hb, M_mb, E_c, I_bk)
        return StageResult(
            None, I_e, None, I_e, theta, stages.TIP.function(delta_b, theta, l)
        )  # fmt: skip

    def _at_midspan(self, M: float, earlier: float) -> float:
        if M < 0:
            I_e = self._hogging("top", stages.HOGGING_SIZE.function(min(M, earlier)))
            if I_e is None:
                raise UserError(NO_STIFFNESS)
            return I_e
        M_a = stages.LARGEST_SO_FAR.function(M, earlier)
        if M_a <= self.M_crd:
            return self.section.I_g
        I_cr = self.cracked["midspan"].I_cr
        return clause.EFFECTIVE.function(I_cr, self.section.I_g, self.M_crd, M_a)

    def _hogging(self, name: str, M_a: float) -> float | None:
        if name not in self.cracked and (name != "top" or M_a > self.M_crdn):
            return None
        if M_a <= self.M_crdn:
            return self.I_gw
        return clause.EFFECTIVE_TOP.function(self.cracked[name].I_cr, self.I_gw, self.M_crdn, M_a)


def with_points(M_m: float, l: float, points: Sequence[Point]) -> float:
    """Return the midspan moment at which uniform load gives the same deflection there."""
    for point in points:
        M_m += stages.POINT_LOAD.function(point.P, min(point.x, l - point.x), l)
    return M_m


def from_root(section: SpanSection, points: Sequence[Point]) -> tuple[Point, ...]:
    """Return point loads of a cantilever with stations counted from its root."""
    if section.free == "right":
        return tuple(points)
    return tuple(replace(p, x=section.l - p.x) for p in points)


def from_far_end(section: SpanSection, points: Sequence[Point]) -> tuple[Point, ...]:
    """Return point loads of the span behind with stations counted from its far end."""
    if section.behind is None or section.free == "right":
        return tuple(points)
    return tuple(replace(p, x=section.behind.l - p.x) for p in points)


def least_depth(row: str, l_n: float, f_y: float, gamma_c: float) -> float:
    """Return the least depth [mm] of a row of the span-depth table (9.8.2.1).

    Clear span [mm], strength of the bars [MPa], density of the concrete [kg/m3].
    """
    k_h = clause.SPAN_DEPTH.number(row, "k_h")
    if plain_materials(f_y, gamma_c):
        return clause.LEAST_DEPTH.function(l_n, k_h)
    k_fy, k_gc = clause.STEEL_MODIFIER.function(f_y), clause.DENSITY_MODIFIER.function(gamma_c)
    return clause.LEAST_DEPTH_MODIFIED.function(l_n, k_h, k_fy, k_gc)


def plain_materials(f_y: float, gamma_c: float) -> bool:
    """Whether the span-depth table holds without modifiers: 400 MPa, normal density."""
    return f_y == 400 and clause.DENSITY_MODIFIER.function(gamma_c) == 1  # noqa: PLR2004
