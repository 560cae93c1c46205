"""The sheet load: hours of a day, of a week, or of dates, on the policy's clock."""

from collections.abc import Sequence
from pathlib import Path

import pytest
from sheetfiles import estate, intake, least, only_error

from placer.estate import Estate, Load

HEAD = ["array", "volume", "day", "hour begins", "zone", "reads (1/s)", "writes (1/s)"]
Lines = list[list[object]]


def sheets(*rows: Sequence[object], zone: str = "UTC") -> dict[str, Lines]:
    policy: Lines = [["setting", "value"], ["start date", "2026-01-12"], ["zone", zone]]
    return least() | {"load": [list(HEAD), *map(list, rows)], "policy": policy}


def reads(found: Estate, volume: int = 0) -> list[int]:
    return [load.reads // 1000 for load in found.volumes[volume].load]


def test_without_the_sheet_the_busy_hour_holds_all_day(tmp_path: Path) -> None:
    found = estate(tmp_path, least())
    assert [hour.label for hour in found.hours][:2] == ["00:00", "01:00"]
    assert {hour.weekday for hour in found.hours} == {None}
    assert reads(found) == [1050] * 24
    assert not found.volumes[0].profiled
    assumed = [a for a in found.assumptions if a.sheet == "load"]
    assert [(a.cells, a.value) for a in assumed] == [(3, "the busy hour holds all day")]


def test_blank_days_give_the_hours_of_a_day(tmp_path: Path) -> None:
    rows = (["K", "db01", None, hour, None, hour, 1] for hour in range(24))
    found = estate(tmp_path, sheets(*rows))
    assert reads(found) == list(range(24))
    assert found.volumes[0].profiled
    assert reads(found, 2) == [45] * 24
    assert not found.volumes[2].profiled


def test_sizes_are_those_of_the_busy_hour_unless_given(tmp_path: Path) -> None:
    row = ["K", "db01", None, 3, None, 300, 30]
    plain = estate(tmp_path, sheets(row))
    mean = 24_500_000 / 1500
    assert plain.volumes[0].load[3] == Load(
        300_000, 30_000, round(300 * mean), round(30 * mean)
    )
    wide = sheets([*row, 8, 64])
    wide["load"][0] += ["read size (KiB)", "write size (KiB)"]
    given = estate(tmp_path, wide)
    assert given.volumes[0].load[3] == Load(300_000, 30_000, 2_457_600, 1_966_080)


def test_any_weekday_gives_the_hours_of_a_week(tmp_path: Path) -> None:
    found = estate(
        tmp_path,
        sheets(
            *(["K", "db01", None, hour, None, 5, 0] for hour in range(24)),
            ["K", "db01", "Tue", 14, None, 9, 0],
        ),
    )
    assert len(found.hours) == 168
    assert (found.hours[38].weekday, found.hours[38].hour) == (1, 14)
    assert found.hours[38].label == "Tue 14:00"
    assert [at for at, load in enumerate(reads(found)) if load != 5] == [38]
    assert reads(found)[38] == 9


def test_dates_give_one_hour_each_in_order(tmp_path: Path) -> None:
    found = estate(
        tmp_path,
        sheets(
            ["K", "db01", "2026-03-03", 9, None, 7, 0],
            ["K", "db01", "2026-03-02", 14, None, 8, 0],
            ["K", "db02", "2026-03-02", 9, None, 3, 0],
            ["K", "db02", "2026-03-02", 14, None, 4, 0],
        ),
    )
    assert [hour.label for hour in found.hours] == [
        "2026-03-02 09:00",
        "2026-03-02 14:00",
        "2026-03-03 09:00",
    ]
    assert [(h.weekday, h.hour) for h in found.hours] == [(0, 9), (0, 14), (1, 9)]
    assert reads(found) == [7, 8, 7]
    assert reads(found, 1) == [3, 4, 3]


def test_a_missing_hour_is_the_highest_of_its_hour_of_day(tmp_path: Path) -> None:
    found = estate(
        tmp_path,
        sheets(
            ["K", "db01", "Mon", 9, None, 7, 1],
            ["K", "db01", "Wed", 9, None, 2, 3],
        ),
    )
    friday = found.volumes[0].load[4 * 24 + 9]
    assert (friday.reads, friday.writes) == (7_000, 3_000)


def test_hours_without_any_load_are_idle_and_said_once(tmp_path: Path) -> None:
    found = intake(tmp_path, sheets(["K", "db01", None, 9, None, 7, 1]))
    assert found.estate is not None
    assert reads(found.estate) == [0] * 9 + [7] + [0] * 14
    assert [(f.severity, f.code) for f in found.findings] == [("warning", "load")]
    assert "23 of 24 hours" in found.findings[0].sentence


@pytest.mark.parametrize(
    ("zone", "hours"),
    [
        ("Asia/Tokyo", [1]),
        ("America/New_York", [15]),
        ("Asia/Kolkata", [4, 5]),
        ("Asia/Kathmandu", [4, 5]),
        ("Pacific/Auckland", [21]),
        ("UTC", [10]),
    ],
)
def test_an_hour_of_another_zone_is_shifted_by_the_winter_offset(
    tmp_path: Path, zone: str, hours: list[int]
) -> None:
    """Offsets on 2026-01-12: +9, -5, +5:30, +5:45, +13 (zone database, from memory)."""
    found = estate(tmp_path, sheets(["K", "db01", None, 10, zone, 7, 1]))
    assert [at for at, load in enumerate(reads(found)) if load] == hours


def test_a_shift_wraps_round_the_week(tmp_path: Path) -> None:
    found = estate(tmp_path, sheets(["K", "db01", "Mon", 2, "Asia/Tokyo", 7, 0]))
    assert reads(found)[6 * 24 + 17] == 7
    assert found.hours[6 * 24 + 17].label == "Sun 17:00"


def test_the_zone_left_blank_is_that_of_the_policy(tmp_path: Path) -> None:
    row = ["K", "db01", None, 10, None, 7, 1]
    found = estate(tmp_path, sheets(row, zone="Asia/Tokyo"))
    assert reads(found)[10] == 7


@pytest.mark.parametrize(
    ("rows", "code"),
    [
        ([["K", "db09", None, 9, None, 1, 1]], "unknown"),
        ([["K", "db01", None, 9, None, 1, 1]] * 2, "duplicate"),
        (
            [
                ["K", "db01", None, 9, None, 1, 1],
                ["K", "db01", "2026-03-02", 9, None, 1, 1],
            ],
            "load",
        ),
        ([["K", "db01", None, 24, None, 1, 1]], "bounds"),
        ([["K", "db01", "someday", 9, None, 1, 1]], "date"),
        ([["K", "db01", None, 9, "Quay", 1, 1]], "zone"),
    ],
)
def test_faults_of_the_sheet(tmp_path: Path, rows: Lines, code: str) -> None:
    assert only_error(intake(tmp_path, sheets(*rows))).code == code
