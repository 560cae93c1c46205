"""What drives, pools and controllers carry, against published figures."""

from dataclasses import replace
from fractions import Fraction
from typing import Any

import pytest

from placer.audit import groups, machines
from placer.audit.groups import Counts
from placer.audit.machines import Form
from placer.estate import Array, Expansion, Media, Pool
from placer.units import GB, GIB, KIB, MB, MIB, MILLI, PPM, TB

PROTECTIONS = {
    "mirror": (1, 1, True),
    "one parity": (4, 1, True),
    "two parities": (6, 2, True),
    "none": (1, 0, True),
}


def spinning(data: int = 1, parity: int = 0) -> Pool:
    """Return drives that position in 1 ms and have no other limit."""
    return Pool(
        array="a",
        name="p",
        media=Media.SPINNING,
        drives=1,
        data=data,
        parity=parity,
        seek=1_000,
        skew=1_000_000,
    )


def share(form: Form, *load: int) -> Fraction:
    """Return the share of one drive, or controller, that one hour's load takes."""
    return Fraction(form.of(load)[0], form.unit)


def drives(pool: Pool, random: int = PPM, misses: int = 1, whole: int = 1) -> Form:
    """Return what loads add to one drive, random reads [ppm], misses of the whole."""
    work = machines.busy_work(pool, whole)
    assert work is not None
    return work.form(random, misses)


# Small writes cost 2, 4 and 6 drive operations: Patterson, Gibson, Katz, "A Case for
# Redundant Arrays of Inexpensive Disks", SIGMOD 1988, and the same counting for two
# parities; the totals for 1,000 requests/s are plain arithmetic on the factors.
@pytest.mark.parametrize(
    ("protection", "reads", "total"),
    [
        ("mirror", 700, 1_300),
        ("one parity", 700, 1_900),
        ("two parities", 700, 2_500),
        ("mirror", 500, 1_500),
        ("one parity", 500, 2_500),
        ("two parities", 500, 3_500),
        ("none", 900, 1_000),
    ],
)
def test_host_requests_become_requests_to_drives(
    protection: str, reads: int, total: int
) -> None:
    data, parity, _ = PROTECTIONS[protection]
    busy = share(
        drives(spinning(data, parity)), reads * MILLI, (1_000 - reads) * MILLI, 0, 0
    )
    assert busy == Fraction(total, 1_000)


def test_whole_stripes_write_each_block_and_its_part_of_the_parity() -> None:
    """Five writes for four blocks: OSTEP, section 38.6."""
    pool = Pool(
        array="a", name="p", media=Media.FLASH, data=4, parity=1, in_place=False
    )
    assert groups.all_drives(pool) == Counts(Fraction(1), Fraction(0), Fraction(5, 4))


def test_bytes_go_with_the_requests_to_drives() -> None:
    """One MB/s written in place beside one parity moves four at a 10 MB/s drive."""
    pool = replace(spinning(4, 1), drive_rate=10 * MB)
    assert share(drives(pool), 0, 0, MB, 0) == Fraction(1, 10)
    assert share(drives(pool), 0, 0, 0, MB) == Fraction(4, 10)


# OSTEP, chapter 37: half a turn at 30 / rpm seconds.
@pytest.mark.parametrize(
    ("rpm", "milliseconds"),
    [(5_400, 5.5556), (7_200, 4.1667), (10_000, 3.0), (15_000, 2.0)],
)
def test_half_a_turn(rpm: int, milliseconds: float) -> None:
    pool = replace(spinning(), rpm=rpm)
    assert float(machines.half_turn(pool)) / 1_000 == pytest.approx(
        milliseconds, abs=5e-5
    )


def test_flash_adds_reads_writes_and_bytes_over_their_ratings() -> None:
    """By hand: 100/1000 + 10 x (2/1000 + 2/500) + (2 + 4 x 1)/100 = 0.22, x 1.5."""
    pool = Pool(
        array="a",
        name="p",
        media=Media.FLASH,
        drives=1,
        data=3,
        parity=1,
        skew=1_500_000,
        reads_at_most=1_000 * MILLI,
        writes_at_most=500 * MILLI,
        drive_rate=100 * MB,
    )
    busy = share(drives(pool), 100 * MILLI, 10 * MILLI, 2 * MB, 1 * MB)
    assert busy == Fraction(33, 100)


