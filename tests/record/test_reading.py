"""Reading a record: the round trip, and every hostile or damaged one refused as wrong input."""

from __future__ import annotations

import copy
import json
import math
import time
from collections.abc import Callable
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from lineproof.errors import UserError
from lineproof.record import MIME, Record, recompute

Data = dict[str, Any]


def test_round_trip(sample: Record) -> None:
    text = sample.to_text()
    again = Record.from_text(text)
    assert again.data == sample.data == json.loads(text)
    assert again.to_text() == text
    assert again.digest == sample.digest
    assert again.calc_id == "B7"
    assert [part["key"] for part in again.parts] == ["inputs", "flexure", "found"]
    assert next(iter(again.entries)) == "inputs/f_c"
    assert repr(again) == f"record of B7: 21 lines, digest {sample.digest}"
    assert again._repr_mimebundle_() == {MIME: sample.data, "text/plain": repr(again)}


def _entry(data: Data, entry_id: str) -> Data:
    return next(e for part in data["parts"] for e in part["entries"] if e["id"] == entry_id)


def _nested(depth: int) -> Any:
    value: Any = 1
    for _ in range(depth):
        value = [value]
    return value


def _at(entry_id: str, *path: str, value: object) -> Callable[[Data], object]:
    def change(data: Data) -> None:
        row = _entry(data, entry_id)
        for key in path[:-1]:
            row = row[key]
        row[path[-1]] = value

    return change


