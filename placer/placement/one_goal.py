"""The search for one goal: relaxation, chain, exact finish."""

import time
from dataclasses import dataclass, replace

import numpy as np

from placer.candidates.block import Floats
from placer.placement import solver
from placer.placement.chain import Chain, worthwhile
from placer.placement.goals import Cost
from placer.placement.matrix import Program
from placer.placement.watch import Watch

PROVEN = 1e-6
ROUNDING = 1e-9
CHAIN_SHARE = 0.1


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
            known = start is not None
            return solver.Answer(start, -np.inf, proven=not known, impossible=not known)
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
        target = best.bound + self._effort.near_enough * abs(best.bound)
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
            bound = _settled(float(self._cost @ best), bound)
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


def _settled(value: float, bound: float) -> float:
    """Return the bound, without what only rounding keeps it from the value."""
    close = value - bound <= ROUNDING * max(1.0, abs(value))
    return value if close else bound
