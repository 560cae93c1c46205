"""The mix of requests behind which a read waits at the drives of a pool.

A request that finds a drive busy waits for what is left of the one in service.  That is
longer in the mean than half a service: the longer a request, the likelier to be met.
"""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from fractions import Fraction
from math import ceil

from placer.audit import machines
from placer.audit.groups import all_drives
from placer.audit.machines import Hold, Kind
from placer.estate import Load, Pool, Volume
from placer.units import MILLI, PPM


@dataclass(frozen=True, slots=True)
class Moments:
    """Requests of one kind: their number, bytes and squares of bytes, each per time.

    They are whole numbers of fine parts: sums over volumes stay exact and quick.
    """

    number: int = 0
    size: int = 0
    square: int = 0

    def __add__(self, other: "Moments") -> "Moments":
        """Return the requests of both."""
        return Moments(
            self.number + other.number,
            self.size + other.size,
            self.square + other.square,
        )

    def part(self, share: Fraction) -> "Moments":
        """Return a share of the requests, rounded up."""
        top, bottom = share.as_integer_ratio()
        return Moments(
            -(-self.number * top // bottom),
            -(-self.size * top // bottom),
            -(-self.square * top // bottom),
        )

    def held(self, hold: Hold) -> Fraction:
        """Return the sum of n s, where s = once + each byte x bytes."""
        return hold.times * (hold.once * self.number + hold.each_byte * self.size)

    def held_squared(self, hold: Hold) -> Fraction:
        """Return the sum of n s^2."""
        once, byte = hold.once, hold.each_byte
        cross = 2 * once * byte * self.size
        return hold.times * (once**2 * self.number + cross + byte**2 * self.square)


NOTHING = Moments()
Mix = dict[Kind, Moments]


def mean_square(volume: Volume, mean: Fraction) -> Fraction:
    """Return the mean square of the sizes of requests with a mean size [B].

    Part of them may be large: then the others are as small as the mean asks.  Where
    none are left, or no size is known, all are alike.
    """
    size, number = mean.as_integer_ratio()
    share, large = volume.large_share, volume.large_size * number
    if not 0 < share < PPM or not large:
        return Fraction(size**2, number**2)
    others = PPM * size - share * large
    if others <= 0:
        return Fraction(PPM * size**2, share * number**2)
    alike = PPM - share
    squares = share * alike * large**2 + others**2
    return Fraction(squares, PPM * alike * number**2)


def of_hosts(volume: Volume, load: Load, counted: Sequence[int]) -> tuple[Moments, ...]:
    """Return the reads and the writes that hosts ask for, whether a cache has them.

    Parameters
    ----------
    volume
        The volume.
    load
        Its load of the hour as measured, which tells the sizes.
    counted
        [any] reads and writes as they count.
    """
    sizes = (load.reads, load.read_bytes), (load.writes, load.write_bytes)
    return tuple(
        _requests(volume, Fraction(size * MILLI, number), count) if number else NOTHING
        for (number, size), count in zip(sizes, counted, strict=True)
    )


def _requests(volume: Volume, mean: Fraction, count: int) -> Moments:
    return Moments(count, ceil(mean * count), ceil(mean_square(volume, mean) * count))


def at_drives(volume: Volume, hosts: Sequence[Moments], missed: Fraction) -> Mix:
    """Return what is left for drives when caches answer all but a share of reads."""
    reads, writes = hosts
    random = Fraction(volume.random_reads, PPM) * missed
    return {
        Kind.RANDOM: reads.part(random),
        Kind.SEQUENTIAL: reads.part(missed - random),
        Kind.WRITE: writes,
    }


def together(mixes: Iterable[Mix]) -> Mix:
    """Return all requests of some mixes."""
    total = dict.fromkeys(Kind, NOTHING)
    for mix in mixes:
        total = {kind: total[kind] + mix[kind] for kind in Kind}
    return total


def residual(pool: Pool, mix: Mix) -> Fraction:
    """Return the mean of what is left of the request in service [µs]; 0 for none.

    Requests are those of a group with all its drives.

    References
    ----------
    Mean residual life, E[S^2] / (2 E[S]): Pollaczek-Khinchine, R. Cooper, Introduction
    to Queueing Theory, 2nd edition 1981, p. 189.
    """
    holds = machines.holds(pool, all_drives(pool))
    held = sum(mix[hold.kind].held(hold) for hold in holds)
    squared = sum(mix[hold.kind].held_squared(hold) for hold in holds)
    return Fraction(squared, 2 * held) if held else Fraction(0)
