"""Wear of whole pools by their limit, against the arithmetic of drive ratings.

A drive of 3.84 TB rated for one drive write a day over 5 years bears 7008 TB (the
formula of JEDEC JESD218's ratings as data sheets print it).
"""

from dataclasses import replace

import pytest
from smallestate import estate, load, pool, volume

from placer.candidates.limits import Date, pool_wear
from placer.estate import Load, Media, Pool
from placer.units import DAYS_PER_YEAR, GB, MB, PPM, TB

YEARS = 5
RATED = 7_008
A_DAY = Load(0, 0, 0, 3_840 * GB // 86_400)


def flash(**others: int | bool) -> Pool:
    one = pool(
        "quay/fast",
        Media.FLASH,
        3_000,
        drives=1,
        drive_size=3_840 * GB,
        dwpd=PPM,
        warranty_days=YEARS * DAYS_PER_YEAR,
        life_days=YEARS * DAYS_PER_YEAR,
        array_overhead=PPM,
    )
    return replace(one, **others)  # type: ignore[arg-type]


def worn(where: Pool, *loads: Load) -> tuple[float, float]:
    """Return what the drives will have been written, and what they may be [TB]."""
    date = Date(estate([volume("v", where.id, 1, *loads)], [where]), 0)
    block = pool_wear(date)
    return float(block.use(date.home).max() / TB), float(block.limits.max() / TB)


def test_one_drive_write_a_day_wears_the_drive_out_in_its_warranty() -> None:
    written, allowed = worn(flash(), A_DAY)
    assert allowed == RATED
    assert written == pytest.approx(RATED, rel=1e-6)


def test_50_megabytes_a_second_are_4_32_terabytes_a_day() -> None:
    """86 400 s x 50 MB/s; 8.64 TB with a mirror or one parity in place."""
    steady = Load(0, 0, 0, 50 * MB)
    for scheme, expected in (((1, 0), 4.32), ((1, 1), 8.64), ((4, 1), 8.64)):
        data, parity = scheme
        written, _ = worn(flash(data=data, parity=parity, life_days=1), steady)
        assert written == pytest.approx(expected)


def test_a_stripe_written_whole_wears_by_its_share_of_parity() -> None:
    """OSTEP 38.6 (R. and A. Arpaci-Dusseau): 5 writes for 4 blocks, 1.25."""
    whole = flash(data=4, parity=1, in_place=False, life_days=1)
    assert worn(whole, Load(0, 0, 0, 50 * MB))[0] == pytest.approx(4.32 * 1.25)


def test_drives_wear_by_the_mean_of_the_hours_and_never_by_reads() -> None:
    """The daily amount is the mean times a day: 200 MB/s in 6 of 24 hours are 50."""
    hours = [Load(0, 0, 0, 200 * MB)] * 6 + [load(100_000)] * 18
    assert worn(flash(life_days=1), *hours)[0] == pytest.approx(4.32)


def test_reduction_spares_the_drives() -> None:
    """What is reduced 2:1 before it is written wears half as much."""
    halved = flash(life_days=1, reduction=2 * PPM)
    assert worn(halved, Load(0, 0, 0, 50 * MB))[0] == pytest.approx(2.16)


def test_spare_area_does_not_widen_the_rating() -> None:
    """Ratings are host writes (JESD218): more room usable or less, 7008 TB stay."""
    assert worn(flash(usable=2_000 * GB))[1] == worn(flash(overhead=0))[1] == RATED
