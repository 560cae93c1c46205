"""The verdict as a whole: a wear case worked by hand, and what a plan may lack."""

from dataclasses import replace
from fractions import Fraction

import pytest

from placer.audit import goal_values, judge, judge_placement
from placer.audit.case import Case
from placer.audit.limits import Reading, Scene, readings
from placer.audit.response import Answers
from placer.estate import (
    Array,
    Control,
    Estate,
    Hour,
    Importance,
    Load,
    Media,
    Policy,
    Pool,
    Route,
    Volume,
)
from placer.findings import Finding
from placer.plan import Moment, Placed, Plan, Status, Use
from placer.units import GB, GIB, MB, MILLI

HOURS = tuple(Hour(None, hour, f"{hour:02}:00") for hour in range(24))


def asked(hour: int) -> Load:
    """Return reads for one hour, heavy writing for three, light for the rest."""
    if hour == 0:
        return Load(150_000 * MILLI, 0, 0, 0)
    return Load(0, 0, 0, (380 if hour < 4 else 63) * MB)


DRIVES = Pool(
    array="a",
    name="flash",
    media=Media.FLASH,
    drives=12,
    data=5,
    parity=1,
    drive_size=3_840 * GB,
    reduction=2_000_000,
    skew=1_000_000,
    read_time=100,
    reads_at_most=400_000 * MILLI,
    dwpd=1_000_000,
    warranty_days=1_825,
    wear_used=300_000,
    life_days=1_460,
    array_overhead=1_000_000,
)
ESTATE = Estate(
    name="e",
    digest="d",
    hours=HOURS,
    volumes=(
        Volume(
            array="a",
            name="v",
            pool="flash",
            provisioned=GIB,
            occupied=GIB,
            thin=False,
            load=tuple(asked(hour) for hour in range(24)),
        ),
    ),
    pools=(DRIVES,),
    arrays=(
        Array(
            name="a",
            reads_at_most=120_000 * MILLI,
            writes_at_most=120_000 * MILLI,
            controller_ceiling=1_000_000,
            uneven=1_000_000,
        ),
    ),
    policy=Policy(start=0, earliest=0),
)
STAYING = Plan(
    inventory="e",
    digest="d",
    version="0",
    status=Status.PROVEN,
    placements=(Placed(volume="a/v", source="a/flash", target="a/flash"),),
)


def one(code: str) -> Reading:
    """Return the one reading of a limit today."""
    case = Case(ESTATE, STAYING)
    return next(readings(Scene(case, case.today, case.homes, {}), code))


def test_wear_counts_the_mean_of_the_day_not_its_peak() -> None:
    """By hand: 100 MB/s = 8.64 TB/day x 2 / 2 against 84,096 x 0.7 / 1,460 = 40.32."""
    wear = one("pool-wear")
    assert float(wear.use) / 1_460 == pytest.approx(8.64)
    assert float(wear.at_most) / 1_460 == pytest.approx(40.32)


def test_drives_are_counted_by_their_rate_not_by_their_response() -> None:
    """By hand: 150,000 of 12 x 400,000 reads/s = 3.125 %."""
    busy = one("pool-busy")
    assert (float(busy.use), busy.hour) == (3.125, 0)


def test_the_limit_that_binds_is_named_with_figure_and_hour() -> None:
    """By hand: 150,000 of the 120,000 requests/s of the controller left, 125 %."""
    (finding,) = judge_placement(ESTATE, STAYING)
    assert finding.code == "controller-busy"
    assert "125 % of at most 100 % in 00:00" in finding.sentence


def test_no_plan_is_held_to_trust_alone() -> None:
    none = Plan(inventory="e", digest="d", version="0", status=Status.NO_PLAN)
    assert judge(ESTATE, none) == ()
    other = Plan(inventory="e", digest="", version="0", status=Status.NO_PLAN)
    assert codes(judge(ESTATE, other)) == {"digest"}


def test_uses_called_nearest_illustrate_that_there_is_no_plan() -> None:
    nearest = Use(
        where="a/flash",
        limit="pool-room",
        moment=Moment.NEAREST,
        use=9,
        at_most=8,
        unit="GiB",
    )
    none = Plan(
        inventory="e", digest="d", version="0", status=Status.NO_PLAN, uses=(nearest,)
    )
    assert judge(ESTATE, none) == ()
    claimed = replace(none, uses=(replace(nearest, moment=Moment.PLANNED),))
    assert codes(judge(ESTATE, claimed)) == {"claim-uses"}


def test_a_plan_called_done_must_place_every_volume() -> None:
    empty = Plan(inventory="e", digest="d", version="0", status=Status.PROVEN)
    assert "one-place" in codes(judge(ESTATE, empty))


