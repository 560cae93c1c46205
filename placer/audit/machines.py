"""What pools and controllers can carry, by the formulas of DEVELOPERS.md."""

from collections.abc import Sequence
from dataclasses import dataclass
from enum import Enum
from fractions import Fraction
from math import lcm

from placer.audit.groups import Counts, planned_for
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

    def of(self, load: Sequence[int]) -> list[int]:
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


@dataclass(frozen=True, slots=True)
class Work:
    """What loads add to the busy share of one drive, by the kind of their reads.

    Attributes
    ----------
    random, sequential
        What a read and a byte read add, in parts of unit / PPM / the parts of misses.
    writes
        What a write and a byte written add, in parts of the unit.
    """

    random: tuple[int, int]
    sequential: tuple[int, int]
    writes: tuple[int, int]
    unit: int

    def form(self, random: int, misses: int) -> Form:
        """Return the form for one volume: random reads [ppm], misses [parts]."""
        reads, read_bytes = (
            (one * random + other * (PPM - random)) * misses
            for one, other in zip(self.random, self.sequential, strict=True)
        )
        write, written = self.writes
        return Form(reads, write, read_bytes, written, self.unit)


class Kind(Enum):
    """What hosts ask for, as far as drives tell it apart."""

    RANDOM = "random read"
    SEQUENTIAL = "sequential read"
    WRITE = "write"


@dataclass(frozen=True, slots=True)
class Hold:
    """How long a request of one kind occupies drives.

    It does so ``times`` times: ``once`` [µs] and for every byte ``each_byte`` [µs].
    """

    kind: Kind
    times: Fraction
    once: Fraction
    each_byte: Fraction


def _whole(parts: Sequence[Fraction]) -> tuple[list[int], int]:
    """Return fractions as whole parts of one unit, and that unit."""
    unit = lcm(*(part.denominator for part in parts))
    return [int(part * unit) for part in parts], unit


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


def half_turn(pool: Pool) -> Fraction:
    """Return the time of half a turn [µs]; 0 where the speed is not known."""
    return per(HALF_TURN, pool.rpm)


def servers(pool: Pool, steps: int) -> Fraction:
    """Return over how much the work of a pool is spread: drives, or one black box."""
    if not pool.requests_at_most:
        return Fraction(drives(pool, steps))
    return Fraction(drives(pool, steps), pool.drives) if pool.drives else Fraction(1)


def busy_work(pool: Pool, whole: int) -> Work | None:
    """Return what loads add to the busy share of one drive, or None: not modelled.

    Parameters
    ----------
    pool
        The pool whose drives work.
    whole
        In how many parts the misses of a volume will be counted.
    """
    if not pool.takes_volumes:
        return None
    measured = Fraction(pool.measured_factor, PPM)
    parts, unit = _whole([part * measured for part in _parts(pool)])
    random, sequential, write, random_byte, sequential_byte, written = parts
    fine = PPM * whole
    return Work(
        (random, random_byte),
        (sequential, sequential_byte),
        (write * fine, written * fine),
        unit * fine,
    )


def _parts(pool: Pool) -> list[Fraction]:
    """Return the share of a request, then of a byte, of each kind."""
    if pool.requests_at_most:
        share = Fraction(1, pool.requests_at_most)
        return [share] * len(Kind) + [Fraction(0)] * len(Kind)
    requests, moved = (dict.fromkeys(Kind, Fraction(0)) for _ in range(2))
    for hold in holds(pool, planned_for(pool)):
        requests[hold.kind] += hold.times * hold.once / (PPM * MILLI)
        moved[hold.kind] += hold.times * hold.each_byte / PPM
    return [part * pool.skew / PPM for part in (*requests.values(), *moved.values())]


def holds(pool: Pool, counts: Counts) -> tuple[Hold, ...]:
    """Return how requests occupy the drives of a pool of flash or spinning drives.

    Parameters
    ----------
    pool
        The pool.
    counts
        [1] requests to drives that one of a host causes there.
    """
    work = _flash if pool.media is Media.FLASH else _spinning
    return work(pool, counts)


def _flash(pool: Pool, counts: Counts) -> tuple[Hold, ...]:
    read, write = (
        per(PPM * MILLI, rating) for rating in (pool.reads_at_most, pool.writes_at_most)
    )
    byte = per(PPM, pool.drive_rate)
    return (
        Hold(Kind.RANDOM, counts.reads, read, byte),
        Hold(Kind.SEQUENTIAL, counts.reads, read, byte),
        Hold(Kind.WRITE, counts.write_reads, read, byte),
        Hold(Kind.WRITE, counts.writes, write, byte),
    )


def _spinning(pool: Pool, counts: Counts) -> tuple[Hold, ...]:
    once, byte = positioning(pool), per(PPM, pool.drive_rate)
    fetched = byte + positions(pool) * once
    return (
        Hold(Kind.RANDOM, counts.reads, once, byte),
        Hold(Kind.SEQUENTIAL, counts.reads, Fraction(0), fetched),
        Hold(Kind.WRITE, counts.write_reads + counts.writes, once, byte),
    )


def positioning(pool: Pool) -> Fraction:
    """Return the time of positioning once [µs]: the seek and half a turn."""
    return pool.seek + half_turn(pool)


def positions(pool: Pool) -> Fraction:
    """Return how often sequential reads position for one byte; a unit of 0: never."""
    return per(1, pool.prefetch_unit)


def controller_form(array: Array) -> Form:
    """Return what loads add to the busy share of the controllers that must do."""
    left = max(1, array.controllers - array.failures_survived)
    ratings = (
        array.reads_at_most,
        array.writes_at_most,
        array.controller_rate,
        array.controller_rate,
    )
    shares = [per(1, rating) * array.uneven / (PPM * left) for rating in ratings]
    (reads, writes, read, written), unit = _whole(shares)
    return Form(reads, writes, read, written, unit)


def wears(pool: Pool, steps: int) -> bool:
    """Whether the pool has a budget of writes."""
    rated = pool.dwpd > 0 and pool.life_days > 0 and drives(pool, steps) > 0
    return pool.media is Media.FLASH and rated


def wear_budget(pool: Pool, steps: int) -> Fraction:
    """Return the bytes the drives of a pool may still take over the life asked [B]."""
    rated = drives(pool, steps) * pool.drive_size * pool.warranty_days
    return Fraction(rated * pool.dwpd * (PPM - pool.wear_used), PPM * PPM)
