"""The sections of the shear as recorded lines: critical section, resistance, stirrups, bars."""

from __future__ import annotations

from lineproof.beams.continuous.shear_bars_record import record_bars
from lineproof.beams.continuous.shear_numbers import ShearBasis
from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.beams.continuous.torsion_record import record_torsion, record_torsion_legs
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.record import Entry
from lineproof.standards.a23_3 import shear, shear_factors, torsion
from lineproof.standards.references import SHEAR_2004

COARSE = 20.0
_AT_FACE = {
    "indirect": "The beam is carried by a girder: its reaction does not press on the beam from "
    "below, and the shear is taken at the face of the girder.",
    "uplift": "In this load case the support pulls the beam down: its reaction does not press on "
    "the beam, and the shear is taken at the face of the support.",
    "point torque": "A point torque acts nearer to the support than the effective shear depth: "
    "between it and the face the torsion is larger, and the section is taken at the face.",
    "free": "The end is free: the shear is taken at the end itself.",
}
_AT_D_V = "The support presses on the beam from below{loads}: sections nearer to the support than "
_AT_D_V += "the effective shear depth are designed for the shear at that distance from its face."
_OUT_OF_RANGE = (
    "The strain lies outside the range of the general method: no resistance is given, and the "
    "section does NOT hold. More bars on the face in tension, or a deeper beam."
)
_NO_BARS = (
    "No bars count on the face in tension: no resistance is given, and the section does NOT hold. "
    "Bars that are developed here are needed."
)
_ROUND_OFF = 1e-3
"""What a sum may leave where nothing acts, as at the end of a cantilever [N, N.mm]."""
_MIXED = (
    "The moment changes its sign near the section: the smaller of the depths to the top and to "
)
_MIXED += "the bottom bars is used."


def record_place(steps: Steps, section: ShearSection) -> Entry:
    """Record inside the open part d_v and where the section lies; return its distance x_f.

    Needs ``h``, ``d`` and at an end ``b_sn`` in place. Then the forces of ``section.demand`` at
    x_f are recorded, which bind M_f and V_f, and then :func:`record_section`.
    """
    _same(steps, "d", section.d)
    face = "bottom" if section.tension == "bottom" else "top"
    steps.sheet.note("case", f"{section.demand.case}. The {face} is in tension.", title="Load case")
    if section.mixed:
        steps.sheet.note("depth", _MIXED, title="Depth", basis=COMMON_PRACTICE)
    steps.line(shear.D_V)
    if section.place == "station":
        x = steps.sheet.given(
            "x_f", f"{section.distance / 1000:.12g} m",
            source="section of this spacing that is used most, checked every 50 mm",
        )  # fmt: skip
        steps.bind(x_f=x)
        return x
    if section.reason in _AT_FACE:
        _note_place(steps, _AT_FACE[section.reason])
        return steps.line(shear.CRITICAL_AT_FACE)
    small = True
    if section.V_pl > 0:
        V_pl = steps.sheet.given(
            "V_pl", f"{section.V_pl / 1000:.12g} kN", source=section.near_loads
        )
        small = bool(steps.decide(shear.NEAR_POINT_LOADS, V_pl=V_pl))
    if small:
        what = "" if section.V_pl > 0 else " and no point load stands nearer to its face"
        _note_place(steps, _AT_D_V.format(loads=what))
    return steps.line(shear.CRITICAL_AT_D_V if small else shear.CRITICAL_AT_FACE)


def _note_place(steps: Steps, text: str) -> None:
    steps.sheet.note(
        "critical-section", text, title="Critical section", clause="11.3.2", basis=SHEAR_2004
    )


def _same(steps: Steps, name: str, expected: float, scale: float = 0.0) -> None:
    """Refuse to print a section with other numbers than it was chosen by."""
    found = steps.entry(name).value
    if abs(found - expected) > max(1e-9 * max(abs(expected), scale), _ROUND_OFF):
        msg = f"{name} = {found!r} on the sheet, {expected!r} in the choice"
        raise AssertionError(msg)


def record_section(steps: Steps, basis: ShearBasis, section: ShearSection) -> None:
    """Record inside the open part the resistance of a section with every check of its shear.

    Needs M_f, V_f, d_v, ``h``, ``A_s`` (bars on the face in tension), ``A_sp`` (on the other) and
    A_v, s_v, d_bs of :func:`stirrups_record.record_stirrups` in place; with torsion what
    ``torsion_record`` asks for.
    """
    _same(steps, "A_s", section.A_s)
    # A moment near its zero keeps no digits: what shear adds over d_v is the scale.
    V_f = section.values["V_f"]
    _same(steps, "V_f", V_f)
    _same(steps, "M_f", section.values["M_f"], V_f * section.values["d_v"])
    record_torsion(steps, basis, section)
    if not record_method(steps, basis, section):
        text = _OUT_OF_RANGE if section.A_s > 0 else _NO_BARS
        _note_other(steps, text, "out-of-range", "Resistance")
        return
    steps.line(shear.V_C)
    steps.line(shear.V_R_MAX)
    if section.plain:
        _record_plain(steps)
    else:
        _record_stirrups(steps, section)
    record_bars(steps, section)
    if not section.counts and not section.plain and section.place != "station":
        _record_other(steps, basis)


