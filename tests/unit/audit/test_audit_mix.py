"""Behind what a read waits: mixes of requests, by textbook and worked by hand."""

from dataclasses import replace
from fractions import Fraction

import pytest

from placer.audit.case import Case
from placer.audit.mix import Mix, at_drives, mean_square, of_hosts, residual, together
from placer.audit.response import Answers
from placer.estate import (
    Array,
    Estate,
    Hour,
    Load,
    Media,
    Policy,
    Pool,
    Volume,
)
from placer.plan import Placed, Plan, Status
from placer.units import KB, KIB, MB, MILLI, PPM

DISKS = Pool(
    array="a",
    name="one",
    media=Media.SPINNING,
    drives=1,
    usable=1,
    skew=1_000_000,
    busy_ceiling=500_000,
    seek=6_000,
    rpm=7_500,
    drive_rate=100 * MB,
)
FLASH = Pool(
    array="a",
    name="flash",
    media=Media.FLASH,
    data=3,
    parity=1,
    read_time=200,
    reads_at_most=1_000 * MILLI,
    writes_at_most=500 * MILLI,
    drive_rate=100 * MB,
)


def asks(reads: int, size: int, writes: int = 0) -> Load:
    """Return requests of one size [1/s, B]."""
    return Load(reads * MILLI, writes * MILLI, reads * size, writes * size)


def volume(name: str, *load: Load, pool: str = "one") -> Volume:
    """Return a volume that takes no room."""
    return Volume(
        array="a",
        name=name,
        pool=pool,
        provisioned=0,
        occupied=0,
        thin=False,
        load=load,
    )


def answers(
    *volumes: Volume,
    pools: tuple[Pool, ...] = (DISKS,),
    places: dict[str, str] | None = None,
) -> Answers:
    """Return the responses of volumes on the pools of one array."""
    hours = tuple(Hour(None, at, str(at)) for at in range(len(volumes[0].load)))
    estate = Estate(
        name="e",
        digest="d",
        hours=hours,
        volumes=volumes,
        pools=pools,
        arrays=(Array(name="a", read_hit_answer=50),),
        policy=Policy(start=0, earliest=0),
    )
    placed = tuple(
        Placed(volume=name, source="", target=target)
        for name, target in (places or {}).items()
    )
    plan = Plan(
        inventory="e",
        digest="d",
        version="0",
        status=Status.PROVEN,
        placements=placed,
    )
    return Answers(Case(estate, plan))


# Pollaczek-Khinchine, lambda E[S^2] / (2 (1 - rho)): R. Cooper, Introduction to
# Queueing Theory, 2nd edition 1981, p. 189.  Services of 0.1 and 4 ms, of 6 and 26 ms:
# the positioning and the sizes at 100 MB/s are chosen to take so long.
@pytest.mark.parametrize(
    ("seek", "often", "seldom", "waits"),
    [
        (50, (2_000, 5 * KB), (50, 395 * KB), 683.33),
        (5_000, (40, 100 * KB), (8, 2_100 * KB), 6_202.9),
    ],
)
def test_a_read_waits_behind_the_mix_of_short_and_long_services(
    seek: int, often: tuple[int, int], seldom: tuple[int, int], waits: float
) -> None:
    drive = replace(DISKS, seek=seek, rpm=0)
    short, long = volume("short", asks(*often)), volume("long", asks(*seldom))
    both = answers(short, long, pools=(drive,))
    for each, size in ((short, often[1]), (long, seldom[1])):
        waited = both.today(each) - seek - size * PPM / drive.drive_rate
        assert waited == pytest.approx(waits, abs=1)


def test_small_and_large_reads_share_the_wait_of_one_pool() -> None:
    """By hand: 30/s of 8 KiB take 10.1 ms, 10/s of 256 KiB 13.2: 43.5 % busy.

    (30 x 10.1^2 + 10 x 13.2^2) / (2 x 435) = 5.5203; x 0.435 / 0.565 = 4.2502 ms.
    """
    drives = replace(DISKS, drive_rate=80_000 * KIB)
    small, large = volume("s", asks(30, 8 * KIB)), volume("l", asks(10, 256 * KIB))
    shared = answers(small, large, pools=(drives,))
    assert (shared.today(small), shared.today(large)) == (14_351, 17_451)
    assert answers(small, pools=(drives,)).today(small) < 14_351


