"""Imported forces on the sheet: the same design, lines followed by hand, refusals."""

from __future__ import annotations

import os
from collections.abc import Callable, Mapping
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from lineproof import beams
from lineproof.beams.continuous.case_forces import record_forces
from lineproof.beams.continuous.faces import faces_of, sagging_spans
from lineproof.beams.continuous.forces import Demand
from lineproof.beams.continuous.imported_torsion import record_imported_torsion
from lineproof.beams.continuous.model import Model
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.record import Entry, Record
from lineproof.record.recompute import recompute

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from . import frame_files
from .flow import CALLS, MIXED, analysed, close_anyway, record_so_far, run, start

EQUAL = 1e-9
ROUNDED = 1e3
"""A file with three decimals of kN.m knows M to 500 N.mm; between stations the load adds a little
more: 0.001 kN of V over 0.4 m, an eighth of it."""


@pytest.fixture(scope="module")
def own() -> beams.ContinuousBeam:
    beam = analysed()
    beam.flexure()
    return beam


@pytest.fixture
def files(tmp_path: Path, own: beams.ContinuousBeam) -> dict[str, Any]:
    forces = own.model.forces
    return {
        "forces_csv": frame_files.write(
            tmp_path / "frame.csv", frame_files.rows_of(forces, decimals=3)
        ),
        "reactions_csv": frame_files.write(
            tmp_path / "reactions.csv", frame_files.reaction_rows(forces), frame_files.REACTIONS
        ),
    }


def refused(call: Callable[[], object]) -> list[str]:
    with pytest.raises(UserError) as caught:
        call()
    return list(caught.value.faults)


def texts(record: Record, part: str) -> str:
    """Return all notes of a part as one text."""
    return " ".join(
        entry["text"]
        for each in record.data["parts"]
        if each["key"] == part
        for entry in each["entries"]
        if entry["kind"] == "note"
    )


def value(record: Record, entry_id: str) -> float:
    return float(record.entries[entry_id]["value"])


# -- the same design ------------------------------------------------------------------------------


def test_flexure_is_that_of_our_own_analysis(
    own: beams.ContinuousBeam, files: dict[str, Any]
) -> None:
    beam = analysed(**files)
    beam.flexure()
    for span in sagging_spans(own.model):
        assert (
            pytest.approx(own.model.forces.sag(span).M, abs=ROUNDED)
            == beam.model.forces.sag(span).M
        )
    for face in faces_of(own.model):
        ours, theirs = (b.model.forces.hog(face.support, face.side) for b in (own, beam))
        assert pytest.approx(ours.M, abs=ROUNDED) == theirs.M
    first, second = record_so_far(own), record_so_far(beam)
    for part in ("sag-1", "sag-2", "sag-3", "hog-1-right", "hog-2-left", "hog-3-right"):
        assert value(second, f"{part}/A_s") == value(first, f"{part}/A_s")
        assert value(second, f"{part}/M_f") == pytest.approx(
            value(first, f"{part}/M_f"), abs=ROUNDED / 1e6
        )
        assert value(second, f"{part}/M_r") == value(first, f"{part}/M_r")


def test_record_recomputes_and_is_followed_by_hand(files: dict[str, Any]) -> None:
    beam = analysed(**files)
    beam.flexure()
    record = record_so_far(beam)
    assert recompute(record) == []
    assert list(faults(record.data)) == []


@pytest.mark.parametrize("changes", [{}, MIXED], ids=["three spans", "mixed"])
@pytest.mark.parametrize("decimals", [1, 6])
def test_recorded_forces_are_the_numbers_of_the_choice(
    tmp_path: Path, changes: dict[str, Any], decimals: int
) -> None:
    forces = analysed(**changes).model.forces
    lines = frame_files.rows_of(forces, decimals=decimals)
    path = frame_files.write(tmp_path / "frame.csv", lines)
    model = analysed(**changes, forces_csv=path).model
    model.sheet.expected = {}
    for demand, near, key in _places(model):
        x_text = f"{_from(model, demand, near) / 1000!r} m"
        with model.sheet.part(key, "Forces of one case"):
            steps = Steps(model.sheet, {})
            x = None if key.startswith("s") else model.sheet.given("x_f", x_text)
            record_forces(steps, model, demand, near, x=x)
            assert steps.place["M_f"].value == pytest.approx(abs(demand.M), rel=EQUAL, abs=1.0)
            assert steps.place["V_f"].value == pytest.approx(abs(demand.V), rel=EQUAL, abs=1e-2)
            assert steps.place["x_f"].value == pytest.approx(_from(model, demand, near), rel=EQUAL)
    record = close_anyway(model.sheet)
    assert recompute(record) == []
    assert list(faults(record.data)) == []


