"""The edge beam of the notebooks: torsion from the slab, with moment and shear, in whole flow."""

from __future__ import annotations

import math
from collections import Counter
from decimal import ROUND_HALF_UP, Decimal

import numpy as np
import pytest

from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.resistance_cover import covered
from lineproof.beams.continuous.resistance_demand import end_tension, end_torsion
from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.errors import UserError
from lineproof.record import recompute

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .edge_beam import TURNED, Edge, edge, failing, make
from .flow import CALLS, MIXED, run, start


@pytest.fixture(scope="module")
def three_spans() -> Edge:
    """The three-span beam with 15 kN.m per metre of torsion that equilibrium needs."""
    return make(start(**TURNED))


def turned_sections(design: Design) -> list[ShearSection]:
    """Return the printed sections at which torsion counts."""
    return [s for row in design.stirrups.sections for s in row if s.counts]


@pytest.mark.parametrize("name", ["edge_beam", "three_spans"])
def test_every_check_holds_and_every_line_is_followed(
    name: str, request: pytest.FixtureRequest
) -> None:
    """All checks hold; a pocket calculator and a recomputation find every printed number."""
    beam, _, record = request.getfixturevalue(name)
    assert failing(beam.sheet) == []
    assert list(faults(record.data)) == []
    assert recompute(record) == []


@pytest.mark.parametrize("name", ["edge_beam", "three_spans"])
def test_recorded_is_what_was_chosen_by(name: str, request: pytest.FixtureRequest) -> None:
    """Every number of a section with torsion on the sheet is that of the choice, to 1e-9."""
    beam, design, _ = request.getfixturevalue(name)
    found = turned_sections(design)
    assert found
    for section in found:
        entries = beam.sheet.entries_of(section.key)
        for symbol in ("d_v", "M_f", "V_f", "a_t", "theta", "V_c", "V_s", "V_r", "F_lt", "F_lc"):
            scale = section.values["V_f"] * section.values["d_v"] if symbol == "M_f" else 0.0
            expected = section.values[symbol]
            apart = abs(entries[symbol].value - expected)
            assert apart <= 1e-9 * max(abs(expected), scale), (section.key, symbol)
        T_f = entries.get("T_fr", entries["T_f"])
        assert T_f.value == pytest.approx(section.values["T_f"], rel=1e-9)
        assert entries["A_s"].value == pytest.approx(section.A_s, rel=1e-9)
        assert entries["A_sp"].value == pytest.approx(section.A_sp, rel=1e-9)


@pytest.mark.parametrize("name", ["edge_beam", "three_spans"])
def test_bars_carry_torsion_at_every_station(name: str, request: pytest.FixtureRequest) -> None:
    """Every case at every 50 mm: the bars that count are no less than 11.3.10.6 needs."""
    _, design, _ = request.getfixturevalue(name)
    turned = 0
    for check in design.stirrups.checks:
        for needed, area in check.bar_areas():
            assert np.all(needed <= area)
            turned += int((needed > 0).sum())
    assert turned > 100
    assert covered(design.designed, design.runs).gaps == ()


