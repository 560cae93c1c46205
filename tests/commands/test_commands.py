"""Every command on every demonstration inventory, and on what is none."""

import json
import shutil
from datetime import datetime, timedelta, tzinfo
from pathlib import Path
from zipfile import ZipFile

import pytest
from click.testing import CliRunner, Result
from openpyxl import load_workbook

from placer.cli import Exit, main

ROOT = Path(__file__).parents[2]
INVENTORIES = ROOT / "inventories"


class NextYear(datetime):
    """A clock that is a year ahead."""

    @classmethod
    def now(cls, tz: tzinfo | None = None) -> "NextYear":
        return super().now(tz) + timedelta(days=365)


def run(*arguments: str | Path) -> Result:
    return CliRunner().invoke(main, [str(argument) for argument in arguments])


@pytest.fixture(scope="module")
def harbour(tmp_path_factory: pytest.TempPathFactory) -> tuple[Result, Path]:
    """The demonstration, planned once."""
    folder = tmp_path_factory.mktemp("output")
    return run("plan", INVENTORIES / "harbour.xlsx", "--output", folder), folder


def test_the_demonstration_is_planned_and_audited_clean(
    harbour: tuple[Result, Path],
) -> None:
    result, folder = harbour
    assert result.exit_code == Exit.DONE, result.output
    assert "every limit and every claim holds" in result.output
    assert {path.name for path in folder.iterdir()} == {
        "harbour-plan.xlsx",
        "harbour-plan.json",
    }


def test_a_summary_fits_eighty_columns(harbour: tuple[Result, Path]) -> None:
    result, _ = harbour
    assert max(len(line) for line in result.stdout.splitlines()) <= 80


def test_the_written_plan_audits_clean_from_the_files_alone(
    harbour: tuple[Result, Path],
) -> None:
    _, folder = harbour
    result = run("audit", INVENTORIES / "harbour.xlsx", folder / "harbour-plan.xlsx")
    assert result.exit_code == Exit.DONE, result.output


def test_a_plan_changed_by_hand_is_refused(
    harbour: tuple[Result, Path], tmp_path: Path
) -> None:
    """One volume is sent elsewhere in the file: the audit must say so and exit 5."""
    _, folder = harbour
    changed = tmp_path / "changed.xlsx"
    shutil.copy(folder / "harbour-plan.xlsx", changed)
    book = load_workbook(changed)
    sheet = book["placement"]
    rows = [row for row in sheet.iter_rows(min_row=2) if row[2].value and row[3].value]
    moved = next(r for r in rows if "/" in str(r[2].value) and r[2].value != r[3].value)
    moved[3].value = moved[2].value
    book.save(changed)
    result = run("audit", INVENTORIES / "harbour.xlsx", changed)
    assert result.exit_code == Exit.REFUSED
    assert "move-list" in result.output


def test_the_plan_of_another_inventory_is_refused(harbour: tuple[Result, Path]) -> None:
    _, folder = harbour
    other = INVENTORIES / "harbour-least.xlsx"
    result = run("audit", other, folder / "harbour-plan.xlsx")
    assert result.exit_code == Exit.REFUSED
    assert "digest" in result.output


def test_json_output_is_json(harbour: tuple[Result, Path]) -> None:
    _, folder = harbour
    record = json.loads((folder / "harbour-plan.json").read_text(encoding="utf-8"))
    assert record["inventory"] == "harbour"
    assert record["moves"]


def test_an_estate_without_a_plan_names_the_limits(tmp_path: Path) -> None:
    result = run("plan", INVENTORIES / "harbour-short.xlsx", "--output", tmp_path)
    assert result.exit_code == Exit.NO_PLAN, result.output
    book = load_workbook(tmp_path / "harbour-short-plan.xlsx")
    assert "shortages" in book.sheetnames
    assert "short" in result.output


def test_the_least_inventory_is_planned(tmp_path: Path) -> None:
    result = run("plan", INVENTORIES / "harbour-least.xlsx", "--output", tmp_path)
    assert result.exit_code == Exit.DONE, result.output


