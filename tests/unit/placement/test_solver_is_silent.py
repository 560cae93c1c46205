"""Standard output belongs to the user: what solvers print by themselves stays out."""

import os
from typing import Any

import numpy as np
import pytest
from ortools.math_opt.python import mathopt

from placer.placement import solver
from placer.placement.matrix import Builder, RowKey


def test_nothing_a_solver_prints_reaches_standard_output(
    capfd: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    whole = mathopt.solve

    def noisy(*arguments: Any, **named: Any) -> Any:
        os.write(1, b"noise of a solver\n")
        return whole(*arguments, **named)

    monkeypatch.setattr(mathopt, "solve", noisy)
    builder = Builder(2, 2)
    builder.at_most(RowKey("room"), [0, 1], np.array([2.0, 3.0]), 4)
    answer = solver.solve(builder.build(), np.array([-1.0, -2.0]), seconds=5)
    os.write(1, b"ours\n")
    assert capfd.readouterr().out == "ours\n"
    assert answer.x is not None
    assert answer.x.tolist() == [0.0, 1.0]
