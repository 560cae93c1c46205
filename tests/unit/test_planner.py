"""The pipeline hands on what the stages found, and the plan says what it is."""

from dataclasses import replace

import pytest
from smallestate import estate, load, policy, pool, volume

from placer import __version__
from placer.audit import judge
from placer.candidates.table import candidates
from placer.estate import Estate, Expansion, Media
from placer.placement.watch import Watch
from placer.plan import Bought, Goal, Moment, Plan, Reason, Status
from placer.planner import plan

SECONDS = 10.0
SLOW = pool("depot/slow", Media.SPINNING, 100)
FAST = pool("quay/fast", Media.FLASH, 500, read_time=1_000)


def planned(whole: Estate, watch: Watch | None = None) -> Plan:
    table = candidates(whole)
    return plan(table, SECONDS, watch) if watch else plan(table, SECONDS)


def in_order() -> Estate:
    return estate([volume("a", "depot/slow", 50, load(10, kib=0))], [SLOW, FAST])


def slow_reads() -> Estate:
    """Return a volume with 10 ms measured that flash answers in 1 ms."""
    lone = volume("a", "depot/slow", 50, load(100, kib=0), measured=10)
    return estate([replace(lone, response_limit=2_000)], [SLOW, FAST])


def test_an_estate_in_order_gets_an_empty_plan() -> None:
    found = planned(in_order())
    assert found.status is Status.PROVEN
    assert (found.moves, found.bookings, found.left) == ((), (), ())
    assert [p.moves for p in found.placements] == [False]
    assert [p.reason for p in found.placements] == [Reason.STAYS]
    assert [goal.value for goal in found.goals] == [0, 0, 0, 0]


def test_a_plan_names_what_it_was_made_from() -> None:
    whole = replace(in_order(), name="ferries", digest="abc")
    found = planned(whole)
    assert (found.inventory, found.digest) == ("ferries", "abc")
    assert found.version == __version__
    assert found.start == "2024-10-04", "20 000 days after 1970-01-01"


def test_the_day_of_the_start_is_local() -> None:
    """Midnight in the east is still the day before by universal time."""
    wishes = replace(in_order().policy, start=20_000 * 1_440 - 120, zone="Etc/GMT-2")
    assert planned(replace(in_order(), policy=wishes)).start == "2024-10-04"


def test_a_move_is_placed_booked_and_reported() -> None:
    found = planned(slow_reads())
    (placed,), (move,) = found.placements, found.moves
    assert (placed.source, placed.target) == ("depot/slow", "quay/fast")
    assert placed.reason is Reason.LIMIT
    assert (placed.response_today, placed.response_planned) == (10_000, 1_000)
    assert placed.response_limit == 2_000
    assert (move.volume, move.target) == ("depot/a", "quay/fast")
    assert {booking.move for booking in found.bookings} == {move.id}
    assert found.left == ()
    assert {use.moment for use in found.uses} == {Moment.TODAY, Moment.PLANNED}
    room = {(u.where, u.moment): u.use for u in found.uses if u.limit == "pool-room"}
    assert room["depot/slow", Moment.TODAY] == 50
    assert room["quay/fast", Moment.PLANNED] == 50


def test_goals_stand_in_the_order_of_the_aim() -> None:
    names = [goal.name for goal in planned(slow_reads()).goals]
    assert names == ["missed", "money", "relief", "effort"]


def test_goals_are_told_as_they_are_solved() -> None:
    told: list[Goal] = []
    found = planned(slow_reads(), Watch(tell=told.append))
    assert [goal.name for goal in told] == [goal.name for goal in found.goals]


def test_a_halted_search_gives_the_plan_of_today() -> None:
    """Nobody is moved, and nobody says that this is best."""
    found = planned(slow_reads(), Watch(halted=lambda: True))
    assert found.status is Status.WITHIN_GAP
    assert found.moves == ()


def too_much(price: int, budget: int) -> Estate:
    """Return 130 GiB in a pool for 100, which two steps of 25 could enlarge."""
    step = Expansion(drives=1, price=price, at_most=3)
    slow = replace(SLOW, drives=4, expansion=step)
    volumes = [volume("a", "depot/slow", 80), volume("b", "depot/slow", 50)]
    return estate(volumes, [slow], policy(budget=budget))


def test_what_must_be_bought_is_bought_and_no_more() -> None:
    found = planned(too_much(price=700, budget=10_000))
    assert found.bought == (Bought("depot/slow", 2, 1_400),)
    assert next(goal.value for goal in found.goals if goal.name == "money") == 1_400
    room = next(
        u for u in found.uses if u.limit == "pool-room" and u.moment is Moment.PLANNED
    )
    assert (room.use, room.at_most) == (130, 150)


def test_without_money_there_is_no_plan_but_a_shortage() -> None:
    found = planned(too_much(price=700, budget=1_399))
    assert found.status is Status.NO_PLAN
    assert (found.placements, found.moves, found.goals) == ((), (), ())
    assert [(s.limit, s.where) for s in found.shortages] == [
        ("pool-room", "depot/slow")
    ]
    assert found.shortages[0].amount == pytest.approx(5), "one step is affordable"
    assert {use.moment for use in found.uses} == {Moment.TODAY, Moment.NEAREST}


@pytest.mark.parametrize(
    "whole", [in_order(), slow_reads(), too_much(700, 10_000), too_much(700, 0)]
)
def test_the_audit_has_nothing_to_say(whole: Estate) -> None:
    assert judge(whole, planned(whole)) == ()
