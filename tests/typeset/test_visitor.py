"""Brackets, fractions, roots and products: each expectation is written by hand."""

from __future__ import annotations

import xml.etree.ElementTree as ET

import pytest

from lineproof.formula import Notation, Symbol
from lineproof.formula.grammar import parse_expression
from lineproof.formula.tree import Binary, Name, Number
from lineproof.typeset import (
    formula_math,
    mathml,
    plain,
    substitution_math,
    tex,
    typst_mark,
    value_math,
)
from lineproof.typeset.nodes import Math
from lineproof.typeset.typst_mark import TypstMark

NOTATION = Notation([Symbol("f_c", "f", "c", "′")])

TEX = {
    "a": "a",
    "f_c": r"f_{\mathrm{c}}^{\prime}",
    "phi_s*A_s*f_y": r"{\varphi}_{\mathrm{s}}\,A_{\mathrm{s}}\,f_{\mathrm{y}}",
    "a + b - c": "a + b - c",
    "a - (b - c)": r"a - \left(b - c\right)",
    "a - (b + c)": r"a - \left(b + c\right)",
    "a + (b + c)": "a + b + c",
    "a*(b + c)": r"a\,\left(b + c\right)",
    "a/(b + c)": r"\frac{a}{b + c}",
    "(a + b)/c": r"\frac{a + b}{c}",
    "a/b/c": r"\frac{\left(a/b\right)}{c}",
    "a/(b/c)": r"\frac{a}{\left(b/c\right)}",
    "(a + b)/c/d": r"\frac{\left(\left(a + b\right)/c\right)}{d}",
    "-a": "-a",
    "-(a + b)": r"-\left(a + b\right)",
    "a*(-b)": r"a\,\left(-b\right)",
    "a - (-b)": r"a - \left(-b\right)",
    "-a**2": "-a^{2}",
    "(-a)**2": r"\left(-a\right)^{2}",
    "f_c**2": r"\left(f_{\mathrm{c}}^{\prime}\right)^{2}",
    "b_w**2": r"b_{\mathrm{w}}^{2}",
    "(a**2)**3": r"\left(a^{2}\right)^{3}",
    "a**-1": "a^{-1}",
    "a**(2/3)": "a^{2/3}",
    "a**(1/3)": r"\sqrt[3]{a}",
    "a**0.5": r"\sqrt{a}",
    "sqrt(a)**2": r"\left(\sqrt{a}\right)^{2}",
    "cbrt(a*b)": r"\sqrt[3]{a\,b}",
    "abs(a - b)": r"\left|a - b\right|",
    "min(a, b + c)": r"\mathrm{min}\left(a, b + c\right)",
    "sin(45)": r"\mathrm{sin}\left(45^{\circ}\right)",
    "2*b": r"2\,b",
    "b*2": r"b \times 2",
    "2*(1/3)": r"2 \times \frac{1}{3}",
    "12500*a": r"12\,500\,a",
    "2e5*a": r"2 \times 10^{5}\,a",
    "(2e5)**2": r"\left(2 \times 10^{5}\right)^{2}",
}


@pytest.mark.parametrize(("formula", "expected"), TEX.items(), ids=TEX)
def test_tex_of_a_formula(formula: str, expected: str) -> None:
    """Brackets stand where another reading is possible, and nowhere else."""
    assert expected == tex(formula_math(parse_expression(formula), NOTATION))


PLAIN = {
    "phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)": "phi_s A_s f_y / (alpha_1 phi_c f'c b)",
    "(a + b)/(2*c)": "(a + b) / (2 c)",
    "a*b/c": "a b / c",
    "a/b*c": "(a / b) c",
    "a*(b/c)": "a (b / c)",
    "d - a/2": "d - a / 2",
    "4500*sqrt(f_c)": "4500 sqrt(f'c)",
    "a**(b + c)": "a^(b + c)",
    "b_w*h**3/12": "b_w h^3 / 12",
    "f_c**2": "(f'c)^2",
    "-(a/b)": "-a / b",
}


@pytest.mark.parametrize(("formula", "expected"), PLAIN.items(), ids=PLAIN)
def test_plain_text_of_a_formula(formula: str, expected: str) -> None:
    """Plain text carries the brackets that a fraction bar made needless."""
    assert expected == plain(formula_math(parse_expression(formula), NOTATION))


MATHML = {
    "a/2": "<mfrac><mi>a</mi><mn>2</mn></mfrac>",
    "sqrt(f_c)": (
        '<msqrt><msub><mrow><mi>f</mi><mo lspace="0" rspace="0">′</mo></mrow>'
        "<mtext>c</mtext></msub></msqrt>"
    ),
    "phi_s - 2": "<mrow><msub><mi>φ</mi><mtext>s</mtext></msub><mo>−</mo><mn>2</mn></mrow>",
    "b_w**2": "<msubsup><mi>b</mi><mtext>w</mtext><mn>2</mn></msubsup>",
    "cbrt(a)": "<mroot><mi>a</mi><mn>3</mn></mroot>",
    "a*b": '<mrow><mi>a</mi><mspace width="0.1667em"></mspace><mi>b</mi></mrow>',
    "20000": "<mn>20\u202f000</mn>",
}


@pytest.mark.parametrize(("formula", "expected"), MATHML.items(), ids=MATHML)
def test_mathml_of_a_formula(formula: str, expected: str) -> None:
    """Only elements of MathML Core are written."""
    written = mathml(formula_math(parse_expression(formula), NOTATION))

    assert f'<math displaystyle="true">{expected}</math>' == written


