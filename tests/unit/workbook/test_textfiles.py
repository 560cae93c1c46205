"""CSV files as other programs write them."""

from pathlib import Path

import pytest
from sheetfiles import LEAST, TODAY, as_folder, least, only_error

from placer.workbook.intake import read


@pytest.mark.parametrize("separator", [",", ";", "\t"])
@pytest.mark.parametrize("mark", ["", "\ufeff"])
def test_any_separator_and_byte_order_mark(
    tmp_path: Path, separator: str, mark: str
) -> None:
    plain = read(as_folder(tmp_path / "estate", LEAST), TODAY)
    for name, lines in LEAST.items():
        text = "\r\n".join(separator.join(map(str, line)) for line in lines)
        file = tmp_path / "estate" / f"{name}.csv"
        file.write_text(mark + text, encoding="utf-8")
    assert read(tmp_path / "estate", TODAY) == plain


def test_a_quoted_heading_after_a_byte_order_mark(tmp_path: Path) -> None:
    folder = as_folder(tmp_path / "estate", LEAST)
    plain = read(folder, TODAY)
    text = (folder / "volumes.csv").read_text(encoding="utf-8")
    text = text.replace("array", '"array (harbour, inland)"', 1)
    (folder / "volumes.csv").write_text("\ufeff" + text, encoding="utf-8")
    assert read(folder, TODAY) == plain


def test_decimal_commas_between_semicolons(tmp_path: Path) -> None:
    folder = as_folder(tmp_path / "estate", LEAST)
    plain = read(folder, TODAY)
    lines = [";".join(map(str, line)) for line in LEAST["volumes"]]
    text = "\n".join(lines).replace("24.5", "24,5").replace("250.5", "250,5")
    (folder / "volumes.csv").write_text(text, encoding="utf-8")
    assert read(folder, TODAY) == plain


def test_other_files_are_left_alone_and_names_know_no_case(tmp_path: Path) -> None:
    folder = as_folder(tmp_path / "estate", least())
    plain = read(folder, TODAY)
    (folder / "readme.txt").write_text("hello", encoding="utf-8")
    (folder / "pools.csv").rename(folder / "Pools.CSV")
    found = read(folder, TODAY)
    assert found.estate is not None
    assert found.totals == plain.totals


def test_short_lines_are_filled_with_blanks(tmp_path: Path) -> None:
    folder = as_folder(tmp_path / "estate", least())
    file = folder / "volumes.csv"
    file.write_text(file.read_text(encoding="utf-8") + "K,db03\n", encoding="utf-8")
    found = read(folder, TODAY)
    assert {f.code for f in found.findings} == {"blank"}
    assert {f.place.cell for f in found.findings} == {
        f"{column}5" for column in "CDEFGH"
    }


def test_a_western_code_page_is_read_and_said(tmp_path: Path) -> None:
    """Byte E9 is e with an acute accent in Windows-1252, and no UTF-8 here."""
    folder = as_folder(tmp_path / "estate", LEAST)
    file = folder / "volumes.csv"
    text = file.read_text(encoding="utf-8").replace("web01", "caf\u00e9")
    file.write_text(text, encoding="cp1252")
    found = read(folder, TODAY)
    assert found.estate is not None
    assert found.estate.volumes[2].name == "caf\u00e9"
    said = [(f.severity, f.code, f.place.sheet) for f in found.findings]
    assert said == [("note", "code-page", "volumes")]


@pytest.mark.parametrize("content", [b"\x81\xff", "array,volume".encode("utf-16")])
def test_what_is_no_text_is_refused_in_plain_words(
    tmp_path: Path, content: bytes
) -> None:
    folder = as_folder(tmp_path / "estate", LEAST)
    (folder / "hosts.csv").write_bytes(content)
    error = only_error(read(folder, TODAY))
    assert (error.code, error.place.sheet) == ("file", "hosts")
    assert "codec" not in error.sentence
    assert "UTF-8" in error.remedy


def test_volumes_are_not_blamed_for_pools_that_could_not_be_read(
    tmp_path: Path,
) -> None:
    folder = as_folder(tmp_path / "estate", LEAST)
    (folder / "pools.csv").write_bytes(b"\x81\xff")
    error = only_error(read(folder, TODAY))
    assert (error.code, error.place.sheet) == ("file", "pools")
