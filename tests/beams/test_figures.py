"""Figures of a beam: true to scale, complete, nothing outside the paper, no colliding texts."""

from __future__ import annotations

from itertools import combinations, pairwise, product
from typing import Any

import pytest
import typst
from tests.drawing.extent import extent

from lineproof.beams.figures import (
    BarRow,
    Force,
    MomentLevel,
    SectionShape,
    StressState,
    UniformLoad,
    capacity_figure,
    loading_figure,
    section_figure,
    strain_stress_figure,
    stress_strain_figure,
)
from lineproof.drawing import (
    Arrow,
    Circle,
    Dimension,
    Figure,
    Line,
    Point,
    Polyline,
    Runs,
    Text,
    from_json,
    svg,
    symbol,
    to_json,
    words,
)
from lineproof.drawing.paper import PaperShape, Placed, lower

# a floor beam: 25M bars of 25.2 mm in 10M stirrups of 11.3 mm, 40 mm cover
T_BEAM = SectionShape("T", 380.0, 620.0, 3040.0, 140.0)
SMALL_T = SectionShape("T", 300.0, 450.0, 900.0, 120.0)
L_BEAM = SectionShape("L", 380.0, 620.0, 1100.0, 140.0)
RECTANGLE = SectionShape("rectangle", 380.0, 620.0)
EDGE = 40.0 + 11.3
ONE_ROW = (BarRow(5, 25.2, 556.1, "5-25M"),)
TWO_ROWS = (BarRow(4, 25.2, 556.1, "4-25M"), BarRow(2, 25.2, 505.7, "2-25M"))
TOP = (BarRow(2, 16.0, 59.3, "2-15M"),)
SOLID = frozenset({"concrete", "bars", "stirrups", "dimensions"})
MINUS_HALF_A: Runs = (("d", "italic"), (" − ", "roman"), ("a", "italic"), ("/2", "roman"))


def named(name: Runs, value: str) -> Runs:
    """Return a label such as M_r = 795 kN·m."""
    return (*name, (f" = {value}", "roman"))


def section(shape: SectionShape = T_BEAM, **changes: Any) -> Figure:
    """Return the section of the floor beam with some things changed."""
    options: dict[str, Any] = {
        "d": shape.h - 63.9,
        "cover": 40.0,
        "stirrup_diameter": 11.3,
        "stirrup_label": "10M stirrups",
        "bottom": ONE_ROW if shape.h == 620.0 else (BarRow(3, 19.5, shape.h - 61.1, "3-20M"),),
        "top": TOP,
    }
    return section_figure(shape, **(options | changes))


def loading(count: int = 3, **changes: Any) -> Figure:
    """Return the loading of the floor beam."""
    loads = [UniformLoad(f"load {n}", 10.0 * n, f"{10 * n}.0 kN/m") for n in range(1, count + 1)]
    options: dict[str, Any] = {
        "reactions": (named(symbol("R", "f"), "352 kN"), named(symbol("R", "f"), "352 kN")),
        "note": "Tributary width 7.8 m.",
        "moment": named(symbol("M", "f"), "669 kN·m"),
    }
    return loading_figure(7600.0, loads, **(options | changes))


def stresses(shape: SectionShape = T_BEAM, a: float = 26.1, d: float = 556.1) -> Figure:
    """Return strains and stresses; two compression forces once the block passes the flange."""
    c = a / 0.9
    steel = 0.0035 * (d - c) / c
    state = StressState(d, c, a, 0.0035, steel, f"{steel:.4f}")
    compression = [Force(named(symbol("C", "w"), "1380 kN"), a / 2, MINUS_HALF_A)]
    if shape.kind != "rectangle" and a > shape.h_f:
        arm: Runs = (("d", "italic"), (" − ", "roman"), *symbol("h", "f"), ("/2", "roman"))
        flange = Force(named(symbol("C", "f"), "1140 kN"), shape.h_f / 2, arm)
        compression.insert(0, flange)
    tension = Force(named(symbol("T", "r"), "2520 kN"), d)
    rows = (BarRow(5, 25.2, d, "5-25M"),)
    return strain_stress_figure(
        shape, state, compression=compression, tension=tension, rows=rows, edge=EDGE
    )


def curve_point(ratio: float) -> Point:
    """Return a point of a made-up concave curve."""
    return (ratio, 2600.0 * ratio * (1.0 - 0.42 * ratio))


