"""Drives of one protection that lost one, counted by published figures and by hand."""

from dataclasses import replace
from fractions import Fraction

import pytest

from placer.audit.case import Case
from placer.audit.demand import demand_at
from placer.audit.groups import Counts, all_drives, one_lost, planned_for
from placer.audit.limits import CODES, Scene, readings
from placer.audit.machines import busy_work
from placer.audit.mix import at_drives, of_hosts, residual
from placer.audit.response import Answers
from placer.estate import Array, Estate, Expansion, Hour, Load, Media, Policy, Pool
from placer.estate import Volume as Vol
from placer.plan import Plan, Status
from placer.units import KB, MB, MILLI, PPM


def group(data: int, parity: int, in_place: bool = True) -> Pool:
    """Return ten drives that position in 10 ms, planned for one lost."""
    return Pool(
        array="a",
        name="p",
        media=Media.SPINNING,
        drives=10,
        data=data,
        parity=parity,
        usable=1,
        in_place=in_place,
        one_drive_lost=True,
        skew=1_000_000,
        seek=10_000,
    )


def uncrowded(pool: Pool) -> Counts:
    """Return what requests are to a group before they crowd on the drives left."""
    drives = pool.data + pool.parity
    return one_lost(pool).times(Fraction(drives - 1, drives))


# Each survivor of a group with one parity reads for itself and, as often, for the lost
# drive: twice the load.  R. Muntz, J. Lui, Performance Analysis of Disk Arrays under
# Failure, VLDB 1990 (from memory); 2 (N - 1) / N reads of drives per read of a host.
@pytest.mark.parametrize(
    ("drives", "reads"), [(3, 4 / 3), (5, 1.6), (8, 1.75), (16, 1.875)]
)
def test_reads_load_each_survivor_of_one_parity_twice(
    drives: int, reads: float
) -> None:
    pool = group(drives - 1, 1)
    assert float(uncrowded(pool).reads) == pytest.approx(reads, rel=1e-12)
    assert one_lost(pool).reads == 2


# Reads and writes by which block is lost: OSTEP, chapter 38 (from memory: subtractive
# parity, reconstruction by the other blocks of the stripe).  The block itself: D - 1
# reads and a write; the parity: a write; another (D - 1 of N): two of both.
@pytest.mark.parametrize(
    ("drives", "requests"), [(3, Fraction(7, 3)), (5, Fraction(17, 5)), (8, 4)]
)
def test_small_writes_beside_one_parity_with_a_drive_lost(
    drives: int, requests: Fraction | int
) -> None:
    counts = uncrowded(group(drives - 1, 1))
    assert counts.write_reads + counts.writes == requests


def test_a_lost_mirror_leaves_one_drive_to_read_and_write_all() -> None:
    """By hand: each block has one copy left; two drives' requests go to one."""
    assert uncrowded(group(1, 1)) == Counts(Fraction(1), Fraction(0), Fraction(1))
    assert one_lost(group(1, 1)) == Counts(Fraction(2), Fraction(0), Fraction(2))
    assert one_lost(group(1, 1, in_place=False)) == one_lost(group(1, 1))


def counted(data: int, parity: int) -> Counts:
    """Try every block of a stripe as asked for and every drive as lost, and count.

    A lost block is read from as many others as there are blocks of data, and written
    by them: the other blocks of data are read and all parities written.  Where another
    drive is lost, the block and the parities that are left are read and written; a
    block that has no parity left is only written.
    """
    reads = write_reads = writes = 0
    for asked in range(data):
        for lost in range(data + parity):
            left = sum(other != lost for other in range(data, data + parity))
            reads += data if lost == asked else 1
            if lost == asked:
                write_reads, writes = write_reads + data - 1, writes + parity
            else:
                write_reads += left + 1 if left else 0
                writes += left + 1
    tried = data * (data + parity)
    return Counts(*(Fraction(sum_, tried) for sum_ in (reads, write_reads, writes)))


@pytest.mark.parametrize(
    ("data", "parity"), [(2, 1), (4, 1), (7, 1), (4, 2), (6, 2), (8, 2), (1, 2), (5, 3)]
)
def test_counts_are_those_of_all_cases_tried(data: int, parity: int) -> None:
    assert uncrowded(group(data, parity)) == counted(data, parity)


def test_double_parity_by_hand() -> None:
    """Six drives, 4 + 2.

    Reads: five of six from their drive, one by four others: 9/6.  Writes: to the lost
    block 3 reads and 2 writes, beside a lost parity (two of six) 2 and 2, beside
    another (three of six) 3 and 3: reads (3 + 4 + 9) / 6, writes (2 + 4 + 9) / 6.
    """
    counts = Counts(Fraction(9, 6), Fraction(16, 6), Fraction(15, 6))
    assert uncrowded(group(4, 2)) == counts
    assert one_lost(group(4, 2)) == counts.times(Fraction(6, 5))


def test_whole_stripes_are_written_as_with_all_drives_on_those_left() -> None:
    """By hand, 4 + 1: 5/4 writes of a write, 1.6 reads of a read, each x 5/4."""
    counts = Counts(Fraction(2), Fraction(0), Fraction(25, 16))
    assert one_lost(group(4, 1, in_place=False)) == counts


def test_nothing_is_lost_where_nothing_is_planned_or_no_parity_is_left() -> None:
    for pool in (
        replace(group(4, 1), one_drive_lost=False),
        group(1, 0),
        group(4, 0, in_place=False),
    ):
        assert planned_for(pool) == all_drives(pool)
        assert all_drives(pool).reads == 1


