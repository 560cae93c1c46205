"""The nights, instant by instant: two pools that trade places in one array."""

from dataclasses import replace
from random import Random

import pytest

from placer.audit import judge
from placer.estate import (
    Array,
    Estate,
    Expansion,
    Hour,
    Load,
    Media,
    Policy,
    Pool,
    Window,
)
from placer.estate import Volume as Vol
from placer.plan import (
    Booking,
    Bought,
    Move,
    Placed,
    Plan,
    Reason,
    Shortage,
    Status,
)
from placer.units import GIB, MB, MILLI

DAY = 1_440
NIGHTS = tuple(
    Window(
        name=f"w{day}",
        night=f"w{day}",
        opens=day * DAY,
        start=day * DAY,
        end=day * DAY + 480,
        zone="UTC",
    )
    for day in (1, 2, 3)
)
SPAN = 20
"""Minutes of a copy: 100 GiB at 100 MB/s take 17.9."""


def pool(name: str, usable: int) -> Pool:
    """Return a pool that may be filled and busied to the brim."""
    return Pool(
        array="a",
        name=name,
        media=Media.SPINNING,
        drives=1,
        usable=usable * GIB,
        fill_ceiling=1_000_000,
        busy_ceiling=1_000_000,
        skew=1_000_000,
        seek=1_000,
    )


def volume(name: str, home: str, reads: int = 0) -> Vol:
    """Return a volume of 100 GiB, held for a day."""
    return Vol(
        array="a",
        name=name,
        pool=home,
        provisioned=100 * GIB,
        occupied=100 * GIB,
        thin=False,
        load=(Load(reads * MILLI, 0, 0, 0),),
        hold_days=1,
    )


def estate(
    volumes: tuple[Vol, ...], pools: tuple[Pool, ...], cured_by: int = 0
) -> Estate:
    """Return an estate of one array and three nights."""
    return Estate(
        name="e",
        digest="d",
        hours=(Hour(None, 0, "00:00"),),
        volumes=volumes,
        pools=pools,
        arrays=(Array(name="a"),),
        policy=Policy(start=0, earliest=0, cured_by=cured_by),
        windows=NIGHTS,
    )


def plan(case: Estate, ways: dict[str, tuple[str, int, int]]) -> Plan:
    """Return a plan of volume -> target, night, minutes after the window opens."""
    moves, bookings = [], []
    for each in case.volumes:
        if each.name not in ways:
            continue
        target, night, minute = ways[each.name]
        opens = night * DAY
        moves.append(
            Move(
                id=each.name,
                volume=each.id,
                source=each.home,
                target=target,
                size=each.provisioned,
                starts=opens + minute,
                ends=opens + minute + SPAN,
                window=f"w{night}",
                cutover=opens + 100,
                released=opens + DAY,
            )
        )
        bookings.append(
            Booking(
                move=each.name,
                window=f"w{night}",
                starts=opens + minute,
                ends=opens + minute + SPAN,
                rate=100 * MB,
            )
        )
    placements = tuple(
        Placed(
            volume=each.id,
            source=each.home,
            target=ways[each.name][0] if each.name in ways else each.home,
            reason=Reason.MAKE_ROOM if each.name in ways else Reason.STAYS,
        )
        for each in case.volumes
    )
    return Plan(
        inventory="e",
        digest="d",
        version="0",
        status=Status.WITHIN_GAP,
        placements=placements,
        moves=tuple(moves),
        bookings=tuple(bookings),
    )


def broken(case: Estate, made: Plan) -> set[str]:
    """Return the rules broken, but for the claims, which these plans do not make."""
    return {f.code for f in judge(case, made) if not f.code.startswith("claim-")}


ROOMY = estate(
    (volume("x", "one"), volume("y", "two")), (pool("one", 200), pool("two", 100))
)
CHAIN = {"y": ("a/one", 1, 0), "x": ("a/two", 2, 0)}


def test_room_given_back_is_there_for_what_starts_at_the_same_instant() -> None:
    """`two` is full; y leaves it and is released as the second night opens."""
    assert broken(ROOMY, plan(ROOMY, CHAIN)) == set()


