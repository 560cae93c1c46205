"""Whatever stands in a cell, reading gives findings and never fails."""

from collections.abc import Callable, Mapping
from datetime import date, datetime, time, timedelta
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from sheetfiles import FULL, TODAY, Lines, as_folder, as_workbook

from placer.findings import Severity
from placer.workbook.intake import read

ANYTHING = st.one_of(
    st.none(),
    st.booleans(),
    st.integers(),
    st.floats(allow_nan=False, allow_infinity=False),
    st.text(st.characters(min_codepoint=32, max_codepoint=0xD7FF), max_size=12),
    st.sampled_from(["1,234", "-1", "50%", "#N/A", "2:1", "1E+05", "FREQ=DAILY", "/"]),
    st.dates(date(1900, 3, 1), date(2099, 1, 1)),
    st.datetimes(datetime(1904, 1, 2), datetime(2099, 1, 1)),
    st.times(),
    st.timedeltas(timedelta(0), timedelta(days=99)),
    st.just(time(2, 1)),
)


@st.composite
def one_cell_changed(draw: st.DrawFn) -> dict[str, Lines]:
    """Draw the full inventory with anything in one of its cells, headings included."""
    name = draw(st.sampled_from(sorted(FULL)))
    lines = [list(line) for line in FULL[name]]
    line = draw(st.sampled_from(lines))
    line[draw(st.integers(0, len(line) - 1))] = draw(ANYTHING)
    return {**FULL, name: lines}


def _workbook(path: Path, sheets: Mapping[str, Lines]) -> Path:
    return as_workbook(path / "any.xlsx", sheets)


def _folder(path: Path, sheets: Mapping[str, Lines]) -> Path:
    return as_folder(path / "any", sheets)


@pytest.mark.parametrize("write", [_workbook, _folder])
@settings(
    max_examples=80,
    deadline=None,
    suppress_health_check=[HealthCheck.function_scoped_fixture],
)
@given(sheets=one_cell_changed())
def test_reading_never_fails(
    tmp_path: Path,
    write: Callable[[Path, Mapping[str, Lines]], Path],
    sheets: dict[str, Lines],
) -> None:
    found = read(write(tmp_path, sheets), TODAY)
    failed = any(f.severity is Severity.ERROR for f in found.findings)
    assert (found.estate is None) == failed
    assert all(f.sentence and f.place.sheet for f in found.findings)
