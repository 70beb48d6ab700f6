"""Importing Jupyter's packages without what no notebook needs."""

from __future__ import annotations

import sys
from collections.abc import Iterator
from contextlib import contextmanager

_GRAMMARS = "rfc3987_syntax"


@contextmanager
def without_grammars() -> Iterator[None]:
    """Let jsonschema be imported without the grammars of international web addresses.

    Where JupyterLab is installed they would be compiled at every start, which takes longer than
    the calculation; no notebook is checked against them. jsonschema does without them where the
    import fails, as where they are not installed.
    """
    if _GRAMMARS in sys.modules:
        yield
        return
    sys.modules[_GRAMMARS] = None  # type: ignore[assignment] # as Python says: not to be found
    try:
        yield
    finally:
        del sys.modules[_GRAMMARS]
