"""Tenants: caps, and those that only volumes name."""

from pathlib import Path

import pytest
from sheetfiles import estate, intake, least, only_error

from placer.estate import Tenant
from placer.units import MB

Sheets = dict[str, list[list[object]]]
HEAD: list[object] = ["tenant", "requests cap (1/s)", "MB/s cap", "plan for"]


def with_tenants(*rows: list[object], of: object = "ferries") -> Sheets:
    sheets = least()
    sheets["volumes"][0].append("tenant")
    sheets["volumes"][1].append(of)
    sheets["volumes"][2].append(of)
    sheets["tenants"] = [HEAD, *rows]
    return sheets


def tenants(tmp_path: Path, *rows: list[object]) -> tuple[Tenant, ...]:
    return estate(tmp_path, with_tenants(*rows)).tenants


def test_caps_are_read_in_small_units(tmp_path: Path) -> None:
    (found,) = tenants(tmp_path, ["ferries", 1200.5, 80, "Cap"])
    assert (found.requests_cap, found.rate_cap) == (1_200_500, 80 * MB)
    assert found.plan_for_cap


def test_blank_caps_do_not_limit_and_what_was_measured_is_planned(
    tmp_path: Path,
) -> None:
    (found,) = tenants(tmp_path, ["ferries", None, "not limited", None])
    assert (found.requests_cap, found.rate_cap) == (0, 0)
    assert not found.plan_for_cap


@pytest.mark.parametrize("column", [1, 2])
def test_a_cap_of_nothing_is_refused_for_it_would_mean_no_cap(
    tmp_path: Path, column: int
) -> None:
    row: list[object] = ["ferries", 100, 100, None]
    row[column] = 0
    error = only_error(intake(tmp_path, with_tenants(row)))
    assert (error.code, error.place.cell) == ("bounds", "ABC"[column] + "2")


def test_a_rate_in_bits_is_an_eighth(tmp_path: Path) -> None:
    sheets = with_tenants(["ferries", None, 800, None])
    sheets["tenants"][0] = [*HEAD[:2], "throughput cap (Mbit/s)", HEAD[3]]
    assert estate(tmp_path, sheets).tenants[0].rate_cap == 100 * MB


def test_to_plan_for_a_cap_needs_one(tmp_path: Path) -> None:
    found = intake(tmp_path, with_tenants(["ferries", None, None, "cap"]))
    error = only_error(found)
    assert (error.code, error.place.cell) == ("blank", "D2")


def test_a_tenant_not_listed_is_said_once_and_has_no_cap(tmp_path: Path) -> None:
    found = intake(tmp_path, with_tenants(["harbour office", 5, 5, None]))
    assert found.estate is not None
    assert found.estate.tenants[1] == Tenant(
        name="ferries", place=found.findings[0].place
    )
    said = [(f.severity, f.code, f.place.cell) for f in found.findings]
    assert said == [("warning", "unknown", "I2")]


def test_a_tenant_is_said_without_a_sheet_of_tenants_too(tmp_path: Path) -> None:
    sheets = with_tenants()
    del sheets["tenants"]
    assert [f.code for f in intake(tmp_path, sheets).findings] == ["unknown"]


def test_tenants_told_apart_by_case_alone_are_refused(tmp_path: Path) -> None:
    error = only_error(intake(tmp_path, with_tenants(["Ferries", 5, 5, None])))
    assert (error.code, error.place.sheet) == ("id", "volumes")


def test_a_tenant_has_one_row(tmp_path: Path) -> None:
    row: list[object] = ["ferries", 5, 5, None]
    assert only_error(intake(tmp_path, with_tenants(row, row))).code == "duplicate"


@pytest.mark.parametrize("caps", [(5, None), (None, 5), (5, 5)])
def test_either_cap_is_enough_to_plan_for(
    tmp_path: Path, caps: tuple[object, object]
) -> None:
    (found,) = tenants(tmp_path, ["ferries", *caps, "cap"])
    assert found.plan_for_cap


def test_a_cap_that_cannot_be_read_is_not_said_to_be_missing_too(
    tmp_path: Path,
) -> None:
    found = intake(tmp_path, with_tenants(["ferries", "much", None, "cap"]))
    assert only_error(found).place.cell == "B2"
