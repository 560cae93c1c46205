"""The plan as a workbook, out and back in without a loss."""

from collections import defaultdict
from collections.abc import Iterable, Iterator, Sequence
from pathlib import Path
from typing import Any

from openpyxl import load_workbook
from openpyxl.cell.cell import Cell, MergedCell
from openpyxl.workbook import Workbook
from openpyxl.worksheet.worksheet import Worksheet

from placer.estate import Estate
from placer.findings import Finding
from placer.plan import Plan, Status
from placer.workbook import planpages
from placer.workbook.cellkinds import TEXT
from placer.workbook.grid import Grid
from placer.workbook.nightpages import run_sheet
from placer.workbook.plansheets import (
    BOOKINGS,
    LEFT,
    MOVES,
    PLACEMENT,
    POOLS,
    SHORTAGES,
    SUMMARY,
    TABLES,
    Scope,
    Table,
)
from placer.workbook.wholefile import UNREADABLE, save

AnyCell = Cell | MergedCell
Row = Sequence[AnyCell]


class PlanFileError(ValueError):
    """The file is no plan workbook, is damaged, or has a cell that cannot be read."""


def write(
    path: Path,
    estate: Estate,
    plan: Plan,
    findings: Iterable[Finding] = (),
    verdict: str = "",
) -> Path:
    """Write a plan and return the path used, which differs where a file is in the way.

    Parameters
    ----------
    path
        Where the plan should stand.
    estate
        The inventory the plan was made for.
    plan
        The plan, or the shortages where no plan is possible.
    findings
        Remarks on the inventory and on the plan.
    verdict
        What the audit said, in one line.

    Raises
    ------
    placer.workbook.wholefile.FileOpenError
        The file is open in another program.
    """
    return save(build(estate, plan, findings, verdict), path)


def build(
    estate: Estate, plan: Plan, findings: Iterable[Finding] = (), verdict: str = ""
) -> Workbook:
    """Return the workbook of a plan, with its sheets in the order of reading."""
    book = Workbook()
    book.remove(book.worksheets[0])
    planpages.summary(book, estate, plan, verdict)
    run_sheet(book, estate, plan, verdict)
    for table in (PLACEMENT, POOLS, MOVES, BOOKINGS):
        _table(book, table, estate, plan)
    planpages.night_list(book, estate, plan)
    for table in (LEFT, SHORTAGES):
        _table(book, table, estate, plan)
    planpages.assumptions(book, estate)
    planpages.findings(book, findings)
    planpages.about(book, estate, plan)
    return book


def _table(book: Workbook, table: Table, estate: Estate, plan: Plan) -> None:
    records = getattr(plan, table.fills)
    if table.optional and not records:
        return
    grid = Grid(book.create_sheet(table.sheet))
    grid.table(table, records, Scope.of(estate))
    grid.finish(len(table.columns))


def read(path: Path) -> Plan:
    """Read a plan back exactly as it was written.

    Raises
    ------
    PlanFileError
        With a sentence that names the file, the sheet or the cell.
    """
    try:
        book = load_workbook(path)
    except UNREADABLE as error:
        raise PlanFileError(f"{path} cannot be read as a workbook: {error}") from error
    about = _about(book)
    return Plan(
        inventory=about[planpages.INVENTORY],
        digest=about[planpages.DIGEST],
        version=about[planpages.VERSION],
        status=_status(about[planpages.STATUS]),
        start=about[planpages.START],
        **{table.fills: tuple(_records(book, table)) for table in TABLES},
    )


def _about(book: Workbook) -> dict[str, str]:
    """Return what identifies the plan, once all sheets it names are there."""
    sheet = _sheet(book, planpages.ABOUT)
    said = {_text(row[0]): row[1] for row in sheet.iter_rows(min_row=2, max_col=2)}
    missing = [name for name in planpages.IDENTITY if name not in said]
    if missing:
        raise PlanFileError(f"Sheet about lacks the setting {missing[0]}.")
    for title in _text(said[planpages.SHEETS]).split("; "):
        _sheet(book, title)
    return {name: _text(said[name]) for name in planpages.IDENTITY}


def _sheet(book: Workbook, title: str) -> Worksheet:
    if title not in book.sheetnames:
        raise PlanFileError(
            f"This is no whole plan workbook: sheet {title} is missing."
        )
    return book[title]


def _text(cell: AnyCell) -> str:
    return str(_value(cell, TEXT.read, TEXT.expects))


def _status(text: str) -> Status:
    try:
        return Status(text)
    except ValueError as error:
        raise PlanFileError(f"Sheet about: status {text!r} is not known.") from error


def _records(book: Workbook, table: Table) -> Iterator[Any]:
    """Yield the records of one table; an optional one may be absent."""
    if table.optional and table.sheet not in book.sheetnames:
        return
    for row in _rows(book, table):
        parts: dict[str, list[Any]] = defaultdict(list)
        for column, cell in zip(table.columns, row, strict=True):
            if column.field:
                value = _value(cell, column.kind.read, column.kind.expects)
                parts[column.field].append(value)
        yield table.record(**{name: _joined(part) for name, part in parts.items()})


def _joined(part: list[Any]) -> Any:
    """Return the value of one cell, or the id whose halves stand in two."""
    return part[0] if len(part) == 1 else "/".join(half for half in part if half)


def _value(cell: AnyCell, reader: Any, expects: str) -> Any:
    try:
        return reader(cell.value)
    except (ValueError, TypeError) as error:
        address = f"{cell.parent.title}!{cell.coordinate}"
        raise PlanFileError(
            f"{address} holds {cell.value!r} where {expects} should stand."
        ) from error


def _rows(book: Workbook, table: Table) -> Iterator[Row]:
    """Yield the filled rows under a table's headers; a blank row ends it on summary."""
    sheet = _sheet(book, table.sheet)
    rows = sheet.iter_rows(max_col=len(table.columns))
    if not any(_is_header(row, table) for row in rows):
        if table.optional:
            return
        raise PlanFileError(
            f"Sheet {table.sheet} lacks the headers {', '.join(table.headers)}."
        )
    for row in rows:
        if any(cell.value not in (None, "") for cell in row):
            yield row
        elif table.sheet == SUMMARY:
            return


def _is_header(row: Row, table: Table) -> bool:
    return tuple(cell.value for cell in row) == table.headers
