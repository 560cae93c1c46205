"""One cell to one value, or to the fault that stops it from being one."""

import re
from collections.abc import Callable
from contextlib import suppress
from datetime import date, datetime, time, timedelta

from placer.windows.clock import zone_named
from placer.workbook.column import Column, Kind
from placer.workbook.reading.measures import MEASURES, read_quantity
from placer.workbook.reading.raw import Cell, Trouble
from placer.workbook.reading.values import CellFaultError, Value

_WEEKDAYS = (
    "monday",
    "tuesday",
    "wednesday",
    "thursday",
    "friday",
    "saturday",
    "sunday",
)
_SWITCHES = {"yes": True, "y": True, "true": True, "no": False, "n": False}
_SWITCHES |= {"false": False}
_SPREADSHEET_ERROR = re.compile(r"#(N/A|REF!|VALUE!|DIV/0!|NAME\?|NULL!|NUM!)")
_SCIENTIFIC = re.compile(r"\d([.,]\d+)?E\+\d+")
_EXACT_DIGITS = 15
_DATES_IN_WORDS = ("%d %B %Y", "%d %b %Y", "%B %d %Y", "%b %d %Y")
_TIME = re.compile(
    r"(?P<hour>\d{1,2})([:.](?P<minute>\d{2})(:00)?)?\s?((?P<half>[ap])\.?m\.?)?",
    re.IGNORECASE,
)


def read_cell(cell: Cell, column: Column, scale: int, gb: str = "") -> Value:
    """Return the value of a cell that is not blank.

    Parameters
    ----------
    scale
        Small units in one of the unit of the heading.
    gb
        What GB means in this export; blank where the policy does not say.

    Raises
    ------
    GbUnknownError
        The cell says GB, and nobody knows which.
    CellFaultError
        The cell is not what the column asks for.
    """
    if cell.value is Trouble.NO_STORED_VALUE:
        raise CellFaultError(
            "formula",
            "the formula has no stored value",
            "open the file in the spreadsheet program and save it, or paste values",
        )
    if _SPREADSHEET_ERROR.fullmatch(cell.text):
        raise CellFaultError("cell", f"the formula gives {cell.text}", "mend it")
    if column.kind in MEASURES:
        return read_quantity(cell, column, scale, gb)
    return _READERS[column.kind](cell, column)


def _name(cell: Cell, column: Column) -> str:
    value = cell.value
    fraction = isinstance(value, float) and not value.is_integer()
    if fraction or isinstance(value, bool | date | time | timedelta):
        raise CellFaultError(
            "id",
            f"{column.name} is {cell.text}, which the spreadsheet has changed",
            "format the cell as text and write the name again",
        )
    if isinstance(value, int | float):
        return _name_in_digits(int(value), column)
    if _SCIENTIFIC.fullmatch(cell.text):
        raise CellFaultError(
            "id",
            f"{column.name} is {cell.text}: a long number that lost its digits",
            "format the cell as text and write the name again",
        )
    return cell.text


def _name_in_digits(value: int, column: Column) -> str:
    if len(str(abs(value))) > _EXACT_DIGITS:
        raise CellFaultError(
            "id",
            f"{column.name} is a number of over {_EXACT_DIGITS} digits: the last are "
            "lost",
            "format the cell as text and write the name again",
        )
    return str(value)


def _names(cell: Cell, column: Column) -> tuple[str, ...]:
    parts = (part.strip() for part in re.split("[;,]", _name(cell, column)))
    return tuple(dict.fromkeys(part for part in parts if part))


def _switch(cell: Cell, column: Column) -> bool:
    try:
        return _SWITCHES[cell.text.casefold()]
    except KeyError:
        raise CellFaultError(
            "cell", f'{column.name} is "{cell.text}"', "write yes or no"
        ) from None


def _word(cell: Cell, column: Column) -> str:
    said = cell.text.casefold()
    said = dict(column.read_as).get(said, said)
    if said not in column.words:
        raise CellFaultError(
            "cell",
            f'{column.name} is "{cell.text}"',
            f"write one of: {', '.join(column.words)}",
        )
    return said


def _date(cell: Cell, column: Column) -> date:
    if isinstance(cell.value, datetime):
        return cell.value.date()
    if isinstance(cell.value, date):
        return cell.value
    try:
        return _written_date(cell.text)
    except ValueError:
        raise CellFaultError(
            "date",
            f'{column.name} is "{cell.text}", which may mean several dates or none',
            "write it as year-month-day, such as 2026-03-02",
        ) from None


def _written_date(text: str) -> date:
    """Return a date written as year-month-day, or with its month in letters."""
    words = re.sub(r"[-.,\s]+", " ", text)
    for pattern in _DATES_IN_WORDS:
        with suppress(ValueError):
            return datetime.strptime(words, pattern).date()
    return date.fromisoformat(text)


def _day(cell: Cell, column: Column) -> date | int:
    said = cell.text.casefold()
    if isinstance(cell.value, str) and len(said) >= 2:
        for number_, day in enumerate(_WEEKDAYS):
            if day.startswith(said):
                return number_
    return _date(cell, column)


def _clock(cell: Cell, column: Column) -> time:
    if isinstance(cell.value, time):
        return cell.value.replace(second=0, microsecond=0)
    try:
        return _written_time(cell)
    except ValueError:
        raise CellFaultError(
            "cell",
            f'{column.name} is "{cell.text}", which is no time of day',
            "write it as hh:mm, from 00:00 to 23:59",
        ) from None


def _written_time(cell: Cell) -> time:
    """Return 22:00, 22.00, 10 pm or 10:00 pm as a time."""
    found = _TIME.fullmatch(cell.text) if isinstance(cell.value, str) else None
    if found is None or not (found["minute"] or found["half"]):
        raise ValueError(cell.text)
    hour, half = int(found["hour"]), (found["half"] or "").casefold()
    if half:
        if not 1 <= hour <= 12:
            raise ValueError(cell.text)
        hour = hour % 12 + (12 if half == "p" else 0)
    return time(hour, int(found["minute"] or 0))


def _zone(cell: Cell, column: Column) -> str:
    try:
        return zone_named(cell.text).key
    except ValueError as error:
        raise CellFaultError("zone", f"{column.name}: {error}") from None


def _text(cell: Cell, column: Column) -> str:
    return cell.text


_READERS: dict[Kind, Callable[[Cell, Column], Value]] = {
    Kind.ID: _name,
    Kind.TEXT: _text,
    Kind.LIST: _names,
    Kind.SWITCH: _switch,
    Kind.WORD: _word,
    Kind.DAY: _day,
    Kind.DATE: _date,
    Kind.CLOCK: _clock,
    Kind.ZONE: _zone,
}
