"""Top bars at the ends for the restraint that exists, and the minimum with its waiver."""

from __future__ import annotations

import pytest

from .gallery import EDGE, number, record_of


@pytest.mark.parametrize(
    ("ends", "moment"),
    [
        # w_f l2 = 47.787 x 57.76 = 2760.177
        ("cast with a girder", 115.007),  # /24
        ("cast with a column", 172.511),  # /16
    ],
)
def test_top_steel_for_the_restraint_that_exists(ends: str, moment: float) -> None:
    """Web in compression (b = b_w), all bars of web and overhangs, every check there."""
    record = record_of(ends=ends)
    assert number(record, "top-steel/M_f") == pytest.approx(moment, abs=0.0006)
    args = record.entries["top-steel/a"]["args"]
    assert args["b"] == "given/b_w"
    assert record.failed == []
    top = {
        i for i, e in record.entries.items() if i.startswith("top-steel") and e["kind"] == "check"
    }
    assert top == {
        f"top-steel/{key}"
        for key in ("bars-fit", "bars-fit-overhang", "cover-bars", "steel-for-moment", "yield",
                    "strength", "minimum-steel", "second-path", "top-bars-spread")
    }  # fmt: skip


@pytest.mark.parametrize("support", ["girder", "column"])
def test_restraint_is_named(support: str) -> None:
    """What restrains the end, and that it is an assumption."""
    note = record_of(ends=f"cast with a {support}").entries["top-steel/restraint"]
    assert note["kind"] == "note"
    assert note["text"].startswith(f"The beam is cast with a {support} that restrains its end.")
    assert "assumed" in note["text"]


def test_free_ends_have_no_top_steel_to_check() -> None:
    """Nothing but a note."""
    record = record_of(ends="free")
    kinds = [e["kind"] for i, e in record.entries.items() if i.startswith("top-steel/")]
    assert kinds == ["note"]


def test_top_bars_of_an_edge_beam_count_one_overhang() -> None:
    """A_s = (n_t + n_o) A_b; b_ot = min(633.3, 380); least 0.004 x 380 x 140 = 212.8 mm2."""
    record = record_of(**EDGE, ends="cast with a column")
    n_t, n_o = number(record, "top-steel/n_t"), number(record, "top-steel/n_o")
    A_b = number(record, "top-steel/A_b")
    assert number(record, "top-steel/A_s") == pytest.approx((n_t + n_o) * A_b)
    assert number(record, "top-steel/A_so") == pytest.approx(212.8)
    assert n_o * A_b >= 212.8


def test_top_bars_chosen_are_the_lightest_that_pass() -> None:
    """Every lighter choice of the same sizes, typed in, fails a check or does not fit."""
    record = record_of(**EDGE, ends="cast with a column")
    chosen = number(record, "top-steel/A_s")
    tried = 0
    for size, area in (("15M", 200), ("20M", 300), ("25M", 500)):
        overhang = -(-212.8 // area) * area
        for n in range(2, 13):
            if n * area + overhang >= chosen:
                break
            other = record_of(**EDGE, ends="cast with a column", top_bars=f"{n}-{size}")
            assert any(i.startswith("top-steel/") for i in other.failed)
            tried += 1
    assert tried >= 2


def test_minimum_by_cracking_rule() -> None:
    """10.5.1.1: 1.2 x 122.6 = 147.1 <= 380.5 kN.m, in place of the area of 10.5.1.2."""
    record = record_of(minimum_rule="10.5.1.1")
    check = record.entries["minimum-steel/minimum-by-cracking"]
    assert (check["clause"], check["holds"]) == ("10.5.1.1", True)
    assert check["left"] == pytest.approx(147.1, abs=0.06)
    assert check["right"] == pytest.approx(380.5, abs=0.06)
    assert "minimum-steel/A_smin" not in record.entries


def test_minimum_rule_ruling_the_bars() -> None:
    """A light beam: the minimum rule or its waiver, and the bars chosen meet one of them."""
    for rule in ("10.5.1.1", "10.5.1.2"):
        record = record_of(span="4 m", minimum_rule=rule, superimposed="0 kPa", use="office")
        assert record.failed == []
        M_f, M_r = number(record, "loads/M_f"), number(record, "flexure/M_r")
        if rule == "10.5.1.1":
            met = 1.2 * number(record, "section/M_cr") <= M_r
        else:
            met = number(record, "minimum-steel/A_smin") <= number(record, "bars/A_s")
        assert met == ("minimum-steel/waiver" not in record.entries)
        assert met or 4 / 3 * M_f <= M_r


def test_minimum_waived_at_midspan() -> None:
    """2-20M in 3 m: 600 mm2 of the 666.4 required, waived by a resistance a third above.

    b = 380 + 2 x min(600, 1680, 1360) = 1580; a = 204000/(16.6816 x 1580) = 7.740; M_r = 204 x
    (568.95 - 3.870) = 115.28; M_f = 47.787 x 9/8 = 53.760, 4/3 of it 71.68 kN.m.
    """
    record = record_of(span="3 m", bottom_bars="2-20M", ends="free")
    rule, waiver = (record.entries[f"minimum-steel/{k}"] for k in ("minimum-steel", "waiver"))
    assert (rule["kind"], rule["holds"]) == ("decision", False)
    assert (rule["left"], rule["right"]) == pytest.approx((666.4, 600), abs=0.06)
    assert (waiver["kind"], waiver["holds"]) == ("check", True)
    assert (waiver["left"], waiver["right"]) == pytest.approx((71.68, 115.28), abs=0.006)
    assert record.failed == []
