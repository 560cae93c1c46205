"""Raw cells from a folder of CSV files, one per sheet."""

import csv
from pathlib import Path

from openpyxl.utils import get_column_letter

from placer.findings import Place
from placer.workbook.reading.raw import Cell, RawSheet
from placer.workbook.reading.remarks import Remarks

_SEPARATORS = (",", ";", "\t")


def read_folder(path: Path, remarks: Remarks) -> tuple[RawSheet, ...]:
    """Return the CSV files of a folder as sheets of the same names."""
    files = sorted(f for f in path.iterdir() if f.suffix.casefold() == ".csv")
    if not files:
        remarks.error(
            "file",
            Place(),
            f"the folder {path.name} holds no CSV file",
            "put volumes.csv and pools.csv into it, or name a workbook",
        )
    read = (_read_file(file, remarks) for file in files)
    return tuple(sheet for sheet in read if sheet is not None)


def _read_file(file: Path, remarks: Remarks) -> RawSheet | None:
    try:
        text = file.read_text(encoding="utf-8-sig")
        return _sheet(file.stem, text)
    except (UnicodeDecodeError, csv.Error, OSError) as error:
        remarks.error(
            "file",
            Place(file.stem),
            f"{file.name} cannot be read as text: {error}",
            "save it as CSV in UTF-8",
        )
        return None


def _sheet(name: str, text: str) -> RawSheet:
    lines = text.splitlines(keepends=True)
    rows = list(csv.reader(lines, delimiter=_separator(lines)))
    width = max((len(row) for row in rows), default=0)
    return RawSheet(
        name,
        tuple(
            tuple(
                Cell(value, Place(name, f"{get_column_letter(column)}{number}"))
                for column, value in enumerate(_filled(row, width), start=1)
            )
            for number, row in enumerate(rows, start=1)
        ),
    )


def _filled(row: list[str], width: int) -> list[str | None]:
    return [value or None for value in row] + [None] * (width - len(row))


def _separator(lines: list[str]) -> str:
    """Return the separator that stands most often in the first line that has any."""
    counts = [[line.count(mark) for mark in _SEPARATORS] for line in lines]
    first = next((count for count in counts if any(count)), [1, 0, 0])
    return _SEPARATORS[first.index(max(first))]
