"""Honest sheets worked by other algebra than the calc's, each step of a line written down.

By hand M_r is a force times an arm, A_s comes from rho and K_r or by trial, a shear from similar
triangles, a moment from the mean shear. The routes are written here from the mechanics, and share
nothing with what the audit tries. ``python -m tests.audit.planting_other_algebra`` prints what is
said of such sheets.
"""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Callable, Iterable, Iterator
from random import Random

from lineproof.audit.claims.blank import quick_lines
from lineproof.audit.claims.judge import judge
from lineproof.audit.data import Judged
from lineproof.audit.graph import Graph, Node
from lineproof.audit.slips.search import find_slips
from lineproof.quantity.digits import significant

from .planting_beams import BEAMS, beam
from .planting_by_hand import Values, claim, sheet

Pad = Callable[[float], float]
"""Writes a step down: the number with so many digits."""
Route = Callable[[Pad, Values], float]


def _block(r: Pad, v: Values) -> float:
    return r(v["alpha_1"] * v["phi_c"] * v["f_c"] * v["b"])


def _tension(r: Pad, v: Values) -> float:
    return r(v["phi_s"] * v["A_s"] * v["f_y"])


def _by_ratio(r: Pad, v: Values) -> float:
    """A_s from K_r and rho, by the closed root."""
    k, f = r(v["M_f"] / (v["b"] * v["d"] ** 2)), r(v["alpha_1"] * v["phi_c"] * v["f_c"])
    rho = r(f / (v["phi_s"] * v["f_y"]) * (1 - math.sqrt(1 - 2 * k / f)))
    return rho * v["b"] * v["d"]


def _by_trial(r: Pad, v: Values) -> float:
    """A_s from an arm of 0.9 d, refined until it changes by 0.02 % no more."""
    area = r(v["M_f"] / (v["phi_s"] * v["f_y"] * r(0.9 * v["d"])))
    for _ in range(12):
        arm = r(v["d"] - r(_tension(r, {**v, "A_s": area}) / _block(r, v)) / 2)
        before, area = area, r(v["M_f"] / (v["phi_s"] * v["f_y"] * arm))
        if abs(area - before) <= 0.0002 * area:
            break
    return area


def _moment(r: Pad, v: Values) -> float:
    terms = r(v["V_sn"] * v["x_f"]) - r(v["w_f"] * v["x_f"] ** 2 / 2)
    return v.get("M_sn", 0.0) + terms


def _mean_shear(r: Pad, v: Values) -> float:
    at_section = r(v["V_sn"] - v["w_f"] * v["x_f"])
    return v.get("M_sn", 0.0) + (v["V_sn"] + at_section) / 2 * v["x_f"]


def _cracked(r: Pad, v: Values, cracking: str) -> float:
    part = r(r(v[cracking] / v["M_a"]) ** 3)
    return min(part * v["I_g"] + (1 - part) * v["I_cr"], v["I_g"])


def _cot(v: Values) -> float:
    return 1 / math.tan(math.radians(v["theta"]))


