"""Edits of a formula's tree: a name or constant replaced, a branch taken, a slip of its form."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from lineproof.formula import Binary, Call, Name, Negative, Number, Tree

ONE = Number("1")
MOST_BRANCHES = 16
_EXTREMES = ("min", "max")


def replaced(tree: Tree, swaps: Mapping[Tree, Tree]) -> Tree:
    """Return the tree with names or constants put in place of others.

    >>> replaced(Binary("*", Name("a"), Name("b")), {Name("b"): Number("2")}).right
    Number(text='2')
    """
    if tree in swaps:
        return swaps[tree]
    match tree:
        case Negative(of):
            return Negative(replaced(of, swaps))
        case Binary(op, left, right):
            return Binary(op, replaced(left, swaps), replaced(right, swaps))
        case Call(function, args):
            return Call(function, tuple(replaced(arg, swaps) for arg in args))
    return tree


def branches(tree: Tree) -> list[Tree]:
    """Return the forms that a formula takes where one side of its min and max governs.

    The tree itself is none of them; a formula without min and max has none.
    """
    found = list(dict.fromkeys(_chosen(tree)))[: MOST_BRANCHES + 1]
    return [form for form in found if form != tree][:MOST_BRANCHES]


def _chosen(tree: Tree) -> list[Tree]:
    match tree:
        case Negative(of):
            return [Negative(form) for form in _chosen(of)]
        case Binary(op, left, right):
            pairs = [(a, b) for a in _chosen(left) for b in _chosen(right)]
            return [Binary(op, a, b) for a, b in pairs[: 2 * MOST_BRANCHES]]
        case Call(function, args):
            whole: list[tuple[Tree, ...]] = [()]
            for arg in args:
                whole = [(*had, form) for had in whole for form in _chosen(arg)]
                whole = whole[: 2 * MOST_BRANCHES]
            made: list[Tree] = [Call(function, chosen) for chosen in whole]
            if function in _EXTREMES:
                made += [form for arg in args for form in _chosen(arg)]
            return made[: 2 * MOST_BRANCHES]
    return [tree]


def slips(tree: Tree) -> Iterator[tuple[Tree, str]]:
    """Give the tree with one slip of its form each, and what the slip is in words."""
    for form, words in _here(tree):
        yield form, words
    match tree:
        case Negative(of):
            yield from ((Negative(form), words) for form, words in slips(of))
        case Binary(op, left, right):
            yield from ((Binary(op, form, right), words) for form, words in slips(left))
            yield from ((Binary(op, left, form), words) for form, words in slips(right))
        case Call(function, args):
            for place, arg in enumerate(args):
                for form, words in slips(arg):
                    yield Call(function, (*args[:place], form, *args[place + 1 :])), words


def _here(tree: Tree) -> Iterator[tuple[Tree, str]]:
    match tree:
        case Negative(of):
            yield of, f"the sign of {text_of(of)} is turned"
        case Binary("+", left, right):
            yield Binary("-", left, right), f"the sign of {text_of(right)} is turned"
            yield left, f"the term {text_of(right)} is missing"
            yield right, f"the term {text_of(left)} is missing"
        case Binary("-", left, right):
            yield Binary("+", left, right), f"the sign of {text_of(right)} is turned"
            yield left, f"the term {text_of(right)} is missing"
            yield Binary("-", right, left), f"{text_of(left)} and {text_of(right)} are exchanged"
        case Binary("**", left, right):
            yield left, f"the power {text_of(right)} of {text_of(left)} is forgotten"
        case Call("sqrt" | "cbrt", (of,)):
            yield of, f"the root of {text_of(of)} is forgotten"
        case Call("cot", (of,)):
            yield Call("tan", (of,)), f"tan in place of cot of {text_of(of)}"
            yield ONE, f"{text_of(tree)} is missing"
        case Call("sin" | "cos" | "tan", _):
            yield ONE, f"{text_of(tree)} is missing"
        case Binary("/", left, right):
            yield Binary("*", left, right), f"multiplied by {text_of(right)}, not divided"
        case Name(name):
            yield Call("sqrt", (tree,)), f"the root of {plain(name)} is one too much"
            yield Binary("**", tree, Number("2")), f"the square of {plain(name)} is one too much"


_RANK = {"+": 1, "-": 1, "*": 2, "/": 2, "**": 4}
_SIGN = 3


def text_of(tree: Tree) -> str:
    """Return a tree as it is typed.

    >>> text_of(Binary("*", Number("2"), Binary("+", Name("a"), Name("b"))))
    '2*(a + b)'
    """
    return _text(tree)[0]


def _text(tree: Tree) -> tuple[str, int]:
    match tree:
        case Number(text):
            return text, 9
        case Name(name):
            return plain(name), 9
        case Negative(of):
            return f"-{_inside(of, _SIGN)}", 1
        case Call(function, args):
            return f"{function}({', '.join(map(text_of, args))})", 9
        case Binary(op, left, right):
            rank = _RANK[op]
            space = " " if rank == 1 else ""
            first = _inside(left, rank + (op == "**"))
            second = _inside(right, rank + (op in ("-", "/", "**")))
            return f"{first}{space}{op}{space}{second}", rank


def _inside(tree: Tree, rank: int) -> str:
    text, own = _text(tree)
    return text if own >= rank else f"({text})"


def plain(name: str) -> str:
    """Return a symbol's id as a reader says it: ``lambda_`` is lambda."""
    return name.rstrip("_")
