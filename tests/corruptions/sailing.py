"""A correct plan for the ferry company's estate, worked by hand.

Today, `old/spin` is over its ceiling: 100 + 100 + 400 + 300 = 900 GiB of 850.  One step
is bought for `new/flash`: 8 drives, 800 GiB usable.

Busy shares, requests/s x what one takes, over the drives:

* `old/spin` positions in 6 ms + half a turn of 4 ms; a write in place under one parity
  touches drives four times.  10:00: (350 + 4 x 50) x 10 ms / 10 = 55 %; 02:00:
  (70 + 4 x 5) x 10 ms / 10 = 9 %.  Planned, charts alone: 20 %, with a year's growth of
  20 %: 24 %.
* `new/spin` positions in 3 + 2 ms and mirrors: (100 + 2 x 50) x 5 ms + 2 MB / 100 MB/s
  = 1.02, over 10: 10.2 %.  Logs add 0.15 + 0.003: 11.73 %.
* `new/flash`: reads / 1000 + writes x (2/1000 + 2/500) + (bytes read + 4 x written) /
  100 MB/s.  Logs: 0.01 + 0.06 + 0.005 = 0.075, over 4: 1.875 %.  Tickets at 10:00:
  0.2 + 0.15 + 0.03 = 0.38, over 8: 4.75 %.
* `inland/box`: 200 / 1000 = 20 %; with mail and relics 255 / 1000 = 25.5 %.

Wear over 1,000 days, 2 writes and a reduction of 2 cancelling: 0.1 MB/s x 86,400 s x
1,000 = 8.64 TB; tickets 0.15 MB/s: 12.96 TB, and once 200 GiB / 2 x 4/3 =
0.143165576533... TB.

The tenant `cruise` may ask for 200 requests/s.  At 10:00 songs and films ask for 300 +
100: each gets half, and with films doubled at the horizon 200 / 500 = 0.4; at 02:00
they ask for 70, later 90, and get all.  `freight` is planned for its 2 MB/s: manifests
count four times at 02:00 and twice at 10:00, 200 reads/s in both.

* `mole/disks` positions in 10 ms, sequential reads once in 100 kB; its drives are
  measured at 1.2 times the model.  10:00: of 120 reads of songs 40 % hit, 72 are left,
  and 30 writes; of 50 reads of films half hit, 25 are left: 5 are random, the others
  read 200 kB and position twice.  (109 x 10 ms + 1.27 MB / 100 MB/s) x 1.2 / 10 =
  13.2324 %.  Planned, films alone: 80 reads, 40 left, 8 random, 3.2 positions for 320
  kB: (112 ms + 4 ms) x 1.2 / 10 = 1.392 %.
* `berth/flash` has half the cache of `mole`, so 20 % of the reads of songs hit there;
  measured at 0.9 times.  Manifests: (0.2 + 0.02) x 0.9 / 2 = 9.9 %; planned at 10:00
  with songs: 76.8 reads / 1000 + 24 writes / 500 + 1.008 MB / 100 MB/s = 0.13488, so
  0.35488 x 0.9 / 2 = 15.9696 %.
* Controllers serve hits too.  `mole`: 170 / 5000 + 30 / 2500 = 4.6 %, planned 80 reads:
  1.6 %.  `berth`: 200 / 10000 = 2 %, planned 296 / 10000 + 24 / 5000 = 3.44 %.

Responses [µs], wait = u / (1 - u) x sum of n s^2 / (2 sum of n s): the comments beside
the placements.  All requests have 10 kB, so those of `old/spin` all take 10 ms and
those of `new/spin` 5.1: half of that is left of one in service.  On flash a read takes
1,000 + 100, a write 2,000 + 100; a write in place causes two of both on `new/flash`.
"""

from corruptions.harbour import at
from placer.plan import (
    Booking,
    Bought,
    Goal,
    Moment,
    Move,
    Placed,
    Plan,
    Reason,
    Status,
    Use,
)
from placer.units import GIB, MB

