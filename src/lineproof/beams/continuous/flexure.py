"""Flexure at every span and both faces of every support: numbers for the choice, then lines."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass

from lineproof.beams.bars import BarLayer, BarLayers
from lineproof.beams.bottom_bars import bars_inside, for_distance
from lineproof.beams.choice import bars_for
from lineproof.beams.continuous.bar_choice import (
    Chosen,
    Section,
    TopBars,
    bottom_trial,
    choose,
    top_trial,
)
from lineproof.beams.continuous.case_forces import NEAR, record_forces
from lineproof.beams.continuous.forces import Demand, End, other
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.inputs import ContinuousInputs
from lineproof.beams.continuous.model import GIVEN, Model
from lineproof.beams.continuous.numbers import Numbers
from lineproof.beams.continuous.restraint import held_in_frame, record_restraint, restraint_moment
from lineproof.beams.continuous.section_checks import (
    SPREAD_AREAS,
    TENSION_AREAS,
    TENSION_WIDTHS,
    Rules,
    bottom_checks,
    top_checks,
)
from lineproof.beams.cracks import cracks_inside, exposure_kind, skin_inside
from lineproof.beams.flexure import confirmed_value, record_yield, required, resistance
from lineproof.beams.minimum_steel import minimum_of
from lineproof.beams.second_path import record_proof
from lineproof.beams.section import zone_of
from lineproof.beams.steps import Steps
from lineproof.errors import FaultList
from lineproof.record import Entry
from lineproof.standards.a23_3 import analysis, bars, crack_control, flexure, minimum
from lineproof.standards.codes import CodePair

_LAYERS = ("d", "A_s", "d_1", "d_2", "A_s1", "A_s2", "d_bs", "d_b", "A_b")
_MATERIALS = (
    "phi_c", "phi_s", "f_c", "f_y", "E_s", "eps_cu", "lambda_", "alpha_1", "beta_1", "f_r", "E_c",
    "c_c", "a_max", "b_w",
)  # fmt: skip
_SHARED = ("M_r", "A_s", "d", "n_o", "A_b", "d_b", "d_bs")
"""What both faces of a support share where their section is the same."""
CHOSEN = "chosen: one size for the beam, few second layers, then least mass"


@dataclass(frozen=True, slots=True)
class Face:
    """A face of a support, in the span it belongs to."""

    support: int
    side: End

    @property
    def span(self) -> int:
        """The span that the face belongs to."""
        return self.support - 1 if self.side == "left" else self.support

    @property
    def near(self) -> End:
        """The end of that span at which it lies."""
        return other(self.side)

    @property
    def key(self) -> str:
        """Key of its part."""
        return f"hog-{self.support}-{self.side}"

    @property
    def name(self) -> str:
        """Its name in words."""
        return f"support {self.support}, {self.side} face"


def faces_of(model: Model) -> list[Face]:
    """Return all faces of the beam from left to right."""
    return [
        Face(support, side)
        for support in range(1, model.spans + 2)
        for side in ("left", "right")
        if model.forces.has_span(support, side)
    ]


def sagging_spans(model: Model) -> list[int]:
    """Return the spans that have a moment with the bottom in tension: all but cantilevers."""
    return [k for k in range(1, model.spans + 1) if not model.forces.beam.cantilever(k)]


def nominally_simple(model: Model, face: Face) -> bool:
    """Tell whether an end support is analysed as simple: not where an imported frame holds it."""
    kind = model.inputs.supports[face.support - 1].kind
    simple = kind == "simple" and face.support in (1, model.spans + 1) and not _hung(model, face)
    return simple and not held_in_frame(model, face.support, face.span)


def restrained_supports(model: Model) -> frozenset[int]:
    """Return the end supports whose top bars are designed for an assumed restraint."""
    return frozenset(
        face.support
        for face in faces_of(model)
        if nominally_simple(model, face) and restraint_moment(model, face.support, face.span) > 0
    )


def _hung(model: Model, face: Face) -> bool:
    """Tell whether the span of a face is a cantilever."""
    return model.forces.beam.cantilever(face.span)


# -- numbers ---------------------------------------------------------------------------------


def materials_of(model: Model, pair: CodePair) -> Numbers:
    """Return materials and limits as numbers, from the sheet."""
    sheet = model.sheet
    at = {name: sheet.find(name).value for name in _MATERIALS}
    if model.inputs.slab:
        at["h_f"] = sheet.find("h_f").value
    value = confirmed_value(sheet.project, pair)
    at["c_d"] = flexure.YIELD_LIMIT.function(at["f_y"]) if value is None else float(value["value"])
    at["z_max"] = crack_control.LIMITS.number(exposure_kind(model.inputs.exposure), "z_max")
    return at


def numbers_in(model: Model, materials: Mapping[str, float], span: int) -> Numbers:
    """Return materials and geometry of a span as numbers."""
    place = span_place(model.sheet, model.inputs, span)
    at = dict(materials) | {name: entry.value for name, entry in place.items()}
    at["b"] = at.get("b_f", at["b_w"])
    return at


def rules_of(model: Model) -> Rules:
    """Return the choices that the checks of a section depend on."""
    return Rules(model.inputs.shape, model.inputs.minimum_rule)


Anchored = Callable[[int, str], bool]
"""Tell whether bars of a size can be anchored: bottom bars of a span, top bars of a support."""


def choose_bottom(
    model: Model,
    pair: CodePair,
    given: Mapping[int, BarLayers],
    least: Mapping[int, float] | None = None,
    anchored: Anchored | None = None,
) -> dict[int, Chosen]:
    """Return the bottom bars of every span, ``given`` or chosen; raises :class:`UserError`.

    Of bars given along the beam: no item for a span whose middle none of them cross.

    ``least`` is the area that shear and torsion ask for, by span; ``anchored`` tells whether bars
    of a size can be anchored in the end supports.
    """
    rules, stirrup, materials = rules_of(model), model.inputs.stirrup, materials_of(model, pair)
    made: dict[int, Chosen] = {}
    sections: dict[int, Section] = {}
    for span in sagging_spans(model):
        at = numbers_in(model, materials, span) | {"M_f": model.forces.sag(span).M}
        layers = given.get(span)
        if layers is not None:
            made[span] = Chosen(f"span {span}", layers, bottom_checks(at, rules, layers, stirrup))
        elif model.inputs.bar_runs is None:  # else none stand here as given: none are chosen
            sections[span] = Section(
                f"span {span}", (at,), model.lengths[span - 1].value, (least or {}).get(span, 0.0)
            )  # fmt: skip
    numbered = {section.name: span for span, section in sections.items()}
    search = bottom_trial(rules, stirrup)

    def trial(section: Section, size: str) -> tuple[Chosen | None, str]:
        if anchored is not None and not anchored(numbered[section.name], size):
            return None, "anchorage in the support"
        return search(section, size)

    found = choose(list(sections.values()), trial, "bottom_bars")
    return made | dict(zip(sections, found, strict=True))


def choose_top(
    model: Model,
    pair: CodePair,
    given: Mapping[int, TopBars],
    anchored: Callable[[int, str, bool], bool],
    least: Mapping[int, float] | None = None,
) -> dict[int, Chosen]:
    """Return the top bars of every support that has a moment with the top in tension.

    Of bars given along the beam: no item for a support that none of them cross.

    ``least`` is the area within the web that torsion asks for, by support.
    """
    rules, stirrup, materials = rules_of(model), model.inputs.stirrup, materials_of(model, pair)
    made: dict[int, Chosen] = {}
    sections: dict[int, Section] = {}
    for support, numbers in _top_numbers(model, materials).items():
        name = f"support {support}"
        top = given.get(support)
        if top is None:
            if model.inputs.bar_runs is None:  # else none stand here as given: none are chosen
                sections[support] = Section(
                    name, tuple(numbers), _top_length(model, support),
                    (least or {}).get(support, 0.0),
                )  # fmt: skip
            continue
        faces = [top_checks(dict(at), rules, top.web, top.overhang, stirrup) for at in numbers]
        made[support] = Chosen(name, top, max(faces, key=lambda face: max(face.values())))
    numbered = {section.name: support for support, section in sections.items()}
    search = top_trial(rules, stirrup)

    def trial(section: Section, size: str) -> tuple[Chosen | None, str]:
        found, why = search(section, size)
        spread = isinstance(found.bars, TopBars) and found.bars.overhang > 0 if found else False
        if not anchored(numbered[section.name], size, spread):
            return None, "anchorage in the support"
        return found, why

    found = choose(list(sections.values()), trial, "top_bars")
    return made | dict(zip(sections, found, strict=True))


def given_bottom(model: Model) -> dict[int, BarLayers]:
    """Return the bottom bars that the designer gave, by span."""
    rows = enumerate(model.inputs.bottom_bars, start=1)
    return {span: layers for span, layers in rows if layers is not None}


def given_top_bars(model: Model, pair: CodePair) -> dict[int, TopBars]:
    """Return the top bars that the designer gave, with those that the overhangs need."""
    numbers = _top_numbers(model, materials_of(model, pair))
    rows = enumerate(model.inputs.top_bars, start=1)
    return {
        support: _with_overhang(model, layers[0], numbers[support])
        for support, layers in rows
        if layers is not None and support in numbers
    }


SIDES = {"T": 2, "L": 1, "rectangular": 0}
"""Number of overhangs of a shape."""


def _with_overhang(model: Model, web: BarLayer, numbers: Iterable[Numbers]) -> TopBars:
    """Return top bars with the bars of the same size that the overhangs need."""
    sides = SIDES[model.inputs.shape]
    if not sides:
        return TopBars(web, 0, 0)
    needed = max(
        minimum.SPREAD_AREA.function(minimum.SPREAD_WIDTH.function(at["b_o"], at["l"]), at["h_f"])
        for at in numbers
    )
    return TopBars(web, bars_for(needed, web.size), sides)


def _top_numbers(model: Model, materials: Mapping[str, float]) -> dict[int, list[Numbers]]:
    made: dict[int, list[Numbers]] = {}
    for face in faces_of(model):
        M_f = hogging(model, face)
        if M_f > 0:
            at = numbers_in(model, materials, face.span) | {"M_f": M_f}
            made.setdefault(face.support, []).append(at)
    return made


def hogging(model: Model, face: Face) -> float:
    """Return the design moment of a face, top in tension; at most 0 where there is none [N.mm]."""
    if nominally_simple(model, face):
        return restraint_moment(model, face.support, face.span)
    return -model.forces.hog(face.support, face.side).M


def _top_length(model: Model, support: int) -> float:
    """Return about how long the top bars of a support are [mm]: a third of each span beside it."""
    beside = [k for k in (support - 1, support) if 1 <= k <= model.spans]
    return float(sum(model.lengths[k - 1].value for k in beside)) / 3


def _origin(inputs: ContinuousInputs, bars: object) -> str:
    """Say where the bars of a section come from."""
    if inputs.bar_runs is not None:
        return "as given along the beam"
    return "given" if bars is not None else CHOSEN


# -- lines -----------------------------------------------------------------------------------


def record_sag(model: Model, span: int, layers: BarLayers, pair: CodePair) -> None:
    """Record a span's largest moment, its bottom bars, their resistance and all checks."""
    sheet, inputs = model.sheet, model.inputs
    demand = model.forces.sag(span)
    origin = _origin(inputs, inputs.bottom_bars[span - 1])
    with sheet.part(f"sag-{span}", f"Span {span}: moment in the span"):
        steps = begin(model, span, "b_f" if inputs.slab else "b_w")
        near = nearer(model, demand)
        record_forces(steps, model, demand, near, x=at_face(model, demand, near))
        bars_inside(sheet, layers, stirrup=inputs.stirrup, origin=origin)
        _take(steps, _LAYERS)
        required(steps, inputs.shape)
        steps.check(flexure.ENOUGH_STEEL)
        M_r = resistance(steps, inputs.shape)
        record_yield(steps, pair)
        steps.check(flexure.STRENGTH)
        case = "two layers" if len(layers) > 1 else "one layer"
        record_proof(steps, (zone_of(inputs.shape), case), M_r)
        minimum_of(
            steps, inputs.minimum_rule, minimum.BY_CRACKING, minimum.WIDTH_WEB, waivable=True
        )
        cracks_inside(steps, inputs.exposure, layers)
        skin_inside(steps, inputs.exposure)


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


