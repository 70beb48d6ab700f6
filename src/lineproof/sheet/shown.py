"""What a part shows beside its values: figures, tables and notes."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from typing import Any

from lineproof.record import Entry
from lineproof.record.entry import FIGURE, NOTE, TABLE
from lineproof.record.sources import ShownSource
from lineproof.sheet.parts import Parts, check_key


class Shown(Parts):
    """Parts that also record figures, tables and notes."""

    def figure(
        self,
        key: str,
        drawing: Mapping[str, Any],
        *,
        title: str,
        alt: str,
        rests_on: Iterable[Entry] = (),
        front: int | None = None,
        dxf: str = "",
    ) -> Entry:
        """Record a figure (plain shapes as JSON data) with its caption and alternative text.

        With ``front`` it is printed on the summary pages, in rising order, instead of in the
        working. With ``dxf`` the issued package also holds it as ``<calc id>-<dxf>.dxf``.
        """
        content = {"figure": dict(drawing), "alt": alt, "caption": title}
        content |= _placed(front, "dxf", dxf)
        return self._show(FIGURE, key, ShownSource(title, alt, content), rests_on)

    def table(
        self,
        key: str,
        columns: list[str],
        rows: list[list[str]],
        *,
        title: str,
        rests_on: Iterable[Entry] = (),
        front: int | None = None,
        csv: str = "",
        widths: Sequence[float] = (),
        lines: Sequence[Entry | None] = (),
    ) -> Entry:
        """Record a table of printed texts; a cell that says FAILS prints in bold.

        ``widths`` are column widths in mm on paper, 0 for what its texts need; ``lines`` names
        the entry that each row shows, which is printed as the number of its line. ``front`` and
        ``csv`` as in :meth:`figure`: summary pages, ``<calc id>-<csv>.csv``.
        """
        content: dict[str, Any] = {"columns": columns, "rows": rows}
        content |= _placed(front, "csv", csv)
        content |= {"widths": list(widths)} if widths else {}
        if lines:
            content["lines"] = ["" if entry is None else entry.id for entry in lines]
        on = [*rests_on, *(entry for entry in lines if entry is not None)]
        return self._show(TABLE, key, ShownSource(title, title, content), on)

    def note(
        self, key: str, text: str, *, title: str = "", clause: str = "", basis: str = ""
    ) -> Entry:
        """Record a plain sentence."""
        return self._show(NOTE, key, ShownSource(title, text, {"text": text}, clause, basis), ())

    def _show(self, kind: str, key: str, source: ShownSource, rests_on: Iterable[Entry]) -> Entry:
        check_key(key)
        args = tuple(dict.fromkeys(rests_on))  # an entry rested on twice counts once
        return self._record(Entry(self._open_part(), key, kind, source, args, None))


def _placed(front: int | None, kind: str, stem: str) -> dict[str, Any]:
    """Return where a figure or table goes besides the working; nothing where it does not."""
    return ({} if front is None else {"front": front}) | ({kind: stem} if stem else {})
