"""The Typst template prints only places in a list; anything else is an error."""

from __future__ import annotations

import json

import pytest

from lineproof.package.environment import Interned, Verbatim, typst_environment
from lineproof.typeset.nodes import Letter, Root

HOSTILE = '#sys.version #panic(1) $ \\ *b* " {{ 7*7 }} </script>'


def rendered(template: str, **values: object) -> tuple[str, Interned]:
    """Render a template text in the Typst environment."""
    interned = Interned()
    made = typst_environment().from_string(template).render(interned=interned, **values)
    return made, interned


@pytest.mark.parametrize(
    ("template", "source"),
    [
        ("#strong({{ u }})", "#strong(t.x0)"),
        ("forgotten {{ u }}", "forgotten t.x0"),
        ('#text("{{ u }}")', '#text("t.x0")'),
        ("/* {{ u }} */", "/* t.x0 */"),
        ("#{{ u ~ u }}", "#t.x0"),
        ("#{{ [u, u]|join }}", "#t.x0"),
        ("#{{ u|upper }}", "#t.x0"),
        ("{% for i in [u, u] %}#{{ i }}{% endfor %}", "#t.x0#t.x0"),
        ("{% set x = u %}#{{ x }}", "#t.x0"),
        ("#{{ 'a#b' }}", "#t.x0"),
        ("{% macro m(x) %}({{ x }}){% endmacro %}#{{ m(u) }}", "#t.x1"),
    ],
)
def test_no_position_lets_text_into_the_source(template: str, source: str) -> None:
    """Wherever a text stands in the template, only its place is printed."""
    made, interned = rendered(template, u=HOSTILE)

    assert made == source
    assert all(isinstance(item, str) for item in interned.items)


@pytest.mark.parametrize("value", [None, True, 3, 3.5, ["a"], {"a": 1}, b"x", object()])
def test_what_is_no_text_is_refused(value: object) -> None:
    """Numbers, lists and None would print as source."""
    with pytest.raises(TypeError, match="only text, maths and prose"):
        rendered("#{{ u }}", u=value)


def test_a_missing_name_is_refused() -> None:
    """A misspelt name in a template does not print as nothing."""
    with pytest.raises(Exception, match=r"Undefined|undefined"):
        rendered("#{{ nothing }}")


def test_maths_travels_as_marks() -> None:
    """A formula becomes data, not source; what stands twice is stored once."""
    made, interned = rendered("#m({{ f }}, {{ f }}, {{ g }})", f=Letter("a"), g=Root(Letter("a")))

    assert made == "#m(t.x1, t.x1, t.x3)"
    assert interned.items == [
        ["letter", "a"],
        ["formula", 0, "a"],
        ["root", "", 0],
        ["formula", 2, "sqrt(a)"],
    ]


def test_same_text_has_one_place() -> None:
    """The list holds each text once; verbatim data is not changed."""
    made, interned = rendered("{{ a }}{{ a }}{{ v }}", a="x\x00", v=Verbatim("x\x00"))

    assert made == "t.x0t.x0t.x1"
    assert json.loads(interned.to_json()) == ["x<U+0000>", "x\x00"]
