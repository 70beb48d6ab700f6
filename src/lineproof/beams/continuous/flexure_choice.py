"""The bars of the sections, given or chosen, in numbers."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable, Mapping
from dataclasses import replace

from lineproof.beams.bars import BarLayer, BarLayers, TopBars
from lineproof.beams.choice import bars_for
from lineproof.beams.continuous.bar_choice import (
    ANCHORAGE,
    Chosen,
    Section,
    Stopped,
    bottom_trial,
    choose,
    top_trial,
)
from lineproof.beams.continuous.crack_stress import specified_hog, specified_sag
from lineproof.beams.continuous.faces import (
    faces_of,
    hogging,
    sagging_spans,
)
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.model import Model
from lineproof.beams.continuous.numbers import Numbers
from lineproof.beams.continuous.section_checks import (
    Rules,
    bottom_checks,
    top_checks,
)
from lineproof.beams.cracks import exposure_kind
from lineproof.beams.flexure import confirmed_value
from lineproof.beams.inputs import OVERHANGS
from lineproof.errors import FaultList
from lineproof.standards.a23_3 import bars, crack_control, flexure, minimum
from lineproof.standards.codes import CodePair

_MATERIALS = (
    "phi_c", "phi_s", "f_c", "f_y", "E_s", "eps_cu", "lambda_", "alpha_1", "beta_1", "f_r", "E_c",
    "c_c", "a_max", "b_w",
)  # fmt: skip


def materials_of(model: Model, pair: CodePair) -> Numbers:
    """Return materials and limits as numbers, from the sheet."""
    sheet = model.sheet
    at = {name: sheet.find(name).value for name in _MATERIALS}
    if model.inputs.slab:
        at["h_f"] = sheet.find("h_f").value
    value = confirmed_value(sheet.project, pair)
    at["c_d"] = flexure.YIELD_LIMIT.function(at["f_y"]) if value is None else float(value["value"])
    at["z_max"] = crack_control.LIMITS.number(exposure_kind(model.inputs.exposure), "z_max")
    if model.inputs.coated:
        at["z_max"] = crack_control.COATED_LIMIT.at({"z_mu": at["z_max"]})
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


LeastAnchored = Callable[[int, str], float]
"""Give the least area [mm2] of bottom bars of a size of which enough is anchored, by span."""


def choose_bottom(
    model: Model,
    pair: CodePair,
    given: Mapping[int, BarLayers],
    least: Mapping[int, float] | None = None,
    least_anchored: LeastAnchored | None = None,
) -> dict[int, Chosen]:
    """Return the bottom bars of every span, ``given`` or chosen; raises :class:`UserError`.

    Of bars given along the beam: no item for a span whose largest moment none of them cross.

    ``least`` is the area that shear and torsion ask for, by span; ``least_anchored`` gives that of
    bars of a size which the end supports ask for, infinite where no number of them can be anchored.
    """
    rules, stirrup, materials = rules_of(model), model.inputs.stirrup, materials_of(model, pair)
    made: dict[int, Chosen] = {}
    sections: dict[int, Section] = {}
    for span in sagging_spans(model):
        at = numbers_in(model, materials, span) | {"M_f": model.forces.sag(span).M}
        at |= specified_sag(model, span)
        layers = given.get(span)
        if layers is not None:
            made[span] = Chosen(f"span {span}", layers, bottom_checks(at, rules, layers, stirrup))
        elif model.inputs.bar_runs is None:  # else none stand here as given: none are chosen
            sections[span] = Section(
                f"span {span}", (at,), model.lengths[span - 1].value, (least or {}).get(span, 0.0)
            )  # fmt: skip
    numbered = {section.name: span for span, section in sections.items()}
    search = bottom_trial(rules, stirrup)

    def trial(section: Section, size: str, layers: int) -> tuple[Chosen | None, Stopped | None]:
        at_ends = least_anchored(numbered[section.name], size) if least_anchored else 0.0
        if math.isinf(at_ends):
            return None, Stopped({ANCHORAGE: math.inf}, f"bars {size}")
        return search(replace(section, least=max(section.least, at_ends)), size, layers)

    found = choose(list(sections.values()), trial, "bottom_bars")
    return made | dict(zip(sections, found, strict=True))


def choose_top(
    model: Model,
    pair: CodePair,
    given: Mapping[int, TopBars],
    part: Callable[[int, TopBars], float],
    least: Mapping[int, float] | None = None,
    least_all: Mapping[int, float] | None = None,
) -> dict[int, Chosen]:
    """Return the top bars of every support that has a moment with the top in tension.

    Of bars given along the beam: no item for a support that none of them cross.

    ``part`` gives the part of the area that counts at the faces of a support; ``least`` is the
    area within the web that torsion asks for, ``least_all`` that of all which shear does.
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
                    (least or {}).get(support, 0.0), (least_all or {}).get(support, 0.0),
                )  # fmt: skip
            continue
        faces = [top_checks(dict(at), rules, top, stirrup) for at in numbers]
        made[support] = Chosen(name, top, max(faces, key=lambda face: max(face.values())))
    numbered = {section.name: support for support, section in sections.items()}
    search = top_trial(rules, stirrup, lambda name, bars: part(numbered[name], bars))
    found = choose(list(sections.values()), search, "top_bars")
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


def _with_overhang(model: Model, web: BarLayer, numbers: Iterable[Numbers]) -> TopBars:
    """Return top bars with the bars of the same size that the overhangs need."""
    sides = OVERHANGS[model.inputs.shape]
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
            at |= specified_hog(model, face)
            made.setdefault(face.support, []).append(at)
    return made


def _top_length(model: Model, support: int) -> float:
    """Return about how long the top bars of a support are [mm]: a third of each span beside it."""
    beside = [k for k in (support - 1, support) if 1 <= k <= model.spans]
    return float(sum(model.lengths[k - 1].value for k in beside)) / 3


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
