"""Judges a plan by arithmetic of its own and by replay of its nights.

Nothing here knows how plans are found: the rules are written from the register in
DEVELOPERS.md alone, and only records, quantities and the standard library are used.
"""

from placer.audit.case import Case
from placer.audit.goals import goal_values
from placer.audit.rules import CODES, NIGHTS, PLACEMENT, TRUST, Rule
from placer.estate import Estate
from placer.findings import Finding, Place, Severity
from placer.plan import Plan, Status

__all__ = ["CODES", "goal_values", "judge", "judge_placement"]


def judge(estate: Estate, plan: Plan) -> tuple[Finding, ...]:
    """Return every rule of the register that a plan breaks.

    A plan that is none (status "no plan", nothing placed) is held to the rules of
    trust alone.
    """
    none = plan.status is Status.NO_PLAN and not plan.placements
    return _judged(Case(estate, plan), TRUST if none else PLACEMENT + NIGHTS + TRUST)


def judge_placement(estate: Estate, plan: Plan) -> tuple[Finding, ...]:
    """Return the rules of the planned placement that a plan breaks."""
    return _judged(Case(estate, plan), PLACEMENT)


def _judged(case: Case, rules: tuple[tuple[str, Rule], ...]) -> tuple[Finding, ...]:
    return tuple(
        Finding(code, Severity.ERROR, Place(), sentence)
        for code, rule in rules
        for sentence in rule(case)
    )
