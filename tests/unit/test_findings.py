"""Findings: their address and their order."""

from hypothesis import given
from hypothesis import strategies as st

from placer.findings import Finding, Place, Severity, errors, in_order

FINDINGS = st.lists(
    st.builds(
        Finding,
        code=st.sampled_from(["a", "b", "c"]),
        severity=st.sampled_from(Severity),
        place=st.just(Place()),
        sentence=st.text(max_size=3),
    )
)


def test_address_is_sheet_and_cell_as_far_as_known() -> None:
    assert str(Place("volumes", "D7")) == "volumes!D7"
    assert str(Place("volumes")) == "volumes"
    assert str(Place()) == ""


@given(FINDINGS)
def test_order_is_errors_warnings_notes(findings: list[Finding]) -> None:
    ranks = [list(Severity).index(finding.severity) for finding in in_order(findings)]
    assert ranks == sorted(ranks)


@given(FINDINGS)
def test_order_keeps_findings_of_one_severity_as_they_were_made(
    findings: list[Finding],
) -> None:
    for severity in Severity:
        before = [finding for finding in findings if finding.severity is severity]
        after = [f for f in in_order(findings) if f.severity is severity]
        assert before == after


@given(FINDINGS)
def test_errors_are_only_those_that_stop_planning(findings: list[Finding]) -> None:
    stopping = errors(findings)
    assert {finding.severity for finding in stopping} <= {Severity.ERROR}
    others = [f for f in findings if f.severity is not Severity.ERROR]
    assert len(stopping) + len(others) == len(findings)
