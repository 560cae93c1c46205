"""Mean responses of volumes in their busiest hour, in whole µs; 0 is unknown.

The wait is that behind all requests at the drives, whoever's they are.
"""

from collections.abc import Mapping
from fractions import Fraction
from functools import cached_property, lru_cache
from math import ceil

from placer.audit import limits, machines
from placer.audit.case import Case
from placer.audit.demand import busiest, busiest_load
from placer.audit.mix import Mix, Moments, at_drives, of_hosts, residual, together
from placer.estate import Array, Media, Pool, Volume
from placer.units import MILLI, PPM

MOST_BUSY = Fraction(95, 100)
"""No wait is computed above this share: the formula has a pole at 1."""


def wait(share: Fraction, left: Fraction) -> Fraction:
    """Return how long a request waits for its drive [µs].

    Parameters
    ----------
    share
        [1] busy share of the drive.
    left
        [µs] mean of what is left of the request in service.

    References
    ----------
    Pollaczek-Khinchine: R. Cooper, Introduction to Queueing Theory, 2nd edition 1981,
    p. 189.
    """
    busy = min(share, MOST_BUSY)
    return busy / (1 - busy) * left


def response(
    volume: Volume, pool: Pool, array: Array, hits: Fraction, waited: Fraction
) -> int:
    """Return the mean response of a volume on a pool where reads wait so long [µs].

    The load counts as measured: the factor of a tenant is that of all its parts, so
    neither the size of a read nor the mix of reads and writes depends on it.

    Parameters
    ----------
    volume
        The volume, asked what it is asked in its busiest hour.
    pool, array
        Where it is served.
    hits
        [1] share of its reads that the cache there answers.
    waited
        [µs] how long a read waits for its drive.
    """
    load = busiest_load(volume)
    asked = load.reads + load.writes
    if unmodelled(pool) or not asked:
        return 0
    read = Fraction(0)
    if load.reads:
        at_drives = _at_drives(volume, pool, waited)
        read = hits * array.read_hit_answer + (1 - hits) * at_drives
    return ceil((load.reads * read + load.writes * array.write_answer) / asked)


def unmodelled(pool: Pool) -> bool:
    """Whether no response can be told on a pool."""
    if not pool.takes_volumes or pool.requests_at_most:
        return True
    if pool.media is Media.FLASH:
        return not pool.read_time
    return not pool.seek and not pool.rpm


def _at_drives(volume: Volume, pool: Pool, waited: Fraction) -> Fraction:
    load = busiest_load(volume)
    size = Fraction(load.read_bytes * MILLI, load.reads)
    once: Fraction | int = pool.read_time
    if pool.media is not Media.FLASH:
        once = _times(volume, pool, size) * machines.positioning(pool)
    idle = once + size * machines.per(PPM, pool.drive_rate)
    return (idle + waited) * pool.measured_factor / PPM


def _times(volume: Volume, pool: Pool, size: Fraction) -> Fraction:
    """Return how often one read of a size [B] positions, in the mean."""
    random = Fraction(volume.random_reads, PPM)
    return random + (1 - random) * size * machines.positions(pool)


class Asked:
    """What each volume asks of drives, with the loads of today."""

    def __init__(self, case: Case) -> None:
        self._case = case
        self._hosts: dict[tuple[str, int], tuple[Moments, ...]] = {}

    def of(self, volume: Volume, pool: str, hour: int) -> Mix:
        """Return the requests of a volume to the drives of a pool, were it there."""
        caches, array = self._case.caches, self._case.pools[pool].array
        missed = Fraction(caches.misses(volume, array), caches.whole)
        return at_drives(volume, self._of_hosts(volume, hour), missed)

    def _of_hosts(self, volume: Volume, hour: int) -> tuple[Moments, ...]:
        if (volume.id, hour) not in self._hosts:
            counted = self._case.today.loads[volume.id][4 * hour : 4 * hour + 2]
            asked = of_hosts(volume, volume.load[hour], counted)
            self._hosts[volume.id, hour] = asked
        return self._hosts[volume.id, hour]


class Drives:
    """What the drives of pools do under one placement, with the loads of today."""

    def __init__(
        self,
        asked: Asked,
        case: Case,
        where: Mapping[str, str],
        steps: Mapping[str, int],
    ) -> None:
        scene = limits.Scene(case, case.today, where, steps, latent=False)
        rows = limits.readings(scene, "pool-busy")
        self._asked = asked
        self._standing = case.members(where)
        self._busy = {row.where: row.shares for row in rows}
        self._mixes: dict[tuple[str, int], Mix] = {}

    def busy(self, pool: str, hour: int) -> Fraction:
        """Return the busy share in an hour; 0 where none is told."""
        return self._busy[pool][hour] / 100 if pool in self._busy else Fraction(0)

    def mix(self, pool: str, hour: int) -> Mix:
        """Return all requests to the drives of a pool in an hour."""
        if (pool, hour) not in self._mixes:
            there = (self._asked.of(each, pool, hour) for each in self._standing[pool])
            self._mixes[pool, hour] = together(there)
        return self._mixes[pool, hour]


class Answers:
    """Responses of the volumes of one case, today, promised and planned."""

    def __init__(self, case: Case) -> None:
        self.case = case
        self._asked = Asked(case)

    @cached_property
    def _now(self) -> Drives:
        return Drives(self._asked, self.case, self.case.homes, {})

    @cached_property
    def _then(self) -> Drives:
        case = self.case
        return Drives(self._asked, case, case.targets, case.steps)

    def _at(self, volume: Volume, pool: Pool, share: Fraction, mix: Mix) -> int:
        if unmodelled(pool):
            return 0
        array = self.case.arrays[pool.array]
        hits = self.case.caches.hits(volume, array.name)
        waited = wait(share, residual(pool, mix))
        return response(volume, pool, array, hits, waited)

    def _served(self, volume: Volume, pool: str, drives: Drives) -> int:
        hour = busiest(volume)
        share, mix = drives.busy(pool, hour), drives.mix(pool, hour)
        return self._at(volume, self.case.pools[pool], share, mix)

    def today(self, volume: Volume) -> int:
        """Return the response measured, or the modelled one at home today."""
        return volume.response_measured or self._served(volume, volume.home, self._now)

    def promised(self, volume: Volume, pool: str) -> int:
        """Return the response at the busy ceiling of a pool; at home that of today.

        The volume waits there behind what is served there today and its own requests.
        """
        if pool == volume.home:
            return self.today(volume)
        target, hour = self.case.pools[pool], busiest(volume)
        there, own = self._now.mix(pool, hour), self._asked.of(volume, pool, hour)
        share = Fraction(target.busy_ceiling, PPM)
        return self._at(volume, target, share, together((there, own)))

    def planned(self, volume: Volume) -> int:
        """Return the response at the planned busy share, with the loads of today."""
        target = self.case.targets[volume.id]
        if target == volume.home and volume.response_measured:
            return volume.response_measured
        return self._served(volume, target, self._then)


@lru_cache(maxsize=1)
def answers_of(case: Case) -> Answers:
    """Return the responses of a case, the same for all rules that ask in turn."""
    return Answers(case)
