"""What `check` says names every finding with its cell, the worst first."""

from typing import NamedTuple

import pytest
from smallplan import ESTATE, FINDINGS

from placer.findings import Finding, Place, Severity
from placer.report.check import check_text


class Sum(NamedTuple):
    what: str
    volumes: int
    provisioned: float
    occupied: float
    requests: float
    throughput: float


def test_errors_stand_first_with_cell_sentence_and_remedy() -> None:
    text = check_text(ESTATE, FINDINGS)
    assert text.index("volumes!C9: No pool.") < text.index("volumes!H7: =1+1 is text.")
    assert "Name one." in text


def test_totals_are_told_by_array_and_in_all() -> None:
    sums = (Sum("quay", 3, 300, 180, 2700, 60), Sum("all", 3, 300, 180, 2700, 60))
    rows = [line.split() for line in check_text(None, (), sums).splitlines()]
    assert ["quay", "3", "300", "180", "2,700", "60"] in rows
    assert ["all", "3", "300", "180", "2,700", "60"] in rows


def test_assumptions_are_told_with_cells_and_effect() -> None:
    lines = check_text(ESTATE, ()).splitlines()
    effect = lines.index("  decides how much fits:")
    assert lines[effect + 1].strip() == "volumes, thin = no (3)"


@pytest.mark.parametrize(
    ("findings", "last"),
    [
        (FINDINGS, "1 error, 1 warning, 0 notes. Correct the errors and check again."),
        ((), "0 errors, 0 warnings, 0 notes. The inventory can be planned."),
    ],
)
def test_what_to_do_stands_last(findings: tuple[Finding, ...], last: str) -> None:
    assert check_text(ESTATE, findings).splitlines()[-1] == last


def test_an_inventory_that_could_not_be_read_has_findings_only() -> None:
    assert "array" not in check_text(None, FINDINGS)


def test_lines_keep_the_width() -> None:
    long = Finding("x", Severity.NOTE, Place("volumes", "A1"), "word " * 60, "do " * 60)
    sums = (Sum("q" * 120, 3, 300, 180, 2700, 60),)
    text = check_text(ESTATE, (long,), sums)
    assert max(map(len, text.splitlines())) <= 80
