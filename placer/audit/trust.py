"""Whether plan and inventory belong together, and the inventory is the owner's."""

from collections.abc import Iterator

from placer.audit import words
from placer.audit.case import Case
from placer.audit.demand import busiest_requests
from placer.estate import Control

FAR = 200
"""A total may be off by one part in ``FAR``: 0.5 %."""


def digest(case: Case) -> Iterator[str]:
    """Check that the plan was made from this inventory."""
    if case.plan.digest != case.estate.digest:
        made, given = case.plan.digest or "none", case.estate.digest
        yield f"the plan names the inventory digest {made}, this one has {given}"


def control(case: Case) -> Iterator[str]:
    """Check that the totals typed by the owner agree with the inventory."""
    for typed in case.estate.controls:
        yield from _compared(case, typed)


def _compared(case: Case, typed: Control) -> Iterator[str]:
    there = [
        volume
        for volume in case.estate.volumes
        if not typed.array or volume.array == typed.array
    ]
    whose = typed.array or "the estate"
    if typed.volumes is not None and typed.volumes != len(there):
        yield f"{whose} has {len(there)} volumes, the owner counts {typed.volumes}"
    provisioned = sum(volume.provisioned for volume in there)
    if typed.provisioned is not None and _far(provisioned, typed.provisioned):
        has, says = words.gib(provisioned), words.gib(typed.provisioned)
        yield f"{whose} has {has} provisioned, the owner says {says}"
    asked = sum(busiest_requests(volume) for volume in there)
    if typed.requests is not None and _far(asked, typed.requests):
        has, says = words.requests(asked), words.requests(typed.requests)
        yield f"{whose} is asked {has}, the owner says {says}"


def _far(found: int, typed: int) -> bool:
    return abs(found - typed) * FAR > typed