def test_goals_come_in_the_order_they_are_solved() -> None:
    assert list(goal_values(ESTATE, STAYING)) == ["missed", "money", "relief", "effort"]
    assert set(goal_values(ESTATE, STAYING).values()) == {0}


def codes(findings: tuple[Finding, ...]) -> set[str]:
    """Return the codes of findings."""
    return {finding.code for finding in findings}


# Array names count before site names, the source first.
@pytest.mark.parametrize(
    ("routes", "expected"),
    [
        ((("here", "there"), ("here", "b"), ("a", "there"), ("a", "b")), ("a", "b")),
        ((("here", "there"), ("here", "b"), ("a", "there")), ("a", "there")),
        ((("here", "there"), ("here", "b")), ("here", "b")),
        ((("here", "there"),), ("here", "there")),
        ((("there", "here"), ("b", "a")), None),
    ],
)
def test_the_most_exact_route_counts(
    routes: tuple[tuple[str, str], ...], expected: tuple[str, str] | None
) -> None:
    estate = Estate(
        name="e",
        digest="d",
        hours=HOURS,
        volumes=(),
        pools=(
            Pool(array="a", name="p", media=Media.FLASH),
            Pool(array="b", name="p", media=Media.FLASH),
        ),
        arrays=(Array(name="a", site="here"), Array(name="b", site="there")),
        policy=Policy(start=0, earliest=0),
        routes=tuple(Route(source=near, target=far) for near, far in routes),
    )
    found = Case(estate, STAYING).route("a/p", "b/p")
    assert (None if found is None else (found.source, found.target)) == expected


def test_applications_chain_through_volumes_with_several() -> None:
    volumes = [
        Volume(
            array="a",
            name=name,
            pool="p",
            provisioned=0,
            occupied=0,
            thin=False,
            load=(),
            applications=applications,
        )
        for name, applications in (
            ("1", ("tickets",)),
            ("2", ("mail",)),
            ("3", ("tickets", "books")),
            ("4", ()),
            ("5", ("books",)),
        )
    ]
    chains = Case(ESTATE, STAYING).chains(volumes)
    assert sorted(map(sorted, chains)) == [["a/1", "a/3", "a/5"], ["a/2"], ["a/4"]]


# Steps of 10 % beyond a tolerance of 10 %, at most ten, by the register.
@pytest.mark.parametrize(
    ("measured", "steps"),
    [(11_000, 0), (11_001, 1), (12_000, 1), (12_001, 2), (20_900, 10), (90_000, 10)],
)
def test_a_response_limit_is_missed_in_steps(measured: int, steps: int) -> None:
    waiting = replace(
        ESTATE.volumes[0],
        response_measured=measured,
        response_limit=10_000,
        importance=Importance.HIGH,
    )
    estate = replace(ESTATE, volumes=(waiting,))
    assert goal_values(estate, STAYING)["missed"] == 4 * steps


# A gain counts from 30 % up, a loss whole; 100 requests/s, weight 2.
@pytest.mark.parametrize(
    ("measured", "relief"), [(142, 0), (143, Fraction(86, 10)), (90, -2), (100, 0)]
)
def test_small_gains_are_none_and_losses_count(
    measured: int, relief: Fraction | int
) -> None:
    """The target reads in 100 µs and its drives never wait."""
    calm = replace(DRIVES, reads_at_most=0)
    moving = replace(
        ESTATE.volumes[0],
        load=(Load(100 * MILLI, 0, 0, 0),) * 24,
        response_measured=measured,
    )
    pools = (calm, replace(calm, name="other"))
    estate = replace(ESTATE, volumes=(moving,), pools=pools)
    placed = replace(STAYING.placements[0], target="a/other")
    values = goal_values(estate, replace(STAYING, placements=(placed,)))
    assert values["relief"] == relief


@pytest.mark.parametrize(("typed", "agrees"), [(1_000, True), (999, False)])
def test_typed_totals_may_be_off_by_half_a_percent(typed: int, *, agrees: bool) -> None:
    volume = replace(ESTATE.volumes[0], provisioned=1_005, occupied=0)
    control = Control("a", 1, typed, None)
    estate = replace(ESTATE, volumes=(volume,), controls=(control,))
    assert ("control" not in codes(judge(estate, STAYING))) is agrees


def test_flash_without_drives_has_no_wait_to_tell() -> None:
    bare = replace(DRIVES, drives=0, usable=GIB)
    case = Case(replace(ESTATE, pools=(bare,)), STAYING)
    assert Answers(case).today(case.estate.volumes[0]) == DRIVES.read_time
