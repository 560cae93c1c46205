"""The limits of an estate that add up over volumes, one function per rule.

``limits`` is the list to audit by eye: each function gives the block of one rule of the
register, for the sizes and loads of a date.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from placer.candidates.block import Block, Floats, Ints
from placer.candidates.loads import loads
from placer.estate import Estate, Pool
from placer.physics import capacity, controllers, demand, drives, flash
from placer.units import GIB, PERCENT, PPM, SECONDS_PER_DAY, TB

NOBODY = -1


@dataclass(frozen=True)
class Date:
    """An estate as it will be some months from now, as arrays over its volumes."""

    estate: Estate
    months: int

    @cached_property
    def loads(self) -> Floats:
        """Loads (volumes, hours, 4)."""
        return loads(self.estate, self.months)

    @cached_property
    def sizes(self) -> Floats:
        """Room before reduction (volumes,) [B]."""
        return sizes(self.estate, self.months)

    @cached_property
    def copied(self) -> Floats:
        """What a move carries (volumes,) [B]."""
        return sizes(self.estate, demand.months_of_nights(self.estate))

    @cached_property
    def home(self) -> Ints:
        """Index of each volume's pool today (volumes,)."""
        index = {pool.id: i for i, pool in enumerate(self.estate.pools)}
        return np.array([index[v.home] for v in self.estate.volumes], dtype=np.int64)

    @cached_property
    def most_steps(self) -> int:
        """Most expansion steps any pool may buy."""
        return max((_steps(pool) for pool in self.estate.pools), default=0)

    def still(self) -> Floats:
        """Return asks of a rule that only counts moves: (volumes, 1, 1) of nothing."""
        return np.zeros((len(self.estate.volumes), 1, 1))


def sizes(estate: Estate, months: int) -> Floats:
    """Return the room of each volume before reduction [B]."""
    return np.array([demand.size(v, months) for v in estate.volumes], dtype=float)


def limits(estate: Estate, months: int) -> tuple[Block, ...]:
    """Return all blocks that have an owner, in the order of the register."""
    date = Date(estate, months)
    return tuple(block for rule in RULES if (block := rule(date)).owners)


def pool_room(date: Date) -> Block:
    """``pool-room``: landed bytes within fill ceiling and least free."""
    return _of_pools(
        date,
        "pool-room",
        [pool for pool in date.estate.pools if _has_room_row(pool)],
        date.sizes[:, None, None],
        lambda pool: (PPM / pool.reduction,),
        lambda pool, steps: float(capacity.room(pool, steps)),
        unit="GiB",
        scale=GIB,
    )


def pool_thin(date: Date) -> Block:
    """``pool-thin``: provisioned bytes within the ratio to usable."""
    provisioned = np.array([v.provisioned for v in date.estate.volumes], dtype=float)
    return _of_pools(
        date,
        "pool-thin",
        [pool for pool in date.estate.pools if pool.thin_at_most],
        provisioned[:, None, None],
        lambda _: (1.0,),
        lambda pool, steps: float(capacity.thin_room(pool, steps)),
        unit="GiB",
        scale=GIB,
    )


def pool_busy(date: Date) -> Block:
    """``pool-busy``: drives kept busy in each hour within the ceiling."""
    return _of_pools(
        date,
        "pool-busy",
        [pool for pool in date.estate.pools if drives.busy_cost(pool)],
        date.loads,
        _busy_factors,
        lambda pool, steps: pool.busy_ceiling / PPM * drives.busy_drives(pool, steps),
        unit="drives",
    )


def pool_wear(date: Date) -> Block:
    """``pool-wear``: bytes at the drives over the life asked within the budget."""
    written = date.loads[:, :, 3].mean(axis=1)[:, None, None]
    return _of_pools(
        date,
        "pool-wear",
        [pool for pool in date.estate.pools if flash.is_worn(pool)],
        written,
        lambda pool: (
            float(flash.host_copies(pool)) * SECONDS_PER_DAY * pool.life_days,
        ),
        lambda pool, steps: float(flash.budget(pool, steps)),
        move_cost=lambda pool: float(flash.move_copies(pool)),
        unit="TB",
        scale=TB,
    )


