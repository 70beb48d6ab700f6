"""Nodes of trees whose hash is worked out once: a hash of a tree walks over all of it."""

from __future__ import annotations


class Hashed:
    """What nodes with a kept hash inherit: a place for it."""

    __slots__ = ("hashed",)
    hashed: int


def kept_hash(node: Hashed) -> int:
    """Return the hash of a frozen dataclass with slots; its ``__hash__`` is set to this."""
    try:
        return node.hashed
    except AttributeError:
        pieces = [getattr(node, name) for name in node.__slots__]
        made = hash((node.__class__.__name__, *pieces))
        object.__setattr__(node, "hashed", made)
        return made
