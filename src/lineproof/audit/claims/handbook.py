"""Tables of a handbook read by hand: K_r for a resistance, a ratio of reinforcement for an area."""

from __future__ import annotations

from collections.abc import Iterator

from lineproof.audit.claims.bench import Bench, Other
from lineproof.audit.claims.propagate import Form, combined
from lineproof.audit.data import Interval
from lineproof.audit.graph import Node
from lineproof.quantity.digits import significant

_WIDTHS = ("b", "b_f", "b_w")
_TABLE_DECIMALS = 1
_LEAST_READ = 1.0
"""A table of K_r [MPa] is read by hand to a tenth, which is two digits from 1 up."""
_RATIO_DECIMALS = 4
"""Decimals to which tables give a ratio of reinforcement."""
_ROUNDING = 1e-9


def by_table(bench: Bench, node: Node) -> Iterator[Other]:
    """Give what a line is by every reading of a table that serves for it."""
    yield from _resistance(bench, node)
    yield from _ratio(bench, node)


def works_others(bench: Bench, node: Node) -> bool:
    """Tell whether the author of the claims worked this quantity where a table serves as well.

    Another claim of it follows from the formula, and is no reading.
    """
    for claim in bench.claims.values():
        other = bench.graph[claim.id]
        if other.symbol != node.symbol or other.id == node.id or not other.is_computed:
            continue
        read = [way.interval for way in by_table(bench, other)]
        follows = bench.world.follows[other.id].interval
        if read and claim.stands_for.meets(follows) and not any(map(claim.stands_for.meets, read)):
            return True
    return False


def _resistance(bench: Bench, node: Node) -> Iterator[Other]:
    """M_r = K_r b d^2 with K_r read from a table to two digits."""
    if node.symbol != "M_r" or node.unit not in ("kN.m", "N.mm", "kip.ft", "kip.in"):
        return
    if _was_worked(bench, node):
        return
    width, depth = bench.above(node, _WIDTHS), bench.above(node, ("d",))
    if width is None or depth is None:
        return
    scale = combined(lambda b, d: b * d**2, [width, depth])
    factor = combined(lambda m, s: m / s, [bench.world.follows[node.id], Form(scale.middle)])
    for read in _readings(factor.interval, _TABLE_DECIMALS):
        if read >= _LEAST_READ:
            yield Other(
                f"follows with K_r read from a table as {read:g} (two digits) in M_r = K_r b d2",
                scale.interval.times(read),
                is_read=True,
            )


def _ratio(bench: Bench, node: Node) -> Iterator[Other]:
    """A_s = rho b d with rho read from a table to four decimals."""
    if not node.symbol.startswith("A_s") or node.unit not in ("mm2", "in2"):
        return
    if _was_worked(bench, node):
        return
    width, depth = bench.above(node, _WIDTHS), bench.above(node, ("d",))
    if width is None or depth is None:
        return
    area = combined(lambda b, d: b * d, [width, depth])
    ratio = combined(lambda a, s: a / s, [bench.world.follows[node.id], Form(area.middle)])
    for read in _readings(ratio.interval, _RATIO_DECIMALS):
        if read >= 10 ** (1 - _RATIO_DECIMALS):  # two digits at least
            yield Other(
                f"follows with the ratio read from a table as {read:g} in A_s = rho b d",
                area.interval.times(read),
                is_read=True,
            )


def _was_worked(bench: Bench, node: Node) -> bool:
    """Tell whether a line's formula was worked, for which a table gives the result at once.

    Who wrote down the depth of the stress block did not read K_r, which is there to do without.
    A factor of the materials, which has no unit, is written down with a table as well.
    """
    graph = bench.graph
    args = [target for name, target in node.args.items() if name not in (*_WIDTHS, "d")]
    return any(
        target in bench.claims
        and graph[target].is_computed
        and graph[target].unit
        and not graph[target].symbol.startswith("A_s")
        for target in args
    )


def _readings(interval: Interval, decimals: int) -> tuple[float, ...]:
    """Return a table's readings, to so many decimals, of a number somewhere in an interval."""
    ends = (interval.low * (1 - _ROUNDING), interval.middle, interval.high * (1 + _ROUNDING))
    return tuple(dict.fromkeys(float(significant(end, -decimals)) for end in ends))