def _from(model: Model, demand: Demand, near: str) -> float:
    length = model.lengths[demand.span - 1].value
    return demand.x if near == "left" else length - demand.x


def _places(model: Model) -> list[tuple[Demand, Any, str]]:
    """Return the places of flexure, and quarter points of every span in every case."""
    made: list[tuple[Demand, Any, str]] = []
    for span in sagging_spans(model):
        made += [(model.forces.sag(span), near, f"s{span}-{near}") for near in ("left", "right")]
    for face in faces_of(model):
        made.append((model.forces.hog(face.support, face.side), face.near, face.key))
    for span in range(1, model.spans + 1):
        x = model.lengths[span - 1].value / 4
        for row in range(len(model.forces.cases)):
            near = "left" if row % 2 else "right"
            made.append((model.forces.demand(span, x, "left", row), near, f"q{span}-{row}"))
    return made


# -- lateral load ---------------------------------------------------------------------------------


def frame(tmp_path: Path, cases: dict[str, tuple[float, float, float]]) -> str:
    """Write a span of 8 m: by case M_0 [kN.m], V_0 [kN] and w [kN/m] in M_0 + V_0 x - w x^2/2."""
    lines = [
        f"1,{x:.1f},{case},1.0D + 0.5L + 1.0E,{M + V * x - w * x * x / 2:.6f},{V - w * x:.6f},0"
        for case, (M, V, w) in cases.items()
        for x in (0.8 * n for n in range(11))
    ]
    return frame_files.write(tmp_path / "frame.csv", lines)


ONE_SPAN = {"spans": ["8 m"], "supports": ["column 450 mm"] * 2}
EAST_AND_WEST = {"east": (80.0, 70.0, 30.0), "west": (-320.0, 170.0, 30.0)}
"""w l^2/8 = 240 kN.m, gravity ends of -120, lateral load of +200 and -200: V = 120 -+ 50."""


def test_lateral_cases_reverse_the_moments(tmp_path: Path) -> None:
    """By hand: east has its largest moment at 70/30 = 2.333 m, 80 + 70^2/60 = 161.667 kN.m.

    West at the left face: -320 + 170 x 0.225 - 15 x 0.225^2 = -282.509 kN.m; east mirrored at the
    right face: 80 + 70 x 7.775 - 15 x 7.775^2 = -282.509 kN.m. No restraint is assumed there.
    """
    beam = analysed(**ONE_SPAN, forces_csv=frame(tmp_path, EAST_AND_WEST))
    beam.flexure()
    record = record_so_far(beam)
    assert value(record, "sag-1/M_f") == pytest.approx(80 + 70**2 / 60, rel=1e-6)
    for part in ("hog-1-right", "hog-2-left"):
        assert value(record, f"{part}/M_f") == pytest.approx(282.509, abs=0.001)
        assert f"{part}/restraint" not in record.entries
    assert "west" in record.entries["hog-1-right/M_f"]["title"]
    assert "east" in record.entries["hog-2-left/M_f"]["title"]
    assert recompute(record) == []
    assert list(faults(record.data)) == []


def test_small_end_moments_leave_the_assumed_restraint(tmp_path: Path) -> None:
    """With M of -20 kN.m at the ends the restraint of w l^2/16 is more: 30 x 64/16 = 120 kN.m."""
    path = frame(tmp_path, {"gravity": (-20.0, 120.0, 30.0)})
    beam = analysed(**ONE_SPAN, forces_csv=path)
    beam.flexure()
    record = record_so_far(beam)
    assert value(record, "hog-1-right/M_f") == pytest.approx(120.0, rel=EQUAL)
    assert "gives no larger moment here" in texts(record, "hog-1-right")
    assert recompute(record) == []
    assert list(faults(record.data)) == []