def nearer(model: Model, demand: Demand) -> End:
    """Return the end of its span that a demand stands nearer to."""
    half = model.lengths[demand.span - 1].value / 2
    return "left" if demand.x <= half * (1 + 1e-9) else "right"


def at_face(model: Model, demand: Demand, near: End) -> Entry | None:
    """Record the distance of the near face, if the largest moment of the span stands there.

    Beside a span that is loaded far more, the shear is nowhere zero between the faces.
    """
    start, end = model.forces.beam.faces(demand.span)
    if model.imported is not None or abs(demand.x - (start if near == "left" else end)) > NEAR:
        return None
    support = demand.span if near == "left" else demand.span + 1
    return model.sheet.line(analysis.TO_FACE, b_sn=model.sheet.entry(f"{GIVEN}/b_s{support}"))


def record_hog(model: Model, support: int, top: TopBars, pair: CodePair) -> None:
    """Record both faces of a support: moments, top bars, resistance and all checks.

    The second face of one depth has the same section: there the resistance is taken over.
    """
    faces = [face for face in faces_of(model) if face.support == support]
    faces.sort(key=lambda face: -hogging(model, face))
    worst: dict[str, Entry] = {}
    for face in faces:
        with model.sheet.part(face.key, f"{face.name.capitalize()}: moment over the support"):
            if hogging(model, face) <= 0:
                record_no_moment(model, face)
            elif worst and _same_section(model, faces[0], face):
                _record_other_face(model, face, worst, top)
            else:
                worst = _record_face(model, face, top, pair)


