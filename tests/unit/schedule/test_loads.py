"""Load and dates: cutovers wait for those that take load away; the first-day rule."""

from dataclasses import replace

from booked import booked
from smallestate import START, estate, load, pool, volume, window

from placer.estate import Array, Estate, Media, Volume
from placer.units import MINUTES_PER_DAY, MS, PPM


def disks() -> dict[str, int]:
    """Return the ratings of a pool that serves 100 reads/s to the brim."""
    return {"drives": 1, "seek": 10 * MS, "busy_ceiling": PPM, "skew": PPM}


def halls(*volumes: Volume, rooms: tuple[int, ...] = (1_000, 1_000, 1_000)) -> Estate:
    """Return one array of three pools that serve 100 reads/s each."""
    pools = [
        pool(f"a/{name}", Media.SPINNING, room, **disks())
        for name, room in zip(("one", "two", "three"), rooms, strict=True)
    ]
    return estate([replace(v, hold_days=1) for v in volumes], pools)


def test_a_cutover_waits_for_load_to_leave_first() -> None:
    """X brings 60 reads/s to a pool that serves 60 of 100, until y has left it."""
    x, y = volume("x", "a/one", 10, load(60)), volume("y", "a/two", 900, load(60))
    case = booked(halls(x, y), {"x": "a/two", "y": "a/three"}, order="xy")
    assert case.left == {}
    assert case.moves["x"].ends < case.moves["y"].cutover == case.moves["x"].cutover
    assert case.broken == set()


def test_load_that_never_leaves_is_named_with_its_pool() -> None:
    made = halls(volume("x", "a/one", 10, load(60)), volume("y", "a/two", 10, load(60)))
    case = booked(made, {"x": "a/two"})
    assert case.left == {
        "x": "Drives kept busy in pool a/two at 00:00: 0.2 above the ceiling."
    }


def test_the_hour_that_binds_is_named() -> None:
    made = halls(
        volume("x", "a/one", 10, load(10), load(60)),
        volume("y", "a/two", 10, load(60), load(60)),
    )
    assert booked(made, {"x": "a/two"}).left == {
        "x": "Drives kept busy in pool a/two at 01:00: 0.2 above the ceiling."
    }


def test_hours_that_do_not_coincide_fit_together() -> None:
    made = halls(
        volume("x", "a/one", 10, load(0), load(60)),
        volume("y", "a/two", 10, load(60), load(0)),
    )
    case = booked(made, {"x": "a/two"})
    assert list(case.moves) == ["x"]
    assert case.broken == set()


def test_a_pool_over_its_ceiling_may_be_left_and_refilled_to_what_it_was() -> None:
    """Pool one carries 130 of 100 reads/s: y (60) may follow x (70), not before."""
    made = halls(
        volume("x", "a/one", 10, load(70)),
        volume("w", "a/one", 10, load(60)),
        volume("y", "a/two", 10, load(60)),
    )
    case = booked(made, {"x": "a/three", "y": "a/one"}, order="yx")
    assert case.moves["x"].cutover <= case.moves["y"].cutover
    assert case.broken == set()


def test_room_and_load_that_hold_each_other_up_are_disentangled() -> None:
    """X would fill two's last room and bring load; only z, y, x works."""
    made = halls(
        volume("x", "a/one", 10, load(60)),
        volume("y", "a/two", 10, load(60)),
        volume("z", "a/three", 10, load(30)),
        rooms=(20, 20, 10),
    )
    case = booked(made, {"x": "a/two", "y": "a/three", "z": "a/one"}, order="xyz")
    assert case.left == {}
    assert case.broken == set()


def test_from_the_cure_on_the_ceiling_counts_for_room() -> None:
    """Pool one holds 30 of 20 GiB: y may come in for x before the cure, not after."""
    volumes = [
        volume("x", "a/one", 10),
        volume("w", "a/one", 10),
        volume("v", "a/one", 10),
        volume("y", "a/two", 10),
    ]
    made = halls(*volumes, rooms=(20, 20, 20))
    cured = replace(made.policy, cured_by=START + 4 * MINUTES_PER_DAY)
    made = replace(made, policy=cured)
    case = booked(made, {"x": "a/three", "w": "a/three", "y": "a/one"})
    assert case.left == {}
    assert case.broken == set()
    assert booked(made, {"x": "a/three", "y": "a/one"}).left.keys() == {"y"}


def overfull(cured_by: int) -> Estate:
    """Return pool one with 30 of 20 GiB, cured by some day; sources held a day."""
    crowd = [volume(name, "a/one", 10) for name in "xwv"]
    made = halls(*crowd, rooms=(20, 20, 20))
    day = START + cured_by * MINUTES_PER_DAY
    return replace(made, policy=replace(made.policy, cured_by=day))


def test_a_limit_that_is_not_kept_by_the_date_of_the_cure_is_named() -> None:
    """The first night is on day 1, and its source is released on day 2 at 22:00."""
    case = booked(overfull(cured_by=2), {"x": "a/two"})
    (found,) = case.schedule.overruns
    assert (found.limit, found.where, found.unit) == ("pool-room", "a/one", "GiB")
    assert found.amount == 10
    assert found.sentence == (
        "Room in pool a/one: 10 GiB too little from the date of the cure, "
        "2024-10-06 00:00+00:00, until 2024-10-06 22:00+00:00."
    )
    assert case.broken == {"cured-by"}


def test_a_limit_kept_by_the_date_of_the_cure_is_not_named() -> None:
    case = booked(overfull(cured_by=3), {"x": "a/two"})
    assert case.schedule.overruns == ()
    assert case.broken == set()


def test_a_limit_nobody_cures_is_named_without_an_end() -> None:
    case = booked(overfull(cured_by=3), {})
    (found,) = case.schedule.overruns
    assert found.sentence.endswith("2024-10-07 00:00+00:00, until the end.")
    assert case.broken == {"cured-by"}


def test_both_copies_count_among_the_volumes_of_an_array() -> None:
    """Two volumes of at most three: the second copy waits for the first release."""
    made = halls(volume("x", "a/one", 10), volume("y", "a/one", 10))
    made = replace(made, arrays=(Array(name="a", volumes_at_most=3),))
    case = booked(made, {"x": "a/two", "y": "a/two"})
    assert [m.window for m in case.schedule.moves] == ["night 1", "night 2"]
    assert case.broken == set()
    full = replace(made, arrays=(Array(name="a", volumes_at_most=2),))
    assert set(booked(full, {"x": "a/two", "y": "a/two"}).left.values()) == {
        "Volumes on array a: 1 too many."
    }


def test_both_copies_count_among_what_is_provisioned() -> None:
    made = halls(volume("x", "a/one", 10), volume("y", "a/two", 15))
    one, two, three = made.pools
    two = replace(two, usable=10 * 2**30, thin_at_most=2 * PPM, fill_ceiling=10 * PPM)
    made = replace(made, pools=(one, two, three), windows=(window(1), window(2)))
    case = booked(made, {"x": "a/two", "y": "a/three"}, order="xy")
    assert case.left == {}
    assert case.moves["y"].released == case.moves["x"].starts
    assert case.broken == set()
