"""Estates in which nothing is wrong: worked by hand, nothing may move without a gain.

Invented figures.  A read takes 0.5 ms from flash and was measured at 8 ms on the
spinning pools, so that a volume saves 7.5 ms a read, weight 2, when it moves to flash.
"""

from dataclasses import replace

import pytest
from smallestate import estate, load, policy, pool, volume

from placer import audit, planner
from placer.candidates.table import Candidates, candidates
from placer.candidates.uses import limit_of
from placer.estate import Aim, Estate, Load, Media, Volume
from placer.placement.place import Placement, place
from placer.plan import Goal, Reason, Status
from placer.units import MILLI, MS, PERCENT

SECONDS = 20.0
SIZE = 20
FAST, SLOW = 30, 35
SAVED = 2 * 7.5
FLASH, SPINNING = ("quay/fast",), ("quay/slow", "depot/slow")


def requests(number: int) -> float:
    """Return requests/s of the volumes on spinning pools, few of them busy: 1 to 94.

    The growth from one to the next is such that only one set of volumes has 95 % of the
    best relief with the fewest moves.
    """
    return float(1.067**number)


def day_and_night(reads: float) -> tuple[Load, Load]:
    return load(reads, kib=0), load(reads / 2, kib=0)


def on_flash(number: int) -> Volume:
    """Return a volume that is busier than any on the spinning pools."""
    asked = day_and_night(100 + number)
    return volume(f"busy{number:02}", FLASH[0], SIZE, *asked, measured=0.5)


def on_spinning(number: int) -> Volume:
    asked = day_and_night(requests(number))
    return volume(f"calm{number:02}", SPINNING[number % 2], SIZE, *asked, measured=8)


def grown(record: Volume, limit: float) -> Volume:
    """Return a volume whose load grows by 5 % a year, with a response limit [ms]."""
    return replace(record, load_growth=5 * PERCENT, response_limit=round(limit * MS))


def quiet(aim: Aim, flash: int = FAST * SIZE) -> Estate:
    """Return 30 volumes on ``flash`` [GiB] of flash and 70 on two spinning pools.

    The flash is full to the last byte where it has 600 GiB.
    """
    spinning = {"seek": 4_000, "rpm": 10_000, "drives": 24}
    return estate(
        [grown(on_flash(number), 1) for number in range(FAST)]
        + [grown(on_spinning(number), 20) for number in range(1, 2 * SLOW + 1)],
        [
            pool(FLASH[0], Media.FLASH, flash, read_time=500),
            *(pool(name, Media.SPINNING, 1_000, **spinning) for name in SPINNING),
        ],
        policy(aim, horizon_months=12),
    )


def placed(table: Candidates) -> Placement:
    found = place(table, SECONDS)
    assert isinstance(found, Placement)
    return found


def moved(table: Candidates, found: Placement) -> list[int]:
    return [row for row, p in enumerate(found.places) if p != table.home[row]]


def goal(found: Placement, name: str) -> Goal:
    return next(goal for goal in found.goals if goal.name == name)


def test_the_estate_is_quiet_today_and_at_the_horizon() -> None:
    """What the trials rest on: 100 volumes, no limit over, no response missed."""
    table = candidates(quiet(Aim.BEST_USE))
    nothing = table.home * 0
    assert len(table.volumes) == 100
    for block in (*table.limits_today, *table.limits):
        worst = block.use(table.home).max(axis=1)
        allowed = [limit_of(block, o, nothing) for o in range(len(block.owners))]
        assert (worst <= allowed).all()
    assert not table.missed[range(100), table.home].any()


@pytest.mark.parametrize("flash", [FAST * SIZE, 2 * FAST * SIZE])
def test_least_change_moves_nothing(flash: int) -> None:
    """Not even where half the flash is empty."""
    table = candidates(quiet(Aim.LEAST_CHANGE, flash))
    found = placed(table)
    assert moved(table, found) == []
    assert [goal.gap for goal in found.goals] == [0, 0, 0, 0]


def test_best_use_moves_nothing_where_flash_is_full_of_busier_volumes() -> None:
    table = candidates(quiet(Aim.BEST_USE))
    found = placed(table)
    assert moved(table, found) == []
    assert goal(found, "relief").bound == pytest.approx(0, abs=1e-6)


@pytest.mark.parametrize("aim", list(Aim))
def test_the_plan_of_a_quiet_estate_is_to_leave_it(aim: Aim) -> None:
    """End to end: no move, no night, proven best, and the audit agrees."""
    whole = quiet(aim)
    plan = planner.plan(candidates(whole), SECONDS)
    assert (plan.status, plan.moves, plan.bookings) == (Status.PROVEN, (), ())
    assert not any(placed.moves for placed in plan.placements)
    assert audit.judge(whole, plan) == ()


def test_the_busiest_get_their_nights() -> None:
    """End to end: every volume that moves is booked, and the audit agrees."""
    whole = quiet(Aim.BEST_USE, 2 * FAST * SIZE)
    plan = planner.plan(candidates(whole), SECONDS)
    assert plan.left == ()
    assert {move.target for move in plan.moves} == set(FLASH)
    assert audit.judge(whole, plan) == ()


def test_nothing_moves_for_microseconds() -> None:
    """Even into empty flash, where no read would gain 30 %: 0.65 ms to 0.5 ms."""
    whole = quiet(Aim.BEST_USE, 5_000)
    near = tuple(replace(v, response_measured=650) for v in whole.volumes)
    table = candidates(replace(whole, volumes=near))
    assert moved(table, placed(table)) == []


def test_best_use_fills_empty_flash_with_the_busiest_and_the_fewest() -> None:
    """Thirty volumes fit; 95 % of their relief needs fewer, the busiest ones."""
    busiest = sorted(map(requests, range(1, 2 * SLOW + 1)), reverse=True)[:FAST]
    best = SAVED * sum(busiest)
    fewest = next(k for k in range(FAST) if SAVED * sum(busiest[:k]) >= 0.95 * best)
    table = candidates(quiet(Aim.BEST_USE, 2 * FAST * SIZE))
    found = placed(table)
    movers = [table.volumes[row] for row in moved(table, found)]
    asked = sorted((v.load[0].reads / MILLI for v in movers), reverse=True)
    assert asked == pytest.approx(busiest[:fewest], abs=1 / MILLI)
    assert {v.home for v in movers} == set(SPINNING)
    assert {found.reasons[row] for row in moved(table, found)} == {Reason.RELIEF}
    assert goal(found, "relief").reached == pytest.approx(best, rel=1e-4)
    assert goal(found, "effort").value == pytest.approx((SIZE + 10) * fewest)


def test_all_of_the_relief_is_taken_where_none_may_be_given_up() -> None:
    whole = quiet(Aim.BEST_USE, 2 * FAST * SIZE)
    wishes = replace(whole.policy, relief_given_up=0)
    table = candidates(replace(whole, policy=wishes))
    assert len(moved(table, placed(table))) == FAST
