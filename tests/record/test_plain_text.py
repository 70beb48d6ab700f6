"""JSON text read as plain data: the text tells the same as a walk over the data."""

from __future__ import annotations

import json
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from lineproof.errors import UserError
from lineproof.record.plain_data import DEEPEST, check_plain
from lineproof.record.plain_text import is_surely_plain, read_plain

TEXTS = st.text(alphabet='[]{}"\\/:, aé\n\ud800\x07', max_size=6)
PLAIN = st.recursive(
    st.none() | st.booleans() | st.integers() | st.floats(width=32) | TEXTS,
    lambda inner: st.lists(inner, max_size=3) | st.dictionaries(TEXTS, inner, max_size=3),
    max_leaves=12,
)


def _nested(depth: int, inside: Any, opening: str) -> Any:
    for _ in range(depth):
        inside = [inside] if opening == "[" else {'"]}': inside, "\\": "[["}
    return inside


def _refused(data: Any) -> bool:
    try:
        check_plain(data)
    except UserError:
        return True
    return False


@settings(max_examples=400, deadline=None)
@given(
    PLAIN, st.integers(0, DEEPEST + 4), st.sampled_from("[{"), st.sampled_from(["ascii", "utf-8"])
)
def test_the_text_tells_what_a_walk_over_the_data_tells(
    inside: Any, depth: int, opening: str, written: str
) -> None:
    data = _nested(depth, inside, opening)
    text = json.dumps(data, ensure_ascii=written == "ascii")
    if _refused(data):
        with pytest.raises(UserError, match=r"^record: "):
            read_plain(text)
    else:
        assert read_plain(text) == data


@pytest.mark.parametrize(
    ("text", "sentence"),
    [
        ("[1e999]", "inf is neither text nor a finite number"),
        ("[9007199254740993]", "a very large integer is neither"),
        ("[NaN]", "NaN is not a number"),
        ("[-Infinity]", "-Infinity is not a number"),
        ('["\\ud800"]', "is neither text nor a finite number"),
        ("[" * 62 + "]" * 62, "nested more than 60 deep"),
        ('{"[": 1', "not readable as JSON"),
    ],
)
def test_what_json_could_not_give_back_is_refused(text: str, sentence: str) -> None:
    with pytest.raises(UserError, match=sentence):
        read_plain(text)


def test_the_deepest_that_is_read() -> None:
    """61 brackets: a list at depth 60 holds the last number."""
    assert is_surely_plain("[" * 61 + "1" + "]" * 61)
    assert not is_surely_plain("[" * 62 + "1" + "]" * 62)
