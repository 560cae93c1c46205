"""Room that groups take and give, without time: one figure per limit and owner."""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np

from placer.candidates.block import Block, Floats, Ints
from placer.candidates.table import Candidates

ROOM = ("pool-room", "pool-thin", "array-volumes")


@dataclass(frozen=True, slots=True)
class Room:
    """Room of all owners of a limit on room, side by side.

    Attributes
    ----------
    free
        (owners,) what is free today; below 0 where a limit is overrun.
    takes, gives
        (groups, owners) what each group takes where it goes and gives where it sits.
    """

    free: Floats
    takes: Floats
    gives: Floats


def room(candidates: Candidates, places: Ints, groups: Sequence[Sequence[int]]) -> Room:
    """Return the room of groups of rows that go to their places."""
    blocks = [b for b in candidates.limits_in_nights if b.code in ROOM]
    home = candidates.home

    def used(block: Block, rows: Iterable[int], columns: Ints) -> Floats:
        total = np.zeros(len(block.owners))
        for row in rows:
            owner = int(block.owner_of[columns[row]])
            if owner >= 0:
                total[owner] += block.column(row, int(columns[row]))[0]
        return total

    def table(columns: Ints) -> Floats:
        rows = [[used(block, g, columns) for block in blocks] for g in groups]
        return np.array([np.concatenate([np.zeros(0), *row]) for row in rows])

    free = [block.limits[:, 0] - block.use(home)[:, 0] for block in blocks]
    return Room(np.concatenate([np.zeros(0), *free]), table(places), table(home))
