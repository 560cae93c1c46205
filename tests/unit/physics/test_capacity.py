"""Room of pools and size of volumes, worked out by hand."""

from dataclasses import replace

import pytest
from smallestate import START, estate, load, policy, volume, window

from placer.estate import Expansion, Media, Pool
from placer.physics.capacity import drives, landed, room, thin_room, usable
from placer.physics.demand import busiest_hour, months_of_nights, size
from placer.units import GIB, MINUTES_PER_DAY, PPM, TB

GROUPS = Pool(
    array="quay",
    name="fast",
    media=Media.FLASH,
    drives=17,
    data=6,
    parity=2,
    drive_size=TB,
    overhead=30_000,
    expansion=Expansion(drives=8, price=1, at_most=3),
)
STATED = replace(GROUPS, usable=1_700 * GIB)


@pytest.mark.parametrize(("steps", "groups"), [(0, 2), (1, 3), (3, 5)])
def test_only_whole_groups_of_drives_hold_data(steps: int, groups: int) -> None:
    """17 drives are two groups of 6 + 2 and one over; 3 % overhead."""
    assert drives(GROUPS, steps) == 17 + 8 * steps
    assert usable(GROUPS, steps) == groups * 6 * TB * 97 // 100


def test_stated_room_grows_with_the_drives() -> None:
    assert usable(STATED) == 1_700 * GIB
    assert usable(STATED, 1) == 2_500 * GIB
    assert usable(replace(STATED, drives=0), 1) == 1_700 * GIB


def test_ceiling_or_least_free_whichever_leaves_less() -> None:
    pool = replace(STATED, fill_ceiling=800_000)
    assert room(pool) == 1_360 * GIB
    assert room(replace(pool, least_free=340 * GIB)) == 1_360 * GIB
    assert room(replace(pool, least_free=341 * GIB)) == 1_359 * GIB
    assert room(replace(pool, least_free=1_701 * GIB)) == 0


def test_thin_room_is_a_ratio_of_usable() -> None:
    assert thin_room(replace(STATED, thin_at_most=2_500_000)) == 4_250 * GIB
    assert thin_room(STATED) == 0


def test_supply_is_rounded_down_and_demand_up() -> None:
    odd = replace(STATED, usable=101, fill_ceiling=500_000)
    assert room(odd) == 50
    assert landed(101, replace(odd, reduction=2 * PPM)) == 51


def test_thick_volumes_take_what_is_provisioned() -> None:
    growing = replace(volume("a", "quay/fast", 100), capacity_growth=PPM, occupied=1)
    assert size(growing, 12) == 100 * GIB


def test_thin_volumes_take_what_is_occupied_grown_and_no_more_than_all() -> None:
    """21 % a year: 10 % in half a year; doubled, 60 GiB of 100 are all of it."""
    thin = replace(volume("a", "quay/fast", 100), thin=True, occupied=60 * GIB)
    assert size(thin, 12) == 60 * GIB
    assert size(replace(thin, capacity_growth=210_000), 6) == 66 * GIB
    assert size(replace(thin, capacity_growth=PPM), 12) == 100 * GIB
    assert size(replace(thin, occupied=10, capacity_growth=10_000), 12) == 11


def test_months_of_the_nights_are_those_begun() -> None:
    whole = estate([], [], policy(), windows=(window(1, hours=2),))
    assert months_of_nights(replace(whole, windows=())) == 0
    assert months_of_nights(whole) == 1
    month = START + 30 * MINUTES_PER_DAY
    to_the_minute = replace(window(29), end=month)
    assert months_of_nights(replace(whole, windows=(to_the_minute,))) == 1
    one_more = replace(to_the_minute, end=month + 1)
    assert months_of_nights(replace(whole, windows=(one_more, window(1)))) == 2


def test_the_busiest_hour_has_most_requests_the_first_of_equals() -> None:
    hours = load(5, 4), load(2, 8), load(10, 0), load(0, 9)
    assert busiest_hour(volume("a", "quay/fast", 1, *hours)) == 1
