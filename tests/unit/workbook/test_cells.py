"""Single cells: the value, or the fault with its code, and never a guess."""

from datetime import date, datetime, time, timedelta
from decimal import Decimal
from fractions import Fraction

import pytest
from hypothesis import given
from hypothesis import strategies as st

from placer.findings import Place
from placer.workbook.column import Column
from placer.workbook.columns import SETTINGS, sheet
from placer.workbook.reading.cells import read_cell
from placer.workbook.reading.raw import Cell, Trouble
from placer.workbook.reading.scales import own_scale
from placer.workbook.reading.values import CellFaultError, Quantity, Value


def column(name: str) -> Column:
    sheet_name, _, column_name = name.partition("/")
    if sheet_name == "policy":
        return next(each for each in SETTINGS if each.name == column_name)
    return sheet(sheet_name).column(column_name)


def value(name: str, raw: object, *, percent: bool = False) -> Value:
    asked = column(name)
    cell = Cell(raw, Place("s", "A1"), percent=percent)
    return read_cell(cell, asked, own_scale(asked))


def fault(name: str, raw: object, *, percent: bool = False) -> CellFaultError:
    with pytest.raises(CellFaultError) as caught:
        value(name, raw, percent=percent)
    assert caught.value.sentence
    return caught.value


def exact(name: str, raw: object, *, percent: bool = False) -> Fraction:
    found = value(name, raw, percent=percent)
    assert isinstance(found, Quantity)
    return found.exact


def test_a_percent_cell_and_a_percent_sign_are_clear() -> None:
    assert exact("volumes/reads", 0.25, percent=True) == 250_000
    assert exact("volumes/reads", "25%") == 250_000
    assert exact("volumes/reads", "0,5 %") == 5_000
    assert exact("volumes/reads", 25) == 250_000
    assert exact("volumes/reads", 0) == 0


@pytest.mark.parametrize("raw", [0.25, 1, "0.25", 1.0, "0,7"])
def test_a_bare_share_up_to_one_asks_which_percent(raw: object) -> None:
    found = fault("volumes/reads", raw)
    assert found.code == "percent"
    assert "%" in found.sentence


@given(st.integers(min_value=0, max_value=10_000))
def test_a_percent_cell_keeps_every_digit(hundredths: int) -> None:
    raw = hundredths / 10_000
    assert exact("volumes/reads", raw, percent=True) == Fraction(hundredths) * 100


def test_a_percentage_in_a_column_of_gib_is_refused() -> None:
    assert fault("volumes/provisioned", 0.5, percent=True).code == "percent"


@pytest.mark.parametrize("raw", ["2:1", "2", 2, "2.0:1", "2 : 1"])
def test_a_reduction_may_be_said_in_two_ways(raw: object) -> None:
    assert exact("pools/reduction here", raw) == 2_000_000


@pytest.mark.parametrize(
    "raw", [time(2, 1), datetime(1900, 1, 1, 2, 1), timedelta(hours=26), "02:01"]
)
def test_a_reduction_that_became_a_time_is_refused(raw: object) -> None:
    found = fault("pools/reduction here", raw)
    assert found.code == "cell"


@pytest.mark.parametrize("raw", [-1, 10**8, "1e300", float("inf")])
def test_what_lies_outside_the_bounds_is_refused(raw: object) -> None:
    assert fault("volumes/provisioned", raw).code == "bounds"


def test_reads_over_a_hundred_are_refused() -> None:
    assert fault("volumes/reads", 101).code == "bounds"
    assert fault("volumes/reads", 1.01, percent=True).code == "bounds"


@pytest.mark.parametrize("raw", ["many", "12 G", "-", True, datetime(2026, 3, 2)])
def test_what_is_no_number_is_refused(raw: object) -> None:
    assert fault("volumes/provisioned", raw).code == "cell"


def test_a_thousands_mark_that_may_be_a_decimal_comma_is_asked() -> None:
    assert fault("volumes/provisioned", "1,234").code == "ambiguous"
    assert exact("volumes/provisioned", "1,234.5") == Fraction("1234.5") * 2**30


def test_a_formula_without_a_value_and_a_formula_that_failed_are_faults() -> None:
    assert fault("volumes/provisioned", Trouble.NO_STORED_VALUE).code == "formula"
    assert fault("volumes/volume", Trouble.NO_STORED_VALUE).code == "formula"
    assert fault("volumes/provisioned", "#DIV/0!").code == "cell"
    assert fault("volumes/host", "#N/A").code == "cell"


def test_a_count_is_whole() -> None:
    assert exact("pools/drives without spares", 24.0) == 24
    assert fault("pools/drives without spares", 24.5).code == "cell"


@pytest.mark.parametrize(
    "raw",
    [1.5, 10**16, 1.2345e20, "1.23457E+18", datetime(2026, 3, 2), time(1), True],
)
def test_a_name_the_spreadsheet_has_changed_is_refused(raw: object) -> None:
    assert fault("volumes/volume", raw).code == "id"


def test_names_keep_their_inner_form_and_lose_outer_blanks() -> None:
    assert value("volumes/volume", "  db  01\u00a0") == "db 01"
    assert value("volumes/volume", "007") == "007"
    assert value("volumes/volume", 42) == "42"
    assert value("volumes/volume", "60E2") == "60E2"


