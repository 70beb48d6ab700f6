"""Formulas: grammar and tree, notation, compiled functions, unit proof, algebra."""

from lineproof.formula.formula import (
    COMMON_PRACTICE,
    FROM_MEMORY,
    Criterion,
    Formula,
    System,
    criterion,
    formula,
)
from lineproof.formula.grammar import (
    FormulaError,
    parse_criterion,
    parse_expression,
    parse_line,
)
from lineproof.formula.notation import Notation, Symbol, symbol_from_id
from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree, names_of

__all__ = [
    "COMMON_PRACTICE",
    "FROM_MEMORY",
    "Binary",
    "Call",
    "Criterion",
    "Formula",
    "FormulaError",
    "Name",
    "Negative",
    "Notation",
    "Number",
    "Symbol",
    "System",
    "Tree",
    "criterion",
    "formula",
    "names_of",
    "parse_criterion",
    "parse_expression",
    "parse_line",
    "symbol_from_id",
]
