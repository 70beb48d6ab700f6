"""The families of slips: what a slip is called, and how common it is among slips of the trade.

``share`` is the weight of a family as a whole. A family of many edits, such as every quantity of
the same unit, spreads its share over them: some of them meet a claim of three digits by chance.
"""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Family:
    """Edits of one sort: the name of the slip and the share of the family among slips.

    ``usual`` tells a mistake known by name: it is taught and looked for, and a line offers but a
    few places for it. The others have as many ways as there are digits or quantities about, so
    that one of them gives almost any number; such a fit says nothing where the number has another
    reason. ``wide`` tells edits whose value moves far within the digits of an argument: cot of
    36.1 radians is -0.1 to 0.
    """

    kind: str
    share: float
    usual: bool = False
    wide: bool = False


FAMILIES: dict[str, Family] = {
    # factors and terms
    "factor": Family("factor left out", 1.0, usual=True),
    "number": Family("factor left out", 0.7, usual=True),
    "quantity": Family("factor left out", 0.25),
    "factor twice": Family("factor doubled", 0.8, usual=True),
    "number twice": Family("factor doubled", 0.4, usual=True),
    "quantity twice": Family("factor doubled", 0.1),
    "inverted": Family("multiplied for divided", 0.3),
    "term": Family("term left out", 0.6, usual=True),
    "term twice": Family("term counted twice", 0.3, usual=True),
    "sign": Family("sign", 0.9, usual=True),
    "root": Family("root or square forgotten", 1.0, usual=True),
    "power": Family("other power", 0.2),
    "branch": Family("branch of min or max forgotten", 0.8, usual=True),
    "min for max": Family("min for max", 0.6),
    "brackets": Family("brackets misplaced", 0.7),
    # angles
    "degrees": Family("degrees for radians", 2.0, usual=True, wide=True),
    "function": Family("other function of the angle", 0.3),
    # loads
    "load factor": Family("load factor", 0.8, usual=True),
    "result factored": Family("load factor", 0.5, usual=True),
    "factored": Family("load factor", 0.4, usual=True),
    "service": Family("factored for service", 1.6, usual=True),
    "tributary": Family("half or full tributary width", 2.0, usual=True),
    "simple span": Family("simple span for continuous", 2.0, usual=True),
    "coefficient": Family("coefficient in place of the analysis", 0.4),
    "thumb": Family("rule of thumb", 0.8),
    "web": Family("web alone for the section", 1.0, usual=True),
    "rule": Family("rule of another edition or standard", 0.8, usual=True),
    "centreline": Family("centreline for face", 2.0, usual=True),
    # constants
    "edition": Family("constant of another edition or standard", 1.0, usual=True),
    "load pair": Family("constant of another edition or standard", 1.0, usual=True),
    "table row": Family("other row of the table", 0.6, usual=True),
    "grade": Family("other strength", 0.3, usual=True),
    "mistyped constant": Family("mistyped digit", 0.1),
    # bars
    "diameter": Family("radius or diameter", 1.6, usual=True),
    "bar size": Family("other bar size", 0.5),
    "bar count": Family("bar count changed but not the area", 3.0, usual=True),
    "legs": Family("stirrup legs", 3.0, usual=True),
    # other quantities
    "pair": Family("other quantity", 1.8, usual=True),
    "kin": Family("other quantity", 0.5),
    "near": Family("other quantity", 0.4),
    "far": Family("other quantity", 0.15),
    "clear span": Family("clear for centre span", 2.0, usual=True),
    "mirror": Family("left for right, or neighbouring place", 1.2, usual=True),
    "place": Family("value of another place", 0.4),
    "row": Family("neighbouring row copied", 0.8, usual=True),
    "next row": Family("left for right, or neighbouring place", 0.8, usual=True),
    "row of another place": Family("value of another place", 0.4),
    # units and writing
    "unit": Family("unit factor", 1.0, usual=True),
    "result unit": Family("unit factor", 0.8, usual=True),
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