def test_a_list_takes_both_separators_and_drops_repeats() -> None:
    assert value("volumes/application", "a; b,a ;") == ("a", "b")


def test_words_know_no_case_and_others_are_refused() -> None:
    assert value("volumes/importance", " Vital ") == "vital"
    assert value("volumes/thin", "Yes") is True
    assert value("volumes/thin", False) is False
    assert "vital" in fault("volumes/importance", "urgent").remedy
    assert fault("volumes/thin", "perhaps").code == "cell"


@pytest.mark.parametrize(
    "raw",
    [
        *("4 January 2027", "4 Jan 2027", "04-Jan-2027", "4. january 2027"),
        *("January 4, 2027", "Jan 4 2027"),
    ],
)
def test_a_date_with_the_name_of_its_month_has_one_meaning(raw: str) -> None:
    assert value("policy/start date", raw) == date(2027, 1, 4)
    assert value("load/day", raw) == date(2027, 1, 4)


@pytest.mark.parametrize(
    ("raw", "meant"),
    [
        *(("10pm", time(22)), ("10 PM", time(22)), ("22.00", time(22))),
        *(("10:30 p.m.", time(22, 30)), ("6.15am", time(6, 15))),
        *(("12 am", time(0)), ("12 pm", time(12)), ("22:00:00", time(22))),
    ],
)
def test_a_time_may_be_said_in_other_ways(raw: str, meant: time) -> None:
    """12 am is midnight and 12 pm noon: common practice, no source."""
    assert value("windows/opens at", raw) == meant


@pytest.mark.parametrize(
    ("name", "raw", "small"),
    [
        ("pools/drive size", "3.84 TB", 3_840_000_000_000),
        ("pools/drive size", "500GB", 500_000_000_000),
        ("volumes/provisioned", "12 GiB", 12 * 2**30),
        ("volumes/provisioned", "1 234,5 TiB", Fraction("1234.5") * 2**40),
        ("volumes/response limit", "10 ms", 10_000),
        ("arrays/write answer", "0.5 ms", 500),
        ("volumes/throughput", "80 Mbit/s", 10_000_000),
        ("volumes/requests", "1500 IOPS", 1_500_000),
        ("policy/hold", "2 weeks", 14),
    ],
)
def test_a_number_may_bring_its_unit(name: str, raw: str, small: Fraction) -> None:
    """Units as in test_scales."""
    assert exact(name, raw) == small


@pytest.mark.parametrize(
    ("name", "raw"),
    [
        ("volumes/provisioned", "12 GB/s"),
        ("volumes/provisioned", "50%"),
        ("volumes/throughput", "12 Mbit"),
        ("volumes/throughput", "12 mbps"),
        ("volumes/response limit", "10 m"),
        ("pools/drives without spares", "12 TB"),
    ],
)
def test_a_unit_that_does_not_fit_or_could_be_two_is_refused(
    name: str, raw: str
) -> None:
    assert fault(name, raw).code == "cell"


def test_a_number_with_a_unit_keeps_to_the_bounds() -> None:
    assert fault("volumes/response limit", "61 s").code == "bounds"
    assert fault("volumes/provisioned", "1,234 GiB").code == "ambiguous"


def test_dates_are_dates_or_iso_text_and_nothing_else() -> None:
    assert value("policy/start date", datetime(2026, 3, 2)) == date(2026, 3, 2)
    assert value("policy/start date", "2026-03-02") == date(2026, 3, 2)
    for raw in ("02/03/2026", "2.3.26", 46083, "March", "4 Jan 27", "31 June 2027"):
        assert fault("policy/start date", raw).code == "date"


def test_days_are_weekdays_or_dates() -> None:
    assert value("load/day", "tue") == 1
    assert value("load/day", "Sunday") == 6
    assert value("load/day", "2026-03-02") == date(2026, 3, 2)
    assert fault("load/day", "T").code == "date"


def test_times_of_day() -> None:
    assert value("windows/opens at", "22:00") == time(22)
    assert value("windows/opens at", time(6, 30)) == time(6, 30)
    for raw in ("24:00", 0.5, "22", 22.15, "13 pm", "0 am", "10:60 pm", "22.5"):
        assert fault("windows/opens at", raw).code == "cell"


def test_a_zone_is_one_of_the_zone_database() -> None:
    assert value("policy/zone", "Europe/Lisbon") == "Europe/Lisbon"
    assert fault("policy/zone", "Harbour/Quay").code == "zone"


@given(st.decimals(min_value=0, max_value=10**6, places=3, allow_nan=False))
def test_a_number_in_a_cell_and_as_text_are_the_same(amount: Decimal) -> None:
    typed = float(amount)
    assert exact("volumes/provisioned", typed) == exact(
        "volumes/provisioned", repr(typed)
    )


def test_not_limited_may_be_written_out() -> None:
    assert exact("arrays/reads at most", "not limited") == 0


@pytest.mark.parametrize(
    "name",
    [
        "pools/data per stripe",
        "pools/skew",
        "pools/prefetch unit",
        "arrays/controllers",
    ],
)
def test_not_limited_is_no_number_where_nothing_less_than_one_can_be(name: str) -> None:
    """Read as 0 it would divide by nothing, or take a load away."""
    assert fault(name, "not limited").code == "cell"
