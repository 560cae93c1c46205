"""The table of columns must agree with itself: reader and blank workbook trust it."""

import pytest

from placer.findings import Place
from placer.workbook.column import Column, Effect, Kind, Sheet, key
from placer.workbook.columns import SETTINGS, SHEETS
from placer.workbook.reading.cells import read_cell
from placer.workbook.reading.measures import MEASURES
from placer.workbook.reading.raw import Cell
from placer.workbook.reading.scales import own_scale, scale, unit_named

EVERY = [(sheet.name, column) for sheet in SHEETS for column in sheet.columns] + [
    ("policy", column) for column in SETTINGS
]
NAMES = [f"{sheet}-{column.name}" for sheet, column in EVERY]


@pytest.mark.parametrize("columns", [s.columns for s in SHEETS] + [SETTINGS])
def test_no_spelling_means_two_columns_of_one_sheet(
    columns: tuple[Column, ...],
) -> None:
    spellings = [spelling for column in columns for spelling in column.keys]
    assert len(spellings) == len(set(spellings))


@pytest.mark.parametrize(("_", "column"), EVERY, ids=NAMES)
def test_every_default_can_be_typed_into_its_own_cell(_: str, column: Column) -> None:
    defaults = [default for _, default in column.by_media]
    if column.default and not column.derived:
        defaults.append(column.default)
    mark = "%" if column.kind is Kind.PERCENT else ""
    for default in defaults:
        read_cell(Cell(default + mark, Place()), column, own_scale(column))


@pytest.mark.parametrize(("_", "column"), EVERY, ids=NAMES)
def test_a_heading_of_ours_names_its_own_unit(_: str, column: Column) -> None:
    if column.unit and column.kind in MEASURES:
        assert scale(column, unit_named(column.unit)) == own_scale(column) > 0


@pytest.mark.parametrize(("_", "column"), EVERY, ids=NAMES)
def test_words_and_bounds_make_sense(_: str, column: Column) -> None:
    assert (column.kind is Kind.WORD) == bool(column.words)
    assert column.lowest < column.highest
    assert column.meaning
    assert not (column.required and column.shown_default)


def test_every_effect_but_none_has_a_sentence() -> None:
    assert [effect for effect in Effect if not effect.sentence] == [Effect.NONE]


@pytest.mark.parametrize("sheet", SHEETS, ids=[sheet.name for sheet in SHEETS])
def test_every_sheet_needs_at_least_one_column(sheet: Sheet) -> None:
    assert any(column.required for column in sheet.columns)


def test_a_key_knows_no_case_blanks_punctuation_or_unit() -> None:
    assert key(" Drive-Size  [GB] ") == key("drive size") == "drivesize"
    assert key("provisioned ÷ usable at most") == "provisionedusableatmost"


def test_every_heading_and_default_can_be_saved_in_any_code_page() -> None:
    shown = [text for _, c in EVERY for text in (c.header, c.shown_default)]
    assert [text for text in shown if not text.isascii()] == []


def test_the_tolerance_is_said_to_be_on_responses_and_not_on_room() -> None:
    tolerance = next(each for each in SETTINGS if each.name == "tolerance on limits")
    assert "response limits only" in tolerance.meaning
