"""A ferry company's estate, small enough to be worked by hand.

Five arrays: `inland` in the inland hall, the others in the harbour hall.  All figures
are chosen so that the arithmetic in ``sailing`` can be followed on paper.
"""

from datetime import datetime
from zoneinfo import ZoneInfo

from corruptions.cargo import VOLUMES
from placer.estate import (
    Array,
    Control,
    Estate,
    Expansion,
    Host,
    Hour,
    Level,
    Media,
    Policy,
    Pool,
    Route,
    Rule,
    RuleKind,
    Tenant,
    Window,
)
from placer.units import GIB, MB, MILLI

ZONE = "Europe/Copenhagen"
"""One hour ahead of UTC, two from 29 March 2026 on (IANA time zone data)."""


def at(month: int, day: int, hour: int = 0, minute: int = 0) -> int:
    """Return a local time of 2026 [min UTC]."""
    local = datetime(2026, month, day, hour, minute, tzinfo=ZoneInfo(ZONE))
    return int(local.timestamp()) // 60


HOURS = (Hour(None, 2, "02:00"), Hour(None, 10, "10:00"))

POOLS = (
    Pool(
        array="new",
        name="flash",
        media=Media.FLASH,
        drives=4,
        data=3,
        parity=1,
        drive_size=100_000 * MB,
        usable=400 * GIB,
        thin_at_most=2_000_000,
        reduction=2_000_000,
        skew=1_000_000,
        read_time=200,
        reads_at_most=1_000 * MILLI,
        writes_at_most=500 * MILLI,
        drive_rate=100 * MB,
        dwpd=1_000_000,
        warranty_days=1_825,
        life_days=1_000,
        array_overhead=1_000_000,
        expansion=Expansion(drives=4, price=50_000, at_most=2, delivery_days=2),
    ),
    Pool(
        array="new",
        name="spin",
        media=Media.SPINNING,
        drives=10,
        data=1,
        parity=1,
        usable=1_000 * GIB,
        skew=1_000_000,
        drive_rate=100 * MB,
        rpm=15_000,
        seek=3_000,
    ),
    Pool(
        array="old",
        name="spin",
        media=Media.SPINNING,
        drives=10,
        data=4,
        parity=1,
        usable=1_000 * GIB,
        thin_at_most=1_200_000,
        skew=1_000_000,
        rpm=7_500,
        seek=6_000,
    ),
    Pool(
        array="old",
        name="attic",
        media=Media.MIXED,
        usable=500 * GIB,
        fill_ceiling=1_000_000,
    ),
    Pool(
        array="inland",
        name="box",
        media=Media.SPINNING,
        drives=10,
        usable=2_000 * GIB,
        requests_at_most=1_000 * MILLI,
    ),
    Pool(
        array="mole",
        name="disks",
        media=Media.SPINNING,
        drives=10,
        usable=1_000 * GIB,
        skew=1_000_000,
        drive_rate=100 * MB,
        rpm=7_500,
        seek=6_000,
        prefetch_unit=100_000,
        measured_factor=1_200_000,
    ),
    Pool(
        array="berth",
        name="flash",
        media=Media.FLASH,
        drives=2,
        usable=500 * GIB,
        skew=1_000_000,
        read_time=200,
        reads_at_most=1_000 * MILLI,
        writes_at_most=500 * MILLI,
        drive_rate=100 * MB,
        measured_factor=900_000,
    ),
)

