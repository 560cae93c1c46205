"""A second estate of the ferry company and its plan: worn disks, planned for a loss.

The disks of `pier/worn` were measured 96 % busy, so what fares ask on flash counts 1.5
times.  Both pools keep blocks on groups of 4 + 1 drives and are planned for the loss of
one.  The four left are asked 2 reads per read ((4 + 4) / 5 of one each, x 5/4) and:

* `pier/worn`, in place: of a write 3 + 1, 0 + 1 or three times 2 + 2 requests over five
  cases: 17/5 x 5/4 = 4.25.  They position in 10 ms.  10:00: (2 x 360 + 4.25 x 40) x 10
  ms / 10 = 89 %, planned without fares (320 + 85) / 1000 = 40.5 %.
* `pier/deck`, whole stripes: no reads and 5/4 x 5/4 = 1.5625 writes of a write.  Bells:
  100 x 2 / 1000 + 2 MB / 100 MB/s = 0.22, over 10: 2.2 %.  Fares add 300 reads and 30
  writes: 400 x 2 / 1000 + 30 x 1.5625 / 500 + (8 + 0.46875) / 100 = 0.9784375: 9.784375
  %.

Controllers: 460 / 5000 + 40 / 2500 = 10.8 %, planned 560 / 5000 + 50 / 2500 = 13.2 %.

Wear knows no lost drive: 1.5 x (40 + 200) kB/s / 2 x 86,400 s x 1,000 x 5/4 = 19.44 TB,
and once 300 GiB x 5/4 = 0.402653184 TB.

Responses [µs], with the loads of today, of groups with all their drives at the share of
those that lost one: beside the placements.
"""

from corruptions.cargo import load
from corruptions.harbour import HOURS, ZONE, at, window
from placer.estate import Array, Estate, Media, Policy, Pool, Volume
from placer.plan import (
    Booking,
    Goal,
    Moment,
    Move,
    Placed,
    Plan,
    Reason,
    Status,
    Use,
)
from placer.units import GIB, MB, MILLI

VOLUMES = (
    Volume(
        array="pier",
        name="fares",
        pool="worn",
        provisioned=300 * GIB,
        occupied=300 * GIB,
        thin=False,
        load=(load(20, 4), load(200, 20)),
    ),
    Volume(
        array="pier",
        name="tides",
        pool="worn",
        provisioned=200 * GIB,
        occupied=200 * GIB,
        thin=False,
        load=(load(10, 0), load(160, 20)),
    ),
    Volume(
        array="pier",
        name="bells",
        pool="deck",
        provisioned=50 * GIB,
        occupied=50 * GIB,
        thin=False,
        load=(load(80, 0), load(100, 0)),
    ),
)

POOLS = (
    Pool(
        array="pier",
        name="worn",
        media=Media.SPINNING,
        drives=10,
        data=4,
        parity=1,
        usable=1_000 * GIB,
        skew=1_000_000,
        rpm=7_500,
        seek=6_000,
        one_drive_lost=True,
        busy_measured=960_000,
    ),
    Pool(
        array="pier",
        name="deck",
        media=Media.FLASH,
        drives=10,
        data=4,
        parity=1,
        in_place=False,
        drive_size=100_000 * MB,
        usable=500 * GIB,
        skew=1_000_000,
        read_time=200,
        reads_at_most=1_000 * MILLI,
        writes_at_most=500 * MILLI,
        drive_rate=100 * MB,
        dwpd=1_000_000,
        warranty_days=1_825,
        life_days=1_000,
        array_overhead=1_000_000,
        one_drive_lost=True,
    ),
)

ESTATE = Estate(
    name="pier",
    digest="p1",
    hours=HOURS,
    volumes=VOLUMES,
    pools=POOLS,
    arrays=(
        Array(
            name="pier",
            reads_at_most=5_000 * MILLI,
            writes_at_most=2_500 * MILLI,
            uneven=1_000_000,
            write_answer=100,
        ),
    ),
    policy=Policy(
        start=at(3, 2), earliest=at(3, 9), zone=ZONE, latent_demand=1_500_000
    ),
    windows=(window(13, "first", at(3, 13, 22), at(3, 14, 6)),),
)

