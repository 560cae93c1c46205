"""Raw cells from a workbook; says what is hidden or filtered."""

import re
import warnings
from collections.abc import Iterator
from itertools import groupby
from pathlib import Path
from zipfile import ZipFile

from openpyxl import Workbook, load_workbook
from openpyxl.cell.cell import Cell as Source
from openpyxl.cell.cell import MergedCell
from openpyxl.worksheet.worksheet import Worksheet

from placer.findings import Place
from placer.workbook.reading.raw import Cell, RawSheet, Trouble
from placer.workbook.reading.remarks import Remarks

_Held = tuple[Source | MergedCell, str]
_FORMULA = re.compile(rb"<(\w+:)?f[ />]")
_COMPOUND_FILE = b"\xd0\xcf\x11\xe0"


def read_workbook(path: Path, remarks: Remarks) -> tuple[RawSheet, ...]:
    """Return the sheets of a workbook; none, and a finding, if it cannot be read."""
    with path.open("rb") as file:
        begins = file.read(len(_COMPOUND_FILE))
    if begins == _COMPOUND_FILE:
        remarks.error(
            "file",
            Place(),
            f"{path.name} is protected by a password or of the old .xls kind",
            "save it as .xlsx without a password",
        )
        return ()
    try:
        stored = _load(path, stored=True)
        written = _load(path, stored=False) if _has_formulas(path) else stored
    except Exception:  # a damaged file makes the library raise almost anything
        remarks.error(
            "file",
            Place(),
            f"{path.name} is no whole workbook: it is damaged, cut short or empty",
            "save it again as .xlsx; of CSV files name the folder",
        )
        return ()
    if stored.epoch.year == 1904:
        remarks.note(
            "date", Place(), "the workbook counts days from 1904; dates follow it"
        )
    return tuple(
        _sheet(sheet, written[sheet.title], remarks) for sheet in stored.worksheets
    )


def _load(path: Path, *, stored: bool) -> Workbook:
    """Load the values that formulas had when last saved, or the formulas."""
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        return load_workbook(path, data_only=stored)


def _has_formulas(path: Path) -> bool:
    """Return whether a cell holds a formula (f in ECMA-376 part 1, 18.3.1.40)."""
    with ZipFile(path) as parts:
        names = [name for name in parts.namelist() if "worksheets/" in name]
        return any(_FORMULA.search(parts.read(name)) for name in names)


def _sheet(stored: Worksheet, written: Worksheet, remarks: Remarks) -> RawSheet:
    merged = _merged(stored)
    _say_hidden(stored, remarks)
    places = _filled(written)
    columns = sorted({column for _, column in places})
    rows = tuple(
        tuple(
            _cell(stored.cell(row, column), written.cell(row, column), merged)
            for column in columns
        )
        for row in sorted({row for row, _ in places})
    )
    return RawSheet(stored.title, rows)


def _filled(sheet: Worksheet) -> list[tuple[int, int]]:
    """Return rows and columns of cells with something in them.

    Iterating over rows would make every cell up to the last one: a single stray mark
    at the end of a sheet would cost minutes.
    """
    cells = sheet._cells.items()
    return [place for place, cell in cells if cell.value is not None]


def _cell(
    cell: Source | MergedCell,
    formula: Source | MergedCell,
    merged: dict[str, _Held],
) -> Cell:
    source, area = merged.get(cell.coordinate, (cell, ""))
    value: object = source.value
    if value is None and formula.data_type == "f":
        value = Trouble.NO_STORED_VALUE
    return Cell(
        value,
        Place(str(cell.parent.title), cell.coordinate),
        percent="%" in str(source.number_format),
        merged=area,
    )


def _merged(sheet: Worksheet) -> dict[str, _Held]:
    """Return for each cell that is merged away the one with its value, and the area."""
    holders: dict[str, _Held] = {}
    for area in sheet.merged_cells.ranges:
        first = sheet.cell(area.min_row, area.min_col)
        for row, column in area.cells:
            if (row, column) != (area.min_row, area.min_col):
                holders[sheet.cell(row, column).coordinate] = first, area.coord
    return holders


def _say_hidden(sheet: Worksheet, remarks: Remarks) -> None:
    rows = sorted(n for n, row in sheet.row_dimensions.items() if row.hidden)
    columns = sorted(n for n, it in sheet.column_dimensions.items() if it.hidden)
    how = "filtered out" if sheet.auto_filter.ref else "hidden"
    for said, names in ((f"rows {how}", _runs(rows)), ("columns hidden", columns)):
        if names:
            remarks.warn(
                "hidden",
                Place(sheet.title),
                f"{said} were read all the same: {', '.join(names)}",
                "delete what is not part of the inventory",
            )
    if sheet.sheet_state != "visible":
        remarks.warn(
            "hidden", Place(sheet.title), "the hidden sheet was read all the same"
        )


def _runs(numbers: list[int]) -> list[str]:
    """Return 1, 2, 3, 7 as "1-3", "7"."""
    return list(_spoken_runs(numbers))


def _spoken_runs(numbers: list[int]) -> Iterator[str]:
    for _, group in groupby(enumerate(numbers), lambda pair: pair[1] - pair[0]):
        run = [number for _, number in group]
        yield str(run[0]) if len(run) == 1 else f"{run[0]}-{run[-1]}"
