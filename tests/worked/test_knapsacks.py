"""Published knapsack problems, as a program and as a whole estate."""

import numpy as np
import pytest
from smallestate import estate, load, policy, pool, volume

from placer.candidates.table import candidates
from placer.estate import Aim, Media, Volume
from placer.placement import solver
from placer.placement.goals import Cost
from placer.placement.matrix import Builder, Program, RowKey
from placer.placement.place import Placement, place
from placer.placement.search import search
from placer.plan import Goal

SECONDS = 20.0

# C. Petersen, Operations Research 15, 1967, problem 1; OR-Library (J. Beasley), file
# mknap1, which states the optimum 3800.
PROFIT = np.array([100, 600, 1200, 2400, 500, 2000], dtype=float)
ROWS = (
    ((8, 12, 13, 64, 22, 41), 80),
    ((8, 12, 13, 75, 22, 41), 96),
    ((3, 6, 4, 18, 6, 4), 20),
    ((5, 10, 8, 32, 6, 12), 36),
    ((5, 13, 8, 42, 6, 20), 44),
    ((5, 13, 8, 48, 6, 20), 48),
    ((0, 0, 0, 0, 8, 0), 10),
    ((3, 0, 4, 0, 8, 0), 18),
    ((3, 2, 4, 0, 8, 4), 22),
    ((3, 2, 4, 8, 8, 4), 24),
)
ITEMS_2_3_6 = [0, 1, 1, 0, 0, 1]


def petersen() -> Program:
    builder = Builder(len(PROFIT), len(PROFIT))
    for number, (weights, most) in enumerate(ROWS):
        values = np.array(weights, dtype=float)
        builder.at_most(RowKey("row", str(number)), range(6), values, most)
    return builder.build()


def test_the_search_solves_a_knapsack_of_many_limits() -> None:
    """Ten limits at once, as a pool has room, busy hours and wear at once."""
    found = search(petersen(), (Cost("profit", "units", -PROFIT, -1),), SECONDS)
    assert found.x is not None
    assert found.goals[0].value == pytest.approx(3_800)
    assert list(found.x) == ITEMS_2_3_6


@pytest.mark.parametrize("name", solver.SOLVERS)
def test_every_solver_solves_it(name: str) -> None:
    answer = solver.solve(petersen(), -PROFIT, seconds=SECONDS, solver=name)
    assert answer.x is not None
    assert PROFIT @ answer.x == 3_800


# Multiple knapsack: printed output of the Martello-Toth routine MTM, data of ACM
# Algorithm 632, 1985: 333 with items {1, 4} in the first and {2, 3, 7} in the second.
REQUESTS = (92, 57, 49, 68, 60, 43, 67, 84, 87, 72)
SIZES = (23, 31, 29, 44, 53, 38, 63, 85, 89, 82)
PACKED = {"near/first": {1, 4}, "near/second": {2, 3, 7}}
GAIN_MS = 9


def knapsacks(*, given_up: int = 0) -> Placement:
    """Place volumes that each save 9 ms a read in one of two flash pools.

    They are on a pool without a model, at 10 ms measured; a read from flash takes 1 ms.
    """
    volumes: list[Volume] = [
        volume(f"v{i}", "old/heap", size, load(requests, kib=0), measured=10)
        for i, (requests, size) in enumerate(zip(REQUESTS, SIZES, strict=True), start=1)
    ]
    pools = [
        pool("old/heap", Media.UNMODELLED, 0),
        pool("near/first", Media.FLASH, 70, read_time=1_000),
        pool("near/second", Media.FLASH, 127, read_time=1_000),
    ]
    wishes = policy(Aim.BEST_USE, relief_given_up=given_up)
    found = place(candidates(estate(volumes, pools, wishes)), SECONDS)
    assert isinstance(found, Placement)
    return found


def packed(found: Placement) -> dict[str, set[int]]:
    names = ["old/heap", *PACKED]
    sets: dict[str, set[int]] = {name: set() for name in names}
    for number, place_ in enumerate(found.places, start=1):
        sets[names[place_]].add(number)
    return {name: sets[name] for name in PACKED}


def goal(found: Placement, name: str) -> Goal:
    return next(goal for goal in found.goals if goal.name == name)


def test_volumes_fill_two_flash_pools_like_knapsacks() -> None:
    """Relief is 2 (normal) x requests/s x 9 ms."""
    found = knapsacks()
    assert goal(found, "relief").value == pytest.approx(2 * 333 * GAIN_MS)
    assert packed(found) == PACKED


def test_relief_given_up_buys_fewer_gib() -> None:
    """95 % of the best relief is kept, with fewer GiB than the 190 of the best."""
    found = knapsacks(given_up=50_000)
    assert goal(found, "relief").value >= 0.95 * 2 * 333 * GAIN_MS - 1e-6
    assert goal(found, "relief").reached == pytest.approx(2 * 333 * GAIN_MS)
    moved = int((found.places != 0).sum())
    assert goal(found, "effort").value < 190 + 10 * moved
