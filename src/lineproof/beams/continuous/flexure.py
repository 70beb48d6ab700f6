"""Flexure at every span and both faces of every support, as lines."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from lineproof.beams.bars import TopBars, of_one_size
from lineproof.beams.bottom_bars import (
    bars_inside,
    for_distance,
    placed,
    record_fit_above,
    record_fit_overhang,
)
from lineproof.beams.continuous.case_forces import record_forces
from lineproof.beams.continuous.crack_stress import face_stress, sag_stress
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.developed import (
    Developed,
    area_of,
    count_standing,
    developed_key,
    record_developed_bars,
    same,
)
from lineproof.beams.continuous.faces import (
    Face,
    at_face,
    faces_of,
    has_sag,
    hogging,
    nearer,
    nominally_simple,
)
from lineproof.beams.continuous.flexure_gaps import (
    no_resistance,
    no_steel,
    note_gap,
    note_none,
    record_depth_assumed,
    record_depth_beside,
)
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.inputs import ContinuousInputs
from lineproof.beams.continuous.model import GIVEN, Model
from lineproof.beams.continuous.restraint import record_restraint
from lineproof.beams.continuous.section_checks import TENSION_AREAS
from lineproof.beams.continuous.skin import record_skin
from lineproof.beams.cracks import cracks_inside
from lineproof.beams.flexure import LAYERS, record_yield, required, resistance
from lineproof.beams.inputs import Shape
from lineproof.beams.minimum_steel import minimum_of
from lineproof.beams.second_path import record_proof
from lineproof.beams.section import SPREAD_AREAS, TENSION_WIDTHS, zone_of
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.standards.a23_3 import analysis, bars, flexure, minimum
from lineproof.standards.a23_3.crack_control import NEEDS_SKIN
from lineproof.standards.references import MECHANICS

_SHARED = ("M_r", "A_s", "d", "n_o", "A_b", "d_b", "d_bs")
"""What both faces of a support share where their section is the same."""
COUNTED = "A_s counted"
"""Names, beside these, the area that resists; ``A_s`` is that of all bars, which share cracks."""
_SAME = 1e-9
NO_MOMENT = "no-moment"
"""Key of the note that no load case brings tension to a face of the beam."""
NO_SAG = (
    "No load case brings tension to the bottom anywhere in this span: even in the case nearest to "
    "it, above, the top is in tension. The bottom bars hold the stirrups."
)
CHOSEN = "chosen: one size for the beam, few second layers, then least mass"


def _origin(inputs: ContinuousInputs, bars: object) -> str:
    """Say where the bars of a section come from."""
    if inputs.bar_runs is not None:
        return "as given along the beam"
    return "given" if bars is not None else CHOSEN


def record_sag(design: Design, span: int) -> None:
    """Record a span's largest moment, its bottom bars, their resistance and all checks.

    Given bars are counted as far as they are developed where that moment stands; where none stand
    there is no resistance. Where no load case brings tension to the bottom, that is said, and the
    bars have a resistance but nothing to resist.
    """
    model, layers = design.model, design.bottom_bars(span)
    inputs, key = model.inputs, f"sag-{span}"
    counts = _bottom_in_part(design, key, span) if layers else _depth_beside(design, key, span)
    with model.sheet.part(key, f"Span {span}: positive moment"):
        steps, demand = begin(model, span, "b_f" if inputs.slab else "b_w"), model.forces.sag(span)
        near = nearer(model, demand)
        record_forces(steps, model, demand, near, x=at_face(model, demand, near))
        sags = has_sag(model, span)
        if not sags:
            model.sheet.note(NO_MOMENT, NO_SAG, title="Bottom bars", basis=MECHANICS)
        if layers:
            origin = _origin(inputs, inputs.bottom_bars[span - 1])
            bars_inside(model.sheet, layers, stirrup=inputs.stirrup, origin=origin)
            _take(steps, LAYERS)
        elif sags:
            note_gap(model.sheet, "bottom")
        else:
            note_none(model.sheet, "bottom")
        steps.bind(**counts)
        M_r = _record_strength(steps, design, inputs.shape, bare=not layers, asked=sags)
        if not layers:
            return
        case = "two layers" if len(layers) > 1 and not counts else "one layer"
        record_proof(steps, (zone_of(inputs.shape), case), M_r)
        if sags:
            minimum_of(
                steps, inputs.minimum_rule, minimum.BY_CRACKING, minimum.WIDTH_WEB, waivable=True
            )
            stress = sag_stress(model, span, steps.entry("A_s"))
            count_standing(steps, key)
            cracks_inside(steps, inputs.exposure, layers, stress=stress, coated=inputs.coated)
        if steps.decide(NEEDS_SKIN):
            record_skin(steps, inputs.exposure, design.side_bars(span), "bottom")


def _record_strength(
    steps: Steps, design: Design, shape: Shape, *, bare: bool, asked: bool = True
) -> Entry:
    """Record steel and resistance; both are none of a ``bare`` section. Return the resistance.

    Each stands against what the moment asks for, unless it is not ``asked``: no load case brings
    tension to that face.
    """
    if asked:
        required(steps, shape)
    if bare:
        steps.bind(A_s=no_steel(steps.sheet))
    if asked:
        steps.check(flexure.ENOUGH_STEEL)
    if bare:
        M_r = no_resistance(steps.sheet)
        steps.bind(M_r=M_r)
    else:
        M_r = resistance(steps, shape)
        record_yield(steps, design.pair)
    if asked:
        steps.check(flexure.STRENGTH)
    return M_r


def _depth_beside(design: Design, key: str, span: int) -> dict[str, Entry]:
    """Record the depth to the bottom bars beside a gap; return it."""
    sheet, stirrup = design.model.sheet, design.model.inputs.stirrup
    with sheet.part(f"{key}-beside", f"Span {span}: depth to the bottom bars beside the gap"):
        sheet.stand_for(begin(design.model, span, "b_w").place)
        beside, holder = design.bottom_beside(span), design.designed.bars.holders
        return {"d": record_depth_beside(sheet, stirrup, beside, holder)}


def _bottom_in_part(design: Design, key: str, span: int) -> dict[str, Entry]:
    """Record given bottom bars where they count in part; return their d and A_s, else nothing."""
    if not design.given:
        return {}
    counted, layers = design.bottom_counted(span), design.bottom_bars(span)
    area = sum(layer.area for layer in layers) if of_one_size(layers) else None
    return _in_part(design, counted, area, (key, f"Span {span}: bottom bars", span))


def _top_in_part(design: Design, face: Face, top: TopBars) -> dict[str, Entry]:
    """Record top bars that count in part or stand in two layers; return their d and A_s.

    Nothing for others. Chosen ones count in part only in an end support.
    """
    if not design.given and top.of_one_size and 1 < face.support <= design.model.spans:
        return {}
    title = f"{face.name.capitalize()}: top bars"
    area = top.area if top.of_one_size else None
    return _in_part(design, design.top_counted(face), area, (face.key, title, face.span))


def _in_part(
    design: Design, counted: Sequence[Developed], area: float | None, section: tuple[str, str, int]
) -> dict[str, Entry]:
    """Record bars that count otherwise than in full, or of several sizes side by side.

    ``area`` is that of the section, if its bars have one size; ``section`` has key, title and span.
    """
    key, title, span = section
    if area is not None and abs(area_of(counted) - area) <= _SAME * area:
        return {}
    return record_developed_bars(
        design.model, design.designed, counted, key=developed_key(key),
        title=f"{title} as far as developed", span=span,
    )  # fmt: skip


def begin(model: Model, span: int, width: str) -> Steps:
    """Return steps in a span whose compression zone has the width ``b_f`` or ``b_w``."""
    sheet = model.sheet
    place = span_place(sheet, model.inputs, span)
    b_w = sheet.entry(f"{GIVEN}/b_w")
    place |= {"b_w": b_w, "b": place.get(width, b_w)}
    if model.inputs.slab:
        place["h_f"] = sheet.entry(f"{GIVEN}/h_f")
    sheet.stand_for(place)
    return Steps(sheet, place)


def _take(steps: Steps, names: tuple[str, ...]) -> None:
    """Let symbols stand for what has just been recorded in the open part."""
    made = steps.sheet.part_entries
    steps.bind(**{name: made[name] for name in names if name in made})


def record_hog(design: Design, support: int) -> None:
    """Record both faces of a support: moments, top bars, resistance and all checks.

    The second face of one depth has the same section: there the resistance is taken over. Given
    bars are counted at each face as far as they are developed there.
    """
    model = design.model
    rows = [face for face in faces_of(model) if face.support == support]
    rows.sort(key=lambda face: -hogging(model, face))
    worst: dict[str, Entry] = {}
    for face in rows:
        title = f"{face.name.capitalize()}: negative moment"
        if hogging(model, face) <= 0:
            with model.sheet.part(face.key, title):
                record_no_moment(model, face)
            continue
        top = design.top_bars(face)
        if top is None:
            with model.sheet.part(face.key, title):
                _record_face_without(design, face)
        elif worst and _same_section(design, rows[0], face):
            with model.sheet.part(face.key, title):
                _record_other_face(model, face, worst, top)
        else:
            counts = _top_in_part(design, face, top)
            with model.sheet.part(face.key, title):
                worst = _record_face(design, face, top, counts)


def _same_section(design: Design, first: Face, second: Face) -> bool:
    depths = design.model.inputs.depths
    if depths[first.span - 1].value != depths[second.span - 1].value:
        return False
    return not design.given or same(design.top_counted(first), design.top_counted(second))


def record_no_moment(model: Model, face: Face) -> None:
    """Record inside the open part that no moment brings tension to the top of a face."""
    carrier = model.inputs.supports[face.support - 1].carrier
    rests = nominally_simple(model, face)
    text = (
        f"The beam rests freely on the {carrier}: no moment arises; bars that hold the stirrups "
        "run through."
        if rests
        else "No load case brings tension to the top here; bars that hold the stirrups run through."
    )
    model.sheet.note(NO_MOMENT, text, title="Top bars", basis="common practice")


def record_demand(steps: Steps, model: Model, face: Face) -> None:
    """Record inside the open part the design moment of a face."""
    if nominally_simple(model, face):
        record_restraint(steps, model, face.support, face.span)
        return
    sheet = model.sheet
    x = sheet.line(analysis.TO_FACE, b_sn=sheet.entry(f"{GIVEN}/b_s{face.support}"))
    demand = model.forces.hog(face.support, face.side)
    record_forces(steps, model, demand, face.near, x=x)


def _record_face_without(design: Design, face: Face) -> None:
    """Record a face at which no given top bars stand."""
    steps = begin(design.model, face.span, "b_w")
    record_demand(steps, design.model, face)
    steps.place.pop("h_f", None)
    record_depth_assumed(steps, design.model.inputs.stirrup, design.designed.bars.holders)
    note_gap(steps.sheet, "top")
    _record_strength(steps, design, "rectangular", bare=True)


def _record_face(
    design: Design, face: Face, top: TopBars, counts: Mapping[str, Entry]
) -> dict[str, Entry]:
    """Record a face in full; return its resistance and bars for the other face.

    ``counts`` are d and A_s of bars that count in part.
    """
    model = design.model
    sheet, inputs = model.sheet, model.inputs
    steps = begin(model, face.span, "b_w")
    record_demand(steps, model, face)
    steps.place.pop("h_f", None)
    _record_top_bars(steps, model, face, top)
    steps.bind(**counts)
    M_r = _record_strength(steps, design, "rectangular", bare=False)
    _record_redistribution(steps, model, face)
    record_proof(steps, ("rectangle", "one layer"), M_r)
    minimum_of(
        steps, inputs.minimum_rule, minimum.BY_CRACKING_TOP, TENSION_WIDTHS[inputs.shape],
        waivable=True,
    )  # fmt: skip
    if inputs.slab:
        _check_spread(steps, top)
    counted = steps.entry("A_s")
    count_standing(steps, face.key)
    stress = face_stress(model, face, counted)
    cracks_inside(
        steps, inputs.exposure, top.groups, TENSION_AREAS[inputs.shape], stress,
        coated=inputs.coated,
    )  # fmt: skip
    if steps.holds(NEEDS_SKIN):
        record_skin(steps, inputs.exposure, design.side_bars(face.span, face.near), "top")
    _take(steps, _SHARED)
    made = dict(sheet.part_entries) | dict(counts)
    shared = {name: made[name] for name in _SHARED if name in made}
    return shared | {"A_s": steps.entry("A_s"), COUNTED: counted}


def _record_redistribution(steps: Steps, model: Model, face: Face) -> None:
    """Record that the section allows the change of its support's moment, if there is one."""
    if face.support in model.inputs.redistribution:
        steps.line(analysis.LARGEST_CHANGE)
        p_rd = model.sheet.entry(f"{GIVEN}/p_{face.support}")
        steps.check(analysis.CHANGE_ALLOWED, p_rd=p_rd)


