"""Waiting before service, against queueing theory and its worked examples."""

from collections.abc import Sequence

import pytest

from placer.physics.queueing import MOST_BUSY, wait


def mixed(streams: Sequence[tuple[float, float]]) -> tuple[float, float, float]:
    """Return busy share, mean service [ms] and variation of (1/s, ms) fixed times."""
    rate = sum(r for r, _ in streams)
    mean = sum(r * s for r, s in streams) / rate
    square = sum(r * s * s for r, s in streams) / rate
    return rate * mean / 1_000, mean, square / mean**2 - 1


def queued(busy: float, service: float, variation: float = 0.0) -> float:
    """Wait behind the residual E[s^2] / (2 E[s]) = S (1 + c^2) / 2."""
    return wait(busy, service * (1 + variation) / 2)


@pytest.mark.parametrize(
    ("busy", "expected"),
    [(0.5, 1.5), (0.7, 2.1667), (0.8, 3), (0.9, 5.5), (0.95, 10.5)],
)
def test_response_over_service_with_fixed_times(busy: float, expected: float) -> None:
    """M/D/1, R/S = 1 + U / (2 (1 - U)): Pollaczek-Khinchine without variation."""
    assert 1 + queued(busy, 1.0) == pytest.approx(expected, abs=5e-5)


@pytest.mark.parametrize(
    ("busy", "service", "expected"), [(0.2, 20, 5), (0.8, 20, 80), (0.4, 4, 2.667)]
)
def test_wait_with_exponential_times(
    busy: float, service: float, expected: float
) -> None:
    """M/M/1: 10 and 40 requests/s of 20 ms on a disk wait 5 and 80 ms.

    Hennessy, Patterson, "Computer Architecture", I/O queueing examples (from memory);
    100 requests/s of 4 ms wait 2.667 ms (a storage course's exercise).
    """
    assert queued(busy, service, 1.0) == pytest.approx(expected, abs=5e-4)


@pytest.mark.parametrize(
    ("streams", "expected"),
    [
        ([(2_000, 0.1)], 0.0125),
        ([(2_000, 0.1), (50, 4.0)], 0.68333),
        ([(40, 6.0), (8, 26.0)], 6.2029),
    ],
)
def test_wait_behind_requests_of_mixed_sizes(
    streams: Sequence[tuple[float, float]], expected: float
) -> None:
    """W = lambda E[S^2] / (2 (1 - U)); R. Cooper, "Introduction to Queueing Theory".

    1981, p. 189.  Small requests behind a few large ones wait 54 times longer [ms].
    """
    busy, service, variation = mixed(streams)
    assert queued(busy, service, variation) == pytest.approx(expected, abs=5e-5)


def test_fixed_times_wait_least() -> None:
    """Pollaczek-Khinchine: any variation adds, so the plan may say "at least"."""
    assert queued(0.7, 1.0) < queued(0.7, 1.0, 0.1) < queued(0.7, 1.0, 1.0)


def test_an_overloaded_server_keeps_a_finite_wait() -> None:
    assert queued(1.4, 1.0) == queued(MOST_BUSY, 1.0) == pytest.approx(9.5)
