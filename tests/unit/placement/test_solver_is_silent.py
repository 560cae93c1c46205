"""Standard output belongs to the user: what solvers print by themselves stays out."""

import os

import numpy as np
import pytest

from placer.placement import solver
from placer.placement.matrix import Builder, RowKey


def test_nothing_a_solver_prints_reaches_standard_output(
    capfd: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    whole = solver.mathopt.solve

    def noisy(*arguments: object, **named: object) -> object:
        os.write(1, b"noise of a solver\n")
        return whole(*arguments, **named)  # type: ignore[arg-type]

    monkeypatch.setattr(solver.mathopt, "solve", noisy)
    builder = Builder(2, 2)
    builder.at_most(RowKey("room"), [0, 1], np.array([2.0, 3.0]), 4)
    answer = solver.solve(builder.build(), np.array([-1.0, -2.0]), seconds=5)
    os.write(1, b"ours\n")
    assert capfd.readouterr().out == "ours\n"
    assert answer.x is not None
    assert answer.x.tolist() == [0.0, 1.0]
