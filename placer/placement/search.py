"""The search: goal after goal, each within what the ones before it reached."""

import time
from dataclasses import dataclass, replace

from placer.candidates.block import Floats
from placer.placement import solver
from placer.placement.goals import Cost
from placer.placement.matrix import Program, RowKey
from placer.placement.one_goal import PROVEN, ROUNDING, Effort, OneGoal
from placer.placement.watch import UNWATCHED, Watch
from placer.plan import Goal, Stopped

NEAR_ENOUGH = 5e-4
POLISH_SECONDS = 3.0


@dataclass(frozen=True)
class Found:
    """A solution with the goals it reached; ``x`` is None where there is none.

    ``program`` has the goals reached as rows, all but the last.
    """

    x: Floats | None
    goals: tuple[Goal, ...]
    program: Program
    impossible: bool = False


def search(
    program: Program,
    costs: tuple[Cost, ...],
    seconds: float,
    start: Floats | None = None,
    watch: Watch = UNWATCHED,
    near_enough: float = NEAR_ENOUGH,
) -> Found:
    """Solve the goals in order.

    Parameters
    ----------
    program
        Rows every solution must keep.
    costs
        Goals, the most important first.
    seconds
        [s] time for all goals together; what one leaves over goes to the next.
    start
        A solution to begin with, if one is known.
    watch
        Told of each goal when it is done, asked between steps whether to halt.
    near_enough
        [1] relative distance from the bound at which a goal needs no more search.
    """
    deadline = time.monotonic() + seconds
    x = start if start is not None and program.holds(start) else None
    goals: list[Goal] = []
    for number, cost in enumerate(costs):
        share = (deadline - time.monotonic()) / (len(costs) - number)
        effort = Effort(max(share, 1.0), near_enough, watch)
        answer = OneGoal(program, cost, effort).solve(x)
        if answer.x is None:
            return Found(None, tuple(goals), program, answer.impossible)
        x = answer.x
        goals.append(_goal(cost, answer, effort))
        watch.tell(goals[-1])
        if number < len(costs) - 1:
            program = _kept(program, cost, x)
    left = max(1.0, min(POLISH_SECONDS, deadline - time.monotonic()))
    x = _polished(program, costs, x, Effort(left, near_enough, watch))
    return Found(x, tuple(goals), program)


def _polished(
    program: Program, costs: tuple[Cost, ...], x: Floats | None, effort: Effort
) -> Floats | None:
    """Win back what was given up as far as the last goal does not suffer."""
    if x is None or effort.watch.halted():
        return x
    kept = _kept(program, costs[-1], x)
    for cost in costs[:-1]:
        if cost.given_up:
            x = OneGoal(kept, cost, effort).solve(x).x
    return x


def _goal(cost: Cost, answer: solver.Answer, effort: Effort) -> Goal:
    assert answer.x is not None
    value = float(cost.vector @ answer.x)
    reached = _stated(cost, value)
    distance = (value - answer.bound) / max(abs(value), ROUNDING)
    return Goal(
        name=cost.name,
        value=reached,
        reached=reached,
        bound=_stated(cost, float(answer.bound)),
        unit=cost.unit,
        stopped=_stopped(distance, effort),
    )


def _stopped(distance: float, effort: Effort) -> Stopped:
    if distance <= PROVEN:
        return Stopped.DONE
    if distance <= effort.near_enough:
        return Stopped.NEAR
    return Stopped.INTERRUPT if effort.watch.halted() else Stopped.TIME


def _stated(cost: Cost, value: float) -> float:
    """Return a value as people state it: gains positive, and no minus before a zero."""
    return cost.sign * value + 0.0


def at_solution(cost: Cost, goal: Goal, x: Floats) -> Goal:
    """Return the goal with the value that a solution has for it."""
    value = _stated(cost, float(cost.vector @ x))
    best = cost.sign * min(cost.sign * goal.reached, cost.sign * value)
    return replace(goal, value=value, reached=best)


def _kept(program: Program, cost: Cost, x: Floats) -> Program:
    """Add the row that keeps what a goal has reached, less what may be given up."""
    if not cost.vector.any():
        return program
    value = float(cost.vector @ x)
    allowed = value + cost.given_up * abs(value)
    slack = ROUNDING * max(1.0, abs(value))
    return program.with_row(RowKey(f"goal {cost.name}"), cost.vector, allowed + slack)
