"""The placement's own program and search on published assignment problems.

Jobs are volumes, agents are pools: every job goes to exactly one agent within its
capacity.  Rows of the tables are agents.
"""

from dataclasses import dataclass

import numpy as np
import pytest

from placer.placement import solver
from placer.placement.goals import Cost
from placer.placement.matrix import Builder, Ints, Program, RowKey
from placer.placement.search import search

SECONDS = 20.0


@dataclass(frozen=True)
class Problem:
    """Agents x jobs; ``best`` is the optimum, a maximum where ``gain``."""

    worth: str
    weight: str
    capacity: str
    best: int
    gain: bool = False
    assigned: str = ""

    @property
    def cost(self) -> Cost:
        sign = -1 if self.gain else 1
        worth = table(self.worth).ravel().astype(np.float64)
        return Cost("worth", "units", sign * worth, sign)

    def program(self, *, all_jobs: bool = True) -> Program:
        """Columns are agent by agent; without ``all_jobs`` some may be left out."""
        weight = table(self.weight)
        agents, jobs = weight.shape
        builder = Builder(agents * jobs, agents * jobs)
        for job in range(jobs):
            columns = list(range(job, agents * jobs, jobs))
            add = builder.equal if all_jobs else builder.at_most
            add(RowKey("job", str(job)), columns, np.ones(agents), 1)
        for agent, most in enumerate(table(self.capacity)[0]):
            columns = list(range(agent * jobs, (agent + 1) * jobs))
            builder.at_most(
                RowKey("agent"), columns, weight[agent].astype(np.float64), float(most)
            )
        return builder.build()

    def agents_of(self, x: np.ndarray[tuple[int], np.dtype[np.float64]]) -> str:
        """Return the agent of each job, counted from 1, as the tables print it."""
        grid = x.reshape(table(self.weight).shape)
        return " ".join(str(1 + int(agent)) for agent in grid.argmax(axis=0))


def table(text: str) -> Ints:
    return np.array([row.split() for row in text.split("/")], dtype=np.int64)