def test_a_messy_inventory_is_not_planned(tmp_path: Path) -> None:
    """Nothing is written, the faults are listed, and no traceback is shown."""
    for command in (["check"], ["plan", "--output", tmp_path]):
        result = run(*command, INVENTORIES / "harbour-messy.xlsx")
        assert result.exit_code == Exit.BAD_INVENTORY
        assert "volumes!" in result.output
    assert list(tmp_path.iterdir()) == []


@pytest.mark.parametrize(
    "name", ["missing.xlsx", "empty.xlsx", "cut.xlsx", "words.xlsx"]
)
def test_what_is_no_workbook_gets_one_clear_sentence(name: str, tmp_path: Path) -> None:
    whole = (INVENTORIES / "harbour.xlsx").read_bytes()
    contents = {"empty.xlsx": b"", "cut.xlsx": whole[: len(whole) // 2]}
    if name != "missing.xlsx":
        (tmp_path / name).write_bytes(contents.get(name, b"not a workbook at all"))
    for command in ("check", "plan"):
        result = run(command, tmp_path / name)
        assert result.exit_code == Exit.BAD_INVENTORY
        assert result.exception is None or isinstance(result.exception, SystemExit)


def test_an_audit_of_no_plan_is_one_clear_sentence(tmp_path: Path) -> None:
    stray = tmp_path / "stray.xlsx"
    with ZipFile(stray, "w") as archive:
        archive.writestr("hello.txt", "hello")
    result = run("audit", INVENTORIES / "harbour.xlsx", stray)
    assert result.exit_code == Exit.WRONG_USE
    assert result.output.startswith("Error: ")


def test_what_hinders_the_writing_is_said_before_the_search(tmp_path: Path) -> None:
    """Minutes of search are not spent on a plan that cannot be kept."""
    (tmp_path / "file").write_text("in the way")
    locked = tmp_path / "open"
    locked.mkdir()
    (locked / ".~lock.harbour-plan.xlsx#").write_text("somebody")
    for folder, said in ((tmp_path / "file", "cannot write to"), (locked, "is open")):
        result = run("plan", INVENTORIES / "harbour.xlsx", "--output", folder)
        assert result.exit_code == Exit.NOTHING
        assert said in result.output
        assert "searching" not in result.output
        assert "Errno" not in result.output


def test_findings_are_json_where_json_is_asked_for(tmp_path: Path) -> None:
    messy = INVENTORIES / "harbour-messy.xlsx"
    result = run("plan", messy, "--json", "--output", tmp_path)
    assert result.exit_code == Exit.BAD_INVENTORY
    assert {found["severity"] for found in json.loads(result.stdout)} >= {"error"}


def test_an_inventory_is_only_written_as_a_workbook(tmp_path: Path) -> None:
    result = run("blank", tmp_path / "mine.csv")
    assert result.exit_code == Exit.WRONG_USE
    assert list(tmp_path.iterdir()) == []


def test_the_list_of_commands_is_told_whole() -> None:
    listed = run("--help").output.partition("Commands:")[2]
    assert all(name in listed for name in main.commands)
    assert "..." not in listed


def test_an_empty_inventory_is_written_and_says_that_it_is_empty(
    tmp_path: Path,
) -> None:
    file = tmp_path / "mine.xlsx"
    assert run("blank", file).exit_code == Exit.DONE
    result = run("check", file)
    assert result.exit_code == Exit.BAD_INVENTORY
    assert "volumes" in result.output


def test_wrong_use_exits_with_two() -> None:
    assert run("plan").exit_code == 2
    assert run("sail").exit_code == 2


def test_a_plan_without_a_start_date_still_audits_on_a_later_day(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """The plan remembers its first day, so the audit reads the same estate."""
    undated = INVENTORIES / "harbour-least.xlsx"
    planned = run("plan", undated, "--output", tmp_path)
    assert planned.exit_code in (Exit.DONE, Exit.NO_PLAN), planned.output
    monkeypatch.setattr("placer.workbook.intake.datetime", NextYear)
    result = run("audit", undated, tmp_path / "harbour-least-plan.xlsx")
    assert result.exit_code == Exit.DONE, result.output
