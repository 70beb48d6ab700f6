"""Compiled functions and algebra, against each other and against mpmath and hand values."""

from __future__ import annotations

import math
import time
from collections.abc import Callable
from types import SimpleNamespace
from typing import Any

import mpmath
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st
from tests.formula.by_sympy import value_at

from lineproof.errors import UserError
from lineproof.formula import Binary, Call, Name, Negative, Number, Tree, parse_expression
from lineproof.formula.algebra import expression
from lineproof.formula.compiled import compile_step, compile_tree, weave_tree

NAMES = ("a", "b", "c")
VALUES = st.floats(min_value=0.1, max_value=50.0)


def _joined(inner: st.SearchStrategy[Tree]) -> st.SearchStrategy[Tree]:
    power = st.sampled_from(["2", "3", "0.5", "1.5"]).map(Number)
    return st.one_of(
        st.builds(Binary, st.sampled_from(["+", "-", "*", "/"]), inner, inner),
        st.builds(Binary, st.just("**"), inner, power),
        st.builds(Negative, inner),
        st.builds(lambda f, x: Call(f, (x,)), st.sampled_from(["sqrt", "cbrt", "abs"]), inner),
        st.builds(lambda f, x: Call(f, (x,)), st.sampled_from(["sin", "cos", "tan", "cot"]), inner),
        st.builds(lambda f, x, y: Call(f, (x, y)), st.sampled_from(["min", "max"]), inner, inner),
    )


TREES = st.recursive(
    st.one_of(
        st.sampled_from(NAMES).map(Name),
        st.sampled_from(["0.85", "1", "12", "0.0015", "4500"]).map(Number),
    ),
    _joined,
    max_leaves=7,
)

_MP = {
    "sqrt": mpmath.sqrt, "cbrt": lambda x: mpmath.root(x, 3), "abs": mpmath.fabs,
    "min": min, "max": max,
    "sin": lambda x: mpmath.sin(mpmath.radians(x)), "cos": lambda x: mpmath.cos(mpmath.radians(x)),
    "tan": lambda x: mpmath.tan(mpmath.radians(x)), "cot": lambda x: mpmath.cot(mpmath.radians(x)),
}  # fmt: skip


def _exact(tree: Tree, at: dict[str, float], seen: list[float]) -> mpmath.mpf:
    """Evaluate a tree at 60 digits by mpmath; ``seen`` takes every value on the way."""
    match tree:
        case Number(text):
            value = mpmath.mpf(text)
        case Name(name):
            value = mpmath.mpf(at[name])
        case Negative(of):
            value = -_exact(of, at, seen)
        case Binary(op, left, right):
            x, y = _exact(left, at, seen), _exact(right, at, seen)
            value = {
                "+": lambda: x + y, "-": lambda: x - y, "*": lambda: x * y, "/": lambda: x / y,
                "**": lambda: x**y,
            }[op]()  # fmt: skip
        case Call(name, args):
            value = _MP[name](*[_exact(a, at, seen) for a in args])
    if isinstance(value, mpmath.mpc):
        raise TypeError(tree)
    seen.append(abs(float(value)))
    return value


@settings(deadline=None)
@given(TREES, VALUES, VALUES, VALUES)
def test_compiled_equals_sympy_and_mpmath(tree: Tree, a: float, b: float, c: float) -> None:
    at = {"a": a, "b": b, "c": c}
    seen: list[float] = []
    with mpmath.workdps(60):
        try:
            exact = float(_exact(tree, at, seen))
        except (ArithmeticError, ValueError, TypeError):
            assume(False)  # noqa: FBT003 - nothing real to compare
    # Values on the way that cancel or overflow would test the floats, not the compiler.
    assume(all(1e-6 < v < 1e9 for v in seen))
    compiled = compile_tree(tree, NAMES)(a, b, c)
    assert compiled == pytest.approx(exact, rel=1e-7)
    assert value_at(tree, at, 50) == pytest.approx(exact, rel=1e-9)


@settings(deadline=None)
@given(TREES, VALUES, VALUES, VALUES)
def test_the_step_of_a_sheet_is_the_same_function(tree: Tree, a: float, b: float, c: float) -> None:
    scope = {n: SimpleNamespace(value=v) for n, v in zip(NAMES, (a, b, c), strict=True)}
    try:
        expected = compile_tree(tree, NAMES)(a, b, c)
    except (ArithmeticError, ValueError, TypeError):
        with pytest.raises((ArithmeticError, ValueError, TypeError)):
            compile_step(tree, NAMES)(scope)
        return
    args, value = compile_step(tree, NAMES)(scope)
    assert value == expected or value != value or isinstance(value, complex)  # noqa: PLR0124
    assert [arg.value for arg in args] == [a, b, c]


def _outcome(function: Callable[..., float], *at: float) -> str:
    """Return every bit of what a function gives, or the error that it raises."""
    try:
        value = function(*at)
    except (ArithmeticError, ValueError, TypeError) as error:
        return type(error).__name__
    return value.hex() if isinstance(value, float) else repr(value)


def _worked(tree: Tree, at: dict[str, float]) -> Any:
    """Work a tree out node by node, as it stands: what both kinds of functions have to give."""
    match tree:
        case Number(text):
            return float(text)
        case Name(name):
            return at[name]
        case Negative(of):
            return -_worked(of, at)
        case Binary(op, left, right):
            x, y = _worked(left, at), _worked(right, at)
            return {
                "+": lambda: x + y, "-": lambda: x - y, "*": lambda: x * y, "/": lambda: x / y,
                "**": lambda: x**y,
            }[op]()  # fmt: skip
        case Call(name, args):
            values = [_worked(a, at) for a in args]
            if name in ("sin", "cos", "tan", "cot"):
                angle = math.radians(values[0])
                return 1.0 / math.tan(angle) if name == "cot" else getattr(math, name)(angle)
            if name == "cbrt" and values[0] < 0:
                raise ValueError(name)
            return {**vars(math), "abs": math.fabs, "min": min, "max": max}[name](*values)