SUBSTITUTION = {
    "phi_s*A_s*f_y": "0.85 x 3000 x 400",
    "d - a": "556 - (-3.5)",
    "a**2": "(-3.5)^2",
    "-a": "-(-3.5)",
    "I/d": "5.00 x 10^9 / 556",
    "d/I": "556 / (5.00 x 10^9)",
    "I**2": "(5.00 x 10^9)^2",
    "d*sqrt(d)": "556 x sqrt(556)",
    "d*(d - a/2)": "556 x (556 - -3.5 / 2)",
    "cot(theta)": "cot(35 degrees)",
    "b*d": "b x 556",
}


@pytest.mark.parametrize(("formula", "expected"), SUBSTITUTION.items(), ids=SUBSTITUTION)
def test_substitution_reads_one_way(formula: str, expected: str) -> None:
    """Numbers are multiplied with a sign, and negative or long ones are bracketed."""
    printed = {
        "phi_s": "0.85", "A_s": "3000", "f_y": "400", "d": "556", "a": "-3.5", "I": "5.00e9",
        "theta": "35",
    }  # fmt: skip

    assert expected == plain(substitution_math(parse_expression(formula), printed))


def marks_of(math: Math) -> list[TypstMark]:
    """Return the marks of a formula, those inside a mark before it."""
    marks: list[TypstMark] = []

    def place(node: Math) -> int:
        mark = typst_mark(node, place)
        marks.append(mark)
        return len(marks) - 1

    place(math)
    return marks


def test_typst_marks_are_lists_of_texts_and_places() -> None:
    """Each mark is named by its first text and made of marks that stand before it."""
    assert marks_of(formula_math(parse_expression("-f_c/2"), NOTATION)) == [
        ["prefix", "−"],
        ["letter", "f"],
        ["prime"],
        ["row", 1, 2],
        ["word", "c"],
        ["scripts", 3, 4, None],
        ["row", 0, 5],
        ["word", "2"],
        ["frac", 6, False, 7, False],
    ]


@pytest.mark.parametrize(
    ("formula", "words"),
    [
        # no-break spaces on both sides of signs, narrow ones between thousands
        ("a*b", ["7\u00a0×\u00a012\u202f500"]),
        ("a + b - a", ["7\u00a0+\u00a012\u202f500\u00a0−\u00a07"]),
        ("-a + b", ["−7\u00a0+\u00a012\u202f500"]),
        ("a*sqrt(b)", ["7", "12\u202f500"]),  # the sign before the root stands alone
    ],
)
def test_typst_sets_stretches_of_numbers_as_one_word(formula: str, words: list[str]) -> None:
    """Numbers and the signs between them are one text on paper."""
    math = substitution_math(parse_expression(formula), {"a": "7", "b": "12500"})

    assert [mark[1] for mark in marks_of(math) if mark[0] == "word"] == words


def test_typst_sets_a_number_and_its_unit_as_one_word() -> None:
    """So does the unit after the number, but for degrees without a space."""
    assert marks_of(value_math("551", "kN.m"))[0] == ["word", "551\u00a0kN·m"]
    assert marks_of(value_math("-35", "deg"))[0] == ["word", "−35°"]


@pytest.mark.parametrize("formula", [*TEX, *PLAIN, *SUBSTITUTION])
def test_mathml_is_well_formed(formula: str) -> None:
    """Each element is closed and no mrow holds an mrow needlessly."""
    written = mathml(formula_math(parse_expression(formula), NOTATION))
    root = ET.fromstring(written)  # noqa: S314 - our own text

    assert root.tag == "math"


READ_BACK = (
    "a - (b - c)", "a/(b*c)", "a/b/c", "a/(b/c)", "(a + b)*c", "(-a)**2", "a/b*c", "-(a - b)*c",
    "a**(b - c)", "(a*b)**c", "a - b/c", "a*(b/c)", "-a**2",
)  # fmt: skip


def test_reading_a_formula_back_from_plain_text_gives_its_value() -> None:
    """Plain text with its brackets computes to the value of the tree (a = 7, b = 3, c = 2)."""
    values = {"a": 7.0, "b": 3.0, "c": 2.0}
    printed = {name: f"{value:g}" for name, value in values.items()}
    for text in READ_BACK:
        shown = plain(substitution_math(parse_expression(text), printed))
        python = shown.replace(" x ", "*").replace("^", "**")
        expected = eval(text, {}, values)  # noqa: S307 - the texts above

        assert eval(python) == pytest.approx(expected), shown  # noqa: S307 - own text


def test_a_symbol_without_notation_is_made_from_its_id() -> None:
    """A designer's own symbol is typeset from its id."""
    tree = Binary("*", Name("gamma_c"), Number("0.5"))

    assert tex(formula_math(tree, Notation([]))) == r"{\gamma}_{\mathrm{c}} \times 0.5"


def test_a_fraction_inside_a_fraction_keeps_its_size() -> None:
    """Both printers set it in full size, or a hand checker could not read it."""
    math = formula_math(parse_expression("a/(b + c/d)"), NOTATION)

    assert '<mrow displaystyle="true" scriptlevel="0">' in mathml(math)
    assert marks_of(math)[-1][::2] == ["frac", False, True]


def test_a_fraction_beside_a_bar_has_no_second_brackets() -> None:
    """A product over the solidus needs none; a sum, and a product under it, do."""
    shown = {text: plain(formula_math(parse_expression(text), NOTATION)) for text in (
        "a*b/24/c", "(a + b)/24/c", "c/(a/(b*d))",
    )}  # fmt: skip

    assert list(shown.values()) == [
        "(a b/24) / c", "((a + b)/24) / c", "c / (a/(b d))",
    ]  # fmt: skip
