"""Waiting and response.

References
----------
.. [1] Pollaczek-Khinchine mean wait of M/G/1; R. Cooper, "Introduction to Queueing
   Theory", 1981, p. 189.
"""

from dataclasses import dataclass

from placer.estate import Array, Load, Media, Pool
from placer.physics import drives
from placer.units import MILLI, PPM

MOST_BUSY = 0.95


def wait(busy: float, service: float, variation: float = 0.0) -> float:
    """Return the mean wait before service: U S (1 + c^2) / (2 (1 - U)) [1]_.

    Parameters
    ----------
    busy
        [1] share of time the server is busy, taken as at most 0.95.
    service
        [any time] mean service time; the wait has its unit.
    variation
        [1] squared coefficient of variation of service times; with 0 (fixed times)
        the result is a lower bound.
    """
    share = min(busy, MOST_BUSY)
    return share * service * (1 + variation) / (2 * (1 - share))


def knows_response(pool: Pool) -> bool:
    """Return whether the pool's figures allow a response to be stated."""
    if not pool.takes_volumes or pool.requests_at_most:
        return False
    if pool.media is Media.FLASH:
        return pool.read_time > 0
    return pool.seek > 0 or pool.rpm > 0


@dataclass(frozen=True, slots=True)
class Reads:
    """What a volume's reads are like: mean size [B], shares random and hit [1]."""

    size: float
    random: float = 1.0
    hits: float = 0.0


def read_time(pool: Pool, reads: Reads, busy: float) -> float:
    """Return the mean time of one read at the drives [s]."""
    moved = drives.transfer(reads.size, pool)
    if pool.media is Media.FLASH:
        held = moved + (MILLI / pool.reads_at_most if pool.reads_at_most else 0.0)
        return pool.read_time / drives.MICRO + moved + wait(busy, held)
    whole = drives.positioning(pool) * _positionings(pool, reads) + moved
    return whole + wait(busy, whole)


def response(load: Load, reads: Reads, pool: Pool, array: Array, busy: float) -> float:
    """Return the mean response of a load [us], 0 where it is not known or none.

    Writes are answered from the array's protected cache; reads by its cache where they
    hit, else by the drives.
    """
    requests = load.reads + load.writes
    if not requests or not knows_response(pool):
        return 0.0
    factor = drives.MICRO * pool.measured_factor / PPM
    missed = read_time(pool, reads, busy) * factor
    read = reads.hits * array.read_hit_answer + (1 - reads.hits) * missed
    return (load.reads * read + load.writes * array.write_answer) / requests


def _positionings(pool: Pool, reads: Reads) -> float:
    """Return how often a mean read positions: streams once per prefetch unit."""
    unit = pool.prefetch_unit
    return reads.random + (1 - reads.random) * (reads.size / unit if unit else 0.0)
