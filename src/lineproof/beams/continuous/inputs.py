"""The inputs of a beam of any number of spans: read and checked at the border."""

from __future__ import annotations

import math
import re
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

from lineproof.beams.bars import BarLayers, read_bars, read_one_layer
from lineproof.beams.continuous.imported_forces import ForcesFile
from lineproof.beams.continuous.imported_inputs import read_forces_file
from lineproof.beams.continuous.inputs_together import (
    STORED,
    check_bars_given,
    check_construction,
    check_method,
    check_proportions,
    check_slab,
    check_snow,
    check_torques,
    check_unit_weight,
)
from lineproof.beams.continuous.interface import SlabBars, read_slab_bars
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.shear_numbers import METHODS
from lineproof.beams.continuous.stirrups_given import SpanStirrups, read_stirrups
from lineproof.beams.continuous.typed_beam import (
    TypedLoad,
    TypedSupport,
    outline_of_typed,
    read_depths,
    read_list,
    read_loads,
    read_spans,
    read_supports,
    spans_counted,
)
from lineproof.beams.continuous.typed_runs import read_runs
from lineproof.beams.continuous.typed_ties import check_hook_ties, read_hook_ties
from lineproof.beams.continuous.typed_torques import KINDS_OF_TORSION, read_torques
from lineproof.beams.inputs import (
    MINIMUM_RULES,
    SHAPES,
    InputReader,
    Range,
    Shape,
    bare_number,
    check_density,
    no_openings,
    one_of,
    read_fire_rating,
    read_grade,
    read_in_range,
    read_input,
    row_of,
    yes_or_no,
)
from lineproof.errors import FaultList, UserError
from lineproof.quantity import Typed, echo
from lineproof.standards.a23_3.bars import STIRRUP_BENDS
from lineproof.standards.a23_3.cover import EXPOSURES, FIRE_SLAB
from lineproof.standards.a23_3.deflection import DURATIONS, LIMITS
from lineproof.standards.a23_3.development import UNCOATED
from lineproof.standards.a23_3.hooks import COATING_FACTORS
from lineproof.standards.a23_3.materials import DENSITY_FACTORS
from lineproof.standards.codes import CodePair
from lineproof.standards.nbc.loads import USES

AREA = Range("kPa", 0, 100, 1.8, zero=True)
SHARE = Range("", 0, 1, 0.25, zero=True)
UNIT_WEIGHT = Range("kN/m3", 10, 30, 24)
LEAST_LEGS, MOST_LEGS = 2, 6
ATTACHED = dict(zip(DURATIONS.rows, (3, 6, 12, 60), strict=True))
"""Months of the durations of 9.8.2.5."""
MONTHS = {"week": 12 / 52, "month": 1.0, "year": 12.0}
_DURATION = re.compile(r"\s*(\d+(?:\.\d+)?)\s*(week|month|year)s?\s*", re.IGNORECASE)
USUAL_STIRRUP = "10M"
"""By which zones are looked at whose size is not understood."""


@dataclass(frozen=True)
class ContinuousInputs:
    """Checked inputs of a beam of any number of spans; lists hold one item a span or support."""

    shape: Shape
    spans: tuple[Typed, ...]
    depths: tuple[Typed, ...]
    supports: tuple[TypedSupport, ...]
    spacing: Typed
    tributary_width: Typed | None
    b_w: Typed
    h_f: Typed | None
    f_c: Typed
    gamma_c: Typed
    gamma_w: Typed | None
    density: str
    grade: str
    coating: str
    superimposed: Typed
    partitions: Typed | None
    floor_weight: Typed | None
    use: str
    live_load: Typed | None
    snow: Typed | None
    reduce_live_load: bool
    loads: tuple[TypedLoad, ...]
    construction_load: Typed | None
    exposure: str
    cover: Typed
    aggregate: Typed
    fire_rating: str
    fire_aggregate: str
    stirrup: str
    shear_method: str
    bottom_bars: tuple[BarLayers | None, ...]
    top_bars: tuple[BarLayers | None, ...]
    minimum_rule: str
    carries: str
    attached_after: str
    sustained: Typed | None
    redistribution: Mapping[int, float]
    stirrup_legs: int
    closed_stirrups: bool
    stirrups: Mapping[int, SpanStirrups] | None
    bar_runs: tuple[BarRun, ...] | None
    hook_ties: Mapping[int, float]
    torques: Mapping[str, Typed]
    torsion: str
    slab_bars: SlabBars | None
    forces_file: ForcesFile | None

    @property
    def slab(self) -> bool:
        """Whether the beam has a flange."""
        return self.h_f is not None

    @property
    def coated(self) -> bool:
        """Whether the bars are coated with epoxy."""
        return self.coating != UNCOATED

    @property
    def held(self) -> tuple[int, ...]:
        """Numbers of the supports; free ends are none."""
        return tuple(j for j, each in enumerate(self.supports, start=1) if each.kind != "free")

    @property
    def bars_given(self) -> bool:
        """Whether any bars are given, by section or along the beam."""
        return self.bar_runs is not None or any((*self.bottom_bars, *self.top_bars))

    @property
    def as_built(self) -> bool:
        """Whether both the bars along the beam and the stirrups are given."""
        return self.bar_runs is not None and self.stirrups is not None

    @property
    def live_kind(self) -> str:
        """The load type of the live load on the floor."""
        return "L_st" if self.use in STORED else "L"