def _record_top_bars(steps: Steps, model: Model, face: Face, top: TopBars) -> None:
    sheet, inputs = model.sheet, model.inputs
    origin = _origin(inputs, inputs.top_bars[face.support - 1])
    sheet.note("bars-text", f"Top bars: {top}, {origin}.{placed(top.layers)}", title="Bars")
    entries = {
        "d_bs": sheet.lookup("d_bs", bars.BARS, inputs.stirrup, "d_b"),
        "r_s": sheet.lookup("r_s", bars.STIRRUP_BENDS, inputs.stirrup),
        "d_b": sheet.lookup("d_b", bars.BARS, top.web.size),
        "A_b": sheet.lookup("A_b", bars.BARS, top.web.size),
        "n_t": sheet.given("n_t", str(top.web.count), source=origin),
    }
    entries["n_b"] = for_distance(sheet, "n_b", top.web.count, entries["n_t"])
    if inputs.slab:
        entries["n_o"] = sheet.given("n_o", str(top.overhang), source=origin)
    steps.bind(**entries)
    steps.lines(bars.LEAST_CLEAR, bars.CLEAR)
    steps.check(bars.FITS)
    if top.upper is not None:
        steps.line(bars.DEPTH_FIRST)
        steps.bind(d_2=record_fit_above(sheet, top.layers, origin, entries["d_b"]))
    if top.of_one_size:  # else area and depth have a part of their own
        steps.lines(SPREAD_AREAS[inputs.shape], bars.DEPTH_ONE_LAYER)


