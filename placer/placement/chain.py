"""Good solutions from small programs near the relaxation's ties.

A column's reduced cost tells what using it costs at the relaxation's prices.  Few
columns have a small one, and programs over just those are solved in a moment.

References
----------
.. [1] P. Shaw, "Using constraint programming and local search methods to solve vehicle
   routing problems", CP 1998: large neighbourhood search.
.. [2] G. Dantzig, R. Fulkerson, S. Johnson, "Solution of a large-scale
   travelling-salesman problem", Operations Research 2, 1954: leaving out columns by
   reduced costs.
"""

import time
from dataclasses import dataclass

import numpy as np

from placer.placement import solver
from placer.placement.matrix import Floats, Ints, Program
from placer.placement.solver import Relaxed

FIRST_FREE = 200
LINK_SECONDS = 3.0
IN_VAIN_AT_MOST = 20
LUCK = (0.5, 1.5, 3.0)
IN_USE = 1e-6


@dataclass
class Chain:
    """One chain over a program and a cost; ``free`` choices are open in each link."""

    program: Program
    cost: Floats
    relaxed: Relaxed
    rng: np.random.Generator
    free: int = FIRST_FREE

    def begin(self, deadline: float) -> Floats | None:
        """Return a first solution near the relaxation's own, None if there is none.

        The choices that the relaxation uses and the nearest others are open; their
        number doubles until a solution is found.
        """
        nobody = np.zeros(self.program.columns)
        while time.monotonic() < deadline and self.free <= 2 * self.program.choices:
            opened = self.free
            free = self._opened(self.relaxed.x > IN_USE, nobody)
            found = self._solved(free, nobody, deadline)
            if found is not None:
                return found
            self.free = 2 * opened
        return None

    def improve(self, x: Floats, deadline: float, target: float) -> Floats:
        """Return the best solution found before the deadline [s, monotonic].

        Ends early once the cost is at most ``target``, or after many links in vain.
        """
        in_vain = 0
        while in_vain < IN_VAIN_AT_MOST and self.cost @ x > target:
            if time.monotonic() >= deadline:
                break
            luck = self.rng.choice(LUCK) * self.rng.gumbel(size=len(x))
            found = self._solved(self._opened(x > 0.5, luck), x, deadline)
            better = found is not None and self.cost @ found < self.cost @ x - 1e-9
            in_vain = 0 if better else in_vain + 1
            x = found if better and found is not None else x
        return x

    def _solved(self, free: Ints, x: Floats, deadline: float) -> Floats | None:
        seconds = min(max(deadline - time.monotonic(), 0.1), LINK_SECONDS)
        small = self.program.restricted(free, x)
        hint = x[free] if x.any() else None
        answer = solver.solve(small, self.cost[free], seconds=seconds, hint=hint)
        self.free = int(self.free * (1.2 if answer.proven else 0.8))
        if answer.x is None:
            return None
        tried = x.copy()
        tried[free] = answer.x
        return tried if self.program.holds(tried) else None

    def _opened(
        self, used: np.ndarray[tuple[int], np.dtype[np.bool_]], luck: Floats
    ) -> Ints:
        """Open what is used, all that follows, and the nearest choices, with luck."""
        reduced = np.abs(self.relaxed.reduced)
        floor = max(float(np.quantile(reduced, 0.1)), 1e-9)
        nearness = (np.log(reduced + floor) - luck)[: self.program.choices]
        chosen = used.copy()
        chosen[np.argsort(nearness)[: self.free]] = True
        chosen[self.program.choices :] = True
        return np.flatnonzero(chosen)


def worthwhile(relaxed: Relaxed, best: float, x: Floats) -> Ints:
    """Return the columns that a better solution may use [2]_, and those of x."""
    spare = best - relaxed.value
    possible = (relaxed.reduced <= spare + 1e-9 * abs(best)) | (x > 0.5)
    return np.flatnonzero(possible)
