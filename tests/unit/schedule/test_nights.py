"""What a single night allows: pieces, cutovers, holds, dates, arrays, routes."""

from dataclasses import replace
from datetime import datetime
from zoneinfo import ZoneInfo

import pytest
from booked import Case, booked, of_bytes
from smallestate import START, estate, policy, pool, volume, window

from placer.estate import Array, Estate, Expansion, Media, Route, Volume, Window
from placer.units import GB, MB, MINUTES_PER_DAY

RATE = 100 * MB
WAY = {"x": "b/new"}


def small(*volumes: Volume, windows: tuple[Window, ...] | None = None) -> Estate:
    """Return two roomy arrays that copy 100 MB/s, and the volumes in the first."""
    pools = [pool(p, Media.SPINNING, 10**5) for p in ("a/old", "b/new")]
    arrays = [Array(name=name, one_copy=RATE) for name in "ab"]
    return estate(list(volumes), pools, arrays=arrays, windows=windows)


def one(gigabytes: int, *applications: str, name: str = "x") -> Volume:
    """Return a volume in the first array; 6 GB take a minute."""
    found = of_bytes(volume(name, "a/old", 1), gigabytes)
    return replace(found, applications=applications)


def test_a_copy_ends_on_the_minute_that_carries_its_last_byte() -> None:
    """601 GB at 100 MB/s: 100 min and 10 s, so 101 minutes."""
    case = booked(small(one(601)), WAY)
    (piece,) = case.pieces("x")
    assert piece.ends - piece.starts == 101
    assert piece.rate == RATE
    assert case.moves["x"].cutover == piece.ends
    assert case.broken == set()


def test_a_copy_longer_than_a_window_goes_on_in_the_next_ones() -> None:
    """480 minutes a night, 420 of the last: 7 TB need 1,167, so three nights."""
    case = booked(small(one(7_000)), WAY)
    pieces = case.pieces("x")
    assert [each.window for each in pieces] == ["night 1", "night 2", "night 3"]
    assert sum(each.rate * 60 * (each.ends - each.starts) for each in pieces) >= (
        7_000 * GB
    )
    assert case.moves["x"].window == "night 3"
    assert case.broken == set()


def test_a_copy_too_long_for_all_windows_is_left_with_what_they_carry() -> None:
    """One window of 420 minutes before its cutover carries 2,520 GB = 2,347 GiB."""
    case = booked(small(one(3_000), windows=(window(1),)), WAY)
    assert case.left == {
        "x": "The windows until 2024-10-06 05:00+00:00 carry 2,347 of the "
        "2,794 GiB of a/x."
    }
    assert case.broken == set()


def test_nothing_stops_a_copy_without_limits_at_the_assumed_rate() -> None:
    made = replace(small(one(12)), arrays=(Array(name="a"), Array(name="b")))
    assert booked(made, WAY).pieces("x")[0].rate == 200 * MB


def test_an_empty_volume_is_still_copied_and_cut_over() -> None:
    empty = replace(one(10), thin=True, occupied=0)
    case = booked(small(empty), WAY)
    assert list(case.moves) == ["x"]
    assert case.broken == set()


def test_an_application_cuts_over_at_one_instant() -> None:
    """The longer copy decides; volumes chained through a third belong together."""
    crowd = (
        one(60, "mail", name="x"),
        one(600, "mail", "news", name="y"),
        one(6, "news", name="z"),
    )
    case = booked(small(*crowd), dict.fromkeys("xyz", "b/new"))
    assert len({move.cutover for move in case.schedule.moves}) == 1
    assert case.moves["x"].cutover == case.moves["y"].ends
    assert case.broken == set()


def test_no_more_applications_cut_over_in_a_night_than_may() -> None:
    """Two pieces of one night share its limit."""
    night = replace(window(1), cutovers=1)
    halves = (
        replace(night, name="1a", end=night.start + 240),
        replace(night, name="1b", start=night.start + 240),
    )
    crowd = (one(6, name="x"), one(6, name="y"))
    made = small(*crowd, windows=(*halves, replace(window(2), cutovers=1)))
    case = booked(made, {"x": "b/new", "y": "b/new"})
    assert [move.window for move in case.schedule.moves] == ["1a", "night 2"]
    assert case.broken == set()


def test_without_a_cutover_left_the_rest_is_left() -> None:
    crowd = (one(6, name="x"), one(6, name="y"))
    made = small(*crowd, windows=(replace(window(1), cutovers=1),))
    case = booked(made, {"x": "b/new", "y": "b/new"})
    assert case.left == {
        "y": "No cutover is left in the nights from 2024-10-05 22:00+00:00 on."
    }
    assert case.broken == set()


