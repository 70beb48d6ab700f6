"""Forces brought in as CSV: read as plain text, checked for statics, refused with every fault."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest

from lineproof.beams.analysis.arrangements import (
    LoadCase,
    factored_combinations,
    standard_arrangements,
)
from lineproof.beams.analysis.envelope import CaseSolution, Envelope, envelope
from lineproof.beams.analysis.imported import Imported, read_forces, read_reactions
from lineproof.beams.analysis.model import SIMPLE, Beam, Load, PointLoad, Span, UniformLoad
from lineproof.beams.analysis.solve import solve
from lineproof.errors import MOST_FAULTS, UserError

from .solving import solve_cases

LENGTHS = (8000.0, 6000.0)
LOADS: list[Load] = [
    UniformLoad("D", 1, 30), UniformLoad("D", 2, 30), UniformLoad("L", 1, 20),
    UniformLoad("L", 2, 20), PointLoad("D", 1, 80e3, 3000),
]  # fmt: skip
HEADER = "span,station (m),case,combination,M (kN.m),V (kN),T (kN.m)"


def own() -> tuple[CaseSolution, Envelope]:
    beam = Beam(tuple(Span(l, 8e13) for l in LENGTHS), (SIMPLE,) * 3)
    solved = solve_cases(solve(beam, LOADS), factored_combinations("DL"), standard_arrangements(2))
    return solved, envelope(solved, pieces=10)


def plain(case: LoadCase) -> str:
    """Return the name of an arrangement without commas."""
    return case.arrangement.replace(",", " and") or "all"


def rows() -> list[str]:
    """Write an analysis as an office's program would export it: kN, m, three decimals."""
    _, found = own()
    return [
        f"{s.span},{s.x / 1000:.3f},{plain(case)},{case.combination},"
        f"{found.M[r, i] / 1e6:.3f},{found.V[r, i] / 1e3:.3f},{0.1 * r:.1f}"
        for r, case in enumerate(found.cases)
        for i, s in enumerate(found.stations)
    ]


def as_csv(lines: list[str], header: str = HEADER) -> bytes:
    return "\n".join([header, *lines]).encode()


def forces(lines: list[str] | None = None, header: str = HEADER) -> Imported:
    return read_forces(as_csv(rows() if lines is None else lines, header), LENGTHS)


def faults(call: Callable[[], object]) -> tuple[str, ...]:
    with pytest.raises(UserError) as caught:
        call()
    return caught.value.faults


def test_what_goes_out_comes_in_again() -> None:
    _, found = own()
    read = forces()
    assert [(s.span, s.side) for s in read.envelope.stations] == [
        (s.span, s.side) for s in found.stations
    ]
    assert read.envelope.cases[0] == LoadCase("1.4D", "all")
    assert np.allclose(read.envelope.M, found.M, rtol=0, atol=600)
    assert np.allclose(read.envelope.V, found.V, rtol=0, atol=0.6)
    assert read.T[2, 0] == pytest.approx(0.2e6)
    assert read.envelope.governing("M", largest=False)[10].case.combination.startswith("1.25D")


def test_units_order_semicolons_and_torsion_left_out() -> None:
    lines = []
    for line in rows():
        span, x, case, combination, M, V, _ = line.split(",")
        lines.append(f"{V};{float(x) * 1000:.0f};{combination};{span};{case};{float(M) * 1000:.0f}")
    read = forces(lines, "V [kN];station [mm];combination;span;case;M [kN.mm]")
    assert np.allclose(read.envelope.M, forces().envelope.M, rtol=1e-12)
    assert not read.T.any()


def test_a_byte_order_mark_empty_lines_and_windows_line_ends_are_harmless() -> None:
    content = b"\xef\xbb\xbf" + as_csv(["", *rows(), " , , "]).replace(b"\n", b"\r\n")
    assert np.array_equal(read_forces(content, LENGTHS).envelope.M, forces().envelope.M)


def changed(place: int, column: int, text: str) -> list[str]:
    lines = rows()
    cells = lines[place].split(",")
    cells[column] = text
    lines[place] = ",".join(cells)
    return lines


