"""Beams written down by hand, for the tests of schedule and figures."""

from __future__ import annotations

import random
from dataclasses import replace

from lineproof.beams.continuous.layout import (
    BarRun,
    BeamOutline,
    BuiltSupport,
    Carrier,
    Detailing,
    Face,
    Hook,
    StirrupZone,
)

GIRDER = BuiltSupport(450.0, "simple", "girder")
COLUMN = BuiltSupport(450.0, "simple", "column")
FREE_END = BuiltSupport(0.0, "free", "none")


def outline(
    lengths: tuple[float, ...] = (7600.0, 9200.0, 7600.0),
    *,
    depths: tuple[float, ...] = (),
    shape: str = "T",
    left: BuiltSupport = GIRDER,
    right: BuiltSupport = GIRDER,
    b_w: float = 380.0,
) -> BeamOutline:
    """Return a beam of the gallery: T of 380 x 620, slab 140, girders at its ends."""
    count = len(lengths)
    widths = {"T": 2300.0, "L": 1100.0, "rectangular": b_w}[shape]
    return BeamOutline(
        shape,  # type: ignore[arg-type]
        lengths,
        depths or (620.0,) * count,
        (widths,) * count,
        (left, *[COLUMN] * (count - 1), right),
        b_w,
        0.0 if shape == "rectangular" else 140.0,
        30.0,
    )


def detailing(beam: BeamOutline, *, closed: bool = False, legs: int = 2) -> Detailing:
    """Return bars for a beam of ordinary spans: cut bars, hooks at the ends, stirrup zones."""
    bars: list[BarRun] = []
    axes, last = beam.axes, len(beam.lengths)
    low, high = beam.ends[0] + 50.0, beam.ends[1] - 50.0
    for span, length in enumerate(beam.lengths, start=1):
        left, right = axes[span - 1], axes[span]
        start = low if span == 1 else left - 300.0
        end = high if span == last else right + 300.0
        bars.append(BarRun("bottom", 1, 3, "25M", start, end, serves=f"span {span}"))
        bars.append(
            BarRun("bottom", 1, 2, "25M", left + 900.0, right - 900.0, serves=f"span {span}")
        )
        if length > 8000.0:
            bars.append(
                BarRun("bottom", 2, 2, "20M", left + 2000.0, right - 2000.0, serves=f"span {span}")
            )
    for support in range(2, last + 1):
        at = axes[support - 1]
        reach = 0.3 * min(beam.lengths[support - 2 : support])
        name = f"support {support}"
        bars += [
            BarRun("top", 1, 3, "25M", at - reach, at + reach, serves=name),
            BarRun("top", 1, 4, "15M", at - reach, at + reach, "overhang", serves=name),
            BarRun("top", 2, 2, "25M", at - 0.6 * reach, at + 0.6 * reach, serves=name),
        ]
    bars += [
        BarRun("top", 1, 3, "20M", low, low + 1700.0, hook_start="90", serves="support 1"),
        BarRun(
            "top", 1, 3, "20M", high - 1700.0, high, hook_end="90", serves=f"support {last + 1}"
        ),
    ]
    return Detailing(tuple(bars), _zones(beam, closed=closed, legs=legs))


def _zones(beam: BeamOutline, *, closed: bool, legs: int) -> tuple[StirrupZone, ...]:
    """Three zones a span: 125 near the supports, 250 between, the first 50 from the face."""
    zones = []
    for span in range(1, len(beam.lengths) + 1):
        start, end = beam.faces(span)
        near = int(0.2 * (end - start) / 125.0)
        first, last = start + 50.0, end - 50.0
        left, right = first + near * 125.0, last - near * 125.0
        between = int((right - left - 1.0) / 250.0)
        slack = (right - left - between * 250.0) / 2
        zones += [
            StirrupZone(span, first, left, near + 1, 125.0, "10M", legs, closed),
            StirrupZone(span, left + slack, right - slack, between + 1, 250.0, "10M", legs, closed),
            StirrupZone(span, right, last, near + 1, 125.0, "10M", legs, closed),
        ]
    return tuple(zones)


def random_beam(seed: int, most_spans: int) -> tuple[BeamOutline, Detailing]:
    """Return a beam of any spans, depths and supports, with bars and hooks anywhere."""
    pick = random.Random(seed)  # noqa: S311 - test data
    count = pick.randint(1, most_spans)
    lengths = tuple(float(pick.randrange(1500, 14000, 50)) for _ in range(count))
    depths = tuple(float(pick.choice((400, 450, 600, 750, 900))) for _ in range(count))

    def support() -> BuiltSupport:
        width = float(pick.choice((0, 200, 300, 450, 600, 900)))
        carriers: tuple[Carrier, ...] = ("column", "girder", "wall")
        return BuiltSupport(width, "simple", pick.choice(carriers))

    beam = outline(lengths, depths=depths)
    ends = [pick.choice((FREE_END, support())) if count > 1 else support() for _ in range(2)]
    beam = replace(beam, supports=(ends[0], *[support() for _ in range(count - 1)], ends[1]))
    given = detailing(beam, closed=pick.random() < 0.5, legs=pick.choice((2, 3, 4)))
    runs = [run for run in given.bars if run.end - run.start > 600.0]
    for _ in range(pick.randint(0, 6)):
        start = pick.uniform(beam.ends[0] + 40.0, beam.ends[1] - 1200.0)
        end = min(beam.ends[1] - 40.0, start + pick.uniform(800.0, 12000.0))
        face: Face = pick.choice(("bottom", "top"))
        hooks: tuple[Hook, ...] = ("", "", "90", "180")
        size = pick.choice(("15M", "20M", "25M", "30M"))
        runs.append(
            BarRun(
                face, pick.choice((1, 2)), pick.randint(1, 4), size, start, end,
                hook_start=pick.choice(hooks), hook_end=pick.choice(hooks),
            )
        )  # fmt: skip
    zones = tuple(zone for zone in given.stirrups if zone.end > zone.start)
    return beam, Detailing(tuple(runs), zones)
