"""The demonstration inventories read as meant, the messy one fault by fault."""

from pathlib import Path

import pytest
from openpyxl import Workbook, load_workbook

from inventories import LEAST, PLANTED, harbour, least, main, messy, short, workbook
from placer.candidates.table import candidates
from placer.candidates.today import compare
from placer.estate import Estate
from placer.findings import errors
from placer.workbook.intake import Intake, read

FOLDER = Path(__file__).parents[3] / "inventories"
NAMES = ("harbour", "harbour-short", "harbour-least", "harbour-messy")


def cells(book: Workbook) -> list[tuple[str, list[tuple[object, ...]]]]:
    return [(s.title, list(s.iter_rows(values_only=True))) for s in book]


def estate(name: str) -> Estate:
    found = read(FOLDER / f"{name}.xlsx").estate
    assert found is not None
    return found


@pytest.mark.parametrize("name", NAMES)
def test_the_files_are_those_the_maker_makes(name: str, tmp_path: Path) -> None:
    main(tmp_path)
    made = load_workbook(tmp_path / f"{name}.xlsx")
    assert cells(load_workbook(FOLDER / f"{name}.xlsx")) == cells(made)


@pytest.mark.parametrize("name", ["harbour", "harbour-short", "harbour-least"])
def test_a_clean_inventory_has_no_error(name: str) -> None:
    assert errors(read(FOLDER / f"{name}.xlsx").findings) == ()


def test_nothing_of_the_harbour_is_left_unread() -> None:
    assert "not-used" not in {f.code for f in read(FOLDER / "harbour.xlsx").findings}


def test_the_harbour_adds_up_to_the_sums_of_its_cells() -> None:
    """Sums of the raw cells, by a plain loop over the workbook."""
    rows = harbour()["volumes"]
    total = read(FOLDER / "harbour.xlsx").totals[-1]
    assert total.volumes == len(rows)
    assert total.provisioned == sum(float(str(r["provisioned (GiB)"])) for r in rows)
    assert total.requests == sum(float(str(r["requests (1/s)"])) for r in rows)


def test_one_cap_of_the_harbour_binds_in_some_hours_and_not_in_all() -> None:
    """Sums of the raw cells, by a plain loop over the rows."""
    sheets = harbour()
    members = {r["volume"] for r in sheets["volumes"] if r["tenant"] == "island line"}
    asked = [0.0] * 24
    for row in sheets["load"]:
        if row["volume"] in members:
            asked[int(str(row["hour begins"]))] += float(str(row["reads (1/s)"]))
            asked[int(str(row["hour begins"]))] += float(str(row["writes (1/s)"]))
    cap = next(r for r in sheets["tenants"] if r["tenant"] == "island line")
    bound = [
        hour
        for hour in range(24)
        if asked[hour] > float(str(cap["requests cap (1/s)"]))
    ]
    assert bound == [6, 7, 16, 17]


def test_the_log_of_the_manifests_is_kept_from_each_of_their_data() -> None:
    implied = [rule.volumes for rule in estate("harbour").rules if "log" in rule.said]
    data = [f"quay/man-db-{number:02}" for number in (1, 2, 3)]
    assert implied == [("quay/man-log-01", name) for name in data]


def test_every_pool_was_measured_and_one_is_not_explained() -> None:
    whole = estate("harbour")
    assert all(pool.busy_measured for pool in whole.pools)
    off = [each for each in compare(candidates(whole)) if not each.near]
    assert [(each.where, each.what) for each in off] == [("old-pier/mast", "pool busy")]
    assert off[0].ratio == pytest.approx(1.3, abs=0.01)


def test_the_least_inventory_has_only_the_columns_people_have() -> None:
    book = workbook(least())
    assert book.sheetnames == ["volumes", "pools"]
    assert tuple(c.value for c in book["volumes"][1]) == LEAST
    assert len(estate("harbour-least").volumes) == len(harbour()["volumes"])


def test_the_short_inventory_is_the_same_estate_asked_for_more() -> None:
    same = [(r["array"], r["volume"], r["pool"]) for r in short()["volumes"]]
    assert same == [(r["array"], r["volume"], r["pool"]) for r in harbour()["volumes"]]
    assert estate("harbour-short").policy.budget == 0


@pytest.fixture(scope="module")
def mess() -> Intake:
    return read(FOLDER / "harbour-messy.xlsx")


@pytest.mark.parametrize(("sheet", "cell", "code"), PLANTED)
def test_every_planted_fault_is_found_in_its_cell(
    mess: Intake, sheet: str, cell: str, code: str
) -> None:
    found = {(f.place.sheet, f.place.cell, f.code) for f in mess.findings}
    assert (sheet, cell, code) in found


def test_nothing_is_planned_from_the_mess(mess: Intake) -> None:
    assert mess.estate is None


def test_every_error_says_what_to_do(mess: Intake) -> None:
    """In its remedy, or after the semicolon where the sentence ends with it."""
    mute = [f for f in errors(mess.findings) if not f.remedy]
    assert [f.sentence for f in mute if "; write" not in f.sentence] == []


def test_only_the_totals_suffer_besides_the_cells_with_faults(mess: Intake) -> None:
    planted = {(sheet, cell) for sheet, cell, _ in messy()[1]}
    others = [
        f for f in errors(mess.findings) if (f.place.sheet, f.place.cell) not in planted
    ]
    assert {f.place.sheet for f in others} <= {"control"}
