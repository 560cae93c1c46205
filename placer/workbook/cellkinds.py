"""Kinds of cells in a plan workbook: how a quantity becomes a cell and comes back.

Every pair is exact: what ``read`` makes of ``cell(value)`` is the value.  Times are
text with the offset of their zone, so that no reader has to guess a zone.
"""

import re
from collections.abc import Callable
from dataclasses import dataclass
from datetime import UTC, datetime, timedelta
from enum import StrEnum
from math import isfinite
from typing import Any

from placer import units
from placer.units import CENTS, GIB, MB, MS
from placer.words import clock

Raw = str | int | float | None
_UNWRITABLE = re.compile(
    r"[\x00-\x08\x0b-\x1f\ud800-\udfff\ufffe\uffff]|_(?=x[0-9A-Fa-f]{4}_)"
)
_ESCAPED = re.compile(r"_x([0-9A-Fa-f]{4})_")
_EPOCH = datetime(1970, 1, 1, tzinfo=UTC)


@dataclass(frozen=True, slots=True)
class Kind:
    """One kind of cell.

    ``cell`` turns a value and the zone it is shown in into a cell; ``read`` turns the
    cell back and raises ValueError or TypeError where it cannot; ``expects`` says in
    words what should stand there.
    """

    cell: Callable[[Any, str], Raw]
    read: Callable[[Any], object]
    expects: str
    number_format: str = "General"


def escape(text: str) -> str:
    """Return text with the characters a workbook cannot hold as ``_xHHHH_``.

    Source: ECMA-376 part 1, 22.9.2.19 (ST_Xstring).
    """
    return _UNWRITABLE.sub(lambda found: f"_x{ord(found[0]):04X}_", text)


def unescape(text: str) -> str:
    """Undo ``escape``."""
    return _ESCAPED.sub(lambda found: chr(int(found[1], 16)), text)


def _read_text(raw: object) -> str:
    if raw is None:
        return ""
    if not isinstance(raw, str):
        raise TypeError(raw)
    return unescape(raw)


def _read_number(raw: object) -> float:
    """Return a number; the infinite ones stand as text, for no cell can hold them."""
    if isinstance(raw, str) and raw in ("inf", "-inf"):
        return float(raw)
    if isinstance(raw, bool) or not isinstance(raw, int | float):
        raise TypeError(raw)
    return raw


def _read_whole(raw: object) -> int:
    number = _read_number(raw)
    if number != int(number):
        raise ValueError(raw)
    return int(number)


def _read_time(raw: object) -> int:
    if not isinstance(raw, str):
        raise TypeError(raw)
    moment = datetime.fromisoformat(raw)
    if moment.tzinfo is None:
        raise ValueError(raw)
    return (moment - _EPOCH) // timedelta(minutes=1)


def _scaled(unit: int, number_format: str) -> Kind:
    """Return the kind of a whole number of small units shown in a larger unit."""
    return Kind(
        lambda value, _zone: value / unit,
        lambda raw: round(_read_number(raw) * unit),
        "a number",
        number_format,
    )


def choice(options: type[StrEnum]) -> Kind:
    """Return the kind of a cell that holds one word of a closed list."""
    known = ", ".join(option.value or "nothing" for option in options)
    return Kind(
        lambda value, _zone: value.value,
        lambda raw: options(_read_text(raw)),
        f"one of: {known}",
        "@",
    )


def blank_if_zero(kind: Kind) -> Kind:
    """Return a kind whose zero, which means none or unknown, stands as a blank."""
    return Kind(
        lambda value, zone: kind.cell(value, zone) if value else None,
        lambda raw: 0 if raw is None else kind.read(raw),
        f"{kind.expects} or nothing",
        kind.number_format,
    )


TEXT = Kind(lambda value, _zone: escape(value), _read_text, "text", "@")
WHOLE = Kind(lambda value, _zone: value, _read_whole, "a whole number", "#,##0")
REAL = Kind(
    lambda value, _zone: value if isfinite(value) else str(value),
    _read_number,
    "a number",
    "#,##0.###",
)
TIME = Kind(clock, _read_time, "a time like 2026-05-08 22:00+02:00", "@")
MILLISECONDS = _scaled(MS, "#,##0.0##")
GIBIBYTES = _scaled(GIB, "#,##0.0")
MEGABYTES_PER_SECOND = _scaled(MB, "#,##0.0")
PERCENT = _scaled(units.PERCENT, "#,##0.0##")
MONEY = _scaled(CENTS, "#,##0.00")
