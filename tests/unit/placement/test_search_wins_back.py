"""What is given up for fewer moves is not given up for nothing."""

from itertools import product

import numpy as np
import pytest

from placer.placement.goals import Cost
from placer.placement.matrix import Builder, RowKey
from placer.placement.search import search

COLUMNS = 9
GIVEN_UP = 0.2


@pytest.mark.parametrize("seed", range(60))
def test_no_better_relief_is_to_be_had_for_the_same_effort(seed: int) -> None:
    """Among all solutions with the least effort, the one with the most relief."""
    rng = np.random.default_rng(seed)
    relief = rng.integers(1, 30, COLUMNS).astype(float)
    effort = rng.integers(1, 3, COLUMNS).astype(float)
    weights = rng.integers(1, 9, COLUMNS).astype(float)
    builder = Builder(COLUMNS, COLUMNS)
    builder.at_most(RowKey("room"), list(range(COLUMNS)), weights, 20)
    costs = (
        Cost("relief", "ms/s", -relief, -1, GIVEN_UP),
        Cost("effort", "GiB", effort),
    )
    found = search(builder.build(), costs, 10, near_enough=0)
    assert found.x is not None
    choices = [np.array(x) for x in product((0, 1), repeat=COLUMNS)]
    possible = [x for x in choices if weights @ x <= 20]
    most = max(relief @ x for x in possible)
    kept = [x for x in possible if relief @ x >= (1 - GIVEN_UP) * most - 1e-9]
    least = min(effort @ x for x in kept)
    wanted = max(relief @ x for x in kept if effort @ x == least)
    assert (effort @ found.x, relief @ found.x) == (least, wanted)
