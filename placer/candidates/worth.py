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
from placer.units import GIB, MILLI, PPM

STEPS_AT_MOST = 10
STEP = 10


def whole_microseconds(time: float) -> int:
    """Round a time up, forgiving what binary fractions add to a whole number."""
    return ceil(round(time, 6))


class Responses:
    """Responses of an estate's volumes in its pools, with the loads of today.

    Attributes
    ----------
    today, modelled_today
        Response of each volume where it is [us]: measured where it was, and modelled.
    requests
        (volumes,) requests of the busiest hour, within the caps [1/s].
    """

    def __init__(self, estate: Estate) -> None:
        self._estate = estate
        self._arrays = {array.name: array for array in estate.arrays}
        self._date = Date(estate, 0)
        self._busy: Block = pool_busy(self._date)
        self._peak = [busiest_hour(volume) for volume in estate.volumes]
        every = range(len(estate.volumes))
        self.requests = self._date.loads[every, self._peak, :2].sum(axis=1)
        no_steps = np.zeros(len(estate.pools), dtype=np.int64)
        shares = self.shares(self._date.home, no_steps)
        self.modelled_today = [
            self.at(v, int(p), shares[p, self._peak[v]])
            for v, p in enumerate(self._date.home)
        ]
        self.today = [
            volume.response_measured or modelled
            for volume, modelled in zip(
                estate.volumes, self.modelled_today, strict=True
            )
        ]

    def at(self, volume: int, pool: int, busy: float) -> int:
        """Return the mean response in the busiest hour at a busy share of the pool."""
        record = self._estate.pools[pool]
        asked = self._estate.volumes[volume]
        load = asked.load[self._peak[volume]]
        reads = queueing.Reads(
            size=load.read_bytes * MILLI / load.reads if load.reads else 0.0,
            random=asked.random_reads / PPM,
            hits=float(self._date.hits[volume, pool]),
        )
        array = self._arrays[record.array]
        return whole_microseconds(queueing.response(load, reads, record, array, busy))

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


def gain(today: int, then: int, policy: Policy) -> int:
    """Return the waiting a request is saved [us] as far as it counts.

    A gain below the least gain counts nothing, so nobody moves for microseconds; a loss
    counts whole; where either response is unknown there is neither.
    """
    saved = today - then
    if not today or not then or 0 <= saved * PPM < policy.least_gain * today:
        return 0
    return saved


def effort(copied: float, policy: Policy) -> float:
    """Return what moving one volume costs [GiB]: its bytes and its cutover."""
    return (copied + policy.cutover_counts_as) / GIB
