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
    """Return the write cost of a pool."""
    return write_cost(pool.data, pool.parity, in_place=pool.in_place)
