"""What `check` says names every finding with its cell, the worst first."""

from dataclasses import replace

import pytest
from smallplan import ESTATE, FINDINGS

from placer.findings import Finding, Place, Severity
from placer.report.check import check_text


def test_errors_stand_first_with_cell_sentence_and_remedy() -> None:
    text = check_text(ESTATE, FINDINGS)
    assert text.index("volumes!C9: No pool.") < text.index("volumes!H7: =1+1 is text.")
    assert "Name one." in text


def test_totals_are_told_by_array_and_in_all() -> None:
    rows = [line.split() for line in check_text(ESTATE, ()).splitlines()]
    assert ["quay", "3", "300", "180", "2,700"] in rows
    assert ["all", "3", "300", "180", "2,700"] in rows


def test_assumptions_are_told_with_cells_and_effect() -> None:
    said = "volumes, thin = no (3 cells); decides how much fits"
    assert said in check_text(ESTATE, ())


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
    name = replace(ESTATE.arrays[0], name="q" * 120)
    text = check_text(replace(ESTATE, arrays=(name,)), (long,))
    assert max(map(len, text.splitlines())) <= 80
