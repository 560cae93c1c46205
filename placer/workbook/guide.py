"""The guide inside the empty inventory: which sheet, which columns first, examples."""

from collections.abc import Iterator
from dataclasses import dataclass

from placer.workbook.column import Column, Sheet
from placer.workbook.columns import SETTINGS, SHEETS

_ADVICE = (
    "Fill in volumes and pools first, one row each. Every other sheet can stay empty.",
    "The note on a heading says what a blank cell means; every default used is listed.",
    "Keep the headings and their units. Columns may be moved or left out.",
    "Leave out rows of totals: they belong into the sheet control, which checks them.",
    "Write shares with a percent sign (25 %), or as a number above 1.",
    "Write a reduction as 2 or 2:1, a date as 2026-03-02, a time as 22:00.",
    "Array and volume together are the key: write names the same everywhere.",
)
_EXAMPLES: dict[str, dict[str, str]] = {
    "volumes": {
        "array": "K",
        "volume": "db01",
        "pool": "S1",
        "provisioned": "2000",
        "occupied": "1400",
        "requests": "1500",
        "reads": "70 %",
        "throughput": "24.5",
    },
    "pools": {
        "pool": "S1",
        "array": "K",
        "media": "spinning",
        "drives without spares": "24",
        "data per stripe": "5",
        "parity per stripe": "1",
        "drive size": "1200",
    },
    "policy": {"start date": "2026-03-02", "zone": "Europe/Lisbon"},
    "windows": {
        "window": "weekend",
        "opens on": "Sat",
        "opens at": "22:00",
        "closes at": "06:00",
    },
    "tenants": {"tenant": "T1", "requests cap": "5000", "plan for": "measured"},
    "hosts": {"host": "h1", "arrays reached": "K; L", "cluster": "C1"},
    "rules": {"what": "role log", "rule": "only on", "where": "media flash"},
}


@dataclass(frozen=True, slots=True)
class Line:
    """A row of the guide: what, its meaning, an example; or a sentence alone."""

    what: str
    meaning: str = ""
    example: str = ""
    strong: bool = False


def lines() -> Iterator[Line]:
    """Yield the guide from the top."""
    yield Line("Inventory of volumes, pools and arrays", strong=True)
    yield from map(Line, _ADVICE)
    yield Line("")
    yield Line("sheet, column", "meaning", "example", strong=True)
    for sheet in SHEETS:
        yield from _sheet(sheet)


def _sheet(sheet: Sheet) -> Iterator[Line]:
    needed = "needed" if sheet.required else "may stay empty"
    yield Line(f"{sheet.name} ({needed})", sheet.meaning, strong=True)
    examples = _EXAMPLES.get(sheet.name, {})
    for column in _columns(sheet):
        if column.required or column.name in examples:
            yield Line(column.header, column.meaning, examples.get(column.name, ""))


def _columns(sheet: Sheet) -> tuple[Column, ...]:
    return SETTINGS if sheet.name == "policy" else sheet.columns