def test_room_is_not_there_a_minute_before_the_release() -> None:
    made = plan(ROOMY, CHAIN)
    late = replace(made.moves[1], released=2 * DAY + 1)
    held = tuple(replace(v, hold_days=1) if v.name == "x" else v for v in ROOMY.volumes)
    case = replace(ROOMY, volumes=held)
    assert broken(case, replace(made, moves=(made.moves[0], late))) == {
        "pool-room",
        "hold",
    }


def test_two_full_pools_cannot_trade_places() -> None:
    full = replace(ROOMY, pools=(pool("one", 100), pool("two", 100)))
    swap = {"y": ("a/one", 1, 0), "x": ("a/two", 1, 0)}
    assert broken(full, plan(full, swap)) == {"pool-room"}


def test_a_copy_takes_its_room_from_its_start_not_from_its_cutover() -> None:
    """X is released at the end of its first day; the copy of y starts an hour early."""
    case = estate(
        (volume("x", "one"), volume("y", "two")),
        (pool("one", 100), pool("two", 100), pool("three", 100)),
    )
    ways = {"x": ("a/three", 1, 0), "y": ("a/one", 2, 0)}
    assert broken(case, plan(case, ways)) == set()
    early = plan(case, {"x": ("a/three", 1, 0), "y": ("a/one", 1, 60)})
    assert broken(case, early) == {"pool-room"}


def test_a_pool_over_its_ceiling_may_be_left_but_not_filled_further() -> None:
    """The first-day rule: 300 GiB stand in 250 today, 200 will at the end."""
    crowd = (volume("x", "one"), volume("y", "one"), volume("z", "one"))
    case = estate(crowd, (pool("one", 250), pool("two", 100)))
    assert broken(case, plan(case, {"x": ("a/two", 1, 0)})) == set()
    fuller = estate((*crowd, volume("w", "two")), (pool("one", 250), pool("two", 400)))
    out = {"x": ("a/two", 1, 0), "y": ("a/two", 1, 30)}
    assert broken(fuller, plan(fuller, out | {"w": ("a/one", 2, 0)})) == set()
    assert broken(fuller, plan(fuller, out | {"w": ("a/one", 1, 60)})) == {"pool-room"}


def test_the_allowance_ends_on_the_day_of_the_cure() -> None:
    crowd = (volume("x", "one"), volume("y", "one"), volume("z", "one"))
    pools = (pool("one", 250), pool("two", 100))
    for cured, expected in ((2 * DAY, set()), (2 * DAY - 1, {"cured-by"})):
        case = estate(crowd, pools, cured_by=cured)
        assert broken(case, plan(case, {"x": ("a/two", 1, 0)})) == expected


@pytest.mark.parametrize(
    ("limit", "where", "expected"),
    [
        ("pool-room", "a/one", set()),
        ("pool-room", "a/two", {"cured-by"}),
        ("pool-thin", "a/one", {"cured-by"}),
    ],
)
def test_a_shortage_of_the_plan_excuses_the_limit_and_place_it_names(
    limit: str, where: str, expected: set[str]
) -> None:
    """300 GiB stand in 250 until the third day, due on the second."""
    crowd = (volume("x", "one"), volume("y", "one"), volume("z", "one"))
    case = estate(crowd, (pool("one", 250), pool("two", 100)), cured_by=DAY)
    made = plan(case, {"x": ("a/two", 1, 0)})
    assert broken(case, made) == {"cured-by"}
    assert broken(case, replace(made, shortages=(lack(limit, where),))) == expected


def lack(limit: str, where: str) -> Shortage:
    """Return a shortage of one limit at one place."""
    return Shortage(
        limit=limit, where=where, amount=50, unit="GiB", sentence="is short"
    )


