"""The grammar: what it reads, and what it refuses without running it."""

from __future__ import annotations

import time
import warnings

import pytest

from lineproof.errors import UserError
from lineproof.formula import (
    Binary,
    Call,
    FormulaError,
    Name,
    Negative,
    Number,
    names_of,
    parse_criterion,
    parse_expression,
    parse_line,
)
from lineproof.formula.grammar import DEEPEST, LONGEST
from lineproof.formula.tree import numbers_of


def test_the_tree_keeps_the_authors_order_and_digits() -> None:
    symbol, tree = parse_line("alpha_1 = max(0.85 - 0.0015*f_c, 0.670)")
    assert symbol == "alpha_1"
    inner = Binary("-", Number("0.85"), Binary("*", Number("0.0015"), Name("f_c")))
    assert tree == Call("max", (inner, Number("0.670")))
    assert names_of(tree) == ("f_c",)
    assert numbers_of(tree) == ("0.85", "0.0015", "0.670")


@pytest.mark.parametrize(
    ("text", "tree"),
    [
        ("-a**2", Negative(Binary("**", Name("a"), Number("2")))),
        ("a - b - c", Binary("-", Binary("-", Name("a"), Name("b")), Name("c"))),
        ("a**b**c", Binary("**", Name("a"), Binary("**", Name("b"), Name("c")))),
        ("(a + b)*c", Binary("*", Binary("+", Name("a"), Name("b")), Name("c"))),
        ("sin", Name("sin")),  # a symbol may be called like a function
        (" 1e3 * a ", Binary("*", Number("1e3"), Name("a"))),
        (".5*a", Binary("*", Number(".5"), Name("a"))),
    ],
)
def test_python_precedence(text: str, tree: object) -> None:
    assert parse_expression(text) == tree


def test_criteria() -> None:
    assert parse_criterion("M_f <= M_r") == (Name("M_f"), "<=", Name("M_r"))
    assert parse_criterion("c/d > 0.5")[1] == ">"
    assert parse_criterion("a >= 2*b")[1] == ">="
    assert parse_criterion("a < b")[1] == "<"


# Texts that run code, hang or crash where text is evaluated.
HOSTILE = [
    "__import__('os')", "__import__(os)", "a.__class__", "a.b", "().__class__.__bases__",
    "(lambda: 1)()", "lambda: 0", "[x for x in y]", "[1, 2]", "{1: 2}", "{1, 2}", "(1, 2)",
    "f'{a}'", "'text'", '"text"', "b'x'", "f'c", "a if b else c", "a and b", "not a", "a or b",
    "a == b", "a < b", "a := 1", "(a := 1)", "a # note", "a\n+ b", "a\\\n+b", "a\tb", "a; b",
    "a, b", "*a", "**a", "a[0]", "a @ b", "a % b", "a // b", "a & b", "a | b", "a ^ b", "~a",
    "+a", "a << 2", "sqrt(a, b)", "sqrt()", "sqrt(x=1)", "sqrt(*a)", "max(a)", "eval(a)",
    "open(a)", "exec(a)", "sqrt(a)(b)", "sqrt.__call__(a)", "1_000", "0x10", "0b1", "0o7", "1j",
    "1e999", "1e400*a", "1e100", "9" * 13, "0.1234567890123", "1.", "1.e5", "...", "None", "True",
    "False", "nan*", "", "   ", "a b", "a = b", "5 a", "((a)", "a)", "a..b", "-" * 20_000,
    "1+" * 20_000 + "1", "(" * 1000, "-" * 390 + "a", "a" * 5000,
    "a+" * 199 + "a", "𝑎 + b", "ϕ*b", "µ", "a\x00b", "\ud800", "__debug__", "_a", "await a",
    "yield a", "async", "print(a)", "a!r", "a$b", "`a`", "a?", "1if a else b", "1or 2", "{{ a }}",
    "max(" * 60 + "a" + ",1)" * 60,
]  # fmt: skip


@pytest.mark.parametrize("text", HOSTILE, ids=range(len(HOSTILE)))
def test_hostile_text_is_refused_quickly(text: str) -> None:
    start = time.perf_counter()
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # Python's own, about odd literals
        with pytest.raises(UserError) as caught:
            parse_expression(text)
        with pytest.raises(UserError):
            parse_line("x = " + text)
        with pytest.raises(UserError):
            parse_criterion(text + " <= 1 <= 2")
    assert time.perf_counter() - start < 2
    assert len(str(caught.value)) < 300


@pytest.mark.parametrize("text", ["9**9**9", "9**9**9**9**9", "a**9e9**9e9"])
def test_towers_of_powers_are_plain_data_until_computed(text: str) -> None:
    assert isinstance(parse_expression(text), Binary)


@pytest.mark.parametrize(
    "text",
    [
        "a",
        "a == b",
        "= b",
        "a =",
        "a = b = c",
        "a <= b",
        "1 = a",
        "a + b = c",
        "lambda = a",
        "a.b = c",
    ],
)
def test_a_line_is_one_symbol_one_sign_one_expression(text: str) -> None:
    with pytest.raises(UserError):
        parse_line(text)


@pytest.mark.parametrize(
    "text",
    ["a", "a = b", "a == b", "a != b", "a <= b <= c", "<= b", "a <=", "a =< b", "a <> b", "a => b"],
)
def test_a_criterion_has_one_comparison(text: str) -> None:
    with pytest.raises(UserError):
        parse_criterion(text)


def test_refusals_say_what_to_write() -> None:
    with pytest.raises(FormulaError) as caught:
        parse_criterion("a <= b <= c")
    assert str(caught.value) == (
        "formula 'a <= b <= c': a criterion has exactly one comparison: 'M_f <= M_r'; write two"
    )
    with pytest.raises(FormulaError) as caught:
        parse_expression("log(a)")
    assert str(caught.value) == (
        "formula 'log(a)': 'log' is not a function of formulas; "
        "there are sqrt, cbrt, abs, min, max, sin, cos, tan, cot"
    )


def test_limits() -> None:
    text = "+".join(["a"] * DEEPEST)
    assert names_of(parse_expression(text)) == ("a",)
    with pytest.raises(FormulaError, match="nested too deeply"):
        parse_expression(text + "+a+a")
    with pytest.raises(FormulaError, match=f"longer than {LONGEST}"):
        parse_expression("a" + " " * LONGEST)