def record_method(steps: Steps, basis: ShearBasis, section: ShearSection) -> bool:
    """Record inside the open part factor and angle; tell whether the section is in their range.

    Needs M_f, V_f, d_v, ``A_s`` in place, with torsion T_f, p_h, A_o.
    """
    if section.plain:
        steps.line(shear_factors.A_G)
        steps.line(shear_factors.S_Z)
    bare = section.A_s == 0
    if section.counts and (bare or basis.method == "general"):
        steps.line(torsion.SHEAR_IN_STRAIN)
    if bare:  # the strain of no bars at all is no number, and neither method means a section so
        steps.line(torsion.LEAST_BARS if section.counts else shear_factors.LEAST_BARS)
        steps.check(shear_factors.BARS_IN_RANGE)
        return False
    if basis.method == "general":
        steps.line(torsion.EPS_X if section.counts else shear_factors.EPS_X)
        if not steps.check(shear_factors.STRAIN_IN_RANGE):
            return False
        if section.plain:
            steps.line(shear_factors.S_ZE)
        steps.line(shear_factors.BETA_GENERAL if section.plain else shear_factors.BETA_STIRRUPS)
        steps.line(shear_factors.THETA)
        return True
    row = "below minimum stirrups" if section.plain else "minimum stirrups or more"
    steps.bind(theta=steps.sheet.lookup("theta", shear_factors.SIMPLIFIED, row))
    if not section.plain:
        steps.bind(beta=steps.sheet.lookup("beta", shear_factors.SIMPLIFIED, row))
    elif steps.entry("a_g").value >= COARSE:
        steps.line(shear_factors.BETA_D_V)
    else:
        steps.line(shear_factors.S_ZE)
        steps.line(shear_factors.BETA_S_ZE)
    return True


def _record_plain(steps: Steps) -> None:
    """Record a section without stirrups that count: only where 11.2.8.1 asks for none."""
    steps.check(shear.DEPTH_WITHOUT_STIRRUPS)
    steps.bind(V_s=steps.sheet.given("V_s", "0 kN", source="no stirrups that count"))
    steps.line(shear.V_R_PLAIN)
    steps.check(shear.STRENGTH)
    steps.check(shear.WEB_HOLDS)


def _record_stirrups(steps: Steps, section: ShearSection) -> None:
    """Record spacing, minimum, resistance and the checks of a section with stirrups."""
    s = steps.sheet.given("s", f"{section.spacing:.12g} mm", source="stirrups of this zone")
    steps.bind(s=s)
    steps.line(shear.A_V_MIN)
    steps.check(shear.HAS_MINIMUM)
    halved = section.counts or bool(steps.decide(shear.CLOSER))
    steps.line(shear.S_MAX_HALVED if halved else shear.S_MAX)
    steps.check(shear.SPACING)
    if section.counts:
        steps.check(torsion.CORNER_BARS, d_b=steps.entry("d_bc"))
    if section.spot.change is not None:
        _record_change(steps, section)
    if section.counts:
        record_torsion_legs(steps)
    steps.line(shear.V_S)
    steps.line(shear.V_R)
    steps.check(shear.STRENGTH)
    steps.check(shear.WEB_HOLDS)


def _record_change(steps: Steps, section: ShearSection) -> None:
    """Record the spacing that counts beside a change of spacing; it stands for s from here on."""
    change = section.spot.change
    assert change is not None  # asked for before  # noqa: S101
    given = steps.sheet.given
    closer = steps.entry("s")
    if change.closer != section.spacing:
        closer = given("s_1", f"{change.closer:.12g} mm", "spacing of the closer stirrups")
    steps.bind(x_z=given("x_z", f"{section.spot.aside:.12g} mm"))
    if change.wider == float("inf"):
        s_x = steps.line(shear.BESIDE_END, s=closer)
    else:
        steps.bind(s_n=given("s_n", f"{change.wider:.12g} mm"))
        s_x = steps.line(shear.BESIDE_CHANGE, s=closer)
    steps.bind(s=s_x)


def _record_other(steps: Steps, basis: ShearBasis) -> None:
    """Record for information what the other method gives, with symbols of its own."""
    if basis.method == "simplified":
        names = {"eps_x": "eps_xg", "beta": "beta_g", "theta": "theta_g"}
        made = {"eps_x": steps.line(shear_factors.EPS_X, symbol=names["eps_x"])}
        if made["eps_x"].value > 0.003:  # noqa: PLR2004 - 11.3.6.4
            _note_other(steps, "The general method does not apply: its strain is out of range.")
            return
        made["beta"] = steps.line(shear_factors.BETA_STIRRUPS, symbol=names["beta"], **made)
        made["theta"] = steps.line(shear_factors.THETA, symbol=names["theta"], **made)
    elif basis.f_y > 400 or basis.f_c > 60:  # noqa: PLR2004 - 11.3.6.3
        _note_other(
            steps,
            "The simplified method does not apply: it holds for bars up to 400 MPa and concrete "
            "up to 60 MPa.",
        )
        return
    else:
        row = "minimum stirrups or more"
        made = {
            name: steps.sheet.lookup(
                f"{name}_g",
                shear_factors.SIMPLIFIED,
                row,
                name,
                title=f"{what} by the simplified method",
            )
            for name, what in (("beta", "factor"), ("theta", "angle"))
        }
    V_c = steps.line(shear.V_C, symbol="V_cg", **made)
    V_s = steps.line(shear.V_S, symbol="V_sg", **made)
    V_r = steps.line(shear.V_R, symbol="V_rg", V_c=V_c, V_s=V_s)
    other = "simplified" if basis.method == "general" else "general"
    _note_other(
        steps,
        f"For information: the {other} method gives a resistance of "
        f"{V_r.value / 1000:.0f} kN; the beam is designed by the {basis.method} method.",
    )


def _note_other(
    steps: Steps, text: str, key: str = "other-method", title: str = "Other method"
) -> None:
    steps.sheet.note(key, text, title=title, clause="11.3.6", basis=SHEAR_2004)
