"""Headings: whatever the case and the unit, one column; the rest is said."""

from collections.abc import Sequence

import pytest

from placer.findings import Finding, Place
from placer.workbook.columns import SHEETS, sheet
from placer.workbook.reading.headings import Heading, Headings, heading_row
from placer.workbook.reading.raw import Cell
from placer.workbook.reading.remarks import Remarks


def find(
    sheet_name: str, headings: Sequence[str], gb: str = ""
) -> tuple[dict[str, Heading], tuple[Finding, ...]]:
    remarks = Remarks()
    cells = [Cell(text, Place(sheet_name, f"{n}")) for n, text in enumerate(headings)]
    found = Headings(sheet(sheet_name).columns, remarks, gb).find(cells)
    return {heading.column.name: heading for heading in found}, remarks.findings


@pytest.mark.parametrize("name", [each.name for each in SHEETS])
def test_every_heading_of_ours_is_found_without_a_remark(name: str) -> None:
    columns = sheet(name).columns
    found, findings = find(name, [column.header for column in columns])
    assert list(found) == [column.name for column in columns]
    assert findings == ()


@pytest.mark.parametrize(
    ("heading", "scale"),
    [
        *(("MB/s", 10**6), ("MiB/s", 2**20), ("Throughput [Mbit/s]", 125_000)),
        *(("THROUGHPUT MiB/s", 2**20), ("data-rate (GB/s)", 10**9)),
    ],
)
def test_a_rate_may_stand_in_any_unit_and_place(heading: str, scale: int) -> None:
    found, findings = find("volumes", [heading])
    assert found["throughput"].scale == scale
    assert findings == ()


def test_a_rate_that_begins_a_name_may_be_in_another_unit() -> None:
    found, _ = find("pools", ["MiB/s per drive"])
    assert found["MB/s per drive"].scale == 2**20


def test_a_word_that_is_also_a_unit_can_end_a_name() -> None:
    found, findings = find("pools", ["drive writes per day"])
    assert list(found) == ["drive writes per day"]
    assert findings == ()


@pytest.mark.parametrize(
    ("gb", "heading", "scale"),
    [
        *(("10^9", "size (GB)", 10**9), ("2^30", "size (GB)", 2**30)),
        *(("10^9", "size (TB)", 10**12), ("2^30", "size (TB)", 2**40)),
        ("10^9", "size (TiB)", 2**40),
    ],
)
def test_gb_means_what_the_policy_says(gb: str, heading: str, scale: int) -> None:
    found, findings = find("volumes", [heading], gb)
    assert found["provisioned"].scale == scale
    assert findings == ()


def test_gb_is_asked_once_however_many_columns_say_it() -> None:
    _, findings = find("volumes", ["provisioned (GB)", "occupied (TB)"])
    assert [(f.severity, f.code) for f in findings] == [("error", "unit")]
    assert "GB in this export means" in findings[0].remedy


def test_a_size_without_a_unit_is_read_in_ours_and_said() -> None:
    found, findings = find("volumes", ["provisioned"])
    assert found["provisioned"].scale == 2**30
    assert [(f.severity, f.code) for f in findings] == [("warning", "unit")]


@pytest.mark.parametrize("heading", ["provisioned (blocks)", "reads (1/s)"])
def test_a_unit_that_cannot_be_meant_is_an_error(heading: str) -> None:
    _, findings = find("volumes", [heading])
    assert [(f.severity, f.code) for f in findings] == [("error", "unit")]


@pytest.mark.parametrize(
    "heading", ["Read %", "reads%", "% reads", "%Read", "READ (%)", "reads percent"]
)
def test_a_percent_sign_is_a_unit_wherever_it_stands(heading: str) -> None:
    found, findings = find("volumes", [heading])
    assert list(found) == ["reads"]
    assert findings == ()


@pytest.mark.parametrize("heading", ["requests %", "% provisioned", "requests%"])
def test_a_percent_sign_where_no_percent_is_asked_is_an_error(heading: str) -> None:
    _, findings = find("volumes", [heading])
    assert [(f.severity, f.code) for f in findings] == [("error", "unit")]


def test_a_ratio_headed_with_a_percent_sign_is_in_percent() -> None:
    found, _ = find("pools", ["skew %"])
    assert found["skew"].scale == 10_000


def test_a_column_that_is_not_ours_is_a_note_and_the_near_one_suggested() -> None:
    _, findings = find("volumes", ["colour", "provisoned (GiB)"])
    assert {f.severity for f in findings} == {"note"}
    assert [f.remedy for f in findings] == ["", 'is it "provisioned (GiB)"?']


def test_two_headings_for_one_column_are_an_error() -> None:
    _, findings = find("volumes", ["requests (1/s)", "IOPS"])
    assert [(f.severity, f.code) for f in findings] == [("error", "column")]


def test_a_title_above_the_headings_is_passed_over() -> None:
    rows = [
        [Cell(text, Place()) for text in line]
        for line in (("Export of March", ""), ("", ""), ("array", "volume"))
    ]
    assert heading_row(rows, sheet("volumes").columns) == 2
    assert heading_row(rows[:2], sheet("volumes").columns) is None
