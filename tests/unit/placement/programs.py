"""Small random programs like those of a placement, and all their solutions."""

from itertools import product

import numpy as np

from placer.placement.goals import Cost
from placer.placement.matrix import Builder, Floats, Program, RowKey

ITEMS, POOLS = 3, 3
PLACES = ITEMS * POOLS
STEPS = 2
COLUMNS = PLACES + STEPS


def program(seed: int) -> Program:
    """Return items in pools with rooms, the first of which can be enlarged twice.

    Sizes and rooms are whole, so that rounding plays no part.
    """
    luck = np.random.default_rng(seed)
    builder = Builder(COLUMNS, PLACES)
    for item in range(ITEMS):
        own = range(item * POOLS, (item + 1) * POOLS)
        builder.equal(RowKey("one", str(item)), own, np.ones(POOLS), 1)
    sizes = luck.integers(1, 10, (2, ITEMS)).astype(float)
    for pool in range(POOLS):
        for kind in range(2):
            columns = [*range(pool, PLACES, POOLS)]
            values, room = sizes[kind], float(luck.integers(3, 16))
            if pool == 0:
                columns += range(PLACES, COLUMNS)
                values = np.append(values, -luck.integers(1, 6, STEPS).astype(float))
            builder.at_most(RowKey("room", str(pool), kind), columns, values, room)
    builder.at_most(RowKey("order"), [PLACES + 1, PLACES], np.array([1.0, -1.0]), 0)
    return builder.build()


def goals(seed: int) -> tuple[Cost, ...]:
    """Return money, relief and effort, whole, as costs of the columns."""
    luck = np.random.default_rng(seed + 10_000)
    money = np.append(np.zeros(PLACES), luck.integers(0, 4, STEPS)).astype(float)
    relief = np.append(luck.integers(-20, 30, PLACES), np.zeros(STEPS)).astype(float)
    effort = np.append(luck.integers(0, 20, PLACES), np.zeros(STEPS)).astype(float)
    return (
        Cost("money", "hundredths", money),
        Cost("relief", "ms/s", -relief, -1, float(luck.choice([0.0, 0.1]))),
        Cost("effort", "GiB", effort),
    )


EVERYTHING = np.array(list(product((0.0, 1.0), repeat=COLUMNS)))


def solutions(small: Program) -> Floats:
    """Return every solution that keeps the rows, one a line."""
    uses = EVERYTHING @ small.matrix.toarray().T
    kept = (uses <= small.high + 1e-7) & (uses >= small.low - 1e-7)
    found: Floats = EVERYTHING[kept.all(axis=1)]
    return found