@pytest.mark.parametrize(
    ("column", "cell", "words"),
    [
        (4, "=1+1", "is a formula; save the values"),
        (4, "=cmd|' /C calc'!A0", "is a formula"),
        (2, "=HYPERLINK(1)", "could run as a formula"),
        (2, "+W", "could run as a formula"),
        (3, "@SUM(A1)", "could run as a formula"),
        (3, "-1.25D", "could run as a formula"),
        (2, "", "case: is empty; write a name"),
        (2, "x" * 81, "is no name of up to 80"),
        (2, "a\u202eb", "is no name of up to 80"),
        (4, "", "M: '' is empty; write a number"),
        (4, "nan", "'nan' is not a number"),
        (4, "inf", "'inf' is not a number"),
        (4, "1_000", "'1_000' is not a number"),
        (4, "0x10", "'0x10' is not a number"),
        (4, "\u0661\u0662", "is not a number"),
        (4, "1e999", "beyond anything a beam carries"),
        (4, "1e12", "beyond anything a beam carries; look at the unit"),
        (0, "1.5", "line 5, span: '1.5' is not a whole number; write it like 2"),
        (4, "12.5 kN.m", "M: '12.5 kN.m' is not a number; write it like -12.5"),
        (4, "1 234.5", "M: '1 234.5' has marks between thousands; write its digits without"),
        (4, "1'234'567", "has marks between thousands"),
        (4, "1\u202f234", "has marks between thousands"),
        (0, "7", "line 5: span 7; the beam has 2"),
        (1, "9.5", "line 5: station 9.5 m is outside span 1 of 8 m; write stations from the left"),
        (1, "-1", "line 5: station -1 m is outside span 1"),
    ],
)
def test_a_hostile_or_wrong_cell_is_named(column: int, cell: str, words: str) -> None:
    found = faults(lambda: forces(changed(3, column, cell)))
    assert found[0].startswith("forces: line 5")
    assert words in found[0]


def test_a_minus_as_printed_is_read() -> None:
    """U+2212, as typed quantities may have it, and as text copied from a page has it."""
    read = forces([line.replace("-", "\u2212") for line in rows()])
    assert np.array_equal(read.envelope.M, forces().envelope.M)
    assert np.array_equal(read.envelope.V, forces().envelope.V)


def test_a_comma_that_may_part_thousands_is_not_called_a_decimal_one() -> None:
    """1,234 kN.m read as 1.234 kN.m would be a thousandth."""
    found = faults(lambda: forces(changed(3, 4, '"1,234"')))
    assert "M: '1,234' has a comma; write a point if it is a decimal one, nothing if" in found[0]
    found = faults(lambda: forces(changed(3, 4, '"1,234.5"')))
    assert "M: '1,234.5' has marks between thousands" in found[0]


def test_a_decimal_comma_is_explained() -> None:
    lines = [line.replace(",", ";").replace(".", ",") for line in rows()]
    found = faults(lambda: forces(lines, HEADER.replace(",", ";")))
    assert "has a decimal comma; write a decimal point" in found[0]


@pytest.mark.parametrize(
    ("header", "words"),
    [
        (HEADER.replace("M (kN.m)", "M"), "heading 'M' has no unit; write 'M (kN.m)'"),
        (HEADER.replace("M (kN.m)", "M (kN)"), "has 'kN', a unit of force"),
        (HEADER.replace("M (kN.m)", "M (kNn)"), "'kNn' is not a unit of the list"),
        (HEADER.replace("M (kN.m)", "moment (kN.m)"), "heading 'moment (kN.m)' is not known"),
        (HEADER + ",N (kN)", "line 1: heading 'N (kN)' is not known; take the column out, or"),
        (HEADER + ",", "line 1: column 8 has no heading; take it out"),
        (HEADER.replace("M (kN.m)", "V (kN)"), "heading 'V (kN)' stands twice"),
        (HEADER.replace("case", "case (kN)"), "heading 'case' takes no unit"),
        (HEADER.replace("T (kN.m)", "M" * 500), "is not known"),
        ("span,station (m),combination,M (kN.m),V (kN)", "column 'case' is missing"),
    ],
)
def test_a_wrong_heading_is_named(header: str, words: str) -> None:
    assert any(words in fault for fault in faults(lambda: forces(header=header)))