def test_force_in_the_bars_with_torsion_by_hand(
    edge_beam: Edge,
) -> None:
    """Span 1 at 2.525 m from support 1, 5-15M below, 10M closed at 175 mm, 1.25 D + 1.5 L.

    d = 620 - 40 - 11.3 - 8 = 560.7, d_v = 0.9 d = 504.63 mm; between the stirrup's centre lines
    380 - 80 - 11.3 = 288.7 and 620 - 80 - 11.3 = 528.7 mm: A_oh = 152 636 mm2, p_h = 1634.8 mm,
    A_o = 0.85 A_oh = 129 740 mm2. t_f = 1.25 x 5.5 + 1.5 x 5.0 = 14.375 kN.m/m, x_n = 2.525 -
    0.225 = 2.30 m, l_n/2 = 3.575 m: T_f = 14.375 x 1.275 = 18.328 kN.m, below 0.67 T_cr. With
    M_f = 127.331 kN.m and V_f = 30.562 kN (live load on span 1; statics tested apart):
    V_fe = sqrt(30.562^2 + (0.9 x 1634.8 x 18.328e6/259 481/1000)^2) = sqrt(934.0 + 103.93^2)
    = 108.33 kN; eps_x = (127 331/504.63 + 108.33)e3/(2 x 200 000 x 1000) = 0.00090164;
    theta = 29 + 7000 eps_x = 35.311 deg, cot 1.41188; a_t = 18.328e6/(259 481 x 340 x 1.41188) =
    0.14714 mm2/mm; legs left for shear 200 - 2 x 0.14714 x 175 = 148.50 mm2; V_s = 0.85 x 148.50 x
    400 x 504.63 x 1.41188/175 = 205.5 kN, more than V_f, which is all it may count: V_f - 0.5 V_f =
    15.281 kN; with 0.45 x 1634.8 x 18.328e6/259 481 = 51.963 kN of torsion sqrt(15.281^2 +
    51.963^2) = 54.163 kN; F_lt = 252.33 + 54.163 x 1.41188 = 328.8 kN; the bars carry 0.85 x 1000
    x 400 = 340 kN. Clauses 11.3.10.3 to .6, 11.3.9.2 and 11.3.6.4.
    """
    beam, design, _ = edge_beam
    worst = max(turned_sections(design), key=lambda section: section.use["tension"])
    assert (worst.span, worst.end, worst.distance, worst.spacing) == (1, "left", 2525.0, 175.0)
    entries = beam.sheet.entries_of(worst.key)
    M, V = entries["M_f"].value, entries["V_f"].value
    assert pytest.approx(127.331e6, rel=1e-5) == M
    assert pytest.approx(30.562e3, rel=1e-4) == V
    T = (1.25 * 5.5 + 1.5 * 5.0) * (7.15 / 2 - 2.30) * 1e6
    p_h, A_o = 2 * (288.7 + 528.7), 0.85 * 288.7 * 528.7
    eps_x = (M / 504.63 + math.hypot(V, 0.9 * p_h * T / (2 * A_o))) / (2 * 200_000 * 1000)
    cot = 1 / math.tan(math.radians(29 + 7000 * eps_x))
    a_t = T / (2 * A_o * 0.85 * 400 * cot)
    V_s = 0.85 * (200 - 2 * a_t * 175) * 400 * 504.63 * cot / 175
    F_lt = M / 504.63 + math.hypot(V - min(V_s, V) / 2, 0.45 * p_h * T / (2 * A_o)) * cot
    assert pytest.approx(328.8e3, abs=50) == F_lt
    assert entries["a_t"].value == pytest.approx(a_t, rel=1e-9)
    assert entries["V_s"].value == pytest.approx(V_s, rel=1e-9)
    assert entries["F_lt"].value == pytest.approx(F_lt, rel=1e-9)
    check = entries["bars-tension-side"]
    assert check.value == (pytest.approx(F_lt, rel=1e-9), pytest.approx(340e3))


def test_inside_a_support_the_moment_of_its_face_counts(
    edge_beam: Edge,
) -> None:
    """The top bars are used most inside support 2: M_f there is the larger of both faces."""
    beam, design, _ = edge_beam
    entries = beam.sheet.entries_of("coverage-top")
    forces = design.model.forces
    assert "inside the support" in entries["inside"].source.text
    assert entries["x_st"].value == 225
    most = max(-forces.hog(2, "left").M, -forces.hog(2, "right").M)
    assert entries["M_f"].value == pytest.approx(most, rel=1e-9)


