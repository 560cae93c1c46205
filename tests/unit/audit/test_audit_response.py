"""Responses against published service times and waiting formulas."""

from fractions import Fraction

import pytest

from placer.audit.response import response
from placer.estate import Load, Media, Pool
from placer.units import MB, MILLI


def reads_of(size: int) -> Load:
    """Return one read of a size [B] a second."""
    return Load(MILLI, 0, size, 0)


# Random read of 4 KB, recomputed from the drives' data: OSTEP, tables 37.1 and 37.2.
@pytest.mark.parametrize(
    ("seek", "rpm", "rate", "microseconds"),
    [(4_000, 15_000, 125, 6_032), (9_000, 7_200, 105, 13_205)],
)
def test_idle_read_of_a_spinning_drive(
    seek: int, rpm: int, rate: int, microseconds: int
) -> None:
    pool = Pool(
        array="a",
        name="p",
        media=Media.SPINNING,
        seek=seek,
        rpm=rpm,
        drive_rate=rate * MB,
    )
    assert response(reads_of(4_000), pool, 0, Fraction(0)) == pytest.approx(
        microseconds, abs=1
    )


# M/D/1, R / S = 1 + U / (2 (1 - U)): Pollaczek-Khinchine without variance.
@pytest.mark.parametrize(
    ("busy", "stretched"),
    [(0.5, 1.5), (0.7, 2.1667), (0.8, 3.0), (0.9, 5.5), (0.95, 10.5)],
)
def test_a_busy_drive_stretches_the_response(busy: float, stretched: float) -> None:
    pool = Pool(array="a", name="p", media=Media.SPINNING, seek=100_000)
    share = Fraction(str(busy))
    assert response(reads_of(0), pool, 0, share) == pytest.approx(
        100_000 * stretched, rel=2e-5
    )


def test_no_wait_is_told_above_95_percent() -> None:
    pool = Pool(array="a", name="p", media=Media.SPINNING, seek=1_000)
    at_most = response(reads_of(0), pool, 0, Fraction(95, 100))
    assert response(reads_of(0), pool, 0, Fraction(99, 100)) == at_most


def test_flash_waits_for_what_a_read_holds_not_for_its_idle_time() -> None:
    """By hand: 200 + 100 idle, holds 10 + 100, waits 0.5 x 110 / 1 = 55."""
    pool = Pool(
        array="a",
        name="p",
        media=Media.FLASH,
        read_time=200,
        reads_at_most=100_000 * MILLI,
        drive_rate=100 * MB,
    )
    assert response(reads_of(10_000), pool, 0, Fraction(1, 2)) == 355


def test_writes_answer_from_the_cache_and_part_of_a_microsecond_counts_whole() -> None:
    """By hand: (1 x 200 + 2 x 100) / 3 = 133.3."""
    pool = Pool(array="a", name="p", media=Media.FLASH, read_time=200)
    load = Load(MILLI, 2 * MILLI, 0, 0)
    assert response(load, pool, 100, Fraction(0)) == 134


@pytest.mark.parametrize(
    "pool",
    [
        Pool(array="a", name="p", media=Media.MIXED, read_time=200, seek=1),
        Pool(array="a", name="p", media=Media.UNMODELLED, read_time=200, seek=1),
        Pool(array="a", name="p", media=Media.FLASH, read_time=200, requests_at_most=1),
        Pool(array="a", name="p", media=Media.FLASH),
        Pool(array="a", name="p", media=Media.SPINNING),
    ],
)
def test_a_response_that_cannot_be_told_is_unknown(pool: Pool) -> None:
    assert response(Load(MILLI, MILLI, 0, 0), pool, 100, Fraction(0)) == 0


def test_a_volume_without_requests_has_no_response() -> None:
    pool = Pool(array="a", name="p", media=Media.FLASH, read_time=200)
    assert response(Load(0, 0, 0, 0), pool, 100, Fraction(0)) == 0
