"""Numbers as text: what is clear is exact, what is not is refused."""

from decimal import Decimal

import pytest
from hypothesis import given
from hypothesis import strategies as st

from placer.workbook.reading.numbers import (
    AmbiguousNumberError,
    NotANumberError,
    number,
)

AMOUNTS = st.decimals(min_value=-(10**12), max_value=10**12, places=2, allow_nan=False)


@given(AMOUNTS)
def test_a_plain_number_comes_back(amount: Decimal) -> None:
    assert number(str(amount)) == amount


@given(AMOUNTS)
def test_a_number_with_two_decimals_comes_back_from_every_way_of_grouping(
    amount: Decimal,
) -> None:
    english = f"{amount:,.2f}"
    swapped = english.translate(str.maketrans(",.", ".,"))
    assert number(english) == amount
    assert number(swapped) == amount
    for mark in (" ", "\u00a0", "\u202f", "'", "\u2019"):
        assert number(english.replace(",", mark)) == amount


@given(st.integers(min_value=10**6, max_value=10**15))
def test_a_whole_number_with_two_marks_or_more_is_clear(whole: int) -> None:
    assert number(f"{whole:,}") == whole
    assert number(f"{whole:,}".replace(",", ".")) == whole


@given(
    st.floats(allow_nan=False, allow_infinity=False, min_value=-1e99, max_value=1e99)
)
def test_the_shortest_text_of_a_float_comes_back(value: float) -> None:
    assert float(number(repr(value))) == value


@given(st.integers(min_value=1, max_value=999), st.integers(min_value=0, max_value=999))
def test_one_comma_before_three_digits_is_never_guessed(left: int, right: int) -> None:
    with pytest.raises(AmbiguousNumberError):
        number(f"{left},{right:03}")


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("12,5", "12.5"),
        ("0,125", "0.125"),
        ("1234,567", "1234.567"),
        ("1,234.5", "1234.5"),
        ("1.234,5", "1234.5"),
        ("\u22123", "-3"),
        (" 1e3 ", "1000"),
        (".5", "0.5"),
    ],
)
def test_what_has_one_reading_is_read(text: str, value: str) -> None:
    assert number(text) == Decimal(value)


@pytest.mark.parametrize(
    "text",
    ["", "-", "n/a", "12 GiB", "1,23,456", "1.2.3", "12 34", "nan", "inf", "1e9999"],
)
def test_what_is_no_number_is_refused(text: str) -> None:
    with pytest.raises(NotANumberError):
        number(text)
