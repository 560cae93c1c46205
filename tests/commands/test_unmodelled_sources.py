"""A pool of which nothing is known but its name may still give its volumes away."""

from smallestate import estate, load, pool, volume

from placer import audit, planner
from placer.candidates.table import candidates
from placer.estate import Media

OLD = pool("old/box", Media.UNMODELLED, 0)
NEW = pool("new/disks", Media.SPINNING, 500, drives=8, seek=8_500, rpm=7_200)


def test_a_source_without_usable_room_has_no_room_limit() -> None:
    """Its volumes may stay or leave, and the plan audits clean."""
    volumes = [volume("a", "old/box", 10, load(5)), volume("b", "old/box", 20, load(5))]
    whole = estate(volumes, [OLD, NEW])
    assert audit.judge(whole, planner.plan(candidates(whole), 5)) == ()
