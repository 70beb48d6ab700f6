"""Verifying a printed package: whether it prints what the record inside it gives."""

from __future__ import annotations

from collections.abc import Sequence

from lineproof.audit.verify.data import Alteration, Outcome, Outside, Proof, Verification, Where
from lineproof.audit.verify.file import is_pdf
from lineproof.audit.verify.html import verify_html
from lineproof.audit.verify.pdf import verify_pdf
from lineproof.audit.verify.record import Source
from lineproof.errors import UserError

__all__ = [
    "Alteration",
    "Outcome",
    "Outside",
    "Proof",
    "Source",
    "Verification",
    "Where",
    "verify",
]


def verify(content: bytes, name: str, against: Sequence[Source] = ()) -> Verification:
    """Verify a PDF or HTML package.

    The record inside is recomputed and printed again, and what is printed is compared with that,
    mark for mark. ``against`` are records to compare with as well; where the file holds no record,
    they stand in its place. Raises :class:`UserError` for a file that cannot be read.
    """
    if is_pdf(content) or name.lower().endswith(".pdf"):
        return verify_pdf(content, name, against)
    try:
        text = content.decode("utf-8-sig")
    except UnicodeDecodeError:
        raise UserError(f"{name}: neither a PDF nor UTF-8 text; give a package as issued") from None
    return verify_html(text, name, against)
