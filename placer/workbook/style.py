"""How a plan workbook looks: type, colours and print set-up.

Colours come from the palette of Okabe and Ito ("Color Universal Design", 2008), made
for colour-blind readers, and never carry a meaning alone.
"""

from collections.abc import Iterable, Mapping
from textwrap import wrap
from typing import cast

from openpyxl.cell.cell import Cell
from openpyxl.styles import Alignment, Border, Font, PatternFill, Side
from openpyxl.utils import get_column_letter
from openpyxl.worksheet.header_footer import HeaderFooterItem
from openpyxl.worksheet.worksheet import Worksheet

from placer.workbook.cellkinds import Raw

_BLUE = "0072B2"
_SKY_BLUE = "56B4E9"
_FACE = "Arial"
_LINE = Side(style="thin", color="999999")
_RISKY = ("=", "+", "-", "@", "\t")

PLAIN = Font(name=_FACE, size=10)
BOLD = Font(name=_FACE, size=10, bold=True)
TITLE = Font(name=_FACE, size=14, bold=True)
_HEADER = Font(name=_FACE, size=10, bold=True, color="FFFFFF")
_UNDER = Border(bottom=_LINE)
_HEADER_FILL = PatternFill("solid", fgColor=_BLUE)
_BAND_FILL = PatternFill("solid", fgColor=_SKY_BLUE)
_NUMBER = Alignment(vertical="top")
_TEXT = Alignment(vertical="top", horizontal="left", indent=1)
RUNNING = _NUMBER
_OVER_NUMBERS = Alignment(horizontal="right", vertical="top", wrap_text=True)
_WRAPPED = Alignment(vertical="top", horizontal="left", indent=1, wrap_text=True)
WIDEST = 60
_LINE_HEIGHT = 13.5
_SHOWN_AS_TEXT = 255  # longer ones show as #### in the format "@"; no source
_TITLE_HEIGHT = 22


def at(sheet: Worksheet, row: int, column: int) -> Cell:
    """Return a cell; none is ever merged in these sheets."""
    return cast("Cell", sheet.cell(row, column))


def put(cell: Cell, value: Raw, number_format: str = "General") -> None:
    """Write a value: text never as a formula, a float with every digit it has."""
    cell.font = PLAIN
    cell.number_format = number_format
    cell.alignment = _alignment(value)
    if isinstance(value, float):
        cell.value = repr(value)
        cell.data_type = "n"
    elif value != "":
        cell.value = value
        if isinstance(value, str):
            if len(value) > _SHOWN_AS_TEXT:
                cell.number_format = "General"
            cell.data_type = "s"
            cell.quotePrefix = value.startswith(_RISKY)


def _alignment(value: Raw) -> Alignment:
    if not isinstance(value, str):
        return _NUMBER
    return _WRAPPED if len(value) > WIDEST else _TEXT


def header(cell: Cell, text: str, number: bool) -> None:
    """Write the header of a column, over its numbers or over its text."""
    put(cell, text)
    cell.font, cell.fill = _HEADER, _HEADER_FILL
    cell.alignment = _OVER_NUMBERS if number else _WRAPPED


def band(sheet: Worksheet, row: int, text: str, columns: int) -> None:
    """Write a heading across the columns of a sheet."""
    put(at(sheet, row, 1), text)
    for column in range(1, columns + 1):
        cell = sheet.cell(row, column)
        cell.font, cell.fill, cell.alignment = BOLD, _BAND_FILL, RUNNING


def heighten(sheet: Worksheet, row: int, values: Iterable[Raw]) -> None:
    """Give a row with long text the height of its lines."""
    texts = [v for v in values if isinstance(v, str) and len(v) > WIDEST]
    if texts:
        lines = max(len(wrap(text, WIDEST)) for text in texts)
        sheet.row_dimensions[row].height = _LINE_HEIGHT * lines


def to_the_left(sheet: Worksheet, row: int, column: int) -> None:
    """Set a value beside its label, whether it is text or a number."""
    at(sheet, row, column).alignment = _WRAPPED


def title(sheet: Worksheet, row: int) -> None:
    """Make a row the title of its sheet."""
    at(sheet, row, 1).font = TITLE
    sheet.row_dimensions[row].height = _TITLE_HEIGHT


def underline(sheet: Worksheet, row: int, columns: int) -> None:
    """Draw a line under a row, for the eye to follow it on paper."""
    for column in range(1, columns + 1):
        sheet.cell(row, column).border = _UNDER


def fit(
    sheet: Worksheet, widths: Mapping[int, int], headers: Iterable[int] = ()
) -> None:
    """Set the widths of columns [characters] and the heights of rows of headers."""
    for column, characters in widths.items():
        sheet.column_dimensions[get_column_letter(column)].width = characters + 2
    for row in headers:
        lines = [
            len(wrap(str(sheet.cell(row, column).value or ""), characters + 3))
            for column, characters in widths.items()
        ]
        sheet.row_dimensions[row].height = _LINE_HEIGHT * max(lines, default=1)


def paper(sheet: Worksheet, titles: int | None = None) -> None:
    """Set up A4 landscape, one page wide, titles repeated, pages numbered."""
    sheet.page_setup.orientation = "landscape"
    sheet.page_setup.paperSize = 9  # A4 in ECMA-376 part 1, 18.3.1.63
    sheet.page_setup.fitToWidth = 1
    sheet.page_setup.fitToHeight = 0
    if sheet.sheet_properties.pageSetUpPr is not None:
        sheet.sheet_properties.pageSetUpPr.fitToPage = True
    footer = HeaderFooterItem()
    footer.left.text, footer.right.text = "&A", "page &P of &N"
    sheet.oddFooter = footer
    sheet.page_margins.left = sheet.page_margins.right = 0.4
    sheet.page_margins.top, sheet.page_margins.bottom = 0.6, 0.8
    if titles:
        sheet.print_title_rows = f"{titles}:{titles}"
