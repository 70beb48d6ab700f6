"""The places of a beam at which checks belong, and the checks that a record makes there."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from enum import StrEnum
from typing import Any

from lineproof.audit.search.member import Member
from lineproof.formula import Criterion
from lineproof.record import Record
from lineproof.record.entry import CHECK, DECISION
from lineproof.standards.a23_3 import deflection_stages, shear, shear_factors

_NUMBERED = re.compile(r"-\d+$")
_STOPS = {
    test.key
    for test in (
        shear_factors.STRAIN_IN_RANGE, shear_factors.BARS_IN_RANGE, *deflection_stages.NO_STIFFNESS,
    )
}  # fmt: skip
_NO_MOMENT = "no-moment"
"""Note of parts of a face that no load case brings tension to."""
_NO_ZERO = "no-zero-moment"
"""Note that no point of inflection stands near a support."""
_NO_BARS = ("no-bars", "none-going-on")
"""Notes of parts in which no bars stand, or none go on."""


class Where(StrEnum):
    """The places at which a complete calc makes a check."""

    BEAM = "the beam"
    SLAB = "the slab over the beam"
    SPAN = "every span"
    DEEP_SPAN = "every span deeper than 750 mm"
    FLANGE = "the flange of every span"
    FLANGE_TOP = "the overhangs with top bars, at every support"
    DEFLECTED = "every span, cantilevers too"
    FACE = "both faces of every support with a moment"
    SUPPORT = "every support with a moment"
    END = "both ends of every span"
    TORSION = "every section where torsion counts"
    STIRRUPS = "every section with stirrups"
    RESTS = "every support"
    BOTTOM_END = "the bottom bars at both ends of every span"
    ZERO = "the bottom bars where the moment is zero"
    EXTERIOR = "the bottom bars that end in a support"
    EXTERIOR_FACE = "the bottom bars at the face of the end supports"
    TOP_END = "the top bars at both faces of every support with a moment"
    CUT = "every place where bars are cut"
    ALONG = "the bars along the beam, as far as developed"
    LAP = "every lap"


@dataclass(frozen=True, slots=True)
class Spot:
    """A place of a beam, in words, and the parts of the record that may hold its checks."""

    name: str
    parts: tuple[Mapping[str, Any], ...]

    @property
    def stopped(self) -> bool:
        """Whether a check fails here that leaves no others to be made: no bars, strain too large.

        A note that there are no bars says so only beside a check that fails.
        """
        return any(_stops(part) for part in self.parts)

    def made(self, tests: Sequence[Criterion]) -> list[str]:
        """Return the ids of what makes one of these tests here: checks, and decisions that hold."""
        keys, texts = {test.key for test in tests}, {test.text for test in tests}
        return [
            entry["id"]
            for part in self.parts
            for entry in part["entries"]
            if (entry["kind"] == CHECK or (entry["kind"] == DECISION and entry["holds"]))
            and (_NUMBERED.sub("", entry["symbol"]) in keys or entry["formula"] in texts)
        ]


def _stops(part: Mapping[str, Any]) -> bool:
    failed = {e["symbol"] for e in part["entries"] if e["kind"] == CHECK and not e["holds"]}
    told = any(entry["symbol"] in _NO_BARS for entry in part["entries"])
    return bool(failed & _STOPS) or (told and bool(failed))


class Calc:
    """The places of a record at which checks belong."""

    def __init__(self, record: Record, member: Member) -> None:
        self.record, self.member = record, member

    def spots(self, where: Where) -> list[Spot]:
        """Return the places of one kind, in order along the beam."""
        return list(_SPOTS[where](self))

    def under(self, pattern: str) -> tuple[Mapping[str, Any], ...]:
        """Return the parts whose whole key is like a pattern."""
        like = re.compile(pattern)
        return tuple(part for part in self.record.parts if like.fullmatch(part["key"]))

    def has(self, part: Mapping[str, Any], *symbols: str) -> bool:
        """Tell whether a part holds an entry of one of these symbols."""
        return any(entry["symbol"] in symbols for entry in part["entries"])

    def holds(self, part: Mapping[str, Any], symbol: str) -> bool | None:
        """Tell whether a check or decision of a part holds; None where there is none."""
        found = [e for e in part["entries"] if e["symbol"] == symbol and "holds" in e]
        return bool(found[0]["holds"]) if found else None

    def value(self, symbol: str) -> float:
        """Return the first value of a symbol in its printed unit; 0 where there is none."""
        values = (e["value"] for e in self.record.entries.values() if e["symbol"] == symbol)
        return float(next(values, 0.0))

    def moment_faces(self) -> list[tuple[int, str]]:
        """Return the faces over supports that have a moment with the top in tension."""
        return [face for face in self.member.faces() if self._has_moment(*face)]

    def moment_spans(self) -> list[int]:
        """Return the spans that have a moment with the bottom in tension."""
        return [k for k in self.member.sagging() if not self._lies_hogging(k)]

    def _lies_hogging(self, span: int) -> bool:
        parts = self.under(f"sag-{span}")
        return bool(parts) and self.has(parts[0], _NO_MOMENT)

    def _has_moment(self, support: int, side: str) -> bool:
        parts = self.under(f"hog-{support}-{side}")
        if parts:
            return not self.has(parts[0], _NO_MOMENT)
        carrier = self.member.support(support)
        rests = self.member.is_exterior(support) and carrier.turns and carrier.carrier == "wall"
        return not rests


def _beam(calc: Calc) -> Iterator[Spot]:
    yield Spot("the beam", tuple(calc.record.parts))


def _spans(calc: Calc) -> Iterator[Spot]:
    return (_span(calc, k) for k in calc.moment_spans())


def _span(calc: Calc, number: int) -> Spot:
    return Spot(f"span {number}", calc.under(f"sag-{number}"))


def _deep_spans(calc: Calc) -> Iterator[Spot]:
    for spot in (_span(calc, k) for k in calc.member.sagging()):
        if any(calc.holds(part, "skin-required") for part in spot.parts):
            yield spot


def _flanges(calc: Calc) -> Iterator[Spot]:
    if calc.value("h_f"):
        for k in calc.moment_spans():
            if not _span(calc, k).stopped:
                yield Spot(f"span {k}", calc.under(f"interface-{k}"))


def _overhangs(calc: Calc) -> Iterator[Spot]:
    if calc.value("h_f"):
        yield from _faces(calc)


def _faces(calc: Calc) -> Iterator[Spot]:
    for support, side in calc.moment_faces():
        yield Spot(f"support {support}, {side} face", calc.under(f"hog-{support}-{side}"))


def _supports(calc: Calc) -> Iterator[Spot]:
    for support in dict.fromkeys(support for support, _ in calc.moment_faces()):
        yield Spot(f"support {support}", calc.under(f"hog-{support}-(left|right)"))


def _ends(calc: Calc) -> Iterator[Spot]:
    for span, side in calc.member.ends():
        yield Spot(f"span {span} at its {side} support", calc.under(rf"shear-{span}-{side}(-\d+)?"))


def _torsion(calc: Calc) -> Iterator[Spot]:
    return (
        Spot(_said(part), (part,))
        for part in calc.record.parts
        if calc.holds(part, "torsion-counts")
        and calc.has(part, "V_c")
        and calc.holds(part, "strain-range") is not False
    )


def _stirrups(calc: Calc) -> Iterator[Spot]:
    """Give the sections with stirrups; with the restraint assumed they are those of the section."""
    return (
        Spot(_said(part), (part,))
        for part in calc.record.parts
        if calc.has(part, "V_s", "s_max") and calc.has(part, "V_c")
        and not _plain(part) and not calc.has(part, "V_fr")
    )  # fmt: skip


def _plain(part: Mapping[str, Any]) -> bool:
    """Tell whether a section has no stirrups: the concrete alone carries its shear."""
    return any(entry.get("formula") == shear.V_R_PLAIN.text for entry in part["entries"])


def _said(part: Mapping[str, Any]) -> str:
    title = str(part["title"])
    return title[:1].lower() + title[1:]


def _rests(calc: Calc) -> Iterator[Spot]:
    for support in calc.member.carrying():
        yield Spot(f"support {support.number}", calc.under(f"support-{support.number}"))


def _deflected(calc: Calc) -> Iterator[Spot]:
    for k in range(1, calc.member.spans + 1):
        yield Spot(f"span {k}", calc.under(f"deflection-{k}(-.*)?"))


def _bottom_sides(calc: Calc) -> Iterator[tuple[int, str]]:
    """Give both ends of the spans that have bottom bars in tension: (support, side of span)."""
    sagging = calc.member.sagging()
    for span, side in calc.member.ends():
        if span in sagging:
            yield span if side == "left" else span + 1, side


def _bottom_end(calc: Calc, support: int, side: str, suffix: str = "") -> Spot:
    span = support if side == "left" else support - 1
    parts = calc.under(f"anchorage-bottom-{span}-{side}{suffix}")
    return Spot(f"span {span} at its {side} support", parts)


def _bottom_ends(calc: Calc) -> Iterator[Spot]:
    return (_bottom_end(calc, support, side) for support, side in _bottom_sides(calc))


def _zeros(calc: Calc) -> Iterator[Spot]:
    """Give the ends near which the moment is zero: where the end is held it need not be."""
    for support, side in _bottom_sides(calc):
        spot = _bottom_end(calc, support, side, "-zero")
        if any(calc.has(part, _NO_ZERO) for part in spot.parts):
            continue
        if calc.member.support(support).turns or not calc.member.is_exterior(support):
            yield spot


def _exterior(calc: Calc) -> Iterator[Spot]:
    for support, side in _bottom_sides(calc):
        if calc.member.is_exterior(support):
            yield _bottom_end(calc, support, side)


def _exterior_faces(calc: Calc) -> Iterator[Spot]:
    for support, _ in _bottom_sides(calc):
        if calc.member.is_exterior(support):
            yield Spot(f"support {support}", calc.under(f"anchorage-end-{support}-bottom"))


def _top_ends(calc: Calc) -> Iterator[Spot]:
    for support, side in calc.moment_faces():
        parts = calc.under(f"anchorage-top-{support}-{side}(-.*)?")
        bare = any(_stops(part) for part in calc.under(f"hog-{support}-{side}"))
        if not bare and not any(calc.has(part, "through", "holders") for part in parts):
            yield Spot(f"support {support}, {side} face", parts)


def _slab(calc: Calc) -> Iterator[Spot]:
    if calc.value("h_f"):
        yield Spot("the slab", tuple(calc.record.parts))


def _along(calc: Calc) -> Iterator[Spot]:
    """Give both faces: of an assumed restraint at an end there is no moment along the span."""
    member = calc.member
    held = [
        k for k, _ in calc.moment_faces() if not (member.is_exterior(k) and member.support(k).turns)
    ]
    for face in ("bottom", "top") if held else ("bottom",):
        yield Spot(f"the {face} bars along the beam", calc.under(f"coverage-{face}(-tension)?"))


def _cuts(calc: Calc) -> Iterator[Spot]:
    return (Spot(_said(part), (part,)) for part in calc.under(r"anchorage-.*-cut-\d+"))


def _laps(calc: Calc) -> Iterator[Spot]:
    return (Spot(_said(part), (part,)) for part in calc.under(r"anchorage-lap-\d+"))


_SPOTS: Mapping[Where, Callable[[Calc], Iterator[Spot]]] = {
    Where.BEAM: _beam,
    Where.SPAN: _spans,
    Where.DEEP_SPAN: _deep_spans,
    Where.FLANGE: _flanges,
    Where.FLANGE_TOP: _overhangs,
    Where.DEFLECTED: _deflected,
    Where.FACE: _faces,
    Where.SUPPORT: _supports,
    Where.END: _ends,
    Where.TORSION: _torsion,
    Where.STIRRUPS: _stirrups,
    Where.RESTS: _rests,
    Where.BOTTOM_END: _bottom_ends,
    Where.ZERO: _zeros,
    Where.EXTERIOR: _exterior,
    Where.EXTERIOR_FACE: _exterior_faces,
    Where.TOP_END: _top_ends,
    Where.CUT: _cuts,
    Where.SLAB: _slab,
    Where.ALONG: _along,
    Where.LAP: _laps,
}
