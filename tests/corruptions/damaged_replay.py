"""Damages that only the replay of the nights can find: the placement is good."""

from dataclasses import replace
from typing import Any

from corruptions.damage import Pair, array, both, damage, move, plan, policy, pool
from corruptions.harbour import ESTATE, at
from corruptions.sailing import PLAN
from placer.estate import Estate, Expansion
from placer.plan import Shortage
from placer.units import GIB, MILLI, MINUTES_PER_DAY

USES = "claim-uses"
STORY = (USES, "claim-responses")


def delivered(days: int) -> Expansion:
    """Return the flash to be had, delivered so many days after the start."""
    return Expansion(drives=4, price=50_000, at_most=2, delivery_days=days)


def held(estate: Estate, **changes: Any) -> Pair:
    """Let tickets be held for four weeks, and relics come to `old/spin` meanwhile."""
    volumes = tuple(
        replace(v, hold_days=28) if "tickets" in v.name else v for v in estate.volumes
    )
    kept = {"released": at(4, 10, 22)}
    edits: dict[str, dict[str, Any]] = {
        "m1": kept,
        "m2": kept,
        "m5": {"target": "old/spin"},
    }
    return replace(estate, volumes=volumes), replace(
        PLAN,
        placements=tuple(
            replace(p, target="old/spin") if p.volume == "old/relics" else p
            for p in PLAN.placements
        ),
        moves=tuple(replace(m, **edits.get(m.id, {})) for m in PLAN.moves),
        **changes,
    )


def shrinking(name: str, growth: int, pair: Pair) -> Pair:
    """Return a pair with the load growth of one volume replaced."""
    volumes = tuple(
        replace(v, load_growth=growth) if v.id == name else v for v in pair[0].volumes
    )
    return replace(pair[0], volumes=volumes), pair[1]


def lacking(where: str) -> Pair:
    """Name a shortage of room, and be due an hour before the hold of tickets ends."""
    short = Shortage(
        limit="pool-room", where=where, amount=50, unit="GiB", sentence="is short"
    )
    return both(policy(cured_by=at(3, 27, 21)), plan(shortages=(short,)))


DAMAGES = (
    damage(
        "pool-room",
        "130 GiB of 127.5 while the drives are late",
        pool("new/flash", usable=150 * GIB, thin_at_most=0, expansion=delivered(20)),
        USES,
    ),
    damage(
        "pool-room",
        "130 GiB of 127.5 for the two hours before the drives come",
        pool("new/flash", usable=150 * GIB, thin_at_most=0, expansion=delivered(12)),
        USES,
    ),
    damage("pool-room", "950 GiB where 900 stand today", held(ESTATE), *STORY),
    damage(
        "pool-thin",
        "360 GiB are promised in the hold, 300 after it",
        pool("new/flash", thin_at_most=437_500),
        USES,
    ),
    damage(
        "pool-thin",
        "1,050 GiB promised where 1,000 are today and may be",
        held(pool("old/spin", thin_at_most=1_000_000)[0]),
        *STORY,
        "pool-room",
    ),
    damage(
        "array-volumes",
        "logs stand twice in the hold: five of four",
        array("new", volumes_at_most=4),
        USES,
    ),
    damage(
        "array-volumes",
        "relics stand twice beside what is held: six of five",
        held(array("old", volumes_at_most=5)[0]),
        *STORY,
        "pool-room",
    ),
    damage(
        "pool-busy",
        "tickets are served by four drives, eight come later",
        pool("new/flash", busy_ceiling=90_000, expansion=delivered(20)),
        "claim-goals",
        USES,
    ),
    damage(
        "pool-busy",
        "logs are a minute late to leave: 5.69 % of 5 %",
        both(
            pool("new/flash", busy_ceiling=50_000), move("m3", cutover=at(3, 13, 23, 1))
        ),
        "claim-goals",
        USES,
    ),
    damage(
        "controller-busy",
        "tickets shrink by half in a year: 4.71 % of 4.5 % in the nights",
        shrinking("old/tickets-1", -500_000, array("new", controller_ceiling=45_000)),
        USES,
    ),
    damage(
        "controller-busy",
        "mail shrinks by nine tenths: 46.3 of 42 reads/s in the nights",
        shrinking("old/mail", -900_000, array("inland", reads_at_most=60 * MILLI)),
        USES,
    ),
    damage(
        "cured-by",
        "due an hour before the hold of tickets ends",
        policy(cured_by=at(3, 27, 21)),
    ),
    damage(
        "cured-by",
        "due a day after the start",
        policy(cured_by=at(3, 2) + MINUTES_PER_DAY),
    ),
    damage(
        "cured-by",
        "a shortage is named at another pool",
        lacking("new/spin"),
    ),
    damage("cured-by", "mail never leaves", plan(moves=PLAN.moves[:0]), "move-list"),
)
