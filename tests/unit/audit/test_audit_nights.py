"""Snapshots, hits and caps in the replay of the nights, on cases worked by hand.

Volumes of 100 GiB in pools of one drive that positions in 1 ms; `small` has half the
cache of `large`.
"""

from dataclasses import replace
from typing import Any

import pytest

from placer.audit import judge
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
    Window,
)
from placer.plan import Booking, Move, Placed, Plan, Reason, Status
from placer.units import GIB, MB, MILLI

DAY = 1_440
OPENS, CUTOVER = DAY, DAY + 100
MONTHS = 24


def pool(array: str, usable: int = 1_000, busy: int = 1_000_000) -> Pool:
    """Return a pool that may be filled to the brim."""
    return Pool(
        array=array,
        name="p",
        media=Media.SPINNING,
        drives=1,
        usable=usable * GIB,
        fill_ceiling=1_000_000,
        busy_ceiling=busy,
        skew=1_000_000,
        seek=1_000,
    )


def volume(name: str, array: str, reads: int = 0, **more: Any) -> Volume:
    """Return a volume that is held for a day."""
    return Volume(
        array=array,
        name=name,
        pool="p",
        provisioned=100 * GIB,
        occupied=100 * GIB,
        thin=False,
        load=(Load(reads * MILLI, 0, 0, 0),),
        hold_days=1,
        **more,
    )


def broken(
    volumes: tuple[Volume, ...],
    pools: tuple[Pool, Pool],
    mover: str,
    **more: Any,
) -> set[str]:
    """Return what a plan breaks that moves one volume, but for claims."""
    window = Window(
        name="w", night="w", opens=OPENS, start=OPENS, end=OPENS + 480, zone="UTC"
    )
    fleet = Estate(
        name="e",
        digest="d",
        hours=(Hour(None, 0, "00:00"),),
        volumes=volumes,
        pools=pools,
        arrays=(
            Array(name="large", cache=64 * GIB),
            Array(name="small", cache=32 * GIB),
        ),
        windows=(window,),
        **{"policy": Policy(start=0, earliest=0, horizon_months=MONTHS)} | more,
    )
    found = judge(fleet, moving(fleet, mover))
    return {f.code for f in found if not f.code.startswith("claim-")}


def moving(fleet: Estate, mover: str) -> Plan:
    """Return the plan that moves one volume to the other array in the one night."""
    each = next(v for v in fleet.volumes if v.name == mover)
    target = next(p.id for p in fleet.pools if p.id != each.home)
    days = max(each.hold_days, each.snapshot_days)
    move = Move(
        id=mover,
        volume=each.id,
        source=each.home,
        target=target,
        size=100 * GIB,
        starts=OPENS,
        ends=OPENS + 20,
        window="w",
        cutover=CUTOVER,
        released=OPENS + days * DAY,
    )
    piece = Booking(
        move=mover, window="w", starts=OPENS, ends=OPENS + 20, rate=100 * MB
    )
    placements = tuple(
        Placed(
            volume=v.id,
            source=v.home,
            target=target if v is each else v.home,
            reason=Reason.MAKE_ROOM if v is each else Reason.STAYS,
        )
        for v in fleet.volumes
    )
    return Plan(
        inventory="e",
        digest="d",
        version="0",
        status=Status.WITHIN_GAP,
        placements=placements,
        moves=(move,),
        bookings=(piece,),
    )


@pytest.mark.parametrize(("usable", "expected"), [(250, set()), (249, {"pool-room"})])
def test_snapshots_take_room_beside_each_volume_in_the_target(
    usable: int, expected: set[str]
) -> None:
    """100 + 30 come to 100 + 20."""
    pair = (
        volume("x", "large", snapshots=30 * GIB),
        volume("y", "small", snapshots=20 * GIB),
    )
    assert broken(pair, (pool("large"), pool("small", usable)), "x") == expected


@pytest.mark.parametrize(("days", "expected"), [(3, set()), (4, {"cured-by"})])
def test_snapshots_keep_the_room_of_the_source(days: int, expected: set[str]) -> None:
    """130 + 100 GiB stand in 200 until the window's opening and the snapshots' days."""
    pair = volume("x", "large", snapshots=30 * GIB), volume("y", "large")
    staying, leaving = pair[1], replace(pair[0], snapshot_days=days)
    cure = Policy(start=0, earliest=0, cured_by=OPENS + 3 * DAY)
    pools = pool("large", 200), pool("small")
    assert broken((leaving, staying), pools, "x", policy=cure) == expected


@pytest.mark.parametrize(
    ("home", "busy", "expected"),
    [
        ("large", 800_000, set()),
        ("large", 799_999, {"pool-busy"}),
        ("small", 600_000, set()),
        ("small", 599_999, {"pool-busy"}),
    ],
)
def test_what_hits_is_told_by_the_array_that_serves(
    home: str, busy: int, expected: set[str]
) -> None:
    """Of 1,000 reads/s 40 % hit; half of them where the cache is half as large."""
    other = {"large": "small", "small": "large"}[home]
    crowd = (volume("x", home, 1_000, read_hits=400_000),)
    pools = pool(home), pool(other, busy=busy)
    assert broken(crowd, pools, "x") == expected


@pytest.mark.parametrize(
    ("busy", "expected"), [(400_000, set()), (399_999, {"pool-busy"})]
)
def test_a_cap_counts_the_same_before_and_after_a_cutover(
    busy: int, expected: set[str]
) -> None:
    """The tenant may have 800 of 600 + 1,000 reads/s: x 300; 100 more are free."""
    crowd = (
        volume("x", "large", 600, tenant="t"),
        volume("y", "large", 1_000, tenant="t"),
        volume("z", "small", 100),
    )
    tenants = (Tenant(name="t", requests_cap=800 * MILLI),)
    pools = pool("large"), pool("small", busy=busy)
    assert broken(crowd, pools, "x", tenants=tenants) == expected


def test_a_cap_is_shared_in_the_nights_by_the_loads_of_the_nights() -> None:
    """Today 500 + 500 of a cap of 500; the other grows ninefold in two years.

    In the nights, a month on, x still asks for nearly its half, at the horizon for
    500 of 5,000: 50.  A ceiling of 20 % is broken in the nights alone.
    """
    crowd = (
        volume("x", "large", 500, tenant="t"),
        volume("y", "large", 500, tenant="t", load_growth=2_000_000),
    )
    tenants = (Tenant(name="t", requests_cap=500 * MILLI),)
    pools = pool("large"), pool("small", busy=200_000)
    assert broken(crowd, pools, "x", tenants=tenants) == {"pool-busy"}
    wide = pool("large"), pool("small", busy=250_000)
    assert broken(crowd, wide, "x", tenants=tenants) == set()


def test_a_factor_measured_at_the_target_counts_there() -> None:
    """400 positionings of 1 ms, measured at twice the model: 80 %."""
    crowd = (volume("x", "large", 400),)
    slow = replace(pool("small", busy=800_000), measured_factor=2_000_000)
    assert broken(crowd, (pool("large"), slow), "x") == set()
    tight = replace(slow, busy_ceiling=799_999)
    assert broken(crowd, (pool("large"), tight), "x") == {"pool-busy"}
