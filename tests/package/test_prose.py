"""Prose: a Markdown subset in which nothing is run."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.errors import UserError
from lineproof.package import build_package, to_html, to_pdf
from lineproof.package.prose import Mark, prose_html, read_prose
from lineproof.typeset import value_math

VALUES = {"M_r": value_math("551", "kN.m"), "flexure/M_r": value_math("551", "kN.m")}


def html(markdown: str) -> str:
    """Return prose as HTML."""
    return prose_html(read_prose(markdown, VALUES))


def test_the_subset_is_printed() -> None:
    """Headings, emphasis, lists, code, tables, links as text."""
    assert html("*a* **b** `c<d`") == "<p><em>a</em> <strong>b</strong> <code>c&lt;d</code></p>"
    assert html("- a\n- b") == "<ul><li><p>a</p></li><li><p>b</p></li></ul>"
    assert html("1. a") == "<ol><li><p>a</p></li></ol>"
    assert html("[plan](https://example.org/x)") == "<p>plan (https://example.org/x)</p>"
    assert html("```\na\n b\n```") == "<pre><code>a\n b</code></pre>"
    assert '<th scope="col">A</th>' in html("| A | B |\n|---|---|\n| 1 | 2 |")


def test_a_name_is_replaced_by_its_value() -> None:
    """Bare or with its part; underscores do not start emphasis."""
    for name in ("{{ M_r }}", "{{M_r}}", "{{ flexure/M_r }}"):
        page = html(f"so {name} and {name}")
        assert page.count("<mn>551</mn>") == 2
        assert page.startswith("<p>so <math")


def test_a_name_in_code_stays_as_written() -> None:
    """Code is not filled in."""
    assert html("`{{ M_r }}`") == "<p><code>{{ M_r }}</code></p>"


@pytest.mark.parametrize(
    ("prose", "said"),
    [
        ("{{ M_x }}", "write M_r"),
        ("{{ cycler.__init__.__globals__ }}", "is no value of this calc"),
        ("a <b>x</b>", "raw HTML '<b>' is not printed"),
        ("<script>x</script>", "raw HTML '<script>x</script>'"),
        ("![x](y.png)", "image"),
        ("text\n\n# \n", "heading # has no words"),
        ("- > ##", "heading ## has no words"),
    ],
)
def test_what_is_not_printed_is_reported(prose: str, said: str) -> None:
    """Nothing is dropped without a word."""
    with pytest.raises(UserError) as error:
        read_prose(prose, VALUES)
    assert said in str(error.value)


def test_all_faults_come_at_once() -> None:
    """Two unknown names and raw HTML give three faults."""
    with pytest.raises(UserError) as error:
        read_prose("{{ x }} {{ y }} <i>", VALUES)
    assert len(error.value.faults) == 3


def test_marks_are_plain_data() -> None:
    """A paragraph is a mark with children."""
    assert read_prose("a", {}).blocks == (Mark("paragraph", children=(Mark("text", "a"),)),)


@pytest.fixture
def walk(record: dict[str, Any]) -> list[tuple[str, str]]:
    """Prose with every kind of block, then the parts."""
    prose = (
        "# Basis\n\n## Loads\n\nA #strong[x] $y$ {{ M_f }}.\n\n- a\n  - b\n\n1. c\n\n> quoted\n\n"
        "| A | B |\n|---|---|\n| `x` | {{ flexure/M_r }} |\n\n```\n#let x\n```\n\n---\n\n#### deep"
    )
    return [("prose", prose), *(("part", p["key"]) for p in record["parts"])]


def test_prose_is_printed_in_both(record: dict[str, Any], walk: list[tuple[str, str]]) -> None:
    """Every block goes through the strict PDF standards and through HTML."""
    package = build_package([record], [walk])

    assert to_pdf(package).startswith(b"%PDF")
    assert "A #strong[x] $y$ <math" in to_html(package)


def test_anchors_that_do_not_fit_the_record_are_errors(
    record: dict[str, Any], walk: list[tuple[str, str]]
) -> None:
    """Unknown, doubled and missing parts are all named at once."""
    wrong = [*walk[:-1], walk[1], ("part", "nowhere"), ("prose", "{{ nothing }}")]
    with pytest.raises(UserError) as error:
        build_package([record], [wrong])
    said = str(error.value)

    assert "part 'nowhere' is shown but not in the record" in said
    assert "part 'inputs' is shown twice" in said
    assert "part 'minimum' is in the record but not shown" in said
    assert "{{ nothing }}" in said
