"""The package straight out of a notebook: ``jupyter nbconvert`` and JupyterLab's export menu.

JupyterLab imports and makes every exporter to list its menu, so this module stays light. No
template of nbconvert is used: the package has its own, in its own folder.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import TYPE_CHECKING, Any

from nbconvert.exporters import Exporter
from nbconvert.utils.exceptions import ConversionException

from lineproof.errors import UserError

if TYPE_CHECKING:
    from lineproof.package import Package

Resources = dict[str, Any]


class NotPrintableError(UserError, ConversionException):
    """A notebook from which no package can be printed, in the form nbconvert reports."""


class _CalcPackage(Exporter):
    """Reads the record of a notebook and prints it; runs nothing."""

    def from_notebook_node(
        self, nb: Any, resources: Resources | None = None, **kw: Any
    ) -> tuple[Any, Resources]:
        """Return the printed package and the resources with its file extension."""
        notebook, made = super().from_notebook_node(nb, resources, **kw)
        name = str(made.get("metadata", {}).get("name") or "notebook")
        try:
            printed = self._print(_package(notebook, name))
        except UserError as error:
            raise NotPrintableError(error.faults) from None
        made["output_extension"] = self.file_extension
        for leftover in ("outputs", "attachments"):
            made.pop(leftover, None)  # with these the server would send a zip archive
        return printed, made

    def _print(self, package: Package) -> str | bytes:
        raise NotImplementedError


class CalcPackagePdf(_CalcPackage):
    """The calculation package as PDF."""

    file_extension = ".pdf"
    output_mimetype = "application/pdf"
    export_from_notebook = "Calculation package (PDF)"

    def _print(self, package: Package) -> bytes:
        from lineproof.package import to_pdf  # noqa: PLC0415 - imported to print, not to list

        return to_pdf(package)


class CalcPackageHtml(_CalcPackage):
    """The calculation package as one self-contained HTML page."""

    file_extension = ".html"
    output_mimetype = "text/html"
    export_from_notebook = "Calculation package (HTML)"

    def _print(self, package: Package) -> str:
        from lineproof.package import to_html  # noqa: PLC0415 - imported to print, not to list

        return to_html(package)


def _package(notebook: Mapping[str, Any], name: str) -> Package:
    from lineproof.notebook.read import calc_of  # noqa: PLC0415
    from lineproof.package import build_package  # noqa: PLC0415

    calc = calc_of(notebook, name)
    return build_package([calc.record], [calc.walk])