def test_a_rating_of_zero_leaves_its_term_out() -> None:
    pool = Pool(array="a", name="p", media=Media.FLASH, drives=1, drive_rate=100 * MB)
    busy = share(drives(pool), MILLI, MILLI, 0, 0)
    assert busy == 0


@pytest.mark.parametrize("media", [Media.MIXED, Media.UNMODELLED])
def test_media_that_only_give_have_no_busy_share(media: Media) -> None:
    pool = Pool(array="a", name="p", media=media, drives=8, requests_at_most=1)
    assert machines.busy_work(pool, 1) is None


def test_a_black_box_counts_requests_without_skew_and_grows_with_its_drives() -> None:
    growing = Expansion(drives=5, price=1, at_most=1)
    pool = replace(spinning(), requests_at_most=200 * MILLI, expansion=growing)
    assert share(drives(pool), 50 * MILLI, 50 * MILLI, MB, MB) == Fraction(1, 2)
    assert machines.servers(pool, 1) == 6


def test_usable_room_counts_whole_stripes_and_overhead() -> None:
    """By hand: 11 drives hold two stripes of 4 + 1; 2 x 4 x 1,000 GB x 0.97."""
    pool = Pool(
        array="a",
        name="p",
        media=Media.SPINNING,
        drives=11,
        data=4,
        parity=1,
        drive_size=1_000 * GB,
        expansion=Expansion(drives=4, price=1, at_most=1),
    )
    assert machines.usable(pool, 0) == 7_760 * GB
    assert machines.usable(pool, 1) == 11_640 * GB


def test_usable_room_as_given_grows_with_the_drives() -> None:
    step = Expansion(drives=4, price=1, at_most=1)
    pool = Pool(
        array="a", name="p", media=Media.FLASH, drives=8, usable=TB, expansion=step
    )
    assert machines.usable(pool, 1) == Fraction(3 * TB, 2)


def test_room_is_what_ceiling_and_least_free_both_leave() -> None:
    pool = Pool(array="a", name="p", media=Media.FLASH, usable=100 * GIB)
    assert machines.room(pool, 0) == 85 * GIB
    tight = Pool(
        array="a",
        name="p",
        media=Media.FLASH,
        usable=100 * GIB,
        least_free=20 * GIB,
    )
    assert machines.room(tight, 0) == 80 * GIB


# Terabytes written = drive writes per day x TB x 365 x years, the trade's definition
# of the rating (in the sense of JEDEC JESD218: host writes).
@pytest.mark.parametrize(
    ("dwpd", "size", "rated"), [(1, 3_840, 7_008), (3, 1_600, 8_760)]
)
def test_rated_writes_of_one_drive(dwpd: int, size: int, rated: int) -> None:
    pool = Pool(
        array="a",
        name="p",
        media=Media.FLASH,
        drives=1,
        drive_size=size * GB,
        dwpd=dwpd * 1_000_000,
        warranty_days=5 * 365,
    )
    assert machines.wear_budget(pool, 0) == rated * TB


def test_controllers_share_what_the_failures_survived_leave() -> None:
    """By hand: (300/1000 + 100/500 + 40/100) / (3 - 1) x 1.2 = 0.54."""
    array = Array(
        name="a",
        controllers=3,
        failures_survived=1,
        reads_at_most=1_000 * MILLI,
        writes_at_most=500 * MILLI,
        controller_rate=100 * MB,
        uneven=1_200_000,
    )
    form = machines.controller_form(array)
    busy = share(form, 300 * MILLI, 100 * MILLI, 30 * MB, 10 * MB)
    assert busy == Fraction(54, 100)


def test_a_black_box_without_drives_is_one_whole() -> None:
    pool = replace(spinning(), drives=0, requests_at_most=200 * MILLI)
    assert machines.servers(pool, 0) == 1


