"""The seal of a record: a hash over all that it holds, by which any change in it shows.

The digest says what a calculation rests on and is the same on every processor; the seal says
that nothing, not the last digit of a float or a point of a figure, has changed since closing.
"""

from __future__ import annotations

import hashlib
import json
import re
from collections.abc import Mapping
from typing import Any

SEAL = "seal"
LENGTH = 32
# Each begins with what is rare in the text: half of the sealing would else be this search.
_WHOLE = re.compile(r"([:,\[]-?[0-9]+)\.0(?=[,\]}])")
_MINUS_ZERO = re.compile(r"-0(?<=[:,\[]-0)(?=[,\]}])")


def seal_of(data: Mapping[str, Any]) -> str:
    """Return the seal of a record's data, itself left out.

    The order of keys does not count, and 7600.0 is 7600: Jupyter saves a notebook with its keys
    sorted and its numbers as JavaScript writes them.

    >>> seal_of({"a": [7600.0, -0.0], "b": ""}) == seal_of({"b": "", "a": [7600, 0]})
    True
    """
    rest = {key: value for key, value in data.items() if key != SEAL}
    text = json.dumps(rest, sort_keys=True, separators=(",", ":"))
    text = _MINUS_ZERO.sub("0", _WHOLE.sub(r"\1", text))
    return hashlib.sha256(text.encode("ascii")).hexdigest()[:LENGTH]