PLACEMENTS = (
    # 0.55 / 0.45 x 5 ms = 6,111; (100 x 16,111 + 25 x 500) / 125; on flash a read takes
    # 200 + 100 idle and waits behind 250 reads and 50 writes: (250 x 1.1^2 + 50 x
    # 2.1^2) / (2 x 380 ms) = 688.2; x 0.0475 / 0.9525 = 34.3; (100 x 334.3 + 25 x 100)
    # / 125.
    Placed(
        volume="old/tickets-1",
        source="old/spin",
        target="new/flash",
        reason=Reason.LIMIT,
        response_today=12_989,
        response_planned=288,
        response_limit=5_000,
    ),
    Placed(
        volume="old/tickets-2",
        source="old/spin",
        target="new/flash",
        reason=Reason.RELIEF,
        response_today=16_112,
        response_planned=335,
    ),
    # Planned: 0.2 / 0.8 x 5 ms = 1,250; (100 x 11,250 + 25 x 500) / 125.
    Placed(
        volume="old/charts",
        source="old/spin",
        target="old/spin",
        response_today=12_989,
        response_planned=9_100,
        response_limit=9_000,
    ),
    # Busiest first at 02:00: 10 ms + 0.09 / 0.91 x 5 ms; a black box is unknown.
    Placed(
        volume="old/mail",
        source="old/spin",
        target="inland/box",
        reason=Reason.CURE,
        response_today=10_495,
    ),
    Placed(
        volume="old/relics",
        source="old/attic",
        target="inland/box",
        reason=Reason.MAKE_ROOM,
    ),
    # 5.1 ms + 0.102 / 0.898 x 2.55 ms = 5,389.6; planned 0.1173: 5,438.9; a third of
    # the requests are writes of 100.
    Placed(
        volume="new/books",
        source="new/spin",
        target="new/spin",
        response_today=3_627,
        response_planned=3_660,
        response_limit=4_000,
    ),
    # Behind 10 + 20 reads and 20 writes: (30 x 1.1^2 + 20 x 2.1^2) / (2 x 75 ms) = 830;
    # 300 + 0.01875 / 0.98125 x 830 = 315.9, half of the requests are writes of 100.
    Placed(
        volume="new/logs",
        source="new/flash",
        target="new/spin",
        reason=Reason.SAVE,
        response_today=208,
        response_planned=2_770,
    ),
    Placed(
        volume="inland/backup",
        source="inland/box",
        target="inland/box",
        response_today=8_000,
        response_planned=8_000,
    ),
    # 72 reads and 30 writes of songs and 5 reads of films take 10.1 ms, 20 reads of
    # films 1 + 0.1: (107 x 10.1^2 + 20 x 1.1^2) / (2 x 1,102.7 ms) = 4,960.2; x
    # 0.132324 / 0.867676 = 756.5; (10,100 + 756.5) x 1.2 = 13,027.7; 0.4 x 500 + 0.6 x
    # 13,027.7 = 8,016.6; a fifth are writes of 1,000.  Planned with the loads of today:
    # 96 reads left, 30 writes and 1.26 MB are 0.1686; (0.1686 + 0.22) x 0.9 / 2 =
    # 0.17487; with the 200 reads of manifests (296 x 1.1^2 + 30 x 2.1^2) / (2 x 388.6
    # ms) = 631.1; 300 + 0.17487 / 0.82513 x 631.1 = 433.7, x 0.9 = 390.4; 0.2 x 150 +
    # 0.8 x 390.4 = 342.3; a fifth are writes of 100.
    Placed(
        volume="mole/songs",
        source="mole/disks",
        target="berth/flash",
        reason=Reason.RELIEF,
        response_today=6_614,
        response_planned=294,
    ),
    # Positions for 0.2 + 0.8 x 10 kB / 100 kB = 0.28 of its reads: 2,800 + 100, waits
    # 756.5 as songs do; 3,656.5 x 1.2 = 4,387.7, half hit in 500.
    # Planned with the loads of today: (70 ms + 2.5 ms) x 1.2 / 10 = 0.0087, behind
    # (5 x 10.1^2 + 20 x 1.1^2) / (2 x 72.5 ms) = 3,684.5; 2,900 + 0.0087 / 0.9913 x
    # 3,684.5 = 2,932.3; x 1.2 = 3,518.8.
    Placed(
        volume="mole/films",
        source="mole/disks",
        target="mole/disks",
        response_today=2_444,
        response_planned=2_010,
    ),
    # (300 + 0.099 / 0.901 x 550) x 0.9 = 324.4; planned as songs: 390.4.
    Placed(
        volume="berth/manifests",
        source="berth/flash",
        target="berth/flash",
        response_today=325,
        response_planned=391,
    ),
)

