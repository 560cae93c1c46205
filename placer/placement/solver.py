"""The door to the solvers: a program and a cost in, a solution and a bound out.

The quirks of the interface are locked in here.  HiGHS through MathOpt refuses a thread
count and cannot be interrupted, so calls are kept short by their callers.  Now and then
it fails on a solution at the edge of its own tolerance; another solver then takes over.
It also prints lines of its own, which must not reach standard output.
"""

import os
import sys
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from datetime import timedelta
from pathlib import Path

import numpy as np
from ortools.math_opt import model_pb2
from ortools.math_opt.python import mathopt

from placer.placement.matrix import INFINITY, Floats, Program

SOLVERS = {
    "highs": mathopt.SolverType.HIGHS,
    "cp-sat": mathopt.SolverType.CP_SAT,
    "scip": mathopt.SolverType.GSCIP,
}


@dataclass(frozen=True)
class Answer:
    """What a solver found.

    ``x`` is None without a solution; ``bound`` is -inf without one; ``proven`` tells
    that nothing is left to search; ``impossible`` that no solution exists.
    """

    x: Floats | None
    bound: float
    proven: bool
    impossible: bool


@dataclass(frozen=True)
class Relaxed:
    """The linear relaxation: a solution, the rows' prices, and what columns cost."""

    x: Floats
    value: float
    reduced: Floats


def solve(
    program: Program,
    cost: Floats,
    *,
    seconds: float,
    hint: Floats | None = None,
    gap: float = 0.0,
    solver: str = "highs",
) -> Answer:
    """Minimise ``cost @ x`` over binary x.

    Parameters
    ----------
    program
        Rows that must hold.
    cost
        (columns,) cost of each column.
    seconds
        [s] time after which the best so far is returned.
    hint
        (columns,) a solution to start from.
    gap
        [1] relative gap at which to stop.
    solver
        One of ``SOLVERS``.
    """
    model = _model(program, cost, integer=True)
    parameters = mathopt.SolveParameters(
        time_limit=timedelta(seconds=seconds), relative_gap_tolerance=gap, random_seed=1
    )
    starts = mathopt.ModelSolveParameters()
    if hint is not None:
        values = {model.get_variable(i): float(v) for i, v in enumerate(hint)}
        starts.solution_hints.append(mathopt.SolutionHint(variable_values=values))
    result = _solved(model, SOLVERS[solver], parameters, starts)
    return _answer(model, result, program)


def _solved(
    model: mathopt.Model,
    solver: mathopt.SolverType,
    parameters: mathopt.SolveParameters,
    starts: mathopt.ModelSolveParameters,
) -> mathopt.SolveResult:
    try:
        with _silenced():
            return mathopt.solve(model, solver, params=parameters, model_params=starts)
    except AttributeError:
        # In this version of the library a failed status surfaces as this error.
        return mathopt.solve(
            model, SOLVERS["scip"], params=parameters, model_params=starts
        )


@contextmanager
def _silenced() -> Iterator[None]:
    """Keep what a solver prints by itself out of standard output."""
    sys.stdout.flush()
    kept = os.dup(1)
    try:
        with Path(os.devnull).open("wb") as nowhere:
            os.dup2(nowhere.fileno(), 1)
        yield
    finally:
        os.dup2(kept, 1)
        os.close(kept)


def relax(program: Program, cost: Floats) -> Relaxed | None:
    """Solve the linear relaxation; None where even that is impossible."""
    model = _model(program, cost, integer=False)
    result = mathopt.solve(model, mathopt.SolverType.GLOP)
    if result.termination.reason != mathopt.TerminationReason.OPTIMAL:
        return None
    variables = list(model.variables())
    return Relaxed(
        np.array(result.variable_values(variables)),
        result.objective_value(),
        np.array(result.reduced_costs(variables)),
    )


def _answer(
    model: mathopt.Model, result: mathopt.SolveResult, program: Program
) -> Answer:
    reason = result.termination.reason
    bound = result.termination.objective_bounds.dual_bound
    x = None
    if result.has_primal_feasible_solution():
        x = np.array(result.variable_values(list(model.variables())))
        binary = program.columns - program.overruns_allowed
        x[:binary] = np.round(x[:binary])
    return Answer(
        x,
        bound if np.isfinite(bound) else -np.inf,
        reason == mathopt.TerminationReason.OPTIMAL,
        reason
        in (
            mathopt.TerminationReason.INFEASIBLE,
            mathopt.TerminationReason.INFEASIBLE_OR_UNBOUNDED,
        ),
    )


def _model(program: Program, cost: Floats, *, integer: bool) -> mathopt.Model:
    """Build the model from arrays: term by term would cost seconds."""
    proto = model_pb2.ModelProto()
    columns, rows = range(program.columns), range(len(program.low))
    proto.variables.ids.extend(columns)
    proto.variables.lower_bounds.extend(np.zeros(program.columns))
    binary = program.columns - program.overruns_allowed
    upper = np.where(np.arange(program.columns) < binary, 1.0, INFINITY)
    proto.variables.upper_bounds.extend(upper)
    whole = [integer] * binary + [False] * program.overruns_allowed
    proto.variables.integers.extend(whole)
    proto.linear_constraints.ids.extend(rows)
    proto.linear_constraints.lower_bounds.extend(program.low)
    proto.linear_constraints.upper_bounds.extend(program.high)
    entries = program.matrix.tocoo()
    order = np.lexsort((entries.col, entries.row))
    proto.linear_constraint_matrix.row_ids.extend(entries.row[order])
    proto.linear_constraint_matrix.column_ids.extend(entries.col[order])
    proto.linear_constraint_matrix.coefficients.extend(entries.data[order])
    used = np.flatnonzero(cost)
    proto.objective.linear_coefficients.ids.extend(used)
    proto.objective.linear_coefficients.values.extend(cost[used])
    return mathopt.Model.from_model_proto(proto)
