"""Wear: what a pool's drives may be written over their life, and what hosts write.

Ratings are host writes to the drive, so the drive's own amplification is inside them.

References
----------
.. [1] JEDEC JESD218: terabytes written is defined in host writes.
"""

from fractions import Fraction

from placer.estate import Media, Pool
from placer.physics import protection
from placer.physics.capacity import drives
from placer.units import DAYS_PER_YEAR, PPM


def rated_bytes(drive_size: int, dwpd: int, warranty_days: int) -> Fraction:
    """Return what one drive may be written over its warranty [B] [1]_.

    Parameters
    ----------
    drive_size
        [B] size of the drive.
    dwpd
        [ppm] drive writes per day.
    warranty_days
        [day] the years of the rating, 365 days each.
    """
    return Fraction(drive_size * dwpd * warranty_days, PPM)


def drive_writes_per_day(written: int, drive_size: int, years: int) -> Fraction:
    """Return the drive writes per day [1/day] behind a rating in bytes written."""
    return Fraction(written, drive_size * DAYS_PER_YEAR * years)


def is_worn(pool: Pool) -> bool:
    """Return whether the pool has a wear limit."""
    return (
        pool.media is Media.FLASH
        and pool.dwpd > 0
        and pool.life_days > 0
        and pool.drives > 0
    )


def budget(pool: Pool, steps: int = 0) -> Fraction:
    """Return what the pool's drives may still be written over the life asked [B]."""
    rated = rated_bytes(pool.drive_size, pool.dwpd, pool.warranty_days)
    return drives(pool, steps) * rated * Fraction(PPM - pool.wear_used, PPM)


def host_copies(pool: Pool) -> Fraction:
    """Return bytes at the drives per byte that hosts write."""
    return protection.of_pool(pool).writes * _array_share(pool)


def move_copies(pool: Pool) -> Fraction:
    """Return bytes at the drives per byte copied in: copies fill whole stripes."""
    return protection.stripe_cost(pool.data, pool.parity) * _array_share(pool)


def _array_share(pool: Pool) -> Fraction:
    """Return the array's own overhead over what reduction saves."""
    return Fraction(pool.array_overhead, pool.reduction)