MOVES = (
    Move(
        id="m1",
        volume="old/tickets-1",
        source="old/spin",
        target="new/flash",
        size=100 * GIB,
        starts=at(3, 13, 22),
        ends=at(3, 13, 22, 18),
        window="first",
        cutover=at(3, 13, 23),
        released=at(3, 27, 22),
    ),
    Move(
        id="m2",
        volume="old/tickets-2",
        source="old/spin",
        target="new/flash",
        size=100 * GIB,
        starts=at(3, 13, 22),
        ends=at(3, 13, 22, 36),
        window="first",
        cutover=at(3, 13, 23),
        released=at(3, 27, 22),
    ),
    Move(
        id="m3",
        volume="new/logs",
        source="new/flash",
        target="new/spin",
        size=60 * GIB,
        starts=at(3, 13, 22, 36),
        ends=at(3, 13, 22, 47),
        window="first",
        cutover=at(3, 13, 23),
        released=at(3, 27, 22),
    ),
    Move(
        id="m4",
        volume="old/mail",
        source="old/spin",
        target="inland/box",
        size=300 * GIB,
        starts=at(3, 20, 22),
        ends=at(3, 20, 23, 48),
        window="second",
        cutover=at(3, 21, 0),
        released=at(4, 3, 22),
    ),
    Move(
        id="m5",
        volume="old/relics",
        source="old/attic",
        target="inland/box",
        size=50 * GIB,
        starts=at(3, 27, 22),
        ends=at(3, 27, 22, 18),
        window="third-b",
        cutover=at(3, 28, 1),
        released=at(4, 10, 22),
    ),
    # Held for the 21 days of its snapshots, not for 14.
    Move(
        id="m6",
        volume="mole/songs",
        source="mole/disks",
        target="berth/flash",
        size=100 * GIB,
        starts=at(3, 27, 22, 18),
        ends=at(3, 27, 22, 36),
        window="third-b",
        cutover=at(3, 28, 1),
        released=at(4, 17, 22),
    ),
)

BOOKINGS = (
    # 18 min x 100 MB/s = 108 GB for 100 GiB = 107.4 GB.
    Booking(
        move="m1",
        window="first",
        starts=at(3, 13, 22),
        ends=at(3, 13, 22, 18),
        rate=100 * MB,
    ),
    # 36 min x 50 MB/s = 108 GB.
    Booking(
        move="m2",
        window="first",
        starts=at(3, 13, 22),
        ends=at(3, 13, 22, 36),
        rate=50 * MB,
    ),
    # 11 min x 100 MB/s = 66 GB for 60 GiB = 64.4 GB.
    Booking(
        move="m3",
        window="first",
        starts=at(3, 13, 22, 36),
        ends=at(3, 13, 22, 47),
        rate=100 * MB,
    ),
    # 60 + 48 min x 50 MB/s = 324 GB for 300 GiB = 322.1 GB.
    Booking(
        move="m4",
        window="second",
        starts=at(3, 20, 22),
        ends=at(3, 20, 23),
        rate=50 * MB,
    ),
    Booking(
        move="m4",
        window="second",
        starts=at(3, 20, 23),
        ends=at(3, 20, 23, 48),
        rate=50 * MB,
    ),
    # 18 min x 50 MB/s = 54 GB for 50 GiB = 53.7 GB.
    Booking(
        move="m5",
        window="third-a",
        starts=at(3, 27, 22),
        ends=at(3, 27, 22, 18),
        rate=50 * MB,
    ),
    # 18 min x 100 MB/s = 108 GB for 100 GiB; the 20 GiB of snapshots stay behind.
    Booking(
        move="m6",
        window="third-a",
        starts=at(3, 27, 22, 18),
        ends=at(3, 27, 22, 36),
        rate=100 * MB,
    ),
)

MOVED_ONCE = 200 * GIB / 2 * 4 / 3 / 1e12

