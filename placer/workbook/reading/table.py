"""A sheet as rows of values: cells understood, faults said, blanks left out."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from datetime import date, time
from fractions import Fraction

from placer.findings import Place
from placer.units import whole
from placer.words import count
from placer.workbook.column import Column, Kind, Sheet
from placer.workbook.reading.cells import read_cell
from placer.workbook.reading.headings import Heading, Headings, heading_row
from placer.workbook.reading.merged import say_merged
from placer.workbook.reading.raw import Cell, RawSheet
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.scales import own_scale
from placer.workbook.reading.totalrows import without_totals
from placer.workbook.reading.values import (
    CellFaultError,
    GbUnknownError,
    Quantity,
    Value,
)


@dataclass(frozen=True, slots=True)
class Row:
    """One row of a sheet, or the settings of the policy.

    Attributes
    ----------
    values
        The cells that are filled and understood, by column.
    places
        The address of each cell of the row that has a column.
    faulty
        Columns whose cell could not be understood.
    """

    sheet: Sheet
    values: Mapping[str, Value]
    places: Mapping[str, Place]
    faulty: frozenset[str]
    remarks: Remarks

    def place(self, column: str = "") -> Place:
        """Return the address of a cell, or of the first one of the row."""
        first = next(iter(self.places.values()), Place(self.sheet.name))
        return self.places.get(column, first)

    def given(self, column: str) -> bool:
        """Return whether the cell holds a value."""
        return column in self.values

    def value(
        self, column: str, medium: str = "", *, matters: bool = True
    ) -> Value | None:
        """Return the cell's value, or its default: an assumption where it matters."""
        if column in self.values:
            return self.values[column]
        described = self.sheet.column(column)
        of_medium = dict(described.by_media).get(medium)
        default = of_medium or described.default
        if described.derived or not default:
            return None
        shown = _with_unit(default, described)
        if matters:
            self._say_default(described, f"{medium} {shown}" if of_medium else shown)
        return read_cell(
            Cell(_as_typed(default, described), Place()),
            described,
            own_scale(described),
        )

    def whole(self, column: str, medium: str = "", *, matters: bool = True) -> int:
        """Return a number as a whole count of the small unit; nothing is 0."""
        found = self.value(column, medium, matters=matters)
        if not isinstance(found, Quantity):
            return 0
        side = self.sheet.column(column).side
        return whole(found.number, found.scale, side)

    def exact(self, column: str) -> Fraction:
        """Return a number in small units, unrounded; nothing is 0."""
        found = self.values.get(column)
        return found.exact if isinstance(found, Quantity) else Fraction(0)

    def text(self, column: str) -> str:
        """Return a word or name; nothing is blank."""
        found = self.value(column)
        return found if isinstance(found, str) else ""

    def switch(self, column: str) -> bool:
        """Return yes or no."""
        return self.value(column) is True

    def names(self, column: str) -> tuple[str, ...]:
        """Return a list of names."""
        found = self.value(column)
        return found if isinstance(found, tuple) else ()

    def date(self, column: str) -> date | None:
        """Return a date, or None."""
        found = self.value(column)
        return found if isinstance(found, date) else None

    def clock(self, column: str) -> time | None:
        """Return a time of day, or None."""
        found = self.value(column)
        return found if isinstance(found, time) else None

    def assume(self, column: str, value: str = "") -> None:
        """Record that an empty cell was filled from elsewhere."""
        described = self.sheet.column(column)
        self._say_default(described, value or described.default)

    def _say_default(self, column: Column, value: str) -> None:
        row = Place(self.sheet.name, str(self.place()))
        self.remarks.default(column, value, row)

    def error(self, code: str, column: str, sentence: str, remedy: str = "") -> None:
        """Record an error at a cell of this row."""
        self.remarks.error(code, self.place(column), sentence, remedy)


def _as_typed(default: str, column: Column) -> str:
    """Return a default with its percent sign: a bare number up to 1 is refused."""
    return f"{default}%" if column.unit.startswith("%") else default


def _with_unit(default: str, column: Column) -> str:
    """Return a default for people: "85 %", but "not limited" without a unit."""
    return f"{default} {column.unit}".strip() if default[0].isdigit() else default


