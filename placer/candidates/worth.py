"""What a place is worth to a volume: its response there, steps missed, relief, effort.

Responses are whole microseconds, rounded up, 0 where unknown.
"""

from math import ceil

import numpy as np

from placer.candidates.block import Block, Floats, Ints
from placer.candidates.limits import Date, pool_busy
from placer.estate import Estate, Policy, Pool, Volume
from placer.physics import drives, queueing
from placer.physics.demand import busiest_hour
from placer.units import GIB, MILLI, MS, PPM

STEPS_AT_MOST = 10
STEP = 10


def whole_microseconds(time: float) -> int:
    """Round a time up, forgiving what binary fractions add to a whole number."""
    return ceil(round(time, 6))


class Responses:
    """Responses of an estate's volumes in its pools, with the loads of today."""

    def __init__(self, estate: Estate) -> None:
        self._estate = estate
        self._arrays = {array.name: array for array in estate.arrays}
        self._date = Date(estate, 0)
        self._busy: Block = pool_busy(self._date)
        self._peak = [busiest_hour(volume) for volume in estate.volumes]
        no_steps = np.zeros(len(estate.pools), dtype=np.int64)
        self.today = self._today(self.shares(self._date.home, no_steps))

    def at(self, volume: int, pool: int, busy: float) -> int:
        """Return the mean response in the busiest hour at a busy share of the pool."""
        record = self._estate.pools[pool]
        load = self._estate.volumes[volume].load[self._peak[volume]]
        array = self._arrays[record.array]
        return whole_microseconds(queueing.response(load, record, array, busy))

    def shares(self, places: Ints, steps: Ints) -> Floats:
        """Return the busy share of every pool and hour, (pools, hours)."""
        used = self._busy.use(places)
        shares = np.zeros((len(self._estate.pools), max(used.shape[1], 1)))
        for i, pool in enumerate(self._estate.pools):
            owner = self._busy.owner_of[i]
            count = drives.busy_drives(pool, int(steps[i]))
            if owner >= 0 and count:
                shares[i] = used[owner] / count
        return shares

    def planned(self, places: Ints, steps: Ints) -> list[int]:
        """Return the response of each volume in a placement, as reported."""
        shares = self.shares(places, steps)
        return [
            self._planned_one(v, int(p), shares[p, self._peak[v]])
            for v, p in enumerate(places)
        ]

    def _planned_one(self, volume: int, pool: int, busy: float) -> int:
        measured = self._estate.volumes[volume].response_measured
        if measured and pool == self._date.home[volume]:
            return measured
        return self.at(volume, pool, busy)

    def _today(self, shares: Floats) -> list[int]:
        return [
            self._planned_one(v, int(p), shares[p, self._peak[v]])
            for v, p in enumerate(self._date.home)
        ]


def promised(responses: Responses, volume: int, pool: int, record: Pool) -> int:
    """Return the response a move promises: with the new pool at its busy ceiling."""
    return responses.at(volume, pool, record.busy_ceiling / PPM)


def steps_missed(volume: Volume, response: int, policy: Policy) -> int:
    """Return by how many steps of 10 % a response misses its limit, at most 10."""
    limit = volume.response_limit
    allowed = limit * (PPM + policy.tolerance)
    if not limit or response * PPM <= allowed:
        return 0
    over = (response * PPM - allowed) * STEP
    return min(STEPS_AT_MOST, -(-over // (limit * PPM)))


def relief(volume: Volume, today: int, then: int, policy: Policy) -> float:
    """Return weighted waiting saved per second [ms/s]; a loss is negative.

    A gain below the least gain counts nothing, so nobody moves for microseconds.
    """
    gain = today - then
    if not today or not then or 0 <= gain * PPM < policy.least_gain * today:
        return 0.0
    load = volume.load[busiest_hour(volume)]
    requests = (load.reads + load.writes) / MILLI
    return volume.importance.weight * requests * gain / MS


def effort(copied: float, policy: Policy) -> float:
    """Return what moving one volume costs [GiB]: its bytes and its cutover."""
    return (copied + policy.cutover_counts_as) / GIB
