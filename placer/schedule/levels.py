"""All limits that hold through the nights: room in both places, load where it is."""

from collections.abc import Iterable, Sequence

import numpy as np

from placer.candidates.block import Block, Floats, Ints
from placer.candidates.table import Candidates
from placer.schedule.level import ALWAYS, Level
from placer.units import MINUTES_PER_DAY

ROOM = ("pool-room", "pool-thin", "array-volumes")
LOAD = ("pool-busy", "controller-busy")

Change = Sequence[tuple[Level, Floats]]
"""By how much a step changes each limit it touches."""

Held = tuple[Block, Sequence[Level]]
"""The limits of one rule with the level of each of their owners."""

Way = tuple[int, int, int]
"""A volume's row, the column of its pool today and of its pool to be."""


class Levels:
    """Levels of an estate at the sizes and loads of the nights.

    The first-day rule is in the limits: until the date of the cure each is at least
    what today's placement would use.
    """

    def __init__(self, candidates: Candidates, bought: Ints) -> None:
        held = {
            block.code: (block, _levels(candidates, bought, block))
            for block in candidates.limits_in_nights
        }
        self._room = [held[code] for code in ROOM if code in held]
        self._load = [held[code] for code in LOAD if code in held]

    @property
    def every(self) -> list[Level]:
        """All levels, rule by rule."""
        return [level for _, levels in (*self._room, *self._load) for level in levels]

    def room(self, volume: int, pool: int) -> Change:
        """Return the room one volume takes in a pool while it is there."""
        return _uses(self._room, volume, pool)

    def cutover(self, ways: Iterable[Way]) -> Change:
        """Return what changes once volumes are served in their new pools."""
        found: list[tuple[Level, Floats]] = []
        for volume, source, target in ways:
            left = _uses(self._load, volume, source)
            found += [(level, -part) for level, part in left]
            found += _uses(self._load, volume, target)
        return merged(found)


def merged(change: Change) -> Change:
    """Return one part per level: the sum of its parts."""
    total: dict[Level, Floats] = {}
    for level, part in change:
        total[level] = total[level] + part if level in total else part
    return list(total.items())


def earliest(change: Change) -> int | None:
    """Return from when on all of a change fits for good [min], None if never."""
    found = [level.earliest(part) for level, part in change]
    if any(minute is None for minute in found):
        return None
    return max((minute for minute in found if minute is not None), default=ALWAYS)


def _uses(held: Iterable[Held], volume: int, pool: int) -> list[tuple[Level, Floats]]:
    """Return whose limits a volume uses in a pool, and how much of each."""
    owners = [(block, levels, int(block.owner_of[pool])) for block, levels in held]
    return [
        (levels[owner], block.column(volume, pool))
        for block, levels, owner in owners
        if owner >= 0
    ]


def _levels(candidates: Candidates, bought: Ints, block: Block) -> tuple[Level, ...]:
    use = block.use(candidates.home)
    return tuple(
        Level(block, name, use[i], _bounds(candidates, bought, block, i, use[i]))
        for i, name in enumerate(block.owners)
    )


def _bounds(
    candidates: Candidates, bought: Ints, block: Block, owner: int, today: Floats
) -> list[tuple[int, Floats]]:
    """Return from when on which limit holds: delivery raises it, the cure ends it."""
    cure = candidates.estate.policy.cured_by
    delivered, steps = _delivery(candidates, bought, block.owners[owner])
    limits = block.limits[owner]

    def at(minute: int) -> tuple[int, Floats]:
        limit = np.full_like(today, limits[steps if minute >= delivered else 0])
        allowed = not cure or minute < cure
        return minute, np.maximum(limit, today) if allowed else limit

    marks = {ALWAYS, delivered, cure} - {0}
    return [at(minute) for minute in sorted(marks)]


def _delivery(candidates: Candidates, bought: Ints, owner: str) -> tuple[int, int]:
    """Return when a pool's expansion is there, days of 24 hours on, and its steps."""
    policy = candidates.estate.policy
    for pool, steps in zip(candidates.pools, bought, strict=True):
        if pool.id == owner and pool.expansion and steps:
            days = pool.expansion.delivery_days
            return policy.start + days * MINUTES_PER_DAY, int(steps)
    return ALWAYS, 0
