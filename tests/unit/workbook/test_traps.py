"""What spreadsheets do to data behind one's back: said, never guessed."""

from datetime import date, datetime
from pathlib import Path
from zipfile import ZipFile

import pytest
from openpyxl.utils.datetime import CALENDAR_MAC_1904
from sheetfiles import TODAY, Changed, as_workbook, estate, intake, least, only_error

from placer.workbook.intake import Intake, read


@pytest.fixture
def changed(tmp_path: Path) -> Changed:
    return Changed(tmp_path / "estate.xlsx", least())


def codes(found: Intake) -> list[tuple[str, str, str]]:
    return [(f.severity, f.code, str(f.place)) for f in found.findings]


def test_a_formula_without_a_stored_value_is_an_error(changed: Changed) -> None:
    changed["volumes"]["D2"].value = "=500*2"
    assert codes(changed.read()) == [("error", "formula", "volumes!D2")]


def test_a_formula_with_a_stored_value_is_read_as_that_value(tmp_path: Path) -> None:
    path = as_workbook(tmp_path / "estate.xlsx", least())
    with ZipFile(path) as old:
        parts = {name: old.read(name) for name in old.namelist()}
    page = parts["xl/worksheets/sheet1.xml"]
    parts["xl/worksheets/sheet1.xml"] = page.replace(
        b"<v>1000</v>", b"<f>500*2</f><v>1000</v>"
    )
    assert parts["xl/worksheets/sheet1.xml"] != page
    plain = read(path, TODAY)
    with ZipFile(path, "w") as new:
        for name, content in parts.items():
            new.writestr(name, content)
    assert read(path, TODAY) == plain
    assert plain.estate is not None


def test_hidden_and_filtered_rows_are_read_and_said(changed: Changed) -> None:
    page = changed["volumes"]
    page.row_dimensions[3].hidden = True
    found = changed.read()
    assert codes(found) == [("warning", "hidden", "volumes")]
    assert "rows hidden" in found.findings[0].sentence
    assert found.totals[-1].volumes == 3
    page.auto_filter.ref = "A1:H4"
    page.row_dimensions[2].hidden = True
    assert "rows filtered out were read all the same: 2-3" in (
        changed.read().findings[0].sentence
    )


def test_hidden_columns_and_sheets_are_read_and_said(changed: Changed) -> None:
    changed["volumes"].column_dimensions["D"].hidden = True
    changed["pools"].sheet_state = "hidden"
    found = changed.read()
    assert found.estate is not None
    assert codes(found) == [
        ("warning", "hidden", "volumes"),
        ("warning", "hidden", "pools"),
    ]


def test_a_stray_mark_at_the_end_of_the_sheet_costs_nothing(changed: Changed) -> None:
    changed["volumes"]["XFD1048576"].value = " "
    found = changed.read()
    assert found.estate is not None
    assert found.findings == ()


def test_merged_words_are_read_for_each_cell_and_said(changed: Changed) -> None:
    changed["volumes"].merge_cells("C2:C3")
    found = changed.read()
    assert found.estate is not None
    assert [v.pool for v in found.estate.volumes] == ["S1", "S1", "F1"]
    assert codes(found) == [("warning", "merged", "volumes!C2:C3")]


def test_a_merged_title_above_the_headings_is_no_matter(tmp_path: Path) -> None:
    sheets = least() | {"policy": [["setting", "value"], ["hold (days)", 7]]}
    for lines in sheets.values():
        lines.insert(0, ["Export of March"])
    changed = Changed(tmp_path / "estate.xlsx", sheets)
    for name in sheets:
        changed[name].merge_cells("A1:B1")
    assert codes(changed.read()) == []
    changed["policy"].merge_cells("A3:B3")
    assert ("warning", "merged", "policy!A3:B3") in codes(changed.read())


def test_merged_numbers_are_refused(changed: Changed) -> None:
    changed["volumes"].merge_cells("E2:E3")
    assert ("error", "merged", "volumes!E3") in codes(changed.read())


def test_dates_of_a_workbook_that_counts_from_1904_are_the_same_days(
    tmp_path: Path,
) -> None:
    sheets = least() | {"policy": [["setting", "value"], ["start date", None]]}
    starts = []
    for epoch in (None, CALENDAR_MAC_1904):
        changed = Changed(tmp_path / "estate.xlsx", sheets)
        changed["policy"]["B2"].value = datetime(2026, 6, 1)
        if epoch:
            changed.book.epoch = epoch
        found = changed.read()
        assert found.estate is not None
        starts.append(found.estate.policy.start)
        assert bool(epoch) == any(f.code == "date" for f in found.findings)
    day = (date(2026, 6, 1) - date(1970, 1, 1)).days * 1440
    assert starts == [day, day]


def test_names_stored_as_numbers_are_read_and_said_once(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][1][1], sheets["volumes"][2][1] = 101, 102
    found = intake(tmp_path, sheets)
    assert found.estate is not None
    assert found.estate.volumes[0].name == "101"
    assert codes(found) == [("warning", "id", "volumes!B2")]
    assert "in 2 cells" in found.findings[0].sentence
    sheets["volumes"][2][1] = "db02"
    assert "in 1 cell:" in intake(tmp_path, sheets).findings[0].sentence


