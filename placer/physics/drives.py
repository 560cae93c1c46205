"""Busy time of drives: what one host read or write costs a pool.

The busy time of a pool is linear in what its volumes ask for: reads/s, writes/s and the
bytes of both.  ``busy_cost`` gives the four factors, so that a pool's busy time is a
scalar product whoever computes it.

References
----------
.. [1] R. and A. Arpaci-Dusseau, "Operating Systems: Three Easy Pieces", ch. 37:
   T = seek + half a turn + transfer.
"""

from dataclasses import dataclass

from placer.estate import Media, Pool
from placer.physics import protection
from placer.physics.capacity import drives
from placer.units import MILLI, PPM

MICRO = 1_000_000


@dataclass(frozen=True, slots=True)
class BusyCost:
    """Drives kept busy per unit of load: per read/s, write/s, and byte/s of each."""

    read: float
    write: float
    read_byte: float
    write_byte: float


def half_turn(rpm: int) -> float:
    """Return the mean wait for the sector [s]: half a turn, 30 / rpm [1]_."""
    return 30 / rpm if rpm else 0.0


def positioning(pool: Pool) -> float:
    """Return seek and half a turn of a spinning drive [s]."""
    return pool.seek / MICRO + half_turn(pool.rpm)


def transfer(size: float, pool: Pool) -> float:
    """Return the time [s] to move ``size`` [B]; 0 where the rate is not limited."""
    return size / pool.drive_rate if pool.drive_rate else 0.0


def busy_cost(pool: Pool) -> BusyCost | None:
    """Return how many of the pool's drives its load keeps busy, None if unmodelled.

    The skew is included: the factors speak for the busiest drive.  The share of the
    pool is the product with the load over ``busy_drives``.
    """
    if not pool.takes_volumes:
        return None
    if pool.requests_at_most:
        share = MILLI / pool.requests_at_most * max(pool.drives, 1)
        return BusyCost(share, share, 0.0, 0.0)
    if not pool.drives and not pool.expansion:
        return None
    work = _flash(pool) if pool.media is Media.FLASH else _spinning(pool)
    return BusyCost(*(part * pool.skew / PPM for part in work))


def busy_drives(pool: Pool, steps: int = 0) -> int:
    """Return the drives that share the load; a black box without drives counts one."""
    count = drives(pool, steps)
    return max(count, 1) if pool.requests_at_most else count


def _flash(pool: Pool) -> tuple[float, float, float, float]:
    cost = protection.of_pool(pool)
    read, write = _per(pool.reads_at_most), _per(pool.writes_at_most)
    byte = transfer(1, pool)
    return (
        read,
        float(cost.reads) * read + float(cost.writes) * write,
        byte,
        byte * float(cost.total),
    )


def _spinning(pool: Pool) -> tuple[float, float, float, float]:
    cost = float(protection.of_pool(pool).total)
    seek, byte = positioning(pool), transfer(1, pool)
    return seek, seek * cost, byte, byte * cost


def _per(rate: int) -> float:
    """Return the share of a drive that one request per second takes."""
    return MILLI / rate if rate else 0.0
