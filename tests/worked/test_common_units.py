"""Limits in whole units: what fills a pool to the last byte fits, one byte more not."""

from math import gcd

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from placer.placement.matrix import Builder, RowKey, common_unit
from placer.units import GIB

sizes = st.lists(st.integers(1, 2_000), min_size=1, max_size=40)


@settings(derandomize=True, max_examples=200, deadline=None)
@given(sizes, st.sampled_from([1.0, 1.5, 3.7, 1 / 3]))
def test_the_unit_of_whole_numbers_is_their_greatest_common_divisor(
    counts: list[int], reduction: float
) -> None:
    """Held against the standard library, whatever the values are scaled by."""
    values = np.array(counts) * GIB / reduction
    scale = values.sum()
    expected = gcd(*counts) * GIB / reduction
    assert common_unit(values / scale) * scale == pytest.approx(expected, rel=1e-12)


def test_numbers_without_a_unit_have_none() -> None:
    """Ratios of the circle's and the square's irrational numbers."""
    assert common_unit(np.array([1.0, np.pi / 4, np.sqrt(0.5)])) == 0


@settings(derandomize=True, max_examples=200, deadline=None)
@given(sizes, st.sampled_from([1.0, 1.5, 3.7, 1 / 3]))
def test_what_fills_the_limit_to_the_last_unit_fits(
    counts: list[int], reduction: float
) -> None:
    values = np.array(counts) * GIB / reduction
    everything = np.ones(len(counts))
    limit = sum(counts) * GIB / reduction

    def fits(limit: float) -> bool:
        builder = Builder(len(counts), len(counts))
        builder.at_most(RowKey("pool-room"), range(len(counts)), values, limit)
        return builder.build().holds(everything)

    assert fits(limit)
    assert not fits(limit * (1 - 1e-6))
