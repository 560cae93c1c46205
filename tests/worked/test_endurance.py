"""What flash drives may be written, against published arithmetic."""

from fractions import Fraction

import pytest

from placer.estate import Media, Pool
from placer.physics.flash import budget, drive_writes_per_day, host_copies, rated_bytes
from placer.units import DAYS_PER_YEAR, GB, MB, PPM, SECONDS_PER_DAY, TB

FIVE_YEARS = 5 * DAYS_PER_YEAR


@pytest.mark.parametrize(
    ("size", "dwpd", "expected"), [(3_840 * GB, 1, 7_008), (1_600 * GB, 3, 8_760)]
)
def test_rated_terabytes(size: int, dwpd: int, expected: int) -> None:
    """TBW = drive writes per day x TB x 365 x years, 7008 and 8760 TB over 5 years.

    The formula of JEDEC JESD218's ratings as data sheets print it; the second value
    is its arithmetic.
    """
    assert rated_bytes(size, dwpd * PPM, FIVE_YEARS) == expected * TB


def test_a_rating_knows_no_1024_and_no_leap_days() -> None:
    """J. Handy, "Comparing DWPD to TBW", shows a rival habit: / 1024 gives 6843.75."""
    rated = rated_bytes(3_840 * GB, PPM, FIVE_YEARS) / TB
    assert rated not in (Fraction("6843.75"), Fraction("7012.8"))


def test_drive_writes_per_day_from_a_rating_in_terabytes() -> None:
    """1432 TB on 1.8 TB in 5 years: 0.43592 a day, 784.66 GB.

    Data sheets print 0.43 and 774 GB: they round before they multiply.
    """
    each = drive_writes_per_day(1_432 * TB, 1_800 * GB, years=5)
    assert float(each) == pytest.approx(0.43592, abs=5e-6)
    assert float(each * 1_800) == pytest.approx(784.66, abs=5e-3)


def test_a_rating_and_its_drive_writes_per_day_are_one_another_s_inverse() -> None:
    each = drive_writes_per_day(1_432 * TB, 1_800 * GB, years=5)
    assert each * 1_800 * GB * FIVE_YEARS == 1_432 * TB


@pytest.mark.parametrize(
    ("data", "parity", "expected"), [(1, 0, 4.32), (1, 1, 8.64), (4, 1, 8.64)]
)
def test_a_day_of_writes(data: int, parity: int, expected: float) -> None:
    """50 MB/s are 4.32 TB a day; a mirror or one parity in place writes 8.64 TB.

    Drives are worn by the two writes of a small write (Patterson, Gibson, Katz,
    SIGMOD 1988), not by its two reads: not by the factor 4 of the requests.
    """
    pool = Pool(
        array="quay",
        name="fast",
        media=Media.FLASH,
        data=data,
        parity=parity,
        array_overhead=PPM,
    )
    day = 50 * MB * SECONDS_PER_DAY * host_copies(pool) / TB
    assert float(day) == pytest.approx(expected)


def test_wear_used_is_taken_from_the_rating() -> None:
    """12 drives of 7008 TB with 30 % used up: 58 867.2 TB are left."""
    pool = Pool(
        array="quay",
        name="fast",
        media=Media.FLASH,
        drives=12,
        drive_size=3_840 * GB,
        dwpd=PPM,
        warranty_days=FIVE_YEARS,
        wear_used=300_000,
    )
    assert float(budget(pool) / TB) == pytest.approx(58_867.2)
