"""Hand formulas against the catalogue: equal in any form, or what differs in plain words."""

from __future__ import annotations

import pytest

from lineproof.audit.junior.catalogue import Said, catalogue_of, compared
from lineproof.audit.junior.edits import branches, text_of
from lineproof.audit.junior.foreign import foreign_rule
from lineproof.formula import parse_line
from lineproof.standards.catalogue import formulas


@pytest.mark.parametrize(
    "text",
    [
        "M_r = phi_s*A_s*f_y*(d - a/2)",
        "M_r = A_s*f_y*phi_s*d - 0.5*phi_s*f_y*A_s*a",
        "M_r = (2*d - a)*phi_s*A_s*f_y/2",
        "M_r = phi_s*A_s*f_y*(d - phi_s*A_s*f_y/(2*alpha_1*phi_c*f_c*b))",  # a written out
        "a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b_w)",  # b is the web here
        "V_s = phi_s*A_v*f_y*d_v/(tan(theta)*s)",
        "M_f = w_f*l_1**2/8",  # of span 1
        "A_smin = 0.2*sqrt(f_c)*b_w*h/f_y",  # b_t is the web here
        "I_g = b*h**3/12",
        "beta = 0.4/(1 + 1500*eps_x)",
        "d = h - d_c",  # d_c is cover, stirrup and half a bar
        "w_f2 = 1.5*w_L + 5/4*w_D",
    ],
)
def test_another_form_of_the_same_is_the_same(text: str) -> None:
    symbol, tree = parse_line(text)
    assert compared(symbol, tree).said is Said.AGREES


def test_algebra_proves_what_numbers_say() -> None:
    symbol, tree = parse_line("M_r = (2*d - a)*phi_s*A_s*f_y/2")
    assert compared(symbol, tree).proved


@pytest.mark.parametrize(
    ("text", "clause", "words"),
    [
        ("V_c = phi_c*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v", "11.3.4", ["lambda is missing"]),
        ("V_c = phi_c*beta*sqrt(f_c)*b_w*d_v", "11.3.4", ["lambda is missing"]),
        ("V_c = phi_c*lambda_*beta*sqrt(f_c)*b_w*d", "11.3.4", ["d in place of d_v"]),
        ("V_c = phi_c*lambda_*beta*f_c*b_w*d_v", "11.3.4", ["the root of f_c is forgotten"]),
        (
            "V_c = 0.2*lambda_*phi_c*sqrt(f_c)*b_w*d", "11.3.4",
            ["0.2 in place of beta", "d in place of d_v"],
        ),
        ("a = phi_s*A_s*f_y/(0.85*phi_c*f_c*b)", "10.1.7", ["0.85 in place of alpha_1"]),
        ("M_r = A_s*f_y*(d - a/2)", "10.1", ["phi_s is missing"]),
        ("M_r = phi_s*A_s*f_y*(d + a/2)", "10.1", ["the sign of a/2 is turned"]),
        ("M_r = phi_s*A_s*f_y*(d - a)", "10.1", ["2 is missing"]),
        ("M_r = phi_s*A_s*f_y*(h - a/2)", "10.1", ["h in place of d"]),
        ("M_r = 1.15*phi_s*A_s*f_y*(d - a/2)", "10.1", ["1.15 is a factor too much"]),
        ("M_r = phi_s*A_s*f_y*d", "10.1", ["the term a/2 is missing"]),
        ("M_f = w_f*l/8", "statics", ["the power 2 of l is forgotten"]),
        ("M_f = w_f*l**2/10", "statics", ["10 in place of 8"]),
        ("V_s = phi_s*A_v*f_y*d_v*tan(theta)/s", "11.3.5", ["tan in place of cot of theta"]),
        ("V_s = phi_s*A_v*f_y*d_v/s", "11.3.5", ["cot(theta) is missing"]),
        ("E_c = 5000*sqrt(f_c)", "8.6.2.3", ["5000 in place of 4500"]),
        ("A_smin = 0.2*sqrt(f_c)*b_w*d/f_y", "10.5.1.2", ["d in place of h"]),
        ("delta_i = 5*w_s*l**4/(384*E_c*I_g)", "9.8.2.2", ["I_g in place of I_e"]),
        ("delta_i = 5*w_s*l**3/(384*E_c*I_e)", "9.8.2.2", ["3 in place of 4"]),
        (
            "w_f2 = 1.4*w_D + 1.7*w_L", "NBC 4.1.3.2",
            ["1.4 in place of 1.25", "1.7 in place of 1.5"],
        ),
        ("d = h - c_c - d_b/2", "geometry", ["the term d_bs is missing"]),
        ("eps_x = (max(M_f, V_f*d_v)/d_v + V_f)/(E_s*A_s)", "11.3.6.4", ["2 is missing"]),
    ],
)  # fmt: skip
def test_what_differs_is_named(text: str, clause: str, words: list[str]) -> None:
    symbol, tree = parse_line(text)
    met = compared(symbol, tree)
    assert met.said is Said.DIFFERS
    assert met.nearest is not None
    assert met.nearest.clause == clause
    assert list(met.differences) == words


