"""An estate that lacks one thing: the shortage must name that and nothing else.

Invented figures, worked by hand.  Twelve flash drives of 3.84 TB, one drive write a
day for 5 years, 30 % used up, 4 years asked; 400 000 reads/s a drive.  Two controllers
of 120 000 requests/s, one of which may fail.  Asked: 150 000 reads/s of 8 KiB in one
hour, 380 MB/s of writes in three and 63 MB/s in twenty; one parity, written in place,
reduction 2.
"""

from dataclasses import replace

import pytest
from smallestate import estate, load, pool, volume

from placer import audit, planner
from placer.candidates.table import candidates
from placer.estate import Array, Estate, Load, Media
from placer.plan import Moment, Plan, Shortage, Status, Use
from placer.units import DAYS_PER_YEAR, GB, KIB, MB, MILLI, PPM

SECONDS = 20.0
WRITE = 256 * KIB
READ_HOUR = 10


def writes(rate: int) -> Load:
    """Return writes of 256 KiB that carry a rate [MB/s]."""
    return Load(0, rate * MB * MILLI // WRITE, 0, rate * MB)


def asked() -> list[Load]:
    hours = [writes(63)] * 20 + [writes(380)] * 3
    hours.insert(READ_HOUR, load(150_000))
    return hours


def one_pool() -> Estate:
    flash = pool(
        "quay/fast",
        Media.FLASH,
        10_000,
        drives=12,
        drive_size=3_840 * GB,
        data=11,
        parity=1,
        reduction=2 * PPM,
        skew=PPM,
        read_time=100,
        reads_at_most=400_000 * MILLI,
        dwpd=PPM,
        warranty_days=5 * DAYS_PER_YEAR,
        wear_used=300_000,
        life_days=4 * DAYS_PER_YEAR,
        array_overhead=PPM,
    )
    controllers = Array(
        name="quay",
        reads_at_most=120_000 * MILLI,
        writes_at_most=120_000 * MILLI,
        controller_ceiling=PPM,
        uneven=PPM,
    )
    database = volume("db", "quay/fast", 4_000, *asked())
    return estate([database], [flash], arrays=[controllers], windows=())


def planned() -> Plan:
    whole = one_pool()
    plan = planner.plan(candidates(whole), SECONDS)
    assert plan.status is Status.NO_PLAN
    assert audit.judge(whole, plan) == ()
    return plan


def the_shortage() -> Shortage:
    (shortage,) = planned().shortages
    return shortage


def nearest(limit: str) -> Use:
    every = [use for use in planned().uses if use.moment is Moment.NEAREST]
    return next(use for use in every if use.limit == limit)


def test_the_controllers_lack_30_000_requests_and_nothing_else_lacks() -> None:
    """One controller is left: 150 000 asked of 120 000."""
    shortage = the_shortage()
    assert (shortage.limit, shortage.where) == ("controller-busy", "quay")
    assert (shortage.unit, shortage.hour) == ("requests/s", f"{READ_HOUR:02}:00")
    assert shortage.amount == pytest.approx(30_000, rel=1e-4)


def test_a_shelf_of_drives_is_said_to_be_no_remedy() -> None:
    assert "shelf of drives is no remedy" in the_shortage().remedy


def test_wear_is_a_fifth_of_what_the_drives_may_bear() -> None:
    """21.4 %: 100 MB/s on average, 8.64 TB/day x 2 / 2 of 40.32 TB/day.

    Not 81 % from the peak of 380 MB/s, nor 137 % with the factor 4 of the requests and
    the drives' own amplification, which their rating already holds.
    """
    wear = nearest("pool-wear")
    assert wear.unit == "TB"
    assert wear.use / wear.at_most == pytest.approx(8.64 / 40.32, rel=1e-4)
    assert wear.use == pytest.approx(8.64 * 4 * DAYS_PER_YEAR, rel=1e-4)


def test_the_drives_are_hardly_busy() -> None:
    """3.1 %: 150 000 of 4 800 000 reads/s; not 125 % by the read time of 100 us."""
    busy = nearest("pool-busy")
    assert (busy.unit, busy.hour) == ("%", f"{READ_HOUR:02}:00")
    assert busy.use == pytest.approx(3.125, rel=1e-6)


def test_the_controllers_are_used_to_125_percent() -> None:
    assert nearest("controller-busy").use == pytest.approx(125, rel=1e-6)


def test_a_third_controller_is_a_remedy() -> None:
    """Two are left then, 62.5 % busy."""
    whole = one_pool()
    three = tuple(replace(array, controllers=3) for array in whole.arrays)
    plan = planner.plan(candidates(replace(whole, arrays=three)), SECONDS)
    assert plan.status is Status.PROVEN
    assert plan.shortages == ()
