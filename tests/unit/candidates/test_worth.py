"""What a place is worth: steps missed, relief and effort, worked out by hand.

Flash without ratings answers a read in its read time, however busy it is.
"""

from dataclasses import replace

import pytest
from smallestate import estate, load, policy, pool, volume, window

from placer.candidates.table import Candidates, candidates
from placer.candidates.worth import effort, steps_missed
from placer.estate import Array, Estate, Importance, Load, Media, Volume
from placer.units import GIB

NORMAL, VITAL = 2, 8


def table(
    lone: Volume, read_time: int = 1_000, array: Array | None = None
) -> Candidates:
    pools = [
        pool("depot/heap", Media.UNMODELLED, 500),
        pool("quay/fast", Media.FLASH, 500, read_time=read_time),
    ]
    return candidates(
        estate([lone], pools, arrays=[Array(name="depot"), array or Array(name="quay")])
    )


def lone(measured: float, *loads: Load) -> Volume:
    hours = loads or (load(100, kib=0),)
    return volume("a", "depot/heap", 100, *hours, measured=measured)


@pytest.mark.parametrize(
    ("response", "steps"),
    [
        (0, 0),
        (1_000, 0),
        (1_100, 0),
        (1_101, 1),
        (1_200, 1),
        (1_201, 2),
        (2_000, 9),
        (2_100, 10),
        (9_000, 10),
    ],
)
def test_steps_of_a_tenth_over_limit_and_tolerance(response: int, steps: int) -> None:
    """A limit of 1 ms, 10 % tolerated: 1.1 ms is kept, then a step each 0.1 ms."""
    limited = replace(lone(10), response_limit=1_000)
    assert steps_missed(limited, response, policy(tolerance=100_000)) == steps


def test_without_a_limit_none_is_missed() -> None:
    assert steps_missed(lone(10), 10**9, policy()) == 0


def test_steps_missed_are_weighted_by_importance() -> None:
    """1.35 ms at home: 3 steps over 1.1; 1 ms on flash: none."""
    vital = replace(lone(1.35), response_limit=1_000, importance=Importance.VITAL)
    assert table(vital).missed.tolist() == [[VITAL * 3, 0]]


def test_relief_is_the_waiting_saved() -> None:
    """9 ms less for 100 requests/s, weight 2; for a vital volume weight 8."""
    assert table(lone(10)).relief.tolist() == [[0, NORMAL * 100 * 9]]
    vital = replace(lone(10), importance=Importance.VITAL)
    assert table(vital).relief.tolist() == [[0, VITAL * 100 * 9]]


@pytest.mark.parametrize(
    ("read_time", "relief"), [(7_000, NORMAL * 100 * 3), (7_001, 0), (10_000, 0)]
)
def test_a_gain_counts_from_the_least_gain_up(read_time: int, relief: float) -> None:
    """30 % of 10 ms are 3 ms."""
    assert table(lone(10), read_time).relief.tolist() == [[0, relief]]


def test_a_loss_counts_whole() -> None:
    """10.001 ms for 10: a loss below the least gain counts all the same."""
    found = table(lone(10), 10_001).relief[0, 1]
    assert found == pytest.approx(-NORMAL * 100 * 0.001)


def test_nothing_is_gained_where_a_response_is_not_known() -> None:
    assert table(lone(0)).relief.tolist() == [[0, 0]]
    assert table(lone(10), read_time=0).relief.tolist() == [[0, 0]]


def test_nothing_is_gained_without_requests() -> None:
    assert table(lone(10, load(0))).relief.tolist() == [[0, 0]]


def test_the_first_busiest_hour_counts() -> None:
    """Reads and writes together: 60 + 60 at 01:00; writes answer in 0.2 ms.

    (60 x 1 + 60 x 0.2) / 120 = 0.6 ms for 10: 9.4 ms less for 120 requests/s.
    """
    hours = load(100, 0, 0), load(60, 60, 0), load(0, 120, 0)
    quay = Array(name="quay", write_answer=200)
    found = table(lone(10, *hours), array=quay).relief[0, 1]
    assert found == pytest.approx(NORMAL * 120 * 9.4)


def test_effort_is_what_is_copied_and_what_a_cutover_counts_as() -> None:
    wishes = policy(cutover_counts_as=5 * GIB)
    assert effort(20 * GIB, wishes) == 25
    assert table(lone(10)).effort.tolist() == [[0, 110]]


def test_effort_counts_the_size_at_the_last_night() -> None:
    """Twelve months to the last window, 50 % a year: 90 of 60 GiB, thin."""
    growing = replace(lone(10), thin=True, occupied=60 * GIB, capacity_growth=500_000)
    last = window(359, hours=2)
    whole: Estate = replace(table(growing).estate, windows=(last,))
    assert candidates(whole).effort[0, 1] == pytest.approx(90 + 10)
