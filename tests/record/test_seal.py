"""The seal of a record: what Jupyter may do to a record keeps it, any change breaks it."""

from __future__ import annotations

import hashlib
import json
import random
from collections.abc import Iterator
from copy import deepcopy
from functools import cache
from typing import Any

import pytest
from tests.beams import gallery

from lineproof.record.seal import SEAL, seal_of


@cache
def _data() -> dict[str, Any]:
    return gallery.record_of().data


def _numbers(data: Any, path: tuple[Any, ...] = ()) -> Iterator[tuple[Any, ...]]:
    """Give the place of every number."""
    for key, item in data.items() if isinstance(data, dict) else enumerate(data):
        if isinstance(item, dict | list):
            yield from _numbers(item, (*path, key))
        elif isinstance(item, int | float) and not isinstance(item, bool):
            yield (*path, key)


def _as_saved_by_a_browser(data: Any) -> Any:
    """Return the data with keys sorted and whole floats as integers, as JavaScript writes them."""
    if isinstance(data, dict):
        return {key: _as_saved_by_a_browser(data[key]) for key in sorted(data)}
    if isinstance(data, list):
        return [_as_saved_by_a_browser(item) for item in data]
    return int(data) if isinstance(data, float) and data.is_integer() else data


def test_seal_is_the_hash_of_sorted_text() -> None:
    text = b'{"a":[7600,0,1.5],"b":"7600.0,"}'
    assert (
        seal_of({"b": "7600.0,", "a": [7600.0, -0.0, 1.5], "seal": "x"})
        == (hashlib.sha256(text).hexdigest()[:32])
    )


def test_saving_in_a_browser_keeps_the_seal() -> None:
    data = _data()
    assert data[SEAL] == seal_of(data)
    assert seal_of(json.loads(json.dumps(data))) == data[SEAL]
    assert seal_of(_as_saved_by_a_browser(data)) == data[SEAL]


@pytest.mark.parametrize("seed", range(20))
def test_any_change_of_a_number_breaks_it(seed: int) -> None:
    """By as little as a float can change, wherever it stands."""
    changed = deepcopy(_data())
    *place, last = random.Random(seed).choice(list(_numbers(changed)))  # noqa: S311 - no secret
    held = changed
    for key in place:
        held = held[key]
    held[last] = held[last] * (1 + 1e-15) + 1e-300 if held[last] != 0 else 5e-324
    assert seal_of(changed) != changed[SEAL]