def controller_busy(date: Date) -> Block:
    """``controller-busy``: share of the controllers left after failures survived."""
    arrays = {a.name: a for a in date.estate.arrays if controllers.controller_cost(a)}

    def cost(pool: Pool) -> tuple[float, ...]:
        factors = controllers.controller_cost(arrays[pool.array])
        assert factors
        return factors.read, factors.write, factors.byte, factors.byte

    ceilings = [a.controller_ceiling / PPM for a in arrays.values()]
    return _of_arrays(
        date,
        "controller-busy",
        list(arrays),
        date.loads,
        cost,
        ceilings,
        unit="%",
        scale=PERCENT / PPM,
    )


def array_volumes(date: Date) -> Block:
    """``array-volumes``: volumes on the array."""
    limited = [a for a in date.estate.arrays if a.volumes_at_most]
    return _of_arrays(
        date,
        "array-volumes",
        [a.name for a in limited],
        date.still() + 1,
        lambda _: (1.0,),
        [float(a.volumes_at_most) for a in limited],
        unit="volumes",
    )


RULES: tuple[Callable[[Date], Block], ...] = (
    pool_room,
    pool_thin,
    pool_busy,
    pool_wear,
    controller_busy,
    array_volumes,
)


def _steps(pool: Pool) -> int:
    return pool.expansion.at_most if pool.expansion else 0


def _has_room_row(pool: Pool) -> bool:
    return pool.takes_volumes or capacity.usable(pool) > 0


def _busy_factors(pool: Pool) -> tuple[float, ...]:
    cost = drives.busy_cost(pool)
    assert cost
    return cost.read, cost.write, cost.read_byte, cost.write_byte


def _of_pools(  # noqa: PLR0913
    date: Date,
    code: str,
    pools: Sequence[Pool],
    asks: Floats,
    cost: Callable[[Pool], tuple[float, ...]],
    limit: Callable[[Pool, int], float],
    *,
    move_cost: Callable[[Pool], float] = lambda _: 0.0,
    unit: str,
    scale: float = 1.0,
) -> Block:
    """Build a block whose owners are pools."""
    every = date.estate.pools
    index = {pool.id: i for i, pool in enumerate(pools)}
    nothing = (0.0,) * asks.shape[2]
    return Block(
        code=code,
        owners=tuple(index),
        owner_of=np.array([index.get(p.id, NOBODY) for p in every], dtype=np.int64),
        asks=asks,
        costs=np.array([cost(p) if p.id in index else nothing for p in every]),
        limits=np.array(
            [
                [limit(p, min(k, _steps(p))) for k in range(date.most_steps + 1)]
                for p in pools
            ]
        ),
        home=date.home,
        moved=date.copied,
        move_costs=np.array([move_cost(p) if p.id in index else 0.0 for p in every]),
        unit=unit,
        scale=scale,
    )


def _of_arrays(  # noqa: PLR0913
    date: Date,
    code: str,
    arrays: Sequence[str],
    asks: Floats,
    cost: Callable[[Pool], tuple[float, ...]],
    limit: Sequence[float],
    *,
    unit: str,
    scale: float = 1.0,
) -> Block:
    """Build a block whose owners are arrays; expansion of pools does not change it."""
    every = date.estate.pools
    index = {name: i for i, name in enumerate(arrays)}
    nothing = (0.0,) * asks.shape[2]
    return Block(
        code=code,
        owners=tuple(index),
        owner_of=np.array([index.get(p.array, NOBODY) for p in every], dtype=np.int64),
        asks=asks,
        costs=np.array([cost(p) if p.array in index else nothing for p in every]),
        limits=np.repeat(np.array(limit)[:, None], date.most_steps + 1, axis=1),
        home=date.home,
        moved=date.copied,
        move_costs=np.zeros(len(every)),
        unit=unit,
        scale=scale,
    )