def test_largest_moment_at_the_face_is_recorded_there(tmp_path: Path) -> None:
    """300 - 90 x - 2 x^2 falls from the left: at 0.225 m 279.649 kN.m (by hand)."""
    beam = analysed(**ONE_SPAN, forces_csv=frame(tmp_path, {"wind": (300.0, -90.0, 4.0)}))
    beam.flexure()
    record = record_so_far(beam)
    assert value(record, "sag-1/x_f") == pytest.approx(0.225)
    assert value(record, "sag-1/M_f") == pytest.approx(279.649, abs=0.001)
    assert list(faults(record.data)) == []


# -- torsion --------------------------------------------------------------------------------------


@pytest.mark.parametrize("near", ["left", "right"])
@pytest.mark.parametrize("x", [2100.0, 3040.0])
def test_torsion_of_a_case_is_recorded(
    tmp_path: Path, own: beams.ContinuousBeam, near: Any, x: float
) -> None:
    """T = 30 - 60 x/7.6: 30 - 16.579 = 13.421 kN.m at 2.1 m, 6 kN.m at 3.04 m, a station."""
    rows = frame_files.rows_of(
        own.model.forces, torsion=lambda _, at: round(30.0 - 60.0 * at / 7600.0, 6)
    )
    model = analysed(forces_csv=frame_files.write(tmp_path / "frame.csv", rows)).model
    forces = model.imported
    assert forces is not None
    demand = model.forces.demand(1, x, "right", 2)
    model.sheet.expected = {}
    with model.sheet.part("torsion", "Torsion of one case"):
        steps = Steps(model.sheet, {})
        at = model.sheet.given("x_f", f"{_from(model, demand, near) / 1000!r} m")
        record_forces(steps, model, demand, near, x=at)
        record_imported_torsion(steps, forces, demand, near)
        T_f = steps.place["T_f"].value
    assert T_f == pytest.approx((30 - 60 * x / 7600) * 1e6, abs=2.0)
    assert abs(forces.imported_torsion(1, np.array([x]))[2, 0]) == pytest.approx(T_f, rel=EQUAL)
    record = close_anyway(model.sheet)
    assert recompute(record) == []
    assert list(faults(record.data)) == []


def test_imported_torsion_is_designed_for(tmp_path: Path, own: beams.ContinuousBeam) -> None:
    """T linear from 30 to -30 kN.m over each span: closed stirrups, T_f of the straight line.

    At d_v from the left face of span 1, x from the axis of 7.6 m: 30 - 60 x/7.6.
    """
    lengths = {1: 7600.0, 2: 9200.0, 3: 7600.0}
    rows = frame_files.rows_of(
        own.model.forces, torsion=lambda span, at: round(30.0 - 60.0 * at / lengths[span], 6)
    )
    path = frame_files.write(tmp_path / "frame.csv", rows)
    more = {"torsion": "equilibrium", "closed_stirrups": True}
    beam = analysed(forces_csv=path, **more)
    beam.flexure()
    beam.shear()
    record = record_so_far(beam)
    sections = [i.partition("/")[0] for i in record.entries if i.endswith("/T_f")]
    assert len(sections) >= 6
    for part in sections:
        x = value(record, f"{part}/x_f" if f"{part}/x_s" not in record.entries else f"{part}/x_s")
        length = lengths[int(part.split("-")[1])] / 1000
        assert value(record, f"{part}/T_f") == pytest.approx(abs(30 - 60 * x / length), abs=1e-4)
    assert record.entries["shear-1-left/torsion-counts"]["holds"]
    assert "is that of the frame analysis" in texts(record, "torsion-1")
    assert recompute(record) == []
    assert list(faults(record.data)) == []


def test_torques_beside_a_file_are_refused(files: dict[str, Any]) -> None:
    found = refused(lambda: start(**files, torques={"D": "4 kN.m"}))
    assert len(found) == 1
    assert found[0].startswith("torques: with forces_csv torsion is the column T of the file")


# -- what stands on the page ----------------------------------------------------------------------


def test_the_page_says_where_the_forces_come_from(files: dict[str, Any]) -> None:
    record = record_so_far(analysed(**files))
    said = texts(record, "analysis")
    for words in (
        "file frame.csv, 15 load cases in 3 combinations",
        "M is positive where the bottom is in tension",
        "positive where the part on the left is held up",
        "M changes by the area of V, within 1 %",
        "every reaction of reactions.csv is the jump of V",
        "without torsion",
    ):
        assert words in said
    assert "no moment follows from the loads of this part" in texts(record, "loads")
    assert "live load stands on the spans that are worst" not in texts(record, "loads")
    assert "coefficients/coefficients" not in record.entries
    missing = {row["check"] for row in record.data["status"]["not_covered"]}
    assert any(check.startswith("Deflections") for check in missing)
    assert any("resist lateral loads" in check for check in missing)
    # 7.6 m at 1.25D + 1.5L on every span: the load of the file is that of the take-down.
    rows = record.entries["analysis/imported-loads"]["rows"]
    assert [row[-1] for row in rows] == ["1.00"] * 3