@pytest.mark.parametrize("first", [HEADER.replace(",", "\t"), "sep=,", "Frame B7,,,,,,"])
def test_a_first_line_without_headings_is_told_once(first: str) -> None:
    (fault,) = faults(lambda: forces([HEADER, *rows()], first))
    assert "are no headings; write 'span,station (m),case,combination,M (kN.m),V (kN)'" in fault


def test_a_space_that_does_not_break_is_one_in_a_heading() -> None:
    read = forces(header=HEADER.replace(" ", "\u00a0"))
    assert np.array_equal(read.envelope.M, forces().envelope.M)


@pytest.mark.parametrize(
    ("content", "words"),
    [
        (b"", "the file is empty"),
        (b"\n\n", "the file is empty"),
        (HEADER.encode(), "no rows under the headings"),
        (HEADER.encode() + b"\n1,2\n", "line 2: 2 cells under 7 headings"),
        (
            HEADER.encode() + b"\n1,0,5,all,A,0,0,0",
            "8 cells under 7 headings; write decimal points",
        ),
        (HEADER.encode() + b'\n1,"2,3', "line 2: a quotation mark is not closed"),
        (HEADER.encode("utf-16"), "not UTF-8"),
        (HEADER.encode() + b"\n1,0,\xe9,A,0,0,0", "line 2: not UTF-8 at byte"),
        (HEADER.encode() + b"\n1,0,a\0b,A,0,0,0", "holds zero bytes"),
        (HEADER.encode() + b"\n" + b"1" * 2000, "line 2 is longer than 1000 characters"),
        (HEADER.encode() + b"\n1" * 200_001, "200002 lines, more than 200000"),
    ],
)
def test_what_is_no_table_is_refused(content: bytes, words: str) -> None:
    assert any(words in fault for fault in faults(lambda: read_forces(content, LENGTHS)))


def test_no_more_than_forty_faults_are_listed() -> None:
    lines = [line.replace(",1.4D,", ",=1,") for line in rows()]
    lines = [line.rsplit(",", 3)[0] + ",x,x,x" for line in lines]
    found = faults(lambda: forces(lines))
    assert len(found) == MOST_FAULTS + 1
    assert found[-1].endswith("faults more")


# -- statics ------------------------------------------------------------------------------------


def test_a_moment_that_does_not_follow_from_the_shear_is_found() -> None:
    found = faults(lambda: forces(changed(4, 4, "400")))
    assert (
        len(found) == 2
    )  # on the stretch before it, and across the load, where the station stands twice
    assert "M changes by" in found[0]
    assert "kN.m, but V gives" in found[0]
    assert "(lines 5, 6)" in found[0]


@pytest.mark.parametrize("column", [4, 5])
def test_a_file_with_m_or_v_turned_throughout_is_told_once(column: int) -> None:
    """Frame programs with moments positive at the top, or shears positive upwards on the right."""

    def turned(line: str) -> str:
        cells = line.split(",")
        cells[column] = str(-float(cells[column]))
        return ",".join(cells)

    (fault,) = faults(lambda: forces([turned(line) for line in rows()]))
    assert fault.endswith("write M or V with the other sign")


def test_one_span_with_m_and_v_turned_is_refused() -> None:
    """It closes by statics: its load acts upward in every case, of 1.25D at the least.

    Span 2 of 6 m carries D = 30 and L = 20 N/mm; in 0.9D alone V rises by 0.9*30*6 = 162 kN.
    """

    def turned(line: str) -> str:
        cells = line.split(",")
        if cells[0] == "2":
            cells[4:6] = [str(-float(cell)) for cell in cells[4:6]]
        return ",".join(cells)

    (fault,) = faults(lambda: forces([turned(line) for line in rows()]))
    assert "span 2: no case loads it downward, V falls by -162 kN at most (0.9D" in fault


def test_shears_in_the_wrong_unit_are_found() -> None:
    header = HEADER.replace("(kN)", "(N)")
    assert any("but V gives" in fault for fault in faults(lambda: forces(header=header)))


def test_moments_that_differ_across_a_station_are_found() -> None:
    _, envelope_of = own()
    load = envelope_of.marked("load", 1)[0]
    value = float(rows()[load].split(",")[4])
    found = faults(lambda: forces(changed(load, 4, f"{value + 60:.3f}")))
    assert any("on the left and" in fault and "must be the same" in fault for fault in found)


