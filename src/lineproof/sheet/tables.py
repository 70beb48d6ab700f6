"""Tables of published values, looked up by row."""

from __future__ import annotations

import difflib
from collections.abc import Mapping
from dataclasses import dataclass, field

from lineproof.errors import UserError
from lineproof.quantity import echo

_MOST_NEAR = 3


@dataclass(frozen=True)
class LookupTable:
    """A table: rows by key, each with a number (as text) per column.

    ``columns`` gives the unit of each column, ``clauses`` the clause of columns with their own;
    ``word`` is what a row is called in an error.
    """

    name: str
    word: str
    columns: Mapping[str, str]
    rows: Mapping[str, Mapping[str, str]]
    source: str
    clause: str = ""
    basis: str = ""
    clauses: Mapping[str, str] = field(default_factory=dict)

    def clause_of(self, column: str) -> str:
        """Return the clause of a column, where it has its own, else that of the table."""
        return self.clauses.get(column, self.clause)

    def row(self, key: object, what: str) -> Mapping[str, str]:
        """Return a row; raises :class:`UserError` that names ``what`` and the rows."""
        found = self.rows.get(key) if isinstance(key, str) else None
        if found is None:
            near = " or ".join(map(repr, self._near(str(key)[:60])))
            hint = f"; did you mean {near}? There are" if near else "; write one of"
            raise UserError(
                f"{what}: {echo(key)} is not {article(self.word)} {self.word}{hint} "
                f"{self._listed()}"
            )
        return found

    def _near(self, key: str) -> list[str]:
        """Return the rows that may be meant: begun alike whatever the capitals, else the closest.

        Of a few like beginnings all are told: 400R and 400W, garages of each weight.
        """
        begun = [row for row in self.rows if key and row.lower().startswith(key.strip().lower())]
        if 0 < len(begun) <= _MOST_NEAR:
            return begun
        folded = {row.lower(): row for row in self.rows}
        close = difflib.get_close_matches(key[:20].lower(), folded, n=1)
        return [folded[row] for row in close]

    def _listed(self) -> str:
        """Return all rows in words, quoted where a name holds a comma itself."""
        rows = self.rows
        return ", ".join(map(repr, rows) if any("," in row for row in rows) else rows)

    def number(self, key: str, column: str) -> float:
        """Return one number of the table, in the column's unit."""
        return float(self.rows[key][column])


def article(word: str) -> str:
    """Return 'a' or 'an'."""
    return "an" if word[0] in "aeiou" and not word.startswith("us") else "a"
