"""Records out of printed packages: nothing in a file is run, damage is named."""

from __future__ import annotations

import io
import json
import logging
import re
from collections.abc import Iterator
from contextlib import contextmanager
from typing import Any

from lineproof.errors import UserError
from lineproof.package.reviewed import REVIEW_MIME, REVIEW_SUFFIX
from lineproof.record import LARGEST_RECORD, MIME

_TAIL = 65_536
_OPENED = re.compile(rf'<script type="{re.escape(MIME)}"[^<>]*>', re.IGNORECASE)
_REVIEW = re.compile(rf'<script type="{re.escape(REVIEW_MIME)}"[^<>]*>', re.IGNORECASE)
_CLOSED = re.compile(r"</script>", re.IGNORECASE)
RECORD_SUFFIX = ".lineproof.json"
"""By which a record is known among the files attached to a PDF."""
_PLACE = re.compile(r"Record (\d{1,4}) of ")


def records_in_html(text: str) -> list[dict[str, Any]]:
    """Return the records inside an HTML package, in order; raises :class:`UserError`."""
    found = [_record(script, f"record {n}") for n, script in enumerate(_scripts(text), 1)]
    if not found:
        raise UserError("no record in this HTML file; give a package that lineproof has printed")
    return _each_once(found)


def reviews_in_html(text: str) -> list[str]:
    """Return the texts of the reviews inside an HTML package, in order; often none."""
    return list(_scripts(text, _REVIEW))


def reviews_in_pdf(content: bytes) -> list[str]:
    """Return the texts of the reviews attached to a PDF package; raises :class:`UserError`."""
    found = _attachments(content)
    return [data.decode(errors="replace") for name, data in found if name.endswith(REVIEW_SUFFIX)]


def _scripts(text: str, opening: re.Pattern[str] = _OPENED) -> Iterator[str]:
    """Yield what stands in the record scripts; one pass, whatever the page holds."""
    place = 0
    while (opened := opening.search(text, place)) is not None:
        closed = _CLOSED.search(text, opened.end())
        if closed is None:
            raise UserError("the record in this HTML file is cut short; give the whole file")
        yield text[opened.end() : closed.start()]
        place = closed.end()


def records_in_pdf(content: bytes) -> list[dict[str, Any]]:
    """Return the records attached to a PDF package, in order; raises :class:`UserError`."""
    found = []
    for name, data in _attachments(content):
        if not name.endswith(RECORD_SUFFIX):
            continue
        try:
            text = data.decode("utf-8")
        except UnicodeDecodeError:
            raise UserError(f"attachment {name[:60]!r} is damaged: not UTF-8 text") from None
        found.append(_record(text, f"attachment {name[:60]!r}"))
    if not found:
        raise UserError(
            "no record is attached to this PDF; give a package that lineproof has printed "
            "(printing it again to PDF drops the attachment)"
        )
    return _each_once(found)


def _attachments(content: bytes) -> list[tuple[str, bytes]]:
    import pypdf  # noqa: PLC0415 - only reading a PDF needs it
    import pypdf.errors  # noqa: PLC0415 - as above

    if b"startxref" not in content[-_TAIL:]:  # else the reader searches it all, line by line
        raise UserError("this PDF is damaged, its end is missing; give the whole file")
    try:
        with silent():
            reader = pypdf.PdfReader(io.BytesIO(content))
            order = _printed_order(reader)
            found = [(name, part) for name, parts in reader.attachments.items() for part in parts]
        return sorted(found, key=lambda pair: order.get(pair[0], len(order)))
    except pypdf.errors.FileNotDecryptedError:
        raise UserError("this PDF is encrypted; give it without a password") from None
    except Exception as error:  # noqa: BLE001 - damage makes it fail in any of its layers
        reason = f"{type(error).__name__}: {error}"[:80]
        raise UserError(f"this PDF cannot be read, it is damaged ({reason})") from None


@contextmanager
def silent() -> Iterator[None]:
    """Keep the PDF library from writing its warnings between our own sentences."""
    logger = logging.getLogger("pypdf")
    level = logger.level
    logger.setLevel(logging.CRITICAL + 1)
    try:
        yield
    finally:
        logger.setLevel(level)


def _printed_order(reader: Any) -> dict[str, int]:
    """Return the place of each attachment as printed; the PDF's own lists go by name."""
    files = [file.get_object() for file in reader.root_object.get("/AF", [])]
    places = [(str(f.get("/UF", "")), _PLACE.match(str(f.get("/Desc", "")))) for f in files]
    return {name: int(place[1]) for name, place in places if place}


def _record(text: str, name: str) -> dict[str, Any]:
    if len(text) > LARGEST_RECORD:
        raise UserError(f"{name} is larger than {LARGEST_RECORD // 1_000_000} MB; not read")
    try:
        data = json.loads(text)
    except (ValueError, RecursionError) as error:
        raise UserError(f"{name} is damaged: not readable as JSON ({str(error)[:60]})") from None
    if not isinstance(data, dict) or not isinstance(data.get("calc"), dict):
        raise UserError(f"{name} is damaged: not a record of a calculation")
    return data


def _each_once(found: list[dict[str, Any]]) -> list[dict[str, Any]]:
    ids = [str(record["calc"].get("id")) for record in found]
    twice = sorted({calc for calc in ids if ids.count(calc) > 1})
    if twice:
        names = ", ".join(repr(calc[:40]) for calc in twice)
        raise UserError(f"two records of calc {names} in one file; give each calc once")
    return found