def mix_of(load: Load, random: int = PPM, missed: int = 100) -> Mix:
    """Return the requests of one volume in one hour; missed reads in percent."""
    asking = replace(volume("v", load), random_reads=random)
    hosts = of_hosts(asking, load, (load.reads, load.writes))
    return at_drives(asking, hosts, Fraction(missed, 100))


# Reads take 1.1 ms, writes 2.1; 10 of each from the hosts.
@pytest.mark.parametrize(
    ("pool", "left"),
    [
        (FLASH, Fraction(1_245, 1_500)),
        (replace(FLASH, data=4, in_place=False), Fraction(67_225, 74_500)),
        (replace(FLASH, data=1), Fraction(10_030, 10_600)),
        (replace(FLASH, parity=0), Fraction(562, 640)),
        (replace(FLASH, parity=2), Fraction(1_807, 2_140)),
    ],
)
def test_writes_are_met_as_often_as_parity_lets_drives_work(
    pool: Pool, left: Fraction
) -> None:
    """By hand [ms]: reads + writes at the drives, s^2 over 2 s.

    One parity 30 + 20: 124.5 / 150; whole stripes of 4 + 1 10 + 12.5: 67.225 / 74.5;
    mirror 10 + 20: 100.3 / 106; none 10 + 10: 56.2 / 64; two 40 + 30: 180.7 / 214.
    """
    assert residual(pool, mix_of(asks(10, 10 * KB, 10))) == left * 1_000


@pytest.mark.parametrize(("data", "parity", "times"), [(1, 1, 2), (4, 1, 4)])
def test_writes_position_as_reads_do(data: int, parity: int, times: int) -> None:
    """By hand: n writes of 10 + 1 ms beside ten reads of 10 + 0.1."""
    pool = replace(DISKS, data=data, parity=parity)
    load = Load(10 * MILLI, MILLI, 100 * KB, 100 * KB)
    held, squared = 101 + times * 11, Fraction(102_010, 100) + times * 121
    assert residual(pool, mix_of(load)) == squared / (2 * held) * 1_000