ROUTES: dict[str, tuple[Route, ...]] = {
    "a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)": (lambda r, v: _tension(r, v) / _block(r, v),),
    "M_r = phi_s*A_s*f_y*(d - a/2)": (lambda r, v: _tension(r, v) * r(v["d"] - v["a"] / 2),),
    "A_sr = alpha_1*phi_c*f_c*b*a_r/(phi_s*f_y)": (_by_ratio, _by_trial),
    "M_f = w_f*l**2/8": (lambda r, v: r(v["w_f"] * v["l"] / 2) * v["l"] / 4,),
    "M_f = V_sn*x_f - w_f*x_f**2/2": (_moment, _mean_shear),
    "M_f = M_sn + V_sn*x_f - w_f*x_f**2/2": (_moment, _mean_shear),
    "M_f = -(M_sn + V_sn*x_f - w_f*x_f**2/2)": (
        lambda r, v: -_moment(r, v),
        lambda r, v: -_mean_shear(r, v),
    ),
    "V_f = V_sn - w_f*x_f": (
        lambda r, v: v["V_sn"] - r(v["w_f"] * v["x_f"]),
        lambda r, v: v["V_sn"] * (1 - r(v["x_f"] / r(v["V_sn"] / v["w_f"]))),
    ),
    "V_sn = w_f*l/2 - M_sn/l": (
        lambda r, v: r(v["w_f"] * v["l"] / 2) - r(v["M_sn"] / v["l"]),
    ),
    "V_c = phi_c*lambda_*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v": (
        lambda r, v: r(v["phi_c"] * v["lambda_"] * v["beta"] * r(min(math.sqrt(v["f_c"]), 8)))
        * v["b_w"] * v["d_v"],
    ),
    "V_s = phi_s*A_v*f_y*d_v*cot(theta)/s": (
        lambda r, v: r(v["phi_s"] * v["A_v"] * v["f_y"]) * v["d_v"] * r(_cot(v)) / v["s"],
        lambda r, v: r(v["phi_s"] * v["A_v"] * v["f_y"] * v["d_v"]) / (v["s"] * r(1 / _cot(v))),
    ),
    "z = f_s*(d_c*A_e)**(1/3)": (lambda r, v: v["f_s"] * r(r(v["d_c"] * v["A_e"]) ** (1 / 3)),),
    "M_cr = f_r*I_g/y_b": (lambda r, v: v["f_r"] * r(v["I_g"] / v["y_b"]),),
    "A_smin = 0.2*sqrt(f_c)*b_t*h/f_y": (
        lambda r, v: r(0.2 * r(math.sqrt(v["f_c"])) / v["f_y"]) * v["b_t"] * v["h"],
    ),
    "I_e = min(I_cr + (I_g - I_cr)*(M_crd/M_a)**3, I_g)": (
        lambda r, v: _cracked(r, v, "M_crd"),
    ),
    "I_e = min(I_cr + (I_g - I_cr)*(M_crdn/M_a)**3, I_g)": (
        lambda r, v: _cracked(r, v, "M_crdn"),
    ),
    "I_cr = b*kd**3/3 + n_E*A_s*(d - kd)**2": (
        lambda r, v: r(v["b"] * v["kd"] ** 3 / 3)
        + r(r(v["n_E"] * v["A_s"]) * r(v["d"] - v["kd"]) ** 2),
    ),
    "delta_i = 5*l**2/(48*E_c*I_ea)*(M_m - 0.1*M_h)": (
        lambda r, v: r(5 * v["M_m"] * v["l"] ** 2 / (48 * v["E_c"] * v["I_ea"]))
        - r(v["M_h"] * v["l"] ** 2 / (96 * v["E_c"] * v["I_ea"])),
    ),
    "F_lt = M_f/d_v + (V_f - 0.5*min(V_s, V_f))*cot(theta)": (
        lambda r, v: r(v["M_f"] / v["d_v"])
        + r(r(v["V_f"] - 0.5 * min(v["V_s"], v["V_f"])) * r(_cot(v))),
    ),
}  # fmt: skip
"""Other ways to a line, by its formula."""


def worked(graph: Graph, steps: int, digits: int, seed: int) -> dict[str, str]:
    """Return a sheet as texts by id: steps with so many digits, lines as well, each carried on."""
    draw = Random(seed)  # noqa: S311 - the same routes every time
    return sheet(graph, lambda node, values: (_worked(graph, node, values, steps, draw), digits))


def _worked(graph: Graph, node: Node, values: Values, steps: int, draw: Random) -> float:
    named = graph.named(node, values)
    routes = ROUTES.get(str(node.entry.get("formula", "")), ())
    if "a_r" in named:  # the steel is found without the block, which the calc has first
        named |= graph.named(graph[node.args["a_r"]], values)
        routes = routes if "M_f" in named else ()
    if not routes:
        return node.compute(named)

    def written(value: float) -> float:
        size = float(significant(abs(value), steps)) if value else 0.0
        return math.copysign(size, value)

    return draw.choice(routes)(written, named)


def said_of(
    numbers: Iterable[int], steps: int, digits: int, *, full: bool
) -> Iterator[tuple[int, Judged]]:
    """Give what is said of each number of the honest sheets of beams, with that of its beam."""
    for number in numbers:
        graph = beam(number)
        texts = worked(graph, steps, digits, number)
        ids = list(texts) if full else quick_lines(graph)
        for each in judge(graph, [claim(graph, i, texts[i]) for i in ids], find_slips):
            if each.claim is not None:
                yield number, each


if __name__ == "__main__":
    for shown in ((5, 3), (4, 3), (4, 4), (3, 3)):
        for whole in (False, True):
            counted = Counter(
                str(j.verdict) for _, j in said_of(range(0, BEAMS, 12), *shown, full=whole)
            )
            table = "full" if whole else "quick"
            print(f"steps and lines of {shown} digits, {table}: {dict(counted)}")  # noqa: T201
