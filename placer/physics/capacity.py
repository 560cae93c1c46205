"""Room: what drives hold for users, with expansion, ceilings and reduction."""

from fractions import Fraction

from placer.estate import Pool
from placer.units import PPM, demand, supply


def drives(pool: Pool, steps: int = 0) -> int:
    """Return the number of drives once ``steps`` expansion steps are bought."""
    return pool.drives + (steps * pool.expansion.drives if pool.expansion else 0)


def usable(pool: Pool, steps: int = 0) -> int:
    """Return the room before reduction [B]: whole stripe groups less overhead.

    floor(n / (D + P)) x D x drive size x (1 - overhead); a figure given by the user
    overrides the arithmetic and grows in proportion to the drives.
    """
    if not pool.usable:
        groups = drives(pool, steps) // (pool.data + pool.parity)
        raw = groups * pool.data * pool.drive_size
        return supply(Fraction(raw * (PPM - pool.overhead), PPM))
    if not pool.drives:
        return pool.usable
    return supply(Fraction(pool.usable * drives(pool, steps), pool.drives))


def room(pool: Pool, steps: int = 0) -> int:
    """Return the room that may be filled [B]: fill ceiling and least free."""
    whole = usable(pool, steps)
    filled = supply(Fraction(whole * pool.fill_ceiling, PPM))
    return max(0, min(filled, whole - pool.least_free))


def thin_room(pool: Pool, steps: int = 0) -> int:
    """Return what may be provisioned in the pool [B]; 0 where it is not limited."""
    return supply(Fraction(usable(pool, steps) * pool.thin_at_most, PPM))


def landed(size: int, pool: Pool) -> int:
    """Return the room that ``size`` [B] takes in the pool after its reduction [B]."""
    return demand(Fraction(size * PPM, pool.reduction))