def capacity(ratio: float = 0.19, factored: float = 0.9, last: float = 1.0) -> Figure:
    """Return the capacity curve with the chosen steel at ``ratio`` of the balanced steel."""
    chosen = curve_point(ratio)
    return capacity_figure(
        [curve_point(last * number / 50) for number in range(51)],
        chosen,
        (*words("5-25M, "), *named(symbol("M", "r"), "748 kN·m")),
        [
            MomentLevel(factored * chosen[1], named(symbol("M", "f"), "700 kN·m"), "M_f", "long"),
            MomentLevel(0.2 * chosen[1], named(symbol("M", "cr"), "212 kN·m"), "M_cr", "dotted"),
        ],
    )


def concrete_curve() -> Figure:
    """Return a parabola that peaks at 28.8 MPa and two thousandths."""
    points = [(n / 20, 28.8 * (n / 20 - (n / 40) ** 2)) for n in range(61)]
    return stress_strain_figure(
        points, peak=(2.0, 28.8), peak_label=named(symbol("f", "c", "′"), "28.8 MPa")
    )


FIGURES = {
    "T": section(),
    "T two rows": section(bottom=TWO_ROWS, d=542.0),
    "small T": section(SMALL_T),
    "L": section(L_BEAM, bottom=TWO_ROWS, d=542.0),
    "rectangle": section(RECTANGLE),
    "loading": loading(),
    "one load": loading(1, moment=(), reactions=((), ()), note=""),
    "block in flange": stresses(),
    "block in web": stresses(SectionShape("T", 380.0, 620.0, 900.0, 140.0), 232.0),
    "rectangle stresses": stresses(RECTANGLE, 232.0),
    "capacity": capacity(),
    "concrete": concrete_curve(),
}


def plain(shape: Text | Dimension) -> str:
    """Return the words of a text or dimension."""
    return "".join(text for text, _ in shape.runs)


def words_of(figure: Figure) -> list[str]:
    """Return the words of all texts and dimensions, in their order."""
    return [plain(s) for s in figure.shapes if isinstance(s, (Text, Dimension))]


def bars_of(figure: Figure) -> list[Circle]:
    """Return the circles on the bars layer."""
    return [s for s in figure.shapes if isinstance(s, Circle) and s.layer == "bars"]


def box(text: Placed, margin: float) -> tuple[float, float, float, float]:
    """Return left, bottom, right, top of a text on paper, grown by a margin."""
    xs, ys = zip(*text.corners, strict=True)
    return min(xs) - margin, min(ys) - margin, max(xs) + margin, max(ys) + margin


def colliding(figure: Figure, layers: frozenset[str]) -> list[tuple[str, str]]:
    """Return pairs of texts that touch and texts crossed by a stroke of the layers."""
    drawn, texts = lower(figure)
    found = []
    for one, two in combinations(texts, 2):
        a, b = box(one, 0.2), box(two, 0.2)
        if a[0] < b[2] and b[0] < a[2] and a[1] < b[3] and b[1] < a[3]:
            found.append((plain(one.text), plain(two.text)))
    for text, shape in product(texts, drawn):
        if shape.layer in layers and any(
            crosses(box(text, 0.0), start, end) for start, end in segments(shape)
        ):
            found.append((plain(text.text), shape.layer))
    return found


def segments(shape: PaperShape) -> list[tuple[Point, Point]]:
    """Return straight pieces of a drawn shape (a circle as its two diameters)."""
    if isinstance(shape, Line):
        return [(shape.start, shape.end)]
    if isinstance(shape, Polyline):
        return list(pairwise((*shape.points, shape.points[0]) if shape.closed else shape.points))
    (x, y), radius = shape.centre, shape.radius
    return [((x - radius, y), (x + radius, y)), ((x, y - radius), (x, y + radius))]


def crosses(field: tuple[float, float, float, float], start: Point, end: Point) -> bool:
    """Clip the segment to the field; something left means it crosses (Liang and Barsky 1984)."""
    low, high = 0.0, 1.0
    for axis in (0, 1):
        way = end[axis] - start[axis]
        for edge, sign in ((field[axis], -1.0), (field[axis + 2], 1.0)):
            room, step = sign * (edge - start[axis]), sign * way
            if step == 0.0:
                if room < 0.0:
                    return False
            elif step > 0.0:
                high = min(high, room / step)
            else:
                low = max(low, room / step)
    return low < high


def assert_fit_to_print(figure: Figure, layers: frozenset[str] = SOLID) -> None:
    """Everything on the field of paper, the field on a page, no collisions."""
    left, bottom, right, top = extent(figure)

    assert left >= 0.0
    assert bottom >= 0.0
    assert right <= figure.width <= 165.0
    assert top <= figure.height <= 85.0
    assert colliding(figure, layers) == []


