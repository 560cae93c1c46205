"""Waiting and response.

References
----------
.. [1] Pollaczek-Khinchine mean wait of M/G/1; R. Cooper, "Introduction to Queueing
   Theory", 1981, p. 189.
"""

from dataclasses import dataclass

from placer.estate import Array, Load, Media, Pool
from placer.physics import drives
from placer.units import PPM

MOST_BUSY = 0.95


def wait(busy: float, residual: float) -> float:
    """Return the mean wait before service: U / (1 - U) x residual [1]_.

    Parameters
    ----------
    busy
        [1] share of time the server is busy, taken as at most 0.95.
    residual
        [any time] mean rest of the request in service, E[s^2] / (2 E[s]); the wait has
        its unit.
    """
    share = min(busy, MOST_BUSY)
    return share / (1 - share) * residual


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


@dataclass(frozen=True, slots=True)
class Queue:
    """What a request meets at a drive: busy share, rest of the one in service [s]."""

    busy: float
    residual: float


def read_time(pool: Pool, reads: Reads, queue: Queue) -> float:
    """Return the mean time of one read at the drives [s]."""
    moved = drives.transfer(reads.size, pool) + wait(queue.busy, queue.residual)
    if pool.media is Media.FLASH:
        return pool.read_time / drives.MICRO + moved
    return drives.positioning(pool) * _positionings(pool, reads) + moved


def response(load: Load, reads: Reads, pool: Pool, array: Array, queue: Queue) -> float:
    """Return the mean response of a load [us], 0 where it is not known or none.

    Writes are answered from the array's protected cache; reads by its cache where they
    hit, else by the drives.
    """
    requests = load.reads + load.writes
    if not requests or not knows_response(pool):
        return 0.0
    factor = drives.MICRO * pool.measured_factor / PPM
    missed = read_time(pool, reads, queue) * factor
    read = reads.hits * array.read_hit_answer + (1 - reads.hits) * missed
    return (load.reads * read + load.writes * array.write_answer) / requests


def _positionings(pool: Pool, reads: Reads) -> float:
    """Return how often a mean read positions: streams once per prefetch unit."""
    unit = pool.prefetch_unit
    return reads.random + (1 - reads.random) * (reads.size / unit if unit else 0.0)
