"""A PDF opened for verifying: its pages, what is attached to it, what others have done to it."""

from __future__ import annotations

import io
import re
from collections.abc import Iterator
from typing import Any

from lineproof.errors import UserError
from lineproof.package import records_in_pdf
from lineproof.package.read import RECORD_SUFFIX
from lineproof.package.reviewed import REVIEW_SUFFIX
from lineproof.record import Record

END = re.compile(rb"%%EOF[\r\n]{0,2}")
"""Where a revision of a PDF ends."""
_TABLE_AT = re.compile(rb"startxref\s+(\d{1,12})\s")
_TABLE = re.compile(rb"\s*(?:xref|\d+ \d+ obj)")
_HEAD, _TAIL = 1024, 4096
_LETTER, _A4 = (612.0, 792.0), (595.28, 841.89)
_LINK = "/Link"
_VIEWED = frozenset({"/ViewArea", "/ViewClip", "/PrintArea", "/PrintClip"})
_OF_BORDER = 2
"""Place of the width in a border: behind the radii of its corners."""
_FIRST_PAGES = 3
Box = tuple[float, float, float, float]
"""Left, low, right and high edge [pt]."""
_DIGEST = re.compile(r"Record\s+([0-9a-f]{16})")
_NUMBERED = re.compile(r"Page\s+\d+\s+of\s+\d+")


def _rectangle(given: Any) -> Box:
    """Return a rectangle of a PDF, whichever corners it gives; nowhere if it is none."""
    try:
        a, b, c, d = (float(each) for each in given.get_object())
    except (AttributeError, TypeError, ValueError):
        return (0.0, 0.0, 0.0, 0.0)
    return min(a, c), min(b, d), max(a, c), max(b, d)


def _has_border(link: Any) -> bool:
    """Tell whether a link is drawn: a thick border hides what it lies on. Ours have none."""
    if "/BS" in link:
        return float(link["/BS"].get_object().get("/W", 1)) > 0
    border = link.get("/Border", [0, 0, 1]).get_object() if "/Border" in link else [0, 0, 1]
    return len(border) > _OF_BORDER and float(border[_OF_BORDER]) > 0


def _runs(action: Any) -> bool:
    """Tell whether opening a file does more than to go to a page."""
    done = action.get_object() if action is not None else []  # a place to go to is a list
    return not isinstance(done, list) and done.get("/S") != "/GoTo"


def _acts(link: Any) -> bool:
    """Tell whether a link does more than to lead to a page or an address."""
    action = link["/A"].get_object() if "/A" in link else {"/S": "/GoTo"}
    return "/AA" in link or "/Next" in action or action.get("/S") not in ("/GoTo", "/URI")


def is_pdf(content: bytes) -> bool:
    """Tell whether a file begins as a PDF."""
    return b"%PDF-" in content[:_HEAD]


def _table_found(content: bytes) -> bool:
    """Tell whether the table of objects stands where the file says."""
    said = _TABLE_AT.findall(content[-_TAIL:])
    header = content.find(b"%PDF-")
    places = (int(said[-1]), int(said[-1]) + header) if said else ()
    return any(_TABLE.match(content, place) for place in places)


