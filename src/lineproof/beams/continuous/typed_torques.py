"""Torques along the beam as the designer types them."""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.beams.continuous.typed_beam import GRAVITY_TYPES
from lineproof.beams.inputs import Range, read_in_range
from lineproof.errors import FaultList, UserError
from lineproof.quantity import QuantityInput, Typed, echo
from lineproof.quantity.units import plain_spelling

TORQUE = Range("kN.m", 0, 1000, 6, zero=True)
KINDS_OF_TORSION = ("compatibility", "equilibrium")


def read_torques(name: str, given: object) -> dict[str, Typed]:
    """Read torques per metre of beam by load type; raises :class:`UserError` with all faults."""
    if not isinstance(given, Mapping):
        raise UserError(
            f"{name}: {echo(given)} is not understood; write the torque per metre of beam by load "
            "type: {'D': '4.5 kN.m', 'L': '3.0 kN.m'}"
        )
    faults, made = FaultList(), {}
    for kind, text in given.items():
        if kind not in GRAVITY_TYPES:
            faults.add(f"{name}: load type {echo(kind)}; write one of {', '.join(GRAVITY_TYPES)}")
            continue
        try:
            made[kind] = read_in_range(f"{name}, {kind}", _on_one_metre(text), TORQUE)
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()
    return made


def _on_one_metre(given: QuantityInput) -> QuantityInput:
    """Return a torque per metre as the torque on one metre: '5.5 kN·m/m' is '5.5 kN.m' there."""
    text = plain_spelling(given) if isinstance(given, str) else ""
    return text.removesuffix("/m") if text.endswith("N.m/m") else given