def test_reactions_are_those_of_the_file(own: beams.ContinuousBeam, files: dict[str, Any]) -> None:
    """The largest reaction of every support is that of our own statics, to the printed digits."""
    rows = record_so_far(analysed(**files)).entries["analysis/imported-reactions"]["rows"]
    ours = own.model.forces.solved.solution.reactions.max(axis=0) / 1e3
    assert [row[0] for row in rows] == ["1", "2", "3", "4"]
    assert [float(row[1]) for row in rows] == pytest.approx(ours.tolist(), abs=0.051)


def test_all_calls_run_and_deflections_are_named_as_not_covered(files: dict[str, Any]) -> None:
    """The cells of a notebook stay as they are; nothing of a deflection is computed or checked."""
    record = run(start(**files)).close()
    assert "NOT checked here" in texts(record, "service")
    assert not any(key.startswith("deflection-") for key in record.entries)
    missing = [row["check"] for row in record.data["status"]["not_covered"]]
    assert sum(check.startswith("Deflections:") for check in missing) == 1
    assert list(record.failed) == list(run(start(**files), NO_DEFLECTIONS).close().failed)


NO_DEFLECTIONS = tuple(call for call in CALLS if call != "deflections")


@pytest.mark.parametrize(("kN", "rows_told"), [(60, 1), (0.5, 0)])
def test_point_loads_of_a_file_ask_for_hangers(tmp_path: Path, kN: float, rows_told: int) -> None:
    """A jump of V by at least 1.4 x 60 kN within span 2 is a beam carried there; 0.7 kN is none."""
    loads = [{"type": "D", "span": 2, "point": f"{kN} kN", "at": "3 m", "what": "beam B3"}]
    rows = frame_files.rows_of(analysed(loads=loads).model.forces)
    beam = start(forces_csv=frame_files.write(tmp_path / "frame.csv", rows))
    found = [row for row in beam.sheet.not_covered if "point loads of the file" in row["check"]]
    assert [row["clause"] for row in found] == ["11.2.12"] * rows_told


def test_no_path_of_the_machine_is_recorded(files: dict[str, Any], tmp_path: Path) -> None:
    assert os.fspath(tmp_path) not in str(record_so_far(analysed(**files)).data)


def test_digest_follows_the_file(files: dict[str, Any]) -> None:
    """A number used nowhere changes the hash of the file, and with it the record."""
    first = record_so_far(analysed(**files))
    path = Path(files["forces_csv"])
    changed = path.read_text().replace(",no such case", ",").splitlines()
    cells = changed[5].split(",")
    cells[4] = repr(float(cells[4]) + 0.001)
    changed[5] = ",".join(cells)
    path.write_text("\n".join(changed) + "\n")
    second = record_so_far(analysed(**files))
    assert first.digest != second.digest
    assert (
        first.entries["analysis/file-hash"]["text"]
        != (second.entries["analysis/file-hash"]["text"])
    )


