"""Where the templates and the shipped calcs lie: at the root of a checkout, else in the package.

Also how a file of the user is opened, and read as text.
"""

from __future__ import annotations

import errno
import stat
from pathlib import Path
from typing import BinaryIO

from lineproof.errors import UserError

_PACKAGE = Path(__file__).resolve().parent


def folder(name: str) -> Path:
    """Return the folder ``templates`` or ``calcs``.

    The checkout comes first: an editable install holds a copy that goes stale.
    """
    root = _PACKAGE.parents[1]
    if (root / "pyproject.toml").is_file() and (root / name).is_dir():
        return root / name
    return _PACKAGE / name


def open_file(path: Path) -> BinaryIO:
    """Open a file to read its bytes; raises :class:`OSError`, also for a pipe or a device.

    A pipe may wait for ever for who writes into it, and a device may never end.
    """
    mode = path.stat().st_mode
    if not (stat.S_ISREG(mode) or stat.S_ISDIR(mode)):
        raise OSError(errno.EINVAL, "a pipe or a device; give a saved file", str(path))
    return path.open("rb")


def csv_text(content: bytes, name: str) -> str:
    """Return the text of a CSV file, with the mark of UTF-8 or without; raises UserError."""
    try:
        text = content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        raise UserError(
            f"{name}: not UTF-8 at byte {error.start}; save it as 'CSV UTF-8'"
        ) from None
    if "\0" in text:
        raise UserError(f"{name}: holds zero bytes; it is no text, save it as 'CSV UTF-8'")
    return text