def test_nothing_starts_before_the_change_lead_or_cuts_over_after_the_finish() -> None:
    dates = policy(earliest=START + 3 * MINUTES_PER_DAY)
    late = replace(small(one(6)), policy=dates)
    case = booked(late, WAY)
    assert case.moves["x"].starts == dates.earliest
    assert case.broken == set()
    ended = replace(late, policy=replace(dates, finish_by=START + 2 * MINUTES_PER_DAY))
    assert booked(ended, WAY).left == {
        "x": "No window is left between the change lead and the date to finish by."
    }


def test_the_finish_bounds_the_cutover_inside_a_window() -> None:
    """Night 1 opens at 22:00; by midnight 120 minutes of copying are possible."""
    dates = policy(finish_by=START + 2 * MINUTES_PER_DAY)
    for gigabytes, moved in ((720, True), (721, False)):
        case = booked(replace(small(one(gigabytes)), policy=dates), WAY)
        assert bool(case.moves) == moved
        assert case.broken == set()


def test_a_window_is_for_its_arrays_only() -> None:
    nights = (replace(window(1), arrays=("a",)), replace(window(2), arrays=("a", "b")))
    case = booked(small(one(6), windows=nights), WAY)
    assert case.moves["x"].window == "night 2"
    assert case.broken == set()
    assert booked(small(one(6), windows=nights[:1]), WAY).left == {
        "x": "No window admits all of a, b."
    }


def test_a_window_shorter_than_a_cutover_only_copies() -> None:
    nights = (replace(window(1), end=window(1).start + 59), window(2))
    case = booked(small(one(6 * 450), windows=nights), WAY)
    assert [each.window for each in case.pieces("x")] == ["night 1", "night 2"]
    assert case.broken == set()
    assert booked(small(one(6), windows=nights[:1]), WAY).left == {
        "x": "Every window left is shorter than a cutover."
    }


def test_copies_over_a_route_share_its_rate() -> None:
    made = replace(
        small(one(60, name="x"), one(60, name="y")),
        routes=(Route(source="a", target="b", one_copy=80 * MB, together=140 * MB),),
    )
    case = booked(made, {"x": "b/new", "y": "b/new"})
    assert sorted(each.rate for each in case.schedule.bookings) == [60 * MB, 80 * MB]
    assert case.broken == set()


def test_windows_that_overlap_share_the_arrays() -> None:
    """One copy at a time; the windows are open for two hours together."""
    first, second = window(1, 4), replace(window(1), name="n", night="n", opens=0)
    second = replace(second, opens=first.start + 120, start=first.start + 120)
    crowd = [one(6 * 150, name=name) for name in ("x", "y")]
    made = small(*crowd, windows=(first, second))
    arrays = tuple(replace(array, copies_at_once=1) for array in made.arrays)
    case = booked(replace(made, arrays=arrays), {"x": "b/new", "y": "b/new"})
    assert case.left == {}
    assert case.broken == set()


def test_room_bought_is_there_from_its_delivery_on() -> None:
    """Three days end at a midnight, two hours after the second night opened."""
    step = Expansion(drives=1, price=0, at_most=1, delivery_days=3)
    target = replace(pool("b/new", Media.SPINNING, 100), drives=1, expansion=step)
    made = small(replace(one(1), provisioned=200 * 2**30, occupied=200 * 2**30))
    made = replace(made, pools=(made.pools[0], target))
    case = booked(made, WAY, bought={"b/new": 1})
    assert case.moves["x"].starts == START + 3 * MINUTES_PER_DAY
    assert case.moves["x"].window == "night 2"
    assert case.broken == set()


def test_days_of_delivery_have_24_hours_in_any_season() -> None:
    """Berlin loses an hour on 28 March 2027: ten days later it is one at night."""
    zone = ZoneInfo("Europe/Berlin")

    def at(text: str) -> int:
        return int(datetime.fromisoformat(text).replace(tzinfo=zone).timestamp()) // 60

    step = Expansion(drives=1, price=0, at_most=1, delivery_days=10)
    target = replace(pool("b/new", Media.SPINNING, 100), drives=1, expansion=step)
    opens = at("2027-03-29T22:00")
    night = replace(window(1), opens=opens, start=opens, end=opens + 480)
    made = small(volume("x", "a/old", 200), windows=(night,))
    start = at("2027-03-20T00:00")
    made = replace(
        made,
        pools=(made.pools[0], target),
        policy=replace(policy(), start=start, earliest=start),
    )
    case = booked(made, WAY, bought={"b/new": 1})
    assert case.moves["x"].starts == at("2027-03-30T01:00")
    assert case.broken == set()