@pytest.mark.parametrize("name", FIGURES)
def test_figure_is_fit_to_print(name: str) -> None:
    """Each figure of the floor beam stays on its paper and has no colliding texts."""
    assert_fit_to_print(FIGURES[name])


@pytest.mark.parametrize("name", FIGURES)
def test_figure_survives_the_record(name: str) -> None:
    """Written to plain data and read back, a figure draws the same bytes."""
    figure = FIGURES[name]

    assert svg(from_json(to_json(figure))) == svg(figure)
    assert figure.alt.endswith(".")
    assert all(2.6 <= s.size <= 3.0 for s in figure.shapes if isinstance(s, (Text, Dimension)))


def test_all_figures_compile_to_an_archival_pdf() -> None:
    """No glyph is missing from the bundled fonts: the PDF/UA gate would refuse it."""
    source = '#set document(title: "t")\n#set text(lang: "en")\n' + "".join(
        f'#image(bytes(sys.inputs.at("{name}")), format: "svg", alt: "a figure")\n'
        for name in FIGURES
    )
    pdf = typst.compile(
        source.encode(),
        sys_inputs={name: svg(figure) for name, figure in FIGURES.items()},
        font_paths=typst.Fonts(include_system_fonts=False),
        pdf_standards=["a-3a", "ua-1"],
    )

    assert pdf.startswith(b"%PDF")


@pytest.mark.parametrize(
    ("kind", "b_w", "h"),
    [*product(["rectangle", "T", "L"], [250.0, 380.0, 600.0], [350.0, 1200.0])],
)
def test_sections_of_any_proportion(kind: Any, b_w: float, h: float) -> None:
    """Narrow, wide, shallow and deep sections with thin and thick, short and long flanges fit."""
    rows = (BarRow(4, 25.2, h - 63.9, "4-25M"), BarRow(2, 25.2, h - 114.3, "2-25M"))
    for h_f, b_f in product([90.0, 140.0], [700.0, 1500.0, 3040.0]):
        shape = SectionShape(kind, b_w, h, b_f, h_f)
        label = "10M stirrups at 250"
        figure = section(shape, bottom=rows, stirrup_label=label)
        assert_fit_to_print(figure)
        for a in (12.0, 0.35 * h):
            d = h - 64.0
            assert_fit_to_print(stresses(shape, a, d), frozenset({"concrete", "bars"}))


@pytest.mark.parametrize("shape", [T_BEAM, SMALL_T, L_BEAM, RECTANGLE])
def test_bars_are_true_in_place_and_size(shape: SectionShape) -> None:
    """On paper a bar is d_b times the scale across; outer bars touch the stirrup, none overlap."""
    figure = section(shape)
    drawn, _ = lower(figure)
    low = [c for c in drawn if isinstance(c, Circle) and c.layer == "bars"]
    row = ONE_ROW[0] if shape.h == 620.0 else BarRow(3, 19.5, shape.h - 61.1, "3-20M")
    bottom = [c for c in bars_of(figure) if c.radius == pytest.approx(row.diameter / 2)]

    assert 2 * low[0].radius == pytest.approx(row.diameter * figure.scale)
    assert len(bottom) == row.count
    assert {round(shape.h - c.centre[1], 6) for c in bottom} == {row.depth}
    # cover 40 + stirrup 11.3 + half a bar from either face
    first = EDGE + row.diameter / 2
    assert bottom[0].centre[0] == pytest.approx(first)
    assert bottom[-1].centre[0] == pytest.approx(shape.b_w - first)
    assert all(two.centre[0] - one.centre[0] > row.diameter for one, two in pairwise(bottom))


def test_second_row_stands_above_the_outer_bars() -> None:
    """Two bars over four stand in line with the corner bars."""
    bars = bars_of(section(bottom=TWO_ROWS))
    first, second = bars[:4], bars[4:6]

    assert [c.centre[0] for c in second] == [first[0].centre[0], first[3].centre[0]]
    assert second[0].centre[1] == pytest.approx(620.0 - 505.7)


@pytest.mark.parametrize(
    ("count", "outer", "expected"),
    [(1, 4, [190.0]), (2, 5, [100.0, 280.0]), (3, 5, [100.0, 190.0, 280.0]),
     (3, 4, [100.0, 190.0, 280.0])],
)  # fmt: skip
def test_bars_of_an_upper_row(count: int, outer: int, expected: list[float]) -> None:
    """Upper bars use places of the lower row where symmetry allows, else even spaces."""
    rows = (BarRow(outer, 20.0, 556.0, "a"), BarRow(count, 20.0, 510.0, "b"))
    figure = section(RECTANGLE, bottom=rows, cover=80.0, stirrup_diameter=10.0, top=())

    assert [c.centre[0] for c in bars_of(figure)[outer:]] == pytest.approx(expected)


