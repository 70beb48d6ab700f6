"""What is given and the load take-down of a beam of any number of spans."""

from __future__ import annotations

from collections.abc import Iterator

from lineproof.beams.basics import record_tributary
from lineproof.beams.continuous.inputs import ContinuousInputs
from lineproof.beams.continuous.model import COLUMNS, GIVEN, LOADS, single_loads, whole_span_loads
from lineproof.beams.continuous.symbols import KINDS, code, notation, numbered, stated, subscript
from lineproof.beams.continuous.typed_beam import TypedColumn, TypedLoad
from lineproof.formula import Symbol
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.codes import CodePair
from lineproof.standards.nbc import loads, reduction

_CARRIERS = {"column": "a column", "girder": "a girder", "wall": "a wall", "none": "a free end"}
_HOLDS = {
    "simple": "holds it vertically and leaves it free to rotate",
    "fixed": "holds it against turning",
    "elastic": "holds it with the stiffness of its columns",
    "free": "does not hold it",
}
_IMPORTED = (
    "Moments and shears are brought in from a frame analysis: combinations, arrangements of live "
    "load and lateral loads are its own, and no moment follows from the loads of this part."
)


def beam_symbols(inputs: ContinuousInputs) -> Iterator[Symbol]:
    """Give the symbols numbered by span, support and load that this beam needs."""
    count = len(inputs.spans)
    for k in range(1, count + 1):
        yield numbered(f"l_{k}", "ℓ", str(k), f"span {k}, centre to centre of supports")
        yield numbered(f"h_{k}", "h", str(k), f"overall depth of span {k}")
        for kind, words in KINDS.items():
            yield numbered(
                f"w_{code(kind)}{k}", "w", f"{subscript(kind)}{k}", f"{words} on span {k}"
            )
    for j in range(1, count + 2):
        yield numbered(f"b_s{j}", "b", f"s{j}", f"width of support {j} along the beam")
    for j in inputs.redistribution:
        yield numbered(f"p_{j}", "p", str(j), f"change of the moments at support {j}, per cent")
    for j, support in enumerate(inputs.supports, start=1):
        yield from _column_symbols(j, len(support.columns))
    yield from _load_symbols(inputs)


def _column_symbols(support: int, columns: int) -> Iterator[Symbol]:
    for letter, where in zip("ab"[:columns], ("first", "second"), strict=False):
        what = f"the {where} column at support {support}"
        sub = f"c{support}{letter}"
        yield numbered(f"h_{sub}", "h", sub, f"depth of {what}, along the beam")
        yield numbered(f"b_{sub}", "b", sub, f"width of {what}")
        yield numbered(f"l_{sub}", "ℓ", sub, f"height of {what}")
        yield numbered(f"I_{sub}", "I", sub, f"moment of inertia of {what}")
    if columns:
        yield numbered(
            f"K_{support}",
            "K",
            str(support),
            f"stiffness of the columns at support {support} over E",
        )


def _load_symbols(inputs: ContinuousInputs) -> Iterator[Symbol]:
    for letter, items in (
        ("x", single_loads(inputs)),
        ("y", [(load, 0) for load in whole_span_loads(inputs)]),
    ):
        for number, (load, span) in enumerate(items, start=1):
            name = f"{letter}{number}"
            yield numbered(f"w_{name}", "w", name, load.what)
            yield numbered(f"q_{name}", "q", name, f"{load.what}, per area")
            yield numbered(f"b_{name}", "b", name, f"{load.what}: loaded width")
            if letter == "x":
                yield numbered(f"P_{name}", "P", name, load.what)
                free = span == 1 and inputs.supports[0].kind == "free"
                origin = "from the free end" if free else "from the left axis"
                yield numbered(f"a_{name}", "a", name, f"{load.what}: {origin}")
                yield numbered(f"s_{name}", "s", name, f"{load.what}: begins at")
                yield numbered(f"e_{name}", "e", name, f"{load.what}: ends at")


