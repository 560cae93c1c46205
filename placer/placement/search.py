"""The search: goal after goal, each within what the ones before it reached."""

import time
from dataclasses import dataclass, replace

import numpy as np

from placer.candidates.block import Floats
from placer.placement import solver
from placer.placement.chain import Chain, worthwhile
from placer.placement.goals import Cost
from placer.placement.matrix import Program, RowKey
from placer.placement.watch import UNWATCHED, Watch
from placer.plan import Goal, Stopped

NEAR_ENOUGH = 5e-4
PROVEN = 1e-6
ROUNDING = 1e-9
CHAIN_SHARE = 0.4


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
        goals.append(_goal(cost, answer, watch.halted()))
        watch.tell(goals[-1])
        if number < len(costs) - 1:
            program = _kept(program, cost, x)
    return Found(x, tuple(goals), program)


@dataclass(frozen=True)
class Effort:
    """How long to search for one goal, and what ends it earlier."""

    seconds: float
    near_enough: float
    watch: Watch


class OneGoal:
    """The search for one goal: relaxation, first solution, chain, exact finish."""

    def __init__(self, program: Program, cost: Cost, effort: Effort) -> None:
        self._program, self._cost, self._effort = program, cost.vector, effort
        self._begin = time.monotonic()

    def solve(self, start: Floats | None) -> solver.Answer:
        """Return the best solution and the highest bound found in the time."""
        relaxed = solver.relax(self._program, self._cost)
        if relaxed is None:
            return solver.Answer(None, -np.inf, proven=True, impossible=True)
        best = self._joined(solver.Answer(start, relaxed.value, False, False))
        if self._far(best, PROVEN):
            best = self._joined(self._chained(relaxed, best), best)
        if best.x is None:
            return self._joined(self._whole(), best)
        if self._far(best, self._effort.near_enough):
            best = self._joined(self._finish(relaxed, best), best)
        return best

    def _chained(self, relaxed: solver.Relaxed, best: solver.Answer) -> solver.Answer:
        """Go from the relaxation to a first solution, then better the best known."""
        chain = Chain(self._program, self._cost, relaxed, np.random.default_rng(1))
        deadline = time.monotonic() + CHAIN_SHARE * self._left()
        first = chain.begin(deadline)
        better = self._joined(replace(best, x=first), best)
        if better.x is None:
            return better
        target = best.bound + self._effort.near_enough / 2 * abs(best.bound)
        return replace(better, x=chain.improve(better.x, deadline, target))

    def _whole(self) -> solver.Answer:
        """Give the whole program to the solver: no solution is known."""
        seconds = max(1.0, self._left())
        return solver.solve(
            self._program, self._cost, seconds=seconds, gap=self._effort.near_enough
        )

    def _finish(self, relaxed: solver.Relaxed, best: solver.Answer) -> solver.Answer:
        """Solve over the columns that can still be part of something better."""
        assert best.x is not None
        free = worthwhile(relaxed, float(self._cost @ best.x), best.x)
        small = self._program.restricted(free, best.x)
        seconds = max(1.0, self._left())
        answer = solver.solve(
            small,
            self._cost[free],
            seconds=seconds,
            hint=best.x[free],
            gap=self._effort.near_enough,
        )
        if answer.x is None:
            return replace(answer, impossible=False)
        whole = np.zeros(self._program.columns)
        whole[free] = answer.x
        return replace(answer, x=whole)

    def _joined(self, *answers: solver.Answer) -> solver.Answer:
        """Keep the best solution that holds and the highest bound of all answers."""
        known = [a.x for a in answers if a.x is not None and self._program.holds(a.x)]
        best = min(known, key=lambda x: float(self._cost @ x), default=None)
        bound = max(answer.bound for answer in answers)
        if best is not None:
            bound = min(bound, float(self._cost @ best))
        return solver.Answer(
            best,
            bound,
            any(answer.proven for answer in answers),
            any(answer.impossible for answer in answers),
        )

    def _far(self, answer: solver.Answer, gap: float) -> bool:
        if answer.x is None:
            return True
        if self._effort.watch.halted():
            return False
        value = float(self._cost @ answer.x)
        return value - answer.bound > max(gap * abs(value), ROUNDING)

    def _left(self) -> float:
        return self._effort.seconds - (time.monotonic() - self._begin)


def _goal(cost: Cost, answer: solver.Answer, halted: bool) -> Goal:
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
        stopped=_stopped(distance, halted),
    )


def _stopped(distance: float, halted: bool) -> Stopped:
    if distance <= PROVEN:
        return Stopped.DONE
    if distance <= NEAR_ENOUGH:
        return Stopped.NEAR
    return Stopped.INTERRUPT if halted else Stopped.TIME


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
