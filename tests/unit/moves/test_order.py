"""The order of groups by room alone, on room written down by hand."""

from itertools import permutations
from random import Random

import numpy as np
import pytest

from placer.moves.order import in_order
from placer.moves.room import Room


def room(free: list[int], *groups: tuple[list[int], list[int]]) -> Room:
    """Return free room by owner, and what each group takes and gives there."""
    takes, gives = zip(*groups, strict=True)
    return Room(*(np.array(part, dtype=float) for part in (free, takes, gives)))


def test_groups_that_fit_keep_their_rank() -> None:
    assert in_order(room([9, 9], ([1, 0], [0, 1]), ([0, 1], [1, 0]))) == [0, 1]


def test_a_chain_runs_from_its_free_end() -> None:
    """0 waits for 1, and 1 for 2."""
    chain = room(
        [0, 0, 1],
        ([1, 0, 0], [0, 0, 0]),
        ([0, 1, 0], [1, 0, 0]),
        ([0, 0, 1], [0, 1, 0]),
    )
    assert in_order(chain) == [2, 1, 0]


def test_only_those_who_are_waited_for_are_drawn_forward() -> None:
    """0 waits for 2; 1 has nothing to do with it."""
    case = room(
        [0, 5, 5],
        ([1, 0, 0], [0, 0, 0]),
        ([0, 1, 0], [0, 0, 1]),
        ([0, 1, 0], [1, 0, 0]),
    )
    assert in_order(case) == [2, 0, 1]


def test_a_ring_begins_where_room_is_free() -> None:
    ring = room([0, 1], ([1, 0], [0, 1]), ([0, 1], [1, 0]))
    assert in_order(ring) == [1, 0]


def test_a_ring_without_free_room_comes_last_as_ranked() -> None:
    case = room(
        [0, 0, 1],
        ([1, 0, 0], [0, 1, 0]),
        ([0, 1, 0], [1, 0, 0]),
        ([0, 0, 1], [0, 0, 0]),
    )
    assert in_order(case) == [2, 0, 1]


def test_the_free_room_of_a_ring_is_kept_for_it() -> None:
    """0 fits at once but takes the only free place of the ring of 1 and 2."""
    case = room(
        [1, 0],
        ([1, 0], [0, 0]),
        ([1, 0], [0, 1]),
        ([0, 1], [2, 0]),
    )
    assert in_order(case) == [1, 2, 0]


def test_an_overrun_limit_does_not_hold_those_who_take_nothing_of_it() -> None:
    assert in_order(room([-5, 1], ([0, 1], [3, 0]))) == [0]


@pytest.mark.parametrize("seed", range(60))
def test_every_group_comes_once_and_the_order_works_where_it_is_easy(seed: int) -> None:
    """With equal sizes and one unit free everywhere, no ring can stop anybody.

    Held against all orders of five groups among three owners.
    """
    dice = Random(seed)
    ends = [dice.sample(range(3), 2) for _ in range(5)]
    groups = [
        (
            [int(owner == to) for owner in range(3)],
            [int(owner == by) for owner in range(3)],
        )
        for by, to in ends
    ]
    free = [dice.randint(1, 2) for _ in range(3)]
    case = room(free, *groups)
    order = in_order(case)
    assert sorted(order) == list(range(5))
    if any(works(case, each) for each in permutations(range(5))):
        assert works(case, order)


def works(case: Room, order: tuple[int, ...] | list[int]) -> bool:
    """Whether each group fits once those before it are done."""
    free = case.free.copy()
    for group in order:
        if ((case.takes[group] > free) & (case.takes[group] > 0)).any():
            return False
        free += case.gives[group] - case.takes[group]
    return True
