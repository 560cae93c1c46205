"""Recurrences: weekday words and RFC 5545 rules to dates."""

import re
from datetime import UTC, date, datetime, time, timedelta, tzinfo

from dateutil.rrule import rrulestr

from placer.windows.clock import zone_named
from placer.windows.weekdays import rule_of_words

_FREQUENCIES = ("DAILY", "WEEKLY", "MONTHLY", "YEARLY")
_CLOCK_PARTS = {"BYHOUR", "BYMINUTE", "BYSECOND"}
_DAY_PARTS = {"BYDAY", "BYMONTHDAY", "BYYEARDAY"}
_HIGHEST = {"BYMONTH": 12, "BYMONTHDAY": 31, "BYYEARDAY": 366, "BYWEEKNO": 53}
_NUMBERED = {"MONTHLY": 5, "YEARLY": 53}
_DATED = re.compile(r"(DTSTART|EXDATE)(?:;[^:]*)?:(\d{8}(?:T\d{6}Z?)?(?:,\d{8}.*)?)")
_MOMENT = re.compile(r"(UNTIL=)?(\d{8}T\d{6})(Z?)")
_UNTIL = re.compile(r"\d{8}(T\d{6}Z?)?")


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
        an RFC 5545 rule ("FREQ=MONTHLY;BYDAY=1SA"), with DTSTART and EXDATE lines
        beside it if need be; of these only the dates count.
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
    rule, dated = _lines(opens_on)
    _check(_parts(rule, opens_on), opens_on)
    text = "\n".join((*dated, f"RRULE:{rule}"))
    place = zone_named(zone)
    start, end = (datetime.combine(day, time.min) for day in (first, last))
    try:
        days = _MOMENT.sub(lambda moment: _day_of(moment, at, place), text)
        found = rrulestr(days, dtstart=start, forceset=True)
    except ValueError as error:
        raise _wrong(opens_on, str(error)) from None
    return tuple(when.date() for when in found.between(start, end, inc=True))


def counts_from_a_date(opens_on: str) -> bool:
    """Return whether a recurrence means nothing without a date to count from.

    So it is with an interval, a count, or a day that only the first date names.

    Raises
    ------
    ValueError
        The text is neither weekday words nor a rule.
    """
    rule, dated = _lines(opens_on)
    parts = _parts(rule, opens_on)
    fixed = parts.get("FREQ") == "DAILY" or bool(_DAY_PARTS & parts.keys())
    counts = not fixed or "COUNT" in parts or parts.get("INTERVAL", "1") != "1"
    return counts and not any(line.startswith("DTSTART") for line in dated)


def _lines(said: str) -> tuple[str, list[str]]:
    """Return the rule and the dated lines beside it, these without their zones."""
    if "=" not in said:
        return rule_of_words(said), []
    lines = said.upper().split()
    dated = [_DATED.sub(r"\1:\2", line) for line in lines if _DATED.fullmatch(line)]
    rules = [line for line in lines if not _DATED.fullmatch(line)]
    if len(rules) != 1:
        raise _wrong(said, "one rule, and beside it DTSTART or EXDATE with dates")
    return rules[0].removeprefix("RRULE:"), dated


def _parts(rule: str, said: str) -> dict[str, str]:
    """Return the parts of a rule, such as FREQ and BYDAY."""
    pairs = [part.partition("=") for part in rule.split(";")]
    parts = {name: value for name, _, value in pairs if name and value}
    if len(parts) != len(pairs):
        raise _wrong(said, "its parts read NAME=VALUE;NAME=VALUE, no name twice")
    return parts


def _check(parts: dict[str, str], said: str) -> None:
    """Refuse what has no sense for whole days, has no end or no dates."""
    frequency = parts.get("FREQ", "")
    if frequency not in _FREQUENCIES:
        raise _wrong(said, "FREQ must be one of " + ", ".join(_FREQUENCIES))
    if _CLOCK_PARTS & parts.keys():
        raise _wrong(said, "the time of day stands on its own, not in the rule")
    if "COUNT" in parts and "UNTIL" in parts:
        raise _wrong(said, "it has both COUNT and UNTIL; keep one")
    if not _UNTIL.fullmatch(parts.get("UNTIL", "20000101")):
        raise _wrong(said, "UNTIL is a date such as 20261231")
    for part in ("INTERVAL", "COUNT"):
        if not re.fullmatch(r"0*[1-9]\d{0,4}", parts.get(part, "1")):
            raise _wrong(said, f"{part} must be a whole number from 1 to 99999")
    _check_numbers(parts, said)


def _check_numbers(parts: dict[str, str], said: str) -> None:
    """Refuse numbers of days, weeks and months that no year has."""
    for part, highest in _HIGHEST.items():
        if not _within(parts.get(part, "1"), highest):
            raise _wrong(said, f"{part} goes from 1 to {highest}")
    numbers = re.findall(r"\d+", parts.get("BYDAY", ""))
    weeks = _NUMBERED.get(parts["FREQ"], 0)
    highest = min(weeks, 5) if "BYMONTH" in parts else weeks
    if numbers and not _within(",".join(numbers), highest):
        sentence = "BYDAY numbers weekdays up to 5 in a month, up to 53 in a year"
        raise _wrong(said, sentence)


def _within(values: str, highest: int) -> bool:
    """Return whether all values are numbers from 1 on, counted from either end."""
    return all(
        re.fullmatch(r"[+-]?\d{1,3}", value) and 1 <= abs(int(value)) <= highest
        for value in values.split(",")
    )


def _day_of(moment: re.Match[str], at: time, zone: tzinfo) -> str:
    """Return a moment as a local date; for UNTIL the last whose ``at`` is within."""
    when = datetime.strptime(moment[2], "%Y%m%dT%H%M%S")
    if moment[3]:
        when = when.replace(tzinfo=UTC).astimezone(zone)
    early = bool(moment[1]) and when.time() < at
    return f"{moment[1] or ''}{when.date() - timedelta(days=early):%Y%m%d}"


def _wrong(said: str, why: str) -> ValueError:
    return ValueError(f'"{said}" is no rule of days (RFC 5545): {why}')
