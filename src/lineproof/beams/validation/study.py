"""The validation as a calculation: each call records parts on a sheet."""

from __future__ import annotations

from lineproof.beams.floor_beam import prepare
from lineproof.beams.inputs import InputReader
from lineproof.beams.validation.case_steps import record_cases
from lineproof.beams.validation.data import cases
from lineproof.beams.validation.flexure_cases import FLEXURE_CASES
from lineproof.beams.validation.frame_cases import FRAME_CASES
from lineproof.beams.validation.notation import notation_for
from lineproof.beams.validation.results import AGREEMENT, TESTS, record_agreement, record_tests
from lineproof.beams.validation.section_cases import SECTION_CASES
from lineproof.beams.validation.strength_tests import (
    BENDING_TESTS,
    MODEL,
    SHEAR_TESTS,
    record_bending_tests,
    record_model,
    record_shear_tests,
)
from lineproof.errors import UserError
from lineproof.quantity import Typed, read_quantity
from lineproof.sheet import Sheet

SCOPE = "preliminary: validation, no design of a member"
_BY_CALL = {
    "study.flexure()": FLEXURE_CASES,
    "study.sections()": SECTION_CASES,
    "study.frames()": FRAME_CASES,
    "study.shear_tests()": SHEAR_TESTS,
    "study.bending_tests()": BENDING_TESTS,
}


def calls() -> dict[str, str]:
    """Return the parts of a validation, each with the call that makes it."""
    made = {cases()[name].key: call for call, names in _BY_CALL.items() for name in names}
    return {
        MODEL: "study.shear_tests()",
        **made,
        AGREEMENT: "study.agreement()",
        TESTS: "study.tests()",
    }


class ValidationStudy:
    """Predictions against published values on a sheet; like a beam it keeps but its inputs."""

    def __init__(self, sheet: Sheet, phi_c: str, phi_s: str) -> None:
        self.sheet, self.phi_c, self.phi_s = sheet, phi_c, phi_s

    def flexure(self) -> None:
        """Record the published cases of bending."""
        record_cases(self.sheet, FLEXURE_CASES)

    def sections(self) -> None:
        """Record the published cases of sections, shear, hooks, cracks and deflection."""
        record_cases(self.sheet, SECTION_CASES)

    def frames(self) -> None:
        """Record the published cases of continuous beams."""
        record_cases(self.sheet, FRAME_CASES)

    def agreement(self) -> None:
        """Record the table of predicted against published values."""
        record_agreement(self.sheet)

    def shear_tests(self) -> None:
        """Record how tests are predicted, and the twelve beams tested in shear."""
        record_model(self.sheet, self.phi_c, self.phi_s)
        record_shear_tests(self.sheet)

    def bending_tests(self) -> None:
        """Record the three pairs of beams tested in bending."""
        record_bending_tests(self.sheet)

    def tests(self) -> None:
        """Record mean and scatter of the tests, their tables and the figure."""
        record_tests(self.sheet)


def validation_study(sheet: Sheet, *, phi_c: str = "1.0", phi_s: str = "1.0") -> ValidationStudy:
    """Start the validation; the resistance factors are those of the predicted tests.

    With 1 the mean strength is predicted, with those of the standard the factored resistance.
    Raises :class:`UserError` with every fault at once, before anything is recorded.
    """
    reader = InputReader({"phi_c": phi_c, "phi_s": phi_s})
    pair = reader.code_pair(sheet.project)
    for name in ("phi_c", "phi_s"):
        reader.take(name, _factor)
    reader.faults.raise_if_any()
    symbols = frozenset(s for case in cases().values() for s in case.published)
    sheet.notation = notation_for(symbols)
    prepare(sheet, pair)
    sheet.member = "predictions against published values"
    sheet.scope = SCOPE
    sheet.expect(calls())
    return ValidationStudy(sheet, phi_c, phi_s)


def _factor(name: str, given: str) -> Typed:
    typed = read_quantity(name, given, "")
    if not 0 < typed.value <= 1:
        raise UserError(f"{name}: {given!r} is no resistance factor; write '1.0' or less")
    return typed