ARRAYS = (
    Array(
        name="new",
        site="harbour",
        reads_at_most=10_000 * MILLI,
        writes_at_most=5_000 * MILLI,
        uneven=1_000_000,
        write_answer=100,
        one_copy=200 * MB,
        copies_in=300 * MB,
        copies_out=300 * MB,
        copies_at_once=2,
        volumes_at_most=10,
        hosts_at_most=4,
        largest_volume=400 * GIB,
    ),
    Array(
        name="old",
        site="harbour",
        reads_at_most=5_000 * MILLI,
        writes_at_most=2_500 * MILLI,
        uneven=1_000_000,
        write_answer=500,
        one_copy=100 * MB,
        copies_in=150 * MB,
        copies_out=150 * MB,
        copies_at_once=2,
    ),
    Array(
        name="inland",
        site="inland",
        one_copy=50 * MB,
        copies_in=50 * MB,
        copies_out=50 * MB,
        copies_at_once=1,
        volumes_at_most=5,
        hosts_at_most=3,
    ),
    Array(
        name="mole",
        site="harbour",
        reads_at_most=5_000 * MILLI,
        writes_at_most=2_500 * MILLI,
        uneven=1_000_000,
        write_answer=1_000,
        read_hit_answer=500,
        cache=64 * GIB,
    ),
    Array(
        name="berth",
        site="harbour",
        reads_at_most=10_000 * MILLI,
        writes_at_most=5_000 * MILLI,
        uneven=1_000_000,
        write_answer=100,
        read_hit_answer=150,
        cache=32 * GIB,
    ),
)

TENANTS = (
    Tenant(name="cruise", requests_cap=200 * MILLI),
    Tenant(name="freight", rate_cap=2 * MB, plan_for_cap=True),
)

RULES = (
    Rule(
        kind=RuleKind.ONLY_ON,
        volumes=("old/charts",),
        pools=("old/spin", "new/spin"),
        said="charts only on spinning pools of the harbour hall",
    ),
    Rule(
        kind=RuleKind.NEVER_ON,
        volumes=("old/tickets-1", "old/tickets-2"),
        pools=("inland/box",),
    ),
    Rule(
        kind=RuleKind.APART,
        volumes=("old/tickets-1", "inland/backup"),
        level=Level.SITE,
    ),
    Rule(
        kind=RuleKind.TOGETHER,
        volumes=("old/tickets-1", "old/tickets-2"),
        level=Level.POOL,
    ),
)


def window(day: int, name: str, start: int, end: int, cutovers: int = 4) -> Window:
    """Return a window of the night that opens on a day of March at 22:00."""
    return Window(
        name=name,
        night=f"2026-03-{day}",
        opens=at(3, day, 22),
        start=start,
        end=end,
        zone=ZONE,
        rate=250 * MB,
        at_once=2,
        cutovers=cutovers,
    )


WINDOWS = (
    window(13, "first", at(3, 13, 22), at(3, 14, 6), cutovers=2),
    window(20, "second", at(3, 20, 22), at(3, 21, 6), cutovers=1),
    window(27, "third-a", at(3, 27, 22), at(3, 28, 0)),
    window(27, "third-b", at(3, 28, 1), at(3, 28, 6)),
)

ESTATE = Estate(
    name="harbour",
    digest="d1",
    hours=HOURS,
    volumes=VOLUMES,
    pools=POOLS,
    arrays=ARRAYS,
    policy=Policy(
        start=at(3, 2),
        earliest=at(3, 9),
        zone=ZONE,
        budget=60_000,
        currency="EUR",
        cured_by=at(4, 15),
        finish_by=at(4, 1),
    ),
    hosts=(
        Host(name="quay", arrays=("old", "new")),
        Host(name="office"),
        Host(name="depot", arrays=("old", "inland")),
    ),
    routes=(
        Route(source="old", target="new", one_copy=100 * MB, together=150 * MB),
        Route(source="harbour", target="harbour", possible=False),
        Route(source="harbour", target="inland", one_copy=50 * MB, together=50 * MB),
        Route(source="mole", target="berth", one_copy=100 * MB),
    ),
    tenants=TENANTS,
    rules=RULES,
    windows=WINDOWS,
    controls=(
        Control("", 11, 2_260 * GIB, 1_275 * MILLI),
        Control("inland", 1, 500 * GIB, 200 * MILLI),
    ),
)