def _same_section(model: Model, first: Face, second: Face) -> bool:
    depths = model.inputs.depths
    return depths[first.span - 1].value == depths[second.span - 1].value


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
    model.sheet.note("no-moment", text, title="Top bars", basis="common practice")


def record_demand(steps: Steps, model: Model, face: Face) -> None:
    """Record inside the open part the design moment of a face."""
    if nominally_simple(model, face):
        record_restraint(steps, model, face.support, face.span)
        return
    sheet = model.sheet
    x = sheet.line(analysis.TO_FACE, b_sn=sheet.entry(f"{GIVEN}/b_s{face.support}"))
    demand = model.forces.hog(face.support, face.side)
    record_forces(steps, model, demand, face.near, x=x)


def _record_face(model: Model, face: Face, top: TopBars, pair: CodePair) -> dict[str, Entry]:
    """Record a face in full; return its resistance and bars for the other face."""
    sheet, inputs = model.sheet, model.inputs
    steps = begin(model, face.span, "b_w")
    record_demand(steps, model, face)
    steps.place.pop("h_f", None)
    _record_top_bars(steps, model, face, top)
    required(steps, "rectangular")
    steps.check(flexure.ENOUGH_STEEL)
    M_r = resistance(steps, "rectangular")
    record_yield(steps, pair)
    steps.check(flexure.STRENGTH)
    _record_redistribution(steps, model, face)
    record_proof(steps, ("rectangle", "one layer"), M_r)
    minimum_of(
        steps, inputs.minimum_rule, minimum.BY_CRACKING_TOP, TENSION_WIDTHS[inputs.shape],
        waivable=True,
    )  # fmt: skip
    if inputs.slab:
        steps.lines(minimum.SPREAD_WIDTH, minimum.SPREAD_AREA)
        steps.check(minimum.SPREAD)
    cracks_inside(steps, inputs.exposure, (top.web,), TENSION_AREAS[inputs.shape])
    _take(steps, _SHARED)
    made = sheet.part_entries
    return {name: made[name] for name in _SHARED if name in made}


