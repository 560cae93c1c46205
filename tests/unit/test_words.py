"""What is said of a plan is true."""

from dataclasses import replace

import pytest
from smallplan import NO_PLAN, PLAN, at

from placer.plan import Goal, Reason, Status, Stopped
from placer.words import REASONS, clock, gap, status, stopped, value


def goal(value_: float, bound: float, stop: Stopped = Stopped.DONE) -> Goal:
    return Goal(
        name="missed",
        value=value_,
        reached=value_,
        bound=bound,
        unit="steps",
        stopped=stop,
    )


@pytest.mark.parametrize(
    ("given", "said"),
    [
        (goal(2, 2), "proven best"),
        (goal(100_000, 99_999), "proven best"),
        (goal(10_000, 9_996), "within 0.04 % of the best possible"),
        (goal(10, 8), "within 20 % of the best possible"),
        (goal(10, 8, Stopped.TIME), "within 20 % of the best possible (time limit)"),
        (goal(10, float("-inf")), "how far from the best possible is not known"),
    ],
)
def test_the_gap_in_words(given: Goal, said: str) -> None:
    assert gap(given) == said


def test_what_was_given_up_for_later_goals_is_said() -> None:
    given = Goal(name="relief", value=950, reached=1000, bound=1000, unit="ms/s")
    assert gap(given) == "proven best, 5 % of it given up for later goals"


def test_a_clock_time_carries_its_offset() -> None:
    """Berlin is at +02:00 in summer: tz database, europe file."""
    assert clock(at("2027-07-01 22:00"), "Europe/Berlin") == "2027-07-01 22:00+02:00"


def test_money_is_told_in_the_currency() -> None:
    money = Goal(name="money", value=123_450, reached=0, bound=0, unit="hundredths")
    assert value(money, "crowns") == "1,234.50 crowns"


def test_figures_have_as_many_digits_as_anybody_reads() -> None:
    assert value(goal(2, 2)) == "2 steps of 10 %"
    assert value(goal(0, 0)) == "none"
    assert value(goal(12.34567, 0)) == "12.35 steps of 10 %"
    assert value(goal(16461.63061, 0)) == "16,462 steps of 10 %"


def test_the_status_says_what_to_make_of_the_plan() -> None:
    assert status(NO_PLAN).startswith("No plan is possible: 1 shortage listed")
    assert status(PLAN).startswith("2 moves and 1 left over: the best found;")
    proven = replace(PLAN, left=(), status=Status.PROVEN)
    assert status(proven) == "2 moves: proven best."
    nothing = replace(PLAN, moves=(), left=(), status=Status.PROVEN)
    assert status(nothing) == "Nothing has to move."


def test_every_reason_to_move_is_explained() -> None:
    assert set(REASONS) == set(Reason) - {Reason.STAYS}


def test_the_search_ended_as_its_first_goal_cut_short() -> None:
    assert stopped(PLAN) is Stopped.TIME
    assert stopped(NO_PLAN) is Stopped.DONE
