"""What is missing is named in the units of the trade, worked out by hand."""

from dataclasses import replace

import pytest
from smallestate import estate, load, policy, pool, volume, window

from placer.candidates.table import candidates
from placer.estate import (
    Array,
    Estate,
    Host,
    Level,
    Load,
    Media,
    Policy,
    Pool,
    Rule,
    RuleKind,
    Volume,
    Window,
)
from placer.findings import Place
from placer.placement.place import Nothing, place
from placer.plan import Shortage
from placer.units import GIB, MB, MILLI, PPM, TB

SECONDS = 10.0
SLOW = pool("depot/slow", Media.SPINNING, 500)
FAST = pool("quay/fast", Media.FLASH, 500)


def lacking(whole: Estate) -> tuple[Shortage, ...]:
    found = place(candidates(whole), SECONDS)
    assert isinstance(found, Nothing)
    assert not found.timed_out
    return found.shortages


def lack(whole: Estate) -> tuple[str, str, float, str, str]:
    """Return limit, place, amount, unit and hour of the only shortage."""
    (only,) = lacking(whole)
    return only.limit, only.where, round(only.amount, 6), only.unit, only.hour


def alone(
    lone: Volume, home: Pool, array: Array | None = None, wishes: Policy | None = None
) -> Estate:
    return estate([lone], [home], wishes, arrays=[array] if array else None)


def test_room_in_gib() -> None:
    """80 % of 500 GiB are 400, but 150 must stay free: 350 for 600."""
    tight = replace(SLOW, fill_ceiling=800_000, least_free=150 * GIB)
    whole = alone(volume("a", "depot/slow", 600), tight)
    assert lack(whole) == ("pool-room", "depot/slow", 250, "GiB", "")
    (said,) = lacking(whole)
    assert said.sentence == "depot/slow: 250 GiB short"
    assert said.remedy


def test_provisioned_room_in_gib() -> None:
    """1.5 x 500 GiB are 750; an empty thin volume of 900 is 150 over."""
    thin = replace(volume("a", "depot/slow", 900), thin=True, occupied=0)
    whole = alone(thin, replace(SLOW, thin_at_most=1_500_000))
    assert lack(whole) == ("pool-thin", "depot/slow", 150, "GiB", "")


def test_busy_drives_in_percent_at_the_hour_that_lacks_most() -> None:
    """Seek 4 ms and half a turn of 2 ms: 300 reads/s keep 90 % of 2 drives busy.

    70 % are allowed; 240 reads/s would be 72 %.
    """
    slow = replace(SLOW, drives=2, seek=4_000, rpm=15_000, skew=PPM)
    hours = load(240, kib=0), load(300, kib=0), load(10, kib=0)
    whole = alone(volume("a", "depot/slow", 1, *hours), slow)
    assert lack(whole) == ("pool-busy", "depot/slow", 20, "busy-percent", "01:00")


def test_drives_that_must_not_be_busy_at_all() -> None:
    """Half a drive of one, where nothing is allowed."""
    fast = replace(FAST, drives=1, reads_at_most=200 * MILLI, skew=PPM, busy_ceiling=0)
    whole = alone(volume("a", "quay/fast", 1, load(100)), fast)
    assert lack(whole) == ("pool-busy", "quay/fast", 50, "busy-percent", "00:00")


def test_busy_pools_known_by_their_requests_only() -> None:
    """300 of 200 requests/s are 150 %, 80 % more than 70 %."""
    box = replace(FAST, requests_at_most=200 * MILLI)
    whole = alone(volume("a", "quay/fast", 1, load(200, 100)), box)
    assert lack(whole) == ("pool-busy", "quay/fast", 80, "busy-percent", "00:00")


def test_wear_in_tb() -> None:
    """1 drive of 1 TB, 1 a day for 100 days: 100 TB.  10 MB/s over 200 days: 172.8."""
    fast = replace(
        FAST,
        drives=1,
        drive_size=TB,
        dwpd=PPM,
        warranty_days=100,
        life_days=200,
        array_overhead=PPM,
    )
    lone = volume("a", "quay/fast", 1, Load(0, MILLI, 0, 10 * MB))
    whole = alone(lone, fast)
    assert lack(whole) == ("pool-wear", "quay/fast", 72.8, "TB", "")


def test_controllers_in_requests() -> None:
    """One of two is left: 70 % of 500 reads/s, at 1.25 unevenly spread, are 280."""
    array = Array(name="depot", reads_at_most=500 * MILLI, uneven=1_250_000)
    whole = alone(volume("a", "depot/slow", 1, load(1_000)), SLOW, array)
    assert lack(whole) == ("controller-busy", "depot", 720, "requests/s", "00:00")


def test_volumes_of_an_array() -> None:
    volumes = [volume(name, "depot/slow", 1) for name in "abc"]
    whole = estate(volumes, [SLOW], arrays=[Array(name="depot", volumes_at_most=1)])
    assert lack(whole) == ("array-volumes", "depot", 2, "volumes", "")


def test_hosts_of_an_array() -> None:
    volumes = [replace(volume(n, "depot/slow", 1), host=n) for n in ("x", "y", "z")]
    whole = estate(volumes, [SLOW], arrays=[Array(name="depot", hosts_at_most=2)])
    assert lack(whole) == ("array-hosts", "depot", 1, "hosts", "")
    assert lacking(whole)[0].sentence == "depot: 1 host short"