def record_given(sheet: Sheet, inputs: ContinuousInputs) -> None:
    """Record the inputs as typed."""
    sheet.notation = sheet.notation | notation(beam_symbols(inputs))
    with sheet.part(GIVEN, "Given"):
        for k, span in enumerate(inputs.spans, start=1):
            sheet.given(f"l_{k}", span)
        if one_depth(inputs):
            sheet.given("h", inputs.depths[0])
        else:
            for k, depth in enumerate(inputs.depths, start=1):
                sheet.given(f"h_{k}", depth)
        for j, support in enumerate(inputs.supports, start=1):
            if support.width is not None:
                sheet.given(f"b_s{j}", support.width)
        record_tributary(sheet, inputs.spacing, inputs.tributary_width)
        sheet.given("b_w", inputs.b_w)
        if inputs.h_f is not None:
            sheet.given("h_f", inputs.h_f)
        sheet.given("f_c", inputs.f_c)
        sheet.given("gamma_c", inputs.gamma_c)
        sheet.given("c_c", inputs.cover)
        sheet.given("a_max", inputs.aggregate)
        for j, percent in inputs.redistribution.items():
            sheet.given(f"p_{j}", f"{percent:g}", clause="9.2.4")
        sheet.note("supports", _supports_text(inputs), title="Supports, from left to right")
        sheet.note("choices", _choices_text(inputs), title="Choices")


_OVERHANGS = (
    " Top bars in the overhangs are the beam's own: bars of the slab are not counted for it."
)


def one_depth(inputs: ContinuousInputs) -> bool:
    """Tell whether all spans have the same depth."""
    return len({depth.value for depth in inputs.depths}) == 1


def _supports_text(inputs: ContinuousInputs) -> str:
    rows = []
    for j, support in enumerate(inputs.supports, start=1):
        width = "" if support.width is None else f", {support.width.text} wide"
        rows.append(f"{j}: {_CARRIERS[support.carrier]}{width}, {_HOLDS[support.kind]}")
    return "; ".join(rows) + "."


def _choices_text(inputs: ContinuousInputs) -> str:
    coated = ", coated with epoxy" if inputs.coated else ""
    return (
        f"Section {inputs.shape}; reinforcement {inputs.grade}{coated}; {inputs.density}-density "
        f"concrete; use: {inputs.use}; exposure class {inputs.exposure}; fire-resistance rating "
        f"{inputs.fire_rating}, type {inputs.fire_aggregate} concrete; stirrups {inputs.stirrup}; "
        f"shear by the {inputs.shear_method} method; minimum reinforcement by "
        f"{inputs.minimum_rule}; carries: {inputs.carries}. Bars in compression are not counted."
        f"{_OVERHANGS if inputs.slab else ''}"
    )


def record_columns(sheet: Sheet, inputs: ContinuousInputs) -> None:
    """Record the rotational stiffness of the columns, if any hold the beam elastically."""
    if not any(support.columns for support in inputs.supports):
        return
    with sheet.part(COLUMNS, "Columns that hold the beam"):
        for j, support in enumerate(inputs.supports, start=1):
            terms = [
                _record_column(sheet, f"c{j}{letter}", column)
                for letter, column in zip("ab", support.columns, strict=False)
            ]
            if terms:
                sheet.line(
                    stated(
                        f"K_{j} = {' + '.join(terms)}", system="N-mm",
                        title=f"Rotational stiffness of the columns at support {j}, over E",
                    )
                )  # fmt: skip
        sheet.note(
            "columns-stiffness",
            "The gross sections of columns and beam are taken, with one modulus of elasticity; "
            "the frame does not sway.",
            title="Stiffness", clause="9.2.1", basis="common practice",
        )  # fmt: skip