def test_bottom_bars_run_through_and_no_fewer_do(
    edge_beam: Edge,
) -> None:
    """All bottom bars run into both supports; one bar less in span 1 does not carry torsion."""
    beam, design, _ = edge_beam
    for span in (1, 2):
        start_, end = design.outline.faces(span)
        layers = beam.design.designed.bars.bottom[span - 1]
        there = [r for r in design.runs if r.face == "bottom" and r.start <= start_]
        through = [r for r in there if r.end >= end]
        assert sum(run.number for run in through) >= sum(layer.number for layer in layers)
    note = beam.sheet.entry("torsion-1/bars-with-torsion")
    assert "run from support to support" in note.source.text
    assert "by the moments alone" in note.source.text
    layer = design.designed.bars.bottom[0][0]
    fewer = edge(bottom_bars=[f"{layer.number - 1}-{layer.size}", None])
    for call in CALLS[:5]:
        getattr(fewer, call)()
    assert any(name.endswith("/bars-tension-side") for name in failing(fewer.sheet))


def test_given_bars_stay_and_fail() -> None:
    """Bars that the designer gave are not changed: where torsion needs more their check fails."""
    beam = start(**(TURNED | {"bottom_bars": ["5-20M", None, None]}))
    for call in CALLS[:5]:
        getattr(beam, call)()
    (layer,) = beam.design.designed.bars.bottom[0]
    assert (layer.number, layer.size) == (5, "20M")
    failed = [name for name in failing(beam.sheet) if "bars-" in name]
    assert failed
    assert all(name.startswith("shear-1-") for name in failed)


@pytest.mark.parametrize("support", [1, 4])
def test_torsion_at_the_bearing(three_spans: Edge, support: int) -> None:
    """F_le at an end support, by hand from V_f, V_s, theta and T_f of its part (11.3.10.6).

    T_f at the face is 1.25 x 15 x l_n/2 = 18.75 x 3.5875 = 67.27 kN.m, or 0.9 D or 1.4 D of it.
    """
    beam, design, _ = three_spans
    entries = beam.sheet.entries_of(f"anchorage-end-{support}-bottom")
    factor = entries["t_f"].value / 15e3
    assert factor in (pytest.approx(1.25), pytest.approx(1.4), pytest.approx(0.9))
    l_n = 7600 - 200 - 225
    assert entries["T_f"].value == pytest.approx(factor * 15e3 * l_n / 2)
    p_h, A_o = 2 * (308.7 + 548.7), 0.85 * 308.7 * 548.7
    V, V_s, theta = (entries[name].value for name in ("V_f", "V_s", "theta"))
    turned = 0.45 * p_h * entries["T_f"].value / (2 * A_o)
    F_le = math.hypot(V - min(V_s, V) / 2, turned) / math.tan(math.radians(theta))
    assert entries["F_le"].value == pytest.approx(F_le, rel=1e-9)
    assert entries["F_le"].value == pytest.approx(end_tension(design.designed, support), rel=1e-9)
    assert end_torsion(design.designed, support) is not None


def test_cantilever_is_held_once() -> None:
    """The torque of a cantilever passes through to its support: T = t (l_n - x)."""
    changes = dict(MIXED) | {"torques": {"D": "6 kN.m"}, "torsion": "equilibrium"}
    beam = start(**(changes | {"closed_stirrups": True}))
    for call in CALLS[:5]:
        getattr(beam, call)()
    assert "at the face of its support only" in beam.sheet.entry("torsion-1/held").source.text
    assert "held against turning at the faces" in beam.sheet.entry("torsion-2/held").source.text
    entries = beam.sheet.entries_of("shear-1-right")
    t_f, x_n = entries["t_f"].value, entries["d_v"].value
    assert entries["T_f"].value == pytest.approx(t_f * (2000 - 225 - x_n), rel=1e-9)
    assert [name for name in failing(beam.sheet) if name.startswith("shear-")] == []


def test_open_stirrups_are_refused_with_what_to_write() -> None:
    beam = start(**(TURNED | {"closed_stirrups": False}))
    for call in CALLS[:3]:
        getattr(beam, call)()
    with pytest.raises(UserError, match="write closed_stirrups = True"):
        beam.flexure()


