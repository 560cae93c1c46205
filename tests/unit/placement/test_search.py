"""The search keeps its promises on programs small enough to try every solution."""

import numpy as np
import pytest
from unit.placement.programs import goals, program, solutions

from placer.placement import solver
from placer.placement.goals import Cost
from placer.placement.matrix import Builder, Floats, Program, RowKey
from placer.placement.search import Found, search
from placer.placement.watch import Watch
from placer.plan import Goal, Stopped

SECONDS = 20.0
CLOSE = 1e-6


def optima(seed: int, found: Found) -> list[float]:
    """Return the least cost of each goal within what was reached for those before."""
    possible, best = solutions(program(seed)), []
    for cost, goal in zip(goals(seed), found.goals, strict=True):
        best.append(float((possible @ cost.vector).min()))
        reached = cost.sign * goal.reached
        allowed = reached + cost.given_up * abs(reached) + CLOSE
        possible = possible[possible @ cost.vector <= allowed]
    return best


def minimised(seed: int, found: Found) -> list[tuple[float, float]]:
    """Return reached and bound of each goal as costs."""
    return [
        (cost.sign * goal.reached, cost.sign * goal.bound)
        for cost, goal in zip(goals(seed), found.goals, strict=True)
    ]


TRIALS = [(seed, 0.0) for seed in range(300)] + [(seed, 0.3) for seed in range(60)]


@pytest.mark.parametrize(("seed", "near_enough"), TRIALS)
def test_bounds_are_never_above_what_can_be_reached(
    seed: int, near_enough: float
) -> None:
    """Nor is anything reached that no solution has; exact search reaches the best."""
    found = search(program(seed), goals(seed), SECONDS, near_enough=near_enough)
    if found.x is None:
        assert not len(solutions(program(seed)))
        assert found.impossible
        return
    assert program(seed).holds(found.x)
    pairs = zip(minimised(seed, found), optima(seed, found), strict=True)
    for (reached, bound), best in pairs:
        assert bound <= best + CLOSE
        assert reached >= best - CLOSE
        assert reached - bound <= near_enough * abs(reached) + CLOSE


@pytest.mark.parametrize("seed", range(40))
def test_the_solution_keeps_what_each_goal_reached(seed: int) -> None:
    found = search(program(seed), goals(seed), SECONDS, near_enough=0)
    if found.x is None:
        return
    for cost, goal in zip(goals(seed), found.goals, strict=True):
        reached = cost.sign * goal.reached
        allowed = reached + cost.given_up * abs(reached) + CLOSE
        assert cost.vector @ found.x <= allowed
    assert found.program.holds(found.x)


def knapsack() -> tuple[Program, Cost, Floats]:
    """Return a room of 5 for sizes 3, 4, 2 with gains 3, 5, 1, and a poor start.

    The best is 4 alone, or 3 and 2: 5; the relaxation fills the rest with a third of 3.
    """
    builder = Builder(3, 3)
    builder.at_most(RowKey("room"), [0, 1, 2], np.array([3.0, 4.0, 2.0]), 5)
    gain = Cost("relief", "ms/s", -np.array([3.0, 5.0, 1.0]), -1)
    return builder.build(), gain, np.array([1.0, 0.0, 0.0])


def test_when_halted_the_start_is_kept() -> None:
    rows, gain, start = knapsack()
    found = search(rows, (gain,), SECONDS, start, Watch(halted=lambda: True))
    assert found.x is not None
    assert list(found.x) == list(start)
    goal = found.goals[0]
    assert goal.value == 3
    assert goal.bound == pytest.approx(6)
    assert goal.stopped is Stopped.INTERRUPT


def test_when_not_halted_it_is_improved() -> None:
    rows, gain, start = knapsack()
    goal = search(rows, (gain,), SECONDS, start, near_enough=0).goals[0]
    assert goal.value == 5
    assert goal.bound == pytest.approx(5)
    assert goal.stopped is Stopped.DONE


def test_a_start_that_breaks_a_row_is_not_used() -> None:
    rows, gain, _ = knapsack()
    found = search(rows, (gain,), SECONDS, np.ones(3), Watch(halted=lambda: True))
    assert found.x is not None
    assert rows.holds(found.x)


def test_each_goal_is_told_once_in_its_order() -> None:
    told: list[Goal] = []
    seed = next(s for s in range(20) if len(solutions(program(s))))
    found = search(program(seed), goals(seed), SECONDS, watch=Watch(tell=told.append))
    assert [goal.name for goal in told] == ["money", "relief", "effort"]
    assert [goal.reached for goal in told] == [goal.reached for goal in found.goals]


def test_nothing_is_told_of_the_impossible() -> None:
    builder = Builder(2, 2)
    builder.equal(RowKey("one"), [0, 1], np.ones(2), 3)
    cost = Cost("effort", "GiB", np.ones(2))
    found = search(builder.build(), (cost, cost), SECONDS)
    assert (found.x, found.goals, found.impossible) == (None, (), True)


def test_what_only_fractions_could_keep_is_impossible() -> None:
    """The relaxation has a solution; no choice has."""
    builder = Builder(2, 2)
    builder.equal(RowKey("one"), [0, 1], np.array([2.0, 2.0]), 3)
    cost = Cost("effort", "GiB", np.ones(2))
    found = search(builder.build(), (cost,), SECONDS)
    assert (found.x, found.impossible) == (None, True)


def test_a_goal_that_nothing_changes_is_reached_at_once() -> None:
    rows, gain, start = knapsack()
    idle = Cost("money", "hundredths", np.zeros(3))
    found = search(rows, (idle, gain), SECONDS, start, near_enough=0)
    assert [goal.value for goal in found.goals] == [0, 5]
    assert str(found.goals[0].value) == "0.0", "never minus nought"


NEARLY = np.array([1.0, 0.0, 1.0])


@pytest.mark.parametrize(
    ("near_enough", "stopped"), [(0.6, Stopped.NEAR), (0.4, Stopped.INTERRUPT)]
)
def test_near_enough_is_what_the_caller_calls_so(
    near_enough: float, stopped: Stopped
) -> None:
    """4 of at most 6: half of what was reached is missing."""
    rows, gain, _ = knapsack()
    halted = Watch(halted=lambda: True)
    goal = search(rows, (gain,), SECONDS, NEARLY, halted, near_enough).goals[0]
    assert goal.gap == pytest.approx(0.5)
    assert goal.stopped is stopped


def test_where_nothing_is_near_enough_a_small_gap_is_no_end() -> None:
    builder = Builder(2, 2)
    builder.at_most(RowKey("room"), [0, 1], np.ones(2), 2)
    gain = Cost("relief", "ms/s", -np.array([10_000.0, 1.0]), -1)
    start, halted = np.array([1.0, 0.0]), Watch(halted=lambda: True)
    found = search(builder.build(), (gain,), SECONDS, start, halted, near_enough=0)
    assert found.goals[0].gap == pytest.approx(1e-4)
    assert found.goals[0].stopped is Stopped.INTERRUPT


def test_a_relaxation_that_fails_does_not_lose_what_is_known(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    """Rows at the edge of its tolerance may defeat it; the start still holds."""
    rows, gain, start = knapsack()
    monkeypatch.setattr(solver, "relax", lambda *_: None)
    found = search(rows, (gain, gain), SECONDS, start)
    assert found.x is not None
    assert list(found.x) == list(start)
    assert not found.impossible
    assert [goal.value for goal in found.goals] == [3, 3]
    assert all(np.isinf(goal.bound) for goal in found.goals)
    assert {goal.stopped for goal in found.goals} == {Stopped.TIME}
