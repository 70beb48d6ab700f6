"""Checks that fail, with what would cure them: a note in the part, a row on the summary."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, field, replace

from lineproof.beams.continuous import cures as find
from lineproof.beams.continuous import cures_checks
from lineproof.beams.continuous.cures import Cure, Variable, lettered, told
from lineproof.beams.continuous.cures_cuts import cut_cures, cut_of
from lineproof.beams.continuous.cures_gaps import (
    gap_cures,
    gap_of,
    section_gap_cures,
    without_bars,
)
from lineproof.beams.continuous.cures_replay import bound_names
from lineproof.beams.continuous.cures_sought import beside_each_other, cures_of
from lineproof.beams.continuous.cures_tried import Tried, failing
from lineproof.beams.continuous.deflection import Behind, SpanSection, deflections
from lineproof.beams.continuous.deflection_figure import bent_of
from lineproof.beams.continuous.deflection_service import (
    Stage,
    StageMoments,
    deflection_key,
    span_behind,
)
from lineproof.beams.continuous.deflections import history_of
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.model import Model
from lineproof.beams.continuous.shear_chapter import STIRRUPS
from lineproof.beams.continuous.summary_tables import Row, ratio_text
from lineproof.errors import UserError
from lineproof.record import Entry, Part
from lineproof.record.printing import utilisation
from lineproof.sentences import begun
from lineproof.standards.a23_3 import deflection as clause
from lineproof.standards.a23_3 import deflection_stages as stages
from lineproof.standards.a23_3 import shear, shear_factors

NOT_SOUGHT = (
    "Depth, steel, width and concrete strength are not what this check is about: no cure is sought "
    "among them."
)
NONE_CROSS = "Bars are needed where none count; how many, the check of the moment there says."
CHOSEN_ANEW = (
    "Found with the bars and the weight as they are here: bars left open are chosen anew "
    "when a value is typed in, and a larger beam weighs more. Give these bars with it, and look at "
    "the check again."
)
COLUMNS = [
    "Place",
    "Check that fails",
    "Ratio",
    "What would cure it: each alone, all else and the loads, self weight too, as they are",
]
WIDTHS = (44.0, 44.0, 20.0, 0.0)
TITLE = "What fails and what would cure it"
AS_ABOVE = "as in the row above"
_SHORT = 60
"""Letters up to which cures are told again, though the row above has the same."""
_DEFLECTIONS = (clause.LIVE_SMALL, clause.ATTACHED_SMALL, stages.RISE_SMALL)
_BARS = ("A_s", "A_sd")
"""Areas of bars: in a gap, further bars are told with their length instead."""
_SAME = 1e-9


@dataclass(frozen=True, eq=False, slots=True)
class Found:
    """The cures found for one design, by id and digest of their checks; what is sought is added.

    ``tried`` calculates the beam with other bars; None where no cures are to be sought.
    """

    tried: Tried | None
    cures: dict[tuple[str, str], list[Cure]] = field(default_factory=dict)


def record_cures(design: Design, part: Part, found: Found) -> None:
    """Record in the open part, after every check that fails, what would cure it."""
    said: dict[str, list[str]] = {}
    for check in failing(part):
        said.setdefault(cure_text(design, check, found), []).append(check.symbol)
    for text, keys in said.items():
        title = f"Cure: {_titles(part, keys)}"  # the note may stand far below the check
        design.model.sheet.note(f"cure-{keys[-1]}"[:60], text, title=title)


def _titles(part: Part, keys: Iterable[str]) -> str:
    return "; ".join(_title(part.entries[key]) for key in keys)


def _title(check: Entry) -> str:
    title = str((check.extra or {}).get("title") or check.source.title)
    return title[:1].lower() + title[1:]


def cure_text(design: Design, check: Entry, found: Found) -> str:
    """Return in a sentence what would cure a check that fails; plainly where nothing is known."""
    made = _once(design, check, found)
    return _reminded(design, check, told(made), made) if made else _why_none(check)


def _reminded(design: Design, check: Entry, text: str, made: Iterable[Cure]) -> str:
    """Return cures of a deflection with what they need: the bars that they were found with.

    A stiffer beam asks for fewer bars, and with those it may bend as much as before.
    """
    open_bars = check.source in _DEFLECTIONS and not design.model.inputs.bars_given
    if not open_bars or all(cure.value is None for cure in made):
        return text
    return f"{text}{'' if text.endswith('.') else '.'} {CHOSEN_ANEW}"


def _why_none(check: Entry) -> str:
    if check.source in stages.NO_STIFFNESS:
        return NONE_CROSS
    return NOT_SOUGHT


def _once(design: Design, check: Entry, found: Found) -> list[Cure]:
    """Return the cures of a check, sought if they are not found yet; none where none are sought."""
    key = check.id, check.digest
    if key not in found.cures and found.tried is not None:
        found.cures[key] = _cures(design, check, found.tried)
    return found.cures.get(key, [])


def _cures(design: Design, check: Entry, tried: Tried) -> list[Cure]:
    model = design.model
    if check.source in _DEFLECTIONS:
        return _deflection_cures(model, check)
    if without_bars(check):
        return section_gap_cures(check, lambda name: model.sheet.find(name).value, _size(design))
    gap = gap_of(design, check)
    if gap is not None:
        more = (cure for cure in cures_of(check) if cure.symbol not in _BARS)
        return [*gap_cures(design, gap, tried), *more]
    cut = cut_of(design, check)
    if cut is not None:
        return cut_cures(design, cut)
    if check.source is shear.STRENGTH and "s" not in check.part.entries:
        return [*_stirrup_cures(model, check), *cures_of(check)]
    return cures_of(check)


def _size(design: Design) -> str:
    """Return the size of the thickest bars of the beam."""
    return max(design.runs, key=lambda run: run.diameter).size


def failing_rows(design: Design, found: Found) -> Iterator[Row]:
    """Give a row for every check that fails, one for those of a part with the same cures.

    Checks that lead stand first. Cures that are those of the row before are not told again.
    """
    above = ""
    for part in sorted(design.model.sheet.parts, key=lambda part: not _leads(part)):
        rows: dict[str, list[Entry]] = {}
        for check in failing(part):
            rows.setdefault(_briefly(design, check, found), []).append(check)
        for cure, checks in rows.items():
            worst = max(checks, key=lambda check: utilisation(check) or math.inf)
            titles = "; ".join(_title(check) for check in checks)
            shown = AS_ABOVE if cure == above and len(cure) > _SHORT else cure
            yield Row((part.title, begun(titles), ratio_text(worst), shown), worst)
            above = cure


def _leads(part: Part) -> bool:
    return any((check.extra or {}).get("leads") for check in failing(part))


def _briefly(design: Design, check: Entry, found: Found) -> str:
    """Return the cures alone, without what would not do; the whole sentence where none does.

    Nothing where none are sought.
    """
    if found.tried is None:
        return ""
    made = _once(design, check, found)
    able = [cure.text for cure in made if cure.value is not None]
    if not able:
        return cure_text(design, check, found)
    return _reminded(design, check, lettered(able), made)


# -- stirrups where there are none -----------------------------------------------------------


def _stirrup_cures(model: Model, check: Entry) -> list[Cure]:
    """Return the widest stirrups with which a section without any that count holds.

    Strength, spacing and minimum stirrups hold together.
    """
    sheet, bound = model.sheet, bound_names(check) | dict(check.part.entries)
    names = ("f_c", "f_y", "phi_c", "phi_s", "lambda_", "E_s", "b_w")
    values = {name: sheet.find(name).value for name in names}
    values |= {name: bound[name].value for name in ("h", "d", "A_s", "M_f", "V_f")}
    values |= {"A_v": sheet.entry(f"{STIRRUPS}/A_v").value, "s": find.WIDEST_STIRRUPS}
    if model.inputs.shear_method == "simplified":
        del values["M_f"]
        row = "minimum stirrups or more"
        values |= {name: shear_factors.SIMPLIFIED.number(row, name) for name in ("beta", "theta")}
    uses = [
        rule(values)
        for rule in (
            cures_checks.shear_strength, cures_checks.stirrup_spacing, cures_checks.least_stirrups,
        )
    ]  # fmt: skip
    closest = find.CLOSEST_STIRRUPS
    spacings = find.down(find.WIDEST_STIRRUPS, closest, 25)
    none = f"no stirrups at {closest:g} mm or more"
    spaced = Variable(spacings, "stirrups at {} mm", "or less", none)
    return list(find.cures(lambda changes: max(use(changes) for use in uses), {"s": spaced}))


# -- deflections -----------------------------------------------------------------------------


def _deflection_cures(model: Model, check: Entry) -> list[Cure]:
    """Return the cures of a deflection: the whole span is bent again with the changed value."""
    spans = range(1, model.spans + 1)
    span = next((k for k in spans if deflection_key(k) == check.part.key), 0)
    if not span:
        return []
    values = {name: model.sheet.find(name).value for name in ("f_c", "lambda_", "gamma_c")}
    try:
        before = _behind(model, span)
        section, moments = bent_of(model, span, _bent_behind(model, before))
        use = cures_checks.deflecting(
            section, moments, carries=model.inputs.carries, history=history_of(model),
            rise=check.source is stages.RISE_SMALL,
            behind=None if before is None else before[1:], **values,
        )  # fmt: skip
        now = use({})
    except UserError:
        return []
    recorded = utilisation(check)
    if recorded is None or abs(now - recorded) > _SAME * recorded:
        return []
    depth = find.depth(section.h)
    if before is not None and before[1].h == section.h:
        depth = replace(depth, words="a depth of {} mm in this span and the one behind")
    variables = {
        "h": depth, "b_w": find.width(section.b_w),
        "f_c": find.concrete(values["f_c"]),
    }  # fmt: skip
    sag = next((part for part in model.sheet.parts if part.key == f"sag-{span}"), None)
    beside = None if sag is None else beside_each_other(sag, use)
    steel = () if beside is None else find.cures(beside[0], {"A_s": beside[1]})
    return [*steel, *find.cures(use, variables)]


def _behind(
    model: Model, span: int
) -> tuple[int, SpanSection, Mapping[Stage, StageMoments]] | None:
    """Return the span behind a cantilever: its number, what bends in it, its moments."""
    if not model.forces.beam.cantilever(span):
        return None
    number = span_behind(model.forces.beam, span)
    return None if number is None else (number, *bent_of(model, number, {}))


def _bent_behind(
    model: Model, before: tuple[int, SpanSection, Mapping[Stage, StageMoments]] | None
) -> dict[int, Behind]:
    if before is None:
        return {}
    number, section, moments = before
    made = deflections(section, moments, carries=model.inputs.carries, history=history_of(model))
    return {number: Behind.of(section.l, made)}
