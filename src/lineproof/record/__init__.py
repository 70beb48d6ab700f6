"""Records: entries, digests, printed strings, reading, recomputing."""

from lineproof.record.entry import Entry, Part, digest_of
from lineproof.record.procedures import Procedure, procedure
from lineproof.record.recompute import Difference, recompute
from lineproof.record.record import LARGEST_RECORD, MIME, Record

__all__ = [
    "LARGEST_RECORD",
    "MIME",
    "Difference",
    "Entry",
    "Part",
    "Procedure",
    "Record",
    "digest_of",
    "procedure",
    "recompute",
]
