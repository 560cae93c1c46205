"""Damages to what is told of caps, caches, sequential reads, snapshots and factors."""

from dataclasses import replace

from corruptions.damage import (
    Pair,
    array,
    damage,
    estate,
    goal,
    move,
    placed,
    pool,
    use,
    volume,
)
from corruptions.harbour import TENANTS, at
from placer.units import GIB

USES = "claim-uses"
ANSWERS = "claim-responses"
GOALS = "claim-goals"


def disks(percent: float) -> Pair:
    """State another busy share of `mole/disks` today, which is 13.2324 %."""
    return use("mole/disks", "pool-busy", "today", use=percent)


def berth(percent: float) -> Pair:
    """State another busy share of `berth/flash` planned, which is 15.9696 %."""
    return use("berth/flash", "pool-busy", "planned", use=percent)


# 10:00 at `mole/disks`, positionings x 10 ms + MB / 100 MB/s, x 1.2 / 10; at
# `berth/flash` what songs take + 0.22, x 0.9 / 2.
DAMAGES = (
    damage(USES, "no cap: 218 positionings, 2.54 MB", disks(26.4648)),
    damage(USES, "no hits: 164 positionings, 2 MB", disks(19.92)),
    damage(USES, "films position each time: 127", disks(15.3924)),
    damage(USES, "sequential reads never position: 107", disks(12.9924)),
    damage(USES, "as modelled, not as measured", disks(11.027)),
    damage(USES, "40 % hit in half the cache: 0.11376", berth(15.0192)),
    damage(USES, "none hits elsewhere: 0.1584", berth(17.028)),
    damage(USES, "freight as measured: 0.11 instead of 0.22", berth(11.01960)),
    damage(USES, "half of the cap at the horizon: 0.1686", berth(17.487)),
    damage(
        USES,
        "hits spare the controllers: 276.8 / 10000 + 24 / 5000",
        use("berth", "controller-busy", "planned", use=3.248),
    ),
    damage(
        USES,
        "no cap on the controllers: 340 / 5000 + 60 / 2500",
        use("mole", "controller-busy", "today", use=9.2),
    ),
    damage(
        USES,
        "20 GiB of snapshots left behind for good",
        use("berth/flash", "pool-room", "planned", use=160),
    ),
    damage(
        USES, "no snapshots today", use("mole/disks", "pool-room", "today", use=300)
    ),
    damage(USES, "the cache of berth unknown", array("berth", cache=0), ANSWERS, GOALS),
    damage(
        USES, "a smaller unit", pool("mole/disks", prefetch_unit=50_000), ANSWERS, GOALS
    ),
    damage(USES, "nobody is capped", estate(tenants=()), ANSWERS, GOALS),
    damage(
        USES,
        "freight is not planned for its cap",
        estate(tenants=(TENANTS[0], replace(TENANTS[1], plan_for_cap=False))),
        ANSWERS,
        GOALS,
    ),
    damage(
        ANSWERS,
        "songs as if none hit: 0.8 x 13,027.7 + 200",
        placed("mole/songs", response_today=10_623),
    ),
    damage(
        ANSWERS,
        "songs with 40 % of hits in half the cache",
        placed("mole/songs", response_planned=256),
    ),
    damage(ANSWERS, "songs as modelled", placed("mole/songs", response_today=5_572)),
    damage(
        ANSWERS,
        "films as if all were random: half of 13,027.7 + 500",
        placed("mole/films", response_today=6_764),
    ),
    damage(
        ANSWERS, "manifests as modelled", placed("berth/manifests", response_today=361)
    ),
    damage(
        ANSWERS,
        "tickets wait behind reads alone: 0.0475 / 0.9525 x 550",
        placed("old/tickets-2", response_planned=328),
    ),
    damage(
        ANSWERS,
        "films wait for what one of their own reads takes",
        placed("mole/films", response_today=2_123),
    ),
    damage(
        ANSWERS,
        "one in a hundred reads of manifests has 1 MB, the others none",
        volume("berth/manifests", large_share=10_000, large_size=1_000_000),
        GOALS,
    ),
    damage(
        GOALS,
        "relief as if songs did not meet their own writes: 550 left",
        goal("relief", value=15_746.66, reached=15_800, bound=15_800),
    ),
    damage(
        GOALS,
        "relief for all 300 requests that songs ask",
        goal("relief", value=17_378.66, reached=17_378.66, bound=17_378.66),
    ),
    damage(
        GOALS,
        "effort for snapshots that are not copied",
        goal("effort", value=790, reached=790, bound=790),
    ),
    damage(
        "move-list",
        "snapshots are to be copied",
        move("m6", size=120 * GIB),
        "copy-whole",
    ),
    damage("hold", "before the snapshots expire", move("m6", released=at(4, 10, 22))),
    damage("hold", "a day early", volume("mole/songs", snapshot_days=22)),
    damage("hold", "snapshots kept for a day less", volume("mole/songs", hold_days=22)),
    damage(
        "pool-room",
        "half a kilobyte of snapshots too many",
        volume("mole/songs", snapshots=265 * GIB + 500),
        USES,
    ),
    damage(
        "pool-room",
        "179.9995 GiB for 180",
        pool("berth/flash", fill_ceiling=359_999),
        USES,
    ),
    damage(
        "pool-busy",
        "15.9696 % of 15.9695",
        pool("berth/flash", busy_ceiling=159_695),
        USES,
        GOALS,
    ),
    damage(
        "pool-busy",
        "1.392 % of 1.3919",
        pool("mole/disks", busy_ceiling=13_919),
        USES,
    ),
    damage(
        "pool-busy",
        "in the nights films leave songs more of the cap: 17.38 % of 17, later 15.97",
        pool("berth/flash", busy_ceiling=170_000),
        USES,
        GOALS,
    ),
    damage(
        "pool-busy",
        "measured at five times the model",
        pool("berth/flash", measured_factor=5_000_000),
        USES,
        ANSWERS,
        GOALS,
        "claim-reasons",
    ),
    damage(
        "controller-busy",
        "1.6 % of 1.5999",
        array("mole", controller_ceiling=15_999),
        USES,
    ),
)
