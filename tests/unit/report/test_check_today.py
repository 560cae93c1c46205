"""`check` holds the model against today: every figure, the worst, and a sentence."""

from typing import NamedTuple

from smallplan import ESTATE

from placer.findings import Finding, Place, Severity
from placer.report.check import check_text


class Figure(NamedTuple):
    where: str
    what: str
    modelled: float
    measured: float
    unit: str
    volumes: int = 0
    worst: str = ""
    near: bool = True

    @property
    def ratio(self) -> float:
        return self.measured / self.modelled if self.modelled else float("inf")


BUSY = (
    Figure("quay/bulk", "pool busy", 50, 70, "%", near=False),
    Figure("quay/fast", "pool busy", 8, 8.4, "%"),
    Figure("quay", "controller busy", 40, 36, "%"),
)
RESPONSES = (Figure("quay/bulk", "response", 10, 11.5, "ms", 3, "quay/mx-02"),)
TITLE = "Does the model explain today?"


def cells(*figures: Figure) -> list[list[str]]:
    return [line.split() for line in check_text(None, (), (), figures).splitlines()]


def test_every_figure_is_shown_modelled_measured_and_in_proportion() -> None:
    rows = cells(*BUSY, *RESPONSES)
    assert ["quay/bulk,", "pool", "busy", "50", "%", "70", "%", "1.40"] in rows
    assert ["quay,", "controller", "busy", "40", "%", "36", "%", "0.90"] in rows
    assert ["quay/bulk", "10", "ms", "11.5", "ms", "1.15", "3"] in rows


def test_the_volume_farthest_off_is_named_with_its_pool() -> None:
    text = check_text(None, (), (), RESPONSES)
    assert "Farthest off: quay/mx-02 in quay/bulk." in text
    assert "Farthest off" not in check_text(None, (), (), BUSY)


def test_a_sentence_says_how_near_the_model_comes() -> None:
    """Ratios 1.4, 1.05, 0.9 and 1.15: the median of four is (1.05 + 1.15) / 2."""
    text = " ".join(check_text(None, (), (), (*BUSY, *RESPONSES)).split())
    assert (
        "The model explains 3 of 4 figures: measured is 0.90 to 1.40 of modelled, "
        "1.10 in the middle. What it does not explain is a warning below."
    ) in text


def test_nothing_is_said_of_others_where_all_are_near() -> None:
    text = " ".join(check_text(None, (), (), BUSY[1:]).split())
    assert "2 of 2 figures: measured is 0.90 to 1.05 of modelled" in text
    assert "warning below" not in text


def test_what_the_model_says_nothing_of_has_no_proportion() -> None:
    figure = Figure("quay", "controller busy", 0, 12, "%", near=False)
    assert ["quay,", "controller", "busy", "0", "%", "12", "%", "-"] in cells(figure)
    text = check_text(None, (), (), (figure,))
    assert "0 of 1 figures. What it does not explain" in " ".join(text.split())
    assert "inf" not in text


def test_without_measurements_it_says_so_and_without_a_model_nothing() -> None:
    assert "Nothing to compare" in check_text(ESTATE, (), (), ())
    assert TITLE not in check_text(ESTATE, ())


def test_it_stands_after_the_totals_and_before_the_findings() -> None:
    finding = Finding("x", Severity.WARNING, Place("pools", "A1"), "Odd.")
    text = check_text(ESTATE, (finding,), (), BUSY)
    assert text.index(TITLE) < text.index("Assumed") < text.index("Odd.")


def test_lines_keep_the_width() -> None:
    long = Figure("q" * 90, "response", 1, 2, "ms", 7, "v" * 90)
    for width in (60, 80):
        text = check_text(None, (), (), (*BUSY, long), width)
        assert max(map(len, text.splitlines())) <= width
