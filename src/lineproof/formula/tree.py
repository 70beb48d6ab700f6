"""The expression tree: the author's order, kept as written, for printing and for computing.

A tree is plain frozen data. ``typeset`` prints it, ``compiled`` turns it into a function,
``algebra`` derives the sympy form from it; none of them changes it.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from functools import lru_cache

from lineproof.formula.hashed import Hashed, kept_hash

MOST_KEPT = 16384
"""Trees of which the names are kept: those of a large record, and of what is tried on them."""


@dataclass(frozen=True, slots=True)
class Number(Hashed):
    """A constant, kept as the author typed it (``0.0015``)."""

    __hash__ = kept_hash

    text: str


@dataclass(frozen=True, slots=True)
class Name(Hashed):
    """A quantity, by its id (``phi_s``)."""

    __hash__ = kept_hash

    id: str


@dataclass(frozen=True, slots=True)
class Negative(Hashed):
    """The expression with its sign changed."""

    __hash__ = kept_hash

    of: Tree


@dataclass(frozen=True, slots=True)
class Binary(Hashed):
    """Two expressions joined by ``+ - * / **``."""

    __hash__ = kept_hash

    op: str
    left: Tree
    right: Tree


@dataclass(frozen=True, slots=True)
class Call(Hashed):
    """A function of the grammar applied to its arguments."""

    __hash__ = kept_hash

    function: str
    args: tuple[Tree, ...]


Tree = Number | Name | Negative | Binary | Call


def walk(tree: Tree) -> Iterator[Tree]:
    """Give every node of the tree, left to right, parents first."""
    yield tree
    match tree:
        case Negative(of):
            yield from walk(of)
        case Binary(_, left, right):
            yield from walk(left)
            yield from walk(right)
        case Call(_, args):
            for arg in args:
                yield from walk(arg)


@lru_cache(maxsize=MOST_KEPT)
def names_of(tree: Tree) -> tuple[str, ...]:
    """Return the ids of the tree's quantities, each once, in order of appearance."""
    return tuple(dict.fromkeys(node.id for node in walk(tree) if isinstance(node, Name)))


def numbers_of(tree: Tree) -> tuple[str, ...]:
    """Return the texts of the tree's constants, each once, in order of appearance."""
    return tuple(dict.fromkeys(node.text for node in walk(tree) if isinstance(node, Number)))
