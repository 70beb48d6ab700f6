"""Ties around the hooks of a beam as built, as typed: their spacing, by the number of the end."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from lineproof.beams.inputs import Range, read_in_range
from lineproof.errors import FaultList, UserError
from lineproof.quantity import echo

SPACING = Range("mm", 30, 600, 75)
"""Closer ties do not let concrete pass, wider ones are a slip of units."""
_SAMPLE = "{1: '75 mm'}"


def read_hook_ties(name: str, given: object) -> dict[int, float]:
    """Read the spacing [mm] of ties by the number of their support; raises :class:`UserError`."""
    if not isinstance(given, Mapping):
        raise UserError(
            f"{name}: {echo(given)} is not understood; write their spacing by the number of the "
            f"end support: {_SAMPLE}"
        )
    faults = FaultList()
    made: dict[int, float] = {}
    for support, spacing in given.items():
        if type(support) is not int:
            faults.add(f"{name}: {echo(support)} is no number of a support; write {_SAMPLE}")
            continue
        try:
            made[support] = read_in_range(f"{name}, support {support}", spacing, SPACING).value
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()
    return made


def check_hook_ties(fields: Mapping[str, Any], given: Mapping[str, Any], faults: FaultList) -> None:
    """Refuse ties of a beam whose bars are left open, and elsewhere than in its end supports."""
    ties, supports = fields.get("hook_ties"), fields.get("supports") or ()
    if not ties:
        return
    if given["bar_runs"] is None or given["stirrups"] is None:
        faults.add(
            "hook_ties: is read where bars and stirrups are both given (bar_runs, stirrups); of "
            "others the ties that hooks ask for are laid: write hook_ties = None"
        )
    for support in ties if supports else ():
        if support not in (1, len(supports)):
            faults.add(
                f"hook_ties: support {support} is no end of the beam; hooks stand at 1 and "
                f"{len(supports)}: write {_SAMPLE}"
            )
        elif supports[support - 1].kind == "free":
            faults.add(
                f"hook_ties: support {support} is a free end; write its ties as a zone of stirrups "
                "and leave it out here"
            )
