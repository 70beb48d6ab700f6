"""Formulas, numbers and units as an engineer writes them: TeX, MathML, Typst maths, plain text."""

from lineproof.typeset.glyphs import printable
from lineproof.typeset.mathml import mathml
from lineproof.typeset.plain import plain
from lineproof.typeset.tex import tex
from lineproof.typeset.typst_mark import typst_mark
from lineproof.typeset.values import (
    number_math,
    number_text,
    symbol_math,
    unit_text,
    value_math,
    value_text,
)
from lineproof.typeset.visitor import formula_math, substitution_math

__all__ = [
    "formula_math",
    "mathml",
    "number_math",
    "number_text",
    "plain",
    "printable",
    "substitution_math",
    "symbol_math",
    "tex",
    "typst_mark",
    "unit_text",
    "value_math",
    "value_text",
]