M_F, CHECK, FOUND = "flexure/M_f", "flexure/M_f_at_most_M_r", "found/s"
DAMAGE: list[tuple[Callable[[Data], object], str]] = [
    (lambda d: d.update(schema=2), "not a lineproof record of schema 1"),
    (lambda d: d.update(schema=True), "not a lineproof record of schema 1"),
    (lambda d: d.update(schema="1"), "not a lineproof record of schema 1"),
    (lambda d: d.pop("schema"), "not a lineproof record of schema 1"),
    (lambda d: d.pop("parts"), "'parts' is missing or not a list"),
    (lambda d: d.update(calc={"id": 7, "title": ""}), "calc: 'id' is missing or not a str"),
    (lambda d: d.update(parts=[7]), "parts holds 7 instead of a row"),
    (lambda d: d["parts"].append(d["parts"][0]), "part 'inputs' stands twice"),
    (lambda d: d["parts"][0]["entries"].append(3), "holds 3 instead of a row"),
    (lambda d: d["parts"][0]["entries"].append(d["parts"][0]["entries"][0]),
     "inputs/f_c stands twice"),
    (lambda d: d["parts"].reverse(), "which does not stand before it"),
    (lambda d: d["notation"].append({"id": "x"}), "notation: 'base' is missing"),
    (lambda d: d["notation"].append(d["notation"][0]), "stands twice or has no known unit"),
    (lambda d: d["codes"].update(pair=7), "'codes' holds something else than text"),
    (lambda d: d["status"].update(failed=[7]), "status holds something else than a list of texts"),
    (lambda d: d["status"].pop("not_covered"), "'not_covered' is missing"),
    (lambda d: d["confirm"].append("x"), "confirm holds 'x' instead of a row"),
    (lambda d: d["project"].update(a=math.nan), "nan is neither text nor a finite number"),
    (lambda d: d["project"].update(a=math.inf), "inf is neither"),
    (lambda d: d["project"].update(a=10**400), "a very large integer is neither"),
    (lambda d: d["project"].update(a="\ud800"), "is neither text nor"),
    (lambda d: d["project"].update(a=b"x"), "a bytes is neither"),
    (lambda d: d["project"].update({7: "x"}), "a object is neither"),
    (lambda d: d["project"].update(a=_nested(100_000)), "nested more than 60 deep"),
    (_at(M_F, "formula", value="M_f = __import__('os').getpid()"), "is not plain arithmetic"),
    (_at(M_F, "formula", value="M_f = w.__class__"), "is not arithmetic"),
    (_at(M_F, "formula", value="M_f = " + "-" * 20_000 + "w"), "longer than 400"),
    (_at(M_F, "formula", value=7), "'formula' is missing or not a str"),
    (_at(M_F, "formula", value="M_f = w*L**2/x"), "is not both in its formula and its args"),
    (_at(M_F, "args", value={"w": "inputs/w", "L": "inputs/x"}), "which does not stand before it"),
    (_at(M_F, "args", value={"w": "inputs/w", "L": "flexure/M_f"}), "does not stand before it"),
    (_at(M_F, "args", value={"w": "inputs/w", "L": ["a"]}), "rests on a list"),
    (_at(M_F, "args", value=["w"]), "'args' is not a dict"),
    (_at(FOUND, "closing", "args", value={"s": "found/s", "A_sq": CHECK}), "which is no value"),
    (_at(M_F, "value", value="298"), "has no finite value"),
    (_at(M_F, "value", value=True), "has no finite value"),
    (_at(M_F, "value", value=None), "has no finite value"),
    (_at(M_F, "unit", value="furlong"), "in a known unit"),
    (_at(M_F, "unit", value=["mm"]), "in a known unit"),
    (_at(M_F, "unit", value="mm"), "is not a unit of its kind"),
    (_at(M_F, "id", value="flexure/M_x"), "is not an entry"),
    (_at(M_F, "id", value="../M_f"), "is not an entry"),
    (_at(M_F, "symbol", value="M f"), "is not an entry"),
    (_at(M_F, "kind", value="magic"), "of kind 'magic' is not an entry"),
    (_at(M_F, "system", value="imperial"), "its system or its constants' units are damaged"),
    (_at(M_F, "numbers", value={"8": 3}), "its system or its constants' units are damaged"),
    (_at(M_F, "digest", value=None), "'digest' is missing"),
    (_at(M_F, "printed", value="298"), "'printed' is missing or not a dict"),
    (_at(M_F, "printed", "result", value="298 kN"), "printed '298 kN' is not a number"),
    (_at(M_F, "printed", "result", value="−298"), "is not a number"),
    (_at(M_F, "printed", "result", value="0298"), "is not a number"),
    (_at(M_F, "printed", "result", value="<b>"), "is not a number"),
    (_at(M_F, "printed", "args", value={"w": "41.3"}), "not every argument is printed"),
    (_at(M_F, "printed", "args", "w", value="nan"), "a printed argument is not a number"),
    (_at(M_F, "printed", "coherent", value="x"), "'coherent' is missing or not a dict"),
    (_at(M_F, "printed", "coherent", value={"result": "1"}), "is not a unit of its kind"),
    (_at(CHECK, "holds", value=1), "'holds' is missing or not a bool"),
    (_at(CHECK, "holds", value="true"), "'holds' is missing or not a bool"),
    (_at(CHECK, "left", value="298"), "compares something that is no finite number"),
    (_at(CHECK, "formula", value="M_f <= M_r <= 3"), "exactly one comparison"),
    (_at(CHECK, "formula", value="M_f <= M_r if M_f else M_r"), "is not arithmetic"),
    (_at(CHECK, "utilisation", value="0.5"), "the utilisation is not a number"),
    (_at(CHECK, "printed", "utilisation", value=None), "the utilisation is not a number"),
    (_at("flexure/half", "exception", value={"reason": "x"}), "'initials' is missing"),
    (_at("inputs/f_c", "typed", value=32), "'typed' is missing or not a str"),
    (_at("inputs/h", "printed", "typed_unit", value="kN"), "is not a unit of its kind"),
    (_at("inputs/A_b", "row", value=25), "'row' is missing or not a str"),
    (_at(FOUND, "procedure", value={"name": "x"}), "'version' is missing"),
    (_at(FOUND, "settings", value={"a": "b"}), "a setting is not a number"),
    (_at(FOUND, "closing", value=[]), "'closing' is missing or not a dict"),
    (_at(FOUND, "closing", "left", value=None), "compares something that is no finite number"),
    (_at("found/bars", "rows", value=[["20M"]]), "too few or many cells"),
    (_at("found/bars", "rows", value=[["20M", 3]]), "something else than a list of texts"),
    (_at("found/section", "figure", value=[]), "'figure' is missing or not a dict"),
    (_at("flexure/why", "text", value=None), "'text' is missing"),
]  # fmt: skip


