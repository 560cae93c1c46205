"""Sizes and loads with their growth, and the months that count."""

from dataclasses import replace
from fractions import Fraction

import pytest

from placer.audit.demand import (
    GRAIN,
    busiest,
    busiest_requests,
    grown,
    growth,
    months_of_nights,
    size,
)
from placer.estate import Estate, Load, Policy, Volume, Window

VOLUME = Volume(
    array="a",
    name="v",
    pool="p",
    provisioned=200,
    occupied=100,
    thin=True,
    load=(Load(3, 1, 7, 5), Load(2, 2, 0, 0), Load(1, 4, 0, 0), Load(5, 0, 0, 0)),
)


def test_growth_compounds_by_the_year() -> None:
    """100 at 25 % a year are 195.3125 after three years."""
    assert 100 * growth(250_000, 36) == Fraction(1_953_125, 10_000)


def test_growth_of_a_month_is_the_twelfth_root() -> None:
    """25 % a year are 1.87693 % a month."""
    assert float(growth(250_000, 1) - 1) == pytest.approx(0.0187693, abs=5e-8)


def test_a_root_that_is_rational_comes_out_exact() -> None:
    assert growth(210_000, 6) == Fraction(11, 10)


def test_no_growth_is_one_and_a_shrinking_volume_shrinks() -> None:
    assert growth(0, 7) == 1
    assert growth(-1_000_000, 12) == 0
    assert growth(-190_000, 6) == Fraction(9, 10)


@pytest.mark.parametrize(
    ("thin", "months", "expected"),
    [(True, 0, 100), (True, 12, 131), (True, 48, 200), (False, 0, 200)],
)
def test_thin_volumes_grow_up_to_what_is_provisioned(
    thin: bool, months: int, expected: int
) -> None:
    volume = replace(VOLUME, thin=thin, capacity_growth=301_000)
    assert size(volume, months) == expected


def test_loads_keep_their_order_and_round_up() -> None:
    assert grown(VOLUME, 0)[:4] == (3 * GRAIN, GRAIN, 7 * GRAIN, 5 * GRAIN)
    third = grown(replace(VOLUME, load_growth=100_000), 1)[0]
    assert 0 < third - 3 * GRAIN * growth(100_000, 1) < 1


def test_the_busiest_hour_is_the_first_with_the_most_requests() -> None:
    assert busiest(VOLUME) == 2
    assert busiest_requests(VOLUME) == 5


def test_a_month_begun_counts_whole() -> None:
    """30 days from the start to the end of the last window are 43,200 minutes."""
    assert months_of_nights(until(43_200)) == 1
    assert months_of_nights(until(43_201)) == 2


def test_without_windows_no_month_passes() -> None:
    assert months_of_nights(replace(until(43_200), windows=())) == 0


def until(end: int) -> Estate:
    """Return an estate whose last window ends so many minutes after the start."""
    start = 1_000
    night = Window(name="w", night="n", opens=0, start=0, end=start + end, zone="UTC")
    return Estate(
        name="e",
        digest="",
        hours=(),
        volumes=(),
        pools=(),
        arrays=(),
        policy=Policy(start=start, earliest=start),
        windows=(night, replace(night, name="early", end=start + 1)),
    )
