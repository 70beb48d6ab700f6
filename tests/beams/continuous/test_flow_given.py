"""Bars and stirrups given are checked as they stand; nothing half-designed closes."""

from __future__ import annotations

import json
from collections.abc import Mapping
from typing import Any

import pytest
from tests.beams.pocket import faults

from lineproof.beams.continuous import beam as beam_module
from lineproof.beams.continuous.detailing_record import record_detailing
from lineproof.beams.continuous.resistance_cover import covered
from lineproof.errors import UserError
from lineproof.record import Record, recompute

from .beam_with_gaps import built, row
from .flow import CALLS, record_of, run, start

BOTTOM = {"face": "bottom", "bars": "4-25M", "start": "-0.15 m", "end": "24.55 m"}
TOP = {"face": "top", "bars": "5-25M", "start": "-0.15 m", "end": "24.55 m"}
TIGHT = [{"span": k, "spacing": "100 mm"} for k in (1, 2, 3)]
"""Stirrups that are enough everywhere."""
WEAK: Mapping[str, tuple[Mapping[str, Any], set[str]]] = {
    "bottom bars": (
        {"bottom_bars": "2-15M"}, {"sag-1/strength", "sag-2/strength", "coverage-bottom/strength"},
    ),
    "top bars": (
        {"top_bars": "2-15M"},
        {"hog-2-left/strength", "hog-3-right/strength", "coverage-top/strength"},
    ),
    "both": ({"bottom_bars": "2-15M", "top_bars": "2-15M"}, {"sag-2/strength"}),
    "bars along the beam": (
        {"bar_runs": [BOTTOM | {"bars": "2-15M"}, TOP | {"bars": "2-15M"}]},
        {"sag-2/strength", "coverage-bottom/strength", "coverage-top/strength"},
    ),
    "bars along the beam, stirrups": (
        {"bar_runs": [BOTTOM | {"bars": "2-15M"}, TOP | {"bars": "2-15M"}], "stirrups": TIGHT},
        {"sag-2/strength", "coverage-bottom/strength", "coverage-top/strength"},
    ),
    "wide stirrups": (
        {"stirrups": [{"span": k, "spacing": "500 mm"} for k in (1, 2, 3)]},
        {"shear-1-right/stirrup-spacing", "shear-2-left/stirrup-spacing"},
    ),
    "no stirrups": ({"stirrups": []}, {"shear-1-right/shear-strength"}),
    "no stirrups in one span": (
        {"stirrups": [row for row in TIGHT if row["span"] != 2]}, {"shear-2-left/shear-strength"},
    ),
}  # fmt: skip


@pytest.mark.parametrize("name", WEAK)
def test_what_is_given_too_weak_fails(name: str) -> None:
    """A failing check, not an error; the record closes, says FAILS, and can be redone."""
    changes, wanted = WEAK[name]
    record = record_of(**changes)
    assert wanted <= set(record.failed)
    assert recompute(Record.from_text(record.to_text())) == []
    assert list(faults(record.data)) == []
    summary = [part for part in record.data["parts"] if part["key"] == "summary"]
    assert "FAILS" in json.dumps(summary)


def test_what_is_given_strong_enough_holds() -> None:
    """The same beam with bars and stirrups of its own proposal given: nothing fails."""
    record = record_of(stirrups=TIGHT)
    assert record.failed == []
    assert "FAILS" not in json.dumps(record.data["parts"])


def test_bars_given_are_not_changed() -> None:
    """5-20M below span 2, 3-30M above support 2 stay what they are; the others are chosen."""
    beam = start(bottom_bars=[None, "5-20M", None], top_bars=[None, "3-30M", None, None])
    run(beam)
    entry = beam.sheet.entry
    assert entry("sag-2/A_s").value == 1500
    assert entry("hog-2-left/n_t").value == 3
    assert entry("hog-2-left/A_b").value == 700
    assert not any(key.startswith("sag-1") for key in beam.sheet.close().failed)