def test_sequential_reads_are_met_for_the_units_they_fetch() -> None:
    """By hand: 100 kB of 1 MB position in 1 ms; half of 10 + 1 and of 1 + 1 ms."""
    pool = replace(DISKS, prefetch_unit=MB)
    load = asks(10, 100 * KB)
    assert residual(pool, mix_of(load, random=0)) == 1_000
    assert residual(pool, mix_of(load)) == 5_500
    half = mix_of(load, random=PPM // 2)
    assert residual(pool, half) == Fraction(121 + 4, 2 * (11 + 2)) * 1_000


def test_reads_that_hit_are_met_at_no_drive() -> None:
    """By hand: of ten reads of 1.1 ms five are left, beside 20 and 20 of the writes."""
    mix = mix_of(asks(10, 10 * KB, 10), missed=50)
    left = Fraction(25 * 121 + 20 * 441, 2 * (25 * 11 + 20 * 21)) * 100
    assert residual(FLASH, mix) == left
    assert residual(FLASH, mix_of(asks(10, 10 * KB), missed=0)) == 0


@pytest.mark.parametrize("pool", [DISKS, FLASH])
def test_where_nothing_is_asked_nothing_is_left(pool: Pool) -> None:
    assert residual(pool, together(())) == 0
    assert residual(pool, mix_of(Load(0, 0, 5, 5))) == 0


def test_a_rating_of_zero_takes_no_time() -> None:
    """By hand: reads take 0.1 ms, writes 2.1: 30 x 0.01 + 20 x 4.41 over 2 x 45."""
    pool = replace(FLASH, reads_at_most=0)
    left = Fraction(8_850, 9_000) * 1_000
    assert residual(pool, mix_of(asks(10, 10 * KB, 10))) == left
    bare = replace(pool, writes_at_most=0, drive_rate=0)
    assert residual(bare, mix_of(asks(10, 10 * KB, 10))) == 0


@pytest.mark.parametrize(
    ("share", "large", "mean", "square"),
    [
        (100_000, 256, 32, Fraction(59_392, 9)),
        (100_000, 256, 16, 2_560),
        (100_000, 320, 32, 10_240),
        (100_000, 32, 32, 1_024),
        (500_000, 16, 32, 1_280),
        (100_000, 0, 32, 1_024),
        (0, 256, 32, 1_024),
        (PPM, 256, 32, 1_024),
    ],
)
def test_large_requests_leave_the_mean_as_it_is(
    share: int, large: int, mean: int, square: Fraction | int
) -> None:
    """By hand [KiB]: 0.1 x 256^2 + 0.9 x (6.4 / 0.9)^2; of 16 no more than 160 fit."""
    asking = replace(volume("v"), large_share=share, large_size=large * KIB)
    assert mean_square(asking, Fraction(mean * KIB)) == square * KIB**2


def test_large_requests_are_waited_for_by_all_on_the_pool() -> None:
    """By hand: 1 KiB/ms; reads of 32 ms in the mean, 59,392 / 9 / 64 = 103.11 left.

    Ten a second keep the drive busy by 32 %: 0.32 / 0.68 x 103.11 = 48.523 ms; all
    alike they wait 0.32 / 0.68 x 16 = 7.529.
    """
    drive = replace(DISKS, seek=1, rpm=0, drive_rate=1_000 * KIB)
    alike = volume("v", asks(10, 32 * KIB))
    mixed = replace(alike, large_share=100_000, large_size=256 * KIB)
    assert answers(alike, pools=(drive,)).today(alike) == pytest.approx(39_529, abs=5)
    assert answers(mixed, pools=(drive,)).today(mixed) == pytest.approx(80_523, abs=5)


PAIR = (
    volume("x", asks(10, 10 * KB)),
    volume("y", asks(5, MB), pool="two"),
)
POOLS = DISKS, replace(DISKS, name="two")


def test_a_promise_counts_what_is_there_today_and_the_volume_itself() -> None:
    """By hand at 50 %: 10 of 10.1 ms, 5 of 20: 3,020.1 / 402 = 7,512.7 as wait."""
    swap = {"a/x": "a/two", "a/y": "a/one"}
    for places in ({}, swap):
        promising = answers(*PAIR, pools=POOLS, places=places)
        assert promising.promised(PAIR[0], "a/two") == 17_613
        assert promising.promised(PAIR[0], "a/one") == promising.today(PAIR[0])


def test_what_is_planned_counts_who_is_there_then() -> None:
    """By hand: alone, 0.101 / 0.899 x 5,050 = 567.4; before y leaves, 20.1 % busy.

    0.201 / 0.799 x 7,512.7 = 1,889.9.
    """
    swap = {"a/x": "a/two", "a/y": "a/one"}
    assert answers(*PAIR, pools=POOLS, places=swap).planned(PAIR[0]) == 10_668
    joined = answers(*PAIR, pools=POOLS, places={"a/x": "a/two"})
    assert joined.planned(PAIR[0]) == 11_990


def test_only_the_hour_that_is_busiest_for_the_volume_counts() -> None:
    """By hand: in the first hour both ask alike: 20.2 % of 10.1 ms reads."""
    small = asks(10, 10 * KB)
    one_hour = volume("x", small, asks(9, 10 * KB)), volume("y", small, asks(5, MB))
    assert answers(*one_hour).today(one_hour[0]) == 11_379
    other = volume("x", asks(9, 10 * KB), small), volume("y", small, asks(5, MB))
    assert answers(*other).today(other[0]) == 11_990


def test_what_cannot_be_told_stays_unknown_behind_any_mix() -> None:
    box = replace(DISKS, name="two", requests_at_most=1_000 * MILLI)
    mixed = replace(DISKS, name="three", media=Media.MIXED)
    telling = answers(*PAIR, pools=(DISKS, box, mixed))
    assert telling.promised(PAIR[0], "a/two") == 0
    assert telling.promised(PAIR[0], "a/three") == 0
    assert telling.today(PAIR[1]) == 0
