"""The mix of requests behind which a read waits at the drives of a pool.

A request that finds a drive busy waits for what is left of the one in service.  That is
longer in the mean than half a service: the longer a request, the likelier to be met.
"""

from collections.abc import Iterable
from dataclasses import dataclass
from fractions import Fraction

from placer.audit import machines
from placer.audit.machines import Kind
from placer.estate import Load, Pool, Volume
from placer.units import MILLI, PPM


@dataclass(frozen=True, slots=True)
class Moments:
    """Requests of one kind: their number, bytes and squares of bytes, each per time."""

    number: Fraction = Fraction(0)
    size: Fraction = Fraction(0)
    square: Fraction = Fraction(0)

    def __add__(self, other: "Moments") -> "Moments":
        """Return the requests of both."""
        return Moments(
            self.number + other.number,
            self.size + other.size,
            self.square + other.square,
        )

    def times(self, factor: Fraction | int) -> "Moments":
        """Return so many times the requests."""
        return Moments(self.number * factor, self.size * factor, self.square * factor)

    def held(self, once: Fraction, each_byte: Fraction) -> Fraction:
        """Return the sum of s, where s = once + each_byte x bytes."""
        return once * self.number + each_byte * self.size

    def held_squared(self, once: Fraction, each_byte: Fraction) -> Fraction:
        """Return the sum of s^2."""
        cross = 2 * once * each_byte * self.size
        return once**2 * self.number + cross + each_byte**2 * self.square


Mix = dict[Kind, Moments]


def one(volume: Volume, mean: Fraction) -> Moments:
    """Return one request of a volume whose requests have a mean size [B].

    Part of them may be large: then the others are as small as the mean asks.  Where
    none are left, or no size is known, all are alike.
    """
    share = Fraction(volume.large_share, PPM)
    if not 0 < share < 1 or not volume.large_size:
        return Moments(Fraction(1), mean, mean**2)
    large = min(Fraction(volume.large_size), mean / share)
    small = (mean - share * large) / (1 - share)
    return Moments(Fraction(1), mean, share * large**2 + (1 - share) * small**2)


def of_volume(
    volume: Volume, load: Load, asked: tuple[int, int], missed: Fraction
) -> Mix:
    """Return what a volume asks of drives.

    Parameters
    ----------
    volume
        The volume.
    load
        Its load of the hour as measured, which tells the sizes.
    asked
        [any] reads and writes as they count.
    missed
        [1] share of the reads that no cache answers.
    """
    random = Fraction(volume.random_reads, PPM)
    reads = _requests(volume, load.reads, load.read_bytes, asked[0] * missed)
    return {
        Kind.RANDOM: reads.times(random),
        Kind.SEQUENTIAL: reads.times(1 - random),
        Kind.WRITE: _requests(volume, load.writes, load.write_bytes, asked[1]),
    }


def _requests(
    volume: Volume, number: int, size: int, counted: Fraction | int
) -> Moments:
    if not number:
        return Moments()
    return one(volume, Fraction(size * MILLI, number)).times(counted)


def together(mixes: Iterable[Mix]) -> Mix:
    """Return all requests of some mixes."""
    total = dict.fromkeys(Kind, Moments())
    for mix in mixes:
        total = {kind: total[kind] + mix[kind] for kind in Kind}
    return total


def residual(pool: Pool, mix: Mix) -> Fraction:
    """Return the mean of what is left of the request in service [µs]; 0 for none.

    References
    ----------
    Mean residual life, E[S^2] / (2 E[S]): Pollaczek-Khinchine, R. Cooper, Introduction
    to Queueing Theory, 2nd edition 1981, p. 189.
    """
    held = squared = Fraction(0)
    for hold in machines.holds(pool):
        requests = mix[hold.kind].times(hold.times)
        held += requests.held(hold.once, hold.each_byte)
        squared += requests.held_squared(hold.once, hold.each_byte)
    return squared / (2 * held) if held else Fraction(0)
