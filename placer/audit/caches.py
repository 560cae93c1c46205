"""What of a volume's reads the caches of arrays answer, so that no drive does."""

from fractions import Fraction
from math import lcm

from placer.estate import Estate, Volume
from placer.units import PPM


class Caches:
    """The caches of an estate's arrays.

    Attributes
    ----------
    whole
        In how many parts a share of reads is counted: the share that hits is a whole
        number of them in every array, since the caches divide into it.
    """

    def __init__(self, estate: Estate) -> None:
        self._sizes = {array.name: array.cache for array in estate.arrays}
        self._common = lcm(*filter(None, self._sizes.values()))
        self.whole = PPM * self._common

    def hits(self, volume: Volume, array: str) -> Fraction:
        """Return the share of the volume's reads that an array's cache answers."""
        return 1 - Fraction(self.misses(volume, array), self.whole)

    def misses(self, volume: Volume, array: str) -> int:
        """Return the share of the reads that is left for the drives [1/whole]."""
        return self.whole - volume.read_hits * self._kept(volume.array, array)

    def _kept(self, home: str, array: str) -> int:
        """Return what an array keeps of the hits at home [1/common]; unknown: none."""
        if array == home:
            return self._common
        if not self._sizes[home]:
            return 0
        same = self._common // self._sizes[home]
        return min(self._common, self._sizes[array] * same)
