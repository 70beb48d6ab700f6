"""Random complete beams for the seeded errors: their records closed, the same ones every time."""

from __future__ import annotations

from collections.abc import Mapping
from functools import cache
from random import Random
from typing import Any

from tests.beams import gallery
from tests.beams.continuous import flow

from lineproof.audit.graph import Graph
from lineproof.errors import UserError

PAIRS = ("NBC 2015 + A23.3-14", "NBC 2020 + A23.3:19")
SHAPES = ("T", "L", "rectangular")
SINGLE, ONE_SPAN, TWO_SPANS, THREE_SPANS = 225, 50, 18, 7
"""How many beams there are: single floor beams (flexure), and whole beams of 1 to 3 spans."""
BEAMS = SINGLE + ONE_SPAN + TWO_SPANS + THREE_SPANS
_SPANS = (0,) * SINGLE + (1,) * ONE_SPAN + (2,) * TWO_SPANS + (3,) * THREE_SPANS
_TRIES = 60
"""Draws until one is not refused."""


def _section(draw: Random) -> dict[str, Any]:
    """Draw what both kinds of beams have: section, concrete, floor."""
    shape = draw.choice(SHAPES)
    tee = shape != "rectangular"
    return {
        "shape": shape,
        "b_w": f"{draw.randrange(300, 560, 10)} mm",
        "h_f": f"{draw.randint(130, 200)} mm" if tee else None,
        "floor_weight": None if tee else f"{draw.randint(20, 50) / 10} kPa",
        "tributary_width": f"{draw.randint(12, 22) / 10} m" if shape == "L" else None,
        "spacing": f"{draw.randint(22, 42) / 10} m",
        "f_c": f"{draw.randint(25, 45)} MPa",
        "superimposed": f"{draw.randint(2, 36) / 10} kPa",
        "use": draw.choice(["office", "assembly area", "library stack room"]),
        "density": draw.choice(["normal", "normal", "semi-low"]),
        "cover": draw.choice(["30 mm", "40 mm"]),
        "minimum_rule": draw.choice(["10.5.1.1", "10.5.1.2"]),
        "project": {"codes": {"pair": draw.choice(PAIRS)}},
    }


def _single(draw: Random) -> Graph:
    span = draw.randint(40, 95) / 10
    inputs = _section(draw) | {
        "span": f"{span} m",
        "h": f"{round(span * draw.randint(75, 95) / 10) * 10} mm",
        "grade": draw.choice(["400R", "400W", "500R", "500W"]),
        "ends": draw.choice(["free", "cast with a girder", "cast with a column"]),
        # given bars as an existing beam has them: what fails is a check, and no search is needed
        "bottom_bars": draw.choice(["3-25M", "4-20M", "4-25M", "3-30M", "3-25M / 2-20M"]),
    }
    return Graph(gallery.record_of(**inputs))


def _supports(draw: Random, spans: int) -> tuple[list[str], Mapping[int, list[str]]]:
    made, columns = [], {}
    for number in range(1, spans + 2):
        width = draw.choice([300, 400, 450, 600])
        carrier = draw.choice(["column", "girder", "wall"])
        made.append(f"{carrier} {width} mm")
        if carrier == "column" and draw.random() < 0.4:
            columns[number] = [f"{width} mm x 500 mm x {draw.randint(28, 45) / 10} m"]
    return made, columns


def _whole(draw: Random, spans: int) -> Graph:
    lengths = [draw.randint(50, 90) / 10 for _ in range(spans)]
    supports, columns = _supports(draw, spans)
    depth = round(max(lengths) * 100 / draw.randint(11, 14)) * 10
    section = _section(draw)
    grade = draw.choice(["400R", "400W", "500R"])
    tee = section["shape"] != "rectangular"
    inputs = section | {
        "spans": [f"{length} m" for length in lengths],
        "supports": supports,
        "columns": columns or None,
        "h": f"{depth} mm",
        "grade": grade,
        "shear_method": "general" if grade == "500R" else draw.choice(["general", "simplified"]),
        "stirrup_legs": draw.choice([2, 2, 4]) if section["shape"] != "L" else 2,
        "slab_bars": "2 x 10M at 300 mm" if tee else None,
    }
    return Graph(flow.record_of(**inputs))


@cache
def beam(number: int, seed: int = 0) -> Graph:
    """Return one of the random beams, 0 to ``BEAMS - 1``; a refused draw is drawn again.

    Another seed gives other beams.
    """
    spans, said = _SPANS[number], ""
    for attempt in range(_TRIES):
        drawn = 1_000_000 * seed + 1000 * number + attempt
        draw = Random(drawn)  # noqa: S311 - the same beams every time
        try:
            return _whole(draw, spans) if spans else _single(draw)
        except UserError as error:
            said = str(error)
    msg = f"no beam in {_TRIES} draws for number {number}: {said}"
    raise AssertionError(msg)
