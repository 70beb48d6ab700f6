"""What the audit reads of a beam from the words of its record."""

from __future__ import annotations

import pytest

from lineproof.audit.search.member import member_of
from lineproof.sheet import Sheet


@pytest.mark.parametrize(
    "words", ["holds it vertically and leaves it free to rotate", "holds it up and lets it turn"]
)
def test_a_support_free_to_rotate_is_read_in_new_and_older_words(words: str) -> None:
    sheet = Sheet("B1")
    with sheet.part("given", "Given"):
        sheet.note(
            "supports",
            f"1: a wall, 200 mm wide, {words}; 2: a column, holds it against turning.",
            title="Supports",
        )
    record = sheet.close()
    record.data["kind_of_member"] = "beam of one span, T section"
    supports = member_of(record).supports
    assert [(s.number, s.carrier, s.turns) for s in supports] == [
        (1, "wall", True),
        (2, "column", False),
    ]
