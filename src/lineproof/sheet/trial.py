"""Trying something out on a copy of a sheet, without recording or showing it."""

from __future__ import annotations

from lineproof.sheet.sheet import Sheet


class Trial(Sheet):
    """A sheet with the parts recorded so far; what is added stays in it and is never shown.

    A design loop runs the very calculation that will be printed on trials, so that no choice
    rests on a second, shorter version of a formula.
    """

    def __init__(self, sheet: Sheet) -> None:
        super().__init__(sheet.calc["id"], project=sheet.project, notation=sheet.notation)
        self.codes = sheet.codes
        self.expected = sheet.expected
        self.adopt(sheet.parts)

    def _show_part(self, key: str) -> None:
        """Show nothing."""
