"""Responses against published service times and waiting formulas."""

from dataclasses import replace
from fractions import Fraction

import pytest

from placer.audit.mix import at_drives, of_hosts, residual
from placer.audit.response import response, wait
from placer.estate import Array, Load, Media, Pool, Volume
from placer.units import KIB, MB, MIB, MILLI, PPM

ARRAY = Array(name="a", write_answer=100)
NONE = Fraction(0)


def reads_of(size: int) -> Load:
    """Return one read of a size [B] a second."""
    return Load(MILLI, 0, size, 0)


def answer(
    load: Load,
    pool: Pool,
    busy: Fraction,
    array: Array = ARRAY,
    random: int = PPM,
    hits: Fraction = NONE,
) -> int:
    """Return the response of a volume that has drives, busy as told, to itself."""
    volume = Volume(
        array="a",
        name="v",
        pool="p",
        provisioned=0,
        occupied=0,
        thin=False,
        load=(load,),
        random_reads=random,
    )
    hosts = of_hosts(volume, load, (load.reads, load.writes))
    own = at_drives(volume, hosts, 1 - hits)
    return response(volume, pool, array, hits, wait(busy, residual(pool, own)))


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
    assert answer(reads_of(4_000), pool, Fraction(0)) == pytest.approx(
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
    assert answer(reads_of(0), pool, share) == pytest.approx(
        100_000 * stretched, rel=2e-5
    )


def test_no_wait_is_told_above_95_percent() -> None:
    pool = Pool(array="a", name="p", media=Media.SPINNING, seek=1_000)
    at_most = answer(reads_of(0), pool, Fraction(95, 100))
    assert answer(reads_of(0), pool, Fraction(99, 100)) == at_most


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
    assert answer(reads_of(10_000), pool, Fraction(1, 2)) == 355


def test_writes_answer_from_the_cache_and_part_of_a_microsecond_counts_whole() -> None:
    """By hand: (1 x 200 + 2 x 100) / 3 = 133.3."""
    pool = Pool(array="a", name="p", media=Media.FLASH, read_time=200)
    load = Load(MILLI, 2 * MILLI, 0, 0)
    assert answer(load, pool, Fraction(0), Array(name="a", write_answer=100)) == 134


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
    assert answer(Load(MILLI, MILLI, 0, 0), pool, Fraction(0)) == 0


def test_a_volume_without_requests_has_no_response() -> None:
    pool = Pool(array="a", name="p", media=Media.FLASH, read_time=200)
    assert answer(Load(0, 0, 0, 0), pool, Fraction(0)) == 0


SPINNING = Pool(
    array="a",
    name="p",
    media=Media.SPINNING,
    seek=7_000,
    rpm=10_000,
    drive_rate=100 * MB,
)


@pytest.mark.parametrize(
    ("random", "unit", "microseconds"),
    [
        (PPM, MIB, 10_656),
        (0, MIB, 1_281),
        (PPM // 2, MIB, 5_968),
        (0, 64 * KIB, 10_656),
        (0, 32 * KIB, 20_656),
        (0, 0, 656),
    ],
)
def test_sequential_reads_position_once_for_each_unit_that_is_fetched(
    random: int, unit: int, microseconds: int
) -> None:
    """By hand: 64 KiB in 1 MiB is each 16th read, 10 ms / 16 = 625; 655.36 transfer."""
    pool = replace(SPINNING, prefetch_unit=unit)
    read = reads_of(64 * KIB)
    assert answer(read, pool, NONE, random=random) == pytest.approx(microseconds, abs=1)


def test_a_sequential_read_waits_for_less_than_a_random_one() -> None:
    """By hand: 1,280.36 and half as much again at 50 % busy, M/D/1."""
    read = reads_of(64 * KIB)
    assert answer(read, SPINNING, Fraction(1, 2), random=0) == 1_921


FLASH = Pool(array="a", name="p", media=Media.FLASH, read_time=1_000)


@pytest.mark.parametrize(
    ("hits", "microseconds"), [(0, 1_000), (40, 640), (100, 100), (25, 775)]
)
def test_reads_that_hit_are_answered_from_the_cache(
    hits: int, microseconds: int
) -> None:
    """By hand: of 1,000 and 100."""
    array = Array(name="a", read_hit_answer=100)
    share = Fraction(hits, 100)
    assert answer(reads_of(0), FLASH, NONE, array, hits=share) == microseconds


def test_hits_do_not_answer_for_a_pool_of_which_nothing_is_known() -> None:
    unknown = replace(FLASH, read_time=0)
    array = Array(name="a", read_hit_answer=100)
    assert answer(reads_of(0), unknown, NONE, array, hits=Fraction(1)) == 0


def test_the_measured_factor_stretches_what_drives_do_not_what_caches_do() -> None:
    """By hand: waits 0.5 x 500 / 1 = 250; (1,250 x 1.5 + 100) / 2 = 987.5 per read."""
    pool = replace(FLASH, measured_factor=1_500_000, reads_at_most=2_000 * MILLI)
    array = Array(name="a", read_hit_answer=100, write_answer=300)
    half = Fraction(1, 2)
    assert answer(reads_of(0), pool, half, array, hits=half) == 988
    mixed = Load(MILLI, MILLI, 0, 0)
    assert answer(mixed, pool, half, array, hits=half) == 644
