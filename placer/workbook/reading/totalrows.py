"""Rows of totals below a table, which are no rows of it."""

from collections.abc import Sequence

from placer.workbook.column import Kind
from placer.workbook.reading.headings import Heading
from placer.workbook.reading.measures import MEASURES
from placer.workbook.reading.raw import Cell
from placer.workbook.reading.remarks import Remarks

_WORDS = {"total", "totals", "sum", "sums", "grand total"}


def without_totals(
    rows: Sequence[Sequence[Cell]], headings: Sequence[Heading], remarks: Remarks
) -> list[Sequence[Cell]]:
    """Return the rows above those of totals; each of these is an error."""
    kept = list(rows)
    while kept:
        cell = _total(kept[-1], headings, alone=len(kept) == 1)
        if cell is None:
            break
        remarks.error(
            "total-row",
            cell.place,
            "this is a row of totals, not of the inventory",
            "remove the row; totals belong into the sheet control, which checks them",
        )
        kept.pop()
    return kept


def _total(
    row: Sequence[Cell], headings: Sequence[Heading], *, alone: bool
) -> Cell | None:
    """Return the cell that shows a row to be of totals: its word, else its first.

    It says so in place of a name and lacks others; or it has numbers but no names at
    all and is not alone.
    """
    named = [h for h in headings if h.column.kind is Kind.ID]
    names = [row[h.index] for h in named]
    words = [cell for cell in names if _says_total(cell)]
    needed = [row[h.index] for h in named if h.column.required]
    others = [cell for cell in needed if cell not in words]
    if words and (not others or any(cell.blank for cell in others)):
        return words[0]
    numbers = [row[h.index] for h in headings if h.column.kind in MEASURES]
    summed = not alone and any(not cell.blank for cell in numbers)
    return names[0] if names and summed and all(c.blank for c in names) else None


def _says_total(cell: Cell) -> bool:
    return cell.text.casefold().strip(" :=") in _WORDS
