"""Waiting and response.

References
----------
.. [1] Pollaczek-Khinchine mean wait of M/G/1; R. Cooper, "Introduction to Queueing
   Theory", 1981, p. 189.
"""

from placer.estate import Array, Load, Media, Pool
from placer.physics import drives
from placer.units import MILLI

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


def read_time(pool: Pool, size: float, busy: float) -> float:
    """Return the mean time of one read of ``size`` [B] at the drives [s]."""
    moved = drives.transfer(size, pool)
    if pool.media is Media.FLASH:
        held = moved + (MILLI / pool.reads_at_most if pool.reads_at_most else 0.0)
        return pool.read_time / drives.MICRO + moved + wait(busy, held)
    whole = drives.positioning(pool) + moved
    return whole + wait(busy, whole)


def response(load: Load, pool: Pool, array: Array, busy: float) -> float:
    """Return the mean response of a load [us], 0 where it is not known or none.

    Writes are answered from the array's protected cache; reads by the drives.
    """
    requests = load.reads + load.writes
    if not requests or not knows_response(pool):
        return 0.0
    size = load.read_bytes * MILLI / load.reads if load.reads else 0.0
    read = read_time(pool, size, busy) * drives.MICRO
    return (load.reads * read + load.writes * array.write_answer) / requests
