"""Where the templates and the shipped calcs lie: at the root of a checkout, else in the package."""

from __future__ import annotations

from pathlib import Path

_PACKAGE = Path(__file__).resolve().parent


def folder(name: str) -> Path:
    """Return the folder ``templates`` or ``calcs``.

    The checkout comes first: an editable install holds a copy that goes stale.
    """
    root = _PACKAGE.parents[1]
    if (root / "pyproject.toml").is_file() and (root / name).is_dir():
        return root / name
    return _PACKAGE / name
