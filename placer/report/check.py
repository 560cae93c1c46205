"""What was read and what is wrong with it, as text for a terminal."""

from collections.abc import Iterable, Iterator, Sequence
from itertools import groupby
from typing import Protocol

from placer.estate import Assumption, Estate
from placer.findings import Finding, Severity, errors, in_order
from placer.report.paragraphs import paragraph, table
from placer.report.summary import counted
from placer.report.today import Compared, today_lines

_SUMS = ("sums", "volumes", "provisioned GiB", "occupied GiB", "requests/s", "MB/s")
_TITLES = {
    Severity.ERROR: "Errors (nothing is planned until they are gone)",
    Severity.WARNING: "Warnings",
    Severity.NOTE: "Notes",
}


class Sums(Protocol):
    """Sums as typed: sizes [GiB], requests [1/s], throughput [MB/s]."""

    @property
    def what(self) -> str:
        """Name of the array, or ``all``."""

    @property
    def volumes(self) -> int:
        """Number of volumes."""

    @property
    def provisioned(self) -> float:
        """Size the hosts see [GiB]."""

    @property
    def occupied(self) -> float:
        """What is written [GiB]."""

    @property
    def requests(self) -> float:
        """Requests of the busy hours [1/s]."""

    @property
    def throughput(self) -> float:
        """Bytes of the busy hours [MB/s]."""


def check_text(
    estate: Estate | None,
    findings: Iterable[Finding],
    totals: Iterable[Sums] = (),
    compared: Sequence[Compared] | None = None,
    width: int = 80,
) -> str:
    """Return what an inventory adds up to and all remarks; what to do stands last.

    Parameters
    ----------
    estate
        What was read, None where the errors left nothing to read.
    findings
        Remarks on the inventory.
    totals
        What was read, to compare with the spreadsheet's own sums.
    compared
        The model against what was measured; None where nothing was modelled.
    width
        [characters] how long a line may be.
    """
    found = in_order(findings)
    parts = [_totals(totals, width)]
    parts += [] if compared is None else [today_lines(compared, width)]
    parts += [] if estate is None else [_assumed(estate, width)]
    parts += [_group(severity, found, width) for severity in Severity]
    parts += [paragraph(f"{counted(found)}. {_next(found)}", width)]
    return "\n\n".join("\n".join(part) for part in parts if part) + "\n"


def _totals(totals: Iterable[Sums], width: int) -> list[str]:
    rows = [
        (
            total.what,
            f"{total.volumes:,}",
            f"{total.provisioned:,.0f}",
            f"{total.occupied:,.0f}",
            f"{total.requests:,.0f}",
            f"{total.throughput:,.0f}",
        )
        for total in totals
    ]
    return table([_SUMS, *rows], width) if rows else []


def _assumed(estate: Estate, width: int) -> list[str]:
    """Return the assumptions by their effect, which is the order they come in."""
    if not estate.assumptions:
        return []
    lines = ["Assumed where cells are empty (in brackets: how many)"]
    for effect, group in groupby(estate.assumptions, key=lambda a: a.effect):
        lines += paragraph(f"{effect or 'no effect on the plan'}:", width, "  ", "  ")
        said = "; ".join(_assumption(assumption) for assumption in group)
        lines += paragraph(said, width, "      ", "      ")
    return lines


def _assumption(assumption: Assumption) -> str:
    named = f"{assumption.sheet}, {assumption.column}"
    return f"{named} = {assumption.value} ({assumption.cells:,})"


def _group(severity: Severity, findings: tuple[Finding, ...], width: int) -> list[str]:
    lines = [
        line
        for finding in findings
        if finding.severity is severity
        for line in _finding(finding, width)
    ]
    return [_TITLES[severity], *lines] if lines else []


def _finding(finding: Finding, width: int) -> Iterator[str]:
    place = f"{finding.place}: " if str(finding.place) else ""
    yield from paragraph(place + finding.sentence, width, "  ", "      ")
    if finding.remedy:
        yield from paragraph(finding.remedy, width, "      ", "      ")


def _next(findings: tuple[Finding, ...]) -> str:
    if errors(findings):
        return "Correct the errors and check again."
    return "The inventory can be planned."
