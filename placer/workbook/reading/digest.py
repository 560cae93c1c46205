"""A fingerprint of what was read: values, not formats."""

from collections.abc import Iterable, Sequence
from datetime import date, time
from hashlib import sha256

from placer.workbook.reading.table import Row
from placer.workbook.reading.values import Quantity, Value


def digest(tables: Iterable[Sequence[Row]]) -> str:
    """Return the SHA-256 of all values: sheet, row, column and value in small units.

    Workbook or CSV, number formats, units of headings, order of columns and whatever
    is not used make no difference; any value used does.
    """
    hashed = sha256()
    for rows in tables:
        for number, row in enumerate(rows):
            for column, value in sorted(row.values.items()):
                line = (row.sheet.name, number, column, _canonical(value))
                hashed.update(repr(line).encode())
    return hashed.hexdigest()


def _canonical(value: Value) -> str:
    if isinstance(value, Quantity):
        return str(value.exact)
    if isinstance(value, date | time):
        return value.isoformat()
    return repr(value)
