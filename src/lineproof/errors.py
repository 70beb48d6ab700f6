"""Errors a user can cause, each with all its faults and an exit code."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from functools import wraps
from typing import Any, ParamSpec, TypeVar

_Given = ParamSpec("_Given")
_Made = TypeVar("_Made")

SHOWN_PREFIX = "Wrong input: "
"""What a fault begins with under a notebook cell; a stored output is told by it."""


class UserError(ValueError):
    """Wrong input: says what was given and what to type instead, all faults at once.

    ``faults`` holds one sentence per fault. Shown without a traceback; exit code 2.

    >>> str(UserError(["span: '7.6' has no unit; write '7.6 m'"]))
    "span: '7.6' has no unit; write '7.6 m'"
    """

    exit_code = 2

    def __init__(self, faults: str | Iterable[str]) -> None:
        self.faults: tuple[str, ...] = (faults,) if isinstance(faults, str) else tuple(faults)
        super().__init__("\n".join(self.faults))

    def __reduce__(self) -> tuple[type[UserError], tuple[tuple[str, ...]]]:
        """Survive a process border with the faults kept apart."""
        return type(self), (self.faults,)

    def _render_traceback_(self) -> list[str]:
        """Show only the faults in a notebook (IPython asks for this method)."""
        return [f"{SHOWN_PREFIX}{fault}" for fault in self.faults]


MOST_FAULTS = 40
"""Of the faults of one file more are only counted."""


class FaultList:
    """Collect faults and raise them together.

    >>> faults = FaultList()
    >>> faults.add("h: '-620 mm' is negative; write a positive length")
    >>> faults.raise_if_any()
    Traceback (most recent call last):
    lineproof.errors.UserError: h: '-620 mm' is negative; write a positive length
    """

    def __init__(self) -> None:
        self.faults: list[str] = []

    def add(self, fault: str) -> None:
        """Note one fault."""
        self.faults.append(fault)

    def take(self, error: UserError) -> None:
        """Note all faults of a caught error."""
        self.faults.extend(error.faults)

    def raise_if_any(self) -> None:
        """Raise one :class:`UserError` with every fault noted so far."""
        if self.faults:
            raise UserError(self.faults)


class FileFaults(FaultList):
    """Faults of one file, each with its name; after the first forty only their number is told."""

    def __init__(self, name: str) -> None:
        super().__init__()
        self.name = name

    def add(self, fault: str) -> None:
        """Note one fault of the file."""
        super().add(f"{self.name}: {fault}")

    def raise_if_any(self) -> None:
        """Raise the first faults and the number of the others."""
        more = len(self.faults) - MOST_FAULTS
        if more > 0:
            raise UserError([*self.faults[:MOST_FAULTS], f"{self.name}: and {more} faults more"])
        super().raise_if_any()


def inputs_named(call: Callable[_Given, _Made]) -> Callable[_Given, _Made]:
    """Make a call tell every input that it does not know or lacks, by :class:`UserError`.

    Python's own error names one kind of fault only, shows a traceback in a notebook, and says
    nothing of what to type.

    >>> @inputs_named
    ... def beam(*, spans: str, h: str = "600 mm") -> None: ...
    >>> beam(span="8 m")
    Traceback (most recent call last):
    lineproof.errors.UserError: beam: 'span' is no input; did you mean 'spans'?
    beam: 'spans' is missing; write spans=...
    """

    @wraps(call)
    def told(*given: _Given.args, **named: _Given.kwargs) -> _Made:
        try:
            return call(*given, **named)
        except TypeError:
            faults = _faults_of_call(call, given, named)
            if not faults:
                raise  # one of the calculation itself
            raise UserError(faults) from None

    return told


def _faults_of_call(
    call: Callable[..., Any], given: tuple[Any, ...], named: dict[str, Any]
) -> list[str]:
    """Say which arguments a call does not know and which it lacks, and what to type."""
    import difflib  # noqa: PLC0415 - only where something is wrong
    import inspect  # noqa: PLC0415

    known = inspect.signature(call).parameters
    alone = [n for n, p in known.items() if p.kind is p.POSITIONAL_OR_KEYWORD]
    sample = next((n for n in known if n not in (*alone, *named)), "input")
    faults = [
        f"{call.__qualname__}: {value!r:.60} stands alone; write it with the name of its input, "
        f"such as {sample}=..."
        for value in given[len(alone) :]
    ]
    for name in named:
        if name not in known:
            near = difflib.get_close_matches(name, [n for n in known if n not in named], n=1)
            advice = f"did you mean {near[0]!r}?" if near else "leave it out"
            faults.append(f"{call.__qualname__}: {name!r} is no input; {advice}")
    for name, parameter in known.items():
        if name in named and name in alone[: len(given)]:
            faults.append(f"{call.__qualname__}: {name!r} is given twice; write it once")
        lacking = parameter.default is parameter.empty and name not in alone[: len(given)]
        if lacking and name not in named:
            faults.append(f"{call.__qualname__}: {name!r} is missing; write {name}=...")
    return faults
