"""What in a detailing contradicts the outline or cannot be bent: plain sentences, all at once."""

from __future__ import annotations

from itertools import pairwise

from lineproof.beams.continuous.bending import hook_leg, stirrup_hook
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Detailing, StirrupZone
from lineproof.standards.a23_3.bars import BARS

SLACK = 1.0
"""mm: positions are whole millimetres."""


def contradictions(outline: BeamOutline, detailing: Detailing, grade: str) -> tuple[str, ...]:
    """Return what cannot be built as given: bars outside the concrete, hooks too long, zones."""
    found: list[str] = []
    thickest = max((BARS.number(zone.size, "d_b") for zone in detailing.stirrups), default=0.0)
    for run in detailing.bars:
        found += _bar_faults(outline, run, grade, thickest)
    for zone in detailing.stirrups:
        found += _zone_faults(outline, zone)
    zones = sorted(detailing.stirrups, key=lambda zone: zone.start)
    found += [
        f"stirrups of span {later.span}: the zone from {later.start:.0f} mm begins before the one "
        f"before it ends at {earlier.end:.0f} mm"
        for earlier, later in pairwise(zones)
        if later.start < earlier.end
    ]
    return tuple(found)


def _bar_faults(outline: BeamOutline, run: BarRun, grade: str, stirrup: float) -> list[str]:
    name = f"{run.mark or run.face} {run.number}-{run.size}"
    low, high = outline.ends
    found = []
    if run.number < 1 or run.end <= run.start:
        found.append(f"{name}: {run.number} bars from {run.start:.0f} to {run.end:.0f} mm")
    if run.start < low - SLACK or run.end > high + SLACK:
        found.append(
            f"{name}: from {run.start:.0f} to {run.end:.0f} mm reaches outside the concrete, "
            f"{low:.0f} to {high:.0f} mm"
        )
    for at, hook in ((run.start, run.hook_start), (run.end, run.hook_end)):
        if hook != "90" or run.place == "side face":
            continue
        span = sum(axis <= at for axis in outline.axes[1:-1])
        room = outline.depths[span] - 2 * (outline.cover + stirrup)
        if hook_leg(run.size, grade) > room:
            found.append(
                f"{name}: the 90° hook has a leg of {hook_leg(run.size, grade):.0f} mm, more than "
                f"the {room:.0f} mm between the stirrups' top and bottom; write thinner bars, or a "
                "deeper beam"
            )
    return found


def _zone_faults(outline: BeamOutline, zone: StirrupZone) -> list[str]:
    name = f"stirrups of span {zone.span}"
    start, end = outline.faces(zone.span)
    found = []
    if abs((zone.number - 1) * zone.spacing - (zone.end - zone.start)) > SLACK:
        found.append(
            f"{name}: {zone.number} at {zone.spacing:.0f} mm do not reach from {zone.start:.0f} "
            f"to {zone.end:.0f} mm"
        )
    low, high = outline.ends
    if zone.start < low - SLACK or zone.end > high + SLACK:
        found.append(
            f"{name}: from {zone.start:.0f} to {zone.end:.0f} mm reaches outside the concrete, "
            f"{low:.0f} to {high:.0f} mm"
        )
    found += [
        f"{name}: from {zone.start:.0f} to {zone.end:.0f} mm crosses the face of a support at "
        f"{face:.0f} mm; write two zones"
        for face in (start, end)
        if zone.start < face - SLACK and zone.end > face + SLACK
    ]
    if stirrup_hook(zone.size) > outline.b_w - 2 * outline.cover and not zone.closed:
        found.append(f"{name}: the hooks are longer than the stirrup is wide; write closed ones")
    return found
