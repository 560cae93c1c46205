"""Drives of one protection: what requests of hosts are to them, whole or one lost."""

from dataclasses import dataclass
from fractions import Fraction

from placer.estate import Pool


@dataclass(frozen=True, slots=True)
class Counts:
    """Requests to drives that one request of a host causes, in the mean.

    Attributes
    ----------
    reads
        Reads per read.
    write_reads, writes
        Reads and writes per write.
    """

    reads: Fraction
    write_reads: Fraction
    writes: Fraction

    def times(self, factor: Fraction) -> "Counts":
        """Return so many times the requests."""
        return Counts(
            self.reads * factor, self.write_reads * factor, self.writes * factor
        )


def whole_stripes(pool: Pool) -> Fraction:
    """Return the writes of drives per byte written in whole stripes."""
    return Fraction(pool.data + pool.parity, pool.data)


def mirrors(pool: Pool) -> bool:
    """Whether each drive has one other as its copy."""
    return pool.data == pool.parity == 1


def all_drives(pool: Pool) -> Counts:
    """Return what requests are to a group with all its drives."""
    return Counts(Fraction(1), *_per_write(pool))


def _per_write(pool: Pool) -> tuple[Fraction, Fraction]:
    if mirrors(pool):
        return Fraction(0), Fraction(2)
    if not pool.parity:
        return Fraction(0), Fraction(1)
    if pool.in_place:
        return Fraction(pool.parity + 1), Fraction(pool.parity + 1)
    return Fraction(0), whole_stripes(pool)


def planned_for(pool: Pool) -> Counts:
    """Return what requests are to the group for which the pool is planned."""
    return one_lost(pool) if pool.one_drive_lost and pool.parity else all_drives(pool)


def one_lost(pool: Pool) -> Counts:
    """Return what requests are to a group that lost a drive.

    They are counted as if spread over all its drives: more than there are, by the share
    of the lost one.

    References
    ----------
    R. Muntz, J. Lui, Performance Analysis of Disk Arrays under Failure, VLDB 1990.
    """
    drives = pool.data + pool.parity
    reads = Fraction(drives - 1 + pool.data, drives)
    crowded = Fraction(drives, drives - 1)
    return Counts(reads, *_per_write_with_one_lost(pool)).times(crowded)


def _per_write_with_one_lost(pool: Pool) -> tuple[Fraction, Fraction]:
    """Return reads and writes by what of a stripe the lost drive holds, in the mean."""
    if not pool.in_place and not mirrors(pool):
        return _per_write(pool)
    data, parity = pool.data, pool.parity
    others = parity + 1
    parity_read = parity if parity > 1 else 0
    reads = (data - 1) + parity * parity_read + (data - 1) * others
    writes = parity + parity * parity + (data - 1) * others
    return Fraction(reads, data + parity), Fraction(writes, data + parity)
