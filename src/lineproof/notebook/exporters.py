"""The package straight out of a notebook: ``jupyter nbconvert`` and JupyterLab's export menu.

JupyterLab imports and makes every exporter to list its menu, so this module stays light. No
template of nbconvert is used: the package has its own, in its own folder.
"""

from __future__ import annotations

from collections.abc import Mapping
from pathlib import Path
from typing import Any, ClassVar

from nbconvert.exporters import Exporter
from nbconvert.utils.exceptions import ConversionException

from lineproof.errors import UserError

Resources = dict[str, Any]


class NotPrintableError(UserError, ConversionException):
    """A notebook from which no package can be printed, in the form nbconvert reports."""


class _CalcPackage(Exporter):
    """Reads the record of a notebook and prints it; runs nothing.

    ``printer`` names the function of the package room that prints.
    """

    printer: ClassVar[str]

    def from_notebook_node(
        self, nb: Any, resources: Resources | None = None, **kw: Any
    ) -> tuple[Any, Resources]:
        """Return the printed package and the resources with its file extension."""
        notebook, made = super().from_notebook_node(nb, resources, **kw)
        about = made.get("metadata", {})
        name = str(about.get("name") or "notebook")
        path = Path(about["path"], f"{name}.ipynb") if "path" in about else None
        try:
            printed = _printed(notebook, name, path, self.printer)
        except UserError as error:
            raise NotPrintableError(error.faults) from None
        made["output_extension"] = self.file_extension
        for leftover in ("outputs", "attachments"):
            made.pop(leftover, None)  # with these the server would send a zip archive
        return printed, made


class CalcPackagePdf(_CalcPackage):
    """The calculation package as PDF."""

    file_extension = ".pdf"
    output_mimetype = "application/pdf"
    export_from_notebook = "Calculation package (PDF)"
    printer = "to_pdf"


class CalcPackageHtml(_CalcPackage):
    """The calculation package as one self-contained HTML page."""

    file_extension = ".html"
    output_mimetype = "text/html"
    export_from_notebook = "Calculation package (HTML)"
    printer = "to_html"


def _printed(
    notebook: Mapping[str, Any], name: str, path: Path | None, printer: str
) -> str | bytes:
    """Print a notebook with the review that lies beside its file, where it has one."""
    from lineproof import package  # noqa: PLC0415 - imported to print, not to list
    from lineproof.notebook.read import calc_of  # noqa: PLC0415 - as above
    from lineproof.notebook.reviews import printed_beside  # noqa: PLC0415 - as above

    calc = calc_of(notebook, name)
    review = None if path is None else printed_beside(path, calc.record)
    built = package.build_package([calc.record], [calc.walk], reviews=[review])
    made: str | bytes = getattr(package, printer)(built)
    return made
