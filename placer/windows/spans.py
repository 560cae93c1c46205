"""Spans of time: recurring ones as instants, and one with others cut out."""

from collections.abc import Iterable
from dataclasses import dataclass
from datetime import date, time, timedelta

from placer.units import MINUTES_PER_DAY
from placer.windows.clock import instant
from placer.windows.recurrence import counts_from_a_date, dates

Piece = tuple[int, int]


@dataclass(frozen=True, slots=True, kw_only=True)
class Recurring:
    """A time of day on recurring days: either a length [min] or a wall-clock end."""

    name: str
    on: str
    at: time
    lasts: int | None
    ends_at: time | None
    zone: str
    first: date | None
    until: date | None

    @property
    def days_at_most(self) -> int:
        """Days that one occurrence may reach past its own [d]."""
        return (self.lasts or 0) // MINUTES_PER_DAY + 2


@dataclass(frozen=True, slots=True)
class Span:
    """One occurrence: its local date and [start, end) [min UTC]."""

    day: date
    start: int
    end: int


def spans(recurring: Recurring, first: date, last: date) -> tuple[Span, ...]:
    """Return the occurrences on the days from ``first`` to ``last``.

    One that a change of offset leaves without a minute is left out.

    Raises
    ------
    ValueError
        The rule is wrong, has no length, or has no date to count from.
    """
    _check(recurring)
    latest = min(last, recurring.until or last)
    anchor = recurring.first or first
    days = dates(recurring.on, anchor, latest, recurring.at, recurring.zone)
    found = (_span(recurring, day) for day in days if day >= first)
    return tuple(span for span in found if span.start < span.end)


def cut(piece: Piece, frozen: Iterable[Piece]) -> tuple[Piece, ...]:
    """Return what is left of a piece [min UTC] outside of all that is frozen."""
    left = [piece]
    for start, end in frozen:
        sides = [
            side for a, b in left for side in ((a, min(b, start)), (max(a, end), b))
        ]
        left = [(a, b) for a, b in sides if a < b]
    return tuple(left)


def _check(recurring: Recurring) -> None:
    if (recurring.lasts is None) == (recurring.ends_at is None):
        raise ValueError(
            f'"{recurring.name}" must say either how long it lasts or when it ends'
        )
    if recurring.lasts is not None and recurring.lasts <= 0:
        raise ValueError(f'"{recurring.name}" must last longer than 0 minutes')
    if recurring.first is None and counts_from_a_date(recurring.on):
        raise ValueError(
            f'"{recurring.name}" repeats from a date on: give the date it counts from'
        )


def _span(recurring: Recurring, day: date) -> Span:
    """Return one occurrence: hours are exact, a wall-clock end may be the next day."""
    start = instant(day, recurring.at, recurring.zone)
    if recurring.ends_at is None:
        return Span(day, start, start + (recurring.lasts or 0))
    overnight = recurring.ends_at <= recurring.at
    closing = day + timedelta(days=overnight)
    return Span(day, start, instant(closing, recurring.ends_at, recurring.zone))