@pytest.mark.parametrize(
    ("row", "column", "name", "code"),
    [
        (2, 1, "db01", "duplicate"),
        (2, 1, "DB01", "id"),
        (2, 1, "db 01", "id"),
        (1, 2, "s1", "id"),
        (1, 2, "S2", "unknown"),
        (3, 0, "M", "unknown"),
    ],
)
def test_names_are_the_same_or_different_never_nearly(
    tmp_path: Path, row: int, column: int, name: str, code: str
) -> None:
    sheets = least()
    sheets["volumes"][row][column] = name
    assert only_error(intake(tmp_path, sheets)).code == code


def test_applications_and_sites_are_told_apart_by_more_than_case(
    tmp_path: Path,
) -> None:
    sheets = least()
    sheets["volumes"][0].append("application")
    sheets["volumes"][1].append("gates; tickets")
    sheets["volumes"][2].append("Tickets")
    error = only_error(intake(tmp_path, sheets))
    assert (error.code, str(error.place)) == ("id", "volumes!I3")
    sheets = least()
    sheets["arrays"] = [["array", "site"], ["K", "harbour"], ["L", "Harbour"]]
    error = only_error(intake(tmp_path, sheets))
    assert (error.code, str(error.place)) == ("id", "arrays!B3")


def test_an_array_written_in_two_cases_is_an_error(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][1][0] = "k"
    assert ("error", "id", "volumes!A2") in codes(intake(tmp_path, sheets))


def test_one_volume_name_may_stand_on_two_arrays(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][3][1] = "db01"
    assert intake(tmp_path, sheets).estate is not None


def test_an_array_with_a_slash_is_refused(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][3][0] = sheets["pools"][2][1] = "L/2"
    assert only_error(intake(tmp_path, sheets)).code == "id"


def test_more_occupied_than_provisioned_is_an_error(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][1][4] = 1000.1
    error = only_error(intake(tmp_path, sheets))
    assert (error.code, str(error.place)) == ("bounds", "volumes!E2")


def test_throughput_without_requests_is_an_error(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][1][5] = 0
    assert str(only_error(intake(tmp_path, sheets)).place) == "volumes!H2"


@pytest.mark.parametrize("rate", [0, 0.7, 26_000])
def test_a_request_of_an_odd_size_is_a_warning(tmp_path: Path, rate: float) -> None:
    sheets = least()
    sheets["volumes"][1][7] = rate
    assert codes(intake(tmp_path, sheets)) == [("warning", "size", "volumes!H2")]


@pytest.mark.parametrize("array", ["k ", " K"])
def test_blanks_around_a_name_do_not_matter(tmp_path: Path, array: str) -> None:
    sheets = least()
    sheets["volumes"][1][0] = array.upper()
    assert intake(tmp_path, sheets).estate is not None


def test_a_heading_in_mbit_is_converted(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][0][7] = "throughput (Mbit/s)"
    assert intake(tmp_path, sheets).totals[-1].throughput == pytest.approx(28.5 / 8)


def test_gb_in_cells_is_asked_once_and_the_answer_used(tmp_path: Path) -> None:
    sheets = least()
    for row in sheets["volumes"][1:]:
        row[3:5] = [f"{row[3]} GB", f"{row[4]} GB"]
    error = only_error(intake(tmp_path, sheets))
    assert (error.code, str(error.place)) == ("unit", "volumes!D2")
    for answer, gib in (("10^9", 1800 * 10**9 / 2**30), ("2^30", 1800)):
        sheets["policy"] = [
            ["setting", "value"],
            ["GB in this export means", answer],
            ["one cutover counts as", "2 GB"],
        ]
        found = intake(tmp_path, sheets)
        assert found.estate is not None
        assert found.totals[-1].provisioned == pytest.approx(gib)
        counts = found.estate.policy.cutover_counts_as
        assert counts == (2 * 10**9 if answer == "10^9" else 2 * 2**30)


def test_a_column_without_a_unit_whose_cells_have_theirs_is_clear(
    tmp_path: Path,
) -> None:
    sheets = least()
    sheets["pools"][0][4] = "drive size"
    sheets["pools"][1][4], sheets["pools"][2][4] = "1.2 TB", "3.84 TB"
    found = estate(tmp_path, sheets)
    assert [p.drive_size for p in found.pools] == [1_200 * 10**9, 3_840 * 10**9]


def test_gb_is_asked_once_and_the_answer_used(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][0][3:5] = ["provisioned (GB)", "occupied (GB)"]
    assert only_error(intake(tmp_path, sheets)).code == "unit"
    for answer, gib in (("10^9", 1800 * 10**9 / 2**30), ("2^30", 1800)):
        sheets["policy"] = [
            ["setting", "value"],
            ["GB in this export means", answer],
        ]
        found = intake(tmp_path, sheets)
        assert found.estate is not None
        assert found.totals[-1].provisioned == pytest.approx(gib)
