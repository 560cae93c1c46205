"""Cells that are merged, where it matters."""

from collections.abc import Iterable, Sequence

from placer.findings import Place
from placer.workbook.reading.raw import Cell
from placer.workbook.reading.remarks import Remarks


def say_merged(sheet: str, rows: Iterable[Sequence[Cell]], remarks: Remarks) -> None:
    """Say once per area that cells are merged in the rows that are read."""
    areas = dict.fromkeys(cell.merged for row in rows for cell in row if cell.merged)
    for area in areas:
        remarks.warn(
            "merged",
            Place(sheet, area),
            "cells are merged; words are read for each of them, numbers are refused",
            "unmerge them and fill in each cell",
        )
