"""What was read and what is wrong with it, as text for a terminal."""

from collections.abc import Iterable, Iterator

from placer.estate import Assumption, Estate
from placer.findings import Finding, Severity, errors, in_order
from placer.report.paragraphs import paragraph, table
from placer.report.summary import counted
from placer.tally import totals
from placer.units import MILLI, gib
from placer.words import count

_TITLES = {
    Severity.ERROR: "Errors (nothing is planned until they are gone)",
    Severity.WARNING: "Warnings",
    Severity.NOTE: "Notes",
}


def check_text(
    estate: Estate | None, findings: Iterable[Finding], width: int = 80
) -> str:
    """Return totals, assumptions and findings of an inventory; what to do stands last.

    Parameters
    ----------
    estate
        What was read, None where the errors left nothing to read.
    findings
        Remarks on the inventory.
    width
        [characters] how long a line may be.
    """
    found = in_order(findings)
    parts = [] if estate is None else [_totals(estate, width), _assumed(estate, width)]
    parts += [_group(severity, found, width) for severity in Severity]
    parts += [paragraph(f"{counted(found)}. {_next(found)}", width)]
    return "\n\n".join("\n".join(part) for part in parts if part) + "\n"


def _totals(estate: Estate, width: int) -> list[str]:
    rows = [("array", "volumes", "provisioned GiB", "occupied GiB", "requests/s")]
    rows += [
        (
            total.array or "all",
            f"{total.volumes:,}",
            f"{gib(total.provisioned):,.0f}",
            f"{gib(total.occupied):,.0f}",
            f"{total.requests / MILLI:,.0f}",
        )
        for total in totals(estate)
    ]
    return table(rows, width)


def _assumed(estate: Estate, width: int) -> list[str]:
    """Return the assumptions in the order of their effect, which is their own order."""
    if not estate.assumptions:
        return []
    lines = (
        line
        for assumption in estate.assumptions
        for line in paragraph(_assumption(assumption), width, "  ", "      ")
    )
    return ["Assumed where cells are empty", *lines]


def _assumption(assumption: Assumption) -> str:
    cells = count(assumption.cells, "cell")
    effect = f"; {assumption.effect}" if assumption.effect else ""
    named = f"{assumption.sheet}, {assumption.column}"
    return f"{named} = {assumption.value} ({cells}){effect}"


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
