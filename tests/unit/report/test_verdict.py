"""The verdict says the cause first, and is short whatever was found."""

from placer.findings import Finding, Place, Severity
from placer.plan import Status
from placer.report.verdict import CLEAN, NO_PLAN, OTHER, verdict_text


def fault(code: str, sentence: str) -> Finding:
    return Finding(code, Severity.ERROR, Place(), sentence)


def test_a_clean_plan_and_a_clean_file_without_one_are_told_apart() -> None:
    """Where limits cannot be kept, nobody may read that they are."""
    assert verdict_text(()) == CLEAN
    assert verdict_text((), Status.NO_PLAN) == NO_PLAN
    assert "limit" not in NO_PLAN


def test_another_inventory_is_told_before_what_follows_from_it() -> None:
    found = [fault("move-list", f"m{n}") for n in range(500)]
    lines = verdict_text([*found, fault("digest", "differs")]).splitlines()
    assert lines[0] == "The audit REFUSES this plan: 501 faults found."
    assert lines[1] == OTHER
    assert "  move-list: and 495 more" in lines
    assert "  digest: differs" in lines
    assert len(lines) < 12


def test_a_single_fault_is_told_with_its_rule() -> None:
    said = verdict_text([fault("hold", "M001 is released too early")])
    assert said.splitlines() == [
        "The audit REFUSES this plan: 1 fault found.",
        "  hold: M001 is released too early",
    ]
