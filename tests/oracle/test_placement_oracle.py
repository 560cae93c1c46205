"""Two hands, one answer: all placements tried and judged by the audit, and the program.

The audit's arithmetic is its own, so a limit that is wrong on either side shows here: a
plan wrongly allowed as well as a good plan wrongly cut off.
"""

from collections.abc import Iterator, Mapping
from fractions import Fraction
from itertools import product

import pytest
from oracle.tiny import estate

from placer.audit import goal_values, judge_placement
from placer.candidates.table import candidates
from placer.estate import Aim, Estate
from placer.placement.place import Nothing, place
from placer.plan import Bought, Placed, Plan, Status

Goals = Mapping[str, Fraction]


def accepted(fleet: Estate) -> list[Goals]:
    """Return the goals of every placement that the audit accepts."""
    plans = (_plan(fleet, places, steps) for places, steps in _everything(fleet))
    return [
        goal_values(fleet, plan) for plan in plans if not judge_placement(fleet, plan)
    ]


def _everything(fleet: Estate) -> Iterator[tuple[tuple[str, ...], tuple[int, ...]]]:
    pools = [pool.id for pool in fleet.pools]
    steps = [
        range(pool.expansion.at_most + 1 if pool.expansion else 1)
        for pool in fleet.pools
    ]
    yield from product(product(pools, repeat=len(fleet.volumes)), product(*steps))


def _plan(fleet: Estate, places: tuple[str, ...], steps: tuple[int, ...]) -> Plan:
    return Plan(
        inventory=fleet.name,
        digest=fleet.digest,
        version="",
        status=Status.WITHIN_GAP,
        placements=tuple(
            Placed(volume=volume.id, source=volume.home, target=target)
            for volume, target in zip(fleet.volumes, places, strict=True)
        ),
        bought=tuple(
            Bought(pool.id, count, count * pool.expansion.price)
            for pool, count in zip(fleet.pools, steps, strict=True)
            if count and pool.expansion
        ),
    )


def best(fleet: Estate, goals: list[Goals]) -> list[Fraction]:
    """Return the best value of each goal, each within the ones before it."""
    last = ["relief", "effort"]
    order = [
        "missed",
        "money",
        *(last if fleet.policy.aim is Aim.BEST_USE else last[::-1]),
    ]
    reached = []
    for name in order:
        value = (
            max(g[name] for g in goals)
            if name == "relief"
            else min(g[name] for g in goals)
        )
        reached.append(value)
        goals = [g for g in goals if _kept(fleet, name, g[name], value)]
    return reached


def _kept(fleet: Estate, name: str, value: Fraction, reached: Fraction) -> bool:
    if name != "relief":
        return value <= reached
    spend = fleet.policy.aim is Aim.BEST_USE
    given_up = Fraction(fleet.policy.relief_given_up, 10**6) if spend else 0
    return value >= reached - given_up * abs(reached)


@pytest.mark.parametrize("seed", range(240))
def test_program_finds_what_enumeration_finds(seed: int) -> None:
    """The optimum of each goal is the best among all placements the audit accepts."""
    fleet = estate(seed)
    goals = accepted(fleet)
    found = place(candidates(fleet), seconds=20, near_enough=0)
    if isinstance(found, Nothing):
        assert not goals
        assert found.shortages
    else:
        reached = [goal.reached for goal in found.goals]
        wanted = [float(value) for value in best(fleet, goals)]
        assert reached == pytest.approx(wanted, rel=1e-6, abs=1e-6)
        assert all(goal.gap <= 1e-6 for goal in found.goals)


def test_estates_are_of_all_kinds() -> None:
    """The trial would prove little if every estate were easy, or none could be."""
    fleets = [estate(seed) for seed in range(240)]
    possible = [bool(accepted(fleet)) for fleet in fleets[:60]]
    assert 10 < sum(possible) < 58
