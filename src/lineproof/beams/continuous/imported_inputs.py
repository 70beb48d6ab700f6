"""Files of an office's frame analysis as an input: found, read once, checked with the beam."""

from __future__ import annotations

import hashlib
from collections.abc import Mapping, Sequence
from pathlib import Path
from typing import Any

import numpy as np

from lineproof.beams.analysis.imported import TOLERANCE, Imported, read_forces, read_reactions
from lineproof.beams.continuous.imported_forces import ForcesFile
from lineproof.beams.continuous.typed_beam import TypedLoad, TypedSupport
from lineproof.errors import FaultList, UserError
from lineproof.quantity import Typed, echo

MOST_BYTES = 20_000_000
_LONGEST_PATH = 1000


def read_forces_file(
    name: str, path: object, given: Mapping[str, Any], fields: Mapping[str, Any]
) -> ForcesFile | None:
    """Return the file of forces if one is given; raises :class:`UserError` with all faults.

    ``given`` holds the inputs as typed, ``fields`` those read so far; where the spans are wrong,
    only the file itself is looked at.
    """
    faults = FaultList()
    _check_beside(given, faults)
    forces = _read_if_given(name, path, faults)
    reactions = _read_if_given("reactions_csv", given["reactions_csv"], faults)
    spans: Sequence[Typed] = fields["spans"]
    made = None
    if forces is not None and spans:
        try:
            made = _read(given, fields, forces, reactions)
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()
    return made


def _check_beside(given: Mapping[str, Any], faults: FaultList) -> None:
    """Note what cannot go with imported forces."""
    if given["forces_csv"] is None:
        if given["reactions_csv"] is not None:
            faults.add(
                "reactions_csv: goes with forces_csv, the moments and shears of the same analysis; "
                "write both, or leave it out"
            )
        return
    if given["torques"]:
        faults.add(
            "torques: with forces_csv torsion is the column T of the file; write it there, or "
            "leave torques out"
        )
    if given["redistribution"]:
        faults.add(
            "redistribution: the moments of forces_csv are not ours to redistribute, their load "
            "types are not known; redistribute in the frame analysis, or leave forces_csv out"
        )


def _read_if_given(name: str, path: object, faults: FaultList) -> bytes | None:
    if path is None:
        return None
    try:
        return read_bytes(name, path)
    except UserError as error:
        faults.take(error)
        return None


def read_bytes(name: str, given: object) -> bytes:
    """Return the content of a file named by an input; raises :class:`UserError`."""
    path = _path(name, given)
    try:
        if not path.is_file():
            what = "a folder, no file" if path.is_dir() else "no such file"
            raise UserError(
                f"{name}: {echo(str(given))}: {what}; write its path from the folder of the "
                f"notebook, like {_like(name)}"
            )
        with path.open("rb") as stream:
            content = stream.read(MOST_BYTES + 1)
    except OSError as error:
        raise UserError(
            f"{name}: {echo(str(given))} cannot be read: {error.strerror}; write the path of a "
            f"file like {_like(name)}"
        ) from None
    if len(content) > MOST_BYTES:
        raise UserError(
            f"{name}: {echo(str(given))} is larger than {MOST_BYTES // 1_000_000} MB; export fewer "
            "cases"
        )
    return content


def _like(name: str) -> str:
    return "'reactions.csv'" if name == "reactions_csv" else "'frame.csv'"


def _path(name: str, given: object) -> Path:
    """Return a path as typed; raises :class:`UserError` where it is none."""
    text = str(given) if isinstance(given, str | Path) else ""
    if not 0 < len(text.strip()) <= _LONGEST_PATH or not text.isprintable():
        raise UserError(f"{name}: {echo(given)} is no path of a file; write one like {_like(name)}")
    return Path(text)


def _read(
    given: Mapping[str, Any], fields: Mapping[str, Any], forces: bytes, reactions: bytes | None
) -> ForcesFile:
    """Read the contents against the beam; every message names input and file."""
    spans: Sequence[Typed] = fields["spans"]
    name = _named("forces_csv", given)
    imported = read_forces(
        forces,
        [span.value for span in spans],
        breaks=_breaks(fields["loads"] or ()),
        name=name,
    )
    faults = FaultList()
    _check_free_ends(imported, fields["supports"], name, faults)
    if reactions is not None:
        try:
            made = read_reactions(reactions, imported, name=_named("reactions_csv", given))
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()
    file_name = Path(given["forces_csv"]).name
    if reactions is None:
        return ForcesFile(file_name, _digest(forces), imported)
    other = Path(given["reactions_csv"]).name
    return ForcesFile(file_name, _digest(forces), imported, other, _digest(reactions), made)


def _named(name: str, given: Mapping[str, Any]) -> str:
    return f"{name}: {Path(given[name]).name}"


def _digest(content: bytes) -> str:
    return hashlib.sha256(content).hexdigest()


def _breaks(loads: Sequence[TypedLoad]) -> dict[int, list[float]]:
    """Return by span where the loads given begin, stand and end [mm]."""
    made: dict[int, list[float]] = {}
    for load in loads:
        for place in (load.at, load.start, load.end):
            if place is not None:
                for span in load.spans:
                    made.setdefault(span, []).append(place.value)
    return made


def _check_free_ends(
    imported: Imported, supports: Sequence[TypedSupport] | None, name: str, faults: FaultList
) -> None:
    """Note where a free end has a moment: the file is of another beam."""
    if not supports:
        return
    M, cases = imported.envelope.M, imported.envelope.cases
    for number, column in ((1, 0), (len(supports), -1)):
        if supports[number - 1].kind != "free":
            continue
        over = np.abs(M[:, column]) > TOLERANCE * np.abs(M).max(axis=1)
        for row in np.flatnonzero(over).tolist()[:1]:
            faults.add(
                f"{name}: {cases[row]}: M is {M[row, column] / 1e6:g} kN.m at support {number}, "
                "which is given as a free end; write the support, or look at the order of spans"
            )
