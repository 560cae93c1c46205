"""Recurrences: weekday words and RFC 5545 rules to dates."""

import re
from datetime import UTC, date, datetime, time, timedelta

from dateutil.rrule import rrulestr

from placer.windows.clock import zone_named

_DAYS = ("monday", "tuesday", "wednesday", "thursday", "friday", "saturday", "sunday")
_CODES = ("MO", "TU", "WE", "TH", "FR", "SA", "SU")
_GROUPS = {"daily": "mon-sun", "weekdays": "mon-fri", "weekends": "sat-sun"}
_FREQUENCIES = ("DAILY", "WEEKLY", "MONTHLY", "YEARLY")
_CLOCK_PARTS = ("BYHOUR", "BYMINUTE", "BYSECOND")
_DAY_PARTS = {"BYDAY", "BYMONTHDAY", "BYYEARDAY"}
_MOMENT = re.compile(r"(UNTIL=)?(\d{8}T\d{6})(Z?)")


def dates(
    opens_on: str,
    first: date,
    last: date,
    at: time = time.min,
    zone: str = "UTC",
) -> tuple[date, ...]:
    """Return the dates of a recurrence from ``first`` to ``last``, both included.

    Parameters
    ----------
    opens_on
        Weekday words ("Fri", "Mon-Thu", "Mon, Wed", "daily", "weekdays", "weekends") or
        an RFC 5545 rule ("FREQ=MONTHLY;BYDAY=1SA"), with DTSTART, EXDATE and RDATE
        lines if need be.
    first, last
        Range asked for; ``first`` stands in for a missing DTSTART.  It is a date of the
        recurrence only where the rule says so.
    at, zone
        Local time of day that the dates are for: UNTIL may end the rule within a day.

    Raises
    ------
    ValueError
        The text is neither, the rule is wrong, or it repeats within a day.
    """
    text = " ".join(opens_on.upper().split())
    rule = text if "=" in text else _rule_of_words(opens_on)
    _check(_parts(rule), opens_on)
    rule = re.sub(r"DTSTART[^: ]*:|EXDATE[^: ]*:|RDATE[^: ]*:", _without_zone, rule)
    rule = _MOMENT.sub(lambda moment: _day_of(moment, at, zone), rule)
    return _between(rule, opens_on, first, last)


def counts_from_a_date(opens_on: str) -> bool:
    """Return whether a recurrence means nothing without a date to count from.

    So it is with an interval, a count, or a day that only the first date names.
    """
    text = " ".join(opens_on.upper().split())
    if "=" not in text or "DTSTART" in text:
        return False
    parts = _parts(text)
    fixed = parts.get("FREQ") == "DAILY" or bool(_DAY_PARTS & parts.keys())
    return not fixed or "COUNT" in parts or parts.get("INTERVAL", "1") != "1"


def _rule_of_words(words: str) -> str:
    """Return weekday words as an RFC 5545 rule."""
    text = re.sub(r"\s*[-\u2013]\s*", "-", words.strip().lower())
    items = [item for item in re.split(r"[\s,;]+|\band\b", text) if item]
    found = {day for item in items for day in _days(_GROUPS.get(item, item), words)}
    if not found:
        raise _not_days(words)
    return "FREQ=WEEKLY;BYDAY=" + ",".join(_CODES[day] for day in sorted(found))


def _days(item: str, words: str) -> list[int]:
    """Return the weekdays of "mon" or "fri-mon"; 0 is Monday."""
    start, dash, end = item.partition("-")
    begin = _weekday(start, words)
    length = (_weekday(end, words) - begin) % 7 if dash else 0
    return [(begin + step) % 7 for step in range(length + 1)]


def _weekday(name: str, words: str) -> int:
    """Return the number of a weekday from its name or the first letters of it."""
    for number, day in enumerate(_DAYS):
        if len(name) >= 2 and name in (day[: len(name)], day + "s"):
            return number
    raise _not_days(words)


def _not_days(words: str) -> ValueError:
    return ValueError(
        f'"{words}" names no days; write Fri, Mon-Thu, "Mon, Wed", daily, weekdays, '
        "or a rule such as FREQ=WEEKLY;BYDAY=TU"
    )


def _parts(text: str) -> dict[str, str]:
    """Return the parts of the rule line, such as FREQ and BYDAY."""
    lines = [line for line in text.split() if "FREQ=" in line]
    line = lines[0].removeprefix("RRULE:") if lines else ""
    return {
        name: value for name, _, value in (p.partition("=") for p in line.split(";"))
    }


def _check(parts: dict[str, str], said: str) -> None:
    """Refuse what has no sense for whole days or would never end."""
    frequency = parts.get("FREQ", "")
    if frequency not in _FREQUENCIES:
        raise ValueError(
            f'"{said}" must repeat by days or longer: FREQ is one of '
            + ", ".join(_FREQUENCIES)
        )
    if any(part in parts for part in _CLOCK_PARTS):
        raise ValueError(f'"{said}" names hours; the time of day stands on its own')
    if "COUNT" in parts and "UNTIL" in parts:
        raise ValueError(f'"{said}" has both COUNT and UNTIL; keep one')
    for part in ("INTERVAL", "COUNT"):
        if not re.fullmatch(r"0*[1-9]\d*", parts.get(part, "1")):
            raise ValueError(f'"{said}": {part} must be a whole number above 0')


def _without_zone(head: re.Match[str]) -> str:
    """Return "DTSTART:" for "DTSTART;TZID=...:": only the dates count here."""
    return head[0].partition(";")[0].rstrip(":") + ":"


def _day_of(moment: re.Match[str], at: time, zone: str) -> str:
    """Return a moment as a local date; for UNTIL the last whose ``at`` is within."""
    when = datetime.strptime(moment[2], "%Y%m%dT%H%M%S")
    if moment[3]:
        when = when.replace(tzinfo=UTC).astimezone(zone_named(zone))
    early = bool(moment[1]) and when.time() < at
    return f"{moment[1] or ''}{when.date() - timedelta(days=early):%Y%m%d}"


def _between(rule: str, said: str, first: date, last: date) -> tuple[date, ...]:
    start, end = (datetime.combine(day, time.min) for day in (first, last))
    try:
        found = rrulestr(rule, dtstart=start, forceset=True, ignoretz=True)
    except (ValueError, KeyError, TypeError, AttributeError) as error:
        raise ValueError(f'"{said}" is no recurrence rule: {error}') from None
    return tuple(when.date() for when in found.between(start, end, inc=True))
