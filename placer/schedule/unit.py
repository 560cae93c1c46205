"""What cuts over together, with all that the nights must find for it."""

from collections import defaultdict
from collections.abc import Sequence
from dataclasses import dataclass

from placer.candidates.table import Candidates
from placer.plan import Transfer
from placer.schedule.lanes import Copy, Lanes
from placer.schedule.levels import Change, Levels


@dataclass(frozen=True, slots=True)
class Part:
    """One transfer of a unit.

    Attributes
    ----------
    arrays
        Names of the arrays at both ends.
    copy
        What the copy uses.
    taken, given
        Room in the new pool from the start of the copy; in the old one till released.
    hold_days
        How long the source is held.
    """

    transfer: Transfer
    arrays: tuple[str, str]
    copy: Copy
    taken: Change
    given: Change
    hold_days: int


@dataclass(frozen=True, slots=True)
class Unit:
    """Transfers that cut over together, the longest copy first, and their load."""

    parts: tuple[Part, ...]
    load: Change

    @property
    def group(self) -> int:
        """Number of the group."""
        return self.parts[0].transfer.group

    @property
    def arrays(self) -> tuple[str, ...]:
        """Arrays that any of its copies touches."""
        return tuple(sorted({name for part in self.parts for name in part.arrays}))


def units(
    candidates: Candidates, transfers: Sequence[Transfer], levels: Levels, lanes: Lanes
) -> list[Unit]:
    """Return the units in the order of their first transfers."""
    rows = {volume.id: row for row, volume in enumerate(candidates.volumes)}
    columns = {pool.id: column for column, pool in enumerate(candidates.pools)}
    members: dict[int, list[Transfer]] = defaultdict(list)
    for transfer in transfers:
        members[transfer.group].append(transfer)

    def part(transfer: Transfer) -> Part:
        row = rows[transfer.volume]
        source, target = columns[transfer.source], columns[transfer.target]
        ends = (candidates.pools[source].array, candidates.pools[target].array)
        return Part(
            transfer,
            ends,
            lanes.copy(*ends),
            levels.room(row, target),
            levels.room(row, source),
            candidates.volumes[row].days_held,
        )

    def unit(group: list[Transfer]) -> Unit:
        longest = sorted(group, key=lambda t: -t.size)
        ways = [(rows[t.volume], columns[t.source], columns[t.target]) for t in group]
        return Unit(tuple(map(part, longest)), levels.cutover(ways))

    return [unit(group) for group in members.values()]
