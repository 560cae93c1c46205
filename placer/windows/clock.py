"""Local clocks and instants: the only place where zones become minutes."""

from datetime import UTC, date, datetime, time, timedelta
from zoneinfo import ZoneInfo

import numpy as np

from placer.units import MINUTES_PER_DAY, SECONDS_PER_DAY

_SECONDS_PER_MINUTE = SECONDS_PER_DAY // MINUTES_PER_DAY


def zone_named(name: str) -> ZoneInfo:
    """Return the time zone of an IANA name.

    Raises
    ------
    ValueError
        There is no such zone.
    """
    try:
        return ZoneInfo(name)
    except (KeyError, OSError, ValueError):
        sentence = f'"{name}" is no time zone; write one such as Europe/Lisbon or UTC'
        raise ValueError(sentence) from None


def instant(day: date, at: time, zone: str) -> int:
    """Return the instant [min UTC] of a local date and time.

    A local time that the clock skips is read with the offset before the gap, one that
    it repeats means the first (RFC 5545, 3.3.5).

    Raises
    ------
    ValueError
        There is no such zone.
    """
    wall = datetime.combine(day, at.replace(fold=0), zone_named(zone))
    return int(wall.timestamp() // _SECONDS_PER_MINUTE)


def local(minute: int, zone: str) -> datetime:
    """Return what the clocks of a zone show at an instant [min UTC].

    Raises
    ------
    ValueError
        There is no such zone.
    """
    shown = datetime.fromtimestamp(minute * _SECONDS_PER_MINUTE, UTC)
    return shown.astimezone(zone_named(zone))


def days_later(minute: int, days: int, zone: str) -> int:
    """Return the instant [min UTC] with the same wall time, days later.

    Days are nominal: one with a change of offset has 23 or 25 hours (RFC 5545, 3.3.6).

    Raises
    ------
    ValueError
        There is no such zone.
    """
    wall = local(minute, zone) + timedelta(days=days)
    return instant(wall.date(), wall.time(), zone)


def working_days_later(day: date, days: int) -> date:
    """Return the first day on which work may start, working days after another day.

    Counts Monday to Friday.  The day itself counts where it is a working day: that many
    full working days lie between its midnight and the day returned, which is a working
    day as well.  No days asked: the day itself, whatever it is.
    """
    if days == 0:
        return day
    return date.fromisoformat(str(np.busday_offset(day, days, roll="forward")))