def read_table(
    raw: RawSheet | None, sheet: Sheet, remarks: Remarks, gb: str
) -> tuple[Row, ...]:
    """Return the rows of a sheet that hold anything.

    Parameters
    ----------
    raw
        The sheet as it stands in the file, or None where there is none.
    gb
        What GB means in this export; blank where the policy does not say.
    """
    if raw is None:
        _say_no_sheet(sheet, remarks)
        return ()
    if not raw.readable:
        return ()
    start = heading_row(raw.rows, sheet.columns)
    if start is None:
        _say_no_headings(raw, sheet, remarks)
        return ()
    say_merged(raw.name, raw.rows[start:], remarks)
    headings = Headings(sheet.columns, remarks, gb).find(raw.rows[start])
    _say_missing(headings, sheet, raw, remarks)
    body: list[Sequence[Cell]] = [row for row in raw.rows[start + 1 :] if _filled(row)]
    if not sheet.of_totals:
        body = without_totals(body, headings, remarks)
    for heading in headings:
        cells = [row[heading.index] for row in body]
        if heading.column.kind is Kind.ID:
            _say_numbers(cells, heading.column, remarks)
        _say_read_as(cells, heading.column, remarks)
    return tuple(read_row(row, headings, sheet, remarks) for row in body)


def read_row(
    cells: Sequence[Cell], headings: Sequence[Heading], sheet: Sheet, remarks: Remarks
) -> Row:
    """Return one row; each cell that cannot be understood is a finding."""
    values: dict[str, Value] = {}
    faulty = set()
    for heading in headings:
        cell, column = cells[heading.index], heading.column
        try:
            if not cell.blank:
                values[column.name] = read_cell(cell, column, heading.scale, heading.gb)
            elif column.required:
                raise _blank(column)
        except GbUnknownError:
            faulty.add(column.name)
            remarks.ask_gb(cell.place, cell.text)
        except CellFaultError as fault:
            faulty.add(column.name)
            remarks.error(fault.code, cell.place, fault.sentence, fault.remedy)
    places = {h.column.name: cells[h.index].place for h in headings}
    return Row(sheet, values, places, frozenset(faulty), remarks)


def _filled(row: Sequence[Cell]) -> bool:
    return any(not cell.blank and not cell.merged for cell in row)


def _say_numbers(cells: Sequence[Cell], column: Column, remarks: Remarks) -> None:
    """Say once per column that names are stored as numbers."""
    numbers = [cell for cell in cells if isinstance(cell.value, int | float)]
    if numbers:
        remarks.warn(
            "id",
            numbers[0].place,
            f"{column.name} is stored as a number in {count(len(numbers), 'cell')}: "
            "leading zeros are lost",
            "format the column as text and write the names again where zeros matter",
        )


def _say_read_as(cells: Sequence[Cell], column: Column, remarks: Remarks) -> None:
    """Say once per word that it is read as one of ours."""
    for word, meant in column.read_as:
        said = [cell for cell in cells if cell.text.casefold() == word]
        if said:
            remarks.note(
                "read-as",
                said[0].place,
                f'{column.name} "{said[0].text}" is read as {meant} in '
                f"{count(len(said), 'cell')}",
                f"write {', '.join(column.words)}, whatever is meant",
            )


def _blank(column: Column) -> CellFaultError:
    return CellFaultError(
        "blank", f"{column.name} is blank", f"fill it in: {column.meaning}"
    )


def _say_no_sheet(sheet: Sheet, remarks: Remarks) -> None:
    if sheet.required:
        remarks.error(
            "sheet",
            Place(sheet.name),
            f"there is no sheet {sheet.name}",
            f"add it: {sheet.meaning}",
        )


def _say_no_headings(raw: RawSheet, sheet: Sheet, remarks: Remarks) -> None:
    if any(not cell.blank for row in raw.rows for cell in row) or sheet.required:
        needed = ", ".join(c.header for c in sheet.columns if c.required)
        remarks.error(
            "column",
            Place(raw.name),
            f"the sheet {raw.name} has no headings that are known",
            f"its first row must name at least: {needed}",
        )


def _say_missing(
    headings: Sequence[Heading], sheet: Sheet, raw: RawSheet, remarks: Remarks
) -> None:
    found = {heading.column.name for heading in headings}
    for column in sheet.columns:
        if column.required and column.name not in found:
            remarks.error(
                "column",
                Place(raw.name),
                f'the column "{column.header}" is missing',
                f"add it: {column.meaning}",
            )
