"""Bars chosen: by brute force over every layout, none earlier in the stated order passes.

The order: few sizes, then few layers, then least mass, then thin bars. The layouts and their
order are written here again; each is typed in as given bars and runs the whole calculation.
"""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.beams.choice import top_candidates
from lineproof.errors import UserError
from lineproof.record import Record

from .gallery import EDGE, RECTANGULAR, bars_of, number, record_of, run, start

SIZES = {"15M": (16.0, 200), "20M": (19.5, 300), "25M": (25.2, 500), "30M": (29.9, 700),
         "35M": (35.7, 1000)}  # fmt: skip
BEAMS: dict[str, dict[str, Any]] = {
    "gallery": {},
    "rectangular": dict(RECTANGULAR),
    "edge": dict(EDGE),
    # one layer holds at most 3-35M: 2 x (49.98 + 35.7) = 171.4 of the 172.4 mm between corner bars
    "two layers": {"b_w": "300 mm", "span": "10.5 m"},
    "exterior": {"exposure": "F-2", "cover": "40 mm", "grade": "500R"},
    "by cracking": {"span": "4.5 m", "minimum_rule": "10.5.1.1", "use": "office"},
    "shallow": {**RECTANGULAR, "span": "6 m", "h": "450 mm"},
}
MIDSPAN = ("bars", "cover", "required-steel", "flexure", "minimum-steel", "crack-control")
CALLS = ("loads", "section", "bars", "flexure", "minimum_steel", "crack_control")

Layout = tuple[tuple[int, str], ...]


def layouts() -> list[Layout]:
    """Return all layouts of one layer, or of two with no thicker bars above, in line.

    Bars above stand over the outer bars, as many at the left as at the right; an odd one needs
    the middle bar of an odd layer below.
    """
    found: list[Layout] = []
    for size, (diameter, _) in SIZES.items():
        for n in range(2, 13):
            found.append(((n, size),))
            found += [
                ((n, size), (m, upper))
                for upper, (other, _) in SIZES.items()
                for m in range(2, n + 1)
                if other <= diameter and not (m % 2 == 1 and n % 2 == 0)
            ]
    return found


def area(layout: Layout) -> float:
    """Return the area of the bars [mm2]; their mass goes with it."""
    return sum(n * SIZES[size][1] for n, size in layout)


def place(layout: Layout) -> tuple[int, int, float, int]:
    """Return the place in the stated order."""
    return (
        len({size for _, size in layout}), len(layout), area(layout), -sum(n for n, _ in layout)
    )  # fmt: skip


def passes(changes: dict[str, Any], layout: Layout) -> bool:
    """Tell whether the layout, typed in, fits and fails no check at midspan."""
    text = " / ".join(f"{n}-{size}" for n, size in layout)
    try:
        sheet = run(start(**changes, bottom_bars=text), CALLS)
    except UserError:
        return False
    entries = [e for key in MIDSPAN for e in sheet.entries_of(key).values()]
    return all(bool(entry) for entry in entries if entry.kind == "check")


def layout_of(record: Record) -> Layout:
    """Return the bars chosen."""
    groups = [group.split("-") for group in bars_of(record).split(" / ")]
    return tuple((int(number), size) for number, size in groups)


@pytest.mark.parametrize("name", BEAMS)
def test_no_earlier_layout_passes(name: str) -> None:
    """Brute force; layouts too small for M_f with a lever arm of h are left out by hand."""
    changes = BEAMS[name]
    record = record_of(**changes)
    chosen = layout_of(record)
    assert chosen in layouts()
    assert record.failed == []
    assert passes(changes, chosen)
    f_y, h = number(record, "materials/f_y"), number(record, "given/h")
    least = number(record, "loads/M_f") * 1e6 / (0.85 * f_y * h)
    earlier = [x for x in layouts() if place(x) < place(chosen) and area(x) >= least]
    assert [x for x in earlier if passes(changes, x)] == []


@pytest.mark.parametrize("name", BEAMS)
def test_bars_fit(name: str) -> None:
    """Corner bars in the bend of the 10M stirrup (radius 22.5 mm), clear distance by A23.1."""
    record = record_of(**BEAMS[name])
    b_w, cover = number(record, "given/b_w"), number(record, "given/c_c")
    for n, size in layout_of(record):
        d_b = SIZES[size][0]
        between = b_w - 2 * (cover + 11.3 + max(22.5, d_b / 2))
        assert between / (n - 1) - d_b >= max(1.4 * d_b, 1.4 * 20, 30)


def test_brute_force_meets_layers_and_order() -> None:
    """The beams above make the choice meet one layer and two."""
    assert {len(layout_of(record_of(**changes))) for changes in BEAMS.values()} == {1, 2}
    assert place(((4, "25M"),)) < place(((2, "35M"),))
    assert place(((3, "20M"), (2, "20M"))) < place(((2, "25M"), (2, "15M")))
    assert place(((5, "20M"),)) < place(((3, "20M"), (2, "20M")))
    # 4000 mm2 in one layer before 1500 mm2 in two
    assert place(((8, "25M"),)) < place(((3, "20M"), (2, "20M")))


def test_what_stopped_the_choice_is_said() -> None:
    """A span far too long: the sentence names the input, the checks that stopped, the remedy."""
    with pytest.raises(UserError) as caught:
        record_of(span="14 m")
    text = str(caught.value)
    assert text.startswith("bottom_bars: no bars pass every check; stopped by: Bars fit into")
    assert text.endswith("; change the inputs that these rest on, such as h, b_w, h_f or cover")


def test_choice_does_not_rest_on_an_earlier_run() -> None:
    """Top bars given too weak fail a check; the bottom bars chosen again are the same."""
    beam = start(top_bars="2-10M", ends="cast with a column")
    calls = ["loads", "section", "bars", "balanced", "flexure", "second_path", "minimum_steel",
             "crack_control", "top_steel", "summary"]  # fmt: skip
    run(beam, calls)
    first = bars_of(beam.sheet.close())
    run(beam, calls)
    assert bars_of(beam.sheet.close()) == first == "4-25M"


@pytest.mark.parametrize("sides", [1, 2])
def test_top_candidates_by_mass(sides: int) -> None:
    """Web bars and the bars of one overhang or two, 212.8 mm2 in each: least mass first."""
    made = [
        (web.number * SIZES[web.size][1], overhang * SIZES[web.size][1])
        for web, overhang in top_candidates(212.8, sides)
    ]
    assert all(each >= 212.8 for _, each in made)
    masses = [web + sides * each for web, each in made]
    assert masses == sorted(masses)
    # 2-15M in the web: 400 + 400 beside it on one side; on two sides 400 + 800
    assert masses[0] == (800 if sides == 1 else 1200)
