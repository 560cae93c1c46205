"""Faults as people make them, planted into the harbour's inventory one by one."""

from dataclasses import dataclass
from datetime import time

from openpyxl import Workbook
from openpyxl.worksheet.worksheet import Worksheet


@dataclass(frozen=True)
class Fault:
    """One fault: where it is planted, what stands there, the code that must find it.

    ``row`` names the row by any text in it; ``column`` is the heading.
    """

    code: str
    sheet: str
    row: str
    column: str
    value: object
    number_format: str = "General"


FAULTS = (
    Fault("cell", "volumes", "bk-db-01", "provisioned (GiB)", "about 500"),
    Fault("cell", "volumes", "bk-db-02", "requests (1/s)", "n/a yet"),
    Fault("bounds", "volumes", "bk-db-03", "occupied (GiB)", -4),
    Fault("ambiguous", "volumes", "bk-db-04", "provisioned (GiB)", "1,234"),
    Fault("percent", "volumes", "bk-db-05", "reads (%)", 0.75),
    Fault("bounds", "volumes", "bk-db-06", "reads (%)", 140),
    Fault("cell", "volumes", "cam-01", "throughput (MB/s)", "12 Mbit"),
    Fault("bounds", "volumes", "cam-02", "occupied (GiB)", 99_000),
    Fault("id", "volumes", "cam-03", "volume", 1234567890123456789),
    Fault("unknown", "volumes", "cam-04", "pool", "bulkk"),
    Fault("duplicate", "volumes", "cam-06", "volume", "cam-05"),
    Fault("id", "volumes", "cam-09", "volume", "CAM-08"),
    Fault("unknown", "volumes", "mx-01", "class", "offfice"),
    Fault("cell", "volumes", "mx-02", "thin", "maybe"),
    Fault("formula", "volumes", "mx-03", "provisioned (GiB)", "=H2*2"),
    Fault("cell", "volumes", "mx-04", "requests (1/s)", "#N/A"),
    Fault("blank", "volumes", "mx-05", "requests (1/s)", None),
    Fault("cell", "volumes", "man-log-01", "role", "journal"),
    Fault("percent", "volumes", "fs-01", "random reads (%)", 0.4),
    Fault("bounds", "tenants", "island line", "requests cap (1/s)", 0),
    Fault("bounds", "pools", "hold", "pool busy measured (%)", 170),
    Fault("cell", "pools", "swift", "media", "tape"),
    Fault("cell", "pools", "bulk", "reduction here", time(2, 1), "h:mm"),
    Fault("drive-size", "pools", "mast", "drive size (GB)", 0.6),
    Fault("bounds", "pools", "deep", "rpm", -7200),
    Fault("bounds", "arrays", "depot", "controllers", 0),
    Fault("date", "policy", "cured by", "value", "31/03/27"),
    Fault("zone", "policy", "zone", "value", "Harbour time"),
    Fault("cell", "windows", "Saturday", "opens at", "25:00"),
    Fault("cell", "rules", "application payroll", "rule", "only at"),
    Fault("unknown", "rules", "application cameras", "where", "pool quay/flash"),
    Fault("control", "control", "all", "volumes", 140),
)


def plant(book: Workbook) -> list[tuple[str, str, str]]:
    """Plant all faults in a workbook and return sheet, cell and code of each."""
    places = [(fault, *_find(book[fault.sheet], fault)) for fault in FAULTS]
    planted = []
    for fault, row, column in places:
        cell = book[fault.sheet].cell(row, column)
        cell.value = fault.value  # type: ignore[assignment, unused-ignore]
        cell.number_format = fault.number_format
        planted.append((fault.sheet, cell.coordinate, fault.code))
    return planted


def _find(sheet: Worksheet, fault: Fault) -> tuple[int, int]:
    rows = list(sheet.iter_rows(values_only=True))
    row = next(number for number, cells in enumerate(rows, 1) if fault.row in cells)
    return row, rows[0].index(fault.column) + 1
