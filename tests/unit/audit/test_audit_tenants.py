"""The caps of tenants, on cases worked by hand."""

from dataclasses import replace
from fractions import Fraction
from typing import Any

import pytest

from placer.audit import goal_values
from placer.audit.case import Case
from placer.audit.demand import GRAIN, Demand, demand_at
from placer.audit.limits import Scene, readings
from placer.audit.response import Answers
from placer.audit.tenants import factor
from placer.estate import (
    Array,
    Estate,
    Hour,
    Load,
    Media,
    Policy,
    Pool,
    Tenant,
    Volume,
)
from placer.plan import Placed, Plan, Status
from placer.units import GIB, MB, MILLI, SECONDS_PER_DAY, TB

PAIR = 400 * MILLI, 4 * MB
"""Two volumes of 300 + 100 requests/s of 10 kB each."""


@pytest.mark.parametrize(
    ("caps", "measured", "planned"),
    [
        ((0, 0), 1, 1),
        ((200, 0), Fraction(1, 2), Fraction(1, 2)),
        ((400, 0), 1, 1),
        ((800, 0), 1, 2),
        ((0, 1), Fraction(1, 4), Fraction(1, 4)),
        ((0, 12), 1, 3),
        ((200, 1), Fraction(1, 4), Fraction(1, 4)),
        ((200, 12), Fraction(1, 2), Fraction(1, 2)),
        ((800, 12), 1, 2),
        ((1_600, 12), 1, 3),
    ],
)
def test_the_tighter_cap_counts_and_only_a_plan_for_it_stretches(
    caps: tuple[int, int], measured: Fraction, planned: Fraction
) -> None:
    """Of 400 requests/s and 4 MB/s: a cap of 200 halves, one planned of 800 doubles."""
    tenant = Tenant(name="t", requests_cap=caps[0] * MILLI, rate_cap=caps[1] * MB)
    assert factor(tenant, PAIR) == measured
    assert factor(replace(tenant, plan_for_cap=True), PAIR) == planned


@pytest.mark.parametrize(
    ("asked", "expected"),
    [((0, 0), 1), ((400 * MILLI, 0), 2), ((0, MB), 12)],
)
def test_what_is_not_asked_for_is_not_capped(
    asked: tuple[int, int], expected: int
) -> None:
    tenant = Tenant(
        name="t", requests_cap=800 * MILLI, rate_cap=12 * MB, plan_for_cap=True
    )
    assert factor(tenant, asked) == expected


def load(reads: int, writes: int) -> Load:
    """Return requests of 10 kB each [1/s]."""
    return Load(reads * MILLI, writes * MILLI, reads * 10_000, writes * 10_000)


def volume(name: str, *hours: Load, **more: Any) -> Volume:
    """Return a volume of 1 GiB of the tenant on flash."""
    return Volume(
        array="a",
        name=name,
        pool="one",
        provisioned=GIB,
        occupied=GIB,
        thin=False,
        load=hours,
        tenant="t",
        **more,
    )


LARGE = volume("large", load(200, 100), load(20, 10))
SMALL = volume("small", load(50, 50), load(10, 0))
FLASH = Pool(
    array="a",
    name="one",
    media=Media.FLASH,
    drives=1,
    usable=100 * GIB,
    read_time=1_000,
    reads_at_most=1_000 * MILLI,
    skew=1_000_000,
)
CAPPED = Tenant(name="t", requests_cap=200 * MILLI)


def estate(*volumes: Volume, tenant: Tenant = CAPPED, **more: Any) -> Estate:
    """Return an estate of two hours and two pools of flash."""
    return Estate(
        name="e",
        digest="d",
        hours=(Hour(None, 9, "09:00"), Hour(None, 21, "21:00")),
        volumes=volumes,
        pools=(FLASH, replace(FLASH, name="two")),
        arrays=(Array(name="a"),),
        policy=Policy(start=0, earliest=0),
        tenants=(tenant,),
        **more,
    )


def requests(demand: Demand, name: str) -> list[float]:
    """Return reads and writes of a volume in each hour [1/s]."""
    parts = demand.loads[name]
    return [
        (parts[first] + parts[first + 1]) / (GRAIN * MILLI)
        for first in range(0, len(parts), 4)
    ]


def test_a_cap_shrinks_the_volumes_alike_in_the_hours_where_it_binds() -> None:
    """400 requests/s of 200 at 09:00: half; 40 at 21:00: all."""
    today = demand_at(estate(LARGE, SMALL), 0)
    assert requests(today, "a/large") == [150, 30]
    assert requests(today, "a/small") == [50, 10]
    halved = Load(100 * MILLI, 50 * MILLI, MB, 500_000)
    parts = halved.reads, halved.writes, halved.read_bytes, halved.write_bytes
    assert today.loads["a/large"][:4] == tuple(part * GRAIN for part in parts)


def test_a_plan_for_the_cap_stretches_every_hour_up_to_it() -> None:
    tenant = replace(CAPPED, requests_cap=800 * MILLI, plan_for_cap=True)
    today = demand_at(estate(LARGE, SMALL, tenant=tenant), 0)
    assert requests(today, "a/large") == [600, 600]
    assert requests(today, "a/small") == [200, 200]


