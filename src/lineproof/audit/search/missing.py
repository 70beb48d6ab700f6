"""What is missing: the checks that a complete calc holds, and the places that were left out."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from lineproof.audit.data import Finding, Severity
from lineproof.audit.search.member import member_of
from lineproof.audit.search.missing_places import Calc, Spot, Where
from lineproof.formula import Criterion
from lineproof.record import Record
from lineproof.standards.a23_3 import (
    bars,
    bearing,
    cover,
    crack_control,
    cutoff,
    deflection,
    flexure,
    interface,
    laps,
    minimum,
    shear,
    shear_bars,
    strain,
    torsion,
)

SOURCE = "missing"
CRITICAL, MAJOR, MINOR = Severity.CRITICAL, Severity.MAJOR, Severity.MINOR


@dataclass(frozen=True, slots=True)
class Expected:
    """A check that a complete calc holds.

    ``tests`` are the criteria of the catalogue any of which makes it; the first one names it.
    """

    where: Where
    severity: Severity
    tests: tuple[Criterion, ...]


_MINIMUM = (minimum.BY_AREA, minimum.BY_CRACKING, minimum.BY_CRACKING_TOP, minimum.WAIVER)
_DEFLECTION = (deflection.ATTACHED_SMALL, deflection.LIVE_SMALL, deflection.DEEP_ENOUGH)
_BARS_WITH_SHEAR = (shear_bars.TENSION_SIDE_HOLDS, shear_bars.CAPPED_HOLDS)
_WIDTH = (cover.WIDE_ENOUGH, cover.WIDE_ENOUGH_TWO_HOURS, cover.WIDE_ENOUGH_THREE_HOURS)
_TOP = (
    cutoff.LONG_PAST_INFLECTION, cutoff.EXTENDED, cutoff.RESTRAINED_END, cutoff.TOP_PAST_INFLECTION,
)  # fmt: skip

CONTINUOUS: tuple[Expected, ...] = (
    Expected(Where.BEAM, MAJOR, (cover.STRONG_ENOUGH,)),
    Expected(Where.BEAM, MAJOR, (cover.DURABLE,)),
    Expected(Where.BEAM, MINOR, (cover.DURABLE_BAR,)),
    Expected(Where.BEAM, MAJOR, (cover.FIRE_SAFE,)),
    Expected(Where.BEAM, MINOR, _WIDTH),
    Expected(Where.SLAB, MINOR, (cover.FIRE_SAFE_SLAB,)),
    Expected(Where.BEAM, MINOR, (shear_bars.HOOKS_SUFFICE,)),
    Expected(Where.BEAM, MAJOR, (shear_bars.CORNERS_HELD,)),
    Expected(Where.SPAN, MAJOR, (bars.FITS,)),
    Expected(Where.SPAN, MAJOR, (flexure.ENOUGH_STEEL,)),
    Expected(Where.SPAN, CRITICAL, (flexure.STRENGTH,)),
    Expected(Where.SPAN, MAJOR, (flexure.YIELDS,)),
    Expected(Where.SPAN, MINOR, (strain.PROVED,)),
    Expected(Where.SPAN, MAJOR, _MINIMUM),
    Expected(Where.SPAN, MAJOR, (crack_control.CRACKS,)),
    Expected(Where.DEEP_SPAN, MAJOR, (crack_control.SKIN_PROVIDED,)),
    Expected(Where.DEEP_SPAN, MINOR, (crack_control.SKIN_CLOSE,)),
    Expected(Where.FACE, CRITICAL, (flexure.STRENGTH,)),
    Expected(Where.FACE, MAJOR, (crack_control.CRACKS,)),
    Expected(Where.SUPPORT, MAJOR, (bars.FITS,)),
    Expected(Where.SUPPORT, MAJOR, (flexure.ENOUGH_STEEL,)),
    Expected(Where.SUPPORT, MAJOR, (flexure.YIELDS,)),
    Expected(Where.SUPPORT, MINOR, (strain.PROVED,)),
    Expected(Where.SUPPORT, MAJOR, _MINIMUM),
    Expected(Where.FLANGE_TOP, MAJOR, (minimum.SPREAD,)),
    Expected(Where.FLANGE, MAJOR, (interface.STRENGTH,)),
    Expected(Where.END, CRITICAL, (shear.STRENGTH,)),
    Expected(Where.END, MAJOR, (shear.WEB_HOLDS,)),
    Expected(Where.END, MAJOR, _BARS_WITH_SHEAR),
    Expected(Where.STIRRUPS, MAJOR, (shear.HAS_MINIMUM,)),
    Expected(Where.STIRRUPS, MAJOR, (shear.SPACING,)),
    Expected(Where.TORSION, CRITICAL, (torsion.LEGS_PROVIDED,)),
    Expected(Where.TORSION, MAJOR, (torsion.SECTION,)),
    Expected(Where.TORSION, MINOR, (torsion.CORNER_BARS,)),
    Expected(Where.RESTS, MAJOR, (bearing.STRENGTH, shear_bars.HANGERS_PROVIDED)),
    Expected(Where.DEFLECTED, MAJOR, _DEFLECTION),
    Expected(Where.BOTTOM_END, MAJOR, (cutoff.INTO_CONTINUOUS_SUPPORT, cutoff.INTO_SIMPLE_SUPPORT)),
    Expected(Where.ZERO, MAJOR, (cutoff.DEVELOPED_AT_ZERO_MOMENT,)),
    Expected(Where.EXTERIOR, MAJOR, (cutoff.LENGTH_IN_SUPPORT,)),
    Expected(Where.EXTERIOR_FACE, MAJOR, (shear_bars.END_SUPPORT_HOLDS,)),
    Expected(Where.TOP_END, MAJOR, _TOP),
    Expected(Where.CUT, MAJOR, (cutoff.SUFFICES,)),
    Expected(Where.CUT, MAJOR, (cutoff.EXTENDED,)),
    Expected(Where.CUT, MAJOR, (cutoff.CONTINUES,)),
    Expected(Where.ALONG, CRITICAL, (flexure.STRENGTH,)),
    Expected(Where.ALONG, MAJOR, _BARS_WITH_SHEAR),
    Expected(Where.LAP, MINOR, (laps.LAPPABLE,)),
    Expected(Where.LAP, MAJOR, (laps.LONG_ENOUGH,)),
)
"""What the calc of a beam of one or more spans holds, beside what it says is not covered."""

SINGLE: tuple[Expected, ...] = (
    Expected(Where.BEAM, MAJOR, (cover.DURABLE,)),
    Expected(Where.BEAM, MAJOR, (cover.FIRE_SAFE,)),
    Expected(Where.BEAM, MAJOR, (bars.FITS,)),
    Expected(Where.BEAM, CRITICAL, (flexure.STRENGTH,)),
    Expected(Where.BEAM, MAJOR, (flexure.YIELDS, flexure.UPPER_LAYER_YIELDS)),
    Expected(Where.BEAM, MAJOR, _MINIMUM),
    Expected(Where.BEAM, MAJOR, (crack_control.CRACKS,)),
    Expected(Where.BEAM, CRITICAL, (shear.STRENGTH,)),
    Expected(Where.STIRRUPS, MAJOR, (shear.HAS_MINIMUM,)),
    Expected(Where.STIRRUPS, MAJOR, (shear.SPACING,)),
    Expected(Where.BEAM, MAJOR, _DEFLECTION),
    Expected(Where.BEAM, MAJOR, (cutoff.DEVELOPED_AT_ZERO_MOMENT, cutoff.EXTENDED)),
    Expected(Where.BEAM, MINOR, (bearing.STRENGTH, shear_bars.HANGERS_PROVIDED)),
)
"""What the calc of one simple span holds, wherever in it."""


_STILL_MADE = (flexure.STRENGTH, flexure.ENOUGH_STEEL, cutoff.EXTENDED)
"""Checks that are made, and fail, where no bars stand."""
_FEW = 4
"""So many places at which a check is made are named; of more it is said how many they are."""


def missing_checks(record: Record) -> tuple[Finding, ...]:
    """Return what a complete calc of this kind of member would hold and this one does not.

    A check that the record lists as not covered is not missed; nor is one at a place that needs
    none, or where another fails for want of bars. A record that is no design of a member, such as
    a study of a section, misses nothing.
    """
    member = member_of(record)
    if not member.flow or not _is_design(record):
        return ()
    expected = CONTINUOUS if member.flow == "continuous" else SINGLE
    calc = Calc(record, member)
    found = [
        finding
        for row in expected
        if not _told(record, row)
        for finding in _missed(row, calc.spots(row.where))
    ]
    return (*found, *_left_out(record))


def _is_design(record: Record) -> bool:
    """Tell whether a record designs for factored forces; a calc of a load alone does not."""
    return any(entry["symbol"] in ("M_f", "V_f") for entry in record.entries.values())


def _missed(row: Expected, spots: Sequence[Spot]) -> Iterator[Finding]:
    """Give the finding of a check that is not made at every spot where it belongs."""
    always = row.where in (Where.BEAM, Where.SLAB) or any(t in _STILL_MADE for t in row.tests)
    made = {
        spot.name: ids
        for spot in spots
        if (ids := spot.made(row.tests)) or always or not spot.stopped
    }
    without = [name for name, ids in made.items() if not ids]
    if not without:
        return
    first = row.tests[0]
    at = [name for name, ids in made.items() if ids]
    if row.where == Where.BEAM:
        said = "not checked"
    elif at:
        only = f"for {_list(at)} only" if len(at) <= _FEW else f"at {len(at)} places"
        said = f"checked {only}, not for {_list(without)}"
    else:
        said = f"not checked anywhere; it is needed for {row.where.value}"
    yield Finding(
        SOURCE,
        row.severity,
        f"{_named(first)}: {said}.",
        tuple(entry_id for ids in made.values() for entry_id in ids),
        first.clause,
        _advice(row),
    )


def _named(test: Criterion) -> str:
    """Return the title of a test; the colon behind it is the only one of its sentence."""
    return test.title.replace(": ", ", ")


def _advice(row: Expected) -> str:
    first, *others = row.tests
    there = "" if row.where == Where.BEAM else " there"
    advice = f"Check {first.text}{there}, or list it on the cover as not covered."
    titles = dict.fromkeys(map(_named, others))
    return f"{advice} In its place counts: {'; '.join(titles)}." if titles else advice


def _list(names: Sequence[str]) -> str:
    """Join names as one says them; those that hold a comma are parted by more.

    >>> _list(["span 1", "span 2", "span 3"])
    'span 1, span 2 and span 3'
    >>> _list(["support 2, left face", "support 3, left face"])
    'support 2, left face; and support 3, left face'
    """
    comma, last = ("; ", "; and ") if any("," in name for name in names) else (", ", " and ")
    return last.join(filter(None, (comma.join(names[:-1]), names[-1])))


def _told(record: Record, row: Expected) -> bool:
    """Tell whether the record itself says that a check is not covered, in each of its ways."""
    told = [
        clause.strip()
        for entry in record.data["status"]["not_covered"]
        for clause in str(entry["clause"]).split(",")
        # Of the top bars alone: what is said of them says nothing of the span.
        if "top bars" not in str(entry["check"])
    ]
    return all(any(_covers(test.clause, each) for each in told) for test in row.tests)


def _covers(clause: str, told: str) -> bool:
    """Tell whether a clause is the one told or lies within it."""
    return bool(told) and (clause == told or clause.startswith(f"{told}."))


_SERIES = re.compile(r"anchorage-(bar|lap)-(\d+)")
_SERIES_NAMES = {"bar": "Development of bars, group", "lap": "Lap"}


def _left_out(record: Record) -> Iterator[Finding]:
    """Give a finding for each number that a series of parts jumps over."""
    series: dict[str, set[int]] = {}
    for part in record.parts:
        match = _SERIES.fullmatch(part["key"])
        if match is not None:
            series.setdefault(match.group(1), set()).add(int(match.group(2)))
    for name, numbers in series.items():
        for number in sorted(set(range(1, max(numbers) + 1)) - numbers):
            yield Finding(
                SOURCE,
                MAJOR,
                f"{_SERIES_NAMES[name]} {number}: left out, though later ones are there.",
                clause="12.15" if name == "lap" else "12.2",
                advice="Ask for the part, or for the reason why it is not needed.",
            )
