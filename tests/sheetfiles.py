"""Small inventories for tests, as dictionaries of sheets, and the files of them."""

import csv
from collections.abc import Mapping, Sequence
from copy import deepcopy
from datetime import date
from pathlib import Path

from openpyxl import Workbook, load_workbook
from openpyxl.worksheet.worksheet import Worksheet

from placer.estate import Estate
from placer.findings import Finding
from placer.workbook.intake import Intake, read

Lines = Sequence[Sequence[object]]
TODAY = date(2026, 3, 2)

LEAST: dict[str, list[list[object]]] = {
    "volumes": [
        [
            *("array", "volume", "pool", "provisioned (GiB)", "occupied (GiB)"),
            *("requests (1/s)", "reads (%)", "throughput (MB/s)"),
        ],
        ["K", "db01", "S1", 1000, 400, 1500, 70, 24.5],
        ["K", "db02", "S1", 500, 250.5, 200, 25, 3],
        ["L", "web01", "F1", 300, 100, 50, 90, 1],
    ],
    "pools": [
        ["pool", "array", "media", "drives without spares", "drive size (GB)"],
        ["S1", "K", "spinning", 24, 1200],
        ["F1", "L", "flash", 8, 3840],
    ],
}


def least() -> dict[str, list[list[object]]]:
    """Return the least inventory there can be, to be changed at will."""
    return deepcopy(LEAST)


_MORE: list[list[object]] = [
    [
        *("application", "host", "tenant", "role", "random reads (%)"),
        *("read hits (%)", "snapshots (GiB)", "snapshot days"),
    ],
    ["tickets", "h1", "ferries", None, "50%", 20, 12.5, 7],
    ["tickets", "h2", None, "log", None, None, None, None],
    [None, "h2", None, "quorum", None, None, None, None],
]

FULL: dict[str, Lines] = {
    **LEAST,
    "volumes": [
        [*line, *more] for line, more in zip(LEAST["volumes"], _MORE, strict=True)
    ],
    "tenants": [["tenant", "requests cap (1/s)"], ["ferries", 1200]],
    "classes": [
        ["class", "response limit (ms)", "importance", "hold (days)"],
        ["gold", 5, "vital", 30],
    ],
    "arrays": [
        ["array", "site", "controllers"],
        ["K", "harbour", 4],
        ["L", "inland", 2],
    ],
    "hosts": [
        ["host", "arrays reached", "cluster"],
        ["h1", "K;L", "bridge"],
        ["h2", None, "bridge"],
    ],
    "routes": [["from", "to", "together (MB/s)"], ["harbour", "L", 90.5]],
    "policy": [
        ["setting", "value"],
        ["start date", "2026-03-02"],
        ["least gain (%)", "25%"],
        ["zone", "Europe/Lisbon"],
    ],
    "windows": [
        ["window", "opens on", "opens at", "lasts (h)"],
        ["weekend", "Sat", "22:00", 6.5],
    ],
    "rules": [
        ["what", "rule", "where", "why"],
        ["volume K/db01; K/db02", "apart", "pool", "two copies"],
    ],
    "load": [
        ["array", "volume", "hour begins", "reads (1/s)", "writes (1/s)"],
        *(["K", "db01", hour, 10 * hour, 2.5] for hour in range(24)),
    ],
    "control": [["what", "volumes", "provisioned (GiB)"], ["all", 3, 1800]],
}


def as_folder(folder: Path, sheets: Mapping[str, Lines]) -> Path:
    """Write a CSV file per sheet."""
    folder.mkdir(parents=True, exist_ok=True)
    for name, lines in sheets.items():
        with (folder / f"{name}.csv").open("w", newline="", encoding="utf-8") as file:
            csv.writer(file).writerows(lines)
    return folder


def as_workbook(path: Path, sheets: Mapping[str, Lines]) -> Path:
    """Write a workbook."""
    book = Workbook()
    book.remove(book.worksheets[0])
    for name, lines in sheets.items():
        page = book.create_sheet(name)
        for line in lines:
            page.append(list(line))
    book.save(path)
    return path


class Changed:
    """A workbook that is open for changes to its cells, and then read."""

    def __init__(self, path: Path, sheets: Mapping[str, Lines]) -> None:
        self._path = as_workbook(path, sheets)
        self.book = load_workbook(path)

    def __getitem__(self, name: str) -> Worksheet:
        page = self.book[name]
        assert isinstance(page, Worksheet)
        return page

    def read(self) -> Intake:
        """Save the workbook and read it as an inventory."""
        self.book.save(self._path)
        return read(self._path, TODAY)


def intake(tmp_path: Path, sheets: Mapping[str, Lines]) -> Intake:
    """Read sheets as a workbook."""
    return read(as_workbook(tmp_path / "estate.xlsx", sheets), TODAY)


def estate(tmp_path: Path, sheets: Mapping[str, Lines]) -> Estate:
    """Read sheets that must be in order."""
    found = intake(tmp_path, sheets)
    assert found.estate is not None, found.findings
    return found.estate


def only_error(found: Intake) -> Finding:
    """Return the one error there must be."""
    errors = [f for f in found.findings if f.severity == "error"]
    assert len(errors) == 1, errors
    assert found.estate is None
    return errors[0]
