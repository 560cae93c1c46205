"""Which places are refused, with which codes, and which route counts."""

from dataclasses import replace

import pytest
from smallestate import estate, pool, volume

from placer.candidates.reach import Reach
from placer.candidates.table import candidates
from placer.estate import (
    Array,
    Estate,
    Expansion,
    Host,
    Media,
    Route,
    Rule,
    RuleKind,
    Volume,
)
from placer.findings import Place
from placer.units import GIB

SLOW = pool("depot/slow", Media.SPINNING, 500)
FAST = pool("quay/fast", Media.FLASH, 100)
NEAR = pool("depot/near", Media.FLASH, 500)
HEAP = pool("quay/heap", Media.MIXED, 500)
LONE = volume("a", "depot/slow", 50)
ARRAYS = [Array(name="depot", site="inland"), Array(name="quay", site="harbour")]


def whole(*routes: Route, lone: Volume = LONE) -> Estate:
    fleet = estate([lone], [SLOW, FAST, NEAR, HEAP], arrays=ARRAYS)
    return replace(fleet, routes=routes)


def refused(fleet: Estate, target: str) -> list[str]:
    found = next(pool for pool in fleet.pools if pool.id == target)
    return [r.code for r in Reach(fleet).refusals(fleet.volumes[0], found)]


def test_without_wishes_only_sources_refuse() -> None:
    fleet = whole()
    assert [refused(fleet, pool.id) for pool in fleet.pools] == [
        [],
        [],
        [],
        ["source-only"],
    ]


def ruled(kind: RuleKind, *pools: str) -> Estate:
    rule = Rule(
        kind=kind,
        volumes=("depot/a",),
        pools=pools,
        said="as the owner said",
        place=Place("rules", "B3"),
    )
    return replace(whole(), rules=(rule,))


def test_only_on_refuses_every_other_pool_home_too() -> None:
    fleet = ruled(RuleKind.ONLY_ON, "quay/fast")
    assert refused(fleet, "quay/fast") == []
    assert refused(fleet, "depot/slow") == ["only-on"]
    assert refused(fleet, "depot/near") == ["only-on"]


def test_never_on_refuses_its_pools_home_too() -> None:
    fleet = ruled(RuleKind.NEVER_ON, "depot/slow", "quay/fast")
    assert refused(fleet, "depot/slow") == ["never-on"]
    assert refused(fleet, "quay/fast") == ["never-on"]
    assert refused(fleet, "depot/near") == []


def test_a_refusal_by_rule_says_whose_and_where() -> None:
    fleet = ruled(RuleKind.NEVER_ON, "quay/fast")
    (refusal,) = Reach(fleet).refusals(fleet.volumes[0], FAST)
    assert "as the owner said" in refusal.sentence
    assert "rules!B3" in refusal.sentence


def test_rules_of_others_do_not_matter() -> None:
    fleet = ruled(RuleKind.NEVER_ON, "quay/fast")
    other = replace(fleet, volumes=(replace(LONE, name="b"),))
    assert refused(other, "quay/fast") == []


def test_what_is_to_stay_is_refused_everywhere_but_at_home() -> None:
    fleet = whole(lone=replace(LONE, stays=True))
    assert refused(fleet, "depot/slow") == []
    assert refused(fleet, "depot/near") == ["stays"]
    assert refused(fleet, "quay/fast") == ["stays"]


def test_a_volume_larger_than_the_pool_is_refused_but_not_at_home() -> None:
    fleet = whole(lone=volume("a", "depot/slow", 101))
    assert refused(fleet, "quay/fast") == ["pool-room"]
    assert refused(whole(lone=volume("a", "depot/slow", 100)), "quay/fast") == []
    assert refused(whole(lone=volume("a", "depot/slow", 900)), "depot/slow") == []


def test_what_the_pool_could_be_enlarged_to_counts() -> None:
    step = Expansion(drives=1, price=1, at_most=1)
    large = replace(FAST, drives=4, expansion=step)
    fleet = whole(lone=volume("a", "depot/slow", 125))
    grown = replace(fleet, pools=(SLOW, large))
    assert refused(grown, "quay/fast") == []
    assert refused(replace(fleet, pools=(SLOW, FAST)), "quay/fast") == ["pool-room"]


def test_the_largest_volume_of_an_array_counts_for_what_enters_it() -> None:
    limited = [replace(array, largest_volume=50 * GIB - 1) for array in ARRAYS]
    fleet = replace(whole(), arrays=tuple(limited))
    assert refused(fleet, "quay/fast") == ["largest-volume"]
    assert refused(fleet, "depot/near") == []
    exact = [replace(array, largest_volume=50 * GIB) for array in ARRAYS]
    assert refused(replace(fleet, arrays=tuple(exact)), "quay/fast") == []


@pytest.mark.parametrize(
    ("hosts", "codes"),
    [
        ((Host(name="crane", arrays=("depot",)),), ["host-reach"]),
        ((Host(name="crane", arrays=("depot", "quay")),), []),
        ((Host(name="crane"),), []),
        ((Host(name="other", arrays=("depot",)),), []),
        ((), []),
    ],
)
def test_hosts_that_do_not_reach_an_array_refuse_it(
    hosts: tuple[Host, ...], codes: list[str]
) -> None:
    fleet = replace(whole(lone=replace(LONE, host="crane")), hosts=hosts)
    assert refused(fleet, "quay/fast") == codes
    assert refused(fleet, "depot/near") == [], "the array stays the same"


def test_where_routes_are_listed_others_are_none() -> None:
    back = whole(Route(source="quay", target="depot"))
    assert refused(back, "quay/fast") == ["route"]
    assert refused(back, "depot/near") == [], "inside an array needs none"


LEVELS = [
    ("depot", "quay"),
    ("depot", "harbour"),
    ("inland", "quay"),
    ("inland", "harbour"),
]


@pytest.mark.parametrize("exact", range(4))
def test_the_most_exact_route_counts(exact: int) -> None:
    """Array before site, the source first; whatever the order in the inventory."""
    routes = [
        Route(source=a, target=b, one_copy=number)
        for number, (a, b) in enumerate(LEVELS)
    ][exact:]
    for listed in (routes, routes[::-1]):
        found = Reach(whole(*listed)).route("depot", "quay")
        assert found is not None
        assert found.one_copy == exact


def test_an_exact_route_that_is_not_possible_closes_the_general_one() -> None:
    general = Route(source="inland", target="harbour")
    closed = Route(source="depot", target="quay", possible=False)
    assert refused(whole(general), "quay/fast") == []
    assert refused(whole(general, closed), "quay/fast") == ["route"]
    opened = (replace(general, possible=False), replace(closed, possible=True))
    assert refused(whole(*opened), "quay/fast") == []


def test_every_reason_against_a_place_is_given() -> None:
    """To stay, too large for pool and array, not reached, no route, never wanted."""
    fleet = replace(
        ruled(RuleKind.NEVER_ON, "quay/fast"),
        volumes=(replace(volume("a", "depot/slow", 200), stays=True, host="crane"),),
        hosts=(Host(name="crane", arrays=("depot",)),),
        routes=(Route(source="quay", target="depot"),),
        arrays=(ARRAYS[0], replace(ARRAYS[1], largest_volume=GIB)),
    )
    assert set(refused(fleet, "quay/fast")) == {
        "never-on",
        "stays",
        "pool-room",
        "largest-volume",
        "host-reach",
        "route",
    }


def test_the_table_allows_what_nothing_refuses() -> None:
    table = candidates(whole())
    assert table.allowed.tolist() == [[True, True, True, False]]
    assert table.home.tolist() == [0]
