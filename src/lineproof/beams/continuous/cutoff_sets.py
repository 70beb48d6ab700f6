"""Recorded: area and depth of a set of bars that stand together, and their moment resistance."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from lineproof.beams.bars import BarLayer, BarLayers, bars_text
from lineproof.beams.continuous.anchorage_record import Writers, place_of, plain
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.layout import BarRun, Face
from lineproof.beams.continuous.resistance import first_layers
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import bars as clause
from lineproof.standards.a23_3 import development, flexure
from lineproof.standards.a23_3.bars import BARS


@dataclass(frozen=True, slots=True)
class Group:
    """Bars of one size in one layer that count together."""

    layer: int
    size: str
    number: int
    first: str
    """Size of the bars in the first layer there, which a second layer stands over."""


def grouped(writers: Writers, runs: Iterable[BarRun]) -> tuple[Group, ...]:
    """Return the bars by layer and size, in order."""
    return groups_met(writers.designed, runs)


def groups_of_layers(layers: BarLayers) -> tuple[Group, ...]:
    """Return the bars of the layers of a section by layer and size, in order."""
    first = layers[0].size
    return tuple(
        Group(number, group.size, group.number, first)
        for number, layer in enumerate(layers, start=1)
        for group in layer.groups
    )


def groups_met(designed: Designed, runs: Iterable[BarRun]) -> tuple[Group, ...]:
    """Return the bars by layer, size and the first layer that they stand over, in order."""
    found: dict[tuple[int, str, str], int] = {}
    for run in runs:
        first = run.size
        if run.layer > 1:
            layers = first_layers(designed, run)
            first = max(layers, key=lambda layer: layer.diameter).size
        key = (run.layer, run.size, first)
        found[key] = found.get(key, 0) + run.number
    return tuple(Group(layer, size, n, first) for (layer, size, first), n in sorted(found.items()))


def text_of(runs: Iterable[BarRun]) -> str:
    """Return bars as typed: ``2-25M + 2-20M``; those of a second layer are named so."""
    found: dict[tuple[int, str, str], int] = {}
    for run in runs:
        key = (run.layer, run.place, run.size)
        found[key] = found.get(key, 0) + run.number
    words = {"web": "", "overhang": " in the overhangs", "side face": " at the side faces"}
    return " + ".join(
        bars_text((BarLayer(n, size),)) + (" in layer 2" if layer > 1 else "") + words[place]
        for (layer, place, size), n in sorted(found.items())
    )


def begin(writers: Writers, sheet: Sheet, span: int, face: Face) -> Steps:
    """Return steps inside the open part at a section of a span: b, h, h_f, stirrup."""
    place = place_of(writers, span)
    outline = writers.designed.outline
    b_w = sheet.find("b_w")
    place |= {"b": b_w, "b_w": b_w}
    if face == "bottom" and outline.h_f:
        place |= {"b": place["b_f"], "h_f": sheet.find("h_f")}
    steps = Steps(sheet, place | dict(writers.sizes.get(face, {})))
    if "d_bs" not in steps.place:
        stirrup = writers.designed.basis.stirrups.size
        steps.bind(d_bs=sheet.lookup("d_bs", BARS, stirrup, "d_b"))
    return steps


def record_area(steps: Steps, groups: Iterable[Group], total: str, *, depth: bool = True) -> Entry:
    """Record number and area of every group, their sum as ``total`` and, if asked, the depth d."""
    kept = tuple(groups)
    if len(kept) == 1:
        A = _record_group(steps, kept[0], "", total)
        if depth:
            steps.bind(d=_record_depth(steps, kept[0], "d", ""))
        steps.bind(A_s=A)
        return A
    areas = [_record_group(steps, g, str(i), f"A_s{i}") for i, g in enumerate(kept, 1)]
    return _summed(steps, kept, areas, total, depth=depth)


def _record_group(steps: Steps, group: Group, mark: str, symbol: str) -> Entry:
    sheet = steps.sheet
    d_b, A_b = (_of_size(steps, name, mark, group.size) for name in ("d_b", "A_b"))
    number = f"n_{mark}" if mark else "n_b"
    n = sheet.given(number, str(group.number), "number of bars as laid", source="as laid")
    steps.bind(**{f"d_b{mark}": d_b})
    return steps.line(clause.AREA_OF_BARS, symbol, n_b=n, A_b=A_b)


def _of_size(steps: Steps, name: str, mark: str, size: str) -> Entry:
    """Return a diameter or area of bars: where it stands already, else looked up here."""
    known = steps.place.get(f"{name} {size}")
    if known is not None:
        return known
    title = "diameter of the bar" if name == "d_b" else "area of one bar"
    made = steps.sheet.lookup(f"{name}{mark}", BARS, size, name, title=title)
    steps.bind(**{f"{name} {size}": made})
    return made


def _summed(
    steps: Steps, groups: tuple[Group, ...], areas: list[Entry], total: str, *, depth: bool
) -> Entry:
    """Record the sum of the areas two by two, and the depth of their centroid."""
    depths: list[Entry] = []
    if depth:
        depths = [_record_depth(steps, g, f"d_{i}", str(i)) for i, g in enumerate(groups, 1)]
    A, d = areas[0], depths[0] if depths else None
    for index in range(1, len(areas)):
        last = index == len(areas) - 1
        pair = {"A_s1": A, "A_s2": areas[index]}
        A = steps.line(clause.TOTAL_AREA, total if last else f"A_sc{index}", **pair)
        if d is not None:
            pair |= {"d_1": d, "d_2": depths[index]}
            d = steps.line(clause.DEPTH_TWO_LAYERS, "d" if last else f"d_c{index}", **pair)
    steps.bind(A_s=A)
    if d is not None:
        steps.bind(d=d)
    return A


def _record_depth(steps: Steps, group: Group, symbol: str, mark: str) -> Entry:
    """Record the depth to the bars of a group."""
    d_b = steps.entry(f"d_b{mark}")
    if group.layer == 1:
        return steps.line(
            clause.DEPTH_ONE_LAYER if symbol == "d" else clause.DEPTH_FIRST, symbol, d_b=d_b
        )
    below = _of_size(steps, "d_b", f"f{mark}", group.first)
    return record_second_depth(steps, symbol, mark, d_b, below)


def record_second_depth(steps: Steps, symbol: str, mark: str, d_b: Entry, below: Entry) -> Entry:
    """Record inside the open part the depth of a second layer over bars of diameter ``below``."""
    thicker = max((below, d_b), key=lambda entry: float(entry.value))
    first = steps.line(clause.DEPTH_FIRST, f"d_f{mark}", d_b=below)
    s_l = steps.line(clause.LAYER_DISTANCE, f"s_l{mark}", d_b=thicker)
    return steps.line(clause.DEPTH_SECOND, symbol, d_1=first, d_b=below, s_l=s_l, d_b2=d_b)


def record_resistance(steps: Steps, writers: Writers, face: Face) -> Entry:
    """Record M_r of the area A_s at the depth d that the steps hold."""
    steps.line(flexure.BLOCK_RECTANGULAR)
    flanged = face == "bottom" and writers.designed.outline.h_f > 0
    if not flanged or steps.decide(flexure.IN_FLANGE):
        return steps.line(flexure.M_R_RECTANGULAR)
    steps.lines(flexure.FLANGE_FORCE, flexure.BLOCK_IN_WEB)
    return steps.line(flexure.M_R_TEE)


def record_developed(
    steps: Steps, rows: Iterable[tuple[Group, float, Entry]], *, depth: bool = True
) -> Entry:
    """Record the developed area of groups: each with the length available and that needed.

    Binds A_sd, A_s (the same) and, if asked, d.
    """
    kept = tuple(rows)
    groups = tuple(group for group, _, _ in kept)
    areas = []
    for index, (group, length, needed) in enumerate(kept, 1):
        mark, of_group = ("", "") if len(kept) == 1 else (str(index), f", group {index}")
        A_s = _record_group(steps, group, mark, f"A_s{mark}")
        l_av = steps.sheet.given(
            f"l_av{mark}",
            plain(length, "mm"),
            "length from the end of the bars" + of_group,
            source="as laid",
        )
        symbol = f"A_sd{mark}"
        areas.append(steps.line(development.DEVELOPED_AREA, symbol, A_s=A_s, l_av=l_av, l_d=needed))
    if len(kept) == 1:
        A = areas[0]
        if depth:
            steps.bind(d=_record_depth(steps, groups[0], "d", ""))
    else:
        A = _summed(steps, groups, areas, "A_sd", depth=depth)
    steps.bind(A_sd=A, A_s=A)
    return A
