"""Numbers, units and symbols as they are printed."""

from __future__ import annotations

import pytest

from lineproof.formula import Symbol
from lineproof.quantity.units import UNITS
from lineproof.typeset import (
    mathml,
    number_math,
    number_text,
    plain,
    printable,
    symbol_math,
    tex,
    unit_text,
    value_math,
    value_text,
)
from lineproof.typeset.glyphs import has_missing, printable_tree, tree_has_missing

THIN = "\u202f"


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("7600", "7600"),
        ("12500", f"12{THIN}500"),
        ("-12.5", "−12.5"),
        ("1234567.25", f"1{THIN}234{THIN}567.25"),
        ("5.00e9", "5.00 × 10⁹"),
        ("1e-06", "1 × 10⁻⁶"),
        ("4-25M", "4-25M"),
        ("0.0000001", "0.0000001"),
    ],
)
def test_number_text(text: str, expected: str) -> None:
    """Groups from five digits, true minus, powers of ten; other text stays as it is."""
    assert expected == number_text(text)


@pytest.mark.parametrize(
    ("unit", "expected"),
    [
        ("", ""),
        ("kN.m", "kN·m"),
        ("N.mm", "N·mm"),
        ("mm2", "mm²"),
        ("mm4", "mm⁴"),
        ("kN/m3", "kN/m³"),
        ("1/mm", "1/mm"),
        ("deg", "°"),
        ("kip.ft", "kip·ft"),
        ("mm2/m", "mm²/m"),
        ("MPa^0.5", "√MPa"),
        ("MPa^1.5", "MPa·√MPa"),
        ("1/MPa", "1/MPa"),
    ],
)
def test_unit_text(unit: str, expected: str) -> None:
    """Dots are raised, exponents are superscripts, roots are roots."""
    assert expected == unit_text(unit)


def test_every_unit_of_the_closed_list_has_glyphs() -> None:
    """No unit prints with ASCII stand-ins or a missing glyph."""
    for unit in UNITS:
        shown = unit_text(unit)
        assert "." not in shown
        assert not any(c.isdigit() for c in shown.replace("1/", "").translate(_RAISED_OFF))
        assert printable(shown) == shown


_RAISED_OFF = {ord(c): None for c in "⁰¹²³⁴⁵⁶⁷⁸⁹"}


def test_value_keeps_number_and_unit_together() -> None:
    """A narrow no-break space stands between number and unit, none before a degree sign."""
    assert value_text("551", "kN.m") == f"551{THIN}kN·m"
    assert value_text("35", "deg") == "35°"
    assert plain(value_math("551e6", "N.mm")) == "551 x 10^6 N.mm"


def test_symbols_are_italic_only_for_single_letters() -> None:
    """Latin letters and small Greek are italic; capitals of Greek, words and scripts upright."""
    assert "<mi>b</mi>" in mathml(symbol_math(Symbol("b", "b")))
    assert "<mi>φ</mi>" in mathml(symbol_math(Symbol("phi", "φ")))
    assert "<mtext>Δ</mtext>" in mathml(symbol_math(Symbol("Delta", "Δ")))
    assert "<mtext>EI</mtext>" in mathml(symbol_math(Symbol("EI", "EI")))
    assert tex(symbol_math(Symbol("A_s", "A", "s,min"))) == r"A_{\mathrm{s,min}}"
    assert plain(symbol_math(Symbol("f_c", "f", "c", "′"))) == "f'c"


def test_hostile_symbol_stays_text() -> None:
    """A symbol's parts are escaped in every output."""
    math = symbol_math(Symbol("x", "<script>", "$}", "\\"))

    assert "&lt;script&gt;" in mathml(math)
    assert "<script" not in mathml(math)
    assert tex(math) == r"\mathrm{\lt script\gt }_{\mathrm{\$\}}}^{\mathrm{\backslash }}"


def test_characters_without_a_glyph_are_shown_by_code() -> None:
    """Emoji, CJK, control and direction marks print as their code."""
    assert printable("a\U0001f600b") == "a<U+1F600>b"
    assert printable("梁") == "<U+6881>"
    assert printable("\u202egnp") == "<U+202E>gnp"
    assert printable("a\x00b") == "a<U+0000>b"
    assert (
        printable("Žižka Čapek Łódź Αθήνα Москва √≤≥×·²") == "Žižka Čapek Łódź Αθήνα Москва √≤≥×·²"
    )


def test_missing_glyphs_are_found_anywhere_in_plain_data() -> None:
    """A record with one such character anywhere gets the note."""
    assert tree_has_missing({"a": [{"b": "x\U0001f600"}]})
    assert not tree_has_missing({"a": [1, None, "Łódź"]})
    assert has_missing("\x07")
    assert printable_tree({"k": ["\x07", 1]}) == {"k": ["<U+0007>", 1]}


def test_number_math_keeps_text_that_is_no_number() -> None:
    """A printed argument that is a word stays a word."""
    assert plain(number_math("25M")) == "25M"
