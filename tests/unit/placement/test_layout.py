"""Columns and goals mean what the placement they are built from means."""

from dataclasses import replace

import numpy as np
import pytest
from smallestate import estate, policy, pool, volume, window

from placer.candidates.table import candidates
from placer.estate import Aim, Array, Estate, Expansion, Media, Rule, RuleKind
from placer.placement import goals, rows
from placer.placement.layout import layout

SLOW = pool("depot/slow", Media.SPINNING, 500)
STEP = Expansion(drives=1, price=1, at_most=2)
FAST = pool("quay/fast", Media.FLASH, 500, drives=4)
PAIR = [
    replace(volume(name, "depot/slow", 10), applications=("fares",), host=name)
    for name in "ab"
]


def whole() -> Estate:
    arrays = [Array(name="depot", hosts_at_most=2), Array(name="quay", hosts_at_most=2)]
    nights = (replace(window(1), cutovers=2),)
    pools = [SLOW, replace(FAST, expansion=STEP)]
    return estate(PAIR, pools, policy(budget=2), arrays=arrays, windows=nights)


@pytest.mark.parametrize("places", [(0, 0), (0, 1), (1, 0), (1, 1)])
@pytest.mark.parametrize("steps", [0, 1, 2])
def test_a_placement_and_its_solution_are_the_same(
    places: tuple[int, int], steps: int
) -> None:
    """Markers of hosts and applications included: its solution keeps every row."""
    plan = layout(candidates(whole()))
    x = plan.solution(np.array(places), np.array([0, steps]))
    assert rows.program(plan).holds(x)
    assert tuple(plan.places(x)) == places
    assert tuple(plan.bought(x)) == (0, steps)


def test_volumes_together_may_only_be_where_each_may_be() -> None:
    names = ("depot/a", "depot/b")
    together = Rule(kind=RuleKind.TOGETHER, volumes=names)
    never = Rule(kind=RuleKind.NEVER_ON, volumes=names[:1], pools=("quay/fast",))
    plan = layout(candidates(replace(whole(), rules=(together, never))))
    assert plan.items.members == ((0, 1),)
    assert plan.items.places == ((0, 0),)


@pytest.mark.parametrize(
    ("aim", "given_up"), [(Aim.BEST_USE, 0.25), (Aim.LEAST_CHANGE, 0.0)]
)
def test_relief_is_given_up_only_where_fewer_moves_come_after_it(
    aim: Aim, given_up: float
) -> None:
    wishes = policy(aim, relief_given_up=250_000)
    costs = goals.costs(layout(candidates(replace(whole(), policy=wishes))))
    assert {cost.name: cost.given_up for cost in costs if cost.given_up} == (
        {"relief": given_up} if given_up else {}
    )
