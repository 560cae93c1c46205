"""Pools: which defaults stand in, what must be given, what cannot be meant."""

from pathlib import Path

import pytest
from sheetfiles import estate, intake, least, only_error

from placer.estate import Assumption, Expansion, Pool
from placer.units import GIB, MIB

Sheets = dict[str, list[list[object]]]


def with_pool(**cells: object) -> Sheets:
    """Return the least inventory with one more pool, K/X."""
    sheets = least()
    sheets["pools"] = [
        [*sheets["pools"][0], *cells],
        *sheets["pools"][1:],
        ["X", "K", None, None, None, *cells.values()],
    ]
    return sheets


def pool(tmp_path: Path, media: str, **cells: object) -> Pool:
    return _pool(tmp_path, media, cells)[0]


def _pool(
    tmp_path: Path, media: str, cells: dict[str, object]
) -> tuple[Pool, tuple[Assumption, ...]]:
    sheets = with_pool(**cells)
    sheets["pools"][3][2] = media
    found = estate(tmp_path, sheets)
    return found.pools[2], found.assumptions


def test_flash_has_the_defaults_of_flash(tmp_path: Path) -> None:
    flash = estate(tmp_path, least()).pools[1]
    assert (flash.read_time, flash.write_time) == (150, 50)
    assert (flash.reads_at_most, flash.writes_at_most) == (80_000_000, 30_000_000)
    assert (flash.drive_rate, flash.rpm, flash.seek) == (1_000_000_000, 0, 0)


def test_spinning_has_the_defaults_of_spinning(tmp_path: Path) -> None:
    spinning = estate(tmp_path, least()).pools[0]
    assert (spinning.rpm, spinning.seek) == (7200, 8500)
    assert (spinning.drive_rate, spinning.read_time) == (150_000_000, 0)


def test_a_black_box_needs_no_drives_and_assumes_none(tmp_path: Path) -> None:
    cells: dict[str, object] = {"requests at most (1/s)": 20_000, "usable (GiB)": 5000}
    box, assumed = _pool(tmp_path, "flash", cells)
    assert (box.requests_at_most, box.usable) == (20_000_000, 5000 * GIB)
    assert (box.read_time, box.reads_at_most, box.drive_rate) == (0, 0, 0)
    of_flash = [a for a in assumed if a.column == "read time idle"]
    assert [a.cells for a in of_flash] == [1]


@pytest.mark.parametrize("media", ["mixed", "unmodelled"])
def test_a_pool_that_only_gives_needs_nothing(tmp_path: Path, media: str) -> None:
    source, assumed = _pool(tmp_path, media, {})
    assert (source.usable, source.drives) == (0, 0)
    assert not source.takes_volumes
    assert [a.cells for a in assumed if a.column == "skew"] == [2]


def test_the_wear_of_a_rated_pool_has_its_defaults(tmp_path: Path) -> None:
    rated = pool(tmp_path, "flash", **{"usable (GiB)": 500, "dwpd": 1.5})
    assert (rated.dwpd, rated.warranty_days) == (1_500_000, 1825)
    assert (rated.life_days, rated.array_overhead) == (1825, 1_100_000)


def test_shares_and_ratios_are_read_to_the_safe_side(tmp_path: Path) -> None:
    cells = {
        "usable (GiB)": 500,
        "fill ceiling (%)": "33.33333%",
        "overhead (%)": "3.33333%",
        "reduction here": "2:1",
        "skew": 1.2345678,
        "provisioned / usable at most": "150%",
    }
    cells["provisioned / usable at most"] = 1.5
    found = pool(tmp_path, "flash", **cells)
    assert (found.fill_ceiling, found.overhead) == (333_333, 33_334)
    assert (found.reduction, found.skew) == (2_000_000, 1_234_568)
    assert found.thin_at_most == 1_500_000


def test_an_expansion_is_whole_or_not_there(tmp_path: Path) -> None:
    cells: dict[str, object] = {
        "usable (GiB)": 500,
        "drives per step": 4,
        "price per step (money)": 1200.5,
        "steps at most": 2,
        "delivery (weeks)": 6,
        "ready after delivery (days)": 3,
    }
    found = pool(tmp_path, "flash", **cells)
    assert found.expansion == Expansion(
        drives=4, price=120_050, at_most=2, delivery_days=45
    )
    sheets = with_pool(**(cells | {"steps at most": None}))
    sheets["pools"][3][2] = "flash"
    assert only_error(intake(tmp_path, sheets)).code == "blank"


def test_usable_above_all_drives_is_refused(tmp_path: Path) -> None:
    """24 drives of 1200 GB are 26 822 GiB."""
    sheets = with_pool(**{"usable (GiB)": 26_823})
    sheets["pools"][3][2:5] = ["spinning", 24, 1200]
    assert only_error(intake(tmp_path, sheets)).code == "raw-capacity"
    sheets["pools"][3][5] = 26_822
    assert intake(tmp_path, sheets).estate is not None


def test_a_drive_under_a_hundred_gb_is_asked(tmp_path: Path) -> None:
    sheets = least()
    sheets["pools"][1][4] = 1.2
    assert only_error(intake(tmp_path, sheets)).code == "drive-size"
    sheets["pools"][0][4] = "drive size (TB)"
    sheets["pools"][2][4] = 3.84
    assert intake(tmp_path, sheets).estate is not None


