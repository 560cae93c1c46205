"""The empty inventory: complete, readable, and made to be filled in."""

from datetime import date, time
from pathlib import Path
from typing import Any

import pytest
from openpyxl import load_workbook
from openpyxl.worksheet.worksheet import Worksheet
from sheetfiles import LEAST, TODAY

from placer.workbook import blank
from placer.workbook.columns import SETTINGS, SHEETS
from placer.workbook.intake import read


@pytest.fixture
def path(tmp_path: Path) -> Path:
    return blank.write(tmp_path / "inventory.xlsx")


def test_it_has_a_guide_and_every_sheet_with_every_heading(path: Path) -> None:
    book = load_workbook(path)
    assert book.sheetnames == ["guide", *(sheet.name for sheet in SHEETS)]
    for sheet in SHEETS:
        row = next(book[sheet.name].iter_rows(max_row=1))
        assert [cell.value for cell in row] == [c.header for c in sheet.columns]
        assert all(cell.comment for cell in row)


def test_the_policy_has_a_row_for_each_setting_and_no_values(path: Path) -> None:
    rows = list(load_workbook(path)["policy"].iter_rows(min_row=2))
    assert [row[0].value for row in rows] == [column.header for column in SETTINGS]
    assert {row[1].value for row in rows} == {None}


def test_words_have_a_drop_down(path: Path) -> None:
    choices = load_workbook(path)["pools"].data_validations.dataValidation
    formulas = {choice.formula1 for choice in choices}
    assert '"flash,spinning,mixed,unmodelled"' in formulas
    assert '"yes,no"' in formulas


def test_read_as_it_is_it_lacks_volumes_and_pools_and_nothing_else(path: Path) -> None:
    found = read(path, TODAY)
    assert [(f.severity, f.sentence) for f in found.findings] == [
        ("error", "there are no volumes"),
        ("error", "there are no pools"),
    ]


def fill(page: Worksheet, row: int, values: dict[str, Any]) -> None:
    """Write values under their headings."""
    for column, heading in enumerate(page[1], start=1):
        page.cell(row, column, values.get(str(heading.value)))


def test_filled_in_with_the_least_it_is_an_estate(path: Path) -> None:
    book = load_workbook(path)
    for name, (head, *rows) in LEAST.items():
        for number, row in enumerate(rows, start=2):
            fill(book[name], number, dict(zip(map(str, head), row, strict=True)))
    fill(
        book["windows"],
        2,
        {"window": "n", "opens on": "Sat", "opens at": time(22), "lasts (h)": 6},
    )
    for cell in book["policy"]["A"]:
        if cell.value == "start date":
            book["policy"].cell(cell.row, 2, date(2026, 3, 2))
    book.save(path)
    found = read(path)
    assert found.findings == ()
    assert found.estate is not None
    assert len(found.estate.volumes) == 3


def test_columns_that_spreadsheets_would_change_are_formatted_as_text(
    path: Path,
) -> None:
    """As stored: the style of each column (ECMA-376 part 1, 18.3.1.13)."""
    book = load_workbook(path)
    for name, kept in (("pools", "reduction here"), ("windows", "opens at")):
        headings = [str(cell.value) for cell in book[name][1]]
        number = headings.index(kept) + 1
        spans = book[name].column_dimensions.values()
        formats = [
            d.number_format for d in spans if (d.min or 0) <= number <= (d.max or 0)
        ]
        assert formats == ["@"]


def test_the_guide_says_what_a_host_without_arrays_reaches(path: Path) -> None:
    page = load_workbook(path)["guide"]
    said = {str(row[0].value): str(row[1].value) for row in page.iter_rows()}
    assert "every array" in said["arrays reached"]
