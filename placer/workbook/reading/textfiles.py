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
    return tuple(_read_file(file, remarks) for file in files)


def _read_file(file: Path, remarks: Remarks) -> RawSheet:
    try:
        return _sheet(file.stem, _text(file, remarks))
    except (UnicodeDecodeError, csv.Error, OSError):
        remarks.error(
            "file",
            Place(file.stem),
            f"{file.name} cannot be read as text",
            "save it again as CSV in UTF-8",
        )
        return RawSheet(file.stem, (), readable=False)


def _text(file: Path, remarks: Remarks) -> str:
    """Return the text of a file; what is no UTF-8 is read as Windows-1252.

    Raises
    ------
    UnicodeDecodeError
        It is neither.
    csv.Error
        It holds zero bytes, as text of two bytes per character does.
    """
    try:
        text = file.read_text(encoding="utf-8-sig")
    except UnicodeDecodeError:
        text = file.read_text(encoding="cp1252")
        if "\0" not in text:
            _say_code_page(file, remarks)
    if "\0" in text:
        raise csv.Error
    return text


def _say_code_page(file: Path, remarks: Remarks) -> None:
    remarks.note(
        "code-page",
        Place(file.stem),
        f"{file.name} is not in UTF-8; it was read as Western text (Windows-1252)",
        "check names with accents; where they are wrong, save it as CSV in UTF-8",
    )


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
