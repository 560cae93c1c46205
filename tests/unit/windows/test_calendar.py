"""Windows that come of rules, with freezes cut out by instants."""

from collections import defaultdict
from datetime import date, time, timedelta
from itertools import pairwise
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from placer.estate import Window
from placer.findings import Place
from placer.windows.calendar import FreezeRule, WindowRule, expand
from placer.windows.clock import instant

LISBON = "Europe/Lisbon"
NIGHT = WindowRule(
    name="harbour night",
    opens_on="Fri",
    opens_at=time(22),
    closes_at=time(6),
    zone=LISBON,
    rate=250_000_000,
    at_once=2,
    cutovers=3,
    arrays=("quay",),
    place=Place("windows", "A2"),
)
MAY = (date(2026, 5, 1), date(2026, 5, 31))


def frozen(day: date, at: time, minutes: int, zone: str = LISBON) -> FreezeRule:
    """Return a freeze of one date."""
    return FreezeRule(
        name=f"freeze of {day}",
        starts_on="daily",
        starts_at=at,
        lasts_minutes=minutes,
        zone=zone,
        first=day,
        until=day,
    )


def daily(name: str = "night", **given_: Any) -> WindowRule:
    """Return a rule of every day from 22:00 UTC, eight hours unless said otherwise."""
    usual: dict[str, Any] = {
        "name": name,
        "opens_on": "daily",
        "opens_at": time(22),
        "lasts_minutes": 480,
    }
    return WindowRule(**(usual | given_))


def names(windows: tuple[Window, ...]) -> list[str]:
    return [window.name for window in windows]


def test_window_carries_its_night_its_limits_and_its_cell() -> None:
    (window,) = expand([NIGHT], [], date(2026, 5, 8), date(2026, 5, 8))
    opens = instant(date(2026, 5, 8), time(22), LISBON)
    assert window == Window(
        name="harbour night 2026-05-08",
        night="harbour night 2026-05-08",
        opens=opens,
        start=opens,
        end=opens + 480,
        zone=LISBON,
        rate=250_000_000,
        at_once=2,
        cutovers=3,
        arrays=("quay",),
        place=Place("windows", "A2"),
    )


def test_windows_open_on_the_days_asked_for_and_within_their_own_dates() -> None:
    rule = daily(first=date(2026, 5, 3), until=date(2026, 5, 5))
    assert names(expand([rule], [], *MAY)) == [
        "night 2026-05-03",
        "night 2026-05-04",
        "night 2026-05-05",
    ]
    assert names(expand([rule], [], date(2026, 5, 5), date(2026, 5, 9))) == [
        "night 2026-05-05"
    ]


def test_windows_stand_in_order_of_their_start() -> None:
    early, late = daily("early", opens_at=time(1)), daily("late")
    found = expand([late, early], [], date(2026, 5, 1), date(2026, 5, 3))
    assert [w.start for w in found] == sorted(w.start for w in found)
    assert names(found)[:2] == ["early 2026-05-01", "late 2026-05-01"]


def test_equal_opening_and_closing_time_is_a_whole_day() -> None:
    rule = daily(lasts_minutes=None, closes_at=time(22))
    (window,) = expand([rule], [], MAY[0], MAY[0])
    assert window.end - window.start == 1440


def test_freeze_in_the_middle_leaves_two_numbered_pieces_of_one_night() -> None:
    freeze = frozen(date(2026, 5, 8), time(23), 150)
    found = expand([NIGHT], [freeze], date(2026, 5, 8), date(2026, 5, 8))
    opens = instant(date(2026, 5, 8), time(22), LISBON)
    assert names(found) == [
        "harbour night 2026-05-08 (1)",
        "harbour night 2026-05-08 (2)",
    ]
    assert {w.night for w in found} == {"harbour night 2026-05-08"}
    assert [(w.start - opens, w.end - opens) for w in found] == [(0, 60), (210, 480)]
    assert {w.opens for w in found} == {opens}


def test_freeze_at_an_end_leaves_one_piece_that_keeps_its_name_and_opening() -> None:
    freeze = frozen(date(2026, 5, 8), time(20), 180)
    (window,) = expand([NIGHT], [freeze], date(2026, 5, 8), date(2026, 5, 8))
    assert window.name == window.night == "harbour night 2026-05-08"
    assert (window.start - window.opens, window.end - window.opens) == (60, 480)


def test_freeze_that_only_touches_cuts_nothing() -> None:
    before = frozen(date(2026, 5, 8), time(20), 120)
    after = frozen(date(2026, 5, 9), time(6), 120)
    (window,) = expand([NIGHT], [before, after], date(2026, 5, 8), date(2026, 5, 8))
    assert (window.start, window.end) == (window.opens, window.opens + 480)


def test_freeze_from_the_last_working_day_to_noon_of_the_first() -> None:
    """Worked by hand: Friday 29 May 2026 is frozen whole, and so is no other Friday.

    29 May is the last working day of the month, Monday 1 June the first of the next;
    30 April (Thursday) and 1 May (Friday, to 12:00) leave the night of 1 May alone.
    """
    freezes = [
        frozen(date(2026, 4, 30), time(), 36 * 60),
        frozen(date(2026, 5, 29), time(), 84 * 60),
        frozen(date(2026, 6, 30), time(), 36 * 60),
    ]
    found = expand([NIGHT], freezes, date(2026, 4, 20), date(2026, 6, 21))
    assert [window.name.removeprefix("harbour night ") for window in found] == [
        *("2026-04-24", "2026-05-01", "2026-05-08", "2026-05-15", "2026-05-22"),
        *("2026-06-05", "2026-06-12", "2026-06-19"),
    ]
    assert {window.end - window.start for window in found} == {480}


