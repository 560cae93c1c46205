"""Rates and sizes of transfers, by drive and by pool, against worked examples.

OSTEP: R. and A. Arpaci-Dusseau, "Operating Systems: Three Easy Pieces", v0.80, 2014.
"""

from dataclasses import replace

import pytest
from smallestate import drives_busy, pool

from placer.estate import Load, Media, Pool
from placer.physics.drives import half_turn, positioning, transfer
from placer.physics.protection import write_cost
from placer.units import KB, KIB, MB, MIB, MILLI, MS, PPM

N = 8
SECTOR = 512
SEQUENTIAL, RANDOM = 47.62, 0.981
NONE, MIRROR, ONE_PARITY = (1, 0), (1, 1), (N - 1, 1)


def drive(seek: float, rpm: int, rate: float) -> Pool:
    """Return one drive: mean seek [ms], turns per minute, rate [B/s]."""
    return pool(
        "quay/slow",
        Media.SPINNING,
        0,
        drives=1,
        seek=round(seek * MS),
        rpm=rpm,
        drive_rate=round(rate),
        skew=PPM,
    )


def milliseconds(size: float, one: Pool) -> float:
    return (positioning(one) + transfer(size, one)) * MS


@pytest.mark.parametrize(
    ("rpm", "turn"), [(10_000, 6), (5_400, 11.1111), (7_200, 8.3333), (15_000, 4)]
)
def test_a_whole_turn(rpm: int, turn: float) -> None:
    """OSTEP ch. 37, aside "Dimensional analysis": 10 000 rpm, 6 ms."""
    assert 2 * half_turn(rpm) * MS == pytest.approx(turn, abs=5e-5)


@pytest.mark.parametrize(
    ("size", "one", "expected"),
    [
        (10 * MB, drive(7, 10_000, 50 * MB), 210),
        (100 * MB, drive(4, 15_000, 125 * MB), 806.0),
        (100 * MB, drive(9, 7_200, 105 * MB), 965.55),
    ],
)
def test_a_long_transfer(size: int, one: Pool, expected: float) -> None:
    """OSTEP 38.4 prints 210 ms; 37.4 prints about 800 and 950 ms for 100 MB."""
    assert milliseconds(size, one) == pytest.approx(expected, abs=5e-3)


def test_the_rates_of_a_drive_at_random_and_in_sequence() -> None:
    """OSTEP 38.4: S = 47.62 MB/s from 10 MB at once, R = 0.981 MB/s from 10 KB.

    Printed R divides by a time with 1024 KB to the MB; all-decimal it is 0.9804 MB/s.
    """
    decimal, binary = drive(7, 10_000, 50 * MB), drive(7, 10_000, 50 * MIB)
    assert 10_000 / milliseconds(10 * MB, decimal) == pytest.approx(47.62, abs=5e-3)
    assert 10 / milliseconds(10 * KIB, binary) == pytest.approx(0.981, abs=5e-4)
    assert 10 / milliseconds(10 * KB, decimal) == pytest.approx(0.9804, abs=5e-5)


@pytest.mark.parametrize(("gigabit", "expected"), [(2**30, 9.2972), (10**9, 9.2994)])
def test_average_time_of_4_kb(gigabit: int, expected: float) -> None:
    """Silberschatz, Galvin, Gagne, "Operating System Concepts", mass storage.

    5 ms, 7200 rpm, 1 Gb/s, 0.1 ms overhead: the slides print 9.27 + 0.031 = 9.301 ms,
    having rounded each part.
    """
    overhead = 0.1
    one = drive(5, 7_200, gigabit / 8)
    assert milliseconds(4 * KIB, one) + overhead == pytest.approx(expected, abs=1e-4)


@pytest.mark.parametrize(
    ("sectors", "rate", "expected", "printed"),
    [(1, 54, 14.676, 14.65), (500, 54, 19.407, 19.5), (500, 128, 16.667, 16.7)],
)
def test_random_and_sequential_sectors(
    sectors: int, rate: int, expected: float, printed: float
) -> None:
    """Anderson, Dahlin, "Operating Systems: Principles and Practice", ch. 12.

    10.5 ms, 7200 rpm; the book takes 4.15 ms for the half turn.
    """
    found = milliseconds(sectors * SECTOR, drive(10.5, 7_200, rate * MB))
    assert found == pytest.approx(expected, abs=5e-4)
    assert found == pytest.approx(printed, abs=0.1)


