"""The chain of small programs: begins with a solution, and never makes it worse."""

import time

import numpy as np
import pytest
from unit.placement.programs import goals, program, solutions

from placer.placement import solver
from placer.placement.chain import Chain, worthwhile
from placer.placement.matrix import Builder, Floats, RowKey

FAR = float("-inf")
POSSIBLE = [seed for seed in range(40) if len(solutions(program(seed)))]


def chain(seed: int, free: int) -> Chain:
    small, cost = program(seed), goals(seed)[1].vector
    relaxed = solver.relax(small, cost)
    assert relaxed is not None
    return Chain(small, cost, relaxed, np.random.default_rng(seed), free)


def worst(seed: int) -> Floats:
    possible, cost = solutions(program(seed)), goals(seed)[1].vector
    found: Floats = possible[(possible @ cost).argmax()]
    return found


@pytest.mark.parametrize("seed", POSSIBLE)
def test_it_begins_with_a_solution(seed: int) -> None:
    first = chain(seed, free=2).begin(time.monotonic() + 10)
    assert first is not None
    assert program(seed).holds(first)
    assert set(first) <= {0.0, 1.0}


@pytest.mark.parametrize("seed", POSSIBLE)
def test_it_never_ends_with_less_than_it_was_given(seed: int) -> None:
    links, start = chain(seed, free=3), worst(seed)
    for _ in range(2):
        better = links.improve(start.copy(), time.monotonic() + 0.1, FAR)
        assert program(seed).holds(better)
        assert links.cost @ better <= links.cost @ start
        start = better


def test_with_all_choices_open_it_ends_with_the_best() -> None:
    for seed in POSSIBLE[:8]:
        links = chain(seed, free=200)
        best = (solutions(program(seed)) @ links.cost).min()
        found = links.improve(worst(seed), time.monotonic() + 10, float(best))
        assert links.cost @ found == pytest.approx(best)


def test_it_leaves_alone_what_is_good_enough_or_too_late() -> None:
    seed = POSSIBLE[0]
    links, start = chain(seed, free=200), worst(seed)
    assert (solutions(program(seed)) @ links.cost).min() < links.cost @ start
    near = links.improve(start, time.monotonic() + 10, float(links.cost @ start))
    assert near is start
    assert links.improve(start, time.monotonic() - 1, FAR) is start
    assert links.begin(time.monotonic() - 1) is None


def test_it_gives_up_where_only_fractions_hold() -> None:
    """Two halves fill the room, one whole does not."""
    builder = Builder(2, 2)
    builder.equal(RowKey("one"), [0, 1], np.ones(2), 1)
    builder.equal(RowKey("half"), [0], np.ones(1), 0.5)
    small, cost = builder.build(), np.ones(2)
    relaxed = solver.relax(small, cost)
    assert relaxed is not None
    links = Chain(small, cost, relaxed, np.random.default_rng(1), 1)
    assert links.begin(time.monotonic() + 10) is None


@pytest.mark.parametrize("seed", POSSIBLE)
def test_every_better_solution_uses_worthwhile_columns_only(seed: int) -> None:
    small, cost, x = program(seed), goals(seed)[1].vector, worst(seed)
    possible = solutions(small)
    relaxed = solver.relax(small, cost)
    assert relaxed is not None
    for known in (x, possible[np.argsort(possible @ cost)[len(possible) // 2]]):
        columns = set(worthwhile(relaxed, float(cost @ known), known))
        assert set(np.flatnonzero(known)) <= columns
        for better in possible[possible @ cost < cost @ known - 1e-6]:
            assert set(np.flatnonzero(better)) <= columns


def test_columns_that_cannot_pay_are_left_out() -> None:
    """x is best at cost 1; y at cost 9 cannot be part of anything below 5."""
    builder = Builder(3, 3)
    builder.equal(RowKey("one"), [0, 1, 2], np.ones(3), 1)
    cost = np.array([1.0, 9.0, 4.0])
    relaxed = solver.relax(builder.build(), cost)
    assert relaxed is not None
    assert list(worthwhile(relaxed, 5.0, np.array([1.0, 0, 0]))) == [0, 2]


def test_a_worse_solution_is_never_taken(monkeypatch: pytest.MonkeyPatch) -> None:
    """Whatever a solver comes back with, what was known is kept."""
    seed = POSSIBLE[0]
    links, possible = chain(seed, free=200), solutions(program(seed))
    best = possible[(possible @ links.cost).argmin()]

    def poor(*_: object, **__: object) -> solver.Answer:
        return solver.Answer(worst(seed), FAR, proven=True, impossible=False)

    monkeypatch.setattr(solver, "solve", poor)
    assert links.improve(best, time.monotonic() + 10, FAR) is best
