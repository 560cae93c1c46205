"""What pools and controllers can carry, by the formulas of DEVELOPERS.md."""

from dataclasses import dataclass
from fractions import Fraction
from math import lcm

from placer.estate import Array, Media, Pool
from placer.units import MILLI, PPM

HALF_TURN = 30 * PPM
"""Half a turn takes ``HALF_TURN`` / rpm [µs]."""


@dataclass(frozen=True, slots=True)
class Form:
    """What each part of a load adds to a busy share: whole parts of ``unit``."""

    reads: int
    writes: int
    read_bytes: int
    write_bytes: int
    unit: int

    def of(self, load: tuple[int, ...]) -> list[int]:
        """Return what a load (4 parts of each hour in turn) adds in each hour."""
        return [
            reads * self.reads
            + writes * self.writes
            + read_bytes * self.read_bytes
            + write_bytes * self.write_bytes
            for reads, writes, read_bytes, write_bytes in zip(
                load[0::4], load[1::4], load[2::4], load[3::4], strict=True
            )
        ]


def _form(*parts: Fraction) -> Form:
    unit = lcm(*(part.denominator for part in parts))
    reads, writes, read_bytes, write_bytes = (int(part * unit) for part in parts)
    return Form(reads, writes, read_bytes, write_bytes, unit)


def per(amount: Fraction | int, rating: int) -> Fraction:
    """Return amount / rating; a rating of 0 leaves the term out."""
    return Fraction(amount) / rating if rating else Fraction(0)


def drives(pool: Pool, steps: int) -> int:
    """Return the drives of a pool once the steps bought are in."""
    return pool.drives + (steps * pool.expansion.drives if pool.expansion else 0)


def usable(pool: Pool, steps: int) -> Fraction:
    """Return the usable room of a pool before reduction [B]."""
    if pool.usable:
        if not pool.drives:
            return Fraction(pool.usable)
        return Fraction(pool.usable * drives(pool, steps), pool.drives)
    stripes = drives(pool, steps) // (pool.data + pool.parity)
    raw = stripes * pool.data * pool.drive_size
    return Fraction(raw * (PPM - pool.overhead), PPM)


def room(pool: Pool, steps: int) -> Fraction:
    """Return the room volumes may fill after reduction [B]."""
    whole = usable(pool, steps)
    return min(whole * pool.fill_ceiling / PPM, whole - pool.least_free)


def back_end(pool: Pool) -> tuple[Fraction, Fraction]:
    """Return the reads and writes of drives that one host write causes."""
    if pool.data == pool.parity == 1:
        return Fraction(0), Fraction(2)
    if not pool.parity:
        return Fraction(0), Fraction(1)
    if pool.in_place:
        return Fraction(pool.parity + 1), Fraction(pool.parity + 1)
    return Fraction(0), whole_stripes(pool)


def whole_stripes(pool: Pool) -> Fraction:
    """Return the writes of drives per byte written in whole stripes."""
    return Fraction(pool.data + pool.parity, pool.data)


def half_turn(pool: Pool) -> Fraction:
    """Return the time of half a turn [µs]; 0 where the speed is not known."""
    return per(HALF_TURN, pool.rpm)


def servers(pool: Pool, steps: int) -> Fraction:
    """Return over how much the work of a pool is spread: drives, or one black box."""
    if not pool.requests_at_most:
        return Fraction(drives(pool, steps))
    return Fraction(drives(pool, steps), pool.drives) if pool.drives else Fraction(1)


def busy_form(pool: Pool) -> Form | None:
    """Return what loads add to the busy share of one drive, or None: not modelled."""
    if not pool.takes_volumes:
        return None
    if pool.requests_at_most:
        share = Fraction(1, pool.requests_at_most)
        return _form(share, share, Fraction(0), Fraction(0))
    parts = _flash(pool) if pool.media is Media.FLASH else _spinning(pool)
    skew = Fraction(pool.skew, PPM)
    return _form(*(part * skew for part in parts))


def _flash(pool: Pool) -> tuple[Fraction, ...]:
    reads, writes = back_end(pool)
    return (
        per(1, pool.reads_at_most),
        per(reads, pool.reads_at_most) + per(writes, pool.writes_at_most),
        per(1, pool.drive_rate),
        per(reads + writes, pool.drive_rate),
    )


def _spinning(pool: Pool) -> tuple[Fraction, ...]:
    touched = sum(back_end(pool), start=Fraction(0))
    positioned = (pool.seek + half_turn(pool)) / (PPM * MILLI)
    return (
        positioned,
        positioned * touched,
        per(1, pool.drive_rate),
        per(touched, pool.drive_rate),
    )


def controller_form(array: Array) -> Form:
    """Return what loads add to the busy share of the controllers that must do."""
    left = max(1, array.controllers - array.failures_survived)
    parts = (
        per(1, array.reads_at_most),
        per(1, array.writes_at_most),
        per(1, array.controller_rate),
        per(1, array.controller_rate),
    )
    return _form(*(part * array.uneven / (PPM * left) for part in parts))


def wears(pool: Pool, steps: int) -> bool:
    """Whether the pool has a budget of writes."""
    rated = pool.dwpd > 0 and pool.life_days > 0 and drives(pool, steps) > 0
    return pool.media is Media.FLASH and rated


def wear_budget(pool: Pool, steps: int) -> Fraction:
    """Return the bytes the drives of a pool may still take over the life asked [B]."""
    rated = drives(pool, steps) * pool.drive_size * pool.warranty_days
    return Fraction(rated * pool.dwpd * (PPM - pool.wear_used), PPM * PPM)
