"""What saturated drives held back counts where flash serves it, and nowhere else."""

from dataclasses import replace
from fractions import Fraction

import pytest

from placer.audit import judge
from placer.audit.case import Case
from placer.audit.goals import values_of
from placer.audit.limits import Scene, readings
from placer.audit.response import Answers
from placer.estate import (
    Array,
    Estate,
    Hour,
    Load,
    Media,
    Policy,
    Pool,
    Tenant,
    Volume,
    Window,
)
from placer.plan import Move, Placed, Plan, Status
from placer.units import KB, MB, MILLI, PPM

DAY = 1_440
DISKS = Pool(
    array="a",
    name="disks",
    media=Media.SPINNING,
    drives=10,
    usable=1,
    skew=1_000_000,
    seek=10_000,
)
FLASH = Pool(
    array="b",
    name="flash",
    media=Media.FLASH,
    drives=10,
    drive_size=MB,
    usable=1,
    skew=1_000_000,
    read_time=100,
    reads_at_most=1_000 * MILLI,
    writes_at_most=500 * MILLI,
    drive_rate=100 * MB,
    dwpd=PPM,
    warranty_days=1_825,
    life_days=1_000,
    array_overhead=1_000_000,
)
IDLE = Load(0, 0, 0, 0)
ASKS = Load(300 * MILLI, 50 * MILLI, 3 * MB, 500 * KB)
"""350 requests/s keep ten disks of 10 ms busy by 35 %."""


def volume(name: str = "v", home: str = "a/disks", load: Load = ASKS) -> Volume:
    """Return a volume of no size that asks in the second hour only."""
    array, pool = home.split("/")
    return Volume(
        array=array,
        name=name,
        pool=pool,
        provisioned=0,
        occupied=0,
        thin=False,
        load=(IDLE, load),
    )


def estate(
    *volumes: Volume, disks: Pool = DISKS, flash: Pool = FLASH, latent: int = 1_500_000
) -> Estate:
    """Return disks and flash in two arrays."""
    array = Array(
        name="a",
        reads_at_most=5_000 * MILLI,
        writes_at_most=2_500 * MILLI,
        uneven=1_000_000,
    )
    night = Window(name="w", night="w", opens=DAY, start=DAY, end=DAY + 480, zone="UTC")
    return Estate(
        name="e",
        digest="d",
        hours=(Hour(None, 0, "00:00"), Hour(None, 1, "01:00")),
        volumes=volumes or (volume(),),
        pools=(disks, flash),
        arrays=(array, replace(array, name="b")),
        policy=Policy(start=0, earliest=0, horizon_months=0, latent_demand=latent),
        windows=(night,),
    )


def case(fleet: Estate, target: str = "b/flash") -> Case:
    """Return the case of a plan that takes the first volume to a pool."""
    first = fleet.volumes[0]
    placed = Placed(volume=first.id, source=first.home, target=target)
    move = Move(
        id="m",
        volume=first.id,
        source=first.home,
        target=target,
        size=0,
        starts=DAY,
        ends=DAY + 1,
        window="w",
        cutover=DAY + 100,
        released=15 * DAY,
    )
    plan = Plan(
        inventory="e",
        digest="d",
        version="0",
        status=Status.PROVEN,
        placements=(placed,),
        moves=(move,) if target != first.home else (),
    )
    return Case(fleet, plan)


def uses(there: Case, pool: str = "b/flash") -> dict[str, Fraction]:
    """Return the uses of a pool and its array as placed."""
    scene = Scene(there, there.horizon, there.targets, {})
    where = {pool, there.pools[pool].array}
    return {
        code: row.use
        for code in ("pool-busy", "controller-busy", "pool-wear")
        for row in readings(scene, code)
        if row.where in where
    }


def times(factor: Fraction | int) -> dict[str, Fraction]:
    """Return what the volume takes of flash [%, %, TB], a number of times.

    300 / 1000 + 50 / 500 + 3.5 / 100 = 0.435, over 10; 300 / 5000 + 50 / 2500; in the
    mean of two hours, the first idle, 0.25 MB/s x 86,400 s x 1,000.
    """
    right = {
        "pool-busy": Fraction(435, 100),
        "controller-busy": Fraction(8),
        "pool-wear": Fraction(216, 10),
    }
    return {code: use * factor for code, use in right.items()}


SWOLLEN = Fraction(3, 2)


