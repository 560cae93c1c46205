"""An interrupt keeps the best plan found, and that plan is honest."""

from pathlib import Path

from placer import audit, planner
from placer.candidates.table import candidates
from placer.placement.watch import Watch
from placer.plan import Stopped
from placer.workbook import intake

HARBOUR = Path(__file__).parents[2] / "inventories" / "harbour.xlsx"


def test_a_halted_search_gives_a_plan_that_audits_clean() -> None:
    """Halted before its first step: what it claims to have reached is still true."""
    estate = intake.read(HARBOUR).estate
    assert estate is not None
    plan = planner.plan(candidates(estate), 20, Watch(halted=lambda: True))
    assert plan.placements
    assert audit.judge(estate, plan) == ()
    assert Stopped.INTERRUPT in {goal.stopped for goal in plan.goals}