def _check_spread(steps: Steps, top: TopBars) -> None:
    """Record that the overhang holds the top bars that it needs, and has room for them."""
    steps.lines(minimum.SPREAD_WIDTH, minimum.SPREAD_AREA)
    A_b, d_b = steps.entry("A_b"), steps.entry("d_b")
    if top.spread_size != top.web.size:
        look_up, size = steps.sheet.lookup, top.spread_size
        title = "area of one bar in the overhang"
        A_b = look_up("A_bo", bars.BARS, size, "A_b", title=title)
        d_b = look_up("d_bo", bars.BARS, size, "d_b")
    steps.check(minimum.SPREAD, A_b=A_b)
    if top.overhang:
        record_fit_overhang(steps, d_b)


def _record_other_face(model: Model, face: Face, worst: Mapping[str, Entry], top: TopBars) -> None:
    """Record the moment of the milder face, its slab and its cracks, for the same bars."""
    steps = begin(model, face.span, "b_w")
    record_demand(steps, model, face)
    steps.bind(**{name: entry for name, entry in worst.items() if name != COUNTED})
    steps.check(flexure.STRENGTH)
    if model.inputs.slab:
        _check_spread(steps, top)
    stress = face_stress(model, face, worst[COUNTED])
    cracks_inside(
        steps, model.inputs.exposure, top.groups, TENSION_AREAS[model.inputs.shape], stress,
        coated=model.inputs.coated,
    )  # fmt: skip
