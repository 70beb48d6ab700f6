"""The depth of the bars at a section of shear, from those of flexure or of what stands there."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import replace

import numpy as np

from lineproof.beams.continuous.cutoff_sets import Group, groups_met, groups_of_layers
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.developed import record_groups
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.layout import Face
from lineproof.beams.continuous.resistance import effective_depth, top_layers
from lineproof.beams.continuous.shear_numbers import depth_at
from lineproof.beams.continuous.shear_restrained_record import restrained_key
from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.beams.continuous.shear_stretches import bars_over, depth_over
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.standards.a23_3 import bars
from lineproof.standards.a23_3.bars import BARS

_SAME = 1e-9
_DEPTH = "depth-"
_FACES = {"bottom": "sag-", "top": "hog-"}
"""How the keys of the sections of flexure with a face in tension begin."""


def depth_with_restraint(design: Design, section: ShearSection) -> Entry | None:
    """Return the depth of the top bars of a section, which the restraint brings into tension."""
    top = design.stirrups.checks[section.span - 1].state.numbers.top
    d = float(depth_at(top, np.array([section.demand.x]))[0])
    turned = replace(section, key=restrained_key(section), tension="top", mixed=False, d=d)
    return depth_of_layers(design, turned, alone=True)


def depth_of_layers(design: Design, section: ShearSection, *, alone: bool = False) -> Entry | None:
    """Return the depth of the section from the bars of a section of flexure.

    It stands there already, of bars on the face in tension, or is recorded in a part of its own
    where several sizes or layers have it; bars of one size have it only where it may stand
    ``alone``, else None is returned for them.
    """
    sheet, designed, span = design.model.sheet, design.designed, section.span
    for key in _nearest_first(section, [part.key for part in sheet.parts]):
        known = sheet.entries_of(key).get("d")
        if known is not None and _is_depth(known.value, section):
            return known
    for where, groups, d in _several(design, section):
        one = len(groups) == 1 and groups[0].layer == 1
        if (one and not alone) or not groups or not _is_depth(d, section):
            continue
        with sheet.part(f"{_DEPTH}{section.key}", f"Span {span}: depth of the bars {where}"):
            steps = Steps(sheet, span_place(sheet, design.model.inputs, span))
            stirrup = designed.basis.stirrups.size
            steps.bind(c_c=sheet.find("c_c"), d_bs=sheet.lookup("d_bs", BARS, stirrup, "d_b"))
            record_groups(steps, [(group, None) for group in groups], "the section")
        return sheet.entries_of(f"{_DEPTH}{section.key}")["d"]
    return None


def _nearest_first(section: ShearSection, keys: Iterable[str]) -> list[str]:
    """Return the parts that may hold the depth of a section, those of its span and end first."""
    support = section.span if section.end == "left" else section.span + 1
    side = "right" if section.end == "left" else "left"
    own = (f"sag-{section.span}", f"hog-{support}-{side}", f"hog-{support}-")
    faces = ("sag-", "hog-") if section.mixed else (_FACES[section.tension],)
    kept = [key for key in keys if key.startswith((*faces, _DEPTH))]

    def far(key: str) -> int:
        return next((n for n, start in enumerate(own) if key.startswith(start)), len(own))

    return sorted(kept, key=far)


def _several(design: Design, section: ShearSection) -> Iterator[tuple[str, Sequence[Group], float]]:
    """Give the bars whose depth a section of shear may have: where they lie, and their depth [mm].

    They are those of the sections of flexure, and those that stand along the span: of the face in
    tension, or of either where the smaller depth of both is used.
    """
    designed, span = design.designed, section.span
    faces: tuple[Face, ...] = ("bottom", "top") if section.mixed else (section.tension,)
    h = designed.outline.depths[span - 1]
    below = (f"below span {span}", designed.bars.bottom[span - 1])
    above = [(f"above support {j}", top_layers(designed, j)) for j in (span, span + 1)]
    for where, layers in (below, *above):
        yield where, groups_of_layers(layers), effective_depth(designed, layers, h)
    found = (over for face in faces for over in bars_over(designed, design.standing, face, span))
    for over in found:
        if over.shares:
            runs = (share.run for share in over.shares)
            yield "that stand there", groups_met(designed, runs), depth_over(designed, span, over)


def _is_depth(d: float, section: ShearSection) -> bool:
    return abs(d - section.d) <= _SAME * section.d


def depth_of_bars(design: Design, steps: Steps, section: ShearSection) -> Entry:
    """Record inside the open part the depth of bars of one size in one layer, and return it."""
    sheet = steps.sheet
    sizes = {design.designed.bars.holders, *(run.size for run in design.runs)}
    for size in sorted(sizes):
        d_b = BARS.number(size, "d_b")
        at = (steps.entry(n).value for n in ("h", "c_c", "d_bs"))
        if _is_depth(bars.DEPTH_ONE_LAYER.function(*at, d_b), section):
            bound = sheet.lookup("d_b", BARS, size)
            return steps.line(bars.DEPTH_ONE_LAYER, d_b=bound)
    msg = f"{section.key}: no bars lie at the depth {section.d!r}"
    raise AssertionError(msg)
