"""Busy share and response of one drive, against worked examples of queueing theory.

Service times are exponential in these books, so the rest of the request in service is
a whole mean time; placer's busy share and wait are used as they are.
"""

import pytest
from smallestate import drives_busy, load, pool

from placer.estate import Media, Pool
from placer.physics.queueing import wait
from placer.units import MS, PPM


def drive(service: float) -> Pool:
    """Return a drive that takes ``service`` [ms] for any request."""
    return pool(
        "quay/slow", Media.SPINNING, 0, drives=1, seek=round(service * MS), skew=PPM
    )


def busy(per_second: float, service: float) -> float:
    return drives_busy(drive(service), load(per_second, kib=0))


def test_busy_time_over_time_is_the_rate_times_the_service_time() -> None:
    """Menasce, Almeida, Dowdy, "Performance by Design", 2004, section 3.2.

    60 s measured, 36 s busy, 1800 requests done: 30/s of 20 ms keep it 60 % busy.
    """
    measured, occupied, done = 60, 36, 1_800
    assert busy(done / measured, occupied / done * MS) == pytest.approx(0.6)


def test_the_utilisation_law() -> None:
    """Lazowska, Zahorjan, Graham, Sevcik, "Quantitative System Performance", 1984.

    Chapter 3 (from memory): 40 requests/s of 22.5 ms, 90 % busy.
    """
    assert busy(40, 22.5) == pytest.approx(0.9)


@pytest.mark.parametrize(
    ("per_second", "service", "share", "waits", "response", "queued"),
    [
        (100, 8, 0.8, 32, 40, 3.2),
        (100, 4, 0.4, 2.667, 6.667, 0.2667),
        (80, 6, 0.48, 5.538, 11.538, 0.4431),
        (80, 3, 0.24, 0.947, 3.947, 0.0758),
        (10, 20, 0.2, 5, 25, 0.05),
        (40, 20, 0.8, 80, 100, 3.2),
    ],
)
def test_a_disk_with_one_queue(
    per_second: float,
    service: float,
    share: float,
    waits: float,
    response: float,
    queued: float,
) -> None:
    """Exercises of a storage course; the last two of Hennessy, Patterson.

    "Computer Architecture", I/O queueing examples (those from memory).  Requests that
    wait are the rate times the wait (Little's law).  Times [ms].
    """
    found = wait(busy(per_second, service), service)
    assert busy(per_second, service) == pytest.approx(share)
    assert found == pytest.approx(waits, abs=5e-4)
    assert found + service == pytest.approx(response, abs=5e-4)
    assert per_second * found / MS == pytest.approx(queued, abs=5e-5)