def test_500_random_sectors() -> None:
    """The same book's drive: 7.34 s."""
    each = milliseconds(SECTOR, drive(10.5, 7_200, 54 * MB))
    assert 500 * each / MS == pytest.approx(7.34, abs=5e-3)


@pytest.mark.parametrize(
    ("one", "size", "expected"),
    [
        (drive(15, 7_200, 50 * MB / 8), 32_768, 24.41),
        (drive(30, 2_400, 512_000), 512, 43.5),
    ],
)
def test_a_random_block(one: Pool, size: int, expected: float) -> None:
    """A university's tutorial on operating systems prints 24.4 ms.

    Elmasri, Navathe, "Fundamentals of Database Systems", disk exercise: 43.5 ms.
    """
    assert milliseconds(size, one) == pytest.approx(expected, abs=5e-3)


def test_the_size_at_which_moving_takes_as_long_as_positioning() -> None:
    """9 ms, 7200 rpm, 105 MB/s: 1.3825 MB; from the drive of OSTEP's table 37.1."""
    one = drive(9, 7_200, 105 * MB)
    assert positioning(one) * MS == pytest.approx(13.1667, abs=5e-5)
    assert transfer(1.3825 * MB, one) == pytest.approx(positioning(one), rel=1e-6)


def eight(scheme: tuple[int, int], *, in_place: bool = True) -> Pool:
    """Return N drives that move 47.62 MB/s, or take the time of R for 10 kB."""
    data, parity = scheme
    return replace(
        drive(0, 0, SEQUENTIAL * MB),
        drives=N,
        data=data,
        parity=parity,
        in_place=in_place,
    )


def at_random(scheme: tuple[int, int]) -> Pool:
    takes = 10 / RANDOM * MS  # [us] for 10 kB
    return replace(eight(scheme), drive_rate=0, seek=round(takes))


@pytest.mark.parametrize(
    ("scheme", "expected"),
    [(NONE, 380.96), (MIRROR, 190.48), (ONE_PARITY, 333.34)],
)
def test_sequential_writes_fill_whole_stripes(
    scheme: tuple[int, int], expected: float
) -> None:
    """OSTEP table 38.7, N S, N S / 2, (N - 1) S with N = 8, S = 47.62 MB/s."""
    full = Load(0, MILLI, 0, round(expected * MB))
    assert drives_busy(eight(scheme, in_place=False), full) == pytest.approx(N)


@pytest.mark.parametrize("scheme", [NONE, MIRROR, ONE_PARITY])
def test_random_reads_in_megabytes(scheme: tuple[int, int]) -> None:
    """OSTEP table 38.7: N R = 7.848 MB/s of 10 kB each for all of these."""
    asked = Load(round(7.848 * MB / (10 * KB) * MILLI), 0, 0, 0)
    assert drives_busy(at_random(scheme), asked) == pytest.approx(N, rel=1e-4)


@pytest.mark.parametrize(
    ("scheme", "expected"), [(NONE, 7.848), (MIRROR, 3.924), (ONE_PARITY, 1.962)]
)
def test_random_writes_in_megabytes(scheme: tuple[int, int], expected: float) -> None:
    """OSTEP table 38.7: N R, N R / 2, N R / 4 with R = 0.981 MB/s."""
    asked = Load(0, round(expected * MB / (10 * KB) * MILLI), 0, 0)
    assert drives_busy(at_random(scheme), asked) == pytest.approx(N, rel=1e-4)


def test_small_writes_use_a_quarter_of_each_drive_and_reads_all_of_it() -> None:
    """Patterson, Gibson, Katz, SIGMOD 1988, level 5 (from memory): 25 % and 100 %."""
    cost = write_cost(*ONE_PARITY, in_place=True)
    assert 1 / cost.total == 0.25
    reads = drives_busy(at_random(ONE_PARITY), Load(MILLI, 0, 0, 0))
    writes = drives_busy(at_random(ONE_PARITY), Load(0, MILLI, 0, 0))
    assert reads / writes == pytest.approx(0.25)


@pytest.mark.parametrize(
    ("data", "parity", "one_block", "whole"), [(7, 1, 4, 8), (8, 2, 6, 10)]
)
def test_one_block_of_a_stripe_against_all_of_it(
    data: int, parity: int, one_block: int, whole: int
) -> None:
    """OSTEP 38.6 generalised: 2 (1 + P) requests for one block, D + P for D blocks.

    Written one by one, all blocks would be 2 D (1 + P) requests.
    """
    assert write_cost(data, parity, in_place=True).total == one_block
    cost = write_cost(data, parity, in_place=False)
    assert [cost.reads, cost.writes * data] == [0, whole]