def test_freeze_of_the_day_alone_leaves_the_hours_after_midnight() -> None:
    """Instants, not names of days: six hours of Saturday remain of Friday's night."""
    freeze = frozen(date(2026, 5, 29), time(), 1440)
    (window,) = expand([NIGHT], [freeze], date(2026, 5, 29), date(2026, 5, 29))
    assert (window.start - window.opens, window.end - window.opens) == (120, 480)


def test_freeze_that_began_long_before_the_first_day_holds() -> None:
    """From 11 April for 21 days: to midnight in Lisbon (23:00 UTC) after 1 May."""
    freeze = frozen(date(2026, 4, 11), time(), 21 * 1440)
    found = expand([daily()], [freeze], date(2026, 5, 1), date(2026, 5, 3))
    assert [w.start - w.opens for w in found] == [60, 0, 0]


def test_freeze_after_the_last_day_cuts_the_window_that_runs_into_it() -> None:
    freeze = FreezeRule(
        name="month end", starts_on="FREQ=MONTHLY;BYMONTHDAY=1", ends_at=time(12)
    )
    (window,) = expand([daily()], [freeze], MAY[1], MAY[1])
    assert window.end == instant(date(2026, 6, 1), time(), "UTC")


def test_freeze_of_another_zone_holds_by_the_instant() -> None:
    """09:00 in Auckland on 9 May 2026 is 21:00 UTC on the 8th (NZST, UTC+12)."""
    freeze = frozen(date(2026, 5, 9), time(9), 120, zone="Pacific/Auckland")
    (window,) = expand([daily()], [freeze], date(2026, 5, 8), date(2026, 5, 8))
    assert window.start == instant(date(2026, 5, 8), time(23), "UTC")


def test_two_rules_of_one_name_are_told_apart_by_their_opening_time() -> None:
    rules = [daily(), daily(opens_at=time(12), lasts_minutes=60)]
    found = expand(rules, [], MAY[0], MAY[0])
    assert names(found) == ["night 2026-05-01 12:00", "night 2026-05-01 22:00"]
    assert [window.night for window in found] == names(found)


def test_the_same_window_twice_is_refused() -> None:
    with pytest.raises(ValueError, match='called "night 2026-05-01 22:00": name them'):
        expand([daily(), daily()], [], *MAY)


@pytest.mark.parametrize(
    ("given_", "sentence"),
    [
        ({"lasts_minutes": 0}, '"night" must last longer than 0 minutes'),
        ({"lasts_minutes": -60}, '"night" must last longer than 0 minutes'),
        ({"lasts_minutes": None}, "either how long it lasts or when it ends"),
        ({"closes_at": time(6)}, "either how long it lasts or when it ends"),
        ({"opens_on": "FREQ=WEEKLY;INTERVAL=2;BYDAY=FR"}, "the date it counts from"),
        ({"opens_on": "whenever"}, "names no days"),
        ({"zone": "Harbour"}, "is no time zone"),
    ],
)
def test_wrong_rules_are_refused(given_: dict[str, Any], sentence: str) -> None:
    with pytest.raises(ValueError, match=sentence):
        expand([daily(**given_)], [], *MAY)


def test_wrong_freeze_is_refused_even_without_windows() -> None:
    with pytest.raises(ValueError, match="must last longer than 0 minutes"):
        expand([], [frozen(date(2026, 5, 8), time(), 0)], *MAY)


def test_window_that_the_clocks_skip_is_no_window() -> None:
    """02:30 to 03:00 does not exist in New York on 8 March 2026."""
    rule = daily(
        opens_at=time(2, 30),
        lasts_minutes=None,
        closes_at=time(3),
        zone="America/New_York",
    )
    found = expand([rule], [], date(2026, 3, 7), date(2026, 3, 9))
    assert names(found) == ["night 2026-03-07", "night 2026-03-09"]


FREEZES = st.builds(
    frozen,
    st.dates(date(2026, 3, 20), date(2026, 4, 8)),
    st.times().map(lambda at: at.replace(second=0, microsecond=0)),
    st.integers(1, 4 * 1440),
    st.sampled_from([LISBON, "UTC", "America/New_York"]),
)


@given(st.lists(FREEZES, max_size=6), st.integers(1, 36))
def test_pieces_avoid_every_freeze_and_add_up(
    freezes: list[FreezeRule], hours: int
) -> None:
    """Minute by minute: uncut windows without the frozen minutes, over a change."""
    rule = daily(lasts_minutes=hours * 60, zone=LISBON)
    days = (date(2026, 3, 24), date(2026, 4, 3))
    closed = set[int]()
    for freeze in freezes:
        assert freeze.first is not None
        begins = instant(freeze.first, freeze.starts_at, freeze.zone)
        closed |= set(range(begins, begins + (freeze.lasts_minutes or 0)))
    open_ = defaultdict[str, list[int]](list)
    for window in expand([rule], freezes, *days):
        open_[window.night] += range(window.start, window.end)
    for whole in expand([rule], [], *days):
        expected = [m for m in range(whole.start, whole.end) if m not in closed]
        assert open_[whole.night] == expected


@given(st.lists(FREEZES, max_size=6))
def test_names_are_unique_and_pieces_of_a_night_do_not_touch(
    freezes: list[FreezeRule],
) -> None:
    found = expand([daily(zone=LISBON)], freezes, date(2026, 3, 24), date(2026, 4, 3))
    assert len({window.name for window in found}) == len(found)
    for before, after in pairwise(found):
        assert before.end < after.start
    assert all(
        w.end - w.start <= timedelta(hours=8) // timedelta(minutes=1) for w in found
    )
