"""The procedure behind the support moments: direct stiffness, from named numbers to one moment.

What it takes goes by name: spans ``l_1``, ``l_2``, ...; inertias ``I_1``, ... (left out: the same
in all spans); rotational stiffness of columns over E ``K_2``, ...; uniform loads ``w_D1``, ...;
single loads ``w_x3`` from ``s_x3`` to ``e_x3`` and ``P_x3`` at ``a_x3``, their span being the
setting ``x3``. The setting ``support_2`` says how support 2 holds: 0 simple, 1 fixed, 2 elastic,
3 free.
"""

from __future__ import annotations

import re
from collections.abc import Mapping
from functools import lru_cache

from lineproof.beams.analysis.model import (
    Beam,
    Load,
    PartialLoad,
    PointLoad,
    Span,
    Support,
    SupportKind,
    UniformLoad,
)
from lineproof.beams.analysis.solve import Solution, solve
from lineproof.record.procedures import procedure

SUPPORT_CODES: Mapping[SupportKind, float] = {
    "simple": 0.0, "fixed": 1.0, "elastic": 2.0, "free": 3.0,
}  # fmt: skip
_KIND_OF = {code: kind for kind, code in SUPPORT_CODES.items()}
_UNIFORM = re.compile(r"w_(?:D|L|Lst|S)(\d+)")
_SINGLE = re.compile(r"[wP]_x(\d+)")
LEFT, RIGHT = 0.0, 1.0

Numbers = tuple[tuple[str, float], ...]


@procedure("support moment", 1, "direct stiffness of the whole beam", None)
def support_moment(
    values: Mapping[str, float], *, span: float, end: float, **settings: float
) -> float:
    """Return M at an end of a span [N.mm], sagging positive; ``end`` 0 is left, 1 right."""
    solution = _solved(tuple(sorted(values.items())), tuple(sorted(settings.items())))
    curves = solution.span(round(span))
    moments = curves.M0 if end == LEFT else curves.end_moment
    return float(moments.sum())


@lru_cache(maxsize=256)
def _solved(values: Numbers, settings: Numbers) -> Solution:
    named, how = dict(values), dict(settings)
    count = sum(1 for name in named if re.fullmatch(r"l_\d+", name))
    spans = tuple(Span(named[f"l_{k}"], named.get(f"I_{k}", 1e9)) for k in range(1, count + 1))
    supports = tuple(_support(named, how, j) for j in range(1, count + 2))
    loads = [load for name in named for load in _loads(name, named, how)]
    return solve(Beam(spans, supports), loads)


def _support(named: Mapping[str, float], how: Mapping[str, float], number: int) -> Support:
    kind = _KIND_OF[how.get(f"support_{number}", 0.0)]
    stiffness = named[f"K_{number}"] if kind == "elastic" else 0.0
    return Support(kind, 0.0, stiffness)


def _loads(name: str, named: Mapping[str, float], how: Mapping[str, float]) -> list[Load]:
    uniform = _UNIFORM.fullmatch(name)
    if uniform:
        return [UniformLoad("D", int(uniform[1]), named[name])]
    single = _SINGLE.fullmatch(name)
    if single is None:
        return []
    number, span = single[1], round(how[f"x{single[1]}"])
    if name.startswith("P"):
        return [PointLoad("D", span, named[name], named[f"a_x{number}"])]
    return [PartialLoad("D", span, named[name], named[f"s_x{number}"], named[f"e_x{number}"])]
