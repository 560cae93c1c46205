"""Files that appear whole, and never over the work of somebody else's hands."""

import os
from collections.abc import Callable, Iterator
from hashlib import sha256
from itertools import count
from pathlib import Path
from tempfile import TemporaryFile
from typing import BinaryIO
from zipfile import BadZipFile

from openpyxl import load_workbook
from openpyxl.utils.exceptions import InvalidFileException
from openpyxl.workbook import Workbook

UNREADABLE = (BadZipFile, InvalidFileException, KeyError, ValueError, OSError)


class FileOpenError(OSError):
    """The file is open in another program, so it is not replaced."""


def save(book: Workbook, path: Path) -> Path:
    """Write a workbook in one step and return the path that was used.

    A file that is no workbook of placer's, or was changed by hand since placer wrote
    it, is left alone: the workbook is then written beside it as ``NAME (2).xlsx``.

    Raises
    ------
    FileOpenError
        A lock file beside the target says that another program has it open.
    """
    used = _used(path)
    book.properties.identifier = _content(book)
    _appear(used, book.save)
    return used


def ready(path: Path) -> Path:
    """Return the path that ``save`` would use, once sure that it can write there.

    Raises
    ------
    FileOpenError
        As ``save``.
    OSError
        Nothing can be written in the folder.
    """
    path.parent.mkdir(parents=True, exist_ok=True)
    with TemporaryFile(dir=path.parent):
        return _used(path)


def save_text(text: str, path: Path) -> Path:
    """Write a text file in one step and return its path."""
    _appear(path, lambda file: file.write(text.encode()))
    return path


def _appear(path: Path, write: Callable[[BinaryIO], object]) -> None:
    """Write a file beside, make sure of it, and put it in its place whole."""
    path.parent.mkdir(parents=True, exist_ok=True)
    part = path.with_name(f".{path.stem}.{os.getpid()}.part")
    try:
        with part.open("wb") as file:
            write(file)
            file.flush()
            os.fsync(file.fileno())
        part.replace(path)
    finally:
        part.unlink(missing_ok=True)


def _used(path: Path) -> Path:
    used = next(p for p in _names(path) if not p.exists() or is_untouched(p))
    _refuse_open(used)
    return used


def _names(path: Path) -> Iterator[Path]:
    yield path
    for number in count(2):
        yield path.with_name(f"{path.stem} ({number}){path.suffix}")


def _refuse_open(path: Path) -> None:
    for lock in (f"~${path.name}", f".~lock.{path.name}#"):
        if path.with_name(lock).exists():
            raise FileOpenError(f"{path} is open in another program: close it first.")


def is_untouched(path: Path) -> bool:
    """Return whether a file holds exactly what placer wrote there."""
    try:
        book = load_workbook(path)
        return str(book.properties.identifier) == _content(book)
    except UNREADABLE:
        return False


def _content(book: Workbook) -> str:
    """Return a digest of every filled cell; the same before writing and after."""
    digest = sha256()
    for sheet in book.worksheets:
        for row in sheet.iter_rows():
            for cell in row:
                if cell.value not in (None, ""):
                    value = _same(cell.value, cell.data_type)
                    digest.update(repr((sheet.title, cell.coordinate, value)).encode())
    return f"placer {digest.hexdigest()}"


def _same(value: object, data_type: str) -> object:
    """Return a number as a float, whether it was a text with all digits or not."""
    return float(str(value)) if data_type == "n" else value