def _record_column(sheet: Sheet, name: str, column: TypedColumn) -> str:
    sheet.given(f"h_{name}", column.depth)
    sheet.given(f"b_{name}", column.width)
    sheet.given(f"l_{name}", column.height)
    sheet.line(
        stated(f"I_{name} = b_{name}*h_{name}**3/12", title="Moment of inertia", system="N-mm")
    )
    return f"{4 if column.far_end == 'fixed' else 3}*I_{name}/l_{name}"


def record_loads(sheet: Sheet, inputs: ContinuousInputs, pair: CodePair) -> None:
    """Record the load take-down: the floor by tributary width, single loads, loads on each span."""
    with sheet.part(LOADS, "Loads"):
        if inputs.gamma_w is None:
            sheet.lookup("gamma_w", loads.UNIT_WEIGHT, "reinforced, normal density")
        else:
            sheet.given("gamma_w", inputs.gamma_w)
        floor = _record_dead(sheet, inputs)
        live = _record_live(sheet, inputs, pair)
        if inputs.snow is not None:
            sheet.given(
                "q_S", inputs.snow, source="specified snow load, importance factor included"
            )
            sheet.line(loads.SNOW)
        if inputs.construction_load is not None:
            sheet.given("q_cn", inputs.construction_load)
            sheet.line(loads.CONSTRUCTION)
        for number, load in enumerate(whole_span_loads(inputs), start=1):
            _record_size(sheet, f"y{number}", load)
        for number, (load, span) in enumerate(single_loads(inputs), start=1):
            _record_single(sheet, f"x{number}", load, span)
        for k in range(1, len(inputs.spans) + 1):
            _record_span(sheet, inputs, k, floor, live)
        sheet.note("load-notes", _notes(inputs), title="Loads taken", clause="NBC 4.1.3.2")


def _notes(inputs: ContinuousInputs) -> str:
    weight = "The weight of the slab is counted once, over the tributary width. "
    if inputs.forces_file is not None:
        return (weight if inputs.slab else "") + _IMPORTED
    return (
        (weight if inputs.slab else "")
        + "Wind and earthquake are not carried by this beam. Every combination stands with 1.25 "
        "and with 0.9 times dead load, with each companion load and without it. Live load stands "
        "on all spans, on alternate spans and on two adjacent spans (9.2.3.1), and also on two "
        "adjacent spans with every other span beyond them, on all other spans without these, and "
        "on every span alone (NBC 4.1.5.3). "
        "No other arrangement is made."
    )


def _record_dead(sheet: Sheet, inputs: ContinuousInputs) -> dict[int, list[str]]:
    """Record the dead loads of the floor; return by span the symbols that make w_D there."""
    own = loads.WEB if inputs.slab else loads.BEAM
    common = ["w_sl"] if inputs.slab else ["w_fl"]
    if inputs.slab:
        sheet.line(loads.SLAB)
    else:
        sheet.given("q_fl", inputs.floor_weight)  # type: ignore[arg-type]  # given with no slab
        sheet.line(loads.FLOOR)
    weights = {}
    if one_depth(inputs):
        name = sheet.line(own).symbol
        weights = dict.fromkeys(range(1, len(inputs.spans) + 1), name)
    else:
        for k in range(1, len(inputs.spans) + 1):
            name = f"{own.symbol}{k}"
            sheet.line(own, symbol=name, h=sheet.find(f"h_{k}"), title=f"{own.title}, span {k}")
            weights[k] = name
    sheet.given("q_SD", inputs.superimposed)
    common.append(sheet.line(loads.SUPERIMPOSED).symbol)
    if inputs.partitions is not None:
        sheet.given("q_pt", inputs.partitions)
        sheet.lookup("q_ptmin", loads.PARTITION_ALLOWANCE, "partitions not drawn")
        sheet.check(loads.PARTITIONS_ENOUGH)
        common.append(sheet.line(loads.PARTITIONS).symbol)
    return {k: [common[0], name, *common[1:]] for k, name in weights.items()}


