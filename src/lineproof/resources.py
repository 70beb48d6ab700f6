"""Where the templates and the shipped calcs lie: at the root of a checkout, else in the package.

Also how a file of the user is read.
"""

from __future__ import annotations

import stat
from pathlib import Path

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


def read_file(
    path: Path,
    most: int,
    advice: str = "not read",
    absent: str = "cannot be read (No such file or directory)",
) -> bytes:
    """Return the content of a file of at most ``most`` bytes; raises :class:`UserError`.

    A pipe or a device is refused: the one may wait for ever for who writes into it, the other may
    never end. ``advice`` is what to do with a larger file, ``absent`` what is said of none.
    """
    try:
        mode = path.stat().st_mode
        if not (stat.S_ISREG(mode) or stat.S_ISDIR(mode)):
            raise UserError(f"{path}: cannot be read (a pipe or a device; give a saved file)")
        with path.open("rb") as stream:
            content = stream.read(most + 1)
    except FileNotFoundError:
        raise UserError(f"{path}: {absent}") from None
    except OSError as error:
        raise UserError(f"{path}: cannot be read ({error.strerror})") from None
    if len(content) > most:
        raise UserError(f"{path}: larger than {most // 1_000_000} MB; {advice}")
    return content


def csv_text(content: bytes, name: str) -> str:
    """Return the text of a CSV file, with the mark of UTF-8 or without; raises UserError."""
    try:
        text = content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = 1 + content.count(b"\n", 0, error.start)
        raise UserError(
            f"{name}: line {line}: not UTF-8 at byte {error.start}; save it as 'CSV UTF-8'"
        ) from None
    if "\0" in text:
        raise UserError(f"{name}: holds zero bytes; it is no text, save it as 'CSV UTF-8'")
    return text
