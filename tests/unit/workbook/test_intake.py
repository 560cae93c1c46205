"""A whole inventory, from a workbook or a folder, to an estate and findings."""

import re
from collections.abc import Callable
from pathlib import Path

import pytest
from sheetfiles import (
    FULL,
    TODAY,
    Changed,
    as_folder,
    as_workbook,
    estate,
    intake,
    least,
    only_error,
)

from placer.estate import Load
from placer.units import GB, GIB
from placer.workbook.intake import read


def test_the_least_columns_make_an_estate(tmp_path: Path) -> None:
    found = estate(tmp_path, least())
    assert [v.id for v in found.volumes] == ["K/db01", "K/db02", "L/web01"]
    first = found.volumes[0]
    assert first.home == "K/S1"
    assert (first.provisioned, first.occupied) == (1000 * GIB, 400 * GIB)
    assert first.load == (Load(1_050_000, 450_000, 17_150_000, 7_350_000),) * 24
    assert [(p.id, p.drives, p.drive_size) for p in found.pools] == [
        ("K/S1", 24, 1200 * GB),
        ("L/F1", 8, 3840 * GB),
    ]
    assert [a.name for a in found.arrays] == ["K", "L"]
    assert found.name == "estate"


def test_a_folder_of_csv_is_the_same_estate_as_the_workbook(tmp_path: Path) -> None:
    book = read(as_workbook(tmp_path / "estate.xlsx", FULL), TODAY)
    folder = read(as_folder(tmp_path / "estate", FULL), TODAY)
    assert book.estate is not None
    assert folder == book


def test_the_full_inventory_fills_every_record(tmp_path: Path) -> None:
    found = estate(tmp_path, FULL)
    assert found.arrays[0].controllers == 4
    assert found.hosts[0].arrays == ("K", "L")
    assert found.routes[0].together == 90_500_000
    assert found.policy.least_gain == 250_000
    assert found.rules[0].volumes == ("K/db01", "K/db02")
    assert [r.volumes for r in found.rules[1:]] == [
        ("K/db02", "K/db01"),
        ("L/web01", "K/db01"),
    ]
    assert found.tenants[0].requests_cap == 1_200_000
    assert found.controls[0].volumes == 3
    assert found.volumes[0].profiled
    assert {w.end - w.start for w in found.windows} == {390}


def test_the_digest_knows_values_and_not_formats(tmp_path: Path) -> None:
    plain = estate(tmp_path, least()).digest
    other = Changed(tmp_path / "estate.xlsx", least())
    other["volumes"]["D2"].number_format = "0.00"
    other["volumes"]["G2"].value = 0.7
    other["volumes"]["G2"].number_format = "0 %"
    other["volumes"]["J1"].value = "colour"
    again = other.read().estate
    assert again is not None
    assert again.digest == plain
    assert re.fullmatch("[0-9a-f]{64}", plain)


@pytest.mark.parametrize("cell", ["B2", "D2", "E3", "G4", "H2"])
def test_the_digest_changes_with_any_value(tmp_path: Path, cell: str) -> None:
    plain = estate(tmp_path, least()).digest
    other = Changed(tmp_path / "estate.xlsx", least())
    old = other["volumes"][cell].value
    other["volumes"][cell].value = f"{old}x" if isinstance(old, str) else old * 1.0001
    again = other.read().estate
    assert again is not None
    assert again.digest != plain


@pytest.mark.parametrize(
    ("sheet", "cell", "value"),
    [
        ("volumes", "K2", "harbour office"),
        ("volumes", "L2", "boot"),
        ("volumes", "M2", 33),
        ("volumes", "N2", 33),
        ("volumes", "O2", 33),
        ("volumes", "P2", 33),
        ("tenants", "B2", 1201),
        ("hosts", "C3", "engine"),
    ],
)
def test_the_digest_covers_tenants_roles_hits_and_snapshots(
    tmp_path: Path, sheet: str, cell: str, value: object
) -> None:
    plain = estate(tmp_path, FULL).digest
    other = Changed(tmp_path / "estate.xlsx", FULL)
    other[sheet][cell].value = value
    again = other.read().estate
    assert again is not None
    assert again.digest != plain


def test_totals_are_the_sums_of_what_was_typed(tmp_path: Path) -> None:
    k, l_, everything = intake(tmp_path, least()).totals
    assert (k.what, k.volumes, k.provisioned, k.occupied) == ("K", 2, 1500, 650.5)
    assert (l_.what, l_.requests, l_.throughput) == ("L", 50, 1)
    assert (everything.what, everything.volumes) == ("all", 3)
    assert (everything.requests, everything.throughput) == (1750, 28.5)


def _nothing(path: Path) -> Path:
    return path / "nowhere.xlsx"


def _empty_file(path: Path) -> Path:
    (path / "empty.xlsx").touch()
    return path / "empty.xlsx"