def _record_redistribution(steps: Steps, model: Model, face: Face) -> None:
    """Record that the section allows the change of its support's moment, if there is one."""
    if face.support in model.inputs.redistribution:
        steps.line(analysis.LARGEST_CHANGE)
        p_rd = model.sheet.entry(f"{GIVEN}/p_{face.support}")
        steps.check(analysis.CHANGE_ALLOWED, p_rd=p_rd)


def _record_top_bars(steps: Steps, model: Model, face: Face, top: TopBars) -> None:
    sheet, inputs = model.sheet, model.inputs
    origin = _origin(inputs, inputs.top_bars[face.support - 1])
    sheet.note("bars-text", f"Top bars: {top}, {origin}.", title="Bars")
    entries = {
        "d_bs": sheet.lookup("d_bs", bars.BARS, inputs.stirrup, "d_b"),
        "r_s": sheet.lookup("r_s", bars.STIRRUP_BENDS, inputs.stirrup),
        "d_b": sheet.lookup("d_b", bars.BARS, top.web.size),
        "A_b": sheet.lookup("A_b", bars.BARS, top.web.size),
        "n_t": sheet.given("n_t", str(top.web.number), source=origin),
    }
    entries["n_b"] = for_distance(sheet, "n_b", top.web.number, entries["n_t"])
    if inputs.slab:
        entries["n_o"] = sheet.given("n_o", str(top.overhang), source=origin)
    steps.bind(**entries)
    steps.lines(bars.LEAST_CLEAR, bars.CLEAR)
    steps.check(bars.FITS)
    steps.lines(SPREAD_AREAS[inputs.shape], bars.DEPTH_ONE_LAYER)


def _record_other_face(model: Model, face: Face, worst: Mapping[str, Entry], top: TopBars) -> None:
    """Record the moment of the milder face, its slab and its cracks, for the same bars."""
    steps = begin(model, face.span, "b_w")
    record_demand(steps, model, face)
    steps.bind(**dict(worst))
    steps.check(flexure.STRENGTH)
    if model.inputs.slab:
        steps.lines(minimum.SPREAD_WIDTH, minimum.SPREAD_AREA)
        steps.check(minimum.SPREAD)
    cracks_inside(steps, model.inputs.exposure, (top.web,), TENSION_AREAS[model.inputs.shape])


def refuse_unfit(chosen: Mapping[int, Chosen], what: str) -> None:
    """Refuse given bars that do not fit into the web: nothing could be printed of them."""
    faults = FaultList()
    for made in chosen.values():
        unfit = [
            key for key in (bars.FITS.key, bars.FITS_SECOND.key) if made.checks.get(key, 0) > 1
        ]
        if unfit:
            shown = " / ".join(map(str, made.bars)) if isinstance(made.bars, tuple) else made.bars
            faults.add(
                f"{what}: {shown} do not fit into the web at {made.section}; write fewer or larger "
                "bars, or a wider web"
            )
    faults.raise_if_any()