def test_a_shortage_excuses_no_more_than_stands_today() -> None:
    """The first-day rule is kept whatever the plan names: 350 GiB where 300 are."""
    crowd = (volume("x", "one"), volume("y", "one"), volume("z", "one"))
    pools = (pool("one", 250), pool("two", 400))
    case = estate((*crowd, volume("w", "two")), pools, cured_by=2 * DAY)
    ways = {n: ("a/two", 1, 30 * at) for at, n in enumerate(("x", "y"))}
    made = plan(case, ways | {"w": ("a/one", 1, 60)})
    named = replace(made, shortages=(lack("pool-room", "a/one"),))
    assert broken(case, named) == {"pool-room"}


def test_load_goes_where_it_is_served_at_the_cutover() -> None:
    """Each pool serves 1,000 reads/s; x and y ask for 600, and trade places."""
    pair = (volume("x", "one", 600), volume("y", "two", 600))
    case = estate(pair, (pool("one", 200), pool("two", 200)))
    at_once = {"x": ("a/two", 1, 0), "y": ("a/one", 1, 30)}
    assert broken(case, plan(case, at_once)) == set()
    in_turn = {"x": ("a/two", 1, 0), "y": ("a/one", 2, 0)}
    assert broken(case, plan(case, in_turn)) == {"pool-busy"}


def test_room_bought_counts_from_its_delivery() -> None:
    """One step doubles a pool of 100 GiB; a copy needs it in the second night."""
    for days, expected in ((2, set()), (3, {"pool-room"})):
        step = Expansion(drives=1, price=0, at_most=1, delivery_days=days)
        grown = replace(pool("two", 100), expansion=step)
        pair = (volume("x", "one"), volume("y", "two"))
        case = estate(pair, (pool("one", 100), grown))
        made = plan(case, {"x": ("a/two", 2, 0)})
        bought = replace(made, bought=(Bought("a/two", 1, 0),))
        assert broken(case, bought) == expected


def test_a_pool_without_drives_is_judged_once_they_come() -> None:
    """Drives come on the second day; 1,200 reads/s are too many for one of them."""
    step = Expansion(drives=1, price=0, at_most=1, delivery_days=2)
    bare = replace(pool("two", 100), drives=0, expansion=step)
    for reads, expected in ((1_000, set()), (1_200, {"pool-busy"})):
        wide = replace(pool("one", 100), drives=2)
        case = estate((volume("x", "one", reads),), (wide, bare))
        made = plan(case, {"x": ("a/two", 3, 0)})
        assert broken(case, replace(made, bought=(Bought("a/two", 1, 0),))) == expected


@pytest.mark.parametrize("seed", range(60))
def test_the_ledger_agrees_with_a_count_all_ten_minutes(seed: int) -> None:
    dice = Random(seed)
    names = ("one", "two", "three")
    crowd = tuple(volume(f"v{n}", dice.choice(names)) for n in range(5))
    case = estate(
        crowd, tuple(pool(name, dice.choice((200, 300, 400))) for name in names)
    )
    ways = {
        each.name: (f"a/{dice.choice(names)}", dice.choice((1, 2, 3)), 10 * n)
        for n, each in enumerate(crowd)
    }
    ways = {n: way for n, way in ways.items() if way[0] != f"a/{home(case, n)}"}
    made = plan(case, ways)
    assert ("pool-room" in broken(case, made)) == overfull(case, made)


def home(case: Estate, name: str) -> str:
    """Return the pool where a volume is today."""
    return next(each.pool for each in case.volumes if each.name == name)


def overfull(case: Estate, made: Plan) -> bool:
    """Count all ten minutes of six days: over the room and over what stands today."""
    moves = {move.volume: move for move in made.moves}

    def stands(minute: int, where: str) -> int:
        there = 0
        for each in case.volumes:
            move = moves.get(each.id)
            if move is None:
                there += each.home == where
            else:
                there += move.source == where and minute < move.released
                there += move.target == where and minute >= move.starts
        return there * 100 * GIB

    return any(
        stands(minute, each.id) > max(each.usable, stands(0, each.id))
        for each in case.pools
        for minute in range(0, 6 * DAY, 10)
    ) or any(stands(6 * DAY, each.id) > each.usable for each in case.pools)