def _text_file(path: Path) -> Path:
    (path / "text.xlsx").write_text("array,volume\n", encoding="utf-8")
    return path / "text.xlsx"


def _truncated(path: Path) -> Path:
    file = as_workbook(path / "cut.xlsx", least())
    file.write_bytes(file.read_bytes()[:-400])
    return file


def _damaged_inside(path: Path) -> Path:
    file = as_workbook(path / "damaged.xlsx", least())
    data = bytearray(file.read_bytes())
    middle = data.index(b"xl/worksheets/sheet1.xml") + 60
    data[middle : middle + 40] = bytes(40)
    file.write_bytes(bytes(data))
    return file


def _protected(path: Path) -> Path:
    (path / "secret.xlsx").write_bytes(b"\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1" + bytes(600))
    return path / "secret.xlsx"


def _empty_folder(path: Path) -> Path:
    (path / "folder").mkdir()
    return path / "folder"


def _foreign_bytes(path: Path) -> Path:
    """Byte 81 is no letter of Windows-1252, nor the first of one in UTF-8."""
    (path / "folder").mkdir()
    (path / "folder" / "volumes.csv").write_bytes(b"array,volume\nK,caf\x81\n")
    return path / "folder"


@pytest.mark.parametrize(
    "make",
    [
        *(_nothing, _empty_file, _text_file, _truncated, _damaged_inside),
        *(_protected, _empty_folder, _foreign_bytes),
    ],
)
def test_a_file_that_cannot_be_read_is_one_finding(
    tmp_path: Path, make: Callable[[Path], Path]
) -> None:
    found = read(make(tmp_path), TODAY)
    error = only_error(found)
    assert error.code == "file"
    assert error.sentence
    assert error.remedy
    assert found.totals == ()


def test_missing_sheets_and_columns_are_each_said(tmp_path: Path) -> None:
    sheets = {"volumes": [["array", "volume"], ["K", "db01"]]}
    found = intake(tmp_path, sheets)
    said = [(f.code, f.sentence) for f in found.findings if f.severity == "error"]
    assert ("sheet", "there is no sheet pools") in said
    assert ("column", 'the column "provisioned (GiB)" is missing') in said
    assert sum(code == "column" for code, _ in said) == 6


def test_sheets_that_are_not_ours_are_notes(tmp_path: Path) -> None:
    sheets = least() | {"progress": [["move"]], "volume": [["x"]], "Guide": [["y"]]}
    found = intake(tmp_path, sheets)
    assert found.estate is not None
    assert [(f.severity, f.place.sheet, f.remedy) for f in found.findings] == [
        ("note", "progress", ""),
        ("note", "volume", 'is it "volumes"?'),
    ]


def test_one_bad_row_leaves_the_others_checked(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][1][3] = "much"
    sheets["volumes"][2][6] = 120
    sheets["volumes"][3][2] = "F9"
    found = intake(tmp_path, sheets)
    assert [(f.code, str(f.place)) for f in found.findings] == [
        ("cell", "volumes!D2"),
        ("bounds", "volumes!G3"),
        ("unknown", "volumes!C4"),
    ]
    assert all(f.remedy for f in found.findings)


def test_rows_that_are_blank_are_passed_over(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"].insert(2, [None] * 8)
    sheets["volumes"] += [[" ", None, ""], [None]]
    assert len(estate(tmp_path, sheets).volumes) == 3


def test_assumptions_are_counted_and_the_gravest_comes_first(tmp_path: Path) -> None:
    found = estate(tmp_path, least()).assumptions
    assert found[0].sheet == "windows"
    assert "Saturdays 22:00 to 06:00" in found[0].value
    thin = next(a for a in found if a.column == "thin")
    assert (thin.sheet, thin.value, thin.cells) == ("volumes", "yes", 3)
    ceiling = next(a for a in found if a.column == "controller ceiling")
    assert (ceiling.sheet, ceiling.value, ceiling.cells) == ("arrays", "70 %", 2)
    assert len({(a.sheet, a.column, a.value) for a in found}) == len(found)
    assert all(a.effect for a in found)
    assert found[-1].column == "importance"


def test_what_is_filled_in_is_no_assumption(tmp_path: Path) -> None:
    sheets = least()
    sheets["volumes"][0].append("thin")
    for row, word in zip(sheets["volumes"][1:], ("yes", "no", None), strict=True):
        row.append(word)
    found = estate(tmp_path, sheets)
    assert [v.thin for v in found.volumes] == [True, False, True]
    assert [a.cells for a in found.assumptions if a.column == "thin"] == [1]


@pytest.mark.parametrize("heads", [None, "kind"])
def test_without_pools_only_their_sheet_is_at_fault(
    tmp_path: Path, heads: str | None
) -> None:
    """No sheet, or one without the column of the names."""
    sheets = least()
    if heads is None:
        del sheets["pools"]
    else:
        sheets["pools"][0][0] = heads
    assert only_error(intake(tmp_path, sheets)).place.sheet == "pools"
