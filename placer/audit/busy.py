"""What volumes add to the busy share of the drives of a pool, past the caches."""

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction

from placer.audit import machines
from placer.audit.caches import Caches
from placer.audit.demand import GRAIN
from placer.estate import Pool, Volume


@dataclass(frozen=True, slots=True)
class Busy:
    """A pool's drives at work; ``worth`` is the busy share of one part added [1]."""

    pool: Pool
    work: machines.Work
    caches: Caches
    worth: Fraction

    def adds(self, volume: Volume, load: Sequence[int]) -> list[int]:
        """Return what a volume adds in each hour, from its load [GRAIN]."""
        misses = self.caches.misses(volume, self.pool.array)
        return self.work.form(volume.random_reads, misses).of(load)


def busy(pool: Pool, steps: int, caches: Caches) -> Busy | None:
    """Return how the drives of a pool are at work; None where that is not modelled."""
    work = machines.busy_work(pool, caches.whole)
    over = machines.servers(pool, steps)
    if work is None or not over:
        return None
    return Busy(pool, work, caches, Fraction(1, work.unit * GRAIN) / over)
