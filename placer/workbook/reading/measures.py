"""Cells that hold a number: as typed, within bounds, or the fault in it."""

import re
from collections.abc import Callable
from dataclasses import replace
from datetime import date, datetime, time, timedelta
from decimal import Decimal

from placer.workbook.column import NOT_LIMITED, Column, Kind
from placer.workbook.reading.numbers import (
    AmbiguousNumberError,
    NotANumberError,
    number,
)
from placer.workbook.reading.raw import Cell
from placer.workbook.reading.scales import asks_gb, own_scale, scale, unit_named
from placer.workbook.reading.values import CellFaultError, GbUnknownError, Quantity


def read_quantity(
    cell: Cell, column: Column, heading_scale: int, gb: str = ""
) -> Quantity:
    """Return the quantity of a cell that is not blank.

    Parameters
    ----------
    heading_scale
        Small units in one of the unit of the heading; a unit in the cell wins.
    gb
        What GB means in this export; blank where the policy does not say.

    Raises
    ------
    CellFaultError
        The cell is no number, an ambiguous one, or out of bounds.
    GbUnknownError
        The cell says GB, and nobody knows which.
    """
    if cell.merged:
        raise CellFaultError(
            "merged",
            f"{column.name} is merged over several cells",
            "unmerge and say the number of each row",
        )
    if cell.text.casefold() == NOT_LIMITED and _may_be_unlimited(column):
        return Quantity(Decimal(0), heading_scale)
    bare, own = _without_unit(cell, column, gb)
    number_ = MEASURES[column.kind](bare, column)
    quantity = Quantity(number_, heading_scale if own is None else own)
    _check_bounds(quantity, cell, column)
    return quantity


def _without_unit(cell: Cell, column: Column, gb: str) -> tuple[Cell, int | None]:
    """Return the cell without the unit that fits the column, and that unit's scale."""
    measured = column.kind in (Kind.NUMBER, Kind.COUNT) and isinstance(cell.value, str)
    parts = re.fullmatch(r"(.*\d)\s*(\D+)", cell.text) if measured else None
    unit = unit_named(parts[2]) if parts else None
    found = scale(column, unit, gb) if unit else None
    if parts is None or found is None:
        return cell, None
    if asks_gb(column, unit) and not gb:
        raise GbUnknownError("unit", "GB may mean 10^9 or 2^30 bytes")
    return replace(cell, value=parts[1]), found


def _may_be_unlimited(column: Column) -> bool:
    """Return whether 0 can stand for "not limited": it is below no bound of its own."""
    return column.lowest == 0 or column.default == NOT_LIMITED


def _check_bounds(quantity: Quantity, cell: Cell, column: Column) -> None:
    own = quantity.number * quantity.scale / own_scale(column)
    if not column.lowest <= own <= column.highest:
        unit = f" {column.unit}" if column.unit else ""
        raise CellFaultError(
            "bounds",
            f"{column.name} is {cell.text}: outside {column.lowest} to "
            f"{column.highest:,}{unit}".replace(",", " "),
            "check the number and the unit of the heading",
        )


def _number(cell: Cell, column: Column) -> Decimal:
    if cell.percent:
        raise CellFaultError(
            "percent",
            f"{column.name} is formatted as a percentage",
            f"write it in {column.unit or 'plain numbers'}",
        )
    return _decimal(cell, column)


def _decimal(cell: Cell, column: Column) -> Decimal:
    """Return the number of a cell, exactly as it shows."""
    value = cell.value
    if isinstance(value, int | float) and not isinstance(value, bool):
        return Decimal(repr(value))
    if not isinstance(value, str):
        raise _not_a_number(cell, column)
    try:
        return number(value)
    except AmbiguousNumberError:
        raise CellFaultError(
            "ambiguous",
            f'{column.name} is "{cell.text}": a thousands mark or a decimal comma?',
            "write it without thousands marks and with a decimal point",
        ) from None
    except NotANumberError:
        raise _not_a_number(cell, column) from None


def _not_a_number(cell: Cell, column: Column) -> CellFaultError:
    unit = f" in {column.unit}" if column.unit else ""
    if isinstance(cell.value, datetime | date | time | timedelta):
        return CellFaultError(
            "cell",
            f"{column.name} is a date or time ({cell.text}); was it a number or 2:1?",
            f"format the cell as text or number and write it again{unit}",
        )
    return CellFaultError(
        "cell",
        f'{column.name} is "{cell.text}", which is no number',
        f"write only the number{unit}, or leave the cell blank",
    )


def _count(cell: Cell, column: Column) -> Decimal:
    found = _number(cell, column)
    if found != found.to_integral_value():
        raise CellFaultError(
            "cell", f"{column.name} is {cell.text}, not a whole number", "round it"
        )
    return found


def _percent(cell: Cell, column: Column) -> Decimal:
    if cell.percent and not isinstance(cell.value, str):
        return _decimal(cell, column) * 100
    if isinstance(cell.value, str) and cell.text.endswith("%"):
        bare = Cell(cell.text.removesuffix("%"), cell.place)
        return _decimal(bare, column)
    found = _decimal(cell, column)
    if 0 < found <= 1:
        raise CellFaultError(
            "percent",
            f"{column.name} is {cell.text}: {cell.text} % or {found * 100:f} %?",
            "write the percent sign into the cell, or a number above 1",
        )
    return found


def _ratio(cell: Cell, column: Column) -> Decimal:
    text = re.fullmatch(r"(.+):\s*1(?:\.0*)?", cell.text)
    if isinstance(cell.value, str) and text:
        return _decimal(Cell(text[1], cell.place), column)
    return _number(cell, column)


MEASURES: dict[Kind, Callable[[Cell, Column], Decimal]] = {
    Kind.NUMBER: _number,
    Kind.COUNT: _count,
    Kind.PERCENT: _percent,
    Kind.RATIO: _ratio,
}