def test_a_small_drive_with_a_usable_room_is_only_a_warning(tmp_path: Path) -> None:
    sheets = with_pool(**{"usable (GiB)": 500})
    sheets["pools"][3][2:5] = ["spinning", 24, 73]
    found = intake(tmp_path, sheets)
    assert found.estate is not None
    assert [(f.severity, f.code) for f in found.findings] == [("warning", "drive-size")]


@pytest.mark.parametrize(("drives", "size"), [(None, None), (24, None), (None, 1200)])
def test_room_must_be_known_one_way_or_the_other(
    tmp_path: Path, drives: int | None, size: int | None
) -> None:
    sheets = least()
    sheets["pools"][1][3:5] = [drives, size]
    assert only_error(intake(tmp_path, sheets)).code == "blank"


def test_two_pools_of_one_name_on_one_array_are_refused(tmp_path: Path) -> None:
    sheets = least()
    sheets["pools"].append(["S1", "K", "flash", 8, 3840])
    assert only_error(intake(tmp_path, sheets)).code == "duplicate"


def test_spinning_prefetches_a_mebibyte_and_flash_does_not_say(tmp_path: Path) -> None:
    found = estate(tmp_path, least())
    assert [p.prefetch_unit for p in found.pools] == [MIB, MIB]
    assumed = [a for a in found.assumptions if a.column == "prefetch unit"]
    assert [(a.value, a.cells) for a in assumed] == [("1024 KiB", 1)]


def test_what_was_measured_is_read_as_typed(tmp_path: Path) -> None:
    cells: dict[str, object] = {
        "usable (GiB)": 500,
        "prefetch unit (KiB)": 512,
        "pool busy measured (%)": "62.5%",
        "measured factor": 1.25,
    }
    found = pool(tmp_path, "spinning", **cells)
    assert found.prefetch_unit == MIB // 2
    assert (found.busy_measured, found.measured_factor) == (625_000, 1_250_000)


def test_a_pool_not_measured_has_the_factor_one(tmp_path: Path) -> None:
    found = estate(tmp_path, least()).pools[0]
    assert (found.busy_measured, found.measured_factor) == (0, 1_000_000)


@pytest.mark.parametrize(
    ("column", "typed"),
    [
        ("prefetch unit (KiB)", 0),
        ("measured factor", 0),
        ("measured factor", 0.09),
        ("measured factor", 11),
        ("pool busy measured (%)", 101),
    ],
)
def test_what_would_divide_by_nothing_or_undo_a_load_is_refused(
    tmp_path: Path, column: str, typed: object
) -> None:
    sheets = with_pool(**{"usable (GiB)": 500, column: typed})
    sheets["pools"][3][2] = "spinning"
    error = only_error(intake(tmp_path, sheets))
    assert (error.code, error.place.cell) == ("bounds", "G4")


def test_a_factor_under_one_is_as_good_as_one_over_it(tmp_path: Path) -> None:
    cells: dict[str, object] = {"usable (GiB)": 500, "measured factor": 0.7}
    assert pool(tmp_path, "flash", **cells).measured_factor == 700_000


PLAN = "plan for a lost drive"
GROUP: dict[str, object] = {
    "usable (GiB)": 500,
    "data per stripe": 5,
    "parity per stripe": 1,
}


def test_a_pool_is_planned_for_a_lost_drive_only_where_asked(tmp_path: Path) -> None:
    for typed, meant, assumed in (("yes", True, 0), ("no", False, 0), (None, False, 1)):
        found, assumptions = _pool(tmp_path, "flash", GROUP | {PLAN: typed})
        assert found.one_drive_lost is meant
        said = [(a.value, a.cells) for a in assumptions if a.column == PLAN]
        assert said == [("no", 1)] * assumed


@pytest.mark.parametrize(
    "cells", [{"parity per stripe": 0}, {"requests at most (1/s)": 20_000}]
)
def test_a_lost_drive_that_cannot_be_counted_is_said(
    tmp_path: Path, cells: dict[str, object]
) -> None:
    sheets = with_pool(**(GROUP | {PLAN: "yes"} | cells))
    sheets["pools"][3][2] = "flash"
    found = intake(tmp_path, sheets)
    assert found.estate is not None
    assert [(f.severity, f.code) for f in found.findings] == [("warning", "lost-drive")]


def test_drives_may_be_named_as_the_trade_does_and_it_is_said_once(
    tmp_path: Path,
) -> None:
    sheets = least()
    sheets["pools"][1][2], sheets["pools"][2][2] = "HDD", "SSD"
    sheets["pools"].append(["F2", "L", "ssd", 8, 3840])
    found = intake(tmp_path, sheets)
    assert found.estate is not None
    assert [p.media for p in found.estate.pools] == ["spinning", "flash", "flash"]
    assert [p.read_time for p in found.estate.pools] == [0, 150, 150]
    said = [(f.severity, f.code, f.place.cell) for f in found.findings]
    assert said == [("note", "read-as", "C3"), ("note", "read-as", "C2")]
    assert "2 cells" in found.findings[0].sentence
