"""Nodes to TeX, in the subset that MathJax of a notebook reads."""

from __future__ import annotations

from lineproof.typeset.glyphs import printable
from lineproof.typeset.nodes import (
    Digits,
    Fence,
    Fraction,
    Letter,
    Math,
    Prime,
    Root,
    Row,
    Scripts,
    Sign,
    Thin,
    Unit,
    Word,
)
from lineproof.typeset.values import grouped, unit_text

_GREEK = {
    "α": "alpha", "β": "beta", "γ": "gamma", "δ": "delta", "ε": "varepsilon", "ζ": "zeta",
    "η": "eta", "θ": "theta", "κ": "kappa", "λ": "lambda", "μ": "mu", "ν": "nu", "ξ": "xi",
    "π": "pi", "ρ": "rho", "σ": "sigma", "τ": "tau", "φ": "varphi", "χ": "chi", "ψ": "psi",
    "ω": "omega", "Γ": "Gamma", "Δ": "Delta", "Θ": "Theta", "Λ": "Lambda", "Σ": "Sigma",
    "Φ": "Phi", "Ψ": "Psi", "Ω": "Omega",
}  # fmt: skip
_SIGNS = {
    "−": "-", "×": r"\times", "≤": r"\le", "≥": r"\ge", "<": r"\lt", ">": r"\gt",
}  # fmt: skip
_SPECIAL = {
    "\\": r"\backslash ", "{": r"\{", "}": r"\}", "$": r"\$", "&": r"\&", "#": r"\#", "%": r"\%",
    "_": r"\_", "^": r"\wedge ", "~": r"\sim ", " ": r"\ ", "<": r"\lt ", ">": r"\gt ",
    "·": r"{\cdot}", "²": "^{2}", "³": "^{3}", "⁴": "^{4}", "√": r"\surd ",
}  # fmt: skip
_RELATION_SPACE = {"relation", "binary"}


def tex(math: Math) -> str:
    """Return the TeX source, without dollar signs."""
    return _write(math)


def _upright(text: str) -> str:
    shown = "".join(
        f"\\{_GREEK[c]} " if c in _GREEK else _SPECIAL.get(c, c) for c in printable(text)
    )
    return rf"\mathrm{{{shown}}}"


def _write(math: Math) -> str:
    match math:
        case Row(items):
            return "".join(map(_write, items))
        case Fraction(top, bottom):
            return rf"\frac{{{_write(top)}}}{{{_write(bottom)}}}"
        case Root(of, index):
            return rf"\sqrt{f'[{index}]' if index else ''}{{{_write(of)}}}"
        case Scripts(base, sub, sup):
            return _scripts(base, sub, sup)
        case Fence(of, left, right):
            return rf"\left{left}{_write(of)}\right{right}"
    return _write_token(math)


def _write_token(math: Math) -> str:  # noqa: PLR0911 - one return per kind of node
    match math:
        case Letter(text):
            return f"{{\\{_GREEK[text]}}}" if text in _GREEK else text
        case Word(text):
            return _upright(text)
        case Digits(text):
            return grouped(text, r"\,")
        case Sign(text, role):
            shown = _SIGNS.get(text, text)
            if text == "|":
                return r"\lvert " if role == "open" else r"\rvert "
            return f" {shown} " if role in _RELATION_SPACE else shown + " " * (text == ",")
        case Thin():
            return r"\,"
        case Unit("deg"):
            return r"^{\circ}"
        case Unit(text):
            return r"\," + _upright(unit_text(text))
        case Prime():
            return r"\prime"
    msg = f"{math!r} is no node"
    raise TypeError(msg)


def _scripts(base: Math, sub: Math | None, sup: Math | None) -> str:
    below = f"_{{{_write(sub)}}}" if sub is not None else ""
    above = f"^{{{_write(sup)}}}" if sup is not None else ""
    return _write(base) + below + above