def test_summary_has_a_row_of_torsion_for_every_section(
    edge_beam: Edge,
) -> None:
    """T_cr = 235 600^2/2000 x 0.38 x 0.65 x sqrt(32)/1e6 = 38.78 kN.m, its quarter 9.69 kN.m."""
    _, design, record = edge_beam
    table = next(e for e in record.entries.values() if e["id"] == "summary/torsion")
    sections = [s for row in design.stirrups.sections for s in row]
    assert len(table["rows"]) == len(sections)
    assert {row[3] for row in table["rows"]} == {"9.69"}
    assert 235_600**2 / 2000 * 0.38 * 0.65 * math.sqrt(32) / 4e6 == pytest.approx(9.69, abs=5e-3)
    counting = [row for row in table["rows"] if row[4] != "0"]
    assert len(counting) == len(turned_sections(design))
    assert not any("FAILS" in cell for row in table["rows"] for cell in row)


@pytest.mark.parametrize(
    ("table", "demand", "resistance"),
    [("flexure", 2, 6), ("shear", 3, 6), ("service", 2, 3)],
)
def test_ratios_of_the_summary_are_those_of_its_columns(
    edge_beam: Edge,
    table: str,
    demand: int,
    resistance: int,
) -> None:
    """Divided with a pocket calculator, rounded half up to two decimals."""
    rows = [r for r in edge_beam[2].entries[f"summary/{table}"]["rows"] if r[-1]]
    assert len(rows) >= 6
    for row in rows:
        numbers = [Decimal(row[at].partition(" ")[0]) for at in (demand, resistance)]
        ratio = (numbers[0] / numbers[1]).quantize(Decimal("0.01"), rounding=ROUND_HALF_UP)
        assert str(ratio) == row[-1], row


def test_an_area_asked_for_stands_only_beside_the_moment_that_it_is_of(edge_beam: Edge) -> None:
    """At support 2 it is worked at the right face, for 251.2 kN.m; the left one has 240.5 kN.m.

    a = 560.7 - sqrt(560.7**2 - 2*M/(0.802*0.65*32*380)), A = 0.802*0.65*32*380*a/(0.85*400).
    """
    k = 0.802 * 0.65 * 32 * 380
    right, left = (
        k * (560.7 - math.sqrt(560.7**2 - 2 * M / k)) / (0.85 * 400) for M in (251.2e6, 240.5e6)
    )
    rows = edge_beam[2].entries["summary/flexure"]["rows"]
    cells = {row[0]: (row[2], row[3]) for row in rows}
    assert cells["support 2, right"] == ("251", "1410")
    assert cells["support 2, left"] == ("241", "–")
    assert (round(right, -1), round(left, -1)) == (1410, 1350)


def test_one_quantity_prints_with_the_same_digits_everywhere(
    edge_beam: Edge,
) -> None:
    """At its own line and in every line that uses it, also in one printed before it.

    Units differ by powers of ten only, so the digits must be the same.
    """
    entries = edge_beam[2].entries
    uses = [
        (holder["args"][name], text, key)
        for key, entry in entries.items()
        for holder in (entry, entry.get("closing", {}))
        for name, text in holder.get("printed", {}).get("args", {}).items()
    ]
    assert len(uses) > 4000
    others = [
        (target, entries[target]["printed"]["result"], text, key)
        for target, text, key in uses
        if _figures(entries[target]["printed"]["result"]) != _figures(text)
    ]
    assert others == []


def _figures(text: str) -> tuple[int, ...]:
    return Decimal(text).normalize().as_tuple().digits