@pytest.mark.parametrize(
    "text",
    [
        "V_c = phi_c*lambda_*beta*sqrt(f_c)*b_w*d_v",  # without the 8 MPa
        "d_v = 0.9*d",  # without 0.72 h
        "V_r = V_c + V_s",  # without V_r,max
        "eps_x = (M_f/d_v + V_f)/(2*E_s*A_s)",  # without the least moment
        "w_f = 1.25*w_D + 1.5*w_L",  # case 2 without case 1
    ],
)
def test_a_branch_is_told_from_the_whole(text: str) -> None:
    symbol, tree = parse_line(text)
    met = compared(symbol, tree)
    assert met.said is Said.BRANCH
    assert met.left_out is not None


def test_what_is_like_nothing_is_not_forced_to_be() -> None:
    symbol, tree = parse_line("M_f = V_sn*x_f - w_f*x_f**2/2")
    assert compared(symbol, tree).said is Said.UNLIKE
    assert compared("w_cb", parse_line("w_cb = gamma_w*b_cb*h_cb")[1]).nearest is None


def test_every_formula_of_the_catalogue_agrees_with_itself() -> None:
    for _, formula in formulas():
        met = compared(formula.symbol, formula.tree)
        assert met.said is Said.AGREES, formula.text


def test_a_factor_too_much_is_found_in_any_formula() -> None:
    every_sixth = list(formulas())[::6]
    named = 0
    for _, formula in every_sixth:
        _, tree = parse_line(f"{formula.symbol} = 1.07*({formula.text.partition('=')[2].strip()})")
        met = compared(formula.symbol, tree)
        assert met.said in (Said.DIFFERS, Said.UNLIKE), formula.text
        named += met.differences == ("1.07 is a factor too much",)
    assert named > 0.8 * len(every_sixth)


def test_plain_arithmetic_may_hold_a_power_of_ten() -> None:
    symbol, tree = parse_line("M_r = phi_s*A_s*f_y*(d - a/2)/1000000")
    assert compared(symbol, tree).said is Said.DIFFERS
    met = compared(symbol, tree, scales=True)
    assert (met.said, met.power) == (Said.AGREES, -6)


def test_editions_of_one_symbol_agree_if_any_does() -> None:
    texts = [formula.text for formula in catalogue_of("x_f")]
    assert len(texts) == len(set(texts)) > 1
    for text in texts:
        assert compared("x_f", parse_line(text)[1]).said is Said.AGREES


@pytest.mark.parametrize(
    ("text", "whose"),
    [
        ("V_c = 0.2*phi_c*lambda_*sqrt(f_c)*b_w*d", "A23.3-94"),
        ("V_c = 0.17*lambda_*sqrt(f_c)*b_w*d", "ACI 318"),
        ("E_c = 4700*sqrt(f_c)", "ACI 318"),
        ("w_f2 = 1.2*w_D + 1.6*w_L", "ASCE 7"),
        ("V_c = phi_c*lambda_*beta*sqrt(f_c)*b_w*d_v", ""),
        ("E_c = 4500*sqrt(f_c)", ""),
    ],
)
def test_rules_of_other_standards_are_known(text: str, whose: str) -> None:
    symbol, tree = parse_line(text)
    assert foreign_rule(symbol, tree).startswith(whose)
    assert bool(foreign_rule(symbol, tree)) == bool(whose)


def test_branches_of_a_limit() -> None:
    forms = {text_of(form) for form in branches(parse_line("d_v = max(0.9*d, 0.72*h)")[1])}
    assert forms == {"0.9*d", "0.72*h"}
    assert branches(parse_line("a = b*c")[1]) == []


@pytest.mark.parametrize(
    "text",
    ["2*(a + b)", "a - (b - c)", "a/(b*c)", "(a + b)**2", "-(a + b)", "sqrt(a)/b", "a**(b/2)"],
)
def test_a_tree_prints_as_it_is_typed(text: str) -> None:
    assert text_of(parse_line(f"x = {text}")[1]) == text
