"""The placement program of tiny estates, held to what is written out by hand."""

import re
from collections.abc import Callable
from pathlib import Path

import pytest
from golden import carried, limits, relations
from golden.case import Case
from golden.written import apart_from, built, parsed

from placer.candidates.limits import RULES, Date
from placer.placement.shortage import REMEDIES

PLACEMENT = Path(__file__).parents[2] / "placer" / "placement"
CASES = (*limits.CASES, *relations.CASES, *carried.CASES)


@pytest.mark.parametrize("case", CASES, ids=lambda case: case.__name__)
def test_program_is_what_is_written(case: Callable[[], Case]) -> None:
    whole, text = case()
    found, wanted = built(whole), parsed(text)
    assert apart_from(found, wanted) == []
    assert apart_from(wanted, found) == []


def test_a_changed_figure_or_name_is_seen() -> None:
    """The comparison itself must be able to fail."""
    row = "pool-room quay/fast #0: 50 a@quay/fast + 100 b@quay/fast <= 400"
    others = (
        row.replace("50 a", "51 a"),
        row.replace("b@", "c@"),
        row.replace("400", "401"),
        row.replace("+", "-"),
        row.replace("#0", "#1"),
        row.replace("<=", "="),
    )
    assert apart_from(parsed(row), parsed(row)) == []
    assert all(apart_from(parsed(row), parsed(other)) for other in others)
    assert apart_from(parsed(row + "\n" + row), parsed(row))


def codes() -> set[str]:
    """Return the codes of rows: named where rows are built, overrun, or added up."""
    sources = (path.read_text(encoding="utf-8") for path in PLACEMENT.glob("*.py"))
    named = {c for s in sources for c in re.findall(r'RowKey\("([a-z-]+)"', s)}
    blocks = {rule(Date(limits.one_place()[0], 0)).code for rule in RULES}
    return named | blocks | REMEDIES.keys()


def test_every_kind_of_row_is_written_out() -> None:
    written = {row.name.split()[0] for case in CASES for row in parsed(case()[1])}
    assert codes() - written == set()
    assert {"one-place", "budget", "steps", "nights-rate", "pool-wear"} <= codes()
