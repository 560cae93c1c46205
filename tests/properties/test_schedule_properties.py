"""Whatever is asked of the nights, what they book passes the audit; nothing is lost."""

from dataclasses import replace

from booked import Case, booked
from hypothesis import given, settings
from hypothesis import strategies as st
from smallestate import START, estate, load, pool, volume, window

from placer.estate import Array, Estate, Expansion, Media, Pool, Route, Volume, Window
from placer.units import GB, MB, MINUTES_PER_DAY, MS, PPM

HOURS = 2
POOLS = ("a/one", "a/two", "b/one", "b/two", "c/one")
APPLICATIONS = ("mail", "news", "gates")

RATES = st.sampled_from((0, 90 * MB, 200 * MB, 333_333_333))
FEW = st.integers(0, 3)


@st.composite
def pools(draw: st.DrawFn) -> list[Pool]:
    """Return pools of disks that carry some of what stands in them, with a step."""
    found = []
    for id_ in POOLS:
        made = pool(
            id_,
            Media.SPINNING,
            draw(st.integers(300, 2_000)),
            drives=draw(st.integers(1, 8)),
            seek=10 * MS,
            reduction=draw(st.sampled_from((PPM, 1_700_000, 2_300_001))),
            thin_at_most=draw(st.sampled_from((0, 2 * PPM, 9 * PPM))),
        )
        step = Expansion(
            drives=made.drives,
            price=0,
            at_most=1,
            delivery_days=draw(st.integers(0, 4)),
        )
        found.append(replace(made, expansion=step))
    return found


@st.composite
def volumes(draw: st.DrawFn) -> list[Volume]:
    """Return volumes with applications, loads, growth and holds of their own."""
    return [
        replace(
            volume(
                f"v{number}",
                draw(st.sampled_from(POOLS)),
                draw(st.integers(1, 700)),
                *(load(draw(st.integers(0, 40))) for _ in range(HOURS)),
            ),
            thin=draw(st.booleans()),
            occupied=draw(st.integers(0, 300 * GB)),
            capacity_growth=draw(st.sampled_from((0, 333_333))),
            load_growth=draw(st.sampled_from((0, 250_000))),
            hold_days=draw(FEW),
            applications=tuple(
                draw(st.sets(st.sampled_from(APPLICATIONS), max_size=2))
            ),
        )
        for number in range(draw(st.integers(1, 9)))
    ]


@st.composite
def windows(draw: st.DrawFn) -> tuple[Window, ...]:
    """Return nights with limits, some cut in two, some that overlap."""
    found: list[Window] = []
    for day in draw(st.sets(st.integers(1, 12), min_size=2, max_size=7)):
        night = replace(
            window(day, draw(st.integers(1, 9))),
            rate=draw(RATES),
            at_once=draw(FEW),
            cutovers=draw(FEW),
            arrays=draw(st.sampled_from(((), ("a", "b"), ("a", "b", "c")))),
            zone=draw(st.sampled_from(("UTC", "Europe/Berlin"))),
        )
        middle = (night.start + night.end) // 2 + draw(st.integers(0, 20))
        overlap = draw(st.sampled_from((None, 0, 45)))
        if overlap is None:
            found.append(night)
            continue
        found.append(replace(night, name=f"{night.name} (1)", end=middle + overlap))
        found.append(replace(night, name=f"{night.name} (2)", start=middle + 5))
    return tuple(found)


@st.composite
def arrays(draw: st.DrawFn) -> list[Array]:
    return [
        Array(
            name=name,
            site="hall",
            one_copy=draw(RATES),
            copies_in=draw(RATES),
            copies_out=draw(RATES),
            copies_at_once=draw(FEW),
            volumes_at_most=draw(st.sampled_from((0, 5, 9))),
            reads_at_most=draw(st.sampled_from((0, 150_000))),
        )
        for name in "abc"
    ]


ROUTES = st.sampled_from(
    (
        (),
        (Route(source="hall", target="hall", together=250 * MB),),
        (
            Route(source="a", target="hall", one_copy=70 * MB, together=100 * MB),
            Route(source="hall", target="hall"),
        ),
    )
)


@st.composite
def cases(draw: st.DrawFn) -> tuple[Estate, dict[str, str], dict[str, int]]:
    """Return an estate, where its volumes shall go, and the steps bought."""
    crowd = draw(volumes())
    made = estate(crowd, draw(pools()), arrays=draw(arrays()), windows=draw(windows()))
    policy = replace(
        made.policy,
        earliest=START + draw(st.integers(0, 3)) * MINUTES_PER_DAY + 1_350,
        cured_by=draw(st.sampled_from((0, START + 3 * MINUTES_PER_DAY))),
        finish_by=draw(st.sampled_from((0, START + 9 * MINUTES_PER_DAY))),
    )
    made = replace(made, policy=policy, routes=draw(ROUTES))
    ways = {v.name: draw(st.sampled_from(POOLS)) for v in crowd}
    bought = {id_: draw(st.integers(0, 1)) for id_ in POOLS}
    return made, ways, {id_: steps for id_, steps in bought.items() if steps}


def lost(case: Case) -> set[str]:
    """Return what is neither moved nor left over, or is both."""
    moved = {move.volume for move in case.schedule.moves}
    left = {each.volume for each in case.schedule.left}
    asked = {transfer.volume for transfer in case.transfers}
    return (asked ^ (moved | left)) | (moved & left)


@settings(max_examples=150, deadline=None, derandomize=True)
@given(cases())
def test_every_schedule_passes_the_audit(
    drawn: tuple[Estate, dict[str, str], dict[str, int]],
) -> None:
    made, ways, bought = drawn
    case = booked(made, ways, bought)
    assert case.broken == ({"cured-by"} if case.schedule.overruns else set())
    assert lost(case) == set()
    assert all(case.left.values())
    assert booked(made, ways, bought).schedule == case.schedule


@settings(max_examples=40, deadline=None, derandomize=True)
@given(volumes(), st.data())
def test_all_is_placed_where_nothing_is_short(
    crowd: list[Volume], data: st.DataObject
) -> None:
    """Roomy, fast pools and sixty nights without limits: nothing may be left."""
    roomy = [
        pool(id_, Media.SPINNING, 10_000, drives=100, seek=10 * MS) for id_ in POOLS
    ]
    ways = {v.name: data.draw(st.sampled_from(POOLS)) for v in crowd}
    case = booked(estate(crowd, roomy), ways)
    assert case.left == {}
    assert case.broken == set()


@settings(max_examples=60, deadline=None, derandomize=True)
@given(cases())
def test_copies_carry_no_more_than_a_minute_too_much(
    drawn: tuple[Estate, dict[str, str], dict[str, int]],
) -> None:
    case = booked(*drawn)
    for move in case.schedule.moves:
        pieces = [b for b in case.schedule.bookings if b.move == move.id]
        carried = sum(b.rate * 60 * (b.ends - b.starts) for b in pieces)
        assert 0 <= carried - move.size <= 60 * max(b.rate for b in pieces)
