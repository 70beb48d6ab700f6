"""Other ways to a value that the standard allows, and handbook tables read by hand.

A claim that one of these gives is no error. Each way says in a sentence what was done, and gives
the interval that follows by it from the values that the claim itself uses.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping

from lineproof.audit.claims.bench import Bench, Other
from lineproof.audit.claims.coefficient_moments import by_coefficients
from lineproof.audit.claims.handbook import by_table
from lineproof.audit.claims.live_loads import by_reduction
from lineproof.audit.claims.propagate import Form, combined
from lineproof.audit.graph import Node
from lineproof.formula import names_of, parse_line
from lineproof.formula.compiled import NOT_COMPUTED, compile_tree
from lineproof.record.entry import LINE, LOOKUP
from lineproof.standards.a23_3 import crack_control

_PAIRS = {
    "beta": "beta_g", "theta": "theta_g", "V_c": "V_cg", "V_s": "V_sg", "V_r": "V_rg",
}  # fmt: skip
"""Shear lines and, in the same part, those by the method that was not chosen."""
_DEVELOPMENT = {"l_d0": ("l_d0g", "l_d0t")}
_SIMPLIFIED = {"beta": 0.18, "theta": 35.0}
"""A23.3, 11.3.6.3: with the minimum of stirrups or more."""
_SIMPLIFIED_YIELD, _SIMPLIFIED_CONCRETE = 400.0, 60.0
_MODULI = ("E_c = 4500*sqrt(f_c)", "E_c = (3300*sqrt(f_c) + 6900)*(gamma_c/2300)**1.5")
"""A23.3, 8.6.2.3 and 8.6.2.2."""
_MODULUS_LEAST, _MODULUS_CONCRETE = 20.0, 40.0
"""Concrete of normal density of 20 to 40 MPa has the short expression (8.6.2.3)."""


def other_ways(bench: Bench, node: Node) -> Iterator[Other]:
    """Give what every other way to a line's value gives; ways that do not apply give nothing."""
    for way in _WAYS if node.is_computed else (_shear,):
        try:
            yield from way(bench, node)
        except NOT_COMPUTED:
            continue


def _shear(bench: Bench, node: Node) -> Iterator[Other]:
    pairs = _recorded_pairs(bench, node)
    swapped = {mine: bench.world.used[other] for mine, other in pairs.items()}
    swapped = swapped or _simplified(bench, node)
    if not swapped or _is_mixed(bench, node, swapped):
        return
    part = bench.graph[next(iter(swapped))].part
    factor = bench.graph.nodes.get(f"{part}/beta")
    general = factor is not None and factor.kind == LOOKUP
    name = "general method of 11.3.6.4" if general else "simplified method of 11.3.6.3"
    sentence = f"follows by the {name}, which the standard allows as well"
    yield from bench.by(node, swapped, sentence, pairs.values())


def _is_mixed(bench: Bench, node: Node, swapped: Mapping[str, Form]) -> bool:
    """Tell whether a line beside one is claimed by the recorded method: both factors go together.

    What rests on the line shows nothing of it; what lies above it is looked at by the bench.
    """
    beside = set(swapped) - {node.id} - set(bench.graph.below([node.id]))
    for claim in (bench.claims[i] for i in beside if i in bench.claims):
        mine = bench.world.follows.get(claim.id, Form(bench.graph.stored[claim.id]))
        by_recorded = claim.stands_for.meets(mine.interval)
        if by_recorded and not claim.stands_for.overlaps(swapped[claim.id].interval):
            return True
    return False


def _parts_above(bench: Bench, node: Node, *symbols: str) -> Iterator[str]:
    """Give the parts in which a line or what it rests on holds a symbol, the nearest first."""
    for entry_id in (node.id, *reversed(bench.graph.above([node.id]))):
        other = bench.graph[entry_id]
        if other.symbol in symbols and other.has_value:
            yield other.part


def _recorded_pairs(bench: Bench, node: Node) -> dict[str, str]:
    """Return lines of the method chosen and, by them, those of the other one."""
    for part in _parts_above(bench, node, "beta", "theta"):
        if f"{part}/beta_g" in bench.graph.nodes:
            return {
                f"{part}/{mine}": f"{part}/{other}"
                for mine, other in _PAIRS.items()
                if f"{part}/{other}" in bench.graph.nodes and f"{part}/{mine}" in bench.graph.nodes
            }
    return {}


