"""The stirrups of a beam as recorded lines: their legs, anchorage, spacings, what governs them."""

from __future__ import annotations

import math
from collections.abc import Sequence
from itertools import pairwise

from lineproof.beams.continuous.layout import BarRun, BeamOutline, StirrupZone, places_of
from lineproof.beams.continuous.stirrup_corners import fewest_in_corners, record_corners
from lineproof.beams.continuous.stirrups_choice import Choice
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE, FROM_MEMORY
from lineproof.record import Entry
from lineproof.standards.a23_3 import bars, shear, shear_bars, shear_factors

_FIRST = (
    "The first stirrup stands about half a spacing from the face of the support, at most 75 mm. "
    "Spacings are steps of 25 mm, at most one near the supports and one between, alike over the "
    "beam, then of least mass. Stirrups are nowhere below the minimum, also where the concrete "
    "alone would carry the shear."
)
_TIES = (
    "The ties around the hooks where the beam ends are no stirrups for shear; 12.5.4 asks them to "
    "stand closer. At a free end they take the place of the stirrups there. Their least clear "
    "distance is that of bars and is checked with the hooks; a stirrup may stand as near to them "
    "as they stand to each other."
)
_GIVEN = "The stirrups are as given and checked as they stand."
_STATIONS = (
    "Every load case is checked every 50 mm with its own moment and shear. For each stretch of one "
    "spacing the section that is used most is printed, and further load cases where bars along the "
    "beam are used more than half and more than printed."
)
_CHANGE = (
    "Where the spacing changes, the closer stirrups count less over half the depth of the beam; "
    "nothing is added to the wider ones."
)
_HOOKS_OPEN = "Stirrups are anchored by standard hooks around a bar in each corner"
_HOOKS_CLOSED = (
    "Stirrups are closed around all bars, with hooks of 135 degrees around a bar in a corner, and "
    "a bar in each corner"
)


def record_stirrups(
    steps: Steps,
    choice: Choice,
    outline: BeamOutline,
    ties: Sequence[StirrupZone] = (),
    runs: Sequence[BarRun] = (),
) -> dict[str, Entry]:
    """Record inside the open part the stirrups of the beam; return A_v, A_t, d_bs for sections.

    ``ties`` are those around hooks in the end supports, ``runs`` the bars along the beam. Needs
    b_w, f_c, f_y on the sheet.
    """
    sheet, basis = steps.sheet, choice.basis
    made = {
        "A_t": sheet.lookup("A_t", bars.BARS, basis.stirrup, "A_b"),
        "d_bs": sheet.lookup("d_bs", bars.BARS, basis.stirrup, "d_b"),
    }
    steps.bind(n_v=sheet.given("n_v", str(basis.legs)), **made)
    made["A_v"] = steps.line(shear.STIRRUP_LEGS)
    steps.check(shear_bars.HOOKS_SUFFICE)
    fewest = fewest_in_corners(outline, runs, choice.zones)
    if fewest is not None:
        record_corners(steps, fewest, basis.legs)
    sheet.note(
        "stirrup-anchorage",
        f"{_HOOKS_CLOSED if basis.closed else _HOOKS_OPEN}, and reach as near to both faces as the "
        "cover lets them.",
        title="Anchorage of the stirrups", clause="12.13", basis=FROM_MEMORY,
    )  # fmt: skip
    if basis.method == "simplified":
        steps.check(shear_factors.GRADE_FOR_SIMPLIFIED)
        steps.check(shear_factors.CONCRETE_FOR_SIMPLIFIED)
    steps.line(shear.SPACING_MINIMUM)
    if choice.zones:
        apart, x = closest(choice.zones, ties)
        source = f"the closest two neighbours as they stand, {x / 1000:.2f} m from support 1"
        s = sheet.given("s", f"{apart:.9g} mm", source)
        steps.check(shear.CLEAR_SPACE, s=s)
    if ties:
        sheet.note(
            "ties-closer", _TIES, title="Ties around hooks", clause="12.5.4",
            basis=COMMON_PRACTICE,
        )  # fmt: skip
    sheet.note(
        "stirrup-rules", _FIRST if choice.chosen else _GIVEN, title="Stirrups",
        basis=COMMON_PRACTICE,
    )  # fmt: skip
    sheet.note("stations", f"{_STATIONS} {_CHANGE}", title="Sections checked", clause="11.3.7")
    columns = ["Span", "From the left face, m", "Stirrups", "Governed by"]
    sheet.table(
        "stirrup-zones", columns, _rows(choice, outline), title="Stirrups and what governs them"
    )
    return made


def closest(zones: Sequence[StirrupZone], ties: Sequence[StirrupZone]) -> tuple[float, float]:
    """Return the least distance of a stirrup from its neighbour, and where it is [mm].

    The neighbour is a stirrup, or a tie that stands closer than ties stand to each other: no more
    room is needed than between these. One stirrup alone has the spacing of its zone.
    """
    places = [(x, 0.0) for zone in zones for x in places_of(zone)]
    places += [(x, zone.spacing) for zone in ties for x in places_of(zone)]
    apart = [
        (other - x, (x + other) / 2)
        for (x, tied), (other, beyond) in pairwise(sorted(places))
        if not (tied and beyond) and (not (tied or beyond) or other - x < max(tied, beyond))
    ]
    return min(apart, default=(zones[0].spacing, zones[0].start))


def _rows(choice: Choice, outline: BeamOutline) -> list[list[str]]:
    """Return a row for each zone with its reason; zones of one reason in the order of reasons."""
    reasons = dict(_parted(reason) for reason in choice.reasons)
    rows = []
    for check in choice.checks:
        span = check.state.numbers.span
        face = outline.faces(span)[0]
        zones = [zone for zone in choice.zones if zone.span == span]
        for band in check.bands:
            middles = [(z, (z.start + z.end) / 2 - face) for z in zones]
            inside = [z for z, u in middles if band.start <= u <= band.end]
            place = f"{band.start / 1000:.3f} to {band.end / 1000:.3f}"
            rows.append([str(span), place, _text(inside, band.spacing), ""])
        for row, why in zip(rows[-len(check.bands) :], _why(reasons, span), strict=False):
            row[3] = why
    return rows


def _parted(reason: str) -> tuple[str, str]:
    head, _, why = reason.partition("; ")
    return head, why


def _why(reasons: dict[str, str], span: int) -> list[str]:
    return [why for head, why in reasons.items() if head.startswith(f"Span {span}")]


def _text(zones: list[StirrupZone], spacing: float) -> str:
    if math.isinf(spacing) or not zones:
        return "none"
    number = sum(zone.number for zone in zones)
    legs = "" if zones[0].legs == 2 else f", {zones[0].legs} legs"  # noqa: PLR2004 - the usual
    closed = ", closed" if zones[0].closed else ""
    return f"{number}-{zones[0].size} at {spacing:g} mm{legs}{closed}"
