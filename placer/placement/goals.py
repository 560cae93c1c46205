"""The goals of the placement as cost vectors, in the order of the policy."""

from dataclasses import dataclass

import numpy as np

from placer.candidates.block import Floats
from placer.estate import Aim, Policy
from placer.placement.layout import Layout


@dataclass(frozen=True)
class Cost:
    """One goal: ``vector @ x`` is minimised; ``sign`` -1 states it as a gain.

    ``given_up`` is the share of what was reached that later goals may spend.
    """

    name: str
    unit: str
    vector: Floats
    sign: int = 1
    given_up: float = 0.0


def costs(layout: Layout) -> tuple[Cost, ...]:
    """Return the goals in the order in which they are solved."""
    policy = layout.estate.policy
    relief, effort = _relief(layout, policy), _effort(layout)
    last = (relief, effort) if policy.aim is Aim.BEST_USE else (effort, relief)
    return (_missed(layout), _money(layout), *last)


def _missed(layout: Layout) -> Cost:
    worth = layout.items.worth(layout.candidates.missed)
    return Cost("missed", "steps", _padded(layout, worth))


def _money(layout: Layout) -> Cost:
    vector = np.zeros(layout.columns)
    for (pool, _), column in layout.step_column.items():
        expansion = layout.estate.pools[pool].expansion
        vector[column] = expansion.price if expansion else 0
    return Cost("money", "hundredths", vector)


def _relief(layout: Layout, policy: Policy) -> Cost:
    worth = layout.items.worth(layout.candidates.relief)
    spent = policy.aim is Aim.BEST_USE
    given_up = policy.relief_given_up / 1e6 if spent else 0.0
    return Cost("relief", "ms/s", _padded(layout, -worth), -1, given_up)


def _effort(layout: Layout) -> Cost:
    worth = layout.items.worth(layout.candidates.effort)
    return Cost("effort", "GiB", _padded(layout, worth))


def _padded(layout: Layout, worth: Floats) -> Floats:
    vector = np.zeros(layout.columns)
    vector[: len(worth)] = worth
    return vector
