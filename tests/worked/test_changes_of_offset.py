"""Nights on which the clocks change, against the rules that make them change.

Rules: RFC 5545 (IETF, 2009), 3.3.5 and 3.3.6; United States: second Sunday of March to
first Sunday of November at 02:00 local (Energy Policy Act 2005; RFC 5545, 3.6.5, prints
the same rule); European Union: last Sundays of March and October at 01:00 UTC
(Directive 2000/84/EC, from memory; London keeps the same dates, from memory).
Lord Howe and Kolkata: IANA time zone data, 2025b.
"""

from datetime import UTC, date, datetime, time, timedelta

import pytest
from dateutil.rrule import rrulestr

from placer.estate import Window
from placer.units import MB, MINUTES_PER_DAY, TB
from placer.windows.calendar import WindowRule, expand
from placer.windows.clock import days_later, instant, local

NEW_YORK = "America/New_York"
BERLIN = "Europe/Berlin"
LONDON = "Europe/London"
YEARS = range(2024, 2028)


def utc(*parts: int) -> int:
    """Return an instant of UTC [min], by plain counting from 1970."""
    since = datetime(*parts) - datetime(1970, 1, 1)  # type: ignore[arg-type]
    return since // timedelta(minutes=1)


def sunday(year: int, rule: str) -> date:
    """Return the Sunday of a year that a yearly rule names."""
    start = datetime(year, 1, 1)
    return rrulestr(f"FREQ=YEARLY;COUNT=1;{rule}", dtstart=start)[0].date()


def minutes_of(day: date, zone: str) -> int:
    """Return the length of a local day [min]."""
    following = day + timedelta(days=1)
    return instant(following, time(), zone) - instant(day, time(), zone)


def night(
    zone: str, day: date, opens: int, closes: int | None, minutes: int | None = None
) -> Window:
    """Return the window that opens on a day, between whole hours of the clock."""
    rule = WindowRule(
        name="night",
        opens_on="daily",
        opens_at=time(opens),
        closes_at=None if closes is None else time(closes),
        lasts_minutes=minutes,
        zone=zone,
    )
    (window,) = expand([rule], [], day, day)
    return window


def test_skipped_local_time_uses_the_offset_before_the_gap() -> None:
    """RFC 5545, 3.3.5: 2007-03-11 02:30 in New York is 03:30 EDT, 07:30 UTC."""
    found = instant(date(2007, 3, 11), time(2, 30), NEW_YORK)
    assert found == utc(2007, 3, 11, 7, 30)
    assert found - instant(date(2007, 3, 11), time(1, 30), NEW_YORK) == 60
    assert local(found, NEW_YORK).time() == time(3, 30)


@pytest.mark.parametrize("fold", [0, 1])
def test_repeated_local_time_means_the_first(fold: int) -> None:
    """RFC 5545, 3.3.5: 2007-11-04 01:30 in New York is EDT, 05:30 UTC."""
    found = instant(date(2007, 11, 4), time(1, 30, fold=fold), NEW_YORK)
    assert found == utc(2007, 11, 4, 5, 30)


@pytest.mark.parametrize(
    ("day", "hours"),
    [(date(2025, 3, 8), 23), (date(2025, 7, 8), 24), (date(2025, 11, 1), 25)],
)
def test_days_are_nominal(day: date, hours: int) -> None:
    """RFC 5545, 3.3.6: a day later is the same wall time, not 24 hours."""
    noon = instant(day, time(12), NEW_YORK)
    later = days_later(noon, 1, NEW_YORK)
    assert later - noon == hours * 60
    assert local(later, NEW_YORK).time() == time(12)


@pytest.mark.parametrize(
    ("day", "closes"), [(date(2025, 3, 8), time(7)), (date(2025, 11, 1), time(5))]
)
def test_hours_are_exact(day: date, closes: time) -> None:
    """RFC 5545, 3.3.6: eight hours from 22:00 end at 07:00 EDT or 05:00 EST."""
    window = night(NEW_YORK, day, 22, None, minutes=480)
    assert window.end - window.start == 480
    assert local(window.end, NEW_YORK).time() == closes


@pytest.mark.parametrize("year", YEARS)
def test_new_york_days_of_23_and_25_hours(year: int) -> None:
    """Energy Policy Act 2005; the changes are at 07:00 and 06:00 UTC."""
    spring = sunday(year, "BYMONTH=3;BYDAY=2SU")
    autumn = sunday(year, "BYMONTH=11;BYDAY=1SU")
    assert minutes_of(spring, NEW_YORK) == 23 * 60
    assert minutes_of(autumn, NEW_YORK) == 25 * 60
    change = utc(spring.year, spring.month, spring.day, 7)
    assert local(change - 1, NEW_YORK).time() == time(1, 59)
    assert local(change, NEW_YORK).time() == time(3)
    back = utc(autumn.year, autumn.month, autumn.day, 6)
    assert local(back - 1, NEW_YORK).time() == time(1, 59)
    assert local(back, NEW_YORK).replace(tzinfo=None).time() == time(1)


