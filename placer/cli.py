"""The command line: reads files, calls the stages, owns the exit codes.

Exit codes: 0 done and audited; 1 the inventory has errors; 2 wrong use; 3 no feasible
plan or moves left over; 4 stopped with nothing; 5 the audit refused the plan.
"""

import signal
import sys
from collections.abc import Callable
from dataclasses import dataclass
from datetime import date
from enum import IntEnum
from pathlib import Path
from threading import Event

import click

from placer import __version__, audit, planner
from placer.candidates.table import Candidates, candidates
from placer.candidates.today import compare
from placer.estate import Estate
from placer.findings import Finding, errors, in_order
from placer.placement.watch import Watch
from placer.plan import Goal, Plan, Status, Stopped
from placer.report.check import check_text
from placer.report.record import dump, dump_findings
from placer.report.summary import plan_text
from placer.report.verdict import verdict_text
from placer.survey import survey
from placer.words import told
from placer.workbook import blank as blank_workbook
from placer.workbook import intake, planbook
from placer.workbook.reading.control import Total
from placer.workbook.wholefile import FileOpenError, ready, save_text

OUTPUT = Path("output")


class Exit(IntEnum):
    """Exit codes of all commands."""

    DONE = 0
    BAD_INVENTORY = 1
    WRONG_USE = 2
    NO_PLAN = 3
    NOTHING = 4
    REFUSED = 5


class WrongUse(click.ClickException):
    """A file was named that the command has no use for."""

    exit_code = Exit.WRONG_USE


class Hindered(click.ClickException):
    """The result cannot be written."""

    exit_code = Exit.NOTHING


@dataclass(frozen=True)
class Opened:
    """An inventory that was read: its estate is None where errors were found."""

    estate: Estate | None
    table: Candidates | None
    findings: tuple[Finding, ...]
    totals: tuple[Total, ...]


@click.group(context_settings={"help_option_names": ["-h", "--help"]})
@click.version_option(__version__, prog_name="placer")
def main() -> None:
    """Place volumes on flash and spinning pools, and plan the nights to get there."""


@main.command(short_help="Write an empty inventory workbook.")
@click.argument("file", type=click.Path(path_type=Path), default="inventory.xlsx")
def blank(file: Path) -> None:
    """Write an empty inventory workbook to FILE.

    Example: placer blank my-estate.xlsx
    """
    if file.suffix.lower() != ".xlsx":
        raise WrongUse(f"{file} is no name of a workbook: end it in .xlsx")
    click.echo(f"Wrote {_written(lambda: blank_workbook.write(file))}.")


@main.command(short_help="List every fault of an inventory, and its sums.")
@click.argument("inventory", type=click.Path(path_type=Path))
@click.option("--json", "as_json", is_flag=True, help="Print findings for machines.")
def check(inventory: Path, *, as_json: bool) -> None:
    """Say what is wrong with an INVENTORY, what was assumed, and what it adds up to.

    Example: placer check inventories/harbour.xlsx
    """
    opened = _open(inventory)
    _tell(opened, as_json)
    sys.exit(Exit.BAD_INVENTORY if errors(opened.findings) else Exit.DONE)


@main.command(short_help="Plan placement, moves and nights; audit what was written.")
@click.argument("inventory", type=click.Path(path_type=Path))
@click.option(
    "--output",
    type=click.Path(path_type=Path),
    default=OUTPUT,
    show_default=True,
    help="Folder the plan is written to.",
)
@click.option(
    "--seconds",
    type=click.IntRange(1),
    metavar="SECONDS",
    help="Time for the search, instead of the time limit in the sheet policy.",
)
@click.option("--json", "as_json", is_flag=True, help="Print the plan for machines.")
@click.option("--quiet", is_flag=True, help="Print no progress.")
def plan(
    inventory: Path, output: Path, seconds: int | None, *, as_json: bool, quiet: bool
) -> None:
    """Plan an INVENTORY: placement, moves, nights; then audit the file written.

    Example: placer plan inventories/harbour.xlsx
    """
    opened = _open(inventory)
    if opened.estate is None or opened.table is None or errors(opened.findings):
        _tell(opened, as_json)
        sys.exit(Exit.BAD_INVENTORY)
    estate = opened.estate
    path = output / f"{estate.name}-plan.xlsx"
    _written(lambda: ready(path))
    limit = seconds or estate.policy.time_limit
    made = planner.plan(opened.table, limit, _watch(estate, limit, quiet))
    if made.status is Status.NO_PLAN and not made.shortages:
        click.echo("The search ended before it found any plan; nothing is written.")
        sys.exit(Exit.NOTHING)
    found, verdict, record = _write(path, estate, made, opened.findings)
    click.echo(record if as_json else plan_text(estate, made, opened.findings, verdict))
    sys.exit(_code(made, found))


