"""Stirrups as given: what is refused with a sentence on what to write, where they stand."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import numpy as np
import pytest

from lineproof.beams.continuous.layout import StirrupZone, places_of
from lineproof.beams.continuous.shear_choice import refuse_strained
from lineproof.beams.continuous.shear_numbers import ShearBasis
from lineproof.beams.continuous.stirrups import Band, first_distance, grid
from lineproof.beams.continuous.stirrups_choice import Choice, choose_stirrups
from lineproof.beams.continuous.stirrups_given import SpanStirrups
from lineproof.beams.continuous.stirrups_record import closest
from lineproof.errors import UserError

from .shear_models import BASIS, case_of, check_zones, new_sheet, record, three_spans, uniform


def checked(*zones: Any, basis: ShearBasis = BASIS) -> Choice:
    case = three_spans()
    return check_zones(case, basis, list(zones))


@pytest.mark.parametrize(
    ("zone", "said"),
    [
        ({"span": 1, "spacing": "80 mm"}, "leaves 69 mm between 10M stirrups, less than the 75 mm"),
        (
            {"span": 1, "spacing": "150 m"},
            "'150 m' is more than 2000 mm; write for example '200 mm'",
        ),
        ({"span": 1}, "no spacing; write for example 'spacing': '200 mm'"),
        ({"span": 4, "spacing": "200 mm"}, "span '4' does not exist; write one of 1, 2, 3"),
        ({"spacing": "200 mm"}, "zone 1: 'span' is missing; write for example 'span': 1"),
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
        check_zones(case, BASIS, {"span": 1})


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
    again = check_zones(case, BASIS, zones)
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
    chosen = choose_stirrups(case.outline, case.forces, BASIS, case.spans)
    with pytest.raises(UserError, match=r"bottom_bars: span 1, .* strain leaves the range"):
        refuse_strained([check.state for check in chosen.checks])


def test_what_stirrups_cannot_cure_fails_where_they_are_given() -> None:
    """The same beam with stirrups as built is checked, and its printed check fails."""
    case = case_of((6000.0,), uniform((6000.0,), 60, 30), bottom=(400.0, 566.0))
    zone = [{"span": 1, "spacing": "150 mm"}]
    choice = check_zones(case, BASIS, zone)
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


def placed(clear: float, *bands: Band) -> list[float]:
    """Return where the stirrups of a span stand from its left face."""
    one = StirrupZone(1, 0.0, 0.0, 1, 0.0, "10M")
    zones = SpanStirrups(1, clear, bands).placed(0.0, one)
    return [x for zone in zones for x in places_of(zone)]


def test_a_closer_zone_moves_up_to_the_face_beside_wider_spaces() -> None:
    """250 mm over 1.5 m at both ends of 6.85 m, 325 mm between: the same from either end.

    From 75: 6 at 250 to 1325; 12 at 325 from 1650 to 5225; the last zone would start at 5475 and
    end at 6725, 50 mm before the place of the last stirrup at 6850 - 75 = 6775: it moves there,
    and leaves 5525 - 5225 = 300 mm, less than 325.
    """
    at = placed(6850.0, Band(0, 1500, 250), Band(1500, 5350, 325), Band(5350, 6850, 250))
    assert at[:6] == [75.0, 325.0, 575.0, 825.0, 1075.0, 1325.0]
    assert at[6] == 1650.0
    assert at[17] == 5225.0
    assert at[18:] == [5525.0, 5775.0, 6025.0, 6275.0, 6525.0, 6775.0]


@pytest.mark.parametrize(
    ("clear", "spacing", "first", "number", "last_space"),
    [
        # 5200 - 2 x 75 = 25 x 200 + 50: 90 mm are due, both ends move 20 mm to the faces.
        (5200.0, 200.0, 55.0, 27, 90.0),
        # 3040 - 2 x 50 = 29 x 100 + 40: both ends move 20 mm inward, to 70 mm from the faces.
        (3040.0, 100.0, 70.0, 30, 100.0),
        # 5250 - 2 x 75 = 25 x 200 + 100: wide enough for placing.
        (5250.0, 200.0, 75.0, 27, 100.0),
    ],
)
def test_two_stirrups_never_stand_too_close_at_the_right_face(
    clear: float, spacing: float, first: float, number: int, last_space: float
) -> None:
    """75 + 11.3 = 86.3, on the module 90 mm."""
    at = placed(clear, Band(0.0, clear, spacing))
    assert (at[0], len(at), at[-1] - at[-2]) == (first, number, last_space)
    assert at[-1] == clear - first


def test_after_a_gap_the_stirrups_move_outward() -> None:
    """From 2 m to the face at 4 m, 150 mm: 2000 - 75 = 12 x 150 + 125; at 160 mm 12 x 160 + 5.

    Of the latter (90 - 5)/2 = 42.5 mm at either end.
    """
    gap = Band(0.0, 2000.0, np.inf)
    at = placed(4000.0, gap, Band(2000.0, 4000.0, 150.0))
    assert (at[0], at[-2], at[-1]) == (2000.0, 3800.0, 3925.0)
    at = placed(4000.0, gap, Band(2000.0, 4000.0, 160.0))
    assert (at[0], at[-2], at[-1]) == (1957.5, 3877.5, 3967.5)


def test_the_closest_neighbours_are_checked() -> None:
    """Stirrups at 0, 300, 600 and 700 mm: 100 mm. A tie 40 mm before the first one is closer.

    Ties among themselves, 55 mm apart, are not stirrups: their clear distance is that of bars.
    One that stands 60 mm before the first stirrup leaves more room than they do.
    """
    one = StirrupZone(1, 0.0, 600.0, 3, 300.0, "10M")
    last = replace(one, start=700.0, end=700.0, number=1)
    wide, near = (
        replace(one, start=x - 110.0, end=x, number=3, spacing=55.0) for x in (-60.0, -40.0)
    )
    assert closest((one, last), ()) == (100.0, 650.0)
    assert closest((one, last), (wide,)) == (100.0, 650.0)
    assert closest((one, last), (near,)) == (40.0, -20.0)
    assert closest((last,), ()) == (300.0, 700.0)
