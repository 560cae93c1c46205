"""Rows of totals below a table: named, not read, not summed."""

from pathlib import Path

import pytest
from sheetfiles import FULL, Changed, estate, intake, least, only_error

from placer.workbook.intake import Intake

Sheets = dict[str, list[list[object]]]
SUMS: list[object] = [1800, 750.5, 1750, None, 28.5]


def with_total(*names: object) -> Sheets:
    sheets = least()
    sheets["volumes"].append([*names, *SUMS])
    return sheets


def said(found: Intake) -> list[tuple[str, str, str]]:
    return [(f.severity, f.code, str(f.place)) for f in found.findings]


@pytest.mark.parametrize(
    ("names", "cell"),
    [
        (("Total", None, None), "A5"),
        ((None, "Sum:", None), "B5"),
        ((None, None, "TOTALS"), "C5"),
        (("Grand total", None, None), "A5"),
        ((None, None, None), "A5"),
        (("L", "Total", None), "B5"),
    ],
)
def test_a_row_of_totals_is_one_error_and_not_summed(
    tmp_path: Path, names: tuple[object, ...], cell: str
) -> None:
    found = intake(tmp_path, with_total(*names))
    assert said(found) == [("error", "total-row", f"volumes!{cell}")]
    assert "totals" in found.findings[0].sentence
    assert "control" in found.findings[0].remedy
    assert [(t.what, t.volumes) for t in found.totals] == [
        ("K", 2),
        ("L", 1),
        ("all", 3),
    ]
    assert found.totals[-1].provisioned == 1800


def test_several_rows_of_totals_are_each_named(tmp_path: Path) -> None:
    sheets = with_total("Sum", None, None)
    sheets["volumes"].append(["Total", None, None, *SUMS])
    cells = [f.place.cell for f in intake(tmp_path, sheets).findings]
    assert sorted(cells) == ["A5", "A6"]


def test_a_total_merged_over_the_names_is_a_total(tmp_path: Path) -> None:
    changed = Changed(tmp_path / "estate.xlsx", with_total("Total", None, None))
    changed["volumes"].merge_cells("A5:C5")
    assert only_error(changed.read()).code == "total-row"


def test_sums_that_are_formulas_are_a_total_too(tmp_path: Path) -> None:
    changed = Changed(tmp_path / "estate.xlsx", least())
    changed["volumes"]["D5"].value = "=SUM(D2:D4)"
    assert said(changed.read()) == [("error", "total-row", "volumes!A5")]


@pytest.mark.parametrize("name", ["pools", "arrays", "load"])
def test_other_sheets_have_rows_of_totals_too(tmp_path: Path, name: str) -> None:
    sheets = {sheet: [list(line) for line in lines] for sheet, lines in FULL.items()}
    width = len(sheets[name][0])
    sheets[name].append(["Total", *[None] * (width - 2), 5])
    error = only_error(intake(tmp_path, sheets))
    assert (error.code, error.place.sheet) == ("total-row", name)


def test_a_volume_that_is_called_total_is_a_volume(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][3][1] = "Total"
    assert estate(tmp_path, sheets).volumes[2].name == "Total"


def test_the_only_row_without_names_lacks_its_names(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"] = [sheets["volumes"][0], [None, None, None, *SUMS]]
    assert "total-row" not in {f.code for f in intake(tmp_path, sheets).findings}


def test_a_row_above_others_that_lacks_its_names_is_no_total(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][1][:3] = [None, None, None]
    assert {f.code for f in intake(tmp_path, sheets).findings} == {"blank"}


def test_totals_of_the_sheet_control_are_meant(tmp_path: Path) -> None:
    sheets = least() | {"control": [["what", "volumes"], ["Total", 3]]}
    assert only_error(intake(tmp_path, sheets)).code == "unknown"
