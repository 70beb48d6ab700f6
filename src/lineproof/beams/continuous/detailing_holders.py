"""The bars that hold the stirrups between the top bars, and the string that they make with them."""

from __future__ import annotations

from dataclasses import replace

from lineproof.beams.continuous.anchored_ends import end_hook
from lineproof.beams.continuous.cutoff import along, axis_of, ceil50, half_of, support_of
from lineproof.beams.continuous.detailing_bottom import CORNERS
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.forces import ENDS, End
from lineproof.beams.continuous.laps import lap_between
from lineproof.beams.continuous.layout import BarRun, Hook
from lineproof.beams.continuous.resistance import span_at


def holder(designed: Designed, span: int, near: End, t: float) -> BarRun:
    """Return the bars that hold the stirrups from one support's corner bars to beyond midspan."""
    far = designed.outline.lengths[span - 1]
    bare = BarRun("top", 1, CORNERS, designed.bars.holders, 0.0, 0.0, serves="holds the stirrups")
    top = designed.bars.top[support_of(span, near) - 1].web
    axes = designed.outline.axes
    mate = None
    if top:
        start, end = axes[span - 1] - 1, axes[span] + 1
        mate = replace(bare, size=top[0].size, start=start, end=end)
    lap = _holder_lap(designed, span, mate)
    x = sorted(along(designed, span, near, at) for at in (t - lap, max(far, t + 2 * lap)))
    return replace(bare, start=x[0], end=x[1])


def _holder_lap(designed: Designed, span: int, mate: BarRun | None) -> float:
    """Return the lap of the bars that hold the stirrups with the corner bars beside; 0 for none."""
    if mate is None:
        return 0.0
    axes = designed.outline.axes
    whole = BarRun("top", 1, CORNERS, designed.bars.holders, axes[span - 1] + 1, axes[span] - 1)
    return lap_between(designed, whole, mate)


def with_holders(designed: Designed, corners: dict[int, BarRun]) -> list[BarRun]:
    """Return corner bars and the bars that hold the stirrups between, from left to right."""
    made: list[BarRun] = []
    for span in range(1, len(designed.outline.lengths) + 1):
        if span in corners:
            made.append(corners[span])
        if not designed.cantilever(span):
            held = _between(designed, span, corners)
            made += [held] if held is not None else []
        elif span not in corners and span + 1 not in corners:
            made.append(_bare(designed, span))
    last = len(designed.outline.supports)
    return [*made, corners[last]] if last in corners else made


def _bare(designed: Designed, span: int) -> BarRun:
    start, end = (
        _outer(designed, span, near) if span in (1, len(designed.outline.lengths)) else 0.0
        for near in ENDS
    )
    return BarRun("top", 1, CORNERS, designed.bars.holders, start, end, serves="holds the stirrups")


def _outer(designed: Designed, span: int, near: End) -> float:
    """Return where bars without top bars at a support start: its end cover, or its axis."""
    support = support_of(span, near)
    if support in (1, len(designed.outline.supports)):
        t = designed.end_cover - half_of(designed, span, near)
        return along(designed, span, near, t)
    return axis_of(designed, span, near)


def _between(designed: Designed, span: int, corners: dict[int, BarRun]) -> BarRun | None:
    """Return the bars that hold the stirrups of a span; None where top bars stand all along.

    The bars of a support may reach past the next one, where that has none.
    """
    start, end = (_outer(designed, span, near) for near in ENDS)
    before = [run for k, run in corners.items() if k <= span and run.end > start]
    after = [run for k, run in corners.items() if k > span and run.start < end]
    left = max(before, key=lambda run: run.end, default=None)
    right = min(after, key=lambda run: run.start, default=None)
    laps = _holder_lap(designed, span, left), _holder_lap(designed, span, right)
    start, end = left.end if left else start, right.start if right else end
    least = 2 * max(laps) if left and right else 0.0
    if end - start < least or end <= start:
        return None
    run = BarRun(
        "top", 1, CORNERS, designed.bars.holders, start - laps[0], end + laps[1],
        serves="holds the stirrups",
    )  # fmt: skip
    return replace(
        run,
        hook_start="" if left else _hook(designed, support_of(span, "left"), run),
        hook_end="" if right else _hook(designed, support_of(span, "right"), run),
    )


def _hook(designed: Designed, support: int, run: BarRun) -> Hook:
    """Return the hook of bars that hold the stirrups where the end of the beam is held."""
    simple = designed.outline.supports[support - 1].kind == "simple"
    return "" if simple or not designed.exterior(support) else end_hook(designed, support, run)


def joined(designed: Designed, string: list[BarRun]) -> list[BarRun]:
    """Return the corner string: like bars made one, others lapped."""
    made: list[BarRun] = []
    for run in string:
        if made and made[-1].size == run.size:
            serves = serving(made[-1].serves, run.serves)
            made[-1] = replace(made[-1], end=run.end, hook_end=run.hook_end, serves=serves)
        elif made:
            made += _lapped(designed, made.pop(), run)
        else:
            made.append(run)
    return made


def serving(first: str, second: str) -> str:
    """Return what two bars made one are for."""
    parts = [p for text in (first, second) for p in text.split(", ")]
    return ", ".join(dict.fromkeys(parts))


def _lapped(designed: Designed, before: BarRun, after: BarRun) -> list[BarRun]:
    """Return two runs of different bars with their lap between them."""
    thin, thick = sorted((before, after), key=lambda run: run.diameter)
    span = span_at(designed.outline, (before.end + after.start) / 2)
    lap = lap_between(designed, replace(thin, start=designed.outline.axes[span - 1] + 1), thick)
    short = lap - (before.end - after.start)
    if short > 0 and thin is before:  # the thinner bars are made longer: they weigh less
        before = replace(before, end=before.end + ceil50(short))
    elif short > 0:
        after = replace(after, start=after.start - ceil50(short))
    return [before, after]
