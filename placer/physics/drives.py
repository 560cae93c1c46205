"""Busy time of drives: what one host read or write costs a pool.

The busy time of a pool is linear in what its volumes ask for: reads/s, writes/s, the
bytes of both, and which reads are random.  ``busy_cost`` gives the factors, so that a
pool's busy time is a scalar product whoever computes it.

References
----------
.. [1] R. and A. Arpaci-Dusseau, "Operating Systems: Three Easy Pieces", ch. 37:
   T = seek + half a turn + transfer.
"""

from dataclasses import astuple, dataclass

from placer.estate import Media, Pool
from placer.physics import protection
from placer.physics.capacity import drives
from placer.units import MILLI, PPM

MICRO = 1_000_000


@dataclass(frozen=True, slots=True)
class BusyCost:
    """Drives kept busy per unit of load.

    Per read/s and write/s of any kind, per byte/s of each, per random read/s, and per
    byte/s of sequential reads.
    """

    read: float
    write: float
    read_byte: float
    write_byte: float
    random_read: float = 0.0
    stream_byte: float = 0.0


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

    The skew is included: the factors speak for the busiest drive; so is what measured
    times are of modelled ones.  The share of the pool is the product with the load over
    ``busy_drives``.
    """
    if not pool.takes_volumes:
        return None
    if pool.requests_at_most:
        share = MILLI / pool.requests_at_most * max(pool.drives, 1)
        return _scaled(BusyCost(share, share, 0.0, 0.0), pool.measured_factor / PPM)
    if not pool.drives and not pool.expansion:
        return None
    work = _flash(pool) if pool.media is Media.FLASH else _spinning(pool)
    return _scaled(work, pool.skew / PPM * pool.measured_factor / PPM)


def busy_drives(pool: Pool, steps: int = 0) -> int:
    """Return the drives that share the load; a black box without drives counts one."""
    count = drives(pool, steps)
    return max(count, 1) if pool.requests_at_most else count


def _scaled(cost: BusyCost, factor: float) -> BusyCost:
    return BusyCost(*(part * factor for part in astuple(cost)))


def _flash(pool: Pool) -> BusyCost:
    cost = protection.planned_for(pool)
    per_read, per_write = float(cost.per_read), cost.per_write
    read, write = _per(pool.reads_at_most), _per(pool.writes_at_most)
    byte = transfer(1, pool)
    return BusyCost(
        read=read * per_read,
        write=float(per_write.reads) * read + float(per_write.writes) * write,
        read_byte=byte * per_read,
        write_byte=byte * float(per_write.total),
    )


def _spinning(pool: Pool) -> BusyCost:
    """Random reads and writes position each; a stream once per prefetch unit."""
    cost = protection.planned_for(pool)
    per_read, per_write = float(cost.per_read), float(cost.per_write.total)
    seek, byte = positioning(pool), transfer(1, pool)
    streamed = seek / pool.prefetch_unit if pool.prefetch_unit else 0.0
    return BusyCost(
        read=0.0,
        write=seek * per_write,
        read_byte=byte * per_read,
        write_byte=byte * per_write,
        random_read=seek * per_read,
        stream_byte=streamed * per_read,
    )


def _per(rate: int) -> float:
    """Return the share of a drive that one request per second takes."""
    return MILLI / rate if rate else 0.0
