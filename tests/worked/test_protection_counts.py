"""What protection costs, against the tables of the books and papers.

OSTEP: R. and A. Arpaci-Dusseau, "Operating Systems: Three Easy Pieces", v0.80, 2014.
"""

import pytest
from smallestate import drives_busy, load

from placer.estate import Media, Pool
from placer.physics.capacity import usable
from placer.physics.protection import stripe_cost, write_cost
from placer.units import PPM, TB

N = 8
NONE, MIRROR, ONE_PARITY, TWO_PARITIES = (1, 0), (1, 1), (N - 1, 1), (N - 2, 2)


def drives(scheme: tuple[int, int]) -> Pool:
    """Return N drives of 1 TB that take 10 ms for a random request."""
    data, parity = scheme
    return Pool(
        array="quay",
        name="disks",
        media=Media.SPINNING,
        drives=N,
        drive_size=TB,
        data=data,
        parity=parity,
        seek=10_000,
        overhead=0,
        skew=PPM,
    )


def at_the_drives(scheme: tuple[int, int], reads: int, writes: int) -> float:
    cost = write_cost(*scheme, in_place=True)
    return float(reads + writes * cost.total)


@pytest.mark.parametrize(
    ("scheme", "share"), [(NONE, N), (MIRROR, N / 2), (ONE_PARITY, N - 1)]
)
def test_usable_capacity(scheme: tuple[int, int], share: float) -> None:
    """OSTEP table 38.7, capacity: N B, N B / 2, (N - 1) B."""
    assert usable(drives(scheme)) == share * TB


def test_a_drive_that_fills_no_stripe_group_holds_nothing() -> None:
    """Two groups of 3 + 1 on nine drives: six drives of data, not 6.75."""
    pool = Pool(
        array="quay",
        name="odd",
        media=Media.SPINNING,
        drives=9,
        data=3,
        parity=1,
        drive_size=TB,
        overhead=0,
    )
    assert usable(pool) == 6 * TB


@pytest.mark.parametrize(
    ("scheme", "share"), [(NONE, N), (MIRROR, N / 2), (ONE_PARITY, N / 4)]
)
def test_random_writes(scheme: tuple[int, int], share: float) -> None:
    """OSTEP table 38.7, random write: N R, N R / 2, N R / 4 with R = 100 writes/s."""
    full = load(0, share * 100, kib=0)
    assert drives_busy(drives(scheme), full) == pytest.approx(N)


def test_random_reads_use_every_drive() -> None:
    """OSTEP table 38.7, random read: N R for all but a drive kept for parity."""
    for scheme in (NONE, MIRROR, ONE_PARITY):
        full = load(N * 100, kib=0)
        assert drives_busy(drives(scheme), full) == pytest.approx(N)


def test_a_small_write_with_one_parity_is_two_reads_and_two_writes() -> None:
    """Patterson, Gibson, Katz, SIGMOD 1988; OSTEP 38.6 (subtractive parity)."""
    cost = write_cost(*ONE_PARITY, in_place=True)
    assert [cost.reads, cost.writes, cost.total] == [2, 2, 4]


def test_two_parities_make_six_requests_and_a_mirror_two() -> None:
    """The counting of Patterson, Gibson, Katz 1988 with a second parity."""
    cost = write_cost(*TWO_PARITIES, in_place=True)
    assert [cost.reads, cost.writes, cost.total] == [3, 3, 6]
    mirror = write_cost(*MIRROR, in_place=True)
    assert [mirror.reads, mirror.writes] == [0, 2]


def test_a_whole_stripe_reads_nothing() -> None:
    """OSTEP 38.6, full-stripe write: 4 + 1 drives take 5 writes for 4 blocks.

    The same blocks one by one would be 16 requests.
    """
    cost = write_cost(4, 1, in_place=False)
    assert [cost.reads, 4 * cost.writes, 4 * stripe_cost(4, 1)] == [0, 5, 5]
    assert 4 * write_cost(4, 1, in_place=True).total == 16


@pytest.mark.parametrize(
    ("reads", "mirror", "one", "two"),
    [
        (700, 1_300, 1_900, 2_500),
        (500, 1_500, 2_500, 3_500),
        (900, 1_100, 1_300, 1_500),
    ],
)
def test_requests_at_the_drives_from_1000_of_the_hosts(
    reads: int, mirror: int, one: int, two: int
) -> None:
    """Small random requests, 70/30, 50/50 and 90/10 reads to writes.

    The factors 2, 4 and 6 of Patterson, Gibson, Katz 1988 and its second parity.
    """
    writes = 1_000 - reads
    assert at_the_drives(MIRROR, reads, writes) == mirror
    assert at_the_drives(ONE_PARITY, reads, writes) == one
    assert at_the_drives(TWO_PARITIES, reads, writes) == two


def test_the_busy_time_of_a_mix_counts_the_requests_at_the_drives() -> None:
    """700 reads and 300 writes on one parity: 1900 requests of 10 ms on 8 drives."""
    asked = load(700, 300, kib=0)
    assert drives_busy(drives(ONE_PARITY), asked) == pytest.approx(19.0)