def test_missing_stations_spans_and_ends_are_found() -> None:
    all_rows = rows()
    without_end = [r for r in all_rows if not r.startswith("1,8.000")]
    assert any("span 1: no station at 8 m" in f for f in faults(lambda: forces(without_end)))
    gap = [r for r in all_rows if not r.startswith(("2,1.800", "2,2.400"))]
    assert any("no station between 1.2 and 3 m" in f for f in faults(lambda: forces(gap)))
    one_span = [r for r in all_rows if r.startswith("1,")]
    assert any("span 2: no station" in f for f in faults(lambda: forces(one_span)))
    first = next(r for r in all_rows if r.startswith("2,2.400"))
    without_one = [r for r in all_rows if r is not first]
    assert any("no station between 1.8 and 3 m" in f for f in faults(lambda: forces(without_one)))


def test_a_span_that_the_first_case_misses_is_not_told_of_the_others() -> None:
    without = [r for r in rows() if not (r.startswith("2,") and ",1.4D," in r)]
    (fault,) = faults(lambda: forces(without))
    assert fault.endswith("1.4D, all, span 2: no station; every case needs every span")


def test_a_case_with_other_stations_than_the_first_is_found() -> None:
    lines = [r for r in rows() if not (r.startswith("1,0.800") and ",1.4D," not in r)]
    extra = next(r for r in rows() if r.startswith("2,3.000") and ",0.9D + 1.5L," in r)
    found = faults(lambda: read_forces(as_csv([*lines, extra]), LENGTHS))
    assert any("no station between 0 and 1.6 m" in f for f in found)
    assert any("misses the right side of the station 0.8 m, unlike 1.4D" in f for f in found)
    assert any("has the left side of the station 3 m" in f for f in found)


def test_a_station_that_stands_three_times_is_found() -> None:
    line = next(r for r in rows() if r.startswith("1,1.600"))
    assert any(
        "stands more than 2 times" in f for f in faults(lambda: forces([*rows(), line, line]))
    )


def test_known_changes_of_load_need_a_station() -> None:
    read_forces(as_csv(rows()), LENGTHS, breaks={1: [3000.0]})
    found = faults(lambda: read_forces(as_csv(rows()), LENGTHS, breaks={2: [1333.0]}))
    assert "no station at 1.333 m" in found[0]


# -- reactions ----------------------------------------------------------------------------------


def reaction_rows() -> list[str]:
    solved, _ = own()
    return [
        f"{s + 1},{plain(case)},{case.combination},{R / 1e3:.2f}"
        for case, row in zip(solved.cases, solved.solution.reactions, strict=True)
        for s, R in enumerate(row.tolist())
    ]


def reactions(lines: list[str]) -> object:
    return read_reactions(as_csv(lines, "support,case,combination,R (kN)"), forces())


def test_reactions_are_the_jumps_of_the_shear() -> None:
    solved, _ = own()
    read = reactions(reaction_rows())
    assert isinstance(read, dict)
    assert np.allclose(list(read.values()), solved.solution.reactions, rtol=0, atol=6)


@pytest.mark.parametrize(
    ("change", "words"),
    [
        (lambda lines: lines[1:], "support 1: no reaction"),
        (lambda lines: [*lines, lines[0]], "support 1 stands twice"),
        (lambda lines: [*lines, "9,all,1.4D,4"], "support 9: no such case or support"),
        (lambda lines: [*lines, "1,all,9D,4"], "9D, all, support 1: no such case"),
        (lambda lines: ["1,all,1.4D,-40", *lines[1:]], "reaction -40 kN, but V jumps by"),
    ],
)
def test_wrong_reactions_are_named(change: Callable[[list[str]], list[str]], words: str) -> None:
    assert any(words in fault for fault in faults(lambda: reactions(change(reaction_rows()))))


def test_a_case_that_stands_twice_as_a_whole_is_told_once_a_span() -> None:
    """Not as a fault of each of its stations, and of each that the other cases have once."""
    again = [line for line in rows() if ",1.4D," in line]
    found = faults(lambda: forces([*rows(), *again]))
    assert len(found) == len(LENGTHS)
    assert all("1.4D, all, span" in f and "all stations stand twice" in f for f in found)