def read_inputs(
    given: Mapping[str, Any], project: Mapping[str, Any]
) -> tuple[ContinuousInputs, CodePair]:
    """Read and check all inputs and the code pair; raises :class:`UserError` with every fault."""
    reader = InputReader(given)
    pair = reader.code_pair(project)
    spans = reader.take("spans", read_spans) or ()
    fields: dict[str, Any] = {"spans": spans} | _read_alone(reader)
    reader.take("web_openings", no_openings)
    if count := len(spans) or spans_counted(given["spans"]):
        fields |= _read_by_span(reader, given, spans, count)
        fields |= _read_laid(reader, fields, pair, count)
    fields["forces_file"] = reader.take("forces_csv", read_forces_file, given, fields)
    _check_together(fields, given, reader.faults)
    reader.faults.raise_if_any()
    return ContinuousInputs(**fields), pair


def _read_alone(reader: InputReader) -> dict[str, Any]:
    """Read the inputs whose meaning does not depend on the number of spans."""
    take, some = reader.take, reader.take_if_given
    return {
        "shape": take("shape", one_of, SHAPES),
        **{name: take(name, read_input)
           for name in ("spacing", "b_w", "f_c", "gamma_c", "superimposed", "cover", "aggregate")},
        **{name: some(name, read_input)
           for name in ("h_f", "live_load", "tributary_width", "floor_weight")},
        **{name: some(name, read_in_range, AREA)
           for name in ("partitions", "snow", "construction_load")},
        "gamma_w": some("gamma_w", read_in_range, UNIT_WEIGHT),
        "sustained": some("sustained", read_in_range, SHARE),
        "density": take("density", row_of, DENSITY_FACTORS),
        "grade": take("grade", read_grade),
        "coating": take("coating", row_of, COATING_FACTORS),
        "use": take("use", row_of, USES),
        "reduce_live_load": take("reduce_live_load", yes_or_no),
        "exposure": take("exposure", row_of, EXPOSURES),
        "fire_rating": take("fire_rating", read_fire_rating),
        "fire_aggregate": take("fire_aggregate", one_of, tuple(FIRE_SLAB.columns)),
        "stirrup": take("stirrup", row_of, STIRRUP_BENDS),
        "shear_method": take("shear_method", one_of, METHODS),
        "minimum_rule": take("minimum_rule", one_of, MINIMUM_RULES),
        "carries": take("carries", row_of, LIMITS),
        "attached_after": take("attached_after", _read_attached),
        "stirrup_legs": take("stirrup_legs", _read_legs),
        "closed_stirrups": take("closed_stirrups", yes_or_no),
        "torques": some("torques", read_torques) or {},
        "torsion": take("torsion", one_of, KINDS_OF_TORSION),
        "slab_bars": some("slab_bars", read_slab_bars),
    }  # fmt: skip


def _read_by_span(
    reader: InputReader, given: Mapping[str, Any], spans: tuple[Typed, ...], count: int
) -> dict[str, Any]:
    """Read the inputs that have a value for every span or support.

    A wrong length of a span hides no other fault; only loads have places that rest on it.
    """
    take = reader.take
    return {
        "depths": take("h", read_depths, count),
        "supports": take("supports", read_supports, given["columns"], count),
        "loads": take("loads", read_loads, spans) if spans else None,
        "redistribution": take("redistribution", _read_redistribution) or {},
        "bottom_bars": take("bottom_bars", _read_bar_list, count, "span", read_bars),
        "top_bars": take("top_bars", _read_bar_list, count + 1, "support", read_one_layer),
    }


