"""Judging claims: each agrees, is the origin of an error, carries one, or is another valid way."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import replace
from itertools import chain

from lineproof.audit.claims.bar_sizes import by_sizes
from lineproof.audit.claims.bench import Bench, Other
from lineproof.audit.claims.conventions import Convention, as_typed, convention_of, in_our_signs
from lineproof.audit.claims.divided import divided_terms
from lineproof.audit.claims.doubt import beside, plausible
from lineproof.audit.claims.habit import HABIT, numbers_of, others_made
from lineproof.audit.claims.in_steps import STEPS, in_steps
from lineproof.audit.claims.mixed_digits import MixedDigits
from lineproof.audit.claims.on_the_way import FOLLOWS, OnTheWay
from lineproof.audit.claims.other_methods import other_ways
from lineproof.audit.claims.propagate import Worker
from lineproof.audit.claims.readings import Rounded, coarse_roundings, unit_slip
from lineproof.audit.claims.rewritten import used_as_written, worked_rightly
from lineproof.audit.claims.safe_side import SIDES, errs_safely
from lineproof.audit.claims.sought import SlipFinder, Sought
from lineproof.audit.claims.twins import twins_of
from lineproof.audit.claims.worlds import (
    as_recorded,
    claimed_above,
    deviating_of,
    unmoved_lines,
    worlds_of,
)
from lineproof.audit.data import Claim, Interval, Judged, Slip, Verdict
from lineproof.audit.graph import Graph, Node
from lineproof.record.entry import DECISION
from lineproof.typeset.values import told

WRONG = (Verdict.INPUT, Verdict.ORIGIN, Verdict.UNIT, Verdict.UNSAFE_ROUNDING, Verdict.UNKNOWN)
"""Verdicts whose values make those below carry something that is not right."""
MISWRITTEN = (Verdict.ORIGIN, Verdict.UNIT)
"""Verdicts on lines that may have been written wrongly and used rightly."""
_DIGITS = 4
_MOVED = 1e-9
_HABIT = "other numbers of the table are rounded so too"


def judge(
    graph: Graph,
    claims: Sequence[Claim],
    find: SlipFinder | None = None,
    convention: Convention | None = None,
) -> tuple[Judged, ...]:
    """Return a judgement per claim and per value that nobody claimed, in the order of the record.

    A claim is compared with what follows from the values that the claim itself uses. Where it
    does not follow, more readings are tried before it is called an origin: that later lines were
    worked from right values, though a claimed one is wrong; that a value which stands in several
    parts was changed in all; that a value above was written wrongly and used rightly; then a slip
    of units, another way, a rounding. ``find`` looks for the slip behind an origin; where a likely
    one gives what another way or a rounding gives as well, the line is doubtful. Moments claimed
    in another sign ``convention``, sought if it is not given, are read in the calc's own signs, and
    keep what was typed.
    """
    signs = convention or convention_of(graph, claims)
    found = _Judge(graph, in_our_signs(claims, signs), find).all()
    return tuple(as_typed(found, claims))


class _Judge:
    """One run of judging; what has been judged so far decides what later claims carry."""

    def __init__(self, graph: Graph, claims: Sequence[Claim], find: SlipFinder | None) -> None:
        self.graph = graph
        self.claims = {claim.id: claim for claim in claims}
        self.worker = Worker(graph)
        deviating = deviating_of(graph, claims)
        self.twins = twins_of(graph, deviating, self.claims)
        self.worlds = worlds_of(self.worker, self.claims, deviating, self.twins)
        self.claimed_bench = Bench(self.worker, self.worlds.claimed, self.claims)
        self.benches = [self.claimed_bench]
        if self.worlds.sound is not self.worlds.claimed:
            self.benches.append(Bench(self.worker, self.worlds.sound, self.claims))
        self.divided = divided_terms(self.claimed_bench)
        self.unmoved = unmoved_lines(self.graph, self.claims, self.worlds)
        self.numbers = numbers_of(graph, claims, self.worlds)
        self.way = OnTheWay(self.worker, self.claims)
        self.mixed = MixedDigits(self.worker, self.claims)
        self.sought = find and Sought(graph, self.claims, self.worlds, self.way, find)
        self.verdicts: dict[str, Verdict] = {}
        self.taints: dict[str, frozenset[str]] = {}
        self.turned: dict[str, list[str]] = {}
        self.as_written: dict[str, bool] = {}
        self.doubted: dict[str, bool] = {}

    def all(self) -> Iterator[Judged]:
        for node in self.graph:
            if node.kind == DECISION and node.id in self.worlds.claimed.turned:
                self.turned.setdefault(node.part, []).append(node.id)
            if not node.has_value:
                continue
            claim = self.claims.get(node.id)
            if claim is None:
                self._pass_on(node)
                yield self._not_claimed(node)
                continue
            judged = self._input(node, claim) if not node.is_computed else self._line(node, claim)
            self._note(node, judged)
            yield judged

    def _not_claimed(self, node: Node) -> Judged:
        interval = self.worlds.claimed.used[node.id].interval
        return Judged(node.id, Verdict.NOT_CLAIMED, None, interval, self.graph.stored[node.id])

    def _input(self, node: Node, claim: Claim) -> Judged:
        right = self.graph.stored[node.id]
        point = Interval(right, right)
        made = Judged(node.id, Verdict.AGREES, claim, point, right)
        if as_recorded(self.graph, claim):
            return made
        other = self._other_way(node, claim)
        if other is not None:
            return replace(made, verdict=Verdict.OTHER_METHOD, note=other.sentence)
        slip = unit_slip(claim, [point])
        said = f"the calc has {self._shown(node, right)}"
        if slip is not None:
            return replace(
                made, verdict=Verdict.UNIT, note=f"{slip.sentence}; {said}", slips=(slip,)
            )
        return replace(made, verdict=Verdict.INPUT, note=said)

    def _line(self, node: Node, claim: Claim) -> Judged:
        worlds, right, stands = self.worlds, self.graph.stored[node.id], claim.stands_for
        follows = worlds.claimed.follows[node.id].interval
        made = Judged(node.id, Verdict.AGREES, claim, follows, right)
        is_right, by_used = stands.holds(right), stands.meets(follows)
        by_sound = stands.meets(worlds.sound.follows[node.id].interval)
        if by_used and (by_sound or is_right):
            return made
        if not by_used and (by_sound or is_right):
            return self._right_alone(node, claim, made)
        if node.id in worlds.claimed.failed:
            why = worlds.claimed.failed[node.id]
            note = f"cannot be worked with the values claimed ({why})"
            return replace(made, verdict=Verdict.UNKNOWN, note=note)
        if by_used or stands.meets(worlds.twin.follows[node.id].interval):
            return self._carried(node, made)
        return self._on_the_way(node, made) or self._not_following(node, claim, made)

    def _not_following(self, node: Node, claim: Claim, made: Judged) -> Judged:
        """Judge a line that does not follow from the values claimed, however these were carried."""
        miswritten = self._miswritten(node, claim)
        if miswritten is not None:
            return self._worked_rightly(node, made, miswritten)
        return self._unexplained(node, claim, made)

    def _on_the_way(self, node: Node, made: Judged) -> Judged | None:
        """Judge a line that follows where the lines above that nobody claimed are rounded too."""
        stands = made.claim.stands_for if made.claim is not None else made.follows
        met = [self.way.met(bench.world, node, stands) for bench in self.benches]
        found = next(filter(None, met), None)
        if found is None:
            return None
        bands = [each and each[0] for each in met]
        return self._following(node, made, bands, f"{FOLLOWS} {found[1]} digits")

    def _rounded_apart(self, node: Node, claim: Claim, made: Judged) -> Judged | None:
        """Judge a line that rounding of its steps, or of lines above, each in its own way, gives.

        It is asked beside a slip.
        """
        worlds, met = [bench.world for bench in self.benches], list[Interval | None]()
        steps = [in_steps(self.worker, world, node, claim, self.claims) for world in worlds]
        note = f"{STEPS} {steps[0][1]} digits" if steps[0] else f"{FOLLOWS} three digits or more"
        if steps[0] is not None:
            met = [each and each[0] for each in steps]
        elif self.way.is_open(node):
            met = [self.mixed.met(world, node, claim.stands_for) for world in worlds]
        if not any(met):
            return None
        read = self._following(node, made, met, note)
        return read if read.verdict in WRONG else self._beside_a_slip(node, claim, read)

    def _following(
        self, node: Node, made: Judged, met: Sequence[Interval | None], note: str
    ) -> Judged:
        """Judge a line that follows by a way of rounding, from values as claimed or put right."""
        follows = next(filter(None, met))
        if met[0] is None:
            return replace(made, note=f"{note}, from the right values and not from those claimed")
        if met[-1] is None:
            return self._carried(node, replace(made, follows=follows))
        return replace(made, follows=follows, note=note)

    def _right_alone(self, node: Node, claim: Claim, made: Judged) -> Judged:
        """Judge a line that is right, or follows from right values, but not from those claimed."""
        if node.id in self.unmoved:
            moved = self._moved_by_hand(node, claim, made)
            return moved or self._not_changed_with(node, claim, made)
        note = "right, though it does not follow from the values claimed"
        if not claim.stands_for.holds(made.right):
            note = "follows from the right values, not from all those claimed"
        return replace(made, note=note)

    def _moved_by_hand(self, node: Node, claim: Claim, made: Judged) -> Judged | None:
        """Judge a line that has the right value, and by rounding above that of the inputs claimed.

        The one does not show that it was left as it was.
        """
        world, stands = self.claimed_bench.world, claim.stands_for
        met = self.way.met(world, node, stands)
        band = met[0] if met else self.way.is_open(node) and self.mixed.met(world, node, stands)
        return self._carried(node, replace(made, follows=band)) if band else None

    def _not_changed_with(self, node: Node, claim: Claim, made: Judged) -> Judged:
        """Judge a line that kept the value of the recorded input while its input was changed."""
        inputs = self._named(self.unmoved[node.id])
        note = f"is the value for other inputs than claimed: not changed with {inputs}"
        return replace(made, verdict=Verdict.ORIGIN, note=note, slips=self._slips(node, claim))

    def _carried(self, node: Node, made: Judged) -> Judged:
        causes = self._causes(node)
        wrong = self._wrong_of(causes)
        if wrong:
            note = f"follows from {self._named(wrong)}"
            return replace(made, verdict=Verdict.CARRIED, note=note, causes=wrong)
        note = f"follows from {self._named(causes)} as claimed" if causes else ""
        return replace(made, note=note, causes=causes)

    def _miswritten(self, node: Node, claim: Claim) -> str | None:
        """Return the wrong line above that was written wrongly, if this one was worked rightly."""
        wrong = [
            i
            for i in claimed_above(self.graph, node.id, self.claims)
            if self.verdicts.get(i) in MISWRITTEN and self.graph[i].is_computed
        ]
        for i in wrong:
            if i not in self.as_written:
                self.as_written[i] = used_as_written(self.claimed_bench, i)
        unused = [i for i in wrong if not self.as_written[i]]
        return worked_rightly(self.claimed_bench, node, claim, unused)

    def _worked_rightly(self, node: Node, made: Judged, miswritten: str) -> Judged:
        """Judge a line that follows from what a line above should be, not from it as claimed."""
        found = set(self._causes(node)) - {miswritten} | set(self._causes(self.graph[miswritten]))
        causes = tuple(i for i in self.claims if i in found)
        wrong = self._wrong_of(causes)
        note = f"follows from what {self._named([miswritten])} should be, not from it as claimed"
        if not wrong:
            return replace(made, note=note, causes=causes)
        note = f"{note}; carries {self._named(wrong)}"
        return replace(made, verdict=Verdict.CARRIED, note=note, causes=wrong)

    def _wrong_of(self, causes: Sequence[str]) -> tuple[str, ...]:
        """Return the causes that are wrong; a twin's claim may be judged only later."""
        return tuple(i for i in causes if self.verdicts.get(i, Verdict.INPUT) in WRONG)

    def _unexplained(self, node: Node, claim: Claim, made: Judged) -> Judged:
        read = self._divided(node, made) or by_sizes(self.benches, node, claim, made)
        if read is not None:
            return read
        around = self.worlds.around(node)
        slip = unit_slip(claim, around)
        if slip is not None:
            return replace(made, verdict=Verdict.UNIT, note=slip.sentence, slips=(slip,))
        way = self._other_way(node, claim)
        if way is not None:
            read = replace(made, verdict=Verdict.OTHER_METHOD, note=way.sentence)
            return self._beside_a_slip(node, claim, read, way)
        rounded = self._as_rounded(node, claim, around, made)
        if rounded is None or rounded.verdict is Verdict.UNSAFE_ROUNDING:
            rounded = self._rounded_apart(node, claim, made) or rounded
        if rounded is not None:
            return rounded
        turned = self.turned.get(node.part)
        if turned:
            note = f"{self._turns(turned[-1])}, so that other expressions apply to this line"
            return replace(made, verdict=Verdict.UNKNOWN, note=note, causes=self._causes(node))
        return replace(made, verdict=Verdict.ORIGIN, slips=self._slips(node, claim))

    def _divided(self, node: Node, made: Judged) -> Judged | None:
        if node.id not in self.divided:
            return None
        *others, total = self.divided[node.id]
        note = f"with {self._named(others)} it makes the right {self._named([total])}"
        note = f"{note}: another division of the same sum"
        return replace(made, verdict=Verdict.OTHER_METHOD, note=note)

    def _as_rounded(
        self, node: Node, claim: Claim, around: Sequence[Interval], judged: Judged
    ) -> Judged | None:
        """Judge a claim that is a coarse rounding: as its author rounds, or for once."""
        read = list(coarse_roundings(claim, node.symbol, around))
        others = [
            others_made(self.numbers, claim, node, each, self._in_doubt) if each.usual else 0
            for each in read
        ]
        for rounded, made in zip(read, others, strict=True):
            if made >= HABIT:
                safe = errs_safely(self.graph, node.id, claim.value, rounded.of)
                said = self._rounded(node, claim, judged, rounded, safe=safe)
                return replace(said, note=f"{said.note}; {_HABIT}", slips=())
        for rounded, made in zip(read, others, strict=True):
            if made or rounded.alone:
                safe = errs_safely(self.graph, node.id, claim.value, rounded.of)
                if rounded.usual or safe:
                    said = self._rounded(node, claim, judged, rounded, safe=safe)
                    elsewhere = not judged.follows.holds(rounded.of)
                    coarse = rounded.is_coarse
                    return self._beside_a_slip(node, claim, said, loosely=elsewhere, coarse=coarse)
        return None

    def _beside_a_slip(
        self,
        node: Node,
        claim: Claim,
        read: Judged,
        way: Other | None = None,
        *,
        loosely: bool = False,
        coarse: bool = False,
    ) -> Judged:
        """Judge a line with a reading that is no error: doubtful where a slip is likely as well."""
        slips = self._slips(node, claim)
        read = replace(read, slips=slips if read.verdict in WRONG else ())
        return beside(self.claimed_bench, read, slips, way, loosely=loosely, coarse=coarse)

    def _in_doubt(self, entry_id: str) -> bool:
        """Tell whether a likely slip gives a claim as well as its rounding does."""
        if entry_id not in self.doubted:
            claim = self.claims[entry_id]
            slips = self._slips(self.graph[entry_id], claim)
            self.doubted[entry_id] = plausible(self.claimed_bench, slips, claim) is not None
        return self.doubted[entry_id]

    def _other_way(self, node: Node, claim: Claim) -> Other | None:
        """Return the other valid way that gives a claim, if one does."""
        ways = chain.from_iterable(other_ways(bench, node) for bench in self.benches)
        met = (way for way in ways if claim.stands_for.overlaps(way.interval))
        return next(met, None)

    def _turns(self, decision: str) -> str:
        node = self.graph[decision]
        formula = node.entry["formula"]
        state = "no longer holds" if node.entry["holds"] else "holds"
        return f"with the values claimed {formula} ({node.label}) {state}"

    def _rounded(
        self, node: Node, claim: Claim, made: Judged, rounded: Rounded, *, safe: bool | None
    ) -> Judged:
        way = "up" if rounded.up else "down"
        shown = self._shown(node, rounded.of, _DIGITS + 1)
        note = f"{shown} rounded {way} to a step of {told(rounded.step, claim.unit)}"
        verdict = Verdict.UNSAFE_ROUNDING if safe is False else Verdict.SAFE_ROUNDING
        return replace(made, verdict=verdict, note=f"{note}: {SIDES[safe]}")

    def _slips(self, node: Node, claim: Claim) -> tuple[Slip, ...]:
        return self.sought.slips(node, claim) if self.sought is not None else ()

    def _causes(self, node: Node) -> tuple[str, ...]:
        found: set[str] = set()
        for target in node.args.values():
            found |= self.taints.get(target, frozenset())
        return tuple(i for i in self.claims if i in found)

    def _note(self, node: Node, judged: Judged) -> None:
        self.verdicts[node.id] = judged.verdict
        if judged.verdict is Verdict.AGREES or judged.verdict is Verdict.CARRIED:
            if judged.causes:
                self.taints[node.id] = frozenset(judged.causes)
        else:
            self.taints[node.id] = frozenset((node.id,))

    def _pass_on(self, node: Node) -> None:
        """Let a line that nobody claimed carry on what moves it."""
        found = frozenset().union(*(self.taints.get(t, ()) for t in node.args.values()))
        if node.id in self.twins:
            found |= {self.twins[node.id]}
        if found and self._is_moved(node.id):
            self.taints[node.id] = found

    def _is_moved(self, entry_id: str) -> bool:
        sound = self.worlds.sound.used[entry_id].middle
        others = (self.worlds.claimed.used[entry_id], self.worlds.twin.used[entry_id])
        return any(abs(form.middle - sound) > _MOVED * abs(sound) for form in others)

    def _named(self, ids: Sequence[str]) -> str:
        return ", ".join(f"{self.graph[i].symbol} ({self.graph[i].label})" for i in ids)

    def _shown(self, node: Node, value: float, digits: int = _DIGITS) -> str:
        return told(node.number_text(value, digits), node.unit)
