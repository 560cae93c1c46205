"""What the audit said, in words."""

from collections.abc import Sequence

from placer.findings import Finding
from placer.words import count

CLEAN = "The audit re-read the file and replayed it: every limit and every claim holds."


def verdict_text(found: Sequence[Finding]) -> str:
    """Return the verdict: one sentence if clean, else every rule that is broken."""
    if not found:
        return CLEAN
    head = f"The audit REFUSES this plan: {count(len(found), 'rule')} broken."
    return "\n".join([head, *(f"  {each.code}: {each.sentence}" for each in found)])
