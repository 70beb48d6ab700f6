"""Reviews as files: the one that lies beside a calculation, and what is printed of it."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from lineproof.errors import UserError
from lineproof.notebook.records import LARGEST_FILE
from lineproof.package.reviewed import REVIEW_SUFFIX, PrintedReview
from lineproof.record import Record
from lineproof.resources import read_file

if TYPE_CHECKING:
    from lineproof.audit.review.data import Review

_NO_REVIEW = (
    "no such file; open the HTML package in a browser, choose Review, mark lines, and save the "
    "file there, or name the file behind CALC"
)


def beside(calc: Path) -> Path:
    """Return where the review of a calc lies: beside it, under its name."""
    return calc.with_name(f"{calc.stem}{REVIEW_SUFFIX}")


def review_beside(calc: Path, record: Record) -> Review | None:
    """Return the review that lies beside a notebook, None for none; raises :class:`UserError`.

    It is refused where it is of another calc, or where the checker is the originator.
    """
    path = beside(calc)
    if not path.is_file():
        return None
    review = read_review_file(path)
    if review.calc != record.calc_id:
        raise UserError(
            f"{path}: the review is of calc {review.calc[:40]!r}, not of {record.calc_id!r}; move "
            "it away, or put the right one there"
        )
    refuse_originators(review, record)
    return review


def printed_beside(calc: Path, record: Record) -> PrintedReview | None:
    """Return what a package prints of the review beside a notebook, None for none.

    Raises :class:`UserError` as :func:`review_beside`.
    """
    review = review_beside(calc, record)
    if review is None:
        return None
    from lineproof.audit.review.print import printed_review  # noqa: PLC0415 - seldom needed

    return printed_review(review, record)


def review_inside(package: Path) -> Review | None:
    """Return the review that was printed with an HTML or PDF package, None for none or several.

    Raises :class:`UserError` for one that is damaged.
    """
    from lineproof.audit.review.read import read_review  # noqa: PLC0415 - 0.1 s
    from lineproof.package.read import reviews_in_html, reviews_in_pdf  # noqa: PLC0415 - as above

    ending = package.suffix.lower()
    if ending not in (".html", ".pdf") or not package.is_file():
        return None
    content = read_file(package, LARGEST_FILE)
    found = reviews_in_pdf(content) if ending == ".pdf" else reviews_in_html(content.decode())
    try:
        return read_review(found[0]) if len(found) == 1 else None
    except UserError as error:
        raise UserError([f"{package}: {fault}" for fault in error.faults]) from None


def read_review_file(path: Path) -> Review:
    """Read a review from its file; raises :class:`UserError` that names the file."""
    from lineproof.audit.review.read import read_review  # noqa: PLC0415 - 0.1 s

    content = read_file(path, LARGEST_FILE, absent=_NO_REVIEW)
    try:
        text = content.decode("utf-8-sig")
    except UnicodeDecodeError:
        raise UserError(
            f"{path}: not UTF-8 text; give the file that the review page saved"
        ) from None
    try:
        return read_review(text)
    except UserError as error:
        raise UserError([f"{path}: {fault}" for fault in error.faults]) from None


def refuse_originators(review: Review, record: Record) -> None:
    """Refuse a review by who made the calculation; raises :class:`UserError`."""
    from lineproof.audit.review.marks import refused_reviewers  # noqa: PLC0415 - 0.1 s

    faults = refused_reviewers(review, record)
    if faults:
        raise UserError(faults)
