"""Procedures: how a found value (a root, a frame solution) was found, by name and version.

The registry lets a record be recomputed without running any text that came with it.
"""

from __future__ import annotations

from collections.abc import Callable, Collection, Mapping
from dataclasses import dataclass

from lineproof.errors import UserError
from lineproof.quantity import echo

PROCEDURES: dict[str, Procedure] = {}


@dataclass(frozen=True)
class Procedure:
    """A named numerical procedure.

    ``function`` takes the arguments ``names`` as floats in internal units, then the settings by
    keyword; raise ``version`` whenever its results change. One that goes ``by_name`` takes whatever
    arguments a value needs, as one mapping: a beam has as many spans as it has.
    """

    name: str
    version: int
    title: str
    names: tuple[str, ...]
    function: Callable[..., float]
    by_name: bool = False

    def takes(self, names: Collection[str]) -> bool:
        """Tell whether these are the arguments it takes."""
        return self.by_name or set(self.names) == set(names)


def procedure(
    name: str, version: int, title: str, names: tuple[str, ...] | None
) -> Callable[[Callable[..., float]], Procedure]:
    """Register a function as a procedure; without ``names`` it takes its arguments by name."""

    def register(function: Callable[..., float]) -> Procedure:
        made = Procedure(name, version, title, names or (), function, by_name=names is None)
        PROCEDURES[name] = made
        return made

    return register


def recall(name: str, version: int) -> Procedure | None:
    """Return the registered procedure of that name and version, if there is one."""
    found = PROCEDURES.get(name)
    return found if found is not None and found.version == version else None


def run(made: Procedure, values: Mapping[str, float], settings: Mapping[str, float]) -> float:
    """Run a procedure on named values.

    Raises :class:`UserError` for arguments or settings that it does not take, as a record changed
    by hand may name.
    """
    if not made.takes(values):
        raise UserError(f"procedure {made.name!r} takes {', '.join(made.names)}")
    given = (values,) if made.by_name else tuple(values[name] for name in made.names)
    try:
        return float(made.function(*given, **settings))
    except TypeError:
        unknown = _not_taken(made, settings)
        if unknown:
            raise UserError(
                f"procedure {made.name!r} has no setting {', '.join(map(echo, unknown))}"
            ) from None
        raise


def _not_taken(made: Procedure, settings: Mapping[str, float]) -> list[str]:
    from inspect import signature  # noqa: PLC0415 - 10 ms, for a fault alone

    known = signature(made.function).parameters
    return [name for name in settings if name not in known]