def test_slopes_are_told_with_what_they_are_times_and_every_number_has_its_unit(
    edge_beam: Edge,
) -> None:
    """With I in mm4 below the line, sums of moment times length over I are slopes times E: kPa."""
    record = edge_beam[2]
    found = record.entries["analysis/M_2rD"]
    assert found["closing"]["unit"] == "kPa"
    assert found["closing"]["conclusion"] == (
        "The slopes of both spans agree (sides: slopes times E)."
    )
    units = {symbol["id"]: symbol["unit"] for symbol in record.data["notation"]}
    assert [units[name] for name in ("I_1", "l_1", "K_1", "w_D1")] == ["mm4", "m", "mm3", "kN/m"]
    words = [symbol["meaning"] for symbol in record.data["notation"]]
    assert len({w for w in words if w.startswith("moment at support 2, on its")}) == 6


def test_torques_per_length_carry_their_unit_and_where_they_come_from(
    edge_beam: Edge,
) -> None:
    """5.5 and 5 kN.m per metre: 1.25 x 5.5 + 1.5 x 5 = 14.375 kN.m/m."""
    given = edge_beam[2].entries["torsion-1/t_D"]
    assert (given["printed"]["result"], given["printed"]["unit"]) == ("5.5", "kN.m/m")
    assert given["source"] == "torques of the inputs"
    values = [e for e in edge_beam[2].entries.values() if e["symbol"] == "t_f"]
    assert {e["unit"] for e in values} == {"kN.m/m"}
    assert max(e["value"] for e in values) == pytest.approx(1.25 * 5.5 + 1.5 * 5)


def test_symbols_that_are_apart_have_words_apart(
    edge_beam: Edge,
) -> None:
    """On the notation page each meaning stands once."""
    words = Counter(symbol["meaning"] for symbol in edge_beam[2].data["notation"])
    assert [meaning for meaning, times in words.items() if times > 1] == []


def test_a_reaction_that_is_not_sought_is_a_dash(
    edge_beam: Edge,
) -> None:
    """A cell left empty would read as forgotten; the middle support has no least live load."""
    table = edge_beam[2].entries["summary/reactions"]
    assert all(cell for row in table["rows"] for cell in row)
    assert "–" in table["rows"][1]
    assert "–" not in table["rows"][0]


def test_bars_that_heavy_torsion_strains_too_much_are_chosen_anew() -> None:
    """All the torsion of 40 kN.m a metre: more bars are chosen until the strain is in range.

    A_oh = (500 - 80 - 11.3)*(800 - 80 - 11.3) = 289 646 mm2, p_h = 2*(408.7 + 708.7) = 2234.8 mm,
    A_o = 0.85*A_oh = 246 199 mm2. At every section with torsion the strain
    (max(M_f/d_v, V_f) + sqrt(V_f**2 + (0.9*p_h*T_f/(2*A_o))**2))/(2*200 000*A_s) stays below 0.003.
    """
    beam = edge(
        h="800 mm", b_w="500 mm", torsion="equilibrium", torques={"D": "40 kN.m"}, loads=[],
    )  # fmt: skip
    sheet = run(beam)

    assert failing(sheet) == []
    strains = []
    for part in sheet.parts:
        names = ("M_f", "V_f", "T_f", "d_v", "A_s")
        if part.key.startswith("shear-") and {"V_fe", *names} <= part.entries.keys():
            M_f, V_f, T_f, d_v, A_s = (part.entries[name].value for name in names)
            V_fe = math.hypot(V_f, 0.9 * 2234.8 * T_f / (2 * 246199))
            strains.append((max(M_f / d_v, V_f) + V_fe) / (2 * 200e3 * A_s))
    assert 0.001 < max(strains) < 0.003


def test_stirrups_too_close_for_torsion_ask_for_no_more_legs() -> None:
    """More than two legs are refused where torsion counts; thicker ones or a larger beam help."""
    beam = edge(torsion="equilibrium", torques={"D": "25 kN.m"}, loads=[])
    with pytest.raises(UserError, match="write thicker stirrups or a larger section"):
        run(beam)