@pytest.mark.parametrize(
    ("measured", "factor"),
    [(950_000, SWOLLEN), (PPM, SWOLLEN), (949_999, 1), (1, 1), (0, 1)],
)
def test_disks_measured_at_95_percent_held_back(
    measured: int, factor: Fraction | int
) -> None:
    """Modelled they are busy by 35 %."""
    worn = replace(DISKS, busy_measured=measured)
    assert uses(case(estate(disks=worn))) == times(factor)


# Beside the 35 % of the volume itself others ask for 60 %, or not quite, of ten disks.
@pytest.mark.parametrize(("others", "factor"), [(600_000, SWOLLEN), (599_999, 1)])
def test_disks_modelled_at_95_percent_held_back(
    others: int, factor: Fraction | int
) -> None:
    beside = volume("w", load=Load(others, 0, 0, 0))
    assert uses(case(estate(volume(), beside))) == times(factor)
    measured = replace(DISKS, busy_measured=500_000)
    assert uses(case(estate(volume(), beside, disks=measured))) == times(1)


def test_the_busiest_hour_of_the_disks_counts_not_that_of_the_volume() -> None:
    others = replace(volume("w"), load=(Load(960 * MILLI, 0, 0, 0), IDLE))
    assert uses(case(estate(volume(), others))) == times(SWOLLEN)


def test_saturation_is_judged_by_what_is_asked_today() -> None:
    """A load that grows to 97 % by the horizon, and one that fell from 97 to 48."""
    for growth, requests, factor in (
        (1_000_000, 135 * MILLI, 2),
        (-500_000, 620 * MILLI, SWOLLEN),
    ):
        others = replace(volume("w", load=Load(requests, 0, 0, 0)), load_growth=growth)
        fleet = estate(replace(volume(), load_growth=growth), others)
        later = replace(fleet, policy=replace(fleet.policy, horizon_months=12))
        grown = 1 + Fraction(growth, PPM)
        expected = factor if growth > 0 else factor * grown
        assert uses(case(later)) == times(expected)


def test_saturation_knows_caps_hits_and_measured_factors() -> None:
    """950 requests/s: half are capped, or hit, or all counted 0.9 times."""
    others = volume("w", load=Load(600 * MILLI, 0, 0, 0))
    full = estate(volume(), others)
    capped = replace(
        estate(volume(), replace(others, tenant="t")),
        tenants=(Tenant(name="t", requests_cap=300 * MILLI),),
    )
    hit = estate(volume(), replace(others, read_hits=500_000))
    slower = replace(DISKS, measured_factor=900_000)
    assert uses(case(full)) == times(SWOLLEN)
    assert uses(case(capped)) == times(1)
    assert uses(case(hit)) == times(1)
    assert uses(case(estate(volume(), others, disks=slower))) == times(1)


SATURATED = replace(DISKS, busy_measured=960_000)


@pytest.mark.parametrize("latent", [1_000_000, 1_250_000, 2_000_000])
def test_the_policy_says_how_much_was_held_back(latent: int) -> None:
    assert uses(case(estate(disks=SATURATED, latent=latent))) == times(
        Fraction(latent, PPM)
    )


def test_a_copy_does_not_swell() -> None:
    """By hand: 1 MB x 1 written once beside 1.5 x 21.6 TB."""
    fleet = estate(replace(volume(), provisioned=MB), disks=SATURATED)
    assert uses(case(fleet))["pool-wear"] == Fraction(324, 10) + Fraction(MB, 10**12)


def test_nothing_swells_but_from_disks_to_flash() -> None:
    media = {Media.FLASH: times(1), Media.MIXED: times(1), Media.UNMODELLED: times(1)}
    for kind, expected in media.items():
        home = replace(SATURATED, media=kind)
        assert uses(case(estate(disks=home))) == expected
    disks = replace(SATURATED, array="b", name="flash", busy_measured=0)
    assert uses(case(estate(disks=SATURATED, flash=disks))) == {
        "pool-busy": 35,
        "controller-busy": 8,
    }


def test_a_volume_of_flash_beside_it_asks_what_it_asks() -> None:
    there = volume("w", home="b/flash")
    fleet = estate(volume(), there, disks=SATURATED)
    assert uses(case(fleet)) == times(SWOLLEN + 1)


def test_at_home_a_volume_asks_what_was_measured() -> None:
    there = case(estate(disks=SATURATED), target="a/disks")
    assert uses(there, "a/disks") == {"pool-busy": 35, "controller-busy": 8}


