"""How the audit says its figures: units, local clock times, names of things."""

from collections.abc import Iterable
from datetime import UTC, datetime
from fractions import Fraction
from zoneinfo import ZoneInfo

from placer.units import GIB, MB, MILLI, MS

FIRST, LAST = (
    int(datetime(year, 1, 2, tzinfo=UTC).timestamp()) // 60 for year in (1, 9999)
)
"""Instants [min UTC] that a calendar holds in every zone."""


def figure(value: Fraction | float, unit: str) -> str:
    """Return a value with its unit: whole numbers bare, others with three places."""
    text = f"{float(value):,.3f}".rstrip("0").rstrip(".")
    return f"{text} {unit}"


def gib(size: int) -> str:
    """Return a size [B] in GiB."""
    return figure(Fraction(size, GIB), "GiB")


def rate(bytes_per_second: int) -> str:
    """Return a rate [B/s] in MB/s."""
    return figure(Fraction(bytes_per_second, MB), "MB/s")


def requests(thousandths: int) -> str:
    """Return a request rate [1/1000 s] in requests/s."""
    return figure(Fraction(thousandths, MILLI), "requests/s")


def wait(microseconds: int) -> str:
    """Return a response [µs] in ms, or the word for an unknown one (0)."""
    return figure(Fraction(microseconds, MS), "ms") if microseconds else "unknown"


def clock(minute: int, zone: str) -> str:
    """Return an instant [min UTC] as local day and time with its offset.

    What no calendar holds comes back as the bare count: a plan may state anything.
    """
    if not FIRST < minute < LAST:
        return f"minute {minute}"
    local = datetime.fromtimestamp(minute * 60, UTC).astimezone(ZoneInfo(zone))
    return local.strftime("%a %Y-%m-%d %H:%M %z")


def names(things: Iterable[str]) -> str:
    """Return names in order, with commas."""
    return ", ".join(sorted(things))
