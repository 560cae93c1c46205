"""Quantities and their rounding, in one place.

Everything inside placer is a whole number of a small unit: bytes, bytes per second,
microseconds, thousandths of a request per second, parts per million, minutes since
1970-01-01 UTC, hundredths of the currency.  Demand is rounded up and supply down, here
and nowhere else.
"""

from decimal import ROUND_CEILING, ROUND_FLOOR, ROUND_HALF_EVEN, Decimal
from enum import Enum
from fractions import Fraction
from math import ceil, floor

KIB = 2**10
MIB = 2**20
GIB = 2**30
KB = 10**3
MB = 10**6
GB = 10**9
TB = 10**12
MILLI = 10**3
PPM = 10**6
PERCENT = 10**4
MS = 10**3
CENTS = 10**2
MINUTES_PER_HOUR = 60
MINUTES_PER_DAY = 1440
SECONDS_PER_DAY = 86_400
DAYS_PER_YEAR = 365
MONTHS_PER_YEAR = 12

Exact = int | Fraction | Decimal


class Side(Enum):
    """Which way a quantity is rounded when it becomes a whole number."""

    DEMAND = ROUND_CEILING
    SUPPLY = ROUND_FLOOR
    NEUTRAL = ROUND_HALF_EVEN


def whole(number: Decimal, unit: int, side: Side) -> int:
    """Return a typed number as a whole count of the small unit.

    Parameters
    ----------
    number
        [any] the number as the user typed it.
    unit
        [1] how many small units one of the typed unit holds.
    side
        Whether the number is demand (rounded up), supply (down) or neither.
    """
    return int((number * unit).to_integral_value(rounding=side.value))


def demand(value: Exact) -> int:
    """Round a demand up to a whole number."""
    return ceil(value)


def supply(value: Exact) -> int:
    """Round a supply down to a whole number."""
    return floor(value)


def gib(size: float) -> float:
    """Return bytes [B] in GiB."""
    return size / GIB


def percent(share: float) -> float:
    """Return parts per million in percent."""
    return share / PERCENT
