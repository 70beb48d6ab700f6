"""The families of slips: what a slip is called, and how common it is among slips of the trade.

``share`` is the weight of a family as a whole. A family of many edits, such as every quantity of
the same unit, spreads its share over them: some of them meet a claim of three digits by chance.
"""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Family:
    """Edits of one sort: the name of the slip and the share of the family among slips."""

    kind: str
    share: float


FAMILIES: dict[str, Family] = {
    # factors and terms
    "factor": Family("factor left out", 1.0),
    "number": Family("factor left out", 0.7),
    "quantity": Family("factor left out", 0.25),
    "factor twice": Family("factor doubled", 0.8),
    "number twice": Family("factor doubled", 0.4),
    "quantity twice": Family("factor doubled", 0.1),
    "inverted": Family("multiplied for divided", 0.3),
    "term": Family("term left out", 0.6),
    "term twice": Family("term counted twice", 0.3),
    "sign": Family("sign", 0.9),
    "root": Family("root or square forgotten", 1.0),
    "power": Family("other power", 0.2),
    "branch": Family("branch of min or max forgotten", 0.8),
    "min for max": Family("min for max", 0.6),
    "brackets": Family("brackets misplaced", 0.7),
    # angles
    "degrees": Family("degrees for radians", 2.0),
    "function": Family("other function of the angle", 0.3),
    # loads
    "load factor": Family("load factor", 0.8),
    "result factored": Family("load factor", 0.5),
    "factored": Family("load factor", 0.4),
    "service": Family("factored for service", 1.6),
    "tributary": Family("half or full tributary width", 2.0),
    "simple span": Family("simple span for continuous", 2.0),
    "coefficient": Family("coefficient in place of the analysis", 0.4),
    "centreline": Family("centreline for face", 2.0),
    # constants
    "edition": Family("constant of another edition or standard", 1.0),
    "load pair": Family("constant of another edition or standard", 1.0),
    "table row": Family("other row of the table", 0.6),
    "grade": Family("other strength", 0.3),
    "mistyped constant": Family("mistyped digit", 0.1),
    # bars
    "diameter": Family("radius or diameter", 1.6),
    "bar size": Family("other bar size", 0.5),
    "bar count": Family("bar count changed but not the area", 3.0),
    "legs": Family("stirrup legs", 3.0),
    # other quantities
    "pair": Family("other quantity", 1.8),
    "kin": Family("other quantity", 0.5),
    "near": Family("other quantity", 0.4),
    "far": Family("other quantity", 0.15),
    "clear span": Family("clear for centre span", 2.0),
    "mirror": Family("left for right, or neighbouring place", 1.2),
    "place": Family("value of another place", 0.4),
    "row": Family("neighbouring row copied", 0.8),
    "next row": Family("left for right, or neighbouring place", 0.8),
    "row of another place": Family("value of another place", 0.4),
    # units and writing
    "unit": Family("unit factor", 1.0),
    "result unit": Family("unit factor", 0.8),
    "other unit": Family("unit factor", 0.2),
    "decimal": Family("decimal point", 0.3),
    "swapped": Family("transposed digits", 0.5),
    "mistyped": Family("mistyped digit", 0.6),
    "mistyped argument": Family("mistyped digit", 0.2),
    "swapped argument": Family("transposed digits", 0.15),
    "swapped result": Family("transposed digits", 0.4),
    "mistyped result": Family("mistyped digit", 0.2),
}
"""Every family by its key. The shares are a checker's judgement, not counted from a survey."""
