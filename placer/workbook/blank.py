"""An empty inventory workbook: every sheet and heading, notes, drop-downs, a guide."""

from collections.abc import Iterable, Sequence
from pathlib import Path

from openpyxl import Workbook
from openpyxl.comments import Comment
from openpyxl.utils import get_column_letter
from openpyxl.worksheet.datavalidation import DataValidation
from openpyxl.worksheet.worksheet import Worksheet

from placer.workbook import style
from placer.workbook.column import Column, Kind, Sheet
from placer.workbook.columns import GUIDE, SETTINGS, SHEETS
from placer.workbook.guide import lines
from placer.workbook.wholefile import save

_ROWS = 5000
_GUIDE_WIDTHS = {1: 34, 2: 72, 3: 14}
_TEXT_FORMAT = "@"
_FORMATS = {Kind.DATE: "yyyy-mm-dd", Kind.NUMBER: "General", Kind.COUNT: "General"}
_NOTE_WIDTH, _NOTE_HEIGHT = 320, 110


def write(path: Path) -> Path:
    """Write the workbook and return the path used, if another file is in the way."""
    book = Workbook()
    _guide(book.worksheets[0])
    for sheet in SHEETS:
        page = book.create_sheet(sheet.name)
        _head(page, sheet)
        if sheet.name == "policy":
            _settings(page)
        else:
            _body(page, sheet.columns)
    return save(book, path)


def _guide(page: Worksheet) -> None:
    page.title = GUIDE
    for row, line in enumerate(lines(), start=1):
        for column, text in enumerate((line.what, line.meaning, line.example), start=1):
            cell = style.at(page, row, column)
            style.put(cell, text)
            cell.alignment = style.RUNNING
            cell.font = style.BOLD if line.strong else style.PLAIN
    style.title(page, 1)
    style.fit(page, _GUIDE_WIDTHS)
    style.paper(page)


def _head(page: Worksheet, sheet: Sheet) -> None:
    for number, column in enumerate(sheet.columns, start=1):
        cell = style.at(page, 1, number)
        style.header(cell, column.header, number=False)
        cell.comment = _note(column)
    widths = {n: _width(column) for n, column in enumerate(sheet.columns, start=1)}
    style.fit(page, widths, headers=(1,))
    page.freeze_panes = "A2"
    style.paper(page, titles=1)


def _width(column: Column) -> int:
    return max(10, min(len(column.header), 18))


def _note(column: Column) -> Comment:
    """Return what a column means, what may stand in it, and what a blank means."""
    said = [column.meaning]
    if column.words:
        said.append(f"one of: {', '.join(column.words)}")
    if column.required:
        said.append("must be filled in")
    else:
        said.append(f"blank: {column.shown_default or 'nothing'}")
    note = Comment("\n".join(said), "placer")
    note.width, note.height = _NOTE_WIDTH, _NOTE_HEIGHT
    return note


def _body(page: Worksheet, columns: Sequence[Column]) -> None:
    for number, column in enumerate(columns, start=1):
        letter = get_column_letter(number)
        page.column_dimensions[letter].number_format = _format(column)
        _drop_down(page, column, f"{letter}2:{letter}{_ROWS}")


def _settings(page: Worksheet) -> None:
    """Write one row per setting; the values stay blank."""
    for row, column in enumerate(SETTINGS, start=2):
        name = style.at(page, row, 1)
        style.put(name, column.header)
        name.comment = _note(column)
        page.cell(row, 2).number_format = _format(column)
        _drop_down(page, column, f"B{row}")
    widths = {1: max(len(column.header) for column in SETTINGS), 2: 24}
    style.fit(page, widths)


def _format(column: Column) -> str:
    """Return a number format that keeps names, times and 2:1 as they are typed."""
    if column.kind is Kind.PERCENT:
        return "General"
    return _FORMATS.get(column.kind, _TEXT_FORMAT)


def _drop_down(page: Worksheet, column: Column, cells: str) -> None:
    words: Iterable[str] = column.words
    if column.kind is Kind.SWITCH:
        words = ("yes", "no")
    if words:
        choice = DataValidation(type="list", formula1=f'"{",".join(words)}"')
        choice.add(cells)
        page.add_data_validation(choice)