def _simplified(bench: Bench, node: Node) -> dict[str, Form]:
    """Return beta and theta of the simplified method where the record has the general one alone."""
    for part in _parts_above(bench, node, "beta", "theta"):
        beta = bench.graph.nodes.get(f"{part}/beta")
        limits = (("f_y", _SIMPLIFIED_YIELD), ("f_c", _SIMPLIFIED_CONCRETE))
        within = all(
            form.middle <= most
            for symbol, most in limits
            for form in bench.meant(bench.graph[node.id], part, symbol)
        )
        with_stirrups = beta is not None and beta.kind == LINE and "s_ze" not in beta.args
        if within and with_stirrups:
            return {
                f"{part}/{symbol}": Form(value)
                for symbol, value in _SIMPLIFIED.items()
                if f"{part}/{symbol}" in bench.graph.nodes
            }
    return {}


def _development(bench: Bench, node: Node) -> Iterator[Other]:
    for mine, others in _DEVELOPMENT.items():
        for part in _parts_above(bench, node, mine):
            for other in others:
                if f"{part}/{other}" in bench.graph.nodes:
                    swapped = {f"{part}/{mine}": bench.world.used[f"{part}/{other}"]}
                    name = "general expression of 12.2.2" if other == "l_d0g" else "table of 12.2.3"
                    sentence = f"follows by the {name}, which the standard allows as well"
                    yield from bench.by(node, swapped, sentence, (f"{part}/{other}",))


def _modulus(bench: Bench, node: Node) -> Iterator[Other]:
    for part in _parts_above(bench, node, "E_c"):
        made = bench.graph[f"{part}/E_c"]
        strength = bench.above(made, ("f_c",))
        if made.kind != LINE or strength is None:
            continue
        density = bench.world.used.get(made.args.get("gamma_c", "given/gamma_c"))
        recorded = str(made.entry["formula"]).replace(" ", "")
        if recorded == _MODULI[0].replace(" ", ""):
            if density is None:
                continue
            forms, text, clause = [strength, density], _MODULI[1], "8.6.2.2"
        elif recorded == _MODULI[1].replace(" ", "") and _is_normal(bench, part, strength):
            forms, text, clause = [strength], _MODULI[0], "8.6.2.3"
        else:
            continue
        sentence = (
            f"follows with the modulus of elasticity by {clause}, which the standard allows as well"
        )
        yield from bench.by(node, {made.id: combined(_function(text), forms)}, sentence)


def _is_normal(bench: Bench, part: str, strength: Form) -> bool:
    """Tell whether the short expression of the modulus holds, which is of normal density only."""
    factor = bench.world.used.get(f"{part}/lambda_", Form(1.0))
    return factor.middle == 1 and _MODULUS_LEAST <= strength.middle <= _MODULUS_CONCRETE


def _function(text: str) -> Callable[..., float]:
    tree = parse_line(text)[1]
    return compile_tree(tree, names_of(tree))


def _midspan_inertia(bench: Bench, node: Node) -> Iterator[Other]:
    for part in _parts_above(bench, node, "I_ea"):
        middle = bench.world.used.get(f"{part}/I_em")
        if middle is not None:
            sentence = (
                "follows with the moment of inertia at midspan alone, which 9.8.2.4 allows for "
                "prismatic members"
            )
            swapped = {f"{part}/I_ea": middle}
            yield from bench.by(node, swapped, sentence, (f"{part}/I_em",))


def _stress_allowance(bench: Bench, node: Node) -> Iterator[Other]:
    """Take 0.6 f_y for z where the stress under specified loads is recorded."""
    for part in _parts_above(bench, node, "f_s"):
        asked = bench.graph.nodes.get(f"{part}/{crack_control.ALLOWANCE_DOES.key}")
        if asked is not None:  # the allowance is not enough, but may be taken
            f_y = bench.world.used[asked.args["f_y"]]
            sentence = "follows with 0.6 f_y for the stress of the bars, which 10.6.1 allows"
            swapped = {f"{part}/f_s": combined(crack_control.STRESS_ALLOWANCE.function, [f_y])}
            yield from bench.by(node, swapped, sentence)


def _coefficients(bench: Bench, node: Node) -> Iterator[Other]:
    for sentence, interval in by_coefficients(bench.graph, bench.world.used, node):
        yield Other(sentence, interval, (node.id,))


def _reduced_load(bench: Bench, node: Node) -> Iterator[Other]:
    if node.symbol == "w_L":
        for sentence, interval in by_reduction(bench.graph, bench.world.used, node):
            yield Other(sentence, interval, (node.id,))


_WAYS: tuple[Callable[[Bench, Node], Iterator[Other]], ...] = (
    _shear, _development, _modulus, _midspan_inertia, _stress_allowance, by_table, _coefficients,
    _reduced_load,
)  # fmt: skip
