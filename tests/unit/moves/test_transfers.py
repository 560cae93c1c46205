"""Transfers: one per volume that moves, whole groups, in the order to be tried."""

from dataclasses import replace

import numpy as np
import pytest
from smallestate import estate, load, pool, volume

from placer.candidates.table import Candidates, candidates
from placer.estate import Array, Estate, Media, Volume
from placer.moves import transfers
from placer.plan import Reason, Transfer
from placer.units import GIB, MS


def small(*volumes: Volume, room: int = 10_000) -> Estate:
    """Return an array with disks that answer in 10 ms and flash that does in 1 ms."""
    pools = [
        pool("a/slow", Media.SPINNING, 10_000, drives=100, seek=10 * MS),
        pool("a/fast", Media.FLASH, room, drives=10, read_time=1 * MS),
        pool("a/other", Media.SPINNING, 10_000, drives=100, seek=10 * MS),
    ]
    return estate(list(volumes), pools)


def ordered(made: Estate, ways: dict[str, str], **why: Reason) -> tuple[Transfer, ...]:
    """Return the transfers of volumes that go to pools of the array, by name."""
    table: Candidates = candidates(made)
    columns = {p.name: column for column, p in enumerate(made.pools)}
    places = [columns[ways.get(v.name, v.pool)] for v in made.volumes]
    reasons = [
        why.get(v.name, Reason.RELIEF if v.name in ways else Reason.STAYS)
        for v in made.volumes
    ]
    return transfers(table, np.array(places), reasons)


def names(found: tuple[Transfer, ...]) -> list[str]:
    return [transfer.volume.split("/")[1] for transfer in found]


def test_only_volumes_that_change_their_pool_are_transfers() -> None:
    made = small(volume("x", "a/slow", 7), volume("y", "a/slow", 5))
    (found,) = ordered(made, {"y": "fast"}, y=Reason.LIMIT)
    assert (found.id, found.volume, found.source, found.target) == (
        "M001",
        "a/y",
        "a/slow",
        "a/fast",
    )
    assert (found.size, found.reason, found.group) == (5 * GIB, Reason.LIMIT, 1)


def test_nothing_moves_where_nothing_changes() -> None:
    assert ordered(small(volume("x", "a/slow", 7)), {}) == ()


def test_relief_by_byte_comes_first_and_is_the_worth() -> None:
    """X waits 9 ms less for 10 requests/s, y for 20; y is four times larger."""
    made = small(
        volume("y", "a/slow", 400, load(20, kib=0), measured=10),
        volume("x", "a/slow", 100, load(10, kib=0), measured=10),
    )
    found = ordered(made, {"x": "fast", "y": "fast"})
    assert names(found) == ["x", "y"]
    assert found[0].worth == pytest.approx(2 * 10 * 9)
    assert found[1].worth == pytest.approx(2 * 20 * 9)


@pytest.mark.parametrize("reason", [Reason.CURE, Reason.LIMIT])
def test_what_must_move_comes_before_relief(reason: Reason) -> None:
    made = small(
        volume("x", "a/slow", 10, load(90, kib=0), measured=10),
        volume("y", "a/slow", 500, load(0)),
    )
    found = ordered(made, {"x": "fast", "y": "other"}, y=reason)
    assert names(found) == ["y", "x"]


def test_a_loss_has_no_worth() -> None:
    made = small(volume("x", "a/fast", 10, load(20, kib=0), measured=1))
    assert ordered(made, {"x": "slow"}, x=Reason.MAKE_ROOM)[0].worth == 0


def test_volumes_of_one_application_stand_together() -> None:
    """X and z share y's applications; w moves alone between them."""
    chained = [
        replace(volume("x", "a/slow", 10), applications=("mail",)),
        volume("w", "a/slow", 10),
        replace(volume("y", "a/slow", 10), applications=("mail", "news")),
        replace(volume("z", "a/slow", 10), applications=("news",)),
    ]
    found = ordered(small(*chained), dict.fromkeys("wxyz", "fast"))
    groups = {t.volume.split("/")[1]: t.group for t in found}
    assert groups["x"] == groups["y"] == groups["z"] != groups["w"]
    assert names(found) in (["x", "y", "z", "w"], ["w", "x", "y", "z"])
    assert [t.id for t in found] == ["M001", "M002", "M003", "M004"]


def test_who_gives_room_comes_before_who_waits_for_it() -> None:
    """The flash of 100 GiB holds 80 cold ones; hot needs 50 of them."""
    made = small(
        volume("hot", "a/slow", 50, load(50, kib=0), measured=10),
        volume("cold", "a/fast", 80),
        room=100,
    )
    ways = {"hot": "fast", "cold": "slow"}
    found = ordered(made, ways, hot=Reason.LIMIT, cold=Reason.MAKE_ROOM)
    assert names(found) == ["cold", "hot"]


def test_who_does_not_give_needed_room_does_not_go_first() -> None:
    made = small(
        volume("hot", "a/slow", 50, load(50, kib=0), measured=10),
        volume("cold", "a/fast", 80),
        room=1_000,
    )
    ways = {"hot": "fast", "cold": "slow"}
    found = ordered(made, ways, hot=Reason.LIMIT, cold=Reason.MAKE_ROOM)
    assert names(found) == ["hot", "cold"]


def test_places_for_volumes_are_room_as_well() -> None:
    made = small(volume("x", "a/slow", 1), volume("y", "b/old", 1))
    made = replace(
        made,
        pools=(*made.pools, pool("b/old", Media.SPINNING, 10)),
        arrays=(Array(name="a"), Array(name="b", volumes_at_most=1)),
    )
    table = candidates(made)
    reasons = [Reason.LIMIT, Reason.MAKE_ROOM]
    assert names(transfers(table, np.array([3, 0]), reasons)) == ["y", "x"]
