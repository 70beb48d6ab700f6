"""A calculation package in which every line can be proved."""

from __future__ import annotations

import sys
from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from lineproof import beams
    from lineproof.notebook.audited import audit_of
    from lineproof.sheet import Sheet

__all__ = ["Sheet", "audit_of", "beams"]


def __getattr__(name: str) -> Any:
    """Import what a notebook asks for on first use, so that commands start at once."""
    if name == "Sheet":
        from lineproof.sheet import Sheet  # noqa: PLC0415 - as the docstring says

        return Sheet
    if name == "beams":
        return import_module("lineproof.beams")
    if name == "audit_of":
        from lineproof.notebook.audited import audit_of  # noqa: PLC0415 - as the docstring says

        return audit_of
    msg = f"module 'lineproof' has no attribute {name!r}"
    raise AttributeError(msg)


def _show_in_notebook() -> None:
    """Show parts under their cells when this runs inside IPython or a notebook."""
    ipython = sys.modules.get("IPython")
    if ipython is not None and ipython.get_ipython() is not None:
        from lineproof.notebook.display import register  # noqa: PLC0415 - only in a notebook

        register()


_show_in_notebook()
