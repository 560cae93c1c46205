"""Prefixes, conversions and the directions of rounding."""

from decimal import Decimal
from fractions import Fraction

import pytest
from hypothesis import given
from hypothesis import strategies as st

from placer.units import (
    GB,
    GIB,
    KB,
    KIB,
    MB,
    MIB,
    MINUTES_PER_DAY,
    MINUTES_PER_HOUR,
    PERCENT,
    PPM,
    SECONDS_PER_DAY,
    TB,
    Side,
    demand,
    gib,
    percent,
    supply,
    whole,
)

NUMBERS = st.decimals(-(10**9), 10**9, places=6)
UNITS = st.sampled_from([1, 1000, GIB])


def test_binary_prefixes() -> None:
    """IEC 80000-13: kibi, mebi, gibi."""
    assert (KIB, MIB, GIB) == (1024, 1_048_576, 1_073_741_824)


def test_decimal_prefixes() -> None:
    """International System of Units: kilo, mega, giga, tera."""
    assert (KB, MB, GB, TB) == (1000, 1_000_000, 1_000_000_000, 1_000_000_000_000)


@pytest.mark.parametrize(
    ("binary", "decimal", "excess"),
    [(KIB, KB, 2.4), (MIB, MB, 4.8576), (GIB, GB, 7.3742), (KIB * GIB, TB, 9.9512)],
)
def test_binary_prefixes_exceed_the_decimal_ones(
    binary: int, decimal: int, excess: float
) -> None:
    """Excess in percent, from the definitions of IEC 80000-13."""
    assert (binary / decimal - 1) * 100 == pytest.approx(excess, abs=5e-5)


@pytest.mark.parametrize(
    ("size", "expected"),
    [(GB, 0.931323), (TB, 0.909495 * KIB), (300 * GB, 279.397), (10 * GIB, 10)],
)
def test_bytes_in_gib(size: int, expected: float) -> None:
    """1 GB, 1 TB and 300 GB, from the definitions of IEC 80000-13."""
    assert gib(size) == pytest.approx(expected, rel=1e-6)


def test_requests_times_size_is_a_rate() -> None:
    """10 000 requests/s of 8 KiB are 81.92 MB/s or 78.125 MiB/s (arithmetic)."""
    rate = 10_000 * whole(Decimal(8), KIB, Side.DEMAND)
    assert rate == whole(Decimal("81.92"), MB, Side.NEUTRAL)
    assert rate == whole(Decimal("78.125"), MIB, Side.NEUTRAL)


@pytest.mark.parametrize(
    ("size", "unit", "seconds"), [(10_240, GIB, 54_975.6), (10, TB, 50_000)]
)
def test_copy_time(size: int, unit: int, seconds: float) -> None:
    """10 TiB and 10 TB at 200 MB/s (arithmetic)."""
    carried = whole(Decimal(size), unit, Side.DEMAND)
    assert carried / (200 * MB) == pytest.approx(seconds, abs=0.05)


def test_units_of_time_agree() -> None:
    assert MINUTES_PER_DAY == 24 * MINUTES_PER_HOUR
    assert SECONDS_PER_DAY == 60 * MINUTES_PER_DAY


def test_percent_of_parts_per_million() -> None:
    assert percent(PPM) == 100
    assert whole(Decimal("12.5"), PERCENT, Side.NEUTRAL) == 125_000


@pytest.mark.parametrize(
    ("number", "expected"),
    [("0.1", (1, 0, 0)), ("0.5", (1, 0, 0)), ("1.5", (2, 1, 2)), ("-0.5", (0, -1, 0))],
)
def test_demand_is_rounded_up_supply_down_and_the_rest_to_the_nearest_even(
    number: str, expected: tuple[int, int, int]
) -> None:
    """Ties to even as in IEEE 754 (roundTiesToEven), from memory."""
    sides = (Side.DEMAND, Side.SUPPLY, Side.NEUTRAL)
    assert tuple(whole(Decimal(number), 1, side) for side in sides) == expected


@given(NUMBERS, UNITS)
def test_typed_demand_never_falls_short_and_supply_never_exceeds(
    number: Decimal, unit: int
) -> None:
    exact = Fraction(number) * unit
    above, below = (whole(number, unit, side) for side in (Side.DEMAND, Side.SUPPLY))
    assert below <= exact <= above
    assert above - below == (exact.denominator > 1)
    assert whole(number, unit, Side.NEUTRAL) in (above, below)


@given(st.fractions())
def test_computed_demand_is_rounded_up_and_supply_down(value: Fraction) -> None:
    assert supply(value) <= value <= demand(value)
    assert demand(value) - supply(value) == (value.denominator > 1)


@given(st.integers())
def test_whole_numbers_stay_as_they_are(value: int) -> None:
    assert demand(value) == supply(value) == value
