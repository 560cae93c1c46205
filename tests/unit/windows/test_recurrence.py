"""Words and rules a user may type, and the sentences for those that mean nothing."""

from datetime import date, time, timedelta

import pytest
from hypothesis import given
from hypothesis import strategies as st

from placer.windows.recurrence import counts_from_a_date, dates

MONDAY = date(2026, 5, 4)
SUNDAY = date(2026, 5, 10)


def weekdays(words: str) -> list[int]:
    """Return the weekdays of one whole week that the words name; 0 is Monday."""
    return [day.weekday() for day in dates(words, MONDAY, SUNDAY)]


@pytest.mark.parametrize(
    ("words", "expected"),
    [
        ("Fri", [4]),
        ("FRIDAY", [4]),
        ("Fridays", [4]),
        ("tu", [1]),
        ("Thurs", [3]),
        ("Mon-Thu", [0, 1, 2, 3]),
        ("Mon \u2013 Thu", [0, 1, 2, 3]),
        ("Fri-Mon", [0, 4, 5, 6]),
        ("Mon, Wed, Fri", [0, 2, 4]),
        ("Mon Wed and Fri", [0, 2, 4]),
        ("Tue, Sat-Sun", [1, 5, 6]),
        ("Fri, Fri, Friday", [4]),
        ("daily", [0, 1, 2, 3, 4, 5, 6]),
        ("Weekdays", [0, 1, 2, 3, 4]),
        ("weekends", [5, 6]),
        ("  sun  ", [6]),
        ("FREQ=WEEKLY;BYDAY=TU", [1]),
        ("RRULE:FREQ=WEEKLY;BYDAY=TU", [1]),
        ("rrule:freq=weekly;byday=tu", [1]),
    ],
)
def test_words_name_days_of_the_week(words: str, expected: list[int]) -> None:
    assert weekdays(words) == expected


@pytest.mark.parametrize(
    "words", ["", "  ", "someday", "M", "Mon-", "-Fri", "Mon-Fri-Sun", "5", "Fri 22:00"]
)
def test_words_that_name_no_days_are_refused(words: str) -> None:
    with pytest.raises(ValueError, match="names no days; write Fri"):
        dates(words, MONDAY, SUNDAY)


@pytest.mark.parametrize(
    ("rule", "sentence"),
    [
        ("FREQ=MINUTELY", "FREQ must be one of"),
        ("INTERVAL=2", "FREQ must be one of"),
        ("FREQ=DAILY;BYHOUR=9", "time of day stands on its own"),
        ("FREQ=DAILY;INTERVAL=0", "INTERVAL must be a whole number"),
        ("FREQ=DAILY;INTERVAL=-1", "INTERVAL must be a whole number"),
        ("FREQ=DAILY;COUNT=two", "COUNT must be a whole number"),
        ("FREQ=DAILY;COUNT=2;UNTIL=20260601", "both COUNT and UNTIL"),
        ("FREQ=DAILY;UNTIL=2026", "UNTIL is a date"),
        ("FREQ=DAILY;UNTIL=20260631", "invalid 'UNTIL'"),
        ("FREQ=DAILY;UNTIL=20260631T000000Z", "day is out of range"),
        ("FREQ=MONTHLY;BYMONTHDAY=32", "BYMONTHDAY goes from 1 to 31"),
        ("FREQ=MONTHLY;BYMONTHDAY=0", "BYMONTHDAY goes from 1 to 31"),
        ("FREQ=YEARLY;BYMONTH=13", "BYMONTH goes from 1 to 12"),
        ("FREQ=WEEKLY;BYDAY=1FR", "BYDAY numbers weekdays"),
        ("FREQ=WEEKLY;BYMONTH=3;BYDAY=1FR", "BYDAY numbers weekdays"),
        ("FREQ=MONTHLY;BYDAY=6FR", "BYDAY numbers weekdays"),
        ("FREQ=YEARLY;BYMONTH=12;BYDAY=53FR", "BYDAY numbers weekdays"),
        ("FREQ=WEEKLY;BYDAY=XX", "invalid 'BYDAY'"),
        ("FREQ=WEEKLY;BYDAY=", "NAME=VALUE"),
        ("FREQ=WEEKLY;", "NAME=VALUE"),
        ("FREQ=HOURLY;FREQ=DAILY", "no name twice"),
        ("FREQ=DAILY;COLOUR=RED", "unknown parameter 'COLOUR'"),
        ("FREQ=DAILY Fri", "one rule"),
        ("FREQ=DAILY RRULE:FREQ=WEEKLY", "one rule"),
        ("DTSTART:2026 RRULE:FREQ=DAILY", "one rule"),
        ("DTSTART:20260504,20260505 FREQ=DAILY", "Multiple DTSTART"),
    ],
)
def test_wrong_rules_are_refused_with_the_reason(rule: str, sentence: str) -> None:
    with pytest.raises(ValueError, match=sentence) as caught:
        dates(rule, MONDAY, SUNDAY)
    assert f'"{rule}"' in str(caught.value)


