"""A block of limits of one kind: which pools or arrays, which hours, how much of each.

Every limit that adds up over volumes has this one shape, so that the program, the
schedule and the report read it alike.
"""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]


@dataclass(frozen=True, slots=True, kw_only=True)
class Block:
    """Limits of one kind.

    The use of volume v placed in pool p is ``asks[v] @ costs[p]`` in each hour, less
    ``eased[v, p]`` of ``asks[v] @ ease[p]``, all of it ``swollen[v, p]`` times, and
    ``moved[v] * move_costs[p]`` more in each hour if p is not its home.  It counts for
    the owner of p.

    Attributes
    ----------
    code
        Rule of the register.
    owners
        Ids of the pools or arrays that have the limit.
    owner_of
        (pools,) index into ``owners``, -1 where the pool has none.
    asks
        (volumes, hours, q) what volumes ask for; one hour where hours do not matter.
    costs, ease
        (pools, q).
    eased
        (volumes, pools) share of the reads that the array's cache answers.
    swollen
        (volumes, pools) what the load becomes on media that can serve more of it.
    limits
        (owners, steps + 1) what is allowed once k expansion steps are bought.
    home
        (volumes,) index of the pool where each volume is today.
    hourly
        Whether hours matter, so that the one that binds is worth naming.
    unit, scale
        Unit of the report, and how much of the limit's own unit one of it is.
    """

    code: str
    owners: tuple[str, ...]
    owner_of: Ints
    asks: Floats
    costs: Floats
    limits: Floats
    home: Ints
    moved: Floats
    move_costs: Floats
    ease: Floats
    eased: Floats
    swollen: Floats
    hourly: bool = False
    unit: str = ""
    scale: float = 1.0

    @property
    def hours(self) -> int:
        """Number of hours the block looks at."""
        return int(self.asks.shape[1])

    def column(self, volume: int, pool: int) -> Floats:
        """Return the use of one volume in one pool, (hours,)."""
        eased = self.costs[pool] - self.eased[volume, pool] * self.ease[pool]
        stay: Floats = self.swollen[volume, pool] * (self.asks[volume] @ eased)
        return stay + self._way(volume, pool)

    def use(self, places: Ints) -> Floats:
        """Return the use of each owner and hour, (owners, hours), for a placement."""
        total = np.zeros((len(self.owners), self.hours))
        every = np.arange(len(places))
        eased = self.eased[every, places][:, None] * self.ease[places]
        costs = (self.costs[places] - eased) * self.swollen[every, places][:, None]
        per_volume = np.einsum("vhq,vq->vh", self.asks, costs)
        away = places != self.home
        per_volume += (self.moved * self.move_costs[places] * away)[:, None]
        owners = self.owner_of[places]
        known = owners >= 0
        np.add.at(total, owners[known], per_volume[known])
        return total

    def _way(self, volume: int, pool: int) -> float:
        if pool == self.home[volume]:
            return 0.0
        return float(self.moved[volume] * self.move_costs[pool])