def test_the_thicker_bars_may_lie_in_the_second_layer() -> None:
    """3-20M below 2-25M: 900 + 1000 mm2, by the larger bar 1900/500 = 3.8 bars (10.6.1)."""
    sheet = run(start(bottom_bars=["3-20M / 2-25M", None, None]), CALLS[:4])
    assert sheet.entry("sag-1/n_z").value == pytest.approx(3.8)


def test_runs_given_stay_as_they_are() -> None:
    beam = start(bar_runs=[BOTTOM, TOP])
    run(beam)
    made = [(r.face, r.number, r.size, r.start, r.end) for r in beam.design.runs]
    assert made == [("bottom", 4, "25M", -150, 24550), ("top", 5, "25M", -150, 24550)]


@pytest.mark.parametrize("call", CALLS[3:])
def test_a_part_that_could_not_be_computed_stops_the_package(
    call: str, monkeypatch: pytest.MonkeyPatch
) -> None:
    """A chapter that stops, before or after its parts, keeps the sheet from closing."""
    function = {
        "flexure": "record_cover", "shear": "record_shear", "deflections": "record_deflections",
        "anchorage": "record_anchorage", "schedule": "record_schedule",
        "summary": "record_summary",
    }[call]  # fmt: skip
    whole = getattr(beam_module, function)
    for late in (False, True):
        beam = start()
        run(beam, CALLS[: CALLS.index(call)])

        def stop(*args: Any, whole: Any = whole, late: bool = late) -> None:
            if late:
                whole(*args)
            raise UserError("nothing can be computed here")

        with monkeypatch.context() as patch:
            patch.setattr(beam_module, function, stop)
            with pytest.raises(UserError, match="nothing can be computed here"):
                getattr(beam, call)()
        for later in CALLS[CALLS.index(call) + 1 :]:
            if later in ("schedule", "summary"):
                with pytest.raises(UserError, match=r"run beam\.\w+\(\) first"):
                    getattr(beam, later)()
        with pytest.raises(UserError, match=rf"beam\.{call}\(\)"):
            beam.sheet.close()
        run(beam, CALLS[CALLS.index(call) :])
        assert beam.sheet.close().failed == []


def test_a_part_that_breaks_off_stops_the_package(monkeypatch: pytest.MonkeyPatch) -> None:
    """A part with half of its lines is not read by others, and the sheet does not close."""
    beam = start()
    run(beam, CALLS[:3])
    with monkeypatch.context() as patch:
        patch.setattr("lineproof.beams.continuous.flexure.record_yield", None)
        with pytest.raises(TypeError):
            beam.flexure()
    for call in ("shear", "deflections", "anchorage", "schedule", "summary"):
        with pytest.raises(UserError, match=r"run beam\.flexure\(\) first"):
            getattr(beam, call)()
    with pytest.raises(UserError, match="stopped with an error"):
        beam.sheet.close()


def test_a_proposal_that_does_not_cover_is_refused(monkeypatch: pytest.MonkeyPatch) -> None:
    """Bars chosen here that leave a gap are no proposal: refused with the gap, not printed."""

    def with_a_gap(writers: Any, runs: Any) -> Any:
        record_detailing(writers, runs)
        shorter = [r for r in runs if r.serves != "span 2"]
        return covered(writers.designed, shorter)

    beam = start()
    run(beam, CALLS[: CALLS.index("anchorage")])
    with monkeypatch.context() as patch:
        patch.setattr("lineproof.beams.continuous.anchorage_chapter.record_detailing", with_a_gap)
        with pytest.raises(UserError, match="bars: Not enough bottom bars, span 2,"):
            beam.anchorage()
    with pytest.raises(UserError, match=r"beam\.anchorage\(\) stopped with an error"):
        beam.sheet.close()