class File:
    """A PDF opened: its pages, what is attached to it, what others have done to it."""

    def __init__(self, content: bytes) -> None:
        import pypdf  # noqa: PLC0415 - only reading a PDF needs it

        self.content = content
        if not is_pdf(content):
            raise UserError("not a PDF, whatever its name says; give a package as it was issued")
        if not END.search(content):
            raise UserError("this PDF is damaged, its end is missing; give the whole file")
        if not _table_found(content):
            raise UserError(
                "this PDF is damaged, bytes are missing inside; give the file as issued"
            )
        try:
            self.reader = pypdf.PdfReader(io.BytesIO(content))
            locked = self.reader.is_encrypted
            self.pages: list[Any] = [] if locked else list(self.reader.pages)
            self.attached: dict[str, list[bytes]] = (
                {} if locked else {name: list(parts) for name, parts in self._attachments()}
            )
        except Exception as error:  # noqa: BLE001 - damage makes it fail in any of its layers
            reason = f"{type(error).__name__}: {error}"[:80]
            raise UserError(f"this PDF cannot be read, it is damaged ({reason})") from None
        if locked:
            raise UserError("this PDF is encrypted; give it without a password")

    def _attachments(self) -> Iterator[tuple[str, list[bytes]]]:
        for name, parts in self.reader.attachments.items():
            if parts:
                yield str(name), parts if isinstance(parts, list) else [parts]

    def records(self) -> list[Record]:
        """Return the records attached, in order; raises :class:`UserError`."""
        if not any(name.endswith(RECORD_SUFFIX) for name in self.attached):
            return []
        return [Record.from_data(data) for data in records_in_pdf(self.content)]

    def review(self, calc: str) -> str:
        """Return the text of the review attached for a calculation, "" if there is none."""
        parts = self.attached.get(f"{calc}{REVIEW_SUFFIX}", [])
        return parts[0].decode("utf-8", "replace") if parts else ""

    def paper(self, page: Any) -> str:
        """Return the paper of a page as the package names it, "" for any other."""
        size = (float(page.mediabox.width), float(page.mediabox.height))
        for paper, wanted in (("us-letter", _LETTER), ("a4", _A4)):
            if all(abs(a - b) < 1 for a, b in zip(size, wanted, strict=True)):
                return paper
        return ""

    def handled(self) -> list[str]:
        """Say what others have done that alters no line: revisions, signatures, saving again."""
        told = []
        ends = len(END.findall(self.content))
        if ends > 1:
            told.append(f"{ends - 1} later change(s) appended to the file as issued")
        told += [f"signed by others: {signer}; the signature itself is not checked here"
                 for signer in self._signers()]  # fmt: skip
        metadata: Any = self.reader.metadata
        producer = str(metadata.get("/Producer", "")) if metadata else ""
        if producer:
            told.append(f"saved again by {producer[:60]}")
        return [*told, *self._added()]

    def _added(self) -> Iterator[str]:
        """Say what others have put into the file beside its pages."""
        for name in self.attached:
            if not name.endswith((RECORD_SUFFIX, REVIEW_SUFFIX)):
                yield f"attached by others: {name[:60]}"
        root = self.reader.root_object
        names, form = (self._held(key) for key in ("/Names", "/AcroForm"))
        runs = any("/AA" in each for each in (root, *self.pages)) or "/JavaScript" in names
        if runs or _runs(root.get("/OpenAction")):
            yield "holds a script or an action that runs when the file or a page is opened"
        if "/XFA" in form:
            yield "holds a form (XFA) that some readers show in place of the pages"
        if _VIEWED.intersection(self._held("/ViewerPreferences")):
            yield "asks a reader to show or print a part of each page alone"
        if "/Collection" in root:
            yield "is made a portfolio: some readers show what is attached in place of the pages"

    def _held(self, key: str) -> Any:
        """Return what the file itself holds under a key, nothing if it holds none."""
        root = self.reader.root_object
        return root[key].get_object() if key in root else {}

    def _signers(self) -> list[str]:
        form = self.reader.root_object.get("/AcroForm")
        fields = form.get_object().get("/Fields", []) if form is not None else []
        signed = []
        for reference in fields:
            entry = reference.get_object()
            if entry.get("/FT") == "/Sig":
                value = entry.get("/V")
                named = value.get_object().get("/Name", "") if value is not None else ""
                signed.append(str(named or entry.get("/T", "") or "no name given")[:60])
        return signed

    def turned(self, page: Any) -> str:
        """Say how a page is shown turned or in another size than its paper; "" for neither."""
        turn, scale = int(page.get("/Rotate", 0) or 0) % 360, float(page.get("/UserUnit", 1) or 1)
        told = [f"turned by {turn} degrees"] if turn else []
        told += [f"shown at {scale:g} times its size"] if scale != 1 else []
        return " and ".join(told)

    def annotations(self, page: Any) -> list[tuple[str, Box]]:
        """Name what others have laid over a page, and where: comments, stamps, signatures."""
        found = []
        for reference in page.get("/Annots", None) or []:
            entry = reference.get_object()
            kind = str(entry.get("/Subtype", ""))
            if kind != _LINK or "/AP" in entry or _has_border(entry) or _acts(entry):
                text = str(entry.get("/Contents", "") or "")[:60]
                named = f"{kind.lstrip('/') or 'annotation'}{f' “{text}”' if text else ''}"
                found.append((named, _rectangle(entry.get("/Rect"))))
        return found

    def digest_redrawn(self) -> str:
        """Return the digest in the footers of a package that another program has drawn again.

        That loses the record and every mark of our printer; "" for a file of others.
        """
        for page in self.pages[:_FIRST_PAGES]:
            try:
                text = page.extract_text()
            except Exception:  # noqa: BLE001 - a page of others may be as odd as it likes
                return ""
            named = _DIGEST.search(text)
            if named and _NUMBERED.search(text):
                return named[1]
        return ""