RATED = Pool(
    array="a",
    name="p",
    media=Media.FLASH,
    drives=1,
    dwpd=1,
    life_days=1,
)


@pytest.mark.parametrize("missing", ["dwpd", "life_days", "drives"])
def test_wear_needs_a_rating_a_life_and_drives(missing: str) -> None:
    unrated: dict[str, Any] = {missing: 0}
    assert machines.wears(RATED, 0)
    assert not machines.wears(replace(RATED, **unrated), 0)
    assert not machines.wears(replace(RATED, media=Media.SPINNING), 0)


def test_sequential_reads_position_each_sixteenth_time() -> None:
    """By hand: 160 reads/s of 64 KiB fetch 10 units of 1 MiB and position in 1 ms."""
    rate = 160 * 64 * KIB
    load = 160 * MILLI, 0, rate, 0
    assert share(drives(spinning(), random=0), *load) == Fraction(10, 1_000)
    assert share(drives(spinning()), *load) == Fraction(160, 1_000)
    half = drives(spinning(), random=PPM // 2)
    assert share(half, *load) == Fraction(85, 1_000)


def test_writes_position_whether_reads_are_random_or_not() -> None:
    for random in (0, PPM):
        form = drives(spinning(4, 1), random=random)
        assert share(form, 0, 10 * MILLI, 0, 10 * MIB) == Fraction(40, 1_000)


def test_without_a_unit_sequential_reads_only_transfer() -> None:
    pool = replace(spinning(), prefetch_unit=0, drive_rate=10 * MB)
    form = drives(pool, random=0)
    assert share(form, 100 * MILLI, 0, MB, 0) == Fraction(1, 10)


@pytest.mark.parametrize("random", [0, 300_000, PPM])
def test_flash_and_black_boxes_know_no_sequential_reads(random: int) -> None:
    flash = replace(
        spinning(), media=Media.FLASH, reads_at_most=MILLI, drive_rate=10 * MB
    )
    box = replace(spinning(), requests_at_most=200 * MILLI)
    load = MILLI // 2, 0, MB, 0
    assert share(drives(flash, random=random), *load) == Fraction(6, 10)
    assert share(drives(box, random=random), *load) == Fraction(1, 400)


def test_reads_that_hit_reach_no_drive_and_writes_all_do() -> None:
    """By hand: a quarter of 80 reads hits; 60 + 10 position in 1 ms, 1.6 MB at 10."""
    pool = replace(spinning(), drive_rate=10 * MB)
    form = drives(pool, misses=3, whole=4)
    busy = share(form, 80 * MILLI, 10 * MILLI, 800_000, MB)
    assert busy == Fraction(70, 1_000) + Fraction(16, 100)


def test_hits_count_among_sequential_reads_too() -> None:
    """By hand: 0.2 x 60 random reads, 0.8 x 60 x 64 KiB fetched by 256 KiB: 12 + 12."""
    pool = replace(spinning(), prefetch_unit=256 * KIB)
    form = drives(pool, random=200_000, misses=3, whole=4)
    busy = share(form, 80 * MILLI, 0, 80 * 64 * KIB, 0)
    assert busy == Fraction(24, 1_000)


def test_a_black_box_is_asked_only_what_misses() -> None:
    """By hand: (50 / 2 + 25) / 200."""
    box = replace(spinning(), requests_at_most=200 * MILLI)
    form = drives(box, misses=1, whole=2)
    assert share(form, 50 * MILLI, 25 * MILLI, MB, MB) == Fraction(1, 4)


def test_what_was_measured_stretches_every_kind_of_busy_share() -> None:
    """By hand: 100 positionings of 1 ms, and 100 of 200 requests, times 1.25."""
    pool = replace(spinning(), measured_factor=1_250_000)
    load = 60 * MILLI, 40 * MILLI, 0, 0
    assert share(drives(pool), *load) == Fraction(125, 1_000)
    box = replace(pool, requests_at_most=200 * MILLI)
    assert share(drives(box), *load) == Fraction(5, 8)
    flash = replace(pool, media=Media.FLASH, reads_at_most=120 * MILLI)
    assert share(drives(flash), *load) == Fraction(5, 8)
