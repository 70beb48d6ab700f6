"""Section, strains and stress block side by side on one depth axis (lengths in mm)."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from lineproof.beams.figure_section import bars
from lineproof.beams.figure_section_concrete import Shown, choose_scale, outline
from lineproof.beams.section_shape import BarRow, SectionShape
from lineproof.drawing import (
    LIGHT,
    MEDIUM,
    TEXT_SIZE,
    THIN,
    Arrow,
    Dimension,
    Figure,
    Line,
    Point,
    Polyline,
    Runs,
    Shape,
    Text,
    symbol,
    words,
)
from lineproof.drawing.axes import spread
from lineproof.drawing.metrics import text_width

TALLEST = 50.0
SECTION_WIDTH = 48.0
STRAIN_WIDTH = 22.0
BLOCK_WIDTH = 12.0
ARROW = 7.0
ARM_PITCH = 7.5
STRESS_LABEL: Runs = (
    *symbol("α", "1"),
    ("\u2009", "roman"),
    *symbol("φ", "c"),
    ("\u2009", "roman"),
    *symbol("f", "c", "′"),
)


@dataclass(frozen=True, slots=True)
class Force:
    """A resultant: its printed label, its depth below the top face in mm, the name of its arm.

    ``arm`` names the distance to the tension steel and is empty for the tension itself.
    """

    label: Runs
    depth: float
    arm: Runs = ()


@dataclass(frozen=True, slots=True)
class StressState:
    """Depths in mm and strains at the resistance of a section."""

    d: float
    c: float
    a: float
    top_strain: float
    steel_strain: float
    steel_strain_printed: str


def strain_stress_figure(
    shape: SectionShape,
    state: StressState,
    *,
    compression: Sequence[Force],
    tension: Force,
    rows: Sequence[BarRow] = (),
    edge: float = 50.0,
) -> Figure:
    """Draw section with compression zone, strain diagram and stress block.

    ``compression`` holds one force, or more where the block reaches into the web (flange and web
    apart) or bars act in compression. ``edge`` is cover plus stirrup diameter, for the place of
    the bars.
    """
    shown = choose_scale(shape, SECTION_WIDTH, TALLEST)
    unit = 1.0 / shown.scale
    strain_x = shape.b_w + shown.right + 19.0 * unit
    stress_x = strain_x + (STRAIN_WIDTH + 20.0) * unit
    shapes: list[Shape] = [_zone(shape, shown, state.a), *outline(shape, shown)]
    shapes.extend(bars(shape, rows, edge))
    shapes.extend(_levels(shape, shown, state, stress_x))
    shapes.extend(_strains(shape, state, strain_x, unit))
    shapes.extend(_stresses(shape, state, stress_x, unit))
    shapes.extend(_forces(shape, [*compression, tension], stress_x, unit, state.d))
    left = 4.0 + shown.left * shown.scale
    width = left + stress_x * shown.scale + BLOCK_WIDTH + _arms_start((*compression, tension))
    width += ARM_PITCH * len(compression)
    shapes.extend(_titles(shape, shown, (strain_x, stress_x), shortened=shown.shortened))
    return Figure(
        round(width, 1),
        round(shape.h * shown.scale + 18.5, 1),
        shown.scale,
        (round(left, 3), 10.5),
        tuple(shapes),
        _alt(state),
        "Strains and stresses at the resistance",
    )


def _zone(shape: SectionShape, shown: Shown, a: float) -> Polyline:
    """Hatch the concrete in compression: the top ``a`` mm of the drawn section."""
    b, h = shape.b_w, shape.h
    low = h - a
    if shape.kind == "rectangle" or a <= shape.h_f:
        x0, x1 = -shown.left, b + shown.right
        corners: tuple[Point, ...] = ((x0, low), (x1, low), (x1, h), (x0, h))
    else:
        soffit = h - shape.h_f
        x0, x1 = -shown.left, b + shown.right
        corners = (
            *((0.0, low), (b, low), (b, soffit), (x1, soffit)),
            *((x1, h), (x0, h), (x0, soffit), (0.0, soffit)),
        )
    return Polyline(corners, weight=0.0, closed=True, fill="hatch")


def _levels(shape: SectionShape, shown: Shown, state: StressState, stress_x: float) -> list[Shape]:
    """Thin lines that carry the top face and the steel level across the panels."""
    gap = 1.5 / shown.scale
    start = shape.b_w + shown.right + gap
    end = stress_x + BLOCK_WIDTH / shown.scale
    y = shape.h - state.d
    return [
        Line((start, shape.h), (stress_x - gap, shape.h), "centre", THIN, "chain"),
        Line((shape.b_w + gap, y), (end, y), "centre", THIN, "chain"),
    ]


def _strains(shape: SectionShape, state: StressState, x: float, unit: float) -> list[Shape]:
    """Draw the straight strain line to one scale: compression to the left, tension right."""
    per_strain = STRAIN_WIDTH * unit / (state.top_strain + state.steel_strain)
    zero = x + state.top_strain * per_strain
    top, axis, steel = shape.h, shape.h - state.c, shape.h - state.d
    left, right = zero - state.top_strain * per_strain, zero + state.steel_strain * per_strain
    shapes: list[Shape] = [
        Polyline(((zero, top), (left, top), (zero, axis)), "curve", MEDIUM, closed=True),
        Polyline(((zero, axis), (right, steel), (zero, steel)), "curve", MEDIUM, closed=True),
        Dimension((left, top), (zero, axis), "vertical", -6.0, symbol("c")),
        Text((left, top + 3.2 * unit), _strain(symbol("ε", "cu"), f"{state.top_strain:g}")),
        Text(
            ((zero + right) / 2, steel - 3.4 * unit),
            _strain(symbol("ε", "s"), state.steel_strain_printed),
        ),
    ]
    return shapes


def _strain(name: Runs, value: str) -> Runs:
    return (*name, (f" = {value}", "roman"))


def _stresses(shape: SectionShape, state: StressState, x: float, unit: float) -> list[Shape]:
    top, low, right = shape.h, shape.h - state.a, x + BLOCK_WIDTH * unit
    block = ((x, low), (right, low), (right, top), (x, top))
    return [
        Polyline(block, "curve", MEDIUM, closed=True, fill="hatch"),
        Line((x, low), (x, shape.h - state.d), "curve", LIGHT),
        Dimension((x, top), (x, low), "vertical", -6.0, symbol("a")),
        Text(((x + right) / 2, top + 3.2 * unit), STRESS_LABEL),
    ]


def _forces(
    shape: SectionShape, forces: Sequence[Force], x: float, unit: float, d: float
) -> list[Shape]:
    """Draw compression towards the block, tension away from it, and the arm of each."""
    edge = x + BLOCK_WIDTH * unit
    heights = [shape.h - force.depth for force in forces]
    texts = spread(heights, 4.6 * unit, -4.0 * unit, shape.h + 1.0 * unit)
    shapes: list[Shape] = []
    arm = _arms_start(forces)
    for force, y, text_y in zip(forces, heights, texts, strict=True):
        if force.arm:
            shapes.append(Arrow((edge + ARROW * unit, y), (edge, y), "loads", MEDIUM, 2.0))
        else:
            shapes.append(Arrow((x, y), (edge + ARROW * unit, y), "loads", MEDIUM, 2.0))
        shapes.append(
            Text((edge + (ARROW + 1.2) * unit, text_y), force.label, "loads", anchor="start")
        )
    for force, y in zip(forces, heights, strict=True):
        if force.arm:
            far = edge + arm * unit
            length = y - (shape.h - d)
            named = text_width((*force.arm, (" = 0000", "roman")), TEXT_SIZE) < length / unit
            arm_name = force.arm if named else ()
            shapes.append(Dimension((far, y), (far, shape.h - d), "vertical", 4.0, arm_name))
            arm += ARM_PITCH
    return shapes


def _arms_start(forces: Sequence[Force]) -> float:
    """Distance from the block to the first arm, past the longest label, mm on paper."""
    return ARROW + 2.5 + max(text_width(force.label, TEXT_SIZE) for force in forces)


def _titles(
    shape: SectionShape, shown: Shown, panels: tuple[float, float], *, shortened: bool
) -> list[Shape]:
    unit = 1.0 / shown.scale
    y = -7.0 * unit
    section = "section (flange shortened)" if shortened else "section"
    middle = (shape.b_w + shown.right - shown.left) / 2
    return [
        Text((middle, y), words(section), size=2.6),
        Text((panels[0] + STRAIN_WIDTH / 2 * unit, y), words("strains"), size=2.6),
        Text((panels[1] + BLOCK_WIDTH / 2 * unit, y), words("stress block and forces"), size=2.6),
    ]


def _alt(state: StressState) -> str:
    return (
        f"Neutral axis {state.c:.1f} mm below the top face, strain {state.top_strain:g} in the "
        f"concrete at the top and {state.steel_strain_printed} in the steel at {state.d:.0f} mm; "
        f"rectangular stress block {state.a:.1f} mm deep."
    )