def test_outline_is_true_to_scale() -> None:
    """The corners of a T drawn whole are those of the section."""
    outline = section(SMALL_T).shapes[0]

    assert isinstance(outline, Polyline)
    assert outline.points == (
        *((0.0, 0.0), (300.0, 0.0), (300.0, 330.0), (600.0, 330.0)),
        *((600.0, 450.0), (-300.0, 450.0), (-300.0, 330.0), (0.0, 330.0)),
    )


@pytest.mark.parametrize("shape", [SMALL_T, L_BEAM, RECTANGLE])
def test_dimensions_measure_what_they_print(shape: SectionShape) -> None:
    """Drawn to scale, no dimension carries a typed value, and each prints its length."""
    dimensions = [s for s in section(shape).shapes if isinstance(s, Dimension)]
    expected = {"bw": shape.b_w, "h": shape.h, "d": shape.h - 63.9, "cover": 40.0}
    if shape.kind != "rectangle":
        expected |= {"bf": shape.b_f, "hf": shape.h_f}
    found = {"".join(text for text, _ in s.symbol): s for s in dimensions}

    assert {name: s.measured for name, s in found.items()} == pytest.approx(expected)
    assert not any(s.value for s in dimensions)
    assert all(plain(s).endswith(f"{s.measured:.0f}") for s in dimensions)


def test_wide_flange_is_cut_and_said_so() -> None:
    """A flange too wide for the page has break lines, its true width in print, and a note."""
    figure = section()
    (width,) = [s for s in figure.shapes if isinstance(s, Dimension) and s.value]

    assert plain(width) == "bf = 3040"
    assert width.measured < 3040.0
    assert "flange shortened" in words_of(figure)[-1]
    assert "flange 3040 mm wide and 140 mm thick" in figure.alt
    assert "shortened" not in words_of(section(SMALL_T))[-1]


def test_section_names_its_steel() -> None:
    """Every row and the stirrups are called out, by arrows that end at the steel."""
    figure = section(bottom=TWO_ROWS)

    assert {"4-25M", "2-25M", "2-15M", "10M stirrups"} <= set(words_of(figure))
    arrows = [s for s in figure.shapes if isinstance(s, Arrow)]
    assert {round(s.end[1], 1) for s in arrows} == {63.9, 114.3, 248.0, 560.7}


def test_section_without_stirrup_or_steel() -> None:
    """Plain concrete draws as outline and dimensions only."""
    figure = section(RECTANGLE, bottom=(), top=(), stirrup_diameter=0.0, stirrup_label="")

    assert not bars_of(figure)
    assert not [s for s in figure.shapes if s.layer == "stirrups"]


def test_loading_span_is_to_scale() -> None:
    """The span dimension measures the span, and supports and reactions stand at its ends."""
    figure = FIGURES["loading"]
    (span,) = [s for s in figure.shapes if isinstance(s, Dimension)]
    reactions = [s for s in figure.shapes if isinstance(s, Arrow) and s.end[1] > s.start[1]]

    assert (span.measured, span.value) == (7600.0, "7600 mm")
    assert [s.end[0] for s in reactions] == [0.0, 7600.0]
    assert {"load 3  30.0 kN/m", "Rf = 352 kN", "Tributary width 7.8 m."} <= set(words_of(figure))


def test_loads_are_stacked_without_gap() -> None:
    """Each load stands on the one before, a greater load higher, and its arrows reach its foot."""
    bands = [s for s in loading().shapes if isinstance(s, Polyline) and s.layer == "loads"][:3]
    feet = [s.points[0][1] for s in bands]
    heads = [s.points[2][1] for s in bands]
    heights = [head - foot for head, foot in zip(heads, feet, strict=True)]

    assert heads[:2] == feet[1:]
    assert heights == sorted(heights)
    arrows = [s for s in loading().shapes if isinstance(s, Arrow) and s.end[1] < s.start[1]]
    assert {s.end[1] for s in arrows} == set(feet)


def test_moment_is_a_parabola() -> None:
    """The moment line is zero at the supports and at three quarters of its top at the quarter."""
    (moment,) = [s for s in loading().shapes if isinstance(s, Polyline) and s.fill == "hatch"]
    base = moment.points[0][1]
    at = {x: y - base for x, y in moment.points}

    # M = 4 M_max x/l (1 - x/l): 3/4 at a quarter of the span
    assert at[7600.0] == pytest.approx(0.0)
    assert at[1900.0] == pytest.approx(0.75 * at[3800.0])
    assert max(at.values()) == at[3800.0]


