"""The empty inventory: complete, readable, and made to be filled in."""

from datetime import date, time
from pathlib import Path

import pytest
from openpyxl import load_workbook
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


def test_filled_in_with_the_least_it_is_an_estate(path: Path) -> None:
    book = load_workbook(path)
    for name, (head, *rows) in LEAST.items():
        columns = {cell.value: cell.column for cell in book[name][1]}
        for number, row in enumerate(rows, start=2):
            for heading, value in zip(head, row, strict=True):
                book[name].cell(number, columns[heading]).value = value
    for row in book["policy"].iter_rows(min_row=2):
        if row[0].value == "start date":
            row[1].value = date(2026, 3, 2)
    window = {"window": "n", "opens on": "Sat", "opens at": time(22), "lasts (h)": 6}
    for cell in book["windows"][1]:
        book["windows"].cell(2, cell.column).value = window.get(str(cell.value))
    book.save(path)
    found = read(path)
    assert found.findings == ()
    assert found.estate is not None
    assert len(found.estate.volumes) == 3
