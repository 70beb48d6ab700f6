"""The printed package: model, HTML, PDF, and the records read back out of them."""

from lineproof.package.files import calc_file_names, calc_files
from lineproof.package.html import to_html
from lineproof.package.joined import joined_files, joined_names
from lineproof.package.model import Package, build_package
from lineproof.package.pdf import PrintError, to_pdf
from lineproof.package.read import records_in_html, records_in_pdf

__all__ = [
    "Package",
    "PrintError",
    "build_package",
    "calc_file_names",
    "calc_files",
    "joined_files",
    "joined_names",
    "records_in_html",
    "records_in_pdf",
    "to_html",
    "to_pdf",
]
