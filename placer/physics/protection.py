"""What protection costs: back-end requests per host write, and room for data.

References
----------
.. [1] D. Patterson, G. Gibson, R. Katz, "A Case for Redundant Arrays of Inexpensive
   Disks", SIGMOD 1988: small writes cost two reads and two writes with one parity.
.. [2] R. and A. Arpaci-Dusseau, "Operating Systems: Three Easy Pieces", ch. 38.
"""

from dataclasses import dataclass
from fractions import Fraction

from placer.estate import Pool


@dataclass(frozen=True, slots=True)
class DriveCost:
    """Requests at the drives for one host read, and behind one host write."""

    per_read: Fraction
    per_write: "WriteCost"


@dataclass(frozen=True, slots=True)
class WriteCost:
    """Requests at the drives for one host write."""

    reads: Fraction
    writes: Fraction

    @property
    def total(self) -> Fraction:
        """All requests at the drives for one host write."""
        return self.reads + self.writes


def write_cost(data: int, parity: int, *, in_place: bool) -> WriteCost:
    """Return the drive requests behind one host write.

    A mirror (1 + 1) writes twice; ``parity`` P in place reads and writes the block and
    its P parities [1]_; a pool that only writes whole stripes pays (D + P) / D [2]_.
    """
    if parity == 0:
        return WriteCost(Fraction(0), Fraction(1))
    if data == parity == 1:
        return WriteCost(Fraction(0), Fraction(2))
    if in_place:
        return WriteCost(Fraction(parity + 1), Fraction(parity + 1))
    return WriteCost(Fraction(0), stripe_cost(data, parity))


def stripe_cost(data: int, parity: int) -> Fraction:
    """Return bytes at the drives per host byte when whole stripes are written."""
    return Fraction(data + parity, data)


def of_pool(pool: Pool) -> WriteCost:
    """Return the write cost of a pool with all its drives."""
    return write_cost(pool.data, pool.parity, in_place=pool.in_place)


def planned_for(pool: Pool) -> DriveCost:
    """Return what the drives of a pool must bear: with a drive lost if so planned."""
    whole = of_pool(pool)
    if not pool.one_drive_lost or not pool.parity:
        return DriveCost(Fraction(1), whole)
    return one_drive_lost(pool.data, pool.parity, in_place=pool.in_place)


def one_drive_lost(data: int, parity: int, *, in_place: bool) -> DriveCost:
    """Return the cost in a group that lost one of its D + P drives.

    Counted as if all drives were left, so that the load of each of those that are is
    right: a read of the lost drive takes the D others of its stripe; a write of the
    lost block makes its parity from the D - 1 others; a write whose parity is lost
    updates what parity is left [2]_.
    """
    drives = data + parity
    crowded = Fraction(drives, drives - 1)
    read = crowded * Fraction(drives - 1 + data, drives)
    if not in_place and not data == parity == 1:
        whole = write_cost(data, parity, in_place=in_place)
        return DriveCost(read, WriteCost(whole.reads, whole.writes * crowded))
    reads, writes = _mirrored_or_in_place(data, parity)
    return DriveCost(read, WriteCost(reads * crowded, writes * crowded))


def _mirrored_or_in_place(data: int, parity: int) -> tuple[Fraction, Fraction]:
    """Return the mean reads and writes per host write, one drive of the group lost."""
    if data == parity == 1:
        return Fraction(0), Fraction(1)
    lost_parity = (0 if parity == 1 else parity, parity)
    cases = (
        (1, (data - 1, parity)),
        (parity, lost_parity),
        (data - 1, (parity + 1, parity + 1)),
    )
    drives = data + parity
    reads = sum(chance * cost[0] for chance, cost in cases)
    writes = sum(chance * cost[1] for chance, cost in cases)
    return Fraction(reads, drives), Fraction(writes, drives)
