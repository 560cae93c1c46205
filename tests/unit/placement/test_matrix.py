"""Programs as arrays: rows are scaled, added, loosened and cut down without change."""

import numpy as np
import pytest
from unit.placement.programs import COLUMNS, EVERYTHING, PLACES, program, solutions

from placer.placement.matrix import Builder, Floats, Program, RowKey, common_unit


def two_rows() -> Program:
    """Return 3 x + 4 y <= 5 and x + z = 1."""
    builder = Builder(3, 2)
    builder.at_most(RowKey("room", "p", 0), [0, 1], np.array([3.0, 4.0]), 5)
    builder.equal(RowKey("one"), [0, 2], np.ones(2), 1)
    return builder.build()


def vector(*values: float) -> Floats:
    return np.array(values, dtype=float)


def test_a_solution_holds_exactly_if_no_row_is_broken() -> None:
    rows = two_rows()
    assert rows.holds(vector(1, 0, 0))
    assert rows.holds(vector(0, 1, 1))
    assert not rows.holds(vector(1, 1, 0)), "3 + 4 > 5"
    assert not rows.holds(vector(0, 0, 0)), "x + z = 0"
    assert not rows.holds(vector(1, 0, 1)), "x + z = 2"


def test_overruns_are_shares_of_the_side() -> None:
    """3 + 4 is 2 more than 5: 40 %; x + z may be wrong on either side."""
    over = two_rows().overruns
    assert over(vector(1, 1, 0)) == pytest.approx([0.4, 0])
    assert over(vector(0, 0, 0)) == pytest.approx([0, 1])
    assert over(vector(1, 0, 1)) == pytest.approx([0, 1])
    assert over(vector(0, 1, 1)) == pytest.approx([0, 0])


def test_a_program_without_rows_holds() -> None:
    assert Builder(2, 2).build().holds(vector(1, 1))
    assert Builder(2, 2).build().columns == 2


def test_largest_coefficient_or_side_is_one() -> None:
    matrix = two_rows().matrix.toarray()
    assert matrix[0] == pytest.approx([0.6, 0.8, 0])
    builder = Builder(1, 1)
    builder.at_most(RowKey("room"), [0], np.array([1e13]), 5e12)
    assert builder.build().matrix.toarray()[0, 0] == 1


def test_limits_without_a_unit_are_shrunk_by_more_than_the_tolerance() -> None:
    builder = Builder(2, 2)
    values = np.array([np.pi, np.sqrt(2.0)])
    builder.at_most(RowKey("room"), [0, 1], values, float(values.sum()))
    assert not builder.build().holds(vector(1, 1))
    builder.at_most(RowKey("room"), [0, 1], values, float(values.sum()) * (1 + 1e-5))
    assert Builder(2, 2).build().holds(vector(1, 1))


def test_values_of_one_column_twice_add_up() -> None:
    """Two volumes kept apart in one item must not both count once."""
    builder = Builder(1, 1)
    builder.at_most(RowKey("apart"), [0, 0], np.ones(2), 1)
    assert not builder.build().holds(vector(1))


def test_one_more_row_leaves_the_others() -> None:
    more = two_rows().with_row(RowKey("goal"), vector(0, 100, 0), 50)
    assert [key.code for key in more.keys] == ["room", "one", "goal"]
    assert more.choices == 2
    assert more.holds(vector(1, 0, 0))
    assert not more.holds(vector(0, 1, 1)), "100 > 50"
    assert not more.holds(vector(1, 1, 0)), "3 + 4 > 5"
    assert more.overruns(vector(0, 1, 1)) == pytest.approx([0, 0, 0.5])


def test_a_row_of_nothing_within_nothing_holds() -> None:
    assert two_rows().with_row(RowKey("goal"), np.zeros(3), 0).holds(vector(1, 0, 0))


def test_negative_goals_are_kept_from_the_right_side() -> None:
    """A gain of 8 reached: -8 at most."""
    more = two_rows().with_row(RowKey("goal"), vector(-8, -9, 0), -8)
    assert more.holds(vector(1, 0, 0))
    assert more.holds(vector(0, 1, 1))
    assert not more.holds(vector(0, 0, 1))


def test_a_loosened_row_may_be_overrun_by_its_own_column_only() -> None:
    loose = two_rows().elastic(np.array([0]))
    assert loose.columns == 4
    assert loose.overruns_allowed == 1
    assert loose.holds(vector(1, 1, 0, 0.4))
    assert not loose.holds(vector(1, 1, 0, 0.39))
    assert not loose.holds(vector(0, 0, 0, 5)), "x + z = 1 stays hard"


@pytest.mark.parametrize("seed", range(10))
def test_a_program_cut_down_says_the_same_about_what_is_left(seed: int) -> None:
    whole = program(seed)
    luck = np.random.default_rng(seed)
    x = luck.integers(0, 2, COLUMNS).astype(float)
    free = np.flatnonzero(luck.random(COLUMNS) < 0.5)
    small = whole.restricted(free, x)
    assert small.columns == len(free)
    assert small.choices == sum(column < PLACES for column in free)
    for other in EVERYTHING[luck.integers(0, len(EVERYTHING), 200)]:
        tried = x.copy()
        tried[free] = other[free]
        assert small.holds(other[free]) == whole.holds(tried)


@pytest.mark.parametrize(
    ("values", "unit"),
    [
        ([0.5, 0.75], 0.25),
        ([-0.5, 0.2], 0.1),
        ([0.3], 0.3),
        ([0.0, 0.4], 0.4),
        ([], 0.0),
        ([1.0, 2e-6], 0.0),
    ],
)
def test_the_common_unit_of_a_few_numbers(values: list[float], unit: float) -> None:
    assert common_unit(np.array(values, dtype=float)) == pytest.approx(unit, abs=1e-12)


def test_random_programs_are_of_all_kinds() -> None:
    """The trials with them prove little if all were possible, or none."""
    counts = [len(solutions(program(seed))) for seed in range(60)]
    assert 10 < sum(count > 0 for count in counts) < 60
    assert max(counts) > 20
