"""Damages that rules of the planned placement must find."""

from dataclasses import replace

from corruptions.damage import (
    array,
    damage,
    estate,
    placed,
    plan,
    policy,
    pool,
    route,
    rule,
    volume,
)
from corruptions.harbour import ESTATE
from corruptions.sailing import PLAN
from placer.estate import Host, Level, Media
from placer.plan import Bought
from placer.units import GIB, MILLI

USES = "claim-uses"
GOALS = "claim-goals"
TWICE = (*PLAN.placements, PLAN.placements[0])

DAMAGES = (
    damage("one-place", "a volume is left out", plan(placements=PLAN.placements[:-1])),
    damage("one-place", "a volume stands twice", plan(placements=TWICE)),
    damage("one-place", "a wrong source", placed("new/books", source="new/flash")),
    damage(
        "one-place",
        "a target that is no pool",
        placed("new/books", target="new/attic"),
    ),
    damage(
        "pool-room",
        "the ceiling leaves 180 GiB for 181 at the horizon, while 161.6 hold now",
        pool("new/spin", fill_ceiling=180_000),
        USES,
    ),
    damage(
        "pool-room",
        "1,151 GiB are to be left free of 2,000",
        pool("inland/box", least_free=1_151 * GIB),
        USES,
    ),
    damage(
        "pool-thin",
        "299 GiB may be promised where 300 are",
        pool("new/flash", thin_at_most=373_750),
        USES,
    ),
    damage(
        "pool-thin",
        "399 GiB may be promised where 400 stay",
        pool("old/spin", thin_at_most=399_000),
        USES,
        "cured-by",
    ),
    damage(
        "pool-busy",
        "24 % of 23.9 % at the horizon, 20.3 % at the end of the nights",
        pool("old/spin", busy_ceiling=239_000),
        USES,
    ),
    damage(
        "pool-busy",
        "a black box that takes 364 requests/s at 70 %, and is asked 255",
        pool("inland/box", requests_at_most=364 * MILLI),
        USES,
    ),
    damage(
        "pool-wear",
        "drives of 0.89 GB are rated for 12.994 TB of 13.103",
        pool("new/flash", drive_size=890_000_000),
        USES,
    ),
    damage("pool-wear", "drives worn out", pool("new/flash", wear_used=995_000), USES),
    damage(
        "controller-busy",
        "3.6 % of 3.5 % at the horizon",
        array("old", controller_ceiling=35_000),
        USES,
    ),
    damage(
        "controller-busy",
        "two of eight controllers left, each asked 255 of 180 requests/s",
        array(
            "inland",
            controllers=8,
            failures_survived=6,
            reads_at_most=180 * MILLI,
            writes_at_most=180 * MILLI,
        ),
        USES,
    ),
    damage("array-volumes", "two of three", array("inland", volumes_at_most=2), USES),
    damage("array-volumes", "three of four", array("new", volumes_at_most=3), USES),
    damage("array-hosts", "one of two", array("new", hosts_at_most=1), USES),
    damage(
        "array-hosts",
        "mail has a host of its own",
        (
            replace(
                ESTATE,
                volumes=tuple(
                    replace(v, host="post") if v.name == "mail" else v
                    for v in ESTATE.volumes
                ),
                arrays=array("inland", hosts_at_most=1)[0].arrays,
            ),
            PLAN,
        ),
        USES,
    ),
    damage(
        "largest-volume",
        "tickets are larger than the array takes",
        array("new", largest_volume=199 * GIB),
    ),
    damage(
        "largest-volume",
        "mail is larger than the array takes",
        array("inland", largest_volume=300 * GIB - 1),
    ),
    damage(
        "source-only",
        "tickets move into a mixed pool",
        pool("new/flash", media=Media.MIXED),
        GOALS,
        USES,
        "claim-responses",
        "claim-reasons",
    ),
    damage(
        "source-only",
        "mail moves into an unmodelled pool",
        pool("inland/box", media=Media.UNMODELLED),
        USES,
    ),
    damage(
        "host-reach",
        "the quay reaches the old array only",
        estate(hosts=(Host(name="quay", arrays=("old",)), *ESTATE.hosts[1:])),
    ),
    damage(
        "host-reach",
        "the depot reaches the harbour hall only",
        estate(hosts=(*ESTATE.hosts[:2], Host(name="depot", arrays=("old", "new")))),
    ),
    damage(
        "route",
        "the array's own route is closed, which counts before that of the halls",
        route("old", "new", possible=False),
    ),
    damage(
        "route",
        "none to the inland hall",
        estate(routes=(*ESTATE.routes[:2], ESTATE.routes[3])),
    ),
    damage("only-on", "charts only on flash", rule(0, pools=("new/flash",))),
    damage("only-on", "mail too", rule(0, volumes=("old/charts", "old/mail"))),
    damage("never-on", "tickets never on flash", rule(1, pools=("new/flash",))),
    damage(
        "never-on",
        "books never where they are",
        rule(1, volumes=("new/books",), pools=("new/spin",)),
    ),
    damage(
        "apart", "two of one hall", rule(2, volumes=("old/tickets-1", "old/charts"))
    ),
    damage(
        "apart",
        "two of one array",
        rule(2, volumes=("old/mail", "inland/backup"), level=Level.ARRAY),
    ),
    damage("together", "books too", rule(3, volumes=("old/tickets-1", "new/books"))),
    damage(
        "together",
        "tickets and charts at one array",
        rule(3, volumes=("old/tickets-2", "old/charts"), level=Level.ARRAY),
    ),
    damage("stays", "mail was to be left", volume("old/mail", stays=True)),
    damage("stays", "logs were to be left", volume("new/logs", stays=True)),
    damage("budget", "one hundredth short", policy(budget=49_999)),
    damage("budget", "nothing to spend", policy(budget=0)),
    damage(
        "steps",
        "none can be had",
        pool("new/flash", expansion=replace(ESTATE.pools[0].expansion, at_most=0)),  # type: ignore[type-var]
    ),
    damage(
        "steps",
        "for a pool that cannot grow",
        plan(bought=(*PLAN.bought, Bought("new/spin", 1, 0))),
    ),
)
