"""The inventory as raw sheets, be it a workbook or a folder."""

from pathlib import Path

from placer.findings import Place
from placer.workbook.reading.raw import RawSheet
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.spreadsheet import read_workbook
from placer.workbook.reading.textfiles import read_folder


def read_source(path: Path, remarks: Remarks) -> tuple[RawSheet, ...]:
    """Return the sheets of a path; none, with a finding, where there is nothing."""
    try:
        if path.is_dir():
            return read_folder(path, remarks)
        return read_workbook(path, remarks)
    except OSError as error:
        remarks.error(
            "file",
            Place(),
            f"{path} cannot be read: {error.strerror}",
            "name a workbook (.xlsx) or a folder of CSV files",
        )
        return ()
