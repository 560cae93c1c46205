"""Growth, reduction, thin volumes and copy times, against plain arithmetic.

Compound growth is that of any interest table; what reduction saves is table 1 of SNIA,
"Understanding data deduplication ratios", 2008; thin provisioning as SNIA's dictionary
has it (from memory).
"""

from dataclasses import replace
from math import log
from pathlib import Path

import pytest
from sheetfiles import estate as read_estate
from sheetfiles import least
from smallestate import estate, pool, volume

from placer.candidates.limits import Date, pool_room, pool_thin
from placer.estate import Media, Pool
from placer.physics.capacity import landed, thin_room
from placer.physics.demand import growth_factor, room, size
from placer.physics.drives import transfer
from placer.units import GIB, MB, MIB, MONTHS_PER_YEAR, PPM, TB

QUARTER = PPM // 4
TIB = 2**40


def grown(months: int, yearly: int = QUARTER) -> float:
    return float(growth_factor(yearly, months))


def reduced(ratio: float) -> Pool:
    return pool("quay/fast", Media.FLASH, 1_000, reduction=round(ratio * PPM))


def test_growth_compounds() -> None:
    """100 TB growing by 25 % a year are 195.3125 TB in 3 years, not 175 TB."""
    thin = replace(
        volume("v", "quay/fast", 1),
        thin=True,
        provisioned=300 * TB,
        occupied=100 * TB,
        capacity_growth=QUARTER,
    )
    assert size(thin, 36) / TB == 195.3125


def test_growth_stops_at_what_is_provisioned() -> None:
    """The thick volume of the same room does not grow at all."""
    thick = replace(volume("v", "quay/fast", 150), capacity_growth=QUARTER)
    thin = replace(thick, thin=True, occupied=100 * GIB)
    assert size(thick, 36) == size(thin, 36) == 150 * GIB


@pytest.mark.parametrize(
    ("target", "years", "months"), [(1.5, 1.81706, 21.805), (2, 3.10628, 37.2754)]
)
def test_time_until_a_quarter_a_year_has_filled_the_room(
    target: float, years: float, months: float
) -> None:
    """ln 1.5 / ln 1.25 = 1.81706 years, doubling takes 3.10628 years."""
    assert grown(int(months)) < target < grown(int(months) + 1)
    assert log(target) / log(grown(1)) == pytest.approx(months, abs=5e-4)
    assert log(target) / log(grown(12)) == pytest.approx(years, abs=5e-6)


def test_a_year_s_rate_is_not_twelve_times_the_month_s() -> None:
    """25 % a year are 1.87693 % a month; 2 % a month are 26.8242 % a year."""
    assert grown(1) - 1 == pytest.approx(0.0187693, abs=5e-8)
    assert grown(1, yearly=268_242) - 1 == pytest.approx(0.02, abs=1e-6)
    assert grown(1) ** MONTHS_PER_YEAR == pytest.approx(1.25, rel=1e-12)


@pytest.mark.parametrize(
    ("ratio", "saved"),
    [
        *((2, 50), (3, 66.667), (4, 75), (5, 80), (10, 90)),
        *((20, 95), (50, 98), (100, 99), (500, 99.8)),
    ],
)
def test_space_that_a_ratio_saves(ratio: int, saved: float) -> None:
    """SNIA 2008, table 1: 1 - 1 / ratio [%]; the last percents cost most."""
    assert 100 * (1 - landed(TB, reduced(ratio)) / TB) == pytest.approx(saved, abs=5e-4)


def test_ratios_multiply_and_savings_do_not_add() -> None:
    """2:1 of what 2:1 has left is 4:1: 75 % saved, not 50 + 50 = 100 %."""
    twice = landed(landed(TB, reduced(2)), reduced(2))
    assert twice == landed(TB, reduced(4)) == TB / 4


def test_over_subscription_is_no_reduction() -> None:
    """Provisioned 10, written 4, reduction 2:1: 2 are taken, 10 of 10 provisioned.

    2.5 times over-subscribed, it neither takes 4 / 5 nor counts as 10 / 2 in the ratio.
    """
    where = replace(reduced(2), usable=4 * GIB, thin_at_most=2_500_000)
    written = replace(volume("v", where.id, 10), thin=True, occupied=4 * GIB)
    date = Date(estate([written], [where]), 0)
    taken, asked = pool_room(date), pool_thin(date)
    assert taken.use(date.home).max() == 2 * GIB
    assert asked.use(date.home).max() == asked.limits.max() == 10 * GIB
    assert thin_room(where) == 10 * GIB


def test_snapshots_of_a_full_thin_volume_take_room_beyond_it() -> None:
    """Room is what is written and the snapshots, both reduced; plain addition."""
    full = replace(volume("v", "quay/fast", 10), thin=True, snapshots=3 * GIB)
    assert landed(room(full, 12), reduced(2)) == 6.5 * GIB


def test_requests_times_their_size_are_bytes_per_second(tmp_path: Path) -> None:
    """10 000 reads/s of 8 KiB are 81.92 MB/s = 78.125 MiB/s."""
    sheets = least()
    sheets["load"] = [
        [
            *("array", "volume", "hour begins", "reads (1/s)", "writes (1/s)"),
            *("read size (KiB)", "write size (KiB)"),
        ],
        *(["K", "db01", hour, 10_000, 0, 8, 8] for hour in range(24)),
    ]
    asked = read_estate(tmp_path, sheets).volumes[0].load[0]
    assert asked.read_bytes == 81.92 * MB == 78.125 * MIB


@pytest.mark.parametrize(
    ("moved", "rate", "hours"),
    [(10 * TIB, 200, 15.271), (10 * TB, 200, 13.889), (10 * TB, 100, 27.778)],
)
def test_hours_that_large_copies_take(moved: int, rate: int, hours: float) -> None:
    """10 TiB at 200 MB/s take 54 975.6 s; a drive of 10 TB is rebuilt in 27.78 h."""
    one = pool("quay/slow", Media.SPINNING, 0, drive_rate=rate * MB)
    assert transfer(moved, one) / 3_600 == pytest.approx(hours, abs=5e-4)
