"""Remarks on the data and on plans: what is wrong, where, and what to do.

Bad data never raises.  It becomes a finding with an address; all are shown at once.
"""

from collections.abc import Iterable
from dataclasses import dataclass
from enum import StrEnum


class Severity(StrEnum):
    """How much a finding weighs: an error stops planning, the others do not."""

    ERROR = "error"
    WARNING = "warning"
    NOTE = "note"


@dataclass(frozen=True, slots=True)
class Place:
    """Where in the user's file something stands; blank parts mean the whole of it."""

    sheet: str = ""
    cell: str = ""

    def __str__(self) -> str:
        """Return the address as ``sheet!cell``."""
        return "!".join(part for part in (self.sheet, self.cell) if part)


@dataclass(frozen=True, slots=True)
class Finding:
    """One remark: a code for machines, a sentence and a remedy for people."""

    code: str
    severity: Severity
    place: Place
    sentence: str
    remedy: str = ""


_RANK = {Severity.ERROR: 0, Severity.WARNING: 1, Severity.NOTE: 2}


def in_order(findings: Iterable[Finding]) -> tuple[Finding, ...]:
    """Return findings with errors first, otherwise in the order they were made."""
    return tuple(sorted(findings, key=lambda finding: _RANK[finding.severity]))


def errors(findings: Iterable[Finding]) -> tuple[Finding, ...]:
    """Return only the findings that stop planning."""
    return tuple(f for f in findings if f.severity is Severity.ERROR)
