"""A calculation being made: parts, givens, lines, decisions, checks, look-ups, found values."""

from lineproof.sheet.sheet import PartView, Sheet
from lineproof.sheet.tables import LookupTable
from lineproof.sheet.trial import Trial

__all__ = ["LookupTable", "PartView", "Sheet", "Trial"]
