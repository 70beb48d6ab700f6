"""The second path: every closed-form resistance proved by layers and strains."""

from __future__ import annotations

from lineproof.beams.bottom_bars import COMPRESSION_BARS
from lineproof.beams.flexure import midspan
from lineproof.beams.inputs import Shape
from lineproof.beams.record_figures import record_curve_figure
from lineproof.beams.section import zone_of
from lineproof.beams.steps import Steps
from lineproof.formula import Criterion
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import strain, strain_closing

SECOND_PATH = "second-path"


def record_proof(
    steps: Steps, key: strain.Key, M_r: Entry, proved: Criterion = strain.PROVED
) -> None:
    """Record inside the open part neutral axis and moment by layers, and the check against M_r.

    ``key`` is zone (tee, rectangle) and case (one layer, two layers, compression bars).
    """
    values = {n: steps.entry(n).value for n in strain.AXIS[key].names}
    axis, moment = strain_closing.closings(key, values)
    if key[1] in strain_closing.LAYERED:
        steps.found(
            "c_l", strain.AXIS[key], axis, unit="mm", clause="10.1.1",
            title="Depth of the neutral axis, by layers and strains",
        )  # fmt: skip
    steps.found(
        "M_l", strain.MOMENT[key], moment, unit="kN.m", clause="10.1",
        title="Moment resistance, by layers and strains",
    )  # fmt: skip
    steps.bind(**{name: M_r for name in proved.names if name != "M_l"})
    steps.check(proved)


def record_parabola(steps: Steps, key: strain.Key) -> None:
    """Record inside the open part what a parabolic concrete curve would give, for information."""
    steps.sheet.note("parabola", strain.PARABOLA, title="For information", basis="common practice")
    record_curve_figure(steps.sheet)
    values = {n: steps.entry(n).value for n in strain.AXIS_PARABOLA[key].names}
    axis, moment = strain_closing.parabola_closings(key, values)
    steps.found(
        "c_p", strain.AXIS_PARABOLA[key], axis, unit="mm", clause="10.1.6",
        title="Depth of the neutral axis, parabolic concrete curve",
        settings=strain.PARABOLA_SETTINGS,
    )  # fmt: skip
    steps.found(
        "M_p", strain.MOMENT_PARABOLA[key], moment, unit="kN.m", clause="10.1.6",
        title="Moment resistance, parabolic concrete curve",
        settings=strain.PARABOLA_SETTINGS,
    )  # fmt: skip


def record_second_path(sheet: Sheet, shape: Shape) -> None:
    """Record the proofs of the resistance at midspan and at the balanced condition."""
    steps = midspan(sheet, shape)
    flexure = sheet.entries_of("flexure")
    case = "two layers" if "A_s2" in steps.place else "one layer"
    if "C_s" in flexure:
        case = f"compression bars{', two layers' if case == 'two layers' else ''}"
        steps.bind(**{n: sheet.entry(f"{COMPRESSION_BARS}/{n}") for n in ("A_sp", "d_p")})
        steps.bind(**{n: flexure[n] for n in ("a", "C_c", "C_s") if n in flexure})
    key = (zone_of(shape), case)
    with sheet.part(SECOND_PATH, "Second path: layers and strains"):
        record_proof(steps, key, flexure["M_r"])
        record_parabola(steps, key)
    prove_balanced(sheet, midspan(sheet, shape), shape)


def prove_balanced(sheet: Sheet, steps: Steps, shape: Shape) -> None:
    """Record the proof of the balanced moment, all bars at d, in a part of its own."""
    steps.bind(A_s=sheet.entry("balanced/A_sb"))
    with sheet.part(f"{SECOND_PATH}-balanced", "Second path: balanced condition"):
        record_proof(
            steps,
            (zone_of(shape), "one layer"),
            sheet.entry("balanced/M_rb"),
            strain.PROVED_BALANCED,
        )
