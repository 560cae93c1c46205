"""Paragraphs keep to their width and keep together what belongs together."""

import pytest

from placer.report.paragraphs import paragraph

TEXT = "pool busy was measured at 60.5 %, the model says 46.5 %"


@pytest.mark.parametrize("width", range(20, 60))
def test_a_percent_sign_stays_with_its_number(width: int) -> None:
    lines = paragraph(TEXT, width)
    assert " ".join(lines) == TEXT
    assert max(map(len, lines)) <= width
    assert not any(line.startswith("%") for line in lines)
