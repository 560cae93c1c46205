"""The use of a limit over time, on figures written down by hand."""

import numpy as np
import pytest

from placer.candidates.block import Block
from placer.schedule.level import ALWAYS, Level

BLOCK = Block(
    code="pool-room",
    owners=("a/one",),
    owner_of=np.zeros(1, dtype=np.int64),
    asks=np.zeros((0, 2, 1)),
    costs=np.zeros((1, 1)),
    limits=np.zeros((1, 1)),
    home=np.zeros(0, dtype=np.int64),
    moved=np.zeros(0),
    move_costs=np.zeros(1),
    ease=np.zeros((1, 1)),
    eased=np.zeros((0, 1)),
    swollen=np.ones((0, 1)),
)


def level(*bounds: tuple[int, float]) -> Level:
    """Return a level of two hours that uses 5 and 6, with limits from instants on."""
    limits = [(minute, np.full(2, limit)) for minute, limit in bounds]
    return Level(BLOCK, "a/one", np.array([5.0, 6.0]), limits)


def change(first: float, second: float) -> np.ndarray:
    return np.array([first, second])


def test_what_is_free_from_the_beginning_fits_always() -> None:
    assert level((ALWAYS, 10.0)).earliest(change(5, 4)) == ALWAYS


def test_what_is_never_free_never_fits() -> None:
    never = level((ALWAYS, 10.0))
    assert never.earliest(change(0, 4.1)) is None
    amount, hour = never.lacking(change(0, 4.5))
    assert amount == pytest.approx(0.5)
    assert hour == 1


def test_a_change_fits_once_another_has_left() -> None:
    used = level((ALWAYS, 10.0))
    used.add(100, change(-3, -3))
    assert used.earliest(change(0, 6)) == 100


def test_a_later_use_counts_now() -> None:
    """What comes at 100 stays, so nothing may take its room before."""
    used = level((ALWAYS, 10.0))
    used.add(100, change(4, 4))
    assert used.earliest(change(1, 0)) == ALWAYS
    assert used.earliest(change(2, 0)) is None


def test_gives_and_takes_of_a_minute_count_together() -> None:
    used = level((ALWAYS, 10.0))
    used.add(100, change(5, 4))
    used.add(100, change(-5, -4))
    assert used.earliest(change(5, 4)) == ALWAYS


def test_a_limit_that_grows_lets_more_in_from_then_on() -> None:
    assert level((ALWAYS, 10.0), (50, 20.0)).earliest(change(9, 9)) == 50


def test_relief_fits_where_the_limit_is_overrun() -> None:
    assert level((ALWAYS, 1.0)).earliest(change(-1, 0)) == ALWAYS


def test_what_is_undone_is_free_again() -> None:
    used = level((ALWAYS, 10.0))
    used.add(100, change(4, 4))
    used.undo()
    assert used.earliest(change(4, 4)) == ALWAYS


def test_the_overrun_is_the_worst_one_and_ends_with_the_last() -> None:
    used = level((ALWAYS, 10.0), (50, 4.0))
    used.add(60, change(3, 0))
    used.add(70, change(-5, -1))
    used.add(80, change(0, -1))
    found = used.overrun(50)
    assert found is not None
    assert (found.amount, found.hour, found.until) == (4.0, 0, 80)
    assert level((ALWAYS, 10.0)).overrun(ALWAYS) is None
