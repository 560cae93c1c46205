"""A small estate of the ferry company with a plan, built by hand for tests of files."""

from dataclasses import replace
from datetime import datetime
from zoneinfo import ZoneInfo

from placer.estate import (
    Array,
    Assumption,
    Control,
    Estate,
    Expansion,
    Hour,
    Load,
    Media,
    Policy,
    Pool,
    Volume,
    Window,
)
from placer.findings import Finding, Place, Severity
from placer.plan import (
    Booking,
    Bought,
    Goal,
    Left,
    Moment,
    Move,
    Placed,
    Plan,
    Reason,
    Shortage,
    Status,
    Stopped,
    Use,
)
from placer.units import GIB, MB

ZONE = "Europe/Berlin"


def at(text: str, zone: str = ZONE) -> int:
    """Return a local time as minutes since 1970-01-01 UTC [min]."""
    moment = datetime.fromisoformat(text).replace(tzinfo=ZoneInfo(zone))
    return int(moment.timestamp()) // 60


def window(name: str, opens: str, closes: str, zone: str = ZONE) -> Window:
    """Return a window given by local times."""
    begin = at(opens, zone)
    return Window(
        name=name,
        night=name,
        opens=begin,
        start=begin,
        end=at(closes, zone),
        zone=zone,
    )


def volume(name: str, pool: str, *applications: str, requests: int = 900) -> Volume:
    """Return a volume of 100 GiB whose only hour has the requests given [1/s]."""
    load = Load(requests * 600, requests * 400, 40 * MB, 20 * MB)
    return Volume(
        array="quay",
        name=name,
        pool=pool,
        provisioned=100 * GIB,
        occupied=60 * GIB,
        thin=True,
        load=(load,),
        applications=applications,
    )


ESTATE = Estate(
    name="harbour",
    digest="d1",
    hours=(Hour(None, 10, "daily 10"),),
    volumes=(
        volume("bk-db-01", "slow", "booking"),
        volume("bk-log-01", "slow", "booking"),
        volume("cam-01", "fast"),
    ),
    pools=(
        Pool(
            array="quay",
            name="fast",
            media=Media.FLASH,
            drives=8,
            expansion=Expansion(drives=4, price=61_702, at_most=3),
        ),
        Pool(array="quay", name="slow", media=Media.SPINNING, drives=24),
    ),
    arrays=(Array(name="quay", site="harbour"),),
    policy=Policy(
        start=at("2027-01-11 00:00"),
        earliest=at("2027-01-25 00:00"),
        zone=ZONE,
        currency="crowns",
        budget=500_000,
    ),
    windows=(
        window("weekday 1", "2027-01-26 22:00", "2027-01-27 04:00"),
        window("weekday 2", "2027-01-27 22:00", "2027-01-28 04:00"),
        window("weekday 3", "2027-02-10 22:00", "2027-02-11 04:00"),
    ),
    controls=(Control("", 3, 300 * GIB, 2_700_000),),
    assumptions=(Assumption("volumes", "thin", "no", 3, "decides how much fits"),),
)


def move(  # the parts of a way that tests vary
    number: int, name: str, source: str, target: str, starts: str, cutover: str
) -> Move:
    """Return a move with a copy of 60 GiB that ends at its cutover, held 14 days."""
    then = at(cutover)
    return Move(
        id=f"M{number:03}",
        volume=f"quay/{name}",
        source=f"quay/{source}",
        target=f"quay/{target}",
        size=60 * GIB,
        starts=at(starts),
        ends=then,
        window="weekday 2",
        cutover=then,
        released=at("2027-02-10 22:00"),
    )


PLAN = Plan(
    inventory="harbour.xlsx",
    digest="d1",
    version="0.1.0",
    status=Status.WITHIN_GAP,
    placements=(
        Placed(
            volume="quay/bk-db-01",
            source="quay/slow",
            target="quay/fast",
            reason=Reason.RELIEF,
            response_today=7_431,
            response_planned=512,
            response_limit=2_000,
        ),
        Placed(
            volume="quay/bk-log-01",
            source="quay/slow",
            target="quay/fast",
            reason=Reason.LIMIT,
        ),
        Placed(volume="quay/cam-01", source="quay/fast", target="quay/fast"),
    ),
    bought=(Bought("quay/fast", 2, 123_405),),
    moves=(
        move(1, "bk-db-01", "slow", "fast", "2027-01-26 22:00", "2027-01-28 02:30"),
        move(2, "bk-log-01", "slow", "fast", "2027-01-27 22:00", "2027-01-28 02:30"),
    ),
    bookings=(
        Booking(
            move="M001",
            window="weekday 1",
            starts=at("2027-01-26 22:00"),
            ends=at("2027-01-27 03:00"),
            rate=123_456_789,
        ),
        Booking(
            move="M001",
            window="weekday 2",
            starts=at("2027-01-27 22:00"),
            ends=at("2027-01-28 01:00"),
            rate=100 * MB,
        ),
        Booking(
            move="M002",
            window="weekday 2",
            starts=at("2027-01-27 22:30"),
            ends=at("2027-01-28 02:00"),
            rate=1,
        ),
    ),
    left=(Left("quay/cam-01", "quay/fast", "quay/slow", "a night of 3 h"),),
    uses=(
        Use(
            where="quay/fast",
            limit="pool-room",
            moment=Moment.TODAY,
            use=1 / 3,
            at_most=0.1 + 0.2,
            unit="GiB",
        ),
        Use(
            where="quay/slow",
            limit="pool-busy",
            moment=Moment.PLANNED,
            use=35.5,
            at_most=70,
            unit="%",
            hour="daily 10",
        ),
    ),
    goals=(
        Goal(name="missed", value=2, reached=2, bound=2, unit="steps"),
        Goal(
            name="relief",
            value=1200.25,
            reached=1234.5678901234567,
            bound=1235.0,
            unit="ms/s",
            stopped=Stopped.TIME,
        ),
    ),
)

NO_PLAN = Plan(
    inventory="harbour.xlsx",
    digest="d1",
    version="0.1.0",
    status=Status.NO_PLAN,
    shortages=(
        Shortage(
            limit="pool-room",
            where="quay/fast",
            amount=412.7,
            unit="GiB",
            sentence="quay/fast: 412.7 GiB short",
            remedy="buy one step of drives",
            hour="daily 10",
        ),
    ),
)

FINDINGS = (
    Finding(
        "number-text", Severity.WARNING, Place("volumes", "H7"), "=1+1 is text.", "-2"
    ),
    Finding("no-pool", Severity.ERROR, Place("volumes", "C9"), "No pool.", "Name one."),
)


def renamed(name: str) -> tuple[Estate, Plan]:
    """Return estate and plan with their first volume called something else."""
    first, *others = ESTATE.volumes
    estate = replace(ESTATE, volumes=(replace(first, name=name), *others))
    placed, *rest = PLAN.placements
    moved, *moves = PLAN.moves
    return estate, replace(
        PLAN,
        placements=(replace(placed, volume=f"quay/{name}"), *rest),
        moves=(replace(moved, volume=f"quay/{name}"), *moves),
    )
