"""Stirrups as given: what is refused with a sentence on what to write, where they stand."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import numpy as np
import pytest

from lineproof.beams.continuous.shear_numbers import ShearBasis
from lineproof.beams.continuous.stirrups import first_distance, grid
from lineproof.beams.continuous.stirrups_choice import Choice, check_stirrups, choose_stirrups
from lineproof.errors import UserError

from .shear_models import BASIS, case_of, new_sheet, record, three_spans, uniform


def checked(*zones: Any, basis: ShearBasis = BASIS) -> Choice:
    case = three_spans()
    return check_stirrups(case.outline, case.forces, basis, case.spans, list(zones))


@pytest.mark.parametrize(
    ("zone", "said"),
    [
        ({"span": 1, "spacing": "80 mm"}, "leaves 69 mm between 10M stirrups, less than the 75 mm"),
        ({"span": 1}, "no spacing; write for example 'spacing': '200 mm'"),
        ({"span": 4, "spacing": "200 mm"}, "span '4' does not exist; write one of 1, 2, 3"),
        ({"span": 1, "from": "0 mm", "to": "9 m", "spacing": "200 mm"}, "not inside the clear"),
        ({"span": 1, "from": "2 m", "to": "1 m", "spacing": "200 mm"}, "not inside the clear"),
        ({"span": 1, "at": "1 m", "spacing": "200 mm"}, "'at' is unknown; write span, from, to"),
        ({"span": 1, "spacing": "200"}, "spacing: '200' has no unit"),
        ("10M at 200", "is not a zone; write {'span': 1"),
    ],
)
def test_a_zone_that_cannot_be_built_is_refused(zone: Any, said: str) -> None:
    with pytest.raises(UserError) as caught:
        checked(zone)
    assert said in str(caught.value)
    assert "zone 1" in str(caught.value)


def test_all_faults_stand_at_once() -> None:
    with pytest.raises(UserError) as caught:
        checked({"span": 1, "spacing": "50 mm"}, {"span": 9, "spacing": "200 mm"})
    assert len(caught.value.faults) == 2


def test_overlapping_zones_are_refused() -> None:
    zones = (
        {"span": 1, "from": "0 m", "to": "2 m", "spacing": "200 mm"},
        {"span": 1, "from": "1.5 m", "to": "4 m", "spacing": "200 mm"},
    )
    with pytest.raises(UserError, match=r"from 0 to 2000 mm and from 1500 to 4000 mm overlap"):
        checked(*zones)


def test_no_list_of_zones_is_refused() -> None:
    case = three_spans()
    with pytest.raises(UserError, match="is not a list of zones"):
        check_stirrups(case.outline, case.forces, BASIS, case.spans, {"span": 1})  # type: ignore[arg-type]


def test_no_space_is_wider_than_given() -> None:
    zones = (
        {"span": 2, "from": "0 mm", "to": "1500 mm", "spacing": "175 mm"},
        {"span": 2, "from": "1500 mm", "to": "7250 mm", "spacing": "350 mm"},
        {"span": 2, "from": "7250 mm", "spacing": "175 mm"},
    )
    choice = checked(*zones)
    at = [z.start + i * z.spacing for z in choice.zones for i in range(z.number)]
    assert at == sorted(at)
    assert np.diff(at).max() <= 350
    # the faces of span 2 stand at 7600 + 225 and 16800 - 225 mm
    assert at[0] == 7825 + 75
    assert at[-1] == 16575 - 75
    middle = [x for x in at if 7825 + 1500 <= x <= 7825 + 7250]
    assert np.diff([x for x in at if x <= 7825 + 1500]).max() <= 175
    assert np.diff(middle).max() <= 350


def test_the_zones_chosen_pass_as_given() -> None:
    """Typed back zone by zone, the chosen stirrups are used as much and pass."""
    case = three_spans()
    choice = choose_stirrups(case.outline, case.forces, BASIS, case.spans)
    zones = [
        {"span": c.state.numbers.span, "from": f"{b.start} mm", "to": f"{b.end} mm",
         "spacing": f"{b.spacing} mm"}
        for c in choice.checks for b in c.bands
    ]  # fmt: skip
    again = check_stirrups(case.outline, case.forces, BASIS, case.spans, zones)
    assert again.worst <= 1
    assert again.worst == pytest.approx(choice.worst, abs=2e-3)
    assert again.reasons[0] == "Span 1, 0.00 to 6.17 m: 350 mm, as given; used to 99 % at most."


def test_closest_spacing_and_first_stirrup() -> None:
    """75 mm clear: 10M at 100 mm. First stirrup half a spacing from the face, 75 mm at most."""
    assert grid(11.3)[-1] == 100.0
    assert grid(11.3)[0] == 600.0
    assert [first_distance(s) for s in (100.0, 125.0, 150.0, 300.0)] == [50.0, 60.0, 75.0, 75.0]


def test_deep_beams_are_refused() -> None:
    case = case_of((1800.0, 6000.0), uniform((1800.0, 6000.0), 20, 10), h=700.0)
    with pytest.raises(UserError, match="less than twice h of 700 mm: a deep beam is outside"):
        choose_stirrups(case.outline, case.forces, BASIS, case.spans)


def test_a_web_that_crushes_is_refused() -> None:
    case = case_of((6000.0,), uniform((6000.0,), 500, 0), bottom=(20000.0, 566.0))
    with pytest.raises(UserError, match=r"b_w: span 1, .* of what the web carries"):
        choose_stirrups(case.outline, case.forces, BASIS, case.spans)


def test_too_few_bars_for_the_general_method_are_refused() -> None:
    case = case_of((6000.0,), uniform((6000.0,), 60, 30), bottom=(400.0, 566.0))
    with pytest.raises(UserError, match=r"bottom_bars: span 1, .* strain leaves the range"):
        choose_stirrups(case.outline, case.forces, BASIS, case.spans)


def test_what_stirrups_cannot_cure_fails_where_they_are_given() -> None:
    """The same beam with stirrups as built is checked, and its printed check fails."""
    case = case_of((6000.0,), uniform((6000.0,), 60, 30), bottom=(400.0, 566.0))
    zone = [{"span": 1, "spacing": "150 mm"}]
    choice = check_stirrups(case.outline, case.forces, BASIS, case.spans, zone)
    assert choice.worst > 1
    made = record(new_sheet(BASIS), case, choice).data
    [failed] = [e for p in made["parts"] if p["key"] == "shear-1-left" for e in p["entries"]
                if e["kind"] == "check"]  # fmt: skip
    assert failed["id"] == "shear-1-left/strain-range"
    assert failed["holds"] is False


def test_stirrups_too_close_ask_for_thicker_ones() -> None:
    case = case_of((6000.0,), uniform((6000.0,), 260, 0), bottom=(9000.0, 566.0))
    with pytest.raises(UserError, match="write thicker stirrups or more legs"):
        choose_stirrups(case.outline, case.forces, BASIS, case.spans)
    thick = replace(BASIS, stirrup="15M")
    assert choose_stirrups(case.outline, case.forces, thick, case.spans).worst <= 1


@pytest.mark.parametrize(
    ("changes", "said"),
    [
        ({"method": "simplified", "f_y": 500.0}, "'simplified' holds up to bars of 400 MPa"),
        ({"method": "simplified", "f_c": 65.0}, "'simplified' holds up to concrete of 60 MPa"),
        ({"method": "exact"}, "'exact'; write one of general, simplified"),
        ({"legs": 1}, "stirrup_legs: 1 given; write 2 or more"),
    ],
)
def test_a_method_that_does_not_hold_is_refused(changes: dict[str, Any], said: str) -> None:
    case = three_spans()
    with pytest.raises(UserError) as caught:
        choose_stirrups(case.outline, case.forces, replace(BASIS, **changes), case.spans)
    assert said in str(caught.value)
