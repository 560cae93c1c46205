"""A plan comes back from its file exactly, and a file that is none says so."""

from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from openpyxl import load_workbook
from smallplan import ESTATE, FINDINGS, NO_PLAN, PLAN, renamed

from placer.plan import Plan, Reason
from placer.words import REASONS
from placer.workbook.planbook import PlanFileError, build, read, write


@pytest.fixture
def path(tmp_path: Path) -> Path:
    return tmp_path / "harbour-plan.xlsx"


@pytest.mark.parametrize("plan", [PLAN, NO_PLAN], ids=["plan", "no plan"])
def test_a_plan_comes_back_as_it_was_written(path: Path, plan: Plan) -> None:
    assert write(path, ESTATE, plan, FINDINGS, "Audited: clean.") == path
    assert read(path) == plan


def test_no_limit_and_no_known_response_stand_as_blanks(path: Path) -> None:
    """A limit of 0.0 ms would read as one that nothing can keep."""
    write(path, ESTATE, PLAN)
    rows = load_workbook(path)["placement"].iter_rows(min_row=2, values_only=True)
    assert [row[5:] for row in rows][1:] == [(None, None, None)] * 2


def test_an_empty_plan_comes_back(path: Path) -> None:
    plan = replace(PLAN, moves=(), bookings=(), left=(), bought=(), goals=())
    write(path, ESTATE, plan)
    assert read(path) == plan


@pytest.mark.parametrize(
    "name",
    ["=1+1", "+5", "-7", "@x", "\tx", "#N/A", "007", "1e5", "a/b", " pad ", "TRUE"],
)
def test_text_stays_text(path: Path, name: str) -> None:
    estate, plan = renamed(name)
    write(path, estate, plan)
    assert read(path) == plan
    cells = [cell for row in load_workbook(path)["placement"] for cell in row]
    assert {c.data_type for c in cells if c.value == name} == {"s"}


@settings(max_examples=30, deadline=None)
@given(
    name=st.text(min_size=1, max_size=20),
    numbers=st.tuples(st.floats(allow_nan=False), st.floats(allow_nan=False)),
    times=st.integers(0, 100_000_000),
    size=st.integers(0, 2**50),
    rate=st.integers(1, 10**11),
)
def test_any_value_survives(
    tmp_path_factory: pytest.TempPathFactory,
    name: str,
    numbers: tuple[float, float],
    times: int,
    size: int,
    rate: int,
) -> None:
    estate, plan = renamed(name)
    plan = replace(
        plan,
        uses=(replace(PLAN.uses[0], use=numbers[0], at_most=numbers[1]),),
        moves=(replace(plan.moves[0], starts=times, size=size),),
        bookings=(replace(PLAN.bookings[0], ends=times, rate=rate),),
    )
    path = tmp_path_factory.mktemp("any") / "x-plan.xlsx"
    assert read(write(path, estate, plan)) == plan


def test_times_stand_in_the_zone_of_their_window_with_the_offset() -> None:
    """Berlin has +01:00 in January: tz database, europe file."""
    book = build(ESTATE, PLAN)
    assert book["bookings"]["C2"].value == "2027-01-26 22:00+01:00"


def test_sheets_stand_in_the_order_of_reading() -> None:
    whole = replace(PLAN, shortages=NO_PLAN.shortages)
    assert build(ESTATE, whole).sheetnames == [
        *("summary", "run sheet", "placement", "pools", "moves", "bookings", "nights"),
        *("left over", "shortages", "assumptions", "findings", "about"),
    ]


def test_no_cell_holds_a_formula(path: Path) -> None:
    """FINDINGS holds texts that begin like formulas."""
    write(path, ESTATE, PLAN, FINDINGS, verdict="=HYPERLINK(1)")
    book = load_workbook(path)
    types = {c.data_type for sheet in book for row in sheet for c in row}
    assert "f" not in types
    assert book["summary"]["A3"].value == "=HYPERLINK(1)"


def test_a_sentence_too_long_for_the_text_format_is_still_text(path: Path) -> None:
    """Over 255 characters in the format "@" show as ####: common practice."""
    lacks = "=" + "x" * 300
    plan = replace(PLAN, left=(replace(PLAN.left[0], lacks=lacks),))
    write(path, ESTATE, plan)
    assert read(path) == plan
    cell = load_workbook(path)["left over"]["D2"]
    assert (cell.number_format, cell.data_type) == ("General", "s")


def test_findings_stand_errors_first() -> None:
    sheet = build(ESTATE, PLAN, FINDINGS)["findings"]
    assert [sheet.cell(row, 1).value for row in (2, 3)] == ["error", "warning"]


def test_numbers_are_numbers(path: Path) -> None:
    write(path, ESTATE, PLAN)
    book = load_workbook(path)
    assert book["moves"]["F2"].value == 60
    assert book["placement"]["F2"].value == 7.431
    assert book["bookings"]["E2"].value == 123.456789


def test_summary_says_what_was_bought_and_how_good_the_plan_is() -> None:
    book = build(ESTATE, PLAN)
    rows = [[cell.value for cell in row] for row in book["summary"].iter_rows()]
    texts = {row[0]: row for row in rows if row[0]}
    assert float(str(texts["bought (crowns)"][1])) == 1234.05
    assert texts["missed"][3] == "response limits missed: 2 steps of 10 %, proven best"
    reason = next(row for row in rows if row[0] == "relief")
    assert reason[3] == REASONS[Reason.RELIEF]
    relief = texts["relief"][3]
    assert "within 0.035 % of the best possible (time limit)" in str(relief)


def edited(path: Path, sheet: str, cell: str, value: Any) -> Path:
    write(path, ESTATE, PLAN)
    book = load_workbook(path)
    book[sheet][cell] = value
    book.save(path)
    return path


@pytest.mark.parametrize(
    ("sheet", "cell", "value", "said"),
    [
        ("moves", "F2", "much", r"moves!F2 holds 'much' where a number"),
        ("moves", "G2", "tonight", "moves!G2"),
        ("moves", "G2", "2027-01-26 22:00", "moves!G2"),
        ("placement", "E2", "whim", "placement!E2 holds 'whim' where one of: cure"),
        ("placement", "C2", 7, "placement!C2"),
        ("bookings", "E1", "rate", "Sheet bookings lacks the headers"),
        ("about", "B5", "perhaps", "status 'perhaps' is not known"),
    ],
)
def test_a_damaged_cell_is_named(
    path: Path, sheet: str, cell: str, value: Any, said: str
) -> None:
    edited(path, sheet, cell, value)
    with pytest.raises(PlanFileError, match=said):
        read(path)


@pytest.mark.parametrize("sheet", ["summary", "placement", "about", "left over"])
def test_a_missing_sheet_is_named(path: Path, sheet: str) -> None:
    write(path, ESTATE, PLAN)
    book = load_workbook(path)
    del book[sheet]
    book.save(path)
    with pytest.raises(PlanFileError, match=sheet):
        read(path)


def test_a_truncated_file_is_refused(path: Path) -> None:
    write(path, ESTATE, PLAN)
    path.write_bytes(path.read_bytes()[:-2000])
    with pytest.raises(PlanFileError, match="cannot be read"):
        read(path)


@pytest.mark.parametrize("content", [b"", b"not a workbook"])
def test_another_file_is_refused(path: Path, content: bytes) -> None:
    path.write_bytes(content)
    with pytest.raises(PlanFileError):
        read(path)


def test_an_absent_file_is_refused(path: Path) -> None:
    with pytest.raises(PlanFileError):
        read(path)