def test_growth_comes_first_and_what_others_grow_is_lost_to_a_volume() -> None:
    """The small one doubles in a year: 300 + 200 of 200 are 0.4."""
    growing = replace(SMALL, load_growth=1_000_000)
    later = demand_at(estate(LARGE, growing), 12)
    assert requests(later, "a/large") == pytest.approx([120, 30])
    assert requests(later, "a/small") == pytest.approx([80, 20])


def test_other_volumes_and_tenants_not_listed_are_free() -> None:
    free = replace(LARGE, name="free", tenant="")
    stray = replace(LARGE, name="stray", tenant="not listed")
    today = demand_at(estate(LARGE, SMALL, free, stray), 0)
    assert requests(today, "a/free") == requests(today, "a/stray") == [300, 30]


def test_capped_loads_together_reach_a_ceiling_and_do_not_pass_it() -> None:
    """Three volumes of 300 reads/s share 100, a third of which is no whole number."""
    names = ("x", "y", "z")
    thirds = [volume(name, load(300, 0), load(0, 0)) for name in names]
    tenant = Tenant(name="t", requests_cap=100 * MILLI)
    drives = replace(FLASH, busy_ceiling=100_000)
    fleet = replace(estate(*thirds, tenant=tenant), pools=(drives,))
    assert not busy(fleet).over
    assert busy(replace(fleet, pools=(replace(drives, busy_ceiling=99_999),))).over


def busy(fleet: Estate) -> Any:
    """Return the busy share of the first pool as everything stands today."""
    case = Case(fleet, plan())
    return next(readings(Scene(case, case.today, case.homes, {}), "pool-busy"))


def plan(target: str = "a/one") -> Plan:
    """Return a plan that puts the large volume on a pool."""
    placed = Placed(volume="a/large", source="a/one", target=target)
    return Plan(
        inventory="e",
        digest="d",
        version="0",
        status=Status.PROVEN,
        placements=(placed,),
    )


def test_relief_counts_the_requests_that_the_cap_lets_through() -> None:
    """Measured 5 ms, promised 1 ms and half of 2.333: normal x 150/s of 300 asked.

    At 70 % busy a read waits 0.7 x 1 ms / 0.6; a third are writes answered in 0.
    """
    slow = replace(LARGE, response_measured=5_000)
    promised = 1_445
    assert goal_values(estate(slow, SMALL), plan("a/two"))["relief"] == Fraction(
        2 * 150 * (5_000 - promised), 1_000
    )
    free = replace(slow, tenant="")
    assert goal_values(estate(free, SMALL), plan("a/two"))["relief"] == Fraction(
        2 * 300 * (5_000 - promised), 1_000
    )


def test_the_busiest_hour_is_told_before_the_cap_is() -> None:
    """09:00 is cut below what 21:00 asks for, and stays the hour that counts.

    At 09:00 a read takes 1,000 and 10 kB / 10 MB/s = 1,000, at 21:00 only the first.
    Of 3 MB/s 0.1 are let through, 1 % busy: waits 0.01 x 1,000 / 1.98 = 5.05.
    """
    slow = replace(FLASH, drive_rate=10 * MB, reads_at_most=0)
    often = volume("large", load(300, 0), Load(250 * MILLI, 0, 0, 0))
    tenant = Tenant(name="t", rate_cap=MB // 10)
    fleet = replace(estate(often, tenant=tenant), pools=(slow,))
    case = Case(fleet, plan())
    assert case.today.loads["a/large"][4] > case.today.loads["a/large"][0]
    assert Answers(case).today(often) == 2_006


def test_wear_counts_what_the_cap_lets_be_written() -> None:
    """By hand: half of 1.5 MB/s at 09:00 and 0.1 at 21:00: 0.425 x 86,400 x 1,000."""
    drives = replace(
        FLASH, dwpd=1, life_days=1_000, array_overhead=1_000_000, reduction=1_000_000
    )
    fleet = replace(estate(LARGE, SMALL), pools=(drives,))
    case = Case(fleet, plan())
    wear = next(readings(Scene(case, case.today, case.homes, {}), "pool-wear"))
    assert wear.use * TB == Fraction(425_000 * SECONDS_PER_DAY * 1_000)


def test_a_rate_cap_counts_what_is_read_and_written() -> None:
    """3 + 1 MB/s of 2: half.  At 21:00 400 kB/s: all."""
    tenant = Tenant(name="t", rate_cap=2 * MB)
    today = demand_at(estate(LARGE, SMALL, tenant=tenant), 0)
    assert requests(today, "a/large") == [150, 30]


def test_snapshots_are_not_copied_so_they_wear_nothing() -> None:
    """A move of 1 GiB writes 1 GiB, whatever stands beside it."""
    kept = volume("large", load(1, 0), load(1, 0), snapshots=9 * GIB)
    worn = replace(FLASH, name="two", dwpd=1, life_days=1_000, array_overhead=1_000_000)
    fleet = replace(estate(kept), pools=(FLASH, worn))
    case = Case(fleet, plan("a/two"))
    scene = Scene(case, case.today, case.targets, {})
    (wear,) = readings(scene, "pool-wear")
    assert wear.use * TB == GIB
