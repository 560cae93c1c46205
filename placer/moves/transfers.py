"""Transfers: one per volume that changes its pool, whole groups in order."""

from collections.abc import Sequence

from placer.candidates.block import Ints
from placer.candidates.groups import groups
from placer.candidates.table import Candidates
from placer.moves.order import in_order
from placer.moves.room import room
from placer.plan import Reason, Transfer

FORCED = (Reason.CURE, Reason.LIMIT)

Rows = tuple[int, ...]


def transfers(
    candidates: Candidates, places: Ints, reasons: Sequence[Reason]
) -> tuple[Transfer, ...]:
    """Return the transfers that lead from today's places to others.

    Forced groups come first, then those that gain most per byte; a group that gives
    room comes before those that wait for it.

    Parameters
    ----------
    candidates
        The table of the estate.
    places
        (volumes,) column of the pool where each volume shall be.
    reasons
        (volumes,) why each volume moves.
    """
    rows = [row for row in range(len(places)) if places[row] != candidates.home[row]]

    def rank(group: Rows) -> tuple[bool, float]:
        forced = any(reasons[row] in FORCED for row in group)
        gained = sum(_worth(candidates, row, int(places[row])) for row in group)
        copied = sum(candidates.copied[row] for row in group)
        return not forced, -gained / max(1.0, float(copied))

    ranked = sorted(groups(candidates.volumes, rows), key=rank)
    ordered = [ranked[n] for n in in_order(room(candidates, places, ranked))]
    numbered = [(row, n) for n, group in enumerate(ordered, 1) for row in group]
    return tuple(
        Transfer(
            id=f"M{number:03}",
            volume=candidates.volumes[row].id,
            source=candidates.pools[candidates.home[row]].id,
            target=candidates.pools[places[row]].id,
            size=int(candidates.copied[row]),
            reason=reasons[row],
            group=group,
            worth=_worth(candidates, row, int(places[row])),
        )
        for number, (row, group) in enumerate(numbered, 1)
    )


def _worth(candidates: Candidates, row: int, pool: int) -> float:
    """Return what a move gains while it is done [ms/s, weighted], 0 for a loss."""
    return max(0.0, float(candidates.relief[row, pool]))
