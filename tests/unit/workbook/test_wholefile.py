"""Files appear whole and never replace what somebody else's hands did."""

from pathlib import Path

import pytest
from openpyxl import load_workbook
from openpyxl.workbook import Workbook
from smallplan import ESTATE, FINDINGS, NO_PLAN, PLAN

from placer.workbook.planbook import build, read, write
from placer.workbook.wholefile import FileOpenError, is_untouched, save, save_text


@pytest.fixture
def path(tmp_path: Path) -> Path:
    return tmp_path / "harbour-plan.xlsx"


def test_an_untouched_plan_is_replaced(path: Path) -> None:
    write(path, ESTATE, PLAN, FINDINGS)
    assert is_untouched(path)
    assert write(path, ESTATE, NO_PLAN) == path
    assert read(path) == NO_PLAN


def test_what_the_operator_wrote_is_never_replaced(path: Path) -> None:
    write(path, ESTATE, PLAN)
    book = load_workbook(path)
    book["run sheet"]["J20"] = "22:04"
    book.save(path)
    before = path.read_bytes()
    assert not is_untouched(path)
    assert write(path, ESTATE, NO_PLAN).name == "harbour-plan (2).xlsx"
    assert path.read_bytes() == before


def test_the_second_name_is_used_again_while_untouched(path: Path) -> None:
    path.write_text("notes of somebody else")
    assert write(path, ESTATE, PLAN).name == "harbour-plan (2).xlsx"
    assert write(path, ESTATE, NO_PLAN).name == "harbour-plan (2).xlsx"


def test_a_workbook_of_somebody_else_is_never_replaced(path: Path) -> None:
    Workbook().save(path)
    assert write(path, ESTATE, PLAN).name == "harbour-plan (2).xlsx"


@pytest.mark.parametrize("lock", ["~$harbour-plan.xlsx", ".~lock.harbour-plan.xlsx#"])
def test_an_open_file_is_refused(path: Path, lock: str) -> None:
    """Names of lock files: common practice of office programs, no source."""
    write(path, ESTATE, PLAN)
    path.with_name(lock).touch()
    with pytest.raises(FileOpenError, match="close it first"):
        write(path, ESTATE, NO_PLAN)
    assert read(path) == PLAN


def test_a_failed_write_leaves_the_old_file_and_no_other(
    path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    write(path, ESTATE, PLAN)

    def full_disk(_descriptor: int) -> None:
        raise OSError("no space left")

    monkeypatch.setattr("os.fsync", full_disk)
    with pytest.raises(OSError, match="no space left"):
        write(path, ESTATE, NO_PLAN)
    assert [p.name for p in path.parent.iterdir()] == [path.name]
    assert read(path) == PLAN


def test_a_missing_folder_is_made(tmp_path: Path) -> None:
    path = tmp_path / "output" / "x-plan.xlsx"
    assert save(build(ESTATE, PLAN), path).exists()


def test_a_text_comes_back_with_its_line_ends(tmp_path: Path) -> None:
    path = save_text("a\nb\N{RIGHTWARDS ARROW}\n", tmp_path / "x.json")
    assert path.read_bytes() == b"a\nb\xe2\x86\x92\n"
