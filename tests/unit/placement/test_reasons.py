"""Each move is given the reason that holds, the weightiest first."""

from collections.abc import Sequence
from dataclasses import replace

import numpy as np
import pytest
from smallestate import estate, load, policy, pool, volume

from placer.candidates.table import candidates
from placer.estate import Array, Estate, Level, Media, Rule, RuleKind, Volume
from placer.placement.reasons import reasons
from placer.plan import Reason

FAST = pool("quay/fast", Media.FLASH, 500, read_time=1_000)
SLOW = pool("depot/slow", Media.SPINNING, 100)
HOME, AWAY = 0, 1


def why(whole: Estate, *places: int) -> list[Reason]:
    return reasons(candidates(whole), np.array(places))


def one(*, measured: float = 0, limit: int = 0, size: int = 50) -> Volume:
    lone = volume("a", "depot/slow", size, load(100, kib=0), measured=measured)
    return replace(lone, response_limit=limit)


def test_what_stays_has_none() -> None:
    whole = estate([one(measured=10, limit=1)], [SLOW, FAST])
    assert why(whole, HOME) == [Reason.STAYS]


def test_fewer_steps_missed_are_its_limit() -> None:
    """10 ms where 5 ms are allowed; there is a gain too, but the limit weighs more."""
    assert why(estate([one(measured=10, limit=5_000)], [SLOW, FAST]), AWAY) == [
        Reason.LIMIT
    ]


def test_a_gain_that_counts_is_relief() -> None:
    assert why(estate([one(measured=10)], [SLOW, FAST]), AWAY) == [Reason.RELIEF]


def test_from_a_pool_that_is_too_full_it_is_a_cure() -> None:
    whole = estate([one(size=60), volume("b", "depot/slow", 50)], [SLOW, FAST])
    assert why(whole, AWAY, HOME) == [Reason.CURE, Reason.STAYS]


def test_from_a_pool_that_will_be_too_full_it_is_a_cure() -> None:
    """60 GiB that grow by 100 % a year in a pool of 100."""
    thin = replace(volume("a", "depot/slow", 200), thin=True, occupied=60 * 2**30)
    growing = replace(thin, capacity_growth=1_000_000)
    pools = [SLOW, FAST]
    assert why(estate([growing], pools, policy(horizon_months=12)), AWAY) == [
        Reason.CURE
    ]
    assert why(estate([thin], pools, policy(horizon_months=12)), AWAY) == [
        Reason.MAKE_ROOM
    ]


def test_from_a_pool_in_order_it_makes_room_for_others() -> None:
    assert why(estate([one()], [SLOW, FAST]), AWAY) == [Reason.MAKE_ROOM]


def test_from_an_array_with_too_many_volumes_it_is_a_cure() -> None:
    arrays = [Array(name="depot", volumes_at_most=1), Array(name="quay")]
    whole = estate([one(), volume("b", "depot/slow", 1)], [SLOW, FAST], arrays=arrays)
    assert why(whole, AWAY, HOME) == [Reason.CURE, Reason.STAYS]


def test_from_an_array_with_too_many_hosts_it_is_a_cure() -> None:
    arrays = [Array(name="depot", hosts_at_most=1), Array(name="quay")]
    volumes = [
        replace(volume(name, "depot/slow", 1), host=host)
        for name, host in (("a", "pilot"), ("b", "crane"))
    ]
    whole = estate(volumes, [SLOW, FAST], arrays=arrays)
    assert why(whole, AWAY, HOME) == [Reason.CURE, Reason.STAYS]
    in_order = [replace(v, host="pilot") for v in volumes]
    assert why(estate(in_order, [SLOW, FAST], arrays=arrays), AWAY, HOME) == [
        Reason.MAKE_ROOM,
        Reason.STAYS,
    ]


def ruled(kind: RuleKind, *pools: str, level: Level = Level.POOL) -> Estate:
    """Return a pair of which a and b are in the depot, a with a gain to be had."""
    rule = Rule(kind=kind, volumes=("depot/a", "depot/b"), pools=pools, level=level)
    arrays = [Array(name="depot", site="inland"), Array(name="quay", site="harbour")]
    whole = estate(
        [one(measured=10), volume("b", "depot/slow", 1)], [SLOW, FAST], arrays=arrays
    )
    return replace(whole, rules=(rule,))


@pytest.mark.parametrize(
    "whole",
    [
        ruled(RuleKind.APART),
        ruled(RuleKind.APART, level=Level.ARRAY),
        ruled(RuleKind.APART, level=Level.SITE),
        ruled(RuleKind.ONLY_ON, "quay/fast"),
        ruled(RuleKind.NEVER_ON, "depot/slow"),
    ],
)
def test_a_rule_that_is_broken_today_is_a_cure_whatever_the_gain(whole: Estate) -> None:
    assert why(whole, AWAY, HOME) == [Reason.CURE, Reason.STAYS]


@pytest.mark.parametrize(
    "whole",
    [
        ruled(RuleKind.TOGETHER),
        ruled(RuleKind.TOGETHER, level=Level.SITE),
        ruled(RuleKind.ONLY_ON, "depot/slow", "quay/fast"),
        ruled(RuleKind.NEVER_ON, "quay/fast"),
    ],
)
def test_a_rule_that_is_kept_today_is_no_reason(whole: Estate) -> None:
    assert why(whole, AWAY, AWAY) == [Reason.RELIEF, Reason.MAKE_ROOM]


def separate(level: Level) -> Sequence[Reason]:
    rule = Rule(kind=RuleKind.TOGETHER, volumes=("depot/a", "quay/b"), level=level)
    arrays = [Array(name="depot", site="harbour"), Array(name="quay", site="harbour")]
    volumes = [volume("a", "depot/slow", 1), volume("b", "quay/fast", 1)]
    whole = replace(estate(volumes, [SLOW, FAST], arrays=arrays), rules=(rule,))
    return why(whole, AWAY, AWAY)


def test_volumes_not_together_today_are_cured_at_the_level_asked() -> None:
    assert separate(Level.POOL) == [Reason.CURE, Reason.STAYS]
    assert separate(Level.ARRAY) == [Reason.CURE, Reason.STAYS]
    assert separate(Level.SITE) == [Reason.MAKE_ROOM, Reason.STAYS]