# Where, limit, unit; today: use, limit, hour; planned: use, limit, hour.
Side = tuple[float, float, str]
TABLE: tuple[tuple[str, str, str, Side, Side], ...] = (
    ("new/flash", "pool-room", "GiB", (30, 340, ""), (100, 680, "")),
    ("new/spin", "pool-room", "GiB", (100, 850, ""), (181, 850, "")),
    ("old/spin", "pool-room", "GiB", (900, 850, ""), (400, 850, "")),
    ("old/attic", "pool-room", "GiB", (50, 500, ""), (0, 500, "")),
    ("inland/box", "pool-room", "GiB", (500, 1_700, ""), (850, 1_700, "")),
    ("new/flash", "pool-thin", "GiB", (60, 800, ""), (300, 1_600, "")),
    ("old/spin", "pool-thin", "GiB", (1_000, 1_200, ""), (400, 1_200, "")),
    ("new/flash", "pool-busy", "%", (1.875, 70, "02:00"), (4.75, 70, "10:00")),
    ("new/spin", "pool-busy", "%", (10.2, 70, "02:00"), (11.73, 70, "02:00")),
    ("old/spin", "pool-busy", "%", (55, 70, "10:00"), (24, 70, "10:00")),
    ("inland/box", "pool-busy", "%", (20, 70, "02:00"), (25.5, 70, "02:00")),
    ("new/flash", "pool-wear", "TB", (8.64, 730, ""), (12.96 + MOVED_ONCE, 1_460, "")),
    ("new", "controller-busy", "%", (2.3, 70, "02:00"), (4.8, 70, "10:00")),
    ("old", "controller-busy", "%", (9.1, 70, "10:00"), (3.6, 70, "10:00")),
    ("new", "array-volumes", "volumes", (2, 10, ""), (4, 10, "")),
    ("inland", "array-volumes", "volumes", (1, 5, ""), (3, 5, "")),
    ("new", "array-hosts", "hosts", (1, 4, ""), (2, 4, "")),
    ("inland", "array-hosts", "hosts", (1, 3, ""), (1, 3, "")),
    ("mole/disks", "pool-room", "GiB", (320, 850, ""), (200, 850, "")),
    ("berth/flash", "pool-room", "GiB", (60, 425, ""), (180, 425, "")),
    ("mole/disks", "pool-busy", "%", (13.2324, 70, "10:00"), (1.392, 70, "10:00")),
    ("berth/flash", "pool-busy", "%", (9.9, 70, "02:00"), (15.9696, 70, "10:00")),
    ("mole", "controller-busy", "%", (4.6, 70, "10:00"), (1.6, 70, "10:00")),
    ("berth", "controller-busy", "%", (2, 70, "02:00"), (3.44, 70, "10:00")),
)
USES = tuple(
    Use(
        where=where,
        limit=limit,
        moment=moment,
        use=use,
        at_most=at_most,
        unit=unit,
        hour=hour,
    )
    for where, limit, unit, today, planned in TABLE
    for moment, (use, at_most, hour) in (
        (Moment.TODAY, today),
        (Moment.PLANNED, planned),
    )
)

GOALS = (
    # Charts stay at 12.989 ms of 9 ms: 34.3 % beyond the tolerance, 4 steps x 2.
    Goal(name="missed", value=8, reached=8, bound=8, unit="steps"),
    Goal(name="money", value=50_000, reached=50_000, bound=50_000, unit="hundredths"),
    # Promised at 70 % busy, 7/3 of what is left, behind those there today and their
    # own. Tickets-1 on flash: 180 reads, 70 writes: 526.5 / 690 ms = 763; 300 + 1,780.4
    # = 2,080.4, with writes 1,685.  Tickets-2: 130 and 20: 245.5 / 370 ms = 663.5;
    # 1,848.2.  Logs: 5.1 + 7/3 x 2.55 = 11.05 ms, with writes 5,575.  Songs as planned,
    # 631.1: (300 + 1,472.5) x 0.9 = 1,595.2; 0.2 x 150 + 0.8 x 1,595.2 = 1,306.2, with
    # writes 1,065.  8 x 125/s x (12.989 - 1.685) + 2 x 100/s x (16.112 - 1.849); logs
    # lose 20/s x (5.575 - 0.208); 2 x 150/s (of 300 asked) x (6.614 - 1.065) = 1,664.7.
    Goal(name="relief", value=15_713.96, reached=15_800, bound=15_800, unit="ms/s"),
    # 100 + 100 + 300 + 50 + 60 + 100 GiB and six cutovers of 10 GiB.
    Goal(name="effort", value=770, reached=770, bound=770, unit="GiB"),
)

PLAN = Plan(
    inventory="harbour",
    digest="d1",
    version="0",
    status=Status.PROVEN,
    placements=PLACEMENTS,
    bought=(Bought("new/flash", 1, 50_000),),
    moves=MOVES,
    bookings=BOOKINGS,
    uses=USES,
    goals=GOALS,
)