def test_an_array_counts_each_volume_by_its_pool() -> None:
    """By hand: one array: 1.5 x 8 % from flash and 8 % from disks."""
    near = replace(FLASH, array="a")
    fleet = estate(volume(), volume("w"), disks=SATURATED, flash=near)
    assert uses(case(fleet, "a/flash"), "a/flash")["controller-busy"] == 20


def test_responses_and_relief_take_loads_as_measured() -> None:
    settings = [estate(disks=SATURATED, latent=latent) for latent in (PPM, 2 * PPM)]
    told = []
    for fleet in settings:
        there = case(fleet)
        answers, asking = Answers(there), fleet.volumes[0]
        promised = answers.promised(asking, "b/flash")
        planned, relief = answers.planned(asking), values_of(there, answers)["relief"]
        assert 0 < planned < promised < answers.today(asking)
        told.append((planned, promised, relief))
    assert told[0] == told[1]


def found(fleet: Estate, target: str = "b/flash") -> set[str]:
    """Return which sums over the nights are broken."""
    broken = {"pool-busy", "controller-busy"}
    there = case(fleet, target)
    return {finding.code for finding in judge(fleet, there.plan)} & broken


def shrunk(ceilings: tuple[int, int], measured: int) -> Estate:
    """Return an estate where all fits at the horizon, when nothing is asked.

    Controllers of `a` and `b`, and flash, have the ceilings [ppm].
    """
    asking = replace(volume(), load_growth=-PPM)
    busy, controllers = ceilings
    fleet = estate(
        asking,
        disks=replace(DISKS, busy_measured=measured),
        flash=replace(FLASH, busy_ceiling=busy),
    )
    arrays = tuple(
        replace(array, controller_ceiling=controllers) for array in fleet.arrays
    )
    far = replace(fleet.policy, start=3 * DAY, horizon_months=12)
    return replace(fleet, arrays=arrays, policy=far)


# 4.35 % of flash and 8 % of controllers as measured, 6.525 and 12 swollen.  The last
# window ends before the policy starts, so the nights count the loads of today.
@pytest.mark.parametrize(
    ("ceilings", "measured", "codes"),
    [
        ((65_250, 120_000), 960_000, set()),
        ((65_249, 120_000), 960_000, {"pool-busy"}),
        ((65_250, 119_999), 960_000, {"controller-busy"}),
        ((43_500, 80_000), 940_000, set()),
    ],
)
def test_from_its_cutover_a_volume_asks_for_more(
    ceilings: tuple[int, int], measured: int, codes: set[str]
) -> None:
    assert found(shrunk(ceilings, measured)) == codes


def test_the_first_day_knows_no_latent_demand() -> None:
    """Controllers of one array: 8 % at home today, over 7 %; 12 % of 7 from flash.

    Today's placement excuses 8 %, which another pool of disks would have.
    """
    for near, codes in (
        (replace(FLASH, array="a", busy_ceiling=PPM), {"controller-busy"}),
        (replace(DISKS, name="flash", busy_ceiling=PPM), set()),
    ):
        fleet = estate(replace(volume(), load_growth=-PPM), disks=SATURATED, flash=near)
        arrays = tuple(replace(a, controller_ceiling=70_000) for a in fleet.arrays)
        far = replace(fleet.policy, start=3 * DAY, horizon_months=12)
        assert found(replace(fleet, arrays=arrays, policy=far), "a/flash") == codes


def test_what_comes_back_from_flash_takes_its_whole_demand_along() -> None:
    """The volumes swap: each ledger ends as the planned placement has it."""
    back = replace(volume("w", home="b/flash"), load_growth=-PPM)
    fleet = estate(
        replace(volume(), load_growth=-PPM),
        back,
        disks=SATURATED,
        flash=replace(FLASH, busy_ceiling=65_250),
    )
    far = replace(fleet.policy, start=3 * DAY, horizon_months=12)
    there = case(replace(fleet, policy=far))
    one = there.plan.moves[0]
    other = replace(one, id="n", volume=back.id, source=one.target, target=one.source)
    plan = replace(
        there.plan,
        moves=(one, other),
        placements=(
            *there.plan.placements,
            Placed(volume=back.id, source=back.home, target="a/disks"),
        ),
    )
    codes = {finding.code for finding in judge(there.estate, plan)}
    assert "pool-busy" not in codes
    tight = replace(there.estate.pools[1], busy_ceiling=65_249)
    tighter = replace(there.estate, pools=(there.estate.pools[0], tight))
    assert "pool-busy" in {finding.code for finding in judge(tighter, plan)}
