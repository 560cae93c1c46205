"""Instants and local times; changes of offset are tested under ``worked``."""

from datetime import date, time, timedelta

import pytest
from dateutil.rrule import DAILY, FR, MO, TH, TU, WE, rrule
from hypothesis import given
from hypothesis import strategies as st

from placer.windows.clock import days_later, instant, local, working_days_later

ZONES = (
    "UTC",
    "Europe/Lisbon",
    "America/New_York",
    "Asia/Kathmandu",
    "Pacific/Chatham",
)
MINUTES = st.integers(0, 100 * 366 * 1440)
DAYS = st.dates(date(2000, 1, 1), date(2060, 1, 1))


@given(MINUTES, st.sampled_from(ZONES))
def test_instant_of_the_local_time_is_the_instant_or_its_first_occurrence(
    minute: int, zone: str
) -> None:
    """A repeated hour means the first, at most one hour before."""
    shown = local(minute, zone)
    back = instant(shown.date(), shown.time(), zone)
    assert back == minute if shown.fold == 0 else minute - 60 <= back < minute


@given(MINUTES, st.integers(0, 60), st.sampled_from(ZONES))
def test_days_later_keeps_the_wall_time_or_lands_behind_a_gap(
    minute: int, days: int, zone: str
) -> None:
    before = local(minute, zone)
    after = local(days_later(minute, days, zone), zone)
    wall = before.replace(tzinfo=None) + timedelta(days=days)
    late = after.replace(tzinfo=None) - wall
    assert late in (timedelta(0), timedelta(hours=1))


@pytest.mark.parametrize(
    "zone", ["", "Europe", "Harbour/Hall", "../UTC", "UTC ", "\0", "CET+1"]
)
def test_unknown_zone_is_refused_with_a_sentence(zone: str) -> None:
    for ask in (
        lambda: instant(date(2026, 5, 4), time(9), zone),
        lambda: local(0, zone),
        lambda: days_later(0, 1, zone),
    ):
        with pytest.raises(ValueError, match="is no time zone; write one such as"):
            ask()


def test_change_lead_of_ten_working_days() -> None:
    """Counted by hand: planned on Monday 20 April 2026, earliest Monday 4 May."""
    assert working_days_later(date(2026, 4, 20), 10) == date(2026, 5, 4)


@pytest.mark.parametrize("day", [18, 19, 20])
def test_lead_over_a_weekend_counts_from_monday(day: int) -> None:
    """Ten full working days from Saturday, Sunday or Monday end with Friday 1 May."""
    assert working_days_later(date(2026, 4, day), 10) == date(2026, 5, 4)


@given(DAYS)
def test_no_lead_is_the_day_itself(day: date) -> None:
    assert working_days_later(day, 0) == day


@given(DAYS, st.integers(1, 60))
def test_lead_agrees_with_a_recurrence_of_working_days(day: date, days: int) -> None:
    """The working day after as many as asked, by the recurrence library."""
    working = rrule(DAILY, dtstart=day, count=days + 1, byweekday=(MO, TU, WE, TH, FR))
    assert working_days_later(day, days) == list(working)[-1].date()