@main.command(name="audit", short_help="Check a plan file against its inventory.")
@click.argument("inventory", type=click.Path(path_type=Path))
@click.argument("plan_file", metavar="PLAN", type=click.Path(path_type=Path))
@click.option("--json", "as_json", is_flag=True, help="Print findings for machines.")
def audit_command(inventory: Path, plan_file: Path, *, as_json: bool) -> None:
    """Replay a PLAN against its INVENTORY, and check every limit and claim.

    Example: placer audit inventories/harbour.xlsx output/harbour-plan.xlsx
    """
    try:
        made = planbook.read(plan_file)
    except planbook.PlanFileError as error:
        raise WrongUse(str(error)) from error
    opened = _open(inventory, made.start)
    if opened.estate is None:
        _tell(opened, as_json)
        sys.exit(Exit.BAD_INVENTORY)
    found = audit.judge(opened.estate, made)
    click.echo(dump_findings(found) if as_json else verdict_text(found, made.status))
    sys.exit(Exit.REFUSED if found else Exit.DONE)


def _open(path: Path, start: str = "") -> Opened:
    """Read an inventory; ``start`` stands in where it names no start date."""
    read = intake.read(path, date.fromisoformat(start) if start else None)
    if read.estate is None:
        return Opened(None, None, read.findings, read.totals)
    table = candidates(read.estate)
    found = in_order((*read.findings, *survey(table)))
    return Opened(read.estate, table, found, read.totals)


def _tell(opened: Opened, as_json: bool) -> None:
    """Print what was read and what is wrong with it."""
    if as_json:
        click.echo(dump_findings(opened.findings))
    else:
        compared = compare(opened.table) if opened.table else None
        said = check_text(opened.estate, opened.findings, opened.totals, compared)
        click.echo(said)


def _write(
    path: Path, estate: Estate, made: Plan, findings: tuple[Finding, ...]
) -> tuple[tuple[Finding, ...], str, str]:
    """Write the plan, audit the file, write the verdict into it.

    Returns what the audit found, the verdict in words, and the record for machines.
    """
    used = _written(lambda: planbook.write(path, estate, made, findings))
    found = audit.judge(estate, planbook.read(used))
    verdict = verdict_text(found, made.status)
    _written(lambda: planbook.write(used, estate, made, findings, verdict))
    record = dump(made, estate, (*findings, *found))
    _written(lambda: save_text(record, used.with_suffix(".json")))
    wrote = f"Wrote {used} and {used.with_suffix('.json').name}."
    return found, f"{verdict}\n{wrote}", record


def _written(write: Callable[[], Path]) -> Path:
    """Call a writer; what hinders it is one clear sentence."""
    try:
        return write()
    except FileOpenError as error:
        raise Hindered(str(error)) from error
    except OSError as error:
        said = f"cannot write to {error.filename}: {error.strerror}"
        raise Hindered(said) from error


def _code(made: Plan, found: tuple[Finding, ...]) -> Exit:
    if found:
        return Exit.REFUSED
    if made.shortages or made.left:
        return Exit.NO_PLAN
    return Exit.DONE


def _watch(estate: Estate, seconds: int, quiet: bool) -> Watch:
    """Return the watch over a search; unless quiet it tells how long and what."""
    halted = _halt_on_interrupt()
    if quiet:
        return Watch(halted=halted.is_set)
    said = f"searching for at most {seconds} s; Ctrl-C keeps the best plan found so far"
    click.echo(said, err=True)
    return Watch(_progress(estate.policy.currency), halted.is_set)


def _progress(currency: str) -> Callable[[Goal], None]:
    def tell(goal: Goal) -> None:
        click.echo(told(goal, currency), err=True)

    return tell


def _halt_on_interrupt() -> Event:
    """Return an event that the first Ctrl-C sets; a second one ends the program."""
    halted = Event()

    def halt(*_: object) -> None:
        halted.set()
        signal.signal(signal.SIGINT, _end)
        said = f"{Stopped.INTERRUPT}: keeping the best plan once this step is done"
        click.echo(said, err=True)

    signal.signal(signal.SIGINT, halt)
    return halted


def _end(*_: object) -> None:
    """End the program at once, as asked by a second Ctrl-C."""
    click.echo("interrupted again: ended", err=True)
    sys.exit(Exit.NOTHING)