# S. Martello, P. Toth, "Knapsack Problems", 1990, in a public collection of such
# problems (its P03); as costs in J. Kallrath, "Business Optimisation", ex. 7.2.  The
# optima were proven by enumeration.
_EIGHT_JOBS = "21 13 9 5 7 15 5 24/20 8 18 25 6 6 9 6/16 16 18 24 11 11 16 18"
_EIGHT_WORTHS = "27 12 12 16 24 31 41 13/14 5 37 9 36 25 1 34/34 34 20 9 19 19 3 34"
EIGHT_MOST = Problem(
    _EIGHT_WORTHS, _EIGHT_JOBS, "26 25 34", 232, gain=True, assigned="3 3 1 1 2 2 1 2"
)
EIGHT_LEAST = Problem(
    _EIGHT_WORTHS, _EIGHT_JOBS, "26 25 34", 145, assigned="3 2 1 1 1 3 2 2"
)
# A variant of the same problem that goes round in programs: two figures differ.
_OTHER_WORTHS = "27 12 12 16 24 31 41 13/14 5 37 9 36 25 1 35/34 34 20 9 19 19 3 24"
OTHER_MOST = Problem(
    _OTHER_WORTHS, _EIGHT_JOBS, "26 25 34", 233, gain=True, assigned="3 3 1 1 2 2 1 2"
)
OTHER_LEAST = Problem(_OTHER_WORTHS, _EIGHT_JOBS, "26 25 34", 141)
# Printed output of the Martello-Toth routine MTG (J. Burkardt's port): 40.
SEVEN = Problem(
    "6 9 4 2 10 3 6/4 8 9 1 7 5 4",
    "4 1 2 1 4 3 8/9 9 8 1 3 8 7",
    "11 22",
    40,
    gain=True,
    assigned="1 1 2 1 2 1 2",
)
# Martello, Toth 1990; M. Guignard, M. Rosenwein, Operations Research 37, 1989: 223.
# Agent 3 is filled to the last unit: loads 26 14 27 20 18.
TEN = Problem(
    "16 26 30 47 18 19 33 37 42 31/38 42 15 21 26 11 11 50 24 19/"
    "48 17 14 22 14 18 47 32 17 42/22 32 28 39 37 23 25 12 44 17/"
    "31 42 31 40 16 15 29 31 44 41",
    "12 8 25 17 19 22 6 22 20 25/5 15 15 14 7 11 14 16 17 15/"
    "21 24 13 24 12 16 23 20 15 5/23 17 10 6 24 20 15 10 19 9/"
    "17 20 15 16 5 13 7 16 8 5",
    "28 20 27 24 19",
    223,
    assigned="1 1 4 2 3 5 1 4 3 5",
)
# OR-Library (J. Beasley), gap1, first problem; optimum of I. Osman, OR Spektrum 17,
# 1995, and D. Cattrysse, M. Salomon, L. Van Wassenhove, EJOR 72, 1994: 336.
FIFTEEN = Problem(
    "17 21 22 18 24 15 20 18 19 18 16 22 24 24 16/"
    "23 16 21 16 17 16 19 25 18 21 17 15 25 17 24/"
    "16 20 16 25 24 16 17 19 19 18 20 16 17 21 24/"
    "19 19 22 22 20 16 19 17 21 19 25 23 25 25 25/"
    "18 19 15 15 21 25 16 16 23 15 22 17 19 22 24",
    "8 15 14 23 8 16 8 25 9 17 25 15 10 8 24/"
    "15 7 23 22 11 11 12 10 17 16 7 16 10 18 22/"
    "21 20 6 22 24 10 24 9 21 14 11 14 11 19 16/"
    "20 11 8 14 9 5 6 19 19 7 6 6 13 9 18/"
    "8 13 13 13 10 20 25 16 16 17 10 10 5 12 23",
    "36 34 38 27 33",
    336,
    gain=True,
)
PROBLEMS = {
    "eight jobs, most": EIGHT_MOST,
    "eight jobs, least": EIGHT_LEAST,
    "variant, most": OTHER_MOST,
    "variant, least": OTHER_LEAST,
    "seven jobs": SEVEN,
    "ten jobs": TEN,
    "fifteen jobs": FIFTEEN,
}
every_problem = pytest.mark.parametrize(
    "problem", PROBLEMS.values(), ids=PROBLEMS.keys()
)


@every_problem
def test_the_search_reaches_and_proves_the_optimum(problem: Problem) -> None:
    found = search(problem.program(), (problem.cost,), SECONDS)
    (goal,) = found.goals
    assert (goal.value, goal.gap) == pytest.approx((problem.best, 0.0), abs=1e-6)


@pytest.mark.parametrize(
    "problem", [p for p in PROBLEMS.values() if p.assigned], ids=lambda p: p.assigned
)
def test_the_search_finds_the_printed_assignment(problem: Problem) -> None:
    """Enumeration shows these to be the only ones with their value."""
    found = search(problem.program(), (problem.cost,), SECONDS)
    assert found.x is not None
    assert problem.agents_of(found.x) == problem.assigned


@pytest.mark.parametrize("name", solver.SOLVERS)
@every_problem
def test_every_solver_finds_the_same_optimum(problem: Problem, name: str) -> None:
    cost = problem.cost.vector
    answer = solver.solve(problem.program(), cost, seconds=SECONDS, solver=name)
    assert answer.x is not None
    assert answer.proven
    assert abs(float(cost @ answer.x)) == problem.best


def test_leaving_a_job_out_would_beat_the_true_optimum() -> None:
    """41 if a job may be left out, 40 with all assigned: every volume has a place."""
    found = search(SEVEN.program(all_jobs=False), (SEVEN.cost,), SECONDS)
    assert found.goals[0].value == pytest.approx(41)
