"""Mean responses of volumes in their busiest hour, in whole µs; 0 is unknown."""

from collections.abc import Mapping
from fractions import Fraction
from functools import cached_property
from math import ceil

from placer.audit import limits, machines
from placer.audit.case import Case
from placer.audit.demand import busiest, busiest_load
from placer.estate import Array, Media, Pool, Volume
from placer.units import MILLI, PPM

MOST_BUSY = Fraction(95, 100)
"""No wait is computed above this share: the formula has a pole at 1."""


def response(
    volume: Volume, pool: Pool, array: Array, hits: Fraction, share: Fraction
) -> int:
    """Return the mean response of a volume on a pool whose drives are busy by a share.

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
    share
        [1] busy share of the drives.

    References
    ----------
    Pollaczek-Khinchine with fixed service times; half a turn is 30 / rpm s.
    """
    load = busiest_load(volume)
    asked = load.reads + load.writes
    if unmodelled(pool) or not asked:
        return 0
    read = Fraction(0)
    if load.reads:
        at_drives = _at_drives(volume, pool, min(share, MOST_BUSY))
        read = hits * array.read_hit_answer + (1 - hits) * at_drives
    return ceil((load.reads * read + load.writes * array.write_answer) / asked)


def unmodelled(pool: Pool) -> bool:
    """Whether no response can be told on a pool."""
    if not pool.takes_volumes or pool.requests_at_most:
        return True
    if pool.media is Media.FLASH:
        return not pool.read_time
    return not pool.seek and not pool.rpm


def _at_drives(volume: Volume, pool: Pool, share: Fraction) -> Fraction:
    load = busiest_load(volume)
    size = Fraction(load.read_bytes * MILLI, load.reads)
    transfer = size * machines.per(PPM, pool.drive_rate)
    if pool.media is Media.FLASH:
        idle = pool.read_time + transfer
        holds = machines.per(PPM * MILLI, pool.reads_at_most) + transfer
    else:
        idle = holds = (
            _times(volume, pool, size) * machines.positioning(pool) + transfer
        )
    waited = share * holds / (2 * (1 - share))
    return (idle + waited) * pool.measured_factor / PPM


def _times(volume: Volume, pool: Pool, size: Fraction) -> Fraction:
    """Return how often one read of a size [B] positions, in the mean."""
    random = Fraction(volume.random_reads, PPM)
    return random + (1 - random) * size * machines.positions(pool)


class Answers:
    """Responses of the volumes of one case, today, promised and planned."""

    def __init__(self, case: Case) -> None:
        self.case = case

    @cached_property
    def _busy_today(self) -> dict[str, tuple[Fraction, ...]]:
        return self._busy(self.case.homes, {})

    @cached_property
    def _busy_planned(self) -> dict[str, tuple[Fraction, ...]]:
        return self._busy(self.case.targets, self.case.steps)

    def _busy(
        self, where: Mapping[str, str], steps: Mapping[str, int]
    ) -> dict[str, tuple[Fraction, ...]]:
        scene = limits.Scene(self.case, self.case.today, where, steps)
        rows = limits.readings(scene, "pool-busy")
        return {row.where: tuple(part / 100 for part in row.shares) for row in rows}

    def _at(self, volume: Volume, pool: Pool, share: Fraction) -> int:
        array = self.case.arrays[pool.array]
        hits = self.case.caches.hits(volume, array.name)
        return response(volume, pool, array, hits, share)

    def _in(
        self, volume: Volume, pool: str, busy: Mapping[str, tuple[Fraction, ...]]
    ) -> int:
        share = busy[pool][busiest(volume)] if pool in busy else Fraction(0)
        return self._at(volume, self.case.pools[pool], share)

    def today(self, volume: Volume) -> int:
        """Return the response measured, or the modelled one at home today."""
        return volume.response_measured or self._in(
            volume, volume.home, self._busy_today
        )

    def promised(self, volume: Volume, pool: str) -> int:
        """Return the response at the busy ceiling of a pool; at home that of today."""
        if pool == volume.home:
            return self.today(volume)
        target = self.case.pools[pool]
        return self._at(volume, target, Fraction(target.busy_ceiling, PPM))

    def planned(self, volume: Volume) -> int:
        """Return the response at the planned busy share, with the loads of today."""
        target = self.case.targets[volume.id]
        if target == volume.home and volume.response_measured:
            return volume.response_measured
        return self._in(volume, target, self._busy_planned)
