"""The search: goal after goal, each within what the ones before it reached."""

import time
from collections.abc import Callable
from dataclasses import dataclass, replace

import numpy as np

from placer.candidates.block import Floats
from placer.placement import solver
from placer.placement.goals import Cost
from placer.placement.matrix import Program, RowKey
from placer.plan import Goal, Stopped

TARGET_GAP = 1e-5
ROUNDING = 1e-9

Progress = Callable[[Goal], None]


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
    progress: Progress = lambda _: None,
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
    progress
        Told of each goal when it is done.
    """
    deadline = time.monotonic() + seconds
    x = start if start is not None and program.holds(start) else None
    goals: list[Goal] = []
    for number, cost in enumerate(costs):
        share = (deadline - time.monotonic()) / (len(costs) - number)
        answer = _one(program, cost, max(share, 1.0), x)
        if answer.x is None:
            return Found(None, tuple(goals), program, answer.impossible)
        x = answer.x
        goals.append(_goal(cost, answer))
        progress(goals[-1])
        if number < len(costs) - 1:
            program = _kept(program, cost, x)
    return Found(x, tuple(goals), program)


def _one(
    program: Program, cost: Cost, seconds: float, start: Floats | None
) -> solver.Answer:
    """Solve one goal; a start that meets the relaxation's bound needs no search."""
    relaxed = solver.relax(program, cost.vector)
    if relaxed is None:
        return solver.Answer(None, -np.inf, proven=True, impossible=True)
    bound = relaxed.value
    if start is not None and _meets(cost.vector @ start, bound):
        return solver.Answer(start, cost.vector @ start, True, False)
    answer = solver.solve(
        program, cost.vector, seconds=seconds, hint=start, gap=TARGET_GAP
    )
    return _better(program, cost, answer, start, bound)


def _better(
    program: Program,
    cost: Cost,
    answer: solver.Answer,
    start: Floats | None,
    bound: float,
) -> solver.Answer:
    """Keep the better of the solver's solution and the start, and the higher bound."""
    known = [x for x in (answer.x, start) if x is not None and program.holds(x)]
    best = min(known, key=lambda x: float(cost.vector @ x), default=None)
    bound = max(bound, answer.bound)
    if best is not None:
        bound = min(bound, float(cost.vector @ best))
    return solver.Answer(best, bound, answer.proven, answer.impossible)


def _meets(value: float, bound: float) -> bool:
    return value <= bound + ROUNDING * max(1.0, abs(bound))


def _goal(cost: Cost, answer: solver.Answer) -> Goal:
    assert answer.x is not None
    reached = _stated(cost, float(cost.vector @ answer.x))
    done = answer.proven or _meets(float(cost.vector @ answer.x), answer.bound)
    return Goal(
        name=cost.name,
        value=reached,
        reached=reached,
        bound=_stated(cost, float(answer.bound)),
        unit=cost.unit,
        stopped=Stopped.DONE if done else Stopped.TIME,
    )


def _stated(cost: Cost, value: float) -> float:
    """Return a value as people state it: gains positive, and no minus before a zero."""
    return cost.sign * value + 0.0


def at_solution(cost: Cost, goal: Goal, x: Floats) -> Goal:
    """Return the goal with the value that a solution has for it."""
    return replace(goal, value=_stated(cost, float(cost.vector @ x)))


def _kept(program: Program, cost: Cost, x: Floats) -> Program:
    """Add the row that keeps what a goal has reached, less what may be given up."""
    if not cost.vector.any():
        return program
    value = float(cost.vector @ x)
    allowed = value + cost.given_up * abs(value)
    slack = ROUNDING * max(1.0, abs(value))
    return program.with_row(RowKey(f"goal {cost.name}"), cost.vector, allowed + slack)