def _record_live(sheet: Sheet, inputs: ContinuousInputs, pair: CodePair) -> str:
    """Record the live load on the tributary width, reduced where asked; return its symbol."""
    if inputs.live_load is None:
        q_L = sheet.lookup("q_L", loads.USES, inputs.use)
    else:
        q_L = sheet.given("q_L", inputs.live_load)
        least = sheet.lookup("q_Lmin", loads.USES, inputs.use, "q_L")
        sheet.check(loads.LIVE_IS_ENOUGH, q_Lmin=least)
    if inputs.reduce_live_load and _record_reduction(sheet, inputs, pair, q_L):
        return sheet.line(reduction.LIVE_REDUCED).symbol
    return sheet.line(loads.LIVE).symbol


def _record_reduction(sheet: Sheet, inputs: ContinuousInputs, pair: CodePair, q_L: Entry) -> bool:
    """Record the factor by tributary area of the shortest span, if the code allows one."""
    made = reduction.reduction(inputs.use, q_L.value, pair.building)
    shortest = min(range(len(inputs.spans)), key=lambda i: inputs.spans[i].value)
    if made is None:
        sheet.note(
            "not-reduced", f"The code allows no reduction for this use ({inputs.use}).",
            title="Live load reduction", clause="NBC 4.1.5.8",
        )  # fmt: skip
        return False
    sheet.line(
        reduction.TRIBUTARY_AREA, l=sheet.find(f"l_{shortest + 1}"),
        title="Tributary area of the shortest span, taken for the whole beam",
    )  # fmt: skip
    row = reduction.HEAVY if made is reduction.FACTOR_HEAVY else reduction.OTHER
    sheet.lookup("A_Lmin", reduction.AREAS, row)
    if not sheet.decide(reduction.LARGE_ENOUGH):
        return False
    sheet.lookup("A_0", reduction.AREAS, row)
    sheet.line(made)
    return True


def _record_size(sheet: Sheet, name: str, load: TypedLoad) -> None:
    """Record a load per length, as given or from a load per area."""
    if load.form == "line":
        sheet.given(f"w_{name}", load.size, load.what, source=KINDS[load.kind])
        return
    sheet.given(f"q_{name}", load.size, load.what, source=KINDS[load.kind])
    sheet.given(f"b_{name}", load.width)  # type: ignore[arg-type]  # an area load has a width
    sheet.line(
        stated(f"w_{name} = q_{name}*b_{name}", title="Load on its width", clause="NBC 4.1.4.1"),
        title=f"{load.what}, on its width",
    )


def _record_single(sheet: Sheet, name: str, load: TypedLoad, span: int) -> None:
    where = f"{KINDS[load.kind]} on span {span}"
    if load.form == "point":
        sheet.given(f"P_{name}", load.size, load.what, source=where)
        sheet.given(f"a_{name}", load.at)  # type: ignore[arg-type]  # a point load has a place
        return
    _record_size(sheet, name, load)
    sheet.given(f"s_{name}", load.start, source=where)  # type: ignore[arg-type]  # given together
    sheet.given(f"e_{name}", load.end, source=where)  # type: ignore[arg-type]  # given together


def _record_span(
    sheet: Sheet, inputs: ContinuousInputs, span: int, floor: dict[int, list[str]], live: str
) -> None:
    """Record the uniform load of each type on one span."""
    terms: dict[str, list[str]] = {"D": list(floor[span]), inputs.live_kind: [live]}
    if inputs.snow is not None:
        terms["S"] = ["w_S"]
    for number, load in enumerate(whole_span_loads(inputs), start=1):
        if span in load.spans:
            terms.setdefault(load.kind, []).append(f"w_y{number}")
    for kind, names in terms.items():
        sheet.line(
            stated(
                f"w_{code(kind)}{span} = {' + '.join(names)}", clause="NBC 4.1.3.2",
                title=f"{KINDS[kind].capitalize()} on span {span}",
            )
        )  # fmt: skip
