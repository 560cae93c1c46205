"""What a place is worth to a volume: its response there, steps missed, relief, effort.

Responses are whole microseconds, rounded up, 0 where unknown.
"""

from dataclasses import replace
from math import ceil

import numpy as np

from placer.candidates.block import Floats, Ints
from placer.candidates.limits import Date, pool_busy
from placer.candidates.mixes import Mixes
from placer.estate import Estate, Policy, Volume
from placer.physics import drives, queueing
from placer.physics.demand import busiest_hour
from placer.physics.queueing import Queue
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
        busy = pool_busy(self._date)
        self._busy = replace(busy, swollen=np.ones_like(busy.swollen))
        self._peak = [busiest_hour(volume) for volume in estate.volumes]
        every = range(len(estate.volumes))
        self.requests = self._date.loads[every, self._peak, :2].sum(axis=1)
        no_steps = np.zeros(len(estate.pools), dtype=np.int64)
        self._mixes = Mixes(self._date)
        self.modelled_today = self._in(self._date.home, no_steps)
        self.today = [
            volume.response_measured or modelled
            for volume, modelled in zip(
                estate.volumes, self.modelled_today, strict=True
            )
        ]

    def promised(self, volume: int) -> list[int]:
        """Return the response in every pool at its busy ceiling.

        The mix in the pool is today's and the volume.
        """
        residuals = self._mixes.joined(volume, self._peak[volume])
        return [
            self._at(volume, i, Queue(pool.busy_ceiling / PPM, float(residuals[i])))
            for i, pool in enumerate(self._estate.pools)
        ]

    def _at(self, volume: int, pool: int, queue: Queue) -> int:
        """Return the mean response in the busiest hour behind a queue of the pool."""
        record = self._estate.pools[pool]
        asked = self._estate.volumes[volume]
        load = asked.load[self._peak[volume]]
        reads = queueing.Reads(
            size=load.read_bytes * MILLI / load.reads if load.reads else 0.0,
            random=asked.random_reads / PPM,
            hits=float(self._date.hits[volume, pool]),
        )
        array = self._arrays[record.array]
        return whole_microseconds(queueing.response(load, reads, record, array, queue))

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
        stays = places == self._date.home
        modelled = self._in(places, steps)
        return [
            volume.response_measured if stays[v] and volume.response_measured else then
            for v, (volume, then) in enumerate(
                zip(self._estate.volumes, modelled, strict=True)
            )
        ]

    def _in(self, places: Ints, steps: Ints) -> list[int]:
        """Return the modelled response of each volume in a placement."""
        shares, residuals = self.shares(places, steps), self._mixes.residuals(places)
        return [
            self._at(v, int(p), Queue(float(shares[p, h]), float(residuals[p, h])))
            for v, (p, h) in enumerate(zip(places, self._peak, strict=True))
        ]


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
