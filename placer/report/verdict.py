"""What the audit said, in words."""

from collections import Counter
from collections.abc import Iterator, Sequence

from placer.findings import Finding
from placer.plan import Status
from placer.words import count

CLEAN = "The audit re-read the file and replayed it: every limit and every claim holds."
NO_PLAN = "The audit re-read the file: what it says of the inventory holds."
OTHER = "The inventory is not the one of this plan, or was changed since: plan again."
_DIGEST = "digest"
_EACH = 5


def verdict_text(found: Sequence[Finding], status: Status = Status.PROVEN) -> str:
    """Return the verdict: one sentence if clean, else the rules that are broken.

    Each rule is told with its first breaches; another inventory is told before all,
    for the other breaches follow from it.
    """
    if not found:
        return NO_PLAN if status is Status.NO_PLAN else CLEAN
    counts = Counter(each.code for each in found)
    head = f"The audit REFUSES this plan: {count(counts.total(), 'fault')} found."
    other = [OTHER] if _DIGEST in counts else []
    return "\n".join([head, *other, *_by_rule(found, counts)])


def _by_rule(found: Sequence[Finding], counts: Counter[str]) -> Iterator[str]:
    for code, number in counts.items():
        said = [each.sentence for each in found if each.code == code]
        yield from (f"  {code}: {sentence}" for sentence in said[:_EACH])
        if number > _EACH:
            yield f"  {code}: and {number - _EACH} more"
