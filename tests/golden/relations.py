"""Programs in which the owner's own rules act, or money."""

from collections.abc import Callable
from dataclasses import replace

from golden.case import FAST, NEAR, SLOW, Case
from smallestate import estate, policy, volume

from placer.estate import Array, Estate, Expansion, Level, Rule, RuleKind
from placer.findings import Place


def related(kind: RuleKind, level: Level) -> Estate:
    rule = Rule(
        kind=kind,
        volumes=("depot/a", "quay/b"),
        level=level,
        place=Place("rules", "A2"),
    )
    volumes = [volume("a", "depot/slow", 0), volume("b", "quay/fast", 0)]
    arrays = [Array(name="quay", site="harbour"), Array(name="depot", site="harbour")]
    whole = estate(volumes, [FAST, NEAR, SLOW], arrays=arrays)
    return replace(whole, rules=(rule,))


FREE_PAIR = """
        one-place 0: 1 a@quay/fast + 1 a@quay/near + 1 a@depot/slow = 1
        one-place 1: 1 b@quay/fast + 1 b@quay/near + 1 b@depot/slow = 1
        pool-room quay/fast #0: 0 a@quay/fast <= 500
        pool-room quay/near #0: 0 a@quay/near <= 500
        pool-room depot/slow #0: 0 a@depot/slow <= 500
"""


def apart_pools() -> Case:
    """At most one of the volumes is in each pool."""
    return (
        related(RuleKind.APART, Level.POOL),
        FREE_PAIR
        + """
        apart rules!A2 quay/fast: 1 a@quay/fast + 1 b@quay/fast <= 1
        apart rules!A2 quay/near: 1 a@quay/near + 1 b@quay/near <= 1
        apart rules!A2 depot/slow: 1 a@depot/slow + 1 b@depot/slow <= 1
    """,
    )


def apart_arrays() -> Case:
    """At most one of the volumes is in all pools of each array."""
    return (
        related(RuleKind.APART, Level.ARRAY),
        FREE_PAIR
        + """
        apart rules!A2 quay: 1 a@quay/fast + 1 a@quay/near + 1 b@quay/fast
            + 1 b@quay/near <= 1
        apart rules!A2 depot: 1 a@depot/slow + 1 b@depot/slow <= 1
    """,
    )


def apart_sites() -> Case:
    """At most one of the volumes is in all pools of each site, here the only one."""
    return (
        related(RuleKind.APART, Level.SITE),
        FREE_PAIR
        + """
        apart rules!A2 harbour: 1 a@quay/fast + 1 a@quay/near + 1 a@depot/slow
            + 1 b@quay/fast + 1 b@quay/near + 1 b@depot/slow <= 1
    """,
    )


def together_arrays() -> Case:
    """Each array holds the first volume exactly if it holds the other."""
    return (
        related(RuleKind.TOGETHER, Level.ARRAY),
        FREE_PAIR
        + """
        together rules!A2 quay: 1 a@quay/fast + 1 a@quay/near - 1 b@quay/fast
            - 1 b@quay/near = 0
        together rules!A2 depot: 1 a@depot/slow - 1 b@depot/slow = 0
    """,
    )


def together_pools() -> Case:
    """Volumes together in one pool are one thing to place, and need no row."""
    return (
        related(RuleKind.TOGETHER, Level.POOL),
        """
        one-place 0: 1 a+b@quay/fast + 1 a+b@quay/near + 1 a+b@depot/slow = 1
        pool-room quay/fast #0: 0 a+b@quay/fast <= 500
        pool-room quay/near #0: 0 a+b@quay/near <= 500
        pool-room depot/slow #0: 0 a+b@depot/slow <= 500
    """,
    )


def steps_and_budget() -> Case:
    """Steps add to their pool's limits, come one after the other, and cost money."""
    # 4 drives hold 500 GiB, so 2 more hold 250 more; 70 % of 4 drives are 2.8, of 2
    # more 1.4.  Steps at 3.00 and 5.00 with 11.00 to spend, in units of 1.00.
    fast = replace(FAST, drives=4, expansion=Expansion(drives=2, price=300, at_most=2))
    near = replace(NEAR, drives=4, expansion=Expansion(drives=4, price=500, at_most=1))
    wishes = policy(budget=1_100)
    return (
        estate([volume("a", "quay/near", 50)], [fast, near], wishes),
        """
        one-place 0: 1 a@quay/fast + 1 a@quay/near = 1
        pool-room quay/fast #0: 50 a@quay/fast - 250 quay/fast*1
            - 250 quay/fast*2 <= 500
        pool-room quay/near #0: 50 a@quay/near - 500 quay/near*1 <= 500
        pool-busy quay/fast #0: 0 a@quay/fast - 1.4 quay/fast*1 - 1.4 quay/fast*2 <= 2.8
        pool-busy quay/near #0: 0 a@quay/near - 2.8 quay/near*1 <= 2.8
        budget: 3 quay/fast*1 + 3 quay/fast*2 + 5 quay/near*1 <= 11
        steps: 1 quay/fast*2 - 1 quay/fast*1 <= 0
    """,
    )


CASES: tuple[Callable[[], Case], ...] = (
    apart_pools,
    apart_arrays,
    apart_sites,
    together_arrays,
    together_pools,
    steps_and_budget,
)
