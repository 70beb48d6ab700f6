"""The records of a file, whatever its kind: notebook, PDF, HTML or record. Nothing is run."""

from __future__ import annotations

import re
from collections.abc import Callable
from pathlib import Path

from lineproof.errors import UserError
from lineproof.record import Record
from lineproof.resources import read_file

LARGEST_FILE = 64_000_000
"""More than any package holds."""
_REVIEW = re.compile(r'\ufeff?\s*\{\s*"schema"\s*:\s*"lineproof review')


def altered_lines(record: Record) -> list[str]:
    """Return a sentence per line that its own formula and givens do not give.

    A record says what it was computed from, so one that was changed by hand gives itself away.
    """
    # Importing them registers the procedures by which found values are found again.
    import lineproof.beams  # noqa: PLC0415 - to recompute only
    import lineproof.standards.catalogue  # noqa: F401, PLC0415 - 0.1 s, to recompute only
    from lineproof.record import recompute  # noqa: PLC0415 - with it

    return [str(difference) for difference in recompute(record)]


def altered_shown(path: Path) -> list[str]:
    """Return a sentence per part that a notebook shows otherwise than it was run.

    Nothing for another file: a package is looked at by ``lineproof verify``.
    """
    if path.suffix.lower() != ".ipynb":
        return []
    from lineproof.notebook.cells import cells_of, load_notebook  # noqa: PLC0415 - by kind of file
    from lineproof.notebook.read import altered_outputs  # noqa: PLC0415 - by kind of file

    return altered_outputs(cells_of(load_notebook(path), str(path)))


def read_records(path: Path) -> list[Record]:
    """Read the records of a file by its kind; raises :class:`UserError` that names the file."""
    readers: dict[str, Callable[[Path], list[Record]]] = {
        ".ipynb": _from_notebook, ".pdf": _from_pdf, ".html": _from_html, ".json": _from_json,
    }  # fmt: skip
    reader = readers.get(path.suffix.lower())
    if reader is None:
        raise UserError(f"{path}: not a file with lines; give one of {', '.join(readers)}")
    try:
        return reader(path)
    except UnicodeDecodeError:
        raise UserError(f"{path}: not UTF-8 text; give a file that lineproof has made") from None
    except UserError as error:
        named = [f if str(path) in f else f"{path}: {f}" for f in error.faults]
        raise UserError(named) from None


def _from_notebook(path: Path) -> list[Record]:
    from lineproof.notebook.cells import cells_of, load_notebook  # noqa: PLC0415 - by kind of file
    from lineproof.notebook.read import record_of  # noqa: PLC0415 - by kind of file

    return [record_of(cells_of(load_notebook(path), str(path)), str(path))]


def _from_pdf(path: Path) -> list[Record]:
    from lineproof.package import records_in_pdf  # noqa: PLC0415 - by kind of file

    return [Record.from_data(data) for data in records_in_pdf(read_file(path, LARGEST_FILE))]


def _from_html(path: Path) -> list[Record]:
    from lineproof.package import records_in_html  # noqa: PLC0415 - by kind of file

    return [
        Record.from_data(data) for data in records_in_html(read_file(path, LARGEST_FILE).decode())
    ]


def _from_json(path: Path) -> list[Record]:
    text = read_file(path, LARGEST_FILE).decode()
    if _REVIEW.match(text):
        raise UserError(
            f"{path}: is a review, not a calc; give the notebook, package or record that it is "
            f"of, as in 'lineproof review CALC {path.name}'"
        )
    return [Record.from_text(text)]