@given(st.text(alphabet="FREQ=DAILYWKMONTH;UBS,:-+0123456789 ", max_size=40))
def test_any_text_gives_dates_in_range_or_a_sentence(text: str) -> None:
    found: tuple[date, ...] = ()
    sentence = text
    try:
        found = dates(text, MONDAY, SUNDAY)
    except ValueError as error:
        sentence = str(error)
    assert text in sentence
    assert all(MONDAY <= day <= SUNDAY for day in found)


def test_first_stands_in_for_a_missing_start() -> None:
    """Every other day counts from the first date asked for."""
    found = dates("FREQ=DAILY;INTERVAL=2", MONDAY, SUNDAY)
    assert [day.weekday() for day in found] == [0, 2, 4, 6]


def test_start_in_the_rule_counts_though_dates_before_the_range_are_not_given() -> None:
    found = dates("DTSTART:20260503 RRULE:FREQ=DAILY;INTERVAL=2", MONDAY, SUNDAY)
    assert [day.weekday() for day in found] == [1, 3, 5]


def test_both_ends_of_the_range_are_included_and_an_empty_range_has_no_dates() -> None:
    assert dates("daily", MONDAY, MONDAY) == (MONDAY,)
    assert dates("daily", SUNDAY, MONDAY) == ()


@pytest.mark.parametrize(
    ("until", "last"),
    [
        ("20260506", date(2026, 5, 6)),
        ("20260506T220000", date(2026, 5, 6)),
        ("20260506T215900", date(2026, 5, 5)),
        ("20260506T200000Z", date(2026, 5, 6)),
        ("20260506T195900Z", date(2026, 5, 5)),
    ],
)
def test_until_includes_its_own_moment(until: str, last: date) -> None:
    """RFC 5545, 3.3.10: UNTIL bounds inclusively; 20:00 UTC is 22:00 in Berlin."""
    rule = f"FREQ=DAILY;UNTIL={until}"
    assert dates(rule, MONDAY, SUNDAY, time(22), "Europe/Berlin")[-1] == last


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("Fri", False),
        ("FREQ=WEEKLY;BYDAY=FR", False),
        ("FREQ=DAILY", False),
        ("FREQ=MONTHLY;BYDAY=-1SA", False),
        ("FREQ=MONTHLY;BYMONTHDAY=-1", False),
        ("FREQ=WEEKLY;BYDAY=FR;INTERVAL=1", False),
        ("FREQ=WEEKLY;BYDAY=FR;UNTIL=20260601", False),
        ("FREQ=WEEKLY;BYDAY=FR;INTERVAL=2", True),
        ("FREQ=WEEKLY;BYDAY=FR;COUNT=3", True),
        ("FREQ=WEEKLY", True),
        ("FREQ=MONTHLY", True),
        ("FREQ=YEARLY;BYMONTH=5", True),
        ("DTSTART:20260501 RRULE:FREQ=WEEKLY;INTERVAL=2", False),
    ],
)
def test_rules_that_need_a_date_to_count_from(text: str, expected: bool) -> None:
    assert counts_from_a_date(text) is expected


@given(
    st.sampled_from(
        ["Mon-Thu", "FREQ=MONTHLY;BYDAY=1SA", "FREQ=MONTHLY;BYMONTHDAY=-1"]
    ),
    st.integers(0, 400),
)
def test_other_rules_give_the_same_dates_from_any_date_on(
    text: str, shift: int
) -> None:
    last = MONDAY + timedelta(days=500)
    later = MONDAY + timedelta(days=shift)
    expected = tuple(day for day in dates(text, MONDAY, last) if day >= later)
    assert not counts_from_a_date(text)
    assert dates(text, later, last) == expected
