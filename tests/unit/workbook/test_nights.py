"""Windows and freezes: what the rows mean, and rows that mean nothing."""

from collections.abc import Sequence
from datetime import UTC, date, datetime
from pathlib import Path

import pytest
from sheetfiles import estate, intake, least, only_error

from placer.units import MB

HEAD = ["window", "opens on", "opens at", "lasts (h)", "closes at", "zone", "until"]
Sheets = dict[str, list[list[object]]]


def sheets(*rows: Sequence[object], **policy: object) -> Sheets:
    settings: dict[str, object] = {"start date": "2026-03-02", "zone": "UTC"}
    settings |= {name.replace("_", " "): value for name, value in policy.items()}
    return least() | {
        "windows": [list(HEAD), *map(list, rows)],
        "policy": [["setting", "value"], *([n, v] for n, v in settings.items())],
    }


def minute(year: int, month: int, day: int, hour: int = 0) -> int:
    return int(datetime(year, month, day, hour, tzinfo=UTC).timestamp()) // 60


def test_no_windows_are_saturdays_for_half_a_year_and_the_first_assumption(
    tmp_path: Path,
) -> None:
    found = estate(tmp_path, sheets())
    assert len(found.windows) == 26
    first = found.windows[0]
    assert first.start == minute(2026, 3, 7, 22)
    assert first.end == minute(2026, 3, 8, 6)
    assert found.assumptions[0].sheet == "windows"


def test_a_window_opens_on_its_days_until_its_last(tmp_path: Path) -> None:
    row = ["nights", "Mon-Thu", "22:00", None, "04:00", None, "2026-03-05"]
    found = estate(tmp_path, sheets(row))
    assert [w.start for w in found.windows] == [
        minute(2026, 3, day, 22) for day in (2, 3, 4, 5)
    ]
    assert {w.end - w.start for w in found.windows} == {360}
    assert all(
        a.sheet != "windows" or a.column != "opens on" for a in found.assumptions
    )


def test_the_calendar_reaches_as_far_as_finish_by(tmp_path: Path) -> None:
    row = ["weekly", "Mon", "22:00", 2, None, None, None]
    short = estate(tmp_path, sheets(row)).windows
    long = estate(tmp_path, sheets(row, finish_by="2026-12-31")).windows
    assert len(short) == 27
    assert long[-1].start == minute(2026, 12, 28, 22)


def test_a_window_has_limits_and_its_own_zone(tmp_path: Path) -> None:
    made = sheets(["n", "Tue", "22:00", 2, None, "Asia/Tokyo", "2026-03-03"])
    extra = ["copies together (MB/s)", "copies at once", "cutovers at most", "arrays"]
    made["windows"][0] += extra
    made["windows"][1] += [90, 3, 2, "K"]
    window = estate(tmp_path, made).windows[0]
    assert window.start == minute(2026, 3, 3, 13)
    assert (window.rate, window.at_once, window.cutovers) == (90 * MB, 3, 2)
    assert window.arrays == ("K",)


def test_a_freeze_is_cut_out(tmp_path: Path) -> None:
    made = sheets(["n", "Tue", "20:00", 8, None, None, "2026-03-10"])
    made["freezes"] = [
        ["freeze", "starts on", "starts at", "lasts (h)", "from", "until", "why"],
        ["closing", "Tue", "22:00", 2, "2026-03-03", "2026-03-03", "accounts"],
    ]
    windows = estate(tmp_path, made).windows
    assert [(w.end - w.start) // 60 for w in windows] == [2, 4, 8]
    assert len({w.night for w in windows}) == 2


@pytest.mark.parametrize(
    ("row", "code"),
    [
        (["n", "someday", "22:00", 2, None, None, None], "window"),
        (["n", "FREQ=HOURLY", "22:00", 2, None, None, None], "window"),
        (["n", "Mon", "22:00", 0, None, None, None], "window"),
        (["n", "Mon", "22:00", None, "22:00", None, None], "window"),
        (["n", "Mon", "22:00", 2, "23:00", None, None], "window"),
        (["n", "Mon", "22:00", None, None, None, None], "window"),
        (["n", "Mon", "22:00", 2, None, "Quay", None], "zone"),
        (["n", "Mon", "late", 2, None, None, None], "cell"),
        (["n", "Mon", None, 2, None, None, None], "blank"),
    ],
)
def test_a_row_that_means_nothing_is_one_error(
    tmp_path: Path, row: list[object], code: str
) -> None:
    error = only_error(intake(tmp_path, sheets(row)))
    assert (error.code, error.place.sheet) == (code, "windows")
    assert error.place.cell


def test_a_bad_freeze_is_an_error(tmp_path: Path) -> None:
    made = sheets()
    made["freezes"] = [["freeze", "starts on", "lasts (h)"], ["f", "Blursday", 24]]
    error = only_error(intake(tmp_path, made))
    assert (error.code, error.place.sheet) == ("window", "freezes")


def test_a_window_for_an_unknown_array_is_an_error(tmp_path: Path) -> None:
    made = sheets(["n", "Mon", "22:00", 2, None, None, None])
    made["windows"][0].append("arrays")
    made["windows"][1].append("K, M")
    assert only_error(intake(tmp_path, made)).code == "unknown"


def test_a_window_that_never_opens_is_said(tmp_path: Path) -> None:
    row = ["n", "Mon", "22:00", 2, None, None, date(2026, 3, 1)]
    found = intake(tmp_path, sheets(row))
    assert [(f.severity, f.code) for f in found.findings] == [("warning", "window")]
    assert found.estate is not None
    assert found.estate.windows == ()
