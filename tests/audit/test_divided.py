"""A sum divided otherwise: terms that make up for each other are no errors, one alone is.

Web 300 x 600, slab 150 on a width of 3.0 m, 24 kN/m3. Slab on the whole width and web below it:
24 x 0.15 x 3.0 = 10.80 and 24 x 0.3 x 0.45 = 3.24. Web over the whole depth and slab between webs:
24 x 0.3 x 0.6 = 4.32 and 24 x 0.15 x 2.7 = 9.72. Either makes 14.04; with 3.00 on top it is 17.04.
"""

from __future__ import annotations

from lineproof.audit.data import Verdict

from .hand import judged, sheet_of, verdicts_of

GIVENS = {
    "gamma_w": "24 kN/m3", "b_tr": "3.0 m", "h_f": "150 mm", "b_w": "300 mm", "h": "600 mm",
    "w_SD": "3.00 kN/m", "k_1": "2",
}  # fmt: skip
LINES = {
    "w_sl = gamma_w*h_f*b_tr": "kN/m",
    "w_wb = gamma_w*b_w*(h - h_f)": "kN/m",
    "w_D = w_sl + w_wb + w_SD": "kN/m",
    "w_f = k_1*w_sl": "kN/m",
}


def said(**claims: str) -> dict[str, Verdict]:
    return verdicts_of(LINES, GIVENS, claims)


def test_web_over_the_whole_depth_and_slab_between_the_webs() -> None:
    found = judged(
        sheet_of(LINES, GIVENS).close(),
        {"beam/w_sl": "9.72", "beam/w_wb": "4.32", "beam/w_D": "17.04"},
    )
    assert found["beam/w_sl"].verdict is Verdict.OTHER_METHOD
    assert found["beam/w_wb"].verdict is Verdict.OTHER_METHOD
    assert found["beam/w_D"].verdict is Verdict.AGREES
    assert found["beam/w_sl"].note == (
        "with w_wb (2.2) it makes the right w_D (2.3): another division of the same sum"
    )


def test_the_web_counted_twice_under_the_slab_is_an_error() -> None:
    """10.80 + 4.32 + 3.00 = 18.12: nothing makes up for it."""
    assert said(w_sl="10.80", w_wb="4.32", w_D="18.12") == {
        "w_sl": Verdict.AGREES,
        "w_wb": Verdict.ORIGIN,
        "w_D": Verdict.CARRIED,
    }


def test_two_wrong_terms_whose_sum_is_wrong_are_two_errors() -> None:
    """9.00 + 4.32 + 3.00 = 16.32."""
    found = said(w_sl="9.00", w_wb="4.32", w_D="16.32")
    assert (found["w_sl"], found["w_wb"]) == (Verdict.ORIGIN, Verdict.ORIGIN)


def test_without_the_sum_nothing_shows_that_they_make_up_for_each_other() -> None:
    assert said(w_sl="9.72", w_wb="4.32") == {"w_sl": Verdict.ORIGIN, "w_wb": Verdict.ORIGIN}


def test_a_right_sum_above_a_wrong_term_that_was_not_used_makes_up_for_nothing() -> None:
    """w_wb alone is written wrongly: 17.04 does not follow from it."""
    assert said(w_sl="10.80", w_wb="4.32", w_D="17.04")["w_wb"] is Verdict.ORIGIN


def test_a_term_that_goes_elsewhere_too_is_wrong_there() -> None:
    """2 x 9.72 = 19.44 is another load than 2 x 10.80."""
    found = said(w_sl="9.72", w_wb="4.32", w_D="17.04", w_f="19.44")
    assert found["w_sl"] is Verdict.ORIGIN
