"""Uses of limits as people read them, worked out by hand."""

from dataclasses import replace

import numpy as np
import pytest
from smallestate import estate, load, pool, volume

from placer.candidates.table import Candidates, candidates
from placer.candidates.uses import uses
from placer.estate import Array, Estate, Expansion, Load, Media
from placer.plan import Moment, Use
from placer.units import MB, MILLI, PPM, TB

SLOW = pool("depot/slow", Media.SPINNING, 500)
FAST = pool("quay/fast", Media.FLASH, 500)


def read(
    whole: Estate, places: list[int], bought: list[int]
) -> dict[tuple[str, str], Use]:
    table: Candidates = candidates(whole)
    found = uses(
        table, table.limits, np.array(places), np.array(bought), Moment.PLANNED
    )
    assert len({(u.where, u.limit) for u in found}) == len(found)
    return {(use.where, use.limit): use for use in found}


def figures(use: Use) -> tuple[float, float, str, str]:
    return round(use.use, 9), round(use.at_most, 9), use.unit, use.hour


def test_room_in_gib_with_the_steps_bought() -> None:
    """100 GiB at 2:1 are 50 of 500; two steps of 2 drives to 4 double it."""
    step = Expansion(drives=2, price=1, at_most=2)
    fast = replace(FAST, drives=4, reduction=2 * PPM, expansion=step)
    whole = estate([volume("a", "depot/slow", 100)], [SLOW, fast])
    here = read(whole, [0], [0, 0])
    assert figures(here["depot/slow", "pool-room"]) == (100, 500, "GiB", "")
    assert figures(here["quay/fast", "pool-room"]) == (0, 500, "GiB", "")
    there = read(whole, [1], [0, 2])
    assert figures(there["quay/fast", "pool-room"]) == (50, 1_000, "GiB", "")
    assert figures(there["depot/slow", "pool-room"]) == (0, 500, "GiB", "")
    assert {use.moment for use in there.values()} == {Moment.PLANNED}


def test_busy_pools_in_percent_at_the_hour_that_binds() -> None:
    """100 of 4 x 1000 reads/s are 2.5 %, 600 are 15 %; with half more drives 10 %."""
    step = Expansion(drives=2, price=1, at_most=1)
    fast = replace(
        FAST, drives=4, reads_at_most=1_000 * MILLI, skew=PPM, expansion=step
    )
    hours = load(100, kib=0), load(600, kib=0), load(0)
    whole = estate([volume("a", "depot/slow", 1, *hours)], [SLOW, fast])
    assert figures(read(whole, [1], [0, 0])["quay/fast", "pool-busy"]) == (
        15,
        70,
        "%",
        "01:00",
    )
    assert figures(read(whole, [1], [0, 1])["quay/fast", "pool-busy"])[:2] == (10, 70)


def test_controllers_in_percent_over_all_pools_of_the_array() -> None:
    """1000 and 500 of 10 000 reads/s, a tenth unevenly spread: 16.5 %."""
    array = Array(name="depot", reads_at_most=10_000 * MILLI, uneven=1_100_000)
    volumes = [
        volume("a", "depot/slow", 1, load(1_000)),
        volume("b", "depot/next", 1, load(500)),
    ]
    pools = [SLOW, replace(SLOW, name="next")]
    found = read(estate(volumes, pools, arrays=[array]), [0, 1], [0, 0])
    assert figures(found["depot", "controller-busy"]) == (16.5, 70, "%", "00:00")


def test_wear_in_tb() -> None:
    """10 MB/s over 200 days are 172.8 TB of 2 x 1 TB x 365 days; no array overhead."""
    fast = replace(
        FAST,
        drives=2,
        drive_size=TB,
        dwpd=PPM,
        warranty_days=365,
        life_days=200,
        array_overhead=PPM,
    )
    lone = volume("a", "quay/fast", 1, Load(0, MILLI, 0, 10 * MB))
    found = read(estate([lone], [fast]), [0], [0])
    assert figures(found["quay/fast", "pool-wear"]) == (172.8, 730, "TB", "")


def test_volumes_and_hosts_are_counted() -> None:
    array = Array(name="depot", volumes_at_most=5, hosts_at_most=4)
    named = [
        replace(volume(name, "depot/slow", 1), host=host)
        for name, host in (("a", "crane"), ("b", "crane"), ("c", "pilot"), ("d", ""))
    ]
    whole = estate(named, [SLOW, FAST], arrays=[array, Array(name="quay")])
    found = read(whole, [0, 0, 1, 0], [0, 0])
    assert figures(found["depot", "array-volumes"]) == (3, 5, "volumes", "")
    assert figures(found["depot", "array-hosts"]) == (1, 4, "hosts", "")
    assert ("quay", "array-hosts") not in found


@pytest.mark.parametrize("media", [Media.MIXED, Media.UNMODELLED])
def test_pools_that_only_give_are_read_for_room_alone(media: Media) -> None:
    heap = replace(SLOW, media=media, drives=4, seek=4_000, rpm=10_000)
    found = read(estate([volume("a", "depot/slow", 100, load(50))], [heap]), [0], [0])
    assert {limit for _, limit in found} == {"pool-room"}
