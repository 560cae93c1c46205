"""Recurrences against the examples printed in RFC 5545 (IETF, 2009), section 3.8.5.3.

All examples there are for 09:00 in America/New_York.  Those without an end are compared
up to the last date that the text prints.
"""

from datetime import date, time

import pytest

from placer.windows.recurrence import dates

ZONE = "America/New_York"
MONTHS = (
    *("Jan", "Feb", "Mar", "Apr", "May", "Jun"),
    *("Jul", "Aug", "Sep", "Oct", "Nov", "Dec"),
)

# title in the section, DTSTART, rule, dates as the text prints them
EXAMPLES = [
    (
        "every ten days, five occurrences",
        "19970902",
        "FREQ=DAILY;INTERVAL=10;COUNT=5",
        "1997 Sep 2 12 22 Oct 2 12",
    ),
    (
        "weekly for ten occurrences",
        "19970902",
        "FREQ=WEEKLY;COUNT=10",
        "1997 Sep 2 9 16 23 30 Oct 7 14 21 28 Nov 4",
    ),
    (
        "weekly on Tuesday and Thursday for five weeks",
        "19970902",
        "FREQ=WEEKLY;COUNT=10;WKST=SU;BYDAY=TU,TH",
        "1997 Sep 2 4 9 11 16 18 23 25 30 Oct 2",
    ),
    (
        "every other week on three days until 24 December 1997",
        "19970901",
        "FREQ=WEEKLY;INTERVAL=2;UNTIL=19971224T000000Z;WKST=SU;BYDAY=MO,WE,FR",
        "1997 Sep 1 3 5 15 17 19 29 Oct 1 3 13 15 17 27 29 31 "
        "Nov 10 12 14 24 26 28 Dec 8 10 12 22",
    ),
    (
        "every other week on Tuesday and Thursday, eight occurrences",
        "19970902",
        "FREQ=WEEKLY;INTERVAL=2;COUNT=8;WKST=SU;BYDAY=TU,TH",
        "1997 Sep 2 4 16 18 30 Oct 2 14 16",
    ),
    (
        "monthly on the first Friday for ten occurrences",
        "19970905",
        "FREQ=MONTHLY;COUNT=10;BYDAY=1FR",
        "1997 Sep 5 Oct 3 Nov 7 Dec 5 1998 Jan 2 Feb 6 Mar 6 Apr 3 May 1 Jun 5",
    ),
    (
        "every other month on the first and last Sunday for ten occurrences",
        "19970907",
        "FREQ=MONTHLY;INTERVAL=2;COUNT=10;BYDAY=1SU,-1SU",
        "1997 Sep 7 28 Nov 2 30 1998 Jan 4 25 Mar 1 29 May 3 31",
    ),
    (
        "monthly on the second-to-last Monday for six months",
        "19970922",
        "FREQ=MONTHLY;COUNT=6;BYDAY=-2MO",
        "1997 Sep 22 Oct 20 Nov 17 Dec 22 1998 Jan 19 Feb 16",
    ),
    (
        "monthly on the third-to-the-last day of the month",
        "19970928",
        "FREQ=MONTHLY;BYMONTHDAY=-3",
        "1997 Sep 28 Oct 29 Nov 28 Dec 29 1998 Jan 29 Feb 26",
    ),
    (
        "monthly on the first and last day for ten occurrences",
        "19970930",
        "FREQ=MONTHLY;COUNT=10;BYMONTHDAY=1,-1",
        "1997 Sep 30 Oct 1 31 Nov 1 30 Dec 1 31 1998 Jan 1 31 Feb 1",
    ),
    (
        "the first Saturday that follows the first Sunday of the month",
        "19970913",
        "FREQ=MONTHLY;BYDAY=SA;BYMONTHDAY=7,8,9,10,11,12,13",
        "1997 Sep 13 Oct 11 Nov 8 Dec 13 1998 Jan 10 Feb 7 Mar 7 Apr 11 May 9 Jun 13",
    ),
    (
        "the third instance of Tuesday, Wednesday or Thursday, three months",
        "19970904",
        "FREQ=MONTHLY;COUNT=3;BYDAY=TU,WE,TH;BYSETPOS=3",
        "1997 Sep 4 Oct 7 Nov 6",
    ),
    (
        "the second-to-last weekday of the month",
        "19970929",
        "FREQ=MONTHLY;BYDAY=MO,TU,WE,TH,FR;BYSETPOS=-2",
        "1997 Sep 29 Oct 30 Nov 27 Dec 30 1998 Jan 29 Feb 26 Mar 30",
    ),
    (
        "weeks that start on Monday",
        "19970805",
        "FREQ=WEEKLY;INTERVAL=2;COUNT=4;BYDAY=TU,SU;WKST=MO",
        "1997 Aug 5 10 19 24",
    ),
    (
        "the same with weeks that start on Sunday",
        "19970805",
        "FREQ=WEEKLY;INTERVAL=2;COUNT=4;BYDAY=TU,SU;WKST=SU",
        "1997 Aug 5 17 19 31",
    ),
    (
        "an invalid date, 30 February, is ignored",
        "20070115",
        "FREQ=MONTHLY;BYMONTHDAY=15,30;COUNT=5",
        "2007 Jan 15 30 Feb 15 Mar 15 30",
    ),
]