def share(pool: Pool, *load: int, random: int = PPM) -> Fraction:
    """Return the share of one drive that one hour's load takes."""
    work = busy_work(pool, 1)
    assert work is not None
    form = work.form(random, 1)
    return Fraction(form.of(load)[0], form.unit)


def test_disks_read_twice_for_random_and_for_sequential_reads() -> None:
    """By hand: 50 reads/s twice 10 ms; 1 MB/s by 100 kB ten times, twice; 2 MB go."""
    pool = replace(group(4, 1), prefetch_unit=100 * KB)
    load = 50 * MILLI, 0, MB, 0
    assert share(pool, *load) == 1
    assert share(pool, *load, random=0) == Fraction(2, 10)
    rated = replace(pool, drive_rate=100 * MB)
    assert share(rated, *load) == 1 + Fraction(2, 100)
    assert share(rated, *load, random=0) == Fraction(22, 100)


def test_disks_and_bytes_written_count_four_and_a_quarter_times() -> None:
    """By hand: 17/5 x 5/4 of 20 writes/s of 10 ms, and of 1 MB/s at 100."""
    pool = replace(group(4, 1), drive_rate=100 * MB)
    assert share(pool, 0, 20 * MILLI, 0, MB) == Fraction(85, 100) + Fraction(
        425, 10_000
    )


def test_flash_reads_and_writes_by_their_own_ratings() -> None:
    """By hand, 4 + 1: a read 2 reads; a write (3 + 6) / 5 x 5/4 reads and 2 writes.

    100 x 2 / 1000 + 10 x (2.25 / 1000 + 2 / 500) + (1 x 2 + 2 x 4.25) / 100.
    """
    pool = replace(
        group(4, 1),
        media=Media.FLASH,
        reads_at_most=1_000 * MILLI,
        writes_at_most=500 * MILLI,
        drive_rate=100 * MB,
    )
    by_hand = Fraction(2, 10) + Fraction(625, 10_000) + Fraction(105, 1_000)
    for random in (0, 400_000, PPM):
        busy = share(pool, 100 * MILLI, 10 * MILLI, MB, 2 * MB, random=random)
        assert busy == by_hand


def test_a_black_box_counts_requests_whatever_its_drives_do() -> None:
    box = replace(group(4, 1), requests_at_most=200 * MILLI)
    assert share(box, 50 * MILLI, 10 * MILLI, MB, MB) == Fraction(3, 10)


def test_a_request_waits_for_what_is_left_as_with_all_drives() -> None:
    """By hand: 10 reads of 10.1 ms and 4 x 10 requests of a write of 11 ms."""
    pool = replace(group(4, 1), drive_rate=100 * MB)
    load = Load(10 * MILLI, 10 * MILLI, 100 * KB, MB)
    hosts = of_hosts(volume(load), load, (load.reads, load.writes))
    mix = at_drives(volume(load), hosts, Fraction(1))
    left = Fraction(10 * 10_201 + 40 * 12_100, 2 * (10 * 101 + 40 * 110)) * 100
    assert residual(pool, mix) == left


def volume(*load: Load) -> Vol:
    """Return a volume of no size on the group."""
    return Vol(
        array="a",
        name="v",
        pool="p",
        provisioned=0,
        occupied=0,
        thin=False,
        load=load,
    )


def case(pool: Pool, load: Load) -> Case:
    """Return one volume that stays on a pool."""
    estate = Estate(
        name="e",
        digest="d",
        hours=(Hour(None, 0, "00:00"),),
        volumes=(volume(load),),
        pools=(pool,),
        arrays=(Array(name="a", write_answer=500),),
        policy=Policy(start=0, earliest=0),
    )
    plan = Plan(inventory="e", digest="d", version="0", status=Status.PROVEN)
    return Case(estate, plan)


def used(there: Case, steps: int) -> dict[str, Fraction]:
    """Return the use of each limit at home with some steps bought."""
    scene = Scene(there, demand_at(there.estate, 0), there.homes, {"a/p": steps})
    return {row.code: row.use for code in CODES for row in readings(scene, code)}


def test_requests_for_a_lost_drive_spread_over_all_drives_bought() -> None:
    """By hand: 100 reads/s, twice 10 ms, over ten and over twenty drives."""
    growing = Expansion(drives=10, price=1, at_most=1)
    there = case(replace(group(4, 1), expansion=growing), Load(100 * MILLI, 0, 0, 0))
    assert used(there, 0)["pool-busy"] == 20
    assert used(there, 1)["pool-busy"] == 10


def test_wear_and_controllers_know_no_lost_drive() -> None:
    pool = replace(
        group(4, 1, in_place=False),
        media=Media.FLASH,
        writes_at_most=500 * MILLI,
        dwpd=PPM,
        life_days=1_000,
        warranty_days=1_825,
    )
    load = Load(0, 10 * MILLI, 0, MB)
    lost = used(case(pool, load), 0)
    whole = used(case(replace(pool, one_drive_lost=False), load), 0)
    assert lost.pop("pool-busy") == whole.pop("pool-busy") * Fraction(5, 4)
    assert lost == whole
    assert lost["pool-wear"] == Fraction(864, 10) * Fraction(5, 4) * Fraction(11, 10)


def test_a_read_waits_at_the_share_of_drives_that_lost_one() -> None:
    """By hand: 200 reads/s, twice 10 ms over ten: 40 %; 10 + 0.4 / 0.6 x 5 ms."""
    there = case(group(4, 1), Load(200 * MILLI, 0, 0, 0))
    answers = Answers(there)
    assert answers.today(there.estate.volumes[0]) == 13_334
    assert answers.planned(there.estate.volumes[0]) == 13_334
