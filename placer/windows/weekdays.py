"""Weekday words, as people write them."""

import re

_DAYS = ("monday", "tuesday", "wednesday", "thursday", "friday", "saturday", "sunday")
_CODES = ("MO", "TU", "WE", "TH", "FR", "SA", "SU")
_GROUPS = {"daily": "mon-sun", "weekdays": "mon-fri", "weekends": "sat-sun"}


def rule_of_words(words: str) -> str:
    """Return weekday words ("Fri", "Mon-Thu", "daily") as an RFC 5545 rule.

    Raises
    ------
    ValueError
        A word names no day.
    """
    text = re.sub(r"\s*[-\u2013]\s*", "-", words.strip().lower())
    items = [item for item in re.split(r"[\s,;]+|\band\b", text) if item]
    found = {day for item in items for day in _days(_GROUPS.get(item, item), words)}
    if not found:
        raise _no_days(words)
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
        if len(name) >= 2 and f"{day}s".startswith(name):
            return number
    raise _no_days(words)


def _no_days(words: str) -> ValueError:
    return ValueError(
        f'"{words}" names no days; write Fri, Mon-Thu, "Mon, Wed", daily, weekdays, '
        "or a rule such as FREQ=WEEKLY;BYDAY=TU"
    )