@pytest.mark.parametrize("zone", [BERLIN, LONDON])
@pytest.mark.parametrize("year", YEARS)
def test_european_days_of_23_and_25_hours(zone: str, year: int) -> None:
    """Directive 2000/84/EC (from memory); both changes are at 01:00 UTC."""
    for rule, hours in (("BYMONTH=3;BYDAY=-1SU", 23), ("BYMONTH=10;BYDAY=-1SU", 25)):
        day = sunday(year, rule)
        change = utc(day.year, day.month, day.day, 1)
        assert minutes_of(day, zone) == hours * 60
        offsets = [local(change + step, zone).utcoffset() for step in (-1, 0)]
        assert offsets[0] != offsets[1]


@pytest.mark.parametrize(
    ("zone", "month", "days", "hours"),
    [
        (NEW_YORK, 3, (10, 9, 8, 14), 23),
        (NEW_YORK, 11, (3, 2, 1, 7), 25),
        (BERLIN, 3, (31, 30, 29, 28), 23),
        (BERLIN, 10, (27, 26, 25, 31), 25),
    ],
)
def test_changes_fall_on_the_dates_published(
    zone: str, month: int, days: tuple[int, ...], hours: int
) -> None:
    """IANA time zone data, 2025b: the days of the change in 2024 to 2027."""
    dated = [date(year, month, day) for year, day in zip(YEARS, days, strict=True)]
    assert {minutes_of(day, zone) for day in dated} == {hours * 60}


def test_lord_howe_changes_by_half_an_hour() -> None:
    zone = "Australia/Lord_Howe"
    assert minutes_of(date(2025, 10, 5), zone) == 23 * 60 + 30
    assert minutes_of(date(2025, 4, 6), zone) == 24 * 60 + 30


def test_lord_howe_window_over_the_change_is_half_an_hour_off() -> None:
    zone = "Australia/Lord_Howe"
    lengths = [
        window.end - window.start
        for day in (date(2025, 10, 4), date(2025, 4, 5), date(2025, 7, 1))
        for window in [night(zone, day, 22, 6)]
    ]
    assert lengths == [450, 510, 480]


def test_kolkata_never_changes() -> None:
    days = (date(2024, 1, 1) + timedelta(days=number) for number in range(4 * 365 + 1))
    assert {minutes_of(day, "Asia/Kolkata") for day in days} == {MINUTES_PER_DAY}


@pytest.mark.parametrize(
    ("zone", "day", "hours"),
    [
        (NEW_YORK, date(2025, 3, 8), 7),
        (NEW_YORK, date(2025, 11, 1), 9),
        (BERLIN, date(2025, 3, 29), 7),
        (BERLIN, date(2025, 10, 25), 9),
        (BERLIN, date(2025, 7, 1), 8),
        (LONDON, date(2026, 3, 28), 7),
        (LONDON, date(2026, 10, 24), 9),
    ],
)
def test_ten_to_six_over_the_change(zone: str, day: date, hours: int) -> None:
    """IANA time zone data: 22:00-06:00 lasts 7, 8 or 9 hours."""
    window = night(zone, day, 22, 6)
    assert window.end - window.start == hours * 60


@pytest.mark.parametrize(
    ("zone", "day", "hours"),
    [
        (NEW_YORK, date(2025, 3, 9), 3),
        (NEW_YORK, date(2025, 11, 2), 5),
        (BERLIN, date(2025, 3, 30), 3),
        (BERLIN, date(2025, 10, 26), 5),
    ],
)
def test_one_to_five_over_the_change(zone: str, day: date, hours: int) -> None:
    """IANA time zone data: 01:00-05:00 lasts 3 or 5 hours."""
    window = night(zone, day, 1, 5)
    assert window.end - window.start == hours * 60


@pytest.mark.parametrize(
    ("day", "tenths"),
    [(date(2025, 3, 8), 126), (date(2025, 7, 1), 144), (date(2025, 11, 1), 162)],
)
def test_bytes_that_a_night_carries(day: date, tenths: int) -> None:
    """500 MB/s carry 12.6, 14.4 and 16.2 TB in 7, 8 and 9 hours (plain arithmetic)."""
    window = night(NEW_YORK, day, 22, 6)
    assert 500 * MB * (window.end - window.start) * 60 == tenths * TB // 10


def test_instants_count_utc_minutes() -> None:
    """Plain counting: 2026-05-08 22:00 UTC."""
    assert instant(date(2026, 5, 8), time(22), "UTC") == utc(2026, 5, 8, 22)
    assert local(utc(2026, 5, 8, 22), "UTC") == datetime(2026, 5, 8, 22, tzinfo=UTC)