@pytest.mark.parametrize(("damage", "sentence"), DAMAGE, ids=range(len(DAMAGE)))
def test_a_damaged_record_is_refused(
    data: Data, damage: Callable[[Data], object], sentence: str
) -> None:
    damage(data)
    start = time.perf_counter()
    with pytest.raises(UserError) as caught:
        Record.from_data(data)
    assert sentence in str(caught.value)
    assert all(
        fault.startswith(("record: ", "formula ", "symbol ")) for fault in caught.value.faults
    )
    assert max(len(fault) for fault in caught.value.faults) < 400
    assert time.perf_counter() - start < 5


def test_all_faults_at_once(data: Data) -> None:
    for damage in (_at(M_F, "value", value=None), _at(CHECK, "holds", value=3)):
        damage(data)
    data["status"]["failed"] = None
    with pytest.raises(UserError) as caught:
        Record.from_data(data)
    assert len(caught.value.faults) == 3


@pytest.mark.parametrize(
    "text",
    ["", "{", "[]", "null", "1", '"x"', "NaN", '{"schema": NaN}', "[" * 100_000, '{"a":' * 50_000,
     '{"schema": ' + "9" * 5000 + "}", '{"schema": 1e999}', "\x00", "\ud800", "{'schema': 1}"],
    ids=range(15),
)  # fmt: skip
def test_text_that_is_no_record(text: str) -> None:
    with pytest.raises(UserError, match=r"^record: "):
        Record.from_text(text)


@pytest.mark.parametrize("thing", [None, 3, [], "x", {1: 2}, object(), {"schema": [1]}])
def test_data_that_is_no_record(thing: object) -> None:
    with pytest.raises(UserError, match=r"^record: "):
        Record.from_data(thing)


def _places(value: Any, path: tuple[Any, ...] = ()) -> list[tuple[Any, ...]]:
    inner = value.items() if isinstance(value, dict) else enumerate(value)
    found = [path] if path else []
    for key, item in inner:
        found += _places(item, (*path, key)) if isinstance(item, dict | list) else [(*path, key)]
    return found


JUNK = st.one_of(
    st.none(), st.booleans(), st.integers(), st.floats(), st.text(max_size=8), st.just("9" * 5000),
    st.sampled_from(
        ["mm", "", "0", "1e9", "9**9**9", "a = b", "a <= b", "check", "line", "given", "found",
         "inputs/f_c", "__import__('os')", "\ud800", "sqrt(0-1) <= 9**9**9", "x = 1/0", "kip",
         "x = (0-1)**0.5", "min((0-1)**0.5, 1) <= 2", "1e400 mm", 10**400, 1e308, -0.0, "-", "−1"]
    ),
    st.lists(st.integers(), max_size=2),
    st.dictionaries(st.text(max_size=3), st.integers(), max_size=2),
    st.just([[[[]]]]), st.just({"a": {"b": {}}}),
)  # fmt: skip


@settings(
    max_examples=300, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture]
)
@given(draw=st.data())
def test_a_record_changed_at_random_is_read_or_refused(sample: Record, draw: st.DataObject) -> None:
    data = copy.deepcopy(sample.data)
    places = [p for p in _places(data) if p[0] != "digest"]
    for _ in range(draw.draw(st.integers(1, 3))):
        *path, last = draw.draw(st.sampled_from(places))
        row: Any = data
        try:
            for key in path:
                row = row[key]
            if draw.draw(st.integers(0, 4)) == 0:
                del row[last]
            else:
                row[last] = draw.draw(JUNK)
        except (KeyError, IndexError, TypeError):
            continue  # an earlier change took the place away
    try:
        record = Record.from_data(data)
    except UserError:
        return
    Record.from_text(record.to_text())
    for difference in recompute(record):
        assert str(difference)
