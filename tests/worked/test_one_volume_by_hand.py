"""The worked example of the contributors' guide, figure by figure."""

import numpy as np
import pytest

from placer.candidates.table import candidates
from placer.candidates.uses import uses
from placer.estate import (
    Array,
    Estate,
    Hour,
    Load,
    Media,
    Policy,
    Pool,
    Volume,
    Window,
)
from placer.plan import Moment, Use
from placer.units import GIB, KIB, MB, MILLI, TB

DISKS = Pool(
    array="k",
    name="s",
    media=Media.SPINNING,
    drives=12,
    data=5,
    parity=1,
    drive_size=4 * TB,
    rpm=7200,
    seek=8500,
    drive_rate=150 * MB,
)
FLASH = Pool(
    array="k",
    name="f",
    media=Media.FLASH,
    drives=6,
    data=5,
    parity=1,
    drive_size=3840 * 10**9,
    reduction=2_000_000,
    read_time=150,
    write_time=50,
    reads_at_most=80_000 * MILLI,
    writes_at_most=30_000 * MILLI,
    drive_rate=1000 * MB,
    dwpd=1_000_000,
    warranty_days=1825,
    life_days=1825,
)
VOLUME = Volume(
    array="k",
    name="one",
    pool="s",
    provisioned=500 * GIB,
    occupied=400 * GIB,
    thin=True,
    load=(Load(150 * MILLI, 50 * MILLI, 150 * 8 * KIB, 50 * 16 * KIB),),
    capacity_growth=200_000,
)
WINDOW = Window(
    name="w", night="w", opens=600, start=600, end=900, zone="UTC", cutovers=0
)
ESTATE = Estate(
    name="by hand",
    digest="",
    hours=(Hour(None, 9, "09:00"),),
    volumes=(VOLUME,),
    pools=(DISKS, FLASH),
    arrays=(Array(name="k", write_answer=500),),
    windows=(WINDOW,),
    policy=Policy(start=0, earliest=0),
)
TABLE = candidates(ESTATE)
NOTHING = np.zeros(2, dtype=np.int64)


def used(pool: int) -> dict[tuple[str, str], Use]:
    """Uses at the horizon with the volume in a pool."""
    places = TABLE.home * 0 + pool
    found = uses(TABLE, TABLE.limits, places, NOTHING, Moment.PLANNED)
    return {(use.where, use.limit): use for use in found}


def test_room() -> None:
    """480 GiB of 30,715 in S; 240 GiB of 14,743 in F."""
    disks, flash = used(0)["k/s", "pool-room"], used(1)["k/f", "pool-room"]
    assert (disks.use, flash.use) == pytest.approx((480, 240))
    assert (disks.at_most, flash.at_most) == pytest.approx((30_715, 14_743), abs=0.5)


def test_busy_shares() -> None:
    """44.63 % and 0.22 % of at most 70 %."""
    disks, flash = used(0)["k/s", "pool-busy"], used(1)["k/f", "pool-busy"]
    assert (disks.use, flash.use) == pytest.approx((44.634, 0.2193), abs=5e-4)
    assert disks.at_most == flash.at_most == pytest.approx(70)


def test_responses_and_relief() -> None:
    """13.522 ms today, 276 us promised: 2,649 ms/s of waiting saved, twice counted."""
    assert TABLE.responses.today == [13_522]
    assert TABLE.responses.promised(0)[1] == 276
    assert TABLE.relief[0, 1] == pytest.approx(2 * 2649.2)


def test_wear() -> None:
    """142.089 TB of hosts and 0.288 TB of the move, of 42,048 TB."""
    wear = used(1)["k/f", "pool-wear"]
    assert wear.use == pytest.approx(142.0886 + 0.2878, abs=1e-4)
    assert wear.at_most == pytest.approx(42_048)
