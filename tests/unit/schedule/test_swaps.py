"""Pools that trade places, with little room and with none.

Unit copies need free room at the target before they start, and the source gives its
room back afterwards: the setting of Hall, Hartline, Karlin, Saia, Wilkes, "On
Algorithms for Efficient Data Migration", SODA 2001.  The numbers of moves below were
found by enumeration of all orders; no case goes by way of a third pool.
"""

from dataclasses import replace
from itertools import permutations
from random import Random

import pytest
from booked import booked
from smallestate import START, estate, pool, volume, window

from placer.estate import Estate, Media
from placer.units import MINUTES_PER_DAY

DISKS = Media.SPINNING


def case(rooms: dict[str, int], homes: dict[str, tuple[str, int]]) -> Estate:
    """Return one array with pools of a room, volumes with their pool and size [GiB]."""
    volumes = [volume(n, f"a/{home}", size) for n, (home, size) in homes.items()]
    pools = [pool(f"a/{name}", DISKS, room) for name, room in rooms.items()]
    return estate([replace(v, hold_days=1) for v in volumes], pools)


def test_two_full_pools_cannot_trade_places() -> None:
    """A(1) and B(1): impossible, and each volume says what it lacks."""
    swap = case({"a": 10, "b": 10}, {"x": ("a", 10), "y": ("b", 10)})
    found = booked(swap, {"x": "a/b", "y": "a/a"})
    assert not found.moves
    assert found.left == {
        "x": "Room in pool a/b: 10 GiB too little.",
        "y": "Room in pool a/a: 10 GiB too little.",
    }
    assert found.broken == set()


@pytest.mark.parametrize("order", ["xy", "yx"])
def test_one_free_place_is_enough_to_trade_places(order: str) -> None:
    """A(2) and B(1): two moves, the second once the hold of the first is over."""
    swap = case({"a": 20, "b": 10}, {"x": ("a", 10), "y": ("b", 10)})
    found = booked(swap, {"x": "a/b", "y": "a/a"}, order=order)
    assert found.broken == set()
    nights = [found.moves[name].window for name in "yx"]
    assert nights == ["night 1", "night 2"]
    assert found.moves["y"].released == found.moves["x"].starts


def test_three_full_pools_cannot_turn() -> None:
    ring = {"x": ("a", 1), "y": ("b", 1), "z": ("c", 1)}
    found = booked(
        case({"a": 1, "b": 1, "c": 1}, ring), {"x": "a/b", "y": "a/c", "z": "a/a"}
    )
    assert not found.moves
    assert found.broken == set()


def test_a_ring_of_three_turns_from_its_free_place_on() -> None:
    """Three moves, a night each: z fills the free place, and the others follow."""
    ring = {"x": ("a", 1), "y": ("b", 1), "z": ("c", 1)}
    found = booked(
        case({"a": 2, "b": 1, "c": 1}, ring), {"x": "a/b", "y": "a/c", "z": "a/a"}
    )
    assert found.broken == set()
    nights = {name: move.window for name, move in found.moves.items()}
    assert nights == {"z": "night 1", "y": "night 2", "x": "night 3"}


def test_free_room_in_pieces_too_small_does_not_help() -> None:
    """A(4) holds 3, B(4) holds 2 and 1: 1 free in each, no exchange possible."""
    found = booked(
        case({"a": 4, "b": 4}, {"x": ("a", 3), "y": ("b", 2), "z": ("b", 1)}),
        {"x": "a/b", "y": "a/a", "z": "a/a"},
    )
    assert "x" in found.left
    assert found.broken == set()


def test_of_two_rings_only_the_one_with_a_free_place_turns() -> None:
    found = booked(
        case(
            {"a": 2, "b": 1, "c": 1, "d": 1},
            {"w": ("a", 1), "x": ("b", 1), "y": ("c", 1), "z": ("d", 1)},
        ),
        {"w": "a/b", "x": "a/a", "y": "a/d", "z": "a/c"},
    )
    assert sorted(found.moves) == ["w", "x"]
    assert sorted(found.left) == ["y", "z"]
    assert found.broken == set()


def test_the_free_place_of_a_ring_is_not_given_away_first() -> None:
    """V would fit at once, but then w and x could never trade places."""
    found = booked(
        case(
            {"a": 2, "b": 1, "c": 1},
            {"v": ("c", 1), "w": ("a", 1), "x": ("b", 1)},
        ),
        {"v": "a/a", "w": "a/b", "x": "a/a"},
        order="vwx",
    )
    assert found.left == {}
    assert found.broken == set()


def test_each_link_of_a_chain_waits_for_the_hold_before_it() -> None:
    """Hold of 7 nights from the start of the cutover window: nights 1, 8 and 15."""
    ring = case({"a": 2, "b": 1, "c": 1}, {"x": ("a", 1), "y": ("b", 1), "z": ("c", 1)})
    held = replace(ring, volumes=tuple(replace(v, hold_days=7) for v in ring.volumes))
    found = booked(held, {"x": "a/b", "y": "a/c", "z": "a/a"})
    nights = [found.moves[name].window for name in "zyx"]
    assert nights == ["night 1", "night 8", "night 15"]
    assert found.broken == set()


@pytest.mark.parametrize("seed", range(80))
def test_all_moves_are_booked_where_any_order_of_them_works(seed: int) -> None:
    """Held against the enumeration of all orders of six moves among three pools."""
    dice = Random(seed)
    homes = {f"v{n}": (dice.choice("abc"), dice.choice((1, 1, 2, 3))) for n in range(6)}
    ways = {
        name: f"a/{dice.choice([p for p in 'abc' if p != home])}"
        for name, (home, _) in homes.items()
    }
    rooms = {p: dice.randint(0, 1) + _needed(p, homes, ways) for p in "abc"}
    found = booked(case(rooms, homes), ways)
    assert (not found.left) == _any_order(rooms, homes, ways)
    assert found.broken == set()


def _needed(where: str, homes: dict[str, tuple[str, int]], ways: dict[str, str]) -> int:
    """Return the room that a pool needs before and after."""
    before = sum(size for home, size in homes.values() if home == where)
    after = sum(size for n, (_, size) in homes.items() if ways[n] == f"a/{where}")
    return max(before, after, 1)


def _any_order(
    rooms: dict[str, int], homes: dict[str, tuple[str, int]], ways: dict[str, str]
) -> bool:
    return any(_works(order, rooms, homes, ways) for order in permutations(homes))


def _works(
    order: tuple[str, ...],
    rooms: dict[str, int],
    homes: dict[str, tuple[str, int]],
    ways: dict[str, str],
) -> bool:
    free = dict(rooms)
    for home, size in homes.values():
        free[home] -= size
    for name in order:
        home, size = homes[name]
        target = ways[name].split("/")[1]
        if free[target] < size:
            return False
        free[target] -= size
        free[home] += size
    return True


def test_room_that_comes_back_too_late_is_named_with_its_date() -> None:
    swap = case({"a": 20, "b": 10}, {"x": ("a", 10), "y": ("b", 10)})
    short = replace(swap, windows=(window(1),))
    found = booked(short, {"x": "a/b", "y": "a/a"})
    day = START + 2 * MINUTES_PER_DAY
    assert list(found.moves) == ["y"]
    assert found.moves["y"].released // MINUTES_PER_DAY == day // MINUTES_PER_DAY
    assert found.left == {
        "x": "Room in pool a/b: enough from 2024-10-06 22:00+00:00 on, "
        "after the last window."
    }
