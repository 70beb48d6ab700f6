"""What is changed to cure each kind of check, and how missing lengths and areas are told."""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.formula import Criterion
from lineproof.standards.a23_3 import (
    bearing,
    crack_control,
    cutoff,
    development,
    flexure,
    hooks,
    interface,
    laps,
    minimum,
    shear,
    shear_bars,
    shear_factors,
    torsion,
)

_SECTION = ("A_s", "h", "b_w", "f_c")
_WEB = ("b_w", "h", "f_c")
SOUGHT: Mapping[Criterion, tuple[str, ...]] = {
    flexure.STRENGTH: _SECTION,
    flexure.YIELDS: ("less A_s", "h", "b_w", "f_c"),
    flexure.UPPER_LAYER_YIELDS: ("h", "f_c"),
    cutoff.SUFFICES: _SECTION,
    minimum.BY_AREA: ("A_s",),
    minimum.BY_CRACKING: ("A_s",),
    minimum.BY_CRACKING_TOP: ("A_s",),
    minimum.WAIVER: ("A_s",),
    minimum.SPREAD: ("n_o",),
    crack_control.CRACKS: ("number", "bars"),
    shear.STRENGTH: ("s", *_SECTION),
    shear.RESTRAINT_STRENGTH: ("s", *_SECTION),
    shear.WEB_HOLDS: _WEB,
    shear_factors.STRAIN_IN_RANGE: ("A_s", "h"),
    shear.SPACING: ("s", "h"),
    shear.HAS_MINIMUM: ("s",),
    shear_bars.TENSION_SIDE_HOLDS: ("A_sd", "s", "h"),
    shear_bars.CAPPED_HOLDS: ("A_sd", "s", "h"),
    shear_bars.COMPRESSION_SIDE_HOLDS: ("A_sp", "s", "h"),
    shear_bars.END_SUPPORT_HOLDS: ("A_sd", "s", "h"),
    torsion.LEGS_PROVIDED: ("s", "h", "b_w"),
    torsion.SECTION: _WEB,
    torsion.CORNER_BARS: ("s",),
    development.DEVELOPED: ("bars", "f_c", "b_sp"),
    hooks.FITS: ("bars", "b_sp"),
    cutoff.DEVELOPED_AT_ZERO_MOMENT: ("bars", "A_s", "h", "f_c"),
    bearing.STRENGTH: ("b_w", "f_c"),
    shear_bars.HANGERS_PROVIDED: ("n_h",),
    interface.STRENGTH: ("s_f", "f_c"),
}
"""What is changed, each alone, by check; ``A_s`` is an area of bars, ``bars`` their size."""
LONGER: Mapping[Criterion, str] = {
    cutoff.EXTENDED: "the bars that end here made {:g} mm longer",
    cutoff.CONTINUES: "the bars that go on made {:g} mm longer",
    cutoff.LENGTH_IN_SUPPORT: "the bottom bars made {:g} mm longer into the support, which must "
    "be as much longer where they end at its far cover",
    cutoff.LONG_PAST_INFLECTION: "the top bars made {:g} mm longer",
    laps.LONG_ENOUGH: "a lap {:g} mm longer",
}
MORE_AREA: Mapping[Criterion, str] = {
    cutoff.INTO_SIMPLE_SUPPORT: "{:g} mm² more of bottom bars going into the support",
    cutoff.INTO_CONTINUOUS_SUPPORT: "{:g} mm² more of bottom bars going into the support",
    cutoff.TOP_PAST_INFLECTION: "{:g} mm² more of top bars going past the inflection",
    cutoff.CUT_AT_DOUBLE_AREA: "{:g} mm² more of bars going on",
    shear_factors.BARS_IN_RANGE: "{:g} mm² more of bars developed on the face in tension",
}
