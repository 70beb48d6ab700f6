"""Procedures: how a found value (a root, a frame solution) was found, by name and version.

The registry lets a record be recomputed without running any text that came with it.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass

PROCEDURES: dict[str, Procedure] = {}


@dataclass(frozen=True)
class Procedure:
    """A named numerical procedure.

    ``function`` takes the arguments ``names`` as floats in internal units, then the settings by
    keyword; raise ``version`` whenever its results change.
    """

    name: str
    version: int
    title: str
    names: tuple[str, ...]
    function: Callable[..., float]


def procedure(
    name: str, version: int, title: str, names: tuple[str, ...]
) -> Callable[[Callable[..., float]], Procedure]:
    """Register a function as a procedure."""

    def register(function: Callable[..., float]) -> Procedure:
        made = Procedure(name, version, title, names, function)
        PROCEDURES[name] = made
        return made

    return register


def recall(name: str, version: int) -> Procedure | None:
    """Return the registered procedure of that name and version, if there is one."""
    found = PROCEDURES.get(name)
    return found if found is not None and found.version == version else None


def run(made: Procedure, values: Mapping[str, float], settings: Mapping[str, float]) -> float:
    """Run a procedure on named values."""
    return float(made.function(*[values[name] for name in made.names], **settings))
