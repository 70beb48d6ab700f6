"""Lines that nobody claimed, each rounded in its own way: how far that may move what rests on them.

By hand one line has three digits and the next has four or all of the calculator. With several of
them on the way to a claim it has more values than can be counted, so that here a band stands: half
a step of the third digit of each line, carried to the claim and added as independent errors are.
What is carried on from one line alone has few values, and these are counted.
"""

from __future__ import annotations

import math
from collections.abc import Collection

from lineproof.audit.claims.propagate import Form, Worker, World
from lineproof.audit.data import Interval
from lineproof.audit.graph import Node
from lineproof.errors import UserError
from lineproof.formula.compiled import NOT_COMPUTED
from lineproof.quantity.units import internal_factor

_DIGITS = 3
"""Digits that a line has at least."""
_LENGTH = 0.05
"""Half a step of lengths in millimetres: a deflection is written to a tenth."""
_MOST = 0.01
"""Part of a value by which a band may move it: what is farther off is asked about, however far
rounding may reach."""
_FEW = 2
"""From so many lines on that are rounded apart a band stands for their values."""
_SAME = 1e-9


class MixedDigits:
    """How far lines may be off where those above that nobody claimed are each rounded apart."""

    def __init__(self, worker: Worker, claimed: Collection[str]) -> None:
        self.worker, self.claimed = worker, claimed
        self._kept: dict[tuple[int, str], Form] = {}

    def met(self, world: World, node: Node, stands_for: Interval) -> Interval | None:
        """Return the band of a line if a claim meets it; None otherwise, or without a band."""
        try:
            form = self._worked(world, node)
        except (*NOT_COMPUTED, UserError):
            return None
        moved = [part for i, part in form.parts.items() if self._is_open(i)]
        if sum(abs(part) > _SAME * abs(form.middle) for part in moved) < _FEW:
            return None
        reach = min(math.hypot(*moved), _MOST * abs(form.middle))
        of_claims = sum(abs(part) for i, part in form.parts.items() if not self._is_open(i))
        half = reach + of_claims + form.rest
        band = Interval(form.middle - half, form.middle + half)
        return band if stands_for.meets(band) else None

    def _is_open(self, entry_id: str) -> bool:
        return entry_id not in self.claimed and self.worker.graph[entry_id].is_computed

    def _worked(self, world: World, node: Node) -> Form:
        return self.worker.form(node, {i: self._form(world, i) for i in node.args.values()})

    def _form(self, world: World, entry_id: str) -> Form:
        if not self._is_open(entry_id):
            return world.used[entry_id]
        key = id(world), entry_id
        if key not in self._kept:
            node = self.worker.graph[entry_id]
            form = self._worked(world, node)
            half = _half_step(form, node.unit)
            self._kept[key] = Form(form.middle, {**form.parts, entry_id: half}, form.rest)
        return self._kept[key]


def _half_step(form: Form, unit: str) -> float:
    """Return half a step of a line's third digit; nothing where it has no more digits than that."""
    factor = internal_factor(unit)
    size = abs(form.middle) / factor
    if not size or not math.isfinite(size):
        return 0.0
    step = 10.0 ** (math.floor(math.log10(size)) + 1 - _DIGITS)
    half = max(step / 2, _LENGTH) if unit == "mm" else step / 2
    is_exact = abs(round(size / step) * step - size) <= _SAME * size
    return 0.0 if is_exact and form.is_point else half * factor