def _read_laid(
    reader: InputReader, fields: Mapping[str, Any], pair: CodePair | None, count: int
) -> dict[str, Any]:
    """Read bars and stirrups along the beam; their places only where the beam itself is sound."""
    outline, some = outline_of_typed(fields), reader.take_if_given
    clear = dict.fromkeys(range(1, count + 1), math.inf)
    if outline is not None:
        halves = [support.half for support in outline.supports]
        for k, length in enumerate(outline.lengths, start=1):
            clear[k] = length - halves[k] - halves[k - 1]
    stirrup = fields["stirrup"] or USUAL_STIRRUP
    return {
        "bar_runs": some("bar_runs", read_runs, outline, pair),
        "stirrups": some("stirrups", read_stirrups, clear, stirrup),
        "hook_ties": some("hook_ties", read_hook_ties) or {},
    }


def _check_together(fields: dict[str, Any], given: Mapping[str, Any], faults: FaultList) -> None:
    """Check what inputs ask of each other; proportions only of inputs that are sound."""
    check_density(fields, given, faults)
    check_unit_weight(fields, faults)
    check_slab(fields, given, faults)
    check_snow(fields, faults)
    check_bars_given(fields, faults)
    check_hook_ties(fields, given, faults)
    check_method(fields, faults)
    if fields["spans"]:
        check_torques(fields, faults)
        check_construction(fields, faults)
    if not faults.faults:
        check_proportions(fields, faults)


def _read_attached(name: str, given: object) -> str:
    """Return one of the durations for which the standard has a factor.

    Of one between them the shorter is safe: more of the deflection comes after it.
    """
    match = _DURATION.fullmatch(str(given))
    if match is None or given in DURATIONS.rows:
        return row_of(name, given, DURATIONS)
    months = float(match[1]) * MONTHS[match[2].lower()]
    reached = [row for row, least in ATTACHED.items() if least <= months]
    if not reached:
        told = f"{next(iter(ATTACHED))!r}; of a shorter time no factor is given"
    elif months in (ATTACHED[reached[-1]], max(months, *ATTACHED.values())):
        told = f"{reached[-1]!r}"
    else:
        told = f"the shorter {reached[-1]!r}, which is safe"
    raise UserError(
        f"{name}: {echo(given)}: 9.8.2.5 has factors for {', '.join(DURATIONS.rows)}; write {told}"
    )


def _read_legs(name: str, given: object) -> int:
    if (
        isinstance(given, bool)
        or not isinstance(given, int)
        or not LEAST_LEGS <= given <= MOST_LEGS
    ):
        told = bare_number(given) or f"{LEAST_LEGS} to {MOST_LEGS}"
        raise UserError(f"{name}: {echo(given)}; write {told}")
    return given


def _read_redistribution(name: str, given: object) -> dict[int, float]:
    """Read by how many per cent the moments of supports are changed, by number of the support."""
    if given is None:
        return {}
    if not isinstance(given, Mapping):
        raise UserError(
            f"{name}: {echo(given)} is not understood; write {{2: 15, 3: 15}} (per cent)"
        )
    faults = FaultList()
    made: dict[int, float] = {}
    for support, percent in given.items():
        number = isinstance(percent, int | float) and not isinstance(percent, bool)
        if type(support) is not int or not number:
            faults.add(
                f"{name}: {{{support!r:.30}: {percent!r:.30}}}; write number of the support and "
                "per cent, both without quotes: {2: 15}"
            )
        elif 0 < abs(percent) < 1:  # a share is meant: nobody redistributes half a per cent
            faults.add(
                f"{name} at support {support}: {percent} % is less than one per cent; write "
                f"{percent * 100:g} for {percent * 100:g} %"
            )
        else:
            made[support] = float(percent)
    faults.raise_if_any()
    return made


def _read_bar_list(
    name: str, given: object, count: int, each: str, read: Any
) -> tuple[BarLayers | None, ...]:
    """Read bars by span or support; None, or None in the list, leaves them open."""
    if given is None:
        return (None,) * count
    rows = [given] * count if isinstance(given, str) else read_list(name, given)
    faults = FaultList()
    if len(rows) != count:
        faults.add(f"{name}: {len(rows)} given; write {count}, one a {each}, or None for all")
    made: list[BarLayers | None] = []
    for number, row in enumerate(rows, start=1):
        try:
            made.append(None if row is None else read(f"{name}, {each} {number}", row))
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()
    return tuple(made)
