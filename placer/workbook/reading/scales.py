"""Units of headings, and how many of the small units of placer each one holds."""

import re
import unicodedata
from functools import cache

from placer.units import (
    CENTS,
    DAYS_PER_YEAR,
    GB,
    GIB,
    KB,
    KIB,
    MB,
    MIB,
    MILLI,
    MINUTES_PER_HOUR,
    MS,
    PERCENT,
    PPM,
    TB,
)
from placer.workbook.column import Column, Kind

_SIZES = {
    "B": 1,
    "KB": KB,
    "KiB": KIB,
    "MB": MB,
    "MiB": MIB,
    "GB": GB,
    "GiB": GIB,
    "TB": TB,
    "TiB": GIB * KIB,
    "PB": TB * KB,
    "PiB": GIB * MIB,
}
_BITS = {"Mbit/s": MB // 8, "Gbit/s": GB // 8}
_RATES = {f"{unit}/s": size for unit, size in _SIZES.items()} | _BITS
_RATIOS = {"": PPM, "%": PERCENT}
_TIMES = {"us": 1, "ms": MS, "s": MS * MS}
_DIMENSIONS: tuple[dict[str, int], ...] = (
    {"s": 1},
    _SIZES,
    _RATES,
    _TIMES,
    {"1/s": MILLI},
    {"%": PERCENT},
    {"%/year": PERCENT},
    {"min": 1, "h": MINUTES_PER_HOUR},
    {"days": 1, "weeks": 7, "years": DAYS_PER_YEAR},
    {"months": 1},
    {"working days": 1},
    {"money": CENTS},
)
_OTHER_SPELLINGS = {
    "kB": "KB",
    "kB/s": "KB/s",
    "MBps": "MB/s",
    "MB/sec": "MB/s",
    "MiB/sec": "MiB/s",
    "Mb/s": "Mbit/s",
    "Mbps": "Mbit/s",
    "Mbits/s": "Mbit/s",
    "Gb/s": "Gbit/s",
    "Gbps": "Gbit/s",
    "iops": "1/s",
    "io/s": "1/s",
    "/s": "1/s",
    "\u03bcs": "us",
    "percent": "%",
    "% per year": "%/year",
    "hours": "h",
    "minutes": "min",
    "day": "days",
    "year": "years",
}
_BINARY_TWIN = {
    "KB": "KiB",
    "MB": "MiB",
    "GB": "GiB",
    "TB": "TiB",
    "PB": "PiB",
}


def _spellings() -> dict[str, str]:
    """Return exact spellings, and those without case that mean one unit only."""
    exact = {unit: unit for dimension in _DIMENSIONS for unit in dimension}
    exact |= _OTHER_SPELLINGS
    loose: dict[str, set[str]] = {}
    for spelling, unit in exact.items():
        loose.setdefault(spelling.casefold(), set()).add(unit)
    clear = {text: min(units) for text, units in loose.items() if len(units) == 1}
    return clear | exact


_SPELLINGS = _spellings()


@cache
def unit_named(text: str) -> str | None:
    """Return the unit a text means; "per drive" and the like are left aside."""
    plain = " ".join(unicodedata.normalize("NFKC", text).split())
    base = re.sub(r" per (drive|controller)$", "", plain)
    return _SPELLINGS.get(base, _SPELLINGS.get(base.casefold()))


def is_rate(unit: str | None) -> bool:
    """Return whether a unit is one of bytes per second."""
    return unit in _RATES


def own_scale(column: Column) -> int:
    """Return how many small units one of the column's own unit holds."""
    return _dimension(column)[unit_named(column.unit) or ""]


def scale(column: Column, unit: str | None, gb: str = "") -> int | None:
    """Return how many small units a unit holds; None: it does not fit the column.

    Parameters
    ----------
    gb
        What GB means where it is asked: 2^30, or else 10^9.
    """
    twin = gb == "2^30" and asks_gb(column, unit)
    meant = _BINARY_TWIN[unit] if unit and twin else unit
    return _dimension(column).get(meant or "")


def unit_matters(column: Column) -> bool:
    """Return whether a heading without a unit could mean several."""
    return _dimension(column) in (_SIZES, _RATES, _TIMES)


def asks_gb(column: Column, unit: str | None) -> bool:
    """Return whether GB and the like stand where a heading of ours says GiB."""
    return column.unit == "GiB" and unit in _BINARY_TWIN


def _dimension(column: Column) -> dict[str, int]:
    if column.kind is Kind.RATIO:
        return _RATIOS
    unit = unit_named(column.unit)
    return next((each for each in _DIMENSIONS if unit in each), {"": 1})