@settings(deadline=None, max_examples=300)
@given(TREES, *[st.floats(-50, 50)] * 3)
def test_compiled_and_woven_functions_give_the_same_bits(
    tree: Tree, a: float, b: float, c: float
) -> None:
    node_by_node = _outcome(lambda *at: _worked(tree, dict(zip(NAMES, at, strict=True))), a, b, c)
    assert _outcome(compile_tree(tree, NAMES), a, b, c) == node_by_node
    woven = weave_tree(tree)
    assert _outcome(lambda *at: woven(dict(zip(NAMES, at, strict=True))), a, b, c) == node_by_node


@pytest.mark.parametrize("name", ["__import__('os').getcwd()", "a b", "_0", "lambda: 0", "'"])
def test_no_text_of_a_tree_is_run(name: str) -> None:
    scope = {name: SimpleNamespace(value=3.0)}
    tree = Binary("*", Name(name), Number("-2"))
    assert compile_tree(tree, [name])(3.0) == -6.0
    assert weave_tree(tree)({name: 3.0}) == -6.0
    assert compile_step(tree, [name])(scope)[1] == -6.0
    with pytest.raises(NameError):
        compile_tree(tree, ["b"])(3.0)
    with pytest.raises(KeyError):
        weave_tree(tree)({"b": 3.0})
    with pytest.raises((NameError, KeyError)):
        compile_tree(Call(name, (Number("1"),)), [name])(3.0)


@pytest.mark.parametrize(
    ("text", "at", "value"),
    [
        # By hand: 0.85 x 2500 x 400 x (550 - 26/2) = 850000 x 537
        ("phi*A*f*(d - a/2)", {"phi": 0.85, "A": 2500, "f": 400, "d": 550, "a": 26}, 456_450_000),
        ("b*h**3/12", {"b": 300, "h": 600}, 5.4e9),
        ("max(0.85 - 0.0015*f, 0.67)", {"f": 32}, 0.802),
        ("max(0.85 - 0.0015*f, 0.67)", {"f": 200}, 0.67),
        ("cot(t)", {"t": 45}, 1.0),
        ("sin(t) + cos(60)", {"t": 30}, 1.0),
        ("tan(t)**2", {"t": 60}, 3.0),
        ("-cbrt(a)", {"a": 27}, -3.0),
        ("-a**2", {"a": 3}, -9.0),
        ("2**3**2*a", {"a": 1}, 512.0),
        ("a/b/c", {"a": 12, "b": 3, "c": 2}, 2.0),
        ("abs(a - b)", {"a": 1, "b": 3}, 2.0),
    ],
)
def test_hand_values(text: str, at: dict[str, float], value: float) -> None:
    tree = parse_expression(text)
    floats = {name: float(number) for name, number in at.items()}
    assert compile_tree(tree, [*floats])(*floats.values()) == pytest.approx(value, rel=1e-14)
    assert value_at(tree, floats) == pytest.approx(value, rel=1e-14)


def test_a_tower_of_powers_overflows_at_once() -> None:
    start = time.perf_counter()
    with pytest.raises(OverflowError):
        compile_tree(parse_expression("9**9**9"), [])()
    for text in ("9**9**9", "((9**60)**60)**60", "x + 10**(10**9)", "0.1**-9e9"):
        with pytest.raises(UserError, match="power of constants"):
            expression(parse_expression(text))
    assert time.perf_counter() - start < 5


def test_a_root_of_a_negative_number_never_hides() -> None:
    assert isinstance(compile_tree(parse_expression("(0 - a)**0.5"), ["a"])(4.0), complex)
    for text in ("abs((0 - a)**0.5)", "min((0 - a)**0.5, a)", "sqrt((0 - a)**0.5)"):
        with pytest.raises(TypeError):
            compile_tree(parse_expression(text), ["a"])(4.0)


@pytest.mark.parametrize("text", ["sqrt(a)", "cbrt(a)", "a**0.5"])
def test_roots_of_negative_numbers_are_refused(text: str) -> None:
    tree = parse_expression(text)
    with pytest.raises(ValueError, match="no real value"):
        value_at(tree, {"a": -27.0})
    try:
        real = isinstance(compile_tree(tree, ["a"])(-27.0), float)
    except ValueError:
        real = False
    assert not real


def test_a_division_by_zero_is_kept() -> None:
    # Simplified algebra would lose it and give c.
    function = compile_tree(parse_expression("(a - b)/(a - b)*c"), NAMES)
    with pytest.raises(ZeroDivisionError):
        function(2.0, 2.0, 3.0)


def test_a_symbol_may_be_called_like_a_function() -> None:
    tree = parse_expression("sin*sin(min) + sqrt(step)")
    assert compile_tree(tree, ["sin", "min", "step"])(2.0, 30.0, 9.0) == pytest.approx(4.0)
    scope = {n: SimpleNamespace(value=v) for n, v in (("sin", 2.0), ("min", 30.0), ("step", 9.0))}
    assert compile_step(tree, ["sin", "min", "step"])(scope)[1] == pytest.approx(4.0)


def test_constants_are_exact_in_algebra() -> None:
    """In floats 0.1 + 0.2 is 0.30000000000000004."""
    assert expression(parse_expression("0.1*x + 0.2*x - 0.3*x")) == 0
