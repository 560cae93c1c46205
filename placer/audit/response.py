"""Mean responses of volumes in their busiest hour, in whole µs; 0 is unknown."""

from collections.abc import Mapping
from fractions import Fraction
from functools import cached_property
from math import ceil

from placer.audit import limits, machines
from placer.audit.case import Case
from placer.audit.demand import busiest, busiest_load
from placer.estate import Load, Media, Pool, Volume
from placer.units import MILLI, PPM

MOST_BUSY = Fraction(95, 100)
"""No wait is computed above this share: the formula has a pole at 1."""


def response(load: Load, pool: Pool, write_answer: int, share: Fraction) -> int:
    """Return the mean response of a load on a pool whose drives are busy by a share.

    Source: Pollaczek-Khinchine with fixed service times; half a turn is 30 / rpm s.
    """
    asked = load.reads + load.writes
    if unmodelled(pool) or not asked:
        return 0
    read = _read(load, pool, min(share, MOST_BUSY)) if load.reads else Fraction(0)
    return ceil((load.reads * read + load.writes * write_answer) / asked)


def unmodelled(pool: Pool) -> bool:
    """Whether no response can be told on a pool."""
    if not pool.takes_volumes or pool.requests_at_most:
        return True
    if pool.media is Media.FLASH:
        return not pool.read_time
    return not pool.seek and not pool.rpm


def _read(load: Load, pool: Pool, share: Fraction) -> Fraction:
    size = Fraction(load.read_bytes * MILLI, load.reads)
    transfer = size * machines.per(PPM, pool.drive_rate)
    if pool.media is Media.FLASH:
        idle = pool.read_time + transfer
        holds = machines.per(PPM * MILLI, pool.reads_at_most) + transfer
    else:
        idle = holds = pool.seek + machines.half_turn(pool) + transfer
    return idle + share * holds / (2 * (1 - share))


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
        answer = self.case.arrays[pool.array].write_answer
        return response(busiest_load(volume), pool, answer, share)

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
