"""The record: plain JSON, read back with every formula checked and nothing run."""

from __future__ import annotations

from functools import cached_property
from typing import Any

from lineproof.errors import UserError
from lineproof.record.build import SCHEMA
from lineproof.record.plain_data import check_plain, json_text
from lineproof.record.plain_text import read_plain
from lineproof.record.uncollected import uncollected
from lineproof.record.validate import check_record

MIME = "application/vnd.lineproof.record+json"
"""By which a record is known in a notebook, an HTML page and a PDF."""
LARGEST_RECORD = 32_000_000
"""Characters of a record that is still read."""


class Record:
    """A closed calculation.

    ``data`` is plain JSON data; ``entries`` holds its entries by id, in order.
    """

    def __init__(self, data: dict[str, Any]) -> None:
        self.data = data

    @classmethod
    def from_text(cls, text: str) -> Record:
        """Read a record; raises :class:`UserError` with everything that is wrong with it."""
        if len(text) > LARGEST_RECORD:
            raise UserError(f"record: larger than {LARGEST_RECORD // 1_000_000} MB; not read")
        with uncollected():
            return cls.from_plain(read_plain(text))

    @classmethod
    def from_data(cls, data: object) -> Record:
        """Check plain data and wrap it; raises :class:`UserError`."""
        check_plain(data)
        return cls.from_plain(data)

    @classmethod
    def from_plain(cls, data: object) -> Record:
        """Check data that are known to be plain, as JSON text gives them or as they were built."""
        schema = data.get("schema") if isinstance(data, dict) else None
        if not isinstance(data, dict) or type(schema) is not int or schema != SCHEMA:
            raise UserError(f"record: not a lineproof record of schema {SCHEMA}")
        check_record(data)
        return cls(data)

    @property
    def calc_id(self) -> str:
        """The id of the calculation, as the notebook opened it."""
        return str(self.data["calc"]["id"])

    @property
    def digest(self) -> str:
        """The digest over all entries."""
        return str(self.data["digest"])

    @property
    def parts(self) -> list[dict[str, Any]]:
        """The parts in order."""
        parts: list[dict[str, Any]] = self.data["parts"]
        return parts

    @cached_property
    def entries(self) -> dict[str, dict[str, Any]]:
        """The entries by id, in order."""
        return {entry["id"]: entry for part in self.parts for entry in part["entries"]}

    @property
    def failed(self) -> list[str]:
        """Ids of the checks that do not hold, accepted exceptions included."""
        return list(self.data["status"]["failed"])

    def to_text(self) -> str:
        """Return the record as JSON text, the same for the same record."""
        return json_text(self.data)

    def __repr__(self) -> str:
        """Show what the record holds."""
        return f"record of {self.calc_id}: {len(self.entries)} lines, digest {self.digest}"

    def _repr_mimebundle_(self, **_: object) -> dict[str, Any]:
        return {MIME: self.data, "text/plain": repr(self)}