def test_a_deep_beam_without_stirrups_shows_its_largest_shear_too() -> None:
    """That the depth asks for stirrups hides no shear: every section fails 11.2.8.1 alike.

    6 m between walls of 300 mm, 400 x 800 mm: D = 24 x 0.4 x 0.8 + (4 + 1) x 3 = 22.68 kN/m and
    L = 9.6 x 3 = 28.8 kN/m, 1.25D + 1.5L = 71.55 kN/m. d = 800 - 30 - 11.3 - 19.5/2 = 748.95 mm,
    d_v = 0.9d = 674.06 mm; at d_v from the face V_f = 71.55(3 - 0.15 - 0.67406) = 155.7 kN.
    beta = 230/(1000 + 674.06) (11.3.6.3), V_c = 0.65 beta sqrt(30) x 400 x 674.06 = 131.9 kN.
    1.4D alone, the first of the load cases, would be 69.1 kN and hold.
    """
    runs = [row("bottom", "4-20M", -0.1, 6.1), row("top", "2-15M", -0.1, 6.1)]
    _, sheet = built(
        runs, spans=["6 m"], supports=["wall 300 mm"] * 2, h="800 mm", live_load="9.6 kPa"
    )
    for end in ("left", "right"):
        entries = sheet.entries_of(f"shear-1-{end}")
        assert entries["V_f"].value == pytest.approx(155.69e3, rel=1e-4)
        assert entries["V_r"].value == pytest.approx(131.89e3, rel=1e-4)
    fail = {f"shear-1-{end}/{key}" for end in ("left", "right")
            for key in ("depth-without-stirrups", "shear-strength")}  # fmt: skip
    assert fail <= set(sheet.close().failed)


def test_a_strain_out_of_range_hides_no_shear_beside_it() -> None:
    """Bars far too few at midspan; nearer to the support, in the same zone, the shear is too large.

    9 m between walls, 400 x 500 mm, 2-20M: D = 4.8 + 15 kN/m, L = 4.5 x 3, 1.25D + 1.5L = 45 kN/m.
    d_v = 0.9(500 - 30 - 11.3 - 9.75) = 404.06 mm. At 1.35 m from the axis of the wall, in 10M at
    280 mm: V_f = 45(4.5 - 1.35) = 141.75 kN, M_f = 45(4.5 x 1.35 - 1.35**2/2) = 232.4 kN.m,
    eps_x = (232.4e6/404.06 + 141750)/(2 x 200000 x 600) = 0.00299, the largest in range.
    beta = 0.40/(1 + 1500 eps_x) = 0.0730, V_c = 0.65 beta sqrt(30) x 400 x 404.06 = 42.0 kN;
    theta = 29 + 7000 eps_x = 49.9 degrees, V_s = 0.85 x 200 x 400 x 404.06 cot(49.9)/280 = 82.6 kN.
    """
    zones = (
        ("0 m", "0.85 m", "150 mm"),
        ("0.85 m", "7.85 m", "280 mm"),
        ("7.85 m", "8.7 m", "150 mm"),
    )
    _, sheet = built(
        [row("bottom", "2-20M", -0.1, 9.1), row("top", "2-15M", -0.1, 9.1)],
        spans=["9 m"], supports=["wall 300 mm"] * 2, shear_method="general", live_load="4.5 kPa",
        stirrups=[{"span": 1, "from": a, "to": b, "spacing": s} for a, b, s in zones],
    )  # fmt: skip
    failed = {
        key.split("/")[1]: key.split("/")[0] for key in sheet.close().failed if "along" in key
    }

    assert set(failed) == {"shear-strength", "strain-range"}
    entries = sheet.entries_of(failed["shear-strength"])
    assert entries["x_f"].value == pytest.approx(1350)
    assert entries["V_f"].value == pytest.approx(141.75e3)
    assert entries["V_r"].value == pytest.approx((42.0 + 82.6) * 1e3, rel=1e-3)
