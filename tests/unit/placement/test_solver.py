"""Three solvers behind one door give one answer, and it is that of an enumeration."""

from typing import Any

import numpy as np
import pytest
from ortools.math_opt.python import mathopt
from unit.placement.programs import goals, program, solutions

from placer.placement import solver
from placer.placement.matrix import Builder, RowKey

SECONDS = 10.0


@pytest.mark.parametrize("name", solver.SOLVERS)
@pytest.mark.parametrize("seed", range(30))
def test_optimum_is_that_of_all_solutions(seed: int, name: str) -> None:
    small, cost = program(seed), goals(seed)[1].vector
    answer = solver.solve(small, cost, seconds=SECONDS, solver=name)
    possible = solutions(small)
    if not len(possible):
        assert answer.x is None
        assert answer.impossible
        return
    best = (possible @ cost).min()
    assert answer.x is not None
    assert small.holds(answer.x)
    assert cost @ answer.x == pytest.approx(best)
    assert answer.bound == pytest.approx(best, abs=1e-6)
    assert answer.proven
    assert not answer.impossible


@pytest.mark.parametrize("seed", range(30))
def test_relaxation_is_never_above_the_optimum(seed: int) -> None:
    small, cost = program(seed), goals(seed)[1].vector
    relaxed, possible = solver.relax(small, cost), solutions(small)
    if len(possible):
        assert relaxed is not None
        assert relaxed.value <= (possible @ cost).min() + 1e-6
        assert cost @ relaxed.x == pytest.approx(relaxed.value)
        assert small.holds(relaxed.x)


def test_impossible_rows_have_no_relaxation() -> None:
    builder = Builder(2, 2)
    builder.equal(RowKey("one"), [0, 1], np.ones(2), 3)
    assert solver.relax(builder.build(), np.ones(2)) is None


def test_a_row_without_columns_is_impossible() -> None:
    """A volume that no pool may take has no column to be in."""
    builder = Builder(1, 1)
    builder.equal(RowKey("one"), [], np.zeros(0), 1)
    answer = solver.solve(builder.build(), np.ones(1), seconds=SECONDS)
    assert (answer.x, answer.impossible) == (None, True)


def test_a_hint_does_not_change_the_optimum() -> None:
    small, cost = program(0), goals(0)[1].vector
    possible = solutions(small)
    worst = possible[(possible @ cost).argmax()]
    answer = solver.solve(small, cost, seconds=SECONDS, hint=worst)
    assert answer.x is not None
    assert cost @ answer.x == pytest.approx((possible @ cost).min())


def test_overruns_are_no_choices() -> None:
    """Room 5 for 3 + 4, both wanted: 40 % over, neither rounded nor refused."""
    builder = Builder(2, 2)
    builder.at_most(RowKey("room"), [0, 1], np.array([3.0, 4.0]), 5)
    builder.equal(RowKey("both"), [0, 1], np.ones(2), 2)
    loose = builder.build().elastic(np.array([0]))
    answer = solver.solve(loose, np.array([0.0, 0.0, 1.0]), seconds=SECONDS)
    assert answer.x is not None
    assert answer.x == pytest.approx([1, 1, 0.4])


def test_when_a_solver_fails_another_takes_over(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    real, asked = mathopt.solve, []

    def failing(model: Any, kind: Any, **others: Any) -> Any:
        asked.append(kind)
        if kind == mathopt.SolverType.HIGHS:
            raise AttributeError
        return real(model, kind, **others)

    monkeypatch.setattr(mathopt, "solve", failing)
    small, cost = program(0), goals(0)[1].vector
    answer = solver.solve(small, cost, seconds=SECONDS)
    assert answer.x is not None
    assert cost @ answer.x == pytest.approx((solutions(small) @ cost).min())
    assert asked == [mathopt.SolverType.HIGHS, mathopt.SolverType.GSCIP]


def test_no_columns_are_no_trouble() -> None:
    answer = solver.solve(Builder(0, 0).build(), np.zeros(0), seconds=SECONDS)
    assert answer.x is not None
    assert len(answer.x) == 0