def forced(
    array: Array | None = None,
    windows: tuple[Window, ...] | None = None,
    wishes: Policy | None = None,
) -> Estate:
    """Return three volumes of 100 GiB that must move, two of one application."""
    names = ("depot/a", "depot/b", "depot/c")
    tickets = replace(volume("a", "depot/slow", 100), applications=("tickets",))
    volumes = [tickets, replace(tickets, name="b"), volume("c", "depot/slow", 100)]
    whole = estate(
        volumes,
        [SLOW, FAST],
        wishes,
        arrays=[array or Array(name="quay"), Array(name="depot")],
        windows=windows,
    )
    rule = Rule(kind=RuleKind.ONLY_ON, volumes=names, pools=("quay/fast",))
    return replace(whole, rules=(rule,))


# 100 MB/s for an hour less 20 % are 288 GB = 268.2209 GiB of 300.
MISSING = round(300 - 288e9 / 2**30, 6)
HOUR = (window(1, hours=1),)


def test_nights_into_an_array_in_gib() -> None:
    whole = forced(Array(name="quay", copies_in=100 * MB), HOUR)
    assert lack(whole) == ("nights-in", "quay", MISSING, "GiB", "")


def test_nights_out_of_an_array_in_gib() -> None:
    whole = forced(windows=HOUR)
    arrays = (Array(name="quay"), Array(name="depot", copies_out=100 * MB))
    whole = replace(whole, arrays=arrays)
    assert lack(whole) == ("nights-out", "depot", MISSING, "GiB", "")


def test_windows_with_a_rate_in_gib() -> None:
    whole = forced(windows=(replace(HOUR[0], rate=100 * MB),))
    assert lack(whole) == ("nights-rate", "all windows", MISSING, "GiB", "")


def test_cutovers_count_applications() -> None:
    """Two applications must move, one can."""
    one = (replace(HOUR[0], cutovers=1),)
    whole = forced(windows=one, wishes=policy(nights_kept_free=0))
    assert lack(whole) == ("nights-cutovers", "all windows", 1, "cutovers", "")


NEVER = forced(windows=(replace(HOUR[0], cutovers=4, end=HOUR[0].start),))
KEPT_FREE = forced(Array(name="quay", copies_in=MB), HOUR, policy(nights_kept_free=PPM))


@pytest.mark.parametrize(
    ("whole", "limit", "amount"),
    [
        (forced(windows=()), "nights-cutovers", 2),
        (NEVER, "nights-cutovers", 2),
        (KEPT_FREE, "nights-in", 300),
    ],
)
def test_no_night_at_all_is_no_contradiction_of_rules(
    whole: Estate, limit: str, amount: float
) -> None:
    named, _, missing, _, _ = lack(whole)
    assert (named, missing) == (limit, amount)


def test_each_limit_that_lacks_is_named_once() -> None:
    """Room of 500 for 600 in one pool, 1 of 2 volumes too many in its array."""
    volumes = [volume("a", "depot/slow", 300), volume("b", "depot/slow", 300)]
    whole = estate(volumes, [SLOW], arrays=[Array(name="depot", volumes_at_most=1)])
    assert {(s.limit, s.amount) for s in lacking(whole)} == {
        ("pool-room", 100),
        ("array-volumes", 1),
    }


def test_the_nearest_placement_lacks_least() -> None:
    """900 GiB for 500 and 300: 100 too much, wherever it is; 500 if nothing moved."""
    volumes = [volume(name, "depot/slow", 100) for name in "abcdefghi"]
    found = place(
        candidates(estate(volumes, [SLOW, pool("quay/fast", Media.FLASH, 300)])),
        SECONDS,
    )
    assert isinstance(found, Nothing)
    assert sum(s.amount for s in found.shortages) == pytest.approx(100)
    assert found.places is not None
    assert len(found.places) == 9


def test_a_volume_that_no_pool_may_take_is_named_with_all_reasons() -> None:
    """Never in the depot; its host does not reach the quay, which is too small."""
    rule = Rule(
        kind=RuleKind.NEVER_ON,
        volumes=("depot/a",),
        pools=("depot/slow",),
        said="never in the depot",
        place=Place("rules", "A2"),
    )
    small = pool("quay/fast", Media.FLASH, 50)
    lone = replace(volume("a", "depot/slow", 100), host="crane")
    whole = replace(
        estate([lone, volume("b", "depot/slow", 1)], [SLOW, small]),
        rules=(rule,),
        hosts=(Host(name="crane", arrays=("depot",)),),
    )
    (only,) = lacking(whole)
    assert (only.where, only.amount, only.unit) == ("depot/a", 1, "volumes")
    for said in ("never in the depot", "rules!A2", "larger than", "does not reach"):
        assert said in only.sentence


@pytest.mark.parametrize("level", Level)
def test_rules_that_no_placement_keeps_contradict_each_other(level: Level) -> None:
    names = ("depot/a", "depot/b")
    rules = (
        Rule(kind=RuleKind.APART, volumes=names, level=level),
        Rule(kind=RuleKind.TOGETHER, volumes=names, level=level),
    )
    volumes = [volume("a", "depot/slow", 1), volume("b", "depot/slow", 1)]
    arrays = [Array(name="depot", site="inland"), Array(name="quay", site="harbour")]
    whole = replace(estate(volumes, [SLOW, FAST], arrays=arrays), rules=rules)
    (only,) = lacking(whole)
    assert only.limit == "rules"
    assert "contradict" in only.sentence


def test_more_volumes_apart_than_there_are_pools_contradict() -> None:
    volumes = [volume(name, "depot/slow", 1) for name in "abc"]
    rule = Rule(kind=RuleKind.APART, volumes=tuple(v.id for v in volumes))
    whole = replace(estate(volumes, [SLOW, FAST]), rules=(rule,))
    assert lacking(whole)[0].limit == "rules"
