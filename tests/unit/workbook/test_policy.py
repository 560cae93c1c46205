"""The policy: a default for every setting, dates as instants, control totals."""

from datetime import UTC, date, datetime
from pathlib import Path

import pytest
from sheetfiles import as_workbook, estate, intake, least, only_error

from placer.estate import Aim, Policy
from placer.units import GIB
from placer.workbook.intake import read

Sheets = dict[str, list[list[object]]]


def sheets(*settings: list[object]) -> Sheets:
    return least() | {"policy": [["setting", "value"], *settings]}


def minute(year: int, month: int, day: int, hour: int = 0) -> int:
    return int(datetime(year, month, day, hour, tzinfo=UTC).timestamp()) // 60


def test_without_a_policy_every_default_holds_from_today(tmp_path: Path) -> None:
    start, earliest = minute(2026, 3, 2), minute(2026, 3, 16)
    assert estate(tmp_path, least()).policy == Policy(start=start, earliest=earliest)
    found = estate(tmp_path, least()).assumptions
    assert ("start date", "2026-03-02") in [(a.column, a.value) for a in found]


def test_every_setting_is_read(tmp_path: Path) -> None:
    found = estate(
        tmp_path,
        sheets(
            ["start date", date(2026, 6, 1)],
            ["Zone", "Asia/Tokyo"],
            ["growth horizon (months)", 24],
            ["budget", "12,500.50"],
            ["currency", "EUR"],
            ["aim", "Least change"],
            ["least gain (%)", 20],
            ["relief given up for fewer moves (%)", "0.5%"],
            ["tolerance on limits", 0],
            ["cured by", "2026-09-30"],
            ["hold (days)", 7],
            ["change lead (working days)", 3],
            ["finish by", "2026-10-31"],
            ["nights kept free (%)", 10],
            ["cutover, check and back-out (min)", 90],
            ["one cutover counts as (GiB)", 2.5],
            ["latent demand", 1.25],
            ["seed", 7],
            ["time limit (s)", 30],
        ),
    ).policy
    assert found == Policy(
        start=minute(2026, 5, 31, 15),
        earliest=minute(2026, 6, 3, 15),
        zone="Asia/Tokyo",
        horizon_months=24,
        budget=1_250_050,
        currency="EUR",
        aim=Aim.LEAST_CHANGE,
        least_gain=200_000,
        relief_given_up=5_000,
        tolerance=0,
        cured_by=minute(2026, 9, 30, 15),
        finish_by=minute(2026, 10, 31, 15),
        hold_days=7,
        nights_kept_free=100_000,
        cutover_minutes=90,
        cutover_counts_as=int(2.5 * GIB),
        latent_demand=1_250_000,
        seed=7,
        time_limit=30,
    )


def test_settings_may_stand_without_a_heading(tmp_path: Path) -> None:
    made = least() | {"policy": [["hold (days)", 3], ["aim", "least change"]]}
    found = estate(tmp_path, made)
    assert (found.policy.hold_days, found.policy.aim) == (3, Aim.LEAST_CHANGE)
    assert {v.hold_days for v in found.volumes} == {3}


def test_an_unknown_setting_is_a_note(tmp_path: Path) -> None:
    found = intake(tmp_path, sheets(["least gian (%)", 10], ["mood", "good"]))
    assert found.estate is not None
    assert [(f.severity, f.remedy) for f in found.findings] == [
        ("note", 'is it "least gain (%)"?'),
        ("note", ""),
    ]


@pytest.mark.parametrize(
    ("setting", "value", "code"),
    [
        ("least gain (%)", 0.3, "percent"),
        ("zone", "Quay", "zone"),
        ("aim", "fast", "cell"),
        ("start date", "1.3.2026", "date"),
        ("finish by", "2026-03-01", "date"),
        ("hold (days)", 1.5, "cell"),
        ("time limit (s)", 0, "bounds"),
        ("latent demand", 0.9, "bounds"),
        ("latent demand", 5.1, "bounds"),
    ],
)
def test_a_wrong_value_is_one_error_at_its_cell(
    tmp_path: Path, setting: str, value: object, code: str
) -> None:
    error = only_error(intake(tmp_path, sheets(["currency", "EUR"], [setting, value])))
    assert (error.code, str(error.place)) == (code, "policy!B3")


def test_a_setting_given_twice_is_an_error(tmp_path: Path) -> None:
    assert (
        only_error(intake(tmp_path, sheets(["seed", 1], ["seed", 2]))).code == "column"
    )


def test_classes_fill_what_the_volume_leaves_blank(tmp_path: Path) -> None:
    made = least()
    made["classes"] = [
        ["class", "response limit (ms)", "importance", "hold (days)"],
        ["gold", 2.5, "vital", 30],
        ["plain", None, None, None],
    ]
    made["volumes"][0] += ["class", "response limit (ms)", "importance"]
    made["volumes"][1] += ["gold", None, None]
    made["volumes"][2] += ["gold", 4, "low"]
    made["volumes"][3] += ["plain", None, None]
    found = estate(tmp_path, made)
    assert [v.response_limit for v in found.volumes] == [2500, 4000, 0]
    assert [v.importance for v in found.volumes] == ["vital", "low", "normal"]
    assert [v.hold_days for v in found.volumes] == [30, 30, 14]
    assert [a.cells for a in found.assumptions if a.column == "response limit"] == [1]
    made["volumes"][1][8] = "silver"
    assert only_error(intake(tmp_path, made)).code == "unknown"


@pytest.mark.parametrize(
    ("row", "column"),
    [
        (["all", 3, 1800, 1750], None),
        (["K", 2, 1507, 1700], None),
        (["All", None, None, 1758], None),
        (["all", 4, None, None], "volumes"),
        (["K", None, 1508, None], "provisioned"),
        (["K", None, None, 1715], "requests"),
    ],
)
def test_control_totals_must_agree_to_half_a_percent(
    tmp_path: Path, row: list[object], column: str | None
) -> None:
    head = ["what", "volumes", "provisioned (GiB)", "requests (1/s)"]
    found = intake(tmp_path, least() | {"control": [head, row]})
    if column is None:
        assert found.findings == ()
    else:
        error = only_error(found)
        assert error.code == "control"
        assert error.sentence.startswith(column)


def test_today_is_the_day_of_the_zone_when_nobody_says(tmp_path: Path) -> None:
    path = as_workbook(tmp_path / "estate.xlsx", least())
    before = datetime.now(UTC).date()
    found = read(path).estate
    after = datetime.now(UTC).date()
    assert found is not None
    days = {(day - date(1970, 1, 1)).days * 1440 for day in (before, after)}
    assert found.policy.start in days
