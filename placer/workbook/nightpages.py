"""The run sheet: what the operator of the night prints, follows and fills in."""

from collections.abc import Iterator, Sequence

from openpyxl.workbook import Workbook
from openpyxl.worksheet.pagebreak import Break

from placer.estate import Control, Estate
from placer.plan import Plan
from placer.tally import Night, Total, nights, totals
from placer.units import GIB, MILLI
from placer.windows.clock import local
from placer.words import CAUTIONS, clock, count, status
from placer.workbook import style
from placer.workbook.cellkinds import (
    MEGABYTES_PER_SECOND,
    REAL,
    TEXT,
    Raw,
    escape,
)
from placer.workbook.grid import Grid, Heading
from placer.workbook.runsheet import Section, Step, sections

RUN_SHEET = "run sheet"
_BOX = "\N{BALLOT BOX}"
_STEP: Sequence[Heading] = (
    ("time", TEXT),
    ("what", TEXT),
    ("move", TEXT),
    ("volume", TEXT),
    ("host", TEXT),
    ("from", TEXT),
    ("to", TEXT),
    ("rate (MB/s)", MEGABYTES_PER_SECOND),
    ("latest start", TEXT),
    ("done", TEXT),
    ("actual time", TEXT),
    ("remark", TEXT),
)
_CONTROL: Sequence[Heading] = (
    ("array", TEXT),
    ("total", TEXT),
    ("owner", REAL),
    ("inventory", REAL),
)
_HAND_WRITTEN = {11: 10, 12: 18}
_SIGNED = "Change no. ________   Approved by ____________   Operator ____________"
_UNAUDITED = "This plan has not been audited: do not carry it out."


def run_sheet(book: Workbook, estate: Estate, plan: Plan, verdict: str) -> None:
    """Write cautions, the owner's totals, and every step in clock order."""
    grid = Grid(book.create_sheet(RUN_SHEET))
    grid.title(f"Run sheet for {plan.inventory}, plan from {plan.start}")
    grid.line(status(plan))
    grid.line((verdict or _UNAUDITED).splitlines()[0], style.BOLD)
    grid.gap()
    grid.line(_SIGNED)
    grid.gap()
    grid.line("Before anything starts", style.BOLD)
    for number, caution in enumerate(CAUTIONS, start=1):
        grid.line(f"{number}.  {caution}")
    if estate.controls:
        grid.gap()
        grid.listing(_CONTROL, _controls(estate))
    grid.gap()
    titles = grid.row
    grid.header(_STEP)
    _sections(grid, estate, plan)
    grid.widths |= _HAND_WRITTEN
    grid.settle()
    style.paper(grid.sheet, titles)


def _controls(estate: Estate) -> Iterator[Sequence[Raw]]:
    """Yield the totals typed by the owner beside those of the inventory."""
    found = {total.array: total for total in totals(estate)}
    for control in estate.controls:
        if control.array in found:
            yield from _control(control, found[control.array])


def _control(control: Control, total: Total) -> Iterator[Sequence[Raw]]:
    of = escape(control.array) or "all"
    pairs = (
        ("volumes", control.volumes, total.volumes, 1),
        ("GiB", control.provisioned, total.provisioned, GIB),
        ("requests/s", control.requests, total.requests, MILLI),
    )
    for what, typed, counted, unit in pairs:
        if typed is not None:
            yield of, what, typed / unit, counted / unit


def _sections(grid: Grid, estate: Estate, plan: Plan) -> None:
    loads = {night.window.name: night for night in nights(estate, plan)}
    for number, section in enumerate(sections(estate, plan)):
        if number and section.window:
            grid.sheet.row_breaks.append(Break(id=grid.row - 1))
        night = loads.get(section.window.name) if section.window else None
        style.band(grid.sheet, grid.row, _heading(section, night), len(_STEP))
        grid.row += 1
        for step in section.steps:
            grid.cells([kind for _, kind in _STEP], _row(step, section))
            style.underline(grid.sheet, grid.row - 1, len(_STEP))


def _heading(section: Section, night: Night | None) -> str:
    window, zone = section.window, section.zone
    if window is None:
        day = local(section.begins, zone)
        return f"{day:%a %Y-%m-%d}, outside the windows"
    opens, closes = local(window.start, zone), clock(window.end, zone)
    named = (
        f"{opens:%a} {clock(window.start, zone)} to {closes}   {escape(window.name)}"
    )
    return named if night is None else f"{named}   {_load(night)}"


def _load(night: Night) -> str:
    copies = f"{night.copies} {'copy' if night.copies == 1 else 'copies'}"
    return (
        f"{copies}, {night.carried / GIB:,.0f} GiB, {count(night.cutovers, 'cutover')}"
    )


def _row(step: Step, section: Section) -> Sequence[Raw]:
    move, zone = step.move, section.zone
    begins = local(section.begins, zone).utcoffset()

    def hand(instant: int) -> str:
        """Return day and time; with the offset where the clock was changed since."""
        moment = local(instant, zone)
        shown = f"{moment:%a %H:%M}"
        changed = moment.utcoffset() != begins
        return f"{shown}{clock(instant, zone)[-6:]}" if changed else shown

    return (
        hand(step.instant),
        escape(step.what),
        escape(move.id),
        escape(move.volume),
        escape(step.host),
        escape(move.source),
        escape(move.target),
        None if step.rate is None else MEGABYTES_PER_SECOND.cell(step.rate, zone),
        None if step.latest is None else hand(step.latest),
        _BOX,
        None,
        None,
    )
