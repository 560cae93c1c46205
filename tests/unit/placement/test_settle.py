"""Settling sends home the moves that no row and no goal asks for, and no other."""

from dataclasses import replace

import numpy as np
from smallestate import estate, load, pool, volume

from placer.candidates.table import candidates
from placer.estate import Estate, Media, Rule, RuleKind
from placer.placement import goals, rows
from placer.placement.layout import Layout, layout
from placer.placement.matrix import Floats, Program, RowKey
from placer.placement.settle import settle

FAST = pool("quay/fast", Media.FLASH, 500, read_time=1_000)
SLOW = pool("depot/slow", Media.SPINNING, 100)
NOTHING = np.zeros(2, dtype=np.int64)


def laid_out(whole: Estate) -> tuple[Program, Layout]:
    plan = layout(candidates(whole))
    return rows.program(plan), plan


def settled(whole: Estate, *places: int) -> list[int]:
    program, plan = laid_out(whole)
    return list(settle(program, plan, np.array(places), NOTHING))


def test_exactly_the_needless_move_is_undone() -> None:
    """70 and 60 GiB do not fit into 100 together: the more laborious goes home."""
    volumes = [volume("a", "depot/slow", 60), volume("b", "depot/slow", 70)]
    assert settled(estate(volumes, [SLOW, FAST]), 1, 1) == [1, 0]


def test_every_needless_move_is_undone() -> None:
    volumes = [volume("a", "depot/slow", 60), volume("b", "depot/slow", 40)]
    assert settled(estate(volumes, [SLOW, FAST]), 1, 1) == [0, 0]


def test_what_stays_stays() -> None:
    volumes = [volume("a", "depot/slow", 60), volume("b", "quay/fast", 40)]
    assert settled(estate(volumes, [SLOW, FAST]), 0, 1) == [0, 1]


def test_a_goal_that_was_reached_keeps_its_move() -> None:
    """10 ms become 1 ms for a; b gains nothing that anybody counted."""
    volumes = [
        volume("a", "depot/slow", 30, load(100, kib=0), measured=10),
        volume("b", "depot/slow", 40),
    ]
    program, plan = laid_out(estate(volumes, [SLOW, FAST]))
    places = np.array([1, 1])
    relief = next(cost for cost in goals.costs(plan) if cost.name == "relief").vector
    held = program.with_row(
        RowKey("goal relief"), relief, float(relief @ reached(plan, places))
    )
    assert list(settle(program, plan, places, NOTHING)) == [0, 0]
    assert list(settle(held, plan, places, NOTHING)) == [1, 0]


def reached(
    plan: Layout, *places: "np.ndarray[tuple[int], np.dtype[np.int64]]"
) -> Floats:
    return plan.solution(places[0], NOTHING)


def together(*names: str) -> Rule:
    return Rule(kind=RuleKind.TOGETHER, volumes=names)


def test_volumes_placed_together_go_home_together() -> None:
    volumes = [volume("a", "depot/slow", 10), volume("b", "depot/slow", 20)]
    whole = replace(
        estate(volumes, [SLOW, FAST]), rules=(together("depot/a", "depot/b"),)
    )
    assert settled(whole, 1, 1) == [0, 0]


def test_volumes_together_from_different_homes_have_no_home_to_go_to() -> None:
    volumes = [volume("a", "depot/slow", 10), volume("b", "quay/fast", 20)]
    whole = replace(
        estate(volumes, [SLOW, FAST]), rules=(together("depot/a", "quay/b"),)
    )
    assert settled(whole, 1, 1) == [1, 1]


def test_a_home_that_a_rule_forbids_is_none() -> None:
    rule = Rule(kind=RuleKind.NEVER_ON, volumes=("depot/a",), pools=("depot/slow",))
    whole = replace(
        estate([volume("a", "depot/slow", 10)], [SLOW, FAST]), rules=(rule,)
    )
    assert settled(whole, 1) == [1]
