"""The summary fits a screen, says what matters last, and says it truly."""

from dataclasses import replace

import pytest
from smallplan import ESTATE, FINDINGS, NO_PLAN, PLAN

from placer.plan import Moment, Plan, Shortage, Use
from placer.report.summary import plan_text


def use(limit: str, moment: Moment, share: float, hour: str = "") -> Use:
    return Use(
        where="quay/fast",
        limit=limit,
        moment=moment,
        use=share,
        at_most=1,
        unit="%",
        hour=hour,
    )


@pytest.mark.parametrize("plan", [PLAN, NO_PLAN], ids=["plan", "no plan"])
@pytest.mark.parametrize("width", [80, 60])
def test_it_fits_the_screen(plan: Plan, width: int) -> None:
    lines = plan_text(ESTATE, plan, FINDINGS, "Audited: clean.", width).splitlines()
    assert len(lines) <= 40
    assert max(map(len, lines)) <= width


def test_many_shortages_do_not_push_the_verdict_off_the_screen() -> None:
    many = tuple(replace(NO_PLAN.shortages[0], where=f"p{n}") for n in range(50))
    text = plan_text(ESTATE, replace(NO_PLAN, shortages=many), (), "Written: x")
    assert len(text.splitlines()) <= 40
    assert "and 46 more, in the plan file" in text


def test_the_verdict_stands_last() -> None:
    text = plan_text(ESTATE, PLAN, FINDINGS, "Audited: clean.\nWritten: x.xlsx")
    assert text.splitlines()[-2:] == ["Audited: clean.", "Written: x.xlsx"]


def test_pools_show_each_limit_today_and_planned() -> None:
    uses = (
        use("pool-room", Moment.TODAY, 1.034),
        use("pool-room", Moment.PLANNED, 0.91),
        use("pool-busy", Moment.TODAY, 0.4, "Mon 10"),
        use("pool-busy", Moment.PLANNED, 0.75, "Tue 14"),
    )
    text = plan_text(ESTATE, replace(PLAN, uses=uses))
    line = next(part for part in text.splitlines() if part.startswith("quay/fast"))
    assert line.split("  ")[-1].strip() == "-"
    assert "103 -> 91" in line
    assert "40 -> 75 (Tue 14)" in line


def test_controllers_stand_under_the_pools_where_they_are_rated() -> None:
    busy = [
        replace(use("controller-busy", moment, share, "16:00"), where="quay")
        for moment, share in ((Moment.TODAY, 0.54), (Moment.PLANNED, 0.66))
    ]
    text = plan_text(ESTATE, replace(PLAN, uses=tuple(busy)))
    line = next(part for part in text.splitlines() if part.startswith("quay contr"))
    assert line.startswith("quay controllers, 1 failed  ")
    assert "54 -> 66 (16:00)" in line
    assert "quay controllers" not in plan_text(ESTATE, PLAN)


def test_without_a_plan_the_pools_show_how_near_it_gets() -> None:
    uses = (
        use("pool-room", Moment.TODAY, 0.5),
        use("pool-room", Moment.NEAREST, 2.05),
    )
    text = plan_text(ESTATE, replace(NO_PLAN, uses=uses))
    assert "no plan, do not carry out" in " ".join(text.split())
    assert "% of limit, today -> nearest" in text
    assert "50 -> 205" in text


def test_moves_are_told_by_reason_with_what_they_copy() -> None:
    text = plan_text(ESTATE, PLAN)
    assert "Moves: 2, 120 GiB: limit 1 (60 GiB), relief 1 (60 GiB)" in text


def test_nights_are_told_with_their_clock_times() -> None:
    text = " ".join(plan_text(ESTATE, PLAN).split())
    assert "Nights: 2 of 3, first opens 2027-01-26 22:00+01:00" in text
    assert "last cutover 2027-01-28 02:30+01:00" in text


def test_goals_carry_their_gap_in_words() -> None:
    assert "response limits missed: 2 steps of 10 %, proven best" in plan_text(
        ESTATE, PLAN
    )


def test_what_is_bought_is_told_with_the_budget() -> None:
    said = "To buy: 2 steps of 4 drives for quay/fast: 1,234.05 of 5,000.00 crowns"
    assert said in plan_text(ESTATE, PLAN)


def test_what_is_planned_is_told_with_the_months_of_its_growth() -> None:
    text = plan_text(ESTATE, PLAN)
    assert f"with the growth of {ESTATE.policy.horizon_months} months" in text


def test_warnings_are_told_where_no_plan_is_possible() -> None:
    """One of them may be the cause, as where no window is open."""
    assert "- volumes!H7: =1+1 is text." in plan_text(ESTATE, NO_PLAN, FINDINGS)
    assert "volumes!H7" not in plan_text(ESTATE, PLAN, FINDINGS)


def test_a_shortage_is_told_with_its_remedy() -> None:
    lacking: Shortage = NO_PLAN.shortages[0]
    text = " ".join(plan_text(ESTATE, NO_PLAN).split())
    assert f"- {lacking.sentence}; {lacking.remedy} " in text
    assert "No plan is possible: 1 shortage listed." in text


def test_what_is_left_over_is_told() -> None:
    said = "quay/cam-01 cannot go to quay/slow: a night of 3 h"
    assert said in plan_text(ESTATE, PLAN)


def test_there_are_no_colours() -> None:
    assert "\x1b" not in plan_text(ESTATE, PLAN, FINDINGS)
