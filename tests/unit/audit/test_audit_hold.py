"""The hold counts wall time, over the changes of offset."""

from datetime import UTC, datetime

import pytest

from placer.audit.moves import days_later


def utc(text: str) -> int:
    """Return an instant of ISO 8601 in UTC [min]."""
    return int(datetime.fromisoformat(text).replace(tzinfo=UTC).timestamp()) // 60


# IANA time zone data: Copenhagen +1, from 29 March to 25 October 2026 +2.
@pytest.mark.parametrize(
    ("opens", "released"),
    [
        ("2026-03-13T21:00", "2026-03-27T21:00"),
        ("2026-03-20T21:00", "2026-04-03T20:00"),
        ("2026-10-16T20:00", "2026-10-30T21:00"),
    ],
)
def test_fourteen_days_end_at_the_same_wall_time(opens: str, released: str) -> None:
    assert days_later(utc(opens), 14, "Europe/Copenhagen") == utc(released)


def test_a_skipped_wall_time_counts_with_the_offset_before() -> None:
    """New York, 2007-03-11 02:30 does not exist and is 07:30 UTC: RFC 5545, 3.3.5."""
    opens = utc("2007-03-10T07:30")
    assert days_later(opens, 1, "America/New_York") == utc("2007-03-11T07:30")


def test_a_repeated_wall_time_counts_the_first_time() -> None:
    """New York, 2007-11-04 01:30 is first 05:30 UTC: RFC 5545, 3.3.5."""
    opens = utc("2007-11-03T05:30")
    assert days_later(opens, 1, "America/New_York") == utc("2007-11-04T05:30")


def test_no_days_of_hold_change_nothing() -> None:
    opens = utc("2026-03-13T21:00")
    assert days_later(opens, 0, "Europe/Copenhagen") == opens