def printed(text: str) -> tuple[date, ...]:
    """Return dates written as in the section: year, month names, days."""
    found, year, month = [], 0, 0
    for word in text.split():
        if word in MONTHS:
            month = MONTHS.index(word) + 1
        elif int(word) > 31:
            year = int(word)
        else:
            found.append(date(year, month, int(word)))
    return tuple(found)


def nine_o_clock(text: str, last: date) -> tuple[date, ...]:
    return dates(text, date(1997, 1, 1), last, time(9), ZONE)


def last_to_compare(rule: str, expected: tuple[date, ...]) -> date:
    """Return a late date for rules that end by themselves, so that the end shows."""
    ends = "COUNT" in rule or "UNTIL" in rule
    return date(2009, 1, 1) if ends else expected[-1]


@pytest.mark.parametrize(
    ("starts", "rule", "text"),
    [example[1:] for example in EXAMPLES],
    ids=[example[0] for example in EXAMPLES],
)
def test_rule_gives_the_dates_printed_in_the_section(
    starts: str, rule: str, text: str
) -> None:
    expected = printed(text)
    last = last_to_compare(rule, expected)
    assert nine_o_clock(f"DTSTART:{starts} RRULE:{rule}", last) == expected


def test_daily_until_24_december_has_113_dates() -> None:
    """The text: 2 September to 23 December 1997; UNTIL is midnight UTC of the 24th."""
    rule = "DTSTART:19970902 RRULE:FREQ=DAILY;UNTIL=19971224T000000Z"
    found = nine_o_clock(rule, date(1998, 12, 31))
    assert (len(found), found[0], found[-1]) == (
        113,
        date(1997, 9, 2),
        date(1997, 12, 23),
    )


def test_lines_may_stand_as_the_section_prints_them() -> None:
    """DTSTART with its zone and time, on a line of its own."""
    text = "DTSTART;TZID=America/New_York:19970902T090000\nRRULE:FREQ=WEEKLY;COUNT=3"
    assert nine_o_clock(text, date(1998, 1, 1)) == printed("1997 Sep 2 9 16")


def test_friday_the_13th_without_the_excluded_start() -> None:
    """Every Friday the 13th; EXDATE takes the DTSTART away, as in the text."""
    text = (
        "DTSTART;TZID=America/New_York:19970902T090000 "
        "EXDATE;TZID=America/New_York:19970902T090000 "
        "RRULE:FREQ=MONTHLY;BYDAY=FR;BYMONTHDAY=13"
    )
    expected = printed("1998 Feb 13 Mar 13 Nov 13 1999 Aug 13 2000 Oct 13")
    assert nine_o_clock(text, expected[-1]) == expected


def test_excluded_date_of_the_rule_is_left_out() -> None:
    """RFC 5545, 3.8.5.1: EXDATE takes dates out of the set."""
    text = "DTSTART:19970902 EXDATE:19970909,19970923T090000 RRULE:FREQ=WEEKLY;COUNT=5"
    assert nine_o_clock(text, date(1998, 1, 1)) == printed("1997 Sep 2 16 30")


def test_rule_within_a_day_is_refused() -> None:
    """The section's every-three-hours example has no sense where days are asked.

    Its printed list (09:00, 12:00, 15:00) is an error of the text besides: UNTIL is
    17:00 UTC, which is 13:00 in New York.
    """
    rule = "DTSTART:19970902 RRULE:FREQ=HOURLY;INTERVAL=3;UNTIL=19970902T170000Z"
    with pytest.raises(ValueError, match="FREQ must be one of DAILY"):
        nine_o_clock(rule, date(1997, 12, 31))