# IANA time zone data: Berlin, 28 March and 31 October 2027 (Directive 2000/84/EC).
@pytest.mark.parametrize(
    ("opens", "released"),
    [
        ("2027-03-20T22:00", "2027-04-03T22:00+02:00"),
        ("2027-10-20T22:00", "2027-11-03T22:00+01:00"),
    ],
)
def test_the_hold_ends_at_the_same_wall_time(opens: str, released: str) -> None:
    zone = ZoneInfo("Europe/Berlin")
    begin = int(datetime.fromisoformat(opens).replace(tzinfo=zone).timestamp()) // 60
    night = replace(window(1), zone="Europe/Berlin", opens=begin)
    night = replace(night, start=begin, end=begin + 480)
    case = booked(small(replace(one(6), hold_days=14), windows=(night,)), WAY)
    shown = datetime.fromtimestamp(case.moves["x"].released * 60, zone)
    assert shown == datetime.fromisoformat(released)
    assert case.broken == set()


def test_the_hold_counts_from_the_uncut_window() -> None:
    """A freeze cut the first hours away; held for no day, until the cutover."""
    night = window(2)
    cut = replace(night, start=night.start + 180)
    for days, released in ((0, cut.start + 1), (1, night.opens + MINUTES_PER_DAY)):
        held = replace(one(6), hold_days=days)
        case = booked(small(held, windows=(cut,)), WAY)
        assert case.moves["x"].released == released
        assert case.broken == set()


def test_room_is_taken_from_the_first_piece_on() -> None:
    """X is copied in nights 1 to 3; y is released as night 3 opens, and only then has
    g room beside x, though the copy of x is not yet done.
    """
    y = of_bytes(volume("y", "b/new", 1), 600, hold=2)
    made = small(one(7_000, name="x"), one(600, name="g"), y)
    two = pool("b/new", Media.SPINNING, 7_200)
    made = replace(made, pools=(made.pools[0], two))
    case = booked(made, {"y": "a/old", "x": "b/new", "g": "b/new"}, order="yxg")
    assert case.moves["x"].starts < case.moves["y"].released < case.moves["x"].ends
    assert case.moves["g"].starts >= case.moves["y"].released
    assert case.broken == set()


def test_pieces_of_one_copy_never_overlap() -> None:
    """Two windows share two of nine hours: 420 minutes before the last cutover."""
    early = window(1, 4)
    late = replace(window(1), name="late", night="late", start=early.start + 120)
    for minutes, moved in ((420, True), (425, False)):
        case = booked(small(one(6 * minutes), windows=(early, late)), WAY)
        assert bool(case.moves) == moved
        assert case.broken == set()


def test_a_cutover_is_in_a_window_of_its_arrays() -> None:
    """The copy fits before a short night ends; the next night is for others."""
    nights = (
        replace(window(1), end=window(1).start + 59),
        replace(window(2), arrays=("a",)),
        window(3),
    )
    case = booked(small(one(6), windows=nights), WAY)
    assert case.moves["x"].window == "night 3"
    assert case.broken == set()


def test_what_was_tried_in_vain_leaves_nothing_behind() -> None:
    """One copy at a time, three nights' work: nights 1 and 2 alone do not do."""
    crowd = [one(6 * 415, "mail", name=name) for name in "xyz"]
    made = small(*crowd)
    arrays = tuple(replace(array, copies_at_once=1) for array in made.arrays)
    case = booked(replace(made, arrays=arrays), dict.fromkeys("xyz", "b/new"))
    assert {move.window for move in case.schedule.moves} == {"night 3"}
    assert {each.window for each in case.schedule.bookings} == {
        "night 1",
        "night 2",
        "night 3",
    }
    assert case.broken == set()


def test_the_longest_copy_of_an_application_is_booked_first() -> None:
    """Copies of 1, 1 and 2 hours, two at a time: 2 hours, and 3 the other way."""
    crowd = [
        one(360 * n, "mail", name=name)
        for name, n in zip("xyz", (1, 1, 2), strict=True)
    ]
    made = small(*crowd)
    arrays = tuple(replace(array, copies_at_once=2) for array in made.arrays)
    case = booked(replace(made, arrays=arrays), dict.fromkeys("xyz", "b/new"))
    assert case.moves["x"].cutover == window(1).start + 120


def lost(case: Case) -> set[str]:
    """Return what is neither moved nor left over."""
    done = {m.volume for m in case.schedule.moves} | {
        x.volume for x in case.schedule.left
    }
    return {transfer.volume for transfer in case.transfers} ^ done


def test_every_transfer_is_a_move_or_is_left() -> None:
    crowd = [one(2_000, name=f"v{n}") for n in range(4)]
    made = small(*crowd, windows=(window(1),))
    arrays = tuple(replace(array, copies_at_once=2) for array in made.arrays)
    case = booked(replace(made, arrays=arrays), {v.name: "b/new" for v in crowd})
    assert lost(case) == set()
    assert len(case.moves) == 2
    assert case.broken == set()
