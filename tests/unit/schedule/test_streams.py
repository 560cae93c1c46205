"""Copies side by side, held to the bounds of scheduling on parallel machines.

One long window; a copy of p GB x 6 at 100 MB/s takes p minutes; "copies at once" of an
array are its machines.  Volumes are tried in the order of the lists, so whole copies
are a list schedule: R. L. Graham, "Bounds for certain multiprocessing anomalies", 1966,
and "Bounds on multiprocessing timing anomalies", SIAM J. Appl. Math. 17, 1969.
"""

from collections.abc import Sequence
from dataclasses import replace
from fractions import Fraction
from itertools import permutations

import pytest
from booked import Case, booked, of_bytes
from smallestate import estate, pool, volume, window

from placer.estate import Array, Media, Window
from placer.units import MB

MINUTE = 6
"""Gigabytes that a copy carries in a minute."""

HOUR = 60
RATE = 100 * MB


def streams(times: Sequence[int], machines: int) -> Case:
    """Return copies of the lengths given [h] inside one array, tried in that order."""
    names = [f"v{number:02}" for number in range(len(times))]
    volumes = [
        of_bytes(volume(name, "a/old", 1), time * HOUR * MINUTE)
        for name, time in zip(names, times, strict=True)
    ]
    arrays = [Array(name="a", one_copy=RATE, copies_at_once=machines)]
    pools = [pool(f"a/{name}", Media.SPINNING, 10**6) for name in ("old", "new")]
    made = estate(volumes, pools, arrays=arrays, windows=(window(1, 100),))
    return booked(made, dict.fromkeys(names, "a/new"), order=names)


def makespan(case: Case) -> Fraction:
    """Return when the last copy ends, in hours from the opening."""
    ends = max(move.ends for move in case.schedule.moves)
    return Fraction(ends - case.estate.windows[0].opens, HOUR)


@pytest.mark.parametrize("machines", [2, 3, 4])
def test_one_long_copy_at_the_end_of_the_list_costs_almost_twice(machines: int) -> None:
    """Graham 1966: m(m - 1) jobs of 1, then one of m: 2m - 1 instead of m."""
    case = streams([1] * machines * (machines - 1) + [machines], machines)
    assert makespan(case) == 2 * machines - 1
    assert case.broken == set()


@pytest.mark.parametrize(
    ("machines", "times", "ends"),
    [
        (2, (3, 3, 2, 2, 2), 7),
        (3, (5, 5, 4, 4, 3, 3, 3), 11),
        (4, (7, 7, 6, 6, 5, 5, 4, 4, 4), 15),
    ],
)
def test_longest_first_ends_where_its_bound_is_tight(
    machines: int, times: tuple[int, ...], ends: int
) -> None:
    """Graham 1969: (4/3 - 1/(3m)) times the optimum, on these lists exactly."""
    assert makespan(streams(times, machines)) == ends


@pytest.mark.parametrize("machines", [2, 3])
def test_no_order_leaves_the_bounds(machines: int) -> None:
    """McNaughton 1959 from below; (2 - 1/m) times the optimum of Graham from above."""
    optimum = {2: 7, 3: 5}[machines]
    times = (5, 4, 3, 2)
    least = max(Fraction(max(times)), Fraction(sum(times), machines))
    for order in permutations(times):
        found = makespan(streams(order, machines))
        assert least <= found <= (2 - Fraction(1, machines)) * optimum


def rounds(pairs: Sequence[str], at_once: int = 1) -> Case:
    """Return copies of an hour between arrays: ``ab`` goes from a to b."""
    names = [f"v{number:02}" for number in range(len(pairs))]
    volumes = [
        of_bytes(volume(name, f"{pair[0]}/old", 1), HOUR * MINUTE)
        for name, pair in zip(names, pairs, strict=True)
    ]
    arrays = [
        Array(name=name, one_copy=RATE, copies_at_once=at_once)
        for name in sorted(set("".join(pairs)))
    ]
    pools = [
        pool(f"{array.name}/{name}", Media.SPINNING, 10**6)
        for array in arrays
        for name in ("old", "new")
    ]
    made = estate(volumes, pools, arrays=arrays, windows=(window(1, 100),))
    ways = {n: f"{pair[1]}/new" for n, pair in zip(names, pairs, strict=True)}
    return booked(made, ways, order=names)


@pytest.mark.parametrize("times", [1, 2, 3])
def test_a_triangle_of_copies_takes_a_round_for_each(times: int) -> None:
    """Chromatic index 3k of a triangle of k-fold edges (Shannon 1949)."""
    case = rounds(["ab", "bc", "ca"] * times)
    assert makespan(case) == 3 * times
    assert case.broken == set()


def test_two_places_at_each_array_take_the_double_triangle_in_two_rounds() -> None:
    """All limits even: max of degree / limit (Kari, Kim, Russell, ICDCS 2011)."""
    assert makespan(rounds(["ab", "bc", "ca"] * 2, at_once=2)) == 2


CLASSES = ["ac", "bd", "ac", "bd", "ac", "be", "ad", "be", "ae"]


def test_copies_between_two_sides_need_as_many_rounds_as_the_busiest_array() -> None:
    """Koenig 1916: degree 5, and classes of that size exist; listed class by class."""
    case = rounds(CLASSES)
    assert makespan(case) == 5
    assert case.broken == set()


@pytest.mark.parametrize("shift", range(9))
def test_no_order_needs_more_than_twice_the_degree(shift: int) -> None:
    """A copy meets at most 2 (degree - 1) others, so 2 x 5 - 1 rounds always do."""
    found = makespan(rounds(CLASSES[shift:] + CLASSES[:shift]))
    assert 5 <= found <= 9


def pair(array: Array, night: Window) -> Case:
    """Return two copies of an hour each out of an array in one night."""
    volumes = [of_bytes(volume(n, "a/old", 1), HOUR * MINUTE) for n in "xy"]
    pools = [pool(p, Media.SPINNING, 10**6) for p in ("a/old", "b/new")]
    arrays = [array, Array(name="b")]
    made = estate(volumes, pools, arrays=arrays, windows=(night,))
    return booked(made, dict.fromkeys("xy", "b/new"))


@pytest.mark.parametrize("by", ["array", "window"])
def test_a_second_copy_takes_what_the_first_one_leaves(by: str) -> None:
    """175 MB/s in all: 75 MB/s at once end in 80 minutes, 100 MB/s later in 120."""
    all_ = 175 * MB
    array = Array(name="a", one_copy=RATE, copies_out=all_ if by == "array" else 0)
    case = pair(array, replace(window(1), rate=all_ if by == "window" else 0))
    assert [case.pieces(name)[0].rate for name in "xy"] == [RATE, 75 * MB]
    assert makespan(case) == Fraction(80, HOUR)
    assert case.broken == set()


def test_a_second_copy_waits_where_a_window_has_one_place() -> None:
    case = pair(Array(name="a", one_copy=RATE), replace(window(1), at_once=1))
    assert makespan(case) == 2
    assert case.broken == set()