@pytest.mark.parametrize("count", range(1, 7))
def test_many_loads_fit(count: int) -> None:
    """One load or six: the figure stays printable."""
    assert_fit_to_print(loading(count), frozenset({"concrete", "dimensions"}))


def test_strains_are_straight() -> None:
    """The strain line passes zero at c: both triangles have one slope."""
    figure = stresses()
    above, below = [
        s for s in figure.shapes if isinstance(s, Polyline) and s.layer == "curve" and s.closed
    ][:2]
    (zero, top), (left, _), (_, axis) = above.points
    (_, _), (right, steel), _ = below.points
    c = 26.1 / 0.9

    assert top - axis == pytest.approx(c)
    assert top - steel == pytest.approx(556.1)
    assert (zero - left) / c == pytest.approx((right - zero) / (556.1 - c))


@pytest.mark.parametrize(
    ("shape", "a"), [(T_BEAM, 26.1), (T_BEAM, 232.0), (RECTANGLE, 232.0), (L_BEAM, 232.0)]
)
def test_compression_zone_is_hatched_to_a(shape: SectionShape, a: float) -> None:
    """The hatched part of the section ends a below the top, and has web and flange."""
    zone = stresses(shape, a).shapes[0]

    assert isinstance(zone, Polyline)
    assert zone.fill == "hatch"
    assert min(y for _, y in zone.points) == pytest.approx(shape.h - a)
    assert max(y for _, y in zone.points) == shape.h
    if a > shape.h_f > 0.0:
        assert {(0.0, shape.h - a), (380.0, shape.h - 140.0)} <= set(zone.points)


def test_forces_stand_at_their_depths() -> None:
    """Compression at h_f/2 and a/2, tension at d, and the arms measure the distances between."""
    figure = FIGURES["block in web"]
    arrows = [s for s in figure.shapes if isinstance(s, Arrow)]
    arms = [s for s in figure.shapes if isinstance(s, Dimension) and "−" in plain(s)]

    assert [620.0 - s.end[1] for s in arrows] == pytest.approx([70.0, 116.0, 556.1])
    assert [s.end[0] < s.start[0] for s in arrows] == [True, True, False]
    # 556.1 - 70 = 486.1 and 556.1 - 116 = 440.1
    assert [plain(s) for s in arms] == ["d − hf/2 = 486", "d − a/2 = 440"]


def test_capacity_marks_the_chosen_steel() -> None:
    """The dot of the chosen steel lies on the drawn curve, with lines to both axes."""
    figure = capacity(0.5)
    (path,) = [s for s in figure.shapes if isinstance(s, Polyline) and s.layer == "curve"]
    (dot,) = [s for s in figure.shapes if isinstance(s, Circle) and s.fill == "black"]

    # 25 of 50 steps: half of the balanced steel
    assert dot.centre == pytest.approx(path.points[25])
    assert "0.500 of the balanced steel" in figure.alt


def test_capacity_tells_lines_apart_without_colour() -> None:
    """Curve, factored moment and cracking moment differ by dashes, and each has its name."""
    figure = capacity()
    dashes = {
        s.dash
        for s in figure.shapes
        if isinstance(s, (Line, Polyline)) and s.layer == "curve" and s.weight >= 0.3
    }

    assert dashes == {"solid", "long", "dotted"}
    assert {"Mr", "Mf = 700 kN·m", "Mcr = 212 kN·m"} <= set(words_of(figure))


def test_capacity_marks_quarters_of_the_balanced_steel() -> None:
    """Open marks stand at 0.25, 0.5, 0.75 and 1.0, those the curve reaches."""
    for last, count in ((1.0, 4), (0.6, 2)):
        shapes = capacity(0.3, last=last).shapes
        assert sum(isinstance(s, Circle) and s.fill == "white" for s in shapes) == count


@pytest.mark.parametrize(
    ("ratio", "factored"), [*product([0.02, 0.1, 0.5, 0.8, 0.97, 1.2], [0.3, 0.97, 1.3])]
)
def test_capacity_label_finds_a_free_place(ratio: float, factored: float) -> None:
    """Wherever the chosen steel lies, its label hides no line and no other label."""
    figure = capacity(ratio, factored, last=1.22)

    assert_fit_to_print(figure, frozenset({"curve"}))


def test_concrete_curve_marks_its_peak() -> None:
    """The dot stands at the top of the curve."""
    figure = concrete_curve()
    (path,) = [s for s in figure.shapes if isinstance(s, Polyline) and s.layer == "curve"]
    (dot,) = [s for s in figure.shapes if isinstance(s, Circle)]

    assert dot.centre[1] == pytest.approx(max(y for _, y in path.points))