PLACEMENTS = (
    # 10 ms + 0.89 / 0.11 x 5 ms = 50,454.5; (200 x 50,454.5 + 20 x 100) / 220.  Planned
    # 300 reads of 1,100 and 25 writes of 2,100: (300 x 1.1^2 + 25 x 2.1^2) / (2 x 382.5
    # ms) = 618.6; busy (0.6 + 0.0625 + 0.063125) / 10 = 0.0725625; 300 + 0.0725625 /
    # 0.9274375 x 618.6 = 348.4; (200 x 348.4 + 20 x 100) / 220.
    Placed(
        volume="pier/fares",
        source="pier/worn",
        target="pier/deck",
        reason=Reason.RELIEF,
        response_today=45_877,
        response_planned=326,
    ),
    # (160 x 50,454.5 + 20 x 100) / 180; planned 10 ms + 0.405 / 0.595 x 5 ms.
    Placed(
        volume="pier/tides",
        source="pier/worn",
        target="pier/worn",
        response_today=44_860,
        response_planned=11_926,
    ),
    # 300 + 0.022 / 0.978 x 550; planned as the reads of fares.
    Placed(
        volume="pier/bells",
        source="pier/deck",
        target="pier/deck",
        response_today=313,
        response_planned=349,
    ),
)

Side = tuple[float, str]
TABLE: tuple[tuple[str, str, str, float, Side, Side], ...] = (
    ("pier/worn", "pool-room", "GiB", 850, (500, ""), (200, "")),
    ("pier/deck", "pool-room", "GiB", 425, (50, ""), (350, "")),
    ("pier/worn", "pool-busy", "%", 70, (89, "10:00"), (40.5, "10:00")),
    ("pier/deck", "pool-busy", "%", 70, (2.2, "10:00"), (9.784375, "10:00")),
    ("pier/deck", "pool-wear", "TB", 1_825, (0, ""), (19.842653184, "")),
    ("pier", "controller-busy", "%", 70, (10.8, "10:00"), (13.2, "10:00")),
)

PLAN = Plan(
    inventory="pier",
    digest="p1",
    version="0",
    status=Status.PROVEN,
    placements=PLACEMENTS,
    moves=(
        Move(
            id="m1",
            volume="pier/fares",
            source="pier/worn",
            target="pier/deck",
            size=300 * GIB,
            starts=at(3, 13, 22),
            ends=at(3, 13, 22, 54),
            window="first",
            cutover=at(3, 13, 23),
            released=at(3, 27, 22),
        ),
    ),
    # 54 min x 100 MB/s = 324 GB for 300 GiB = 322.1 GB.
    bookings=(
        Booking(
            move="m1",
            window="first",
            starts=at(3, 13, 22),
            ends=at(3, 13, 22, 54),
            rate=100 * MB,
        ),
    ),
    uses=tuple(
        Use(
            where=where,
            limit=limit,
            moment=moment,
            use=use,
            at_most=at_most,
            unit=unit,
            hour=hour,
        )
        for where, limit, unit, at_most, today, planned in TABLE
        for moment, (use, hour) in ((Moment.TODAY, today), (Moment.PLANNED, planned))
    ),
    goals=(
        Goal(name="missed", value=0, reached=0, bound=0, unit="steps"),
        Goal(name="money", value=0, reached=0, bound=0, unit="hundredths"),
        # 300 + 7/3 x 618.63 = 1,743.5; with writes 1,595: 2 x 220/s x (45.877 - 1.595).
        Goal(
            name="relief",
            value=19_484.08,
            reached=19_484.08,
            bound=19_484.08,
            unit="ms/s",
        ),
        Goal(name="effort", value=310, reached=310, bound=310, unit="GiB"),
    ),
)