def test_path_is_read_from_the_working_directory(
    files: dict[str, Any], tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.chdir(tmp_path)
    beam = analysed(forces_csv="frame.csv")
    assert beam.inputs.forces_file is not None
    assert beam.inputs.forces_file.name == Path(files["forces_csv"]).name


# -- refusals -------------------------------------------------------------------------------------


def changed_file(files: dict[str, Any], change: Callable[[list[str]], list[str]]) -> str:
    path = Path(files["forces_csv"])
    path.write_text("\n".join(change(path.read_text().splitlines())) + "\n")
    return str(path)


def with_cell(line: int, column: int, text: str) -> Callable[[list[str]], list[str]]:
    def change(lines: list[str]) -> list[str]:
        cells = lines[line].split(",")
        cells[column] = text
        return [*lines[:line], ",".join(cells), *lines[line + 1 :]]

    return change


@pytest.mark.parametrize(
    ("change", "words"),
    [
        (with_cell(5, 4, "=1+1"), "line 6, M: '=1+1' is a formula; save the values"),
        (with_cell(5, 2, "=HYPERLINK(1)"), "line 6, case: '=HYPERLINK(1)' could run as a formula"),
        (with_cell(5, 3, "@SUM(A1)"), "could run as a formula"),
        (with_cell(5, 4, "900"), "look at signs and units"),
        (with_cell(5, 5, "-900"), "but V gives"),
        (with_cell(0, 4, "M"), "heading 'M' has no unit; write 'M (kN.m)'"),
        (lambda lines: [x for x in lines if not x.startswith("3,7.6")], "no station at 7.6 m"),
        (lambda lines: [x for x in lines if not x.startswith("3,")], "no station; every case"),
        (lambda lines: [lines[0]], "no rows under the headings"),
        (lambda _: ["\u0000"], "zero bytes"),
    ],
)  # fmt: skip
def test_a_bad_file_is_named_with_its_line(
    files: dict[str, Any], change: Callable[[list[str]], list[str]], words: str
) -> None:
    path = changed_file(files, change)
    found = refused(lambda: start(forces_csv=path))
    assert all(fault.startswith("forces_csv: frame.csv: ") for fault in found)
    assert any(words in fault for fault in found)


def test_a_file_of_other_spans_is_refused(files: dict[str, Any]) -> None:
    found = refused(lambda: start(**files, spans=["7.6 m", "9.0 m", "7.6 m"]))
    assert "station 9.2 m is outside span 2 of 9 m" in found[0]
    found = refused(lambda: start(**files, spans=["7.6 m", "9.2 m", "7.8 m"]))
    assert any("span 3: no station at 7.8 m" in fault for fault in found)


@pytest.mark.parametrize(
    ("given", "words"),
    [
        ("no-such.csv", "'no-such.csv': no such file; write its path from the folder"),
        (".", "'.': a folder, no file; write its path"),
        ("", "is no path of a file"),
        ("a\u0000b.csv", "is no path of a file"),
        ("a\nb.csv", "is no path of a file"),
        (7, "is no path of a file"),
        ("x" * 2000, "is no path of a file"),
        ("x" * 900, "cannot be read: File name too long"),
    ],
)
def test_a_path_that_is_none_is_refused(given: Any, words: str) -> None:
    found = refused(lambda: start(forces_csv=given))
    assert len(found) == 1
    assert found[0].startswith("forces_csv: ")
    assert words in found[0]


def test_a_huge_file_is_not_read_whole(tmp_path: Path) -> None:
    path = tmp_path / "huge.csv"
    with path.open("wb") as stream:
        stream.truncate(50_000_000_000)  # sparse
    (found,) = refused(lambda: start(forces_csv=str(path)))
    assert found.endswith("is larger than 20 MB; export fewer cases")


def test_all_faults_come_at_once(files: dict[str, Any]) -> None:
    path = changed_file(files, with_cell(5, 4, "=1+1"))
    found = refused(
        lambda: start(
            forces_csv=path, reactions_csv="none.csv", redistribution={2: 10}, cover="-30 mm"
        )
    )
    for words in ("is a formula", "reactions_csv: 'none.csv'", "redistribution: the moments of",
                  "cover: "):  # fmt: skip
        assert any(words in fault for fault in found), words


def test_reactions_need_forces_and_must_be_the_jumps(files: dict[str, Any]) -> None:
    found = refused(lambda: start(reactions_csv=files["reactions_csv"]))
    assert len(found) == 1
    assert found[0].startswith("reactions_csv: goes with forces_csv")
    path = Path(files["reactions_csv"])
    lines = path.read_text().splitlines()
    lines[2] = with_cell(0, 3, "999")([lines[2]])[0]
    path.write_text("\n".join(lines))
    found = refused(lambda: start(**files))
    assert found[0].startswith("reactions_csv: reactions.csv: ")
    assert "reaction 999 kN, but V jumps by" in found[0]


def test_redistribution_of_imported_moments_is_refused(files: dict[str, Any]) -> None:
    found = refused(lambda: start(**files, redistribution={2: 10}))
    assert len(found) == 1
    assert "not ours to redistribute" in found[0]


def test_a_given_load_must_be_a_station_of_the_file(files: dict[str, Any]) -> None:
    load = {"type": "D", "span": 2, "point": "60 kN", "at": "3.111 m", "what": "beam B12"}
    found = refused(lambda: start(**files, loads=[load]))
    assert any("span 2: no station at 3.111 m" in fault for fault in found)


def test_a_moment_at_a_free_end_is_refused(tmp_path: Path) -> None:
    path = frame(tmp_path, {"gravity": (-20.0, 120.0, 30.0)})
    supports = ["free", "wall 300 mm, fixed"]
    found = refused(lambda: start(spans=["8 m"], supports=supports, forces_csv=path))
    assert "M is -20 kN.m at support 1, which is given as a free end" in found[0]


def simple_span(folder: Path, sign: float = 1) -> Mapping[str, Entry]:
    """Analyse 7 m by a file with M = 42*x - 6*x**2 [kN.m] and V = 42 - 12*x [kN], times a sign."""
    places = [x / 2 for x in range(15)]
    rows = [
        f"1,{x},all,1.25D+1.5L,{sign * (42 * x - 6 * x**2)},{sign * (42 - 12 * x)}" for x in places
    ]
    header = "span,station (m),case,combination,M (kN.m),V (kN)"
    beam = analysed(
        spans=["7 m"], supports=["column 450 mm"] * 2,
        forces_csv=frame_files.write(folder / "frame.csv", rows, header),
    )  # fmt: skip
    return beam.sheet.entries_of("analysis")


def test_a_file_of_unfactored_loads_fails_against_the_take_down(tmp_path: Path) -> None:
    """One span of 7 m at 12 kN/m: V falls by 84 kN, M = 42*x - 6*x**2.

    Slab 24*0.14*3.1 = 10.416, web 24*0.38*0.48 = 4.3776, superimposed 1.8*3.1 = 5.58: w_D =
    20.3736 kN/m; w_L = 4.8*3.1 = 14.88 kN/m. 1.25D + 1.5L:
    7*(1.25*20.3736 + 1.5*14.88) = 334.51 kN.
    """
    entries = simple_span(tmp_path)

    check = entries["imported-load-1"]
    assert not check
    assert entries["W_f1"].value == pytest.approx(84e3)
    assert entries["W_d1"].value == pytest.approx(334.51e3, abs=10)
    assert check.value == pytest.approx((0.9 * 334.51e3, 84e3), abs=10)


def test_a_file_with_both_signs_turned_is_refused(tmp_path: Path) -> None:
    """M = 6*x**2 - 42*x with V = 12*x - 42 closes by statics, but its load of 84 kN acts upward.

    Bars chosen for it would stand at the wrong face, and a message that asks for more of them would
    hide why.
    """
    (fault,) = refused(lambda: simple_span(tmp_path, -1))
    assert "span 1: no case loads it downward, V falls by -84 kN at most (1.25D+1.5L, all)" in fault
    assert "write both with the other sign in this span" in fault


def test_a_file_in_other_units_than_its_header_is_refused(tmp_path: Path) -> None:
    """N.m and N under a header of kN.m and kN: 84 000 kN for 334.51, 251 times as much.

    Statics hold in it, and bars would be sought in vain for such moments.
    """
    (fault,) = refused(lambda: simple_span(tmp_path, 1000))
    assert "span 1: the load of 1.25D+1.5L, all is 84000 kN, 251 times the 334.5 kN" in fault
    assert "name the units of the file in its header, such as 'M (N.m)'" in fault


def test_a_case_left_out_of_a_combination_shows_in_the_table(tmp_path: Path) -> None:
    """West is missing in 0.9D + 1.4W, which shares east with the other; 1.4D shares none."""
    cases = [("1.4D", "all")]
    cases += [("1.25D + 1.4W", "east"), ("1.25D + 1.4W", "west"), ("0.9D + 1.4W", "east")]
    rows = [
        f"1,{x / 2},{case},{combination},{42 * x / 2 - 6 * (x / 2) ** 2},{42 - 6 * x}"
        for combination, case in cases
        for x in range(15)
    ]
    header = "span,station (m),case,combination,M (kN.m),V (kN)"
    entries = analysed(
        spans=["7 m"], supports=["column 450 mm"] * 2,
        forces_csv=frame_files.write(tmp_path / "frame.csv", rows, header),
    ).sheet.entries_of("analysis")  # fmt: skip

    assert entries["imported-combinations"].source.content["rows"] == [
        ["1.4D", "all", "–"],
        ["1.25D + 1.4W", "east; west", "–"],
        ["0.9D + 1.4W", "east", "west"],
    ]
