"""A sheet being filled from the top: the next free row, tables, pairs and lines."""

from collections.abc import Iterable, Sequence

from openpyxl.styles import Font
from openpyxl.utils import get_column_letter
from openpyxl.worksheet.worksheet import Worksheet

from placer.workbook import style
from placer.workbook.cellkinds import TEXT, Kind, Raw
from placer.workbook.plansheets import Scope, Table

_SHORT = 13

Heading = tuple[str, Kind]


class Grid:
    """Writes down a sheet row by row.

    Attributes
    ----------
    row
        The next free row, from 1.
    widths
        What the columns of tables need so far [characters].
    """

    def __init__(self, sheet: Worksheet) -> None:
        self.sheet = sheet
        self.row = 1
        self.widths: dict[int, int] = {}
        self._headers: list[int] = []

    def line(self, text: str, font: Font = style.PLAIN) -> None:
        """Write one line of text that may run across the columns."""
        cell = style.at(self.sheet, self.row, 1)
        style.put(cell, TEXT.cell(text, ""), TEXT.number_format)
        cell.font, cell.alignment = font, style.RUNNING
        self.row += 1

    def title(self, text: str) -> None:
        """Write the title of the sheet."""
        self.line(text)
        style.title(self.sheet, self.row - 1)

    def gap(self) -> None:
        """Leave one row free."""
        self.row += 1

    def header(self, columns: Iterable[Heading]) -> None:
        """Write the headers of a table; they wrap at their blanks."""
        for column, (title, kind) in enumerate(columns, start=1):
            number = kind.number_format != TEXT.number_format
            style.header(style.at(self.sheet, self.row, column), title, number)
            self._widen(column, _header_width(title))
        self._headers.append(self.row)
        self.row += 1

    def cells(self, kinds: Iterable[Kind], values: Sequence[Raw]) -> None:
        """Write one row of cells that are already in the form of their kinds."""
        pairs = zip(kinds, values, strict=True)
        for column, (kind, value) in enumerate(pairs, start=1):
            cell = style.at(self.sheet, self.row, column)
            style.put(cell, value, kind.number_format)
            self._widen(column, _width(value))
        style.heighten(self.sheet, self.row, values)
        self.row += 1

    def _widen(self, column: int, characters: int) -> None:
        self.widths[column] = max(self.widths.get(column, 0), characters)

    def pairs(self, pairs: Iterable[tuple[str, object, Kind]], zone: str) -> None:
        """Write a label and a value per row; a value of None stays blank."""
        for label, value, kind in pairs:
            shown = None if value is None else kind.cell(value, zone)
            self.cells((TEXT, kind), (label, shown))
            style.to_the_left(self.sheet, self.row - 1, 2)

    def table(self, table: Table, records: Iterable[object], scope: Scope) -> None:
        """Write the records of a plan under their headers."""
        self.header((c.header, c.kind) for c in table.columns)
        for record in records:
            kinds = [column.kind for column in table.columns]
            self.cells(kinds, [c.cell(record, scope) for c in table.columns])

    def listing(
        self, columns: Sequence[Heading], rows: Iterable[Sequence[Raw]]
    ) -> None:
        """Write rows that are only shown, never read back."""
        self.header(columns)
        for row in rows:
            self.cells([kind for _, kind in columns], row)

    def settle(self) -> None:
        """Give the columns the widths that their tables need."""
        style.fit(self.sheet, self.widths, self._headers)

    def finish(self, columns: int) -> None:
        """Make a sheet that is one table easy to use: frozen, filtered, fitted."""
        last = max(self.row - 1, 1)
        self.sheet.freeze_panes = "A2"
        self.sheet.auto_filter.ref = f"A1:{get_column_letter(columns)}{last}"
        self.settle()
        style.paper(self.sheet, titles=1)


def _header_width(title: str) -> int:
    """Return the width of a header: whole if it is short, else its longest word."""
    return max(min(len(title), _SHORT), *map(len, title.split()))


def _width(value: Raw) -> int:
    """Return how many characters a cell shows; longer text wraps."""
    shown = f"{value:,.1f}" if isinstance(value, float) else str(value or "")
    return min(len(shown), style.WIDEST)
