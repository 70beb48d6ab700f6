"""The second path: every closed-form resistance proved by layers and strains."""

from __future__ import annotations

from lineproof.beams.flexure import midspan
from lineproof.beams.inputs import Shape
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import strain

SECOND_PATH = "second-path"


def record_proof(steps: Steps, case: str, M_r: Entry) -> None:
    """Record inside the open part neutral axis and moment by layers, and the check against M_r.

    ``case`` is ``one layer``, ``two layers`` or ``compression bars``.
    """
    if case in strain.LAYERED:
        names = strain.AXIS[case].names
        values = {n: steps.entry(n).value for n in names}
        steps.found(
            "c_l", strain.AXIS[case], strain.closing(case, values), unit="mm",
            title="Depth of the neutral axis, by layers and strains", clause="10.1.1",
        )  # fmt: skip
    steps.found(
        "M_l", strain.MOMENT[case], strain.MOMENT_BOUND, unit="kN.m",
        title="Moment resistance, by layers and strains", clause="10.1",
    )  # fmt: skip
    steps.check(strain.PROVED, M_r=M_r)


def record_parabola(steps: Steps, case: str) -> None:
    """Record inside the open part what a parabolic concrete curve would give, for information."""
    steps.sheet.note("parabola", strain.PARABOLA, title="For information", basis="common practice")
    steps.found(
        "c_p", strain.AXIS_PARABOLA[case], strain.AXIS_BOUND_PARABOLA, unit="mm",
        title="Depth of the neutral axis, parabolic concrete curve", clause="10.1.6",
        settings=strain.PARABOLA_SETTINGS,
    )  # fmt: skip
    steps.found(
        "M_p", strain.MOMENT_PARABOLA[case], strain.MOMENT_BOUND_PARABOLA, unit="kN.m",
        title="Moment resistance, parabolic concrete curve", clause="10.1.6",
        settings=strain.PARABOLA_SETTINGS,
    )  # fmt: skip


def record_second_path(sheet: Sheet, shape: Shape) -> None:
    """Record the proofs of the resistance at midspan and at the balanced condition."""
    steps = midspan(sheet, shape)
    flexure = sheet.entries_of("flexure")
    case = "two layers" if "A_s2" in steps.place else "one layer"
    if "C_s" in flexure:
        case = "compression bars"
        steps.bind(**{n: sheet.entry(f"compression-bars/{n}") for n in ("A_sp", "d_p")})
    with sheet.part(SECOND_PATH, "Second path: layers and strains"):
        record_proof(steps, case, flexure["M_r"])
        record_parabola(steps, case)
    prove_balanced(sheet, midspan(sheet, shape))


def prove_balanced(sheet: Sheet, steps: Steps) -> None:
    """Record the proof of the balanced moment, all bars at d, in a part of its own."""
    steps.bind(A_s=sheet.entry("balanced/A_sb"))
    with sheet.part("second-path-balanced", "Second path: balanced condition"):
        record_proof(steps, "one layer", sheet.entry("balanced/M_rb"))
