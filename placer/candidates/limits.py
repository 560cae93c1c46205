"""The limits of an estate that add up over volumes, one function per rule.

``limits`` is the list to audit by eye: each function gives the block of one rule of the
register, for the sizes and loads of a date.
"""

from collections.abc import Callable, Mapping, Sequence
from dataclasses import astuple, dataclass
from fractions import Fraction
from functools import cached_property

import numpy as np

from placer.candidates.block import Block, Floats, Ints
from placer.candidates.loads import loads
from placer.estate import Array, Estate, Media, Pool
from placer.physics import capacity, controllers, demand, drives, flash
from placer.physics.cache import kept_hits
from placer.units import GIB, PERCENT, PPM, SECONDS_PER_DAY, TB

NOBODY = -1
READS = (0, 2, 4, 5)
SATURATED = 0.95

Factors = tuple[float, ...]


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
    def drive_loads(self) -> Floats:
        """Loads as drives see them (volumes, hours, 6).

        Reads, writes, bytes of each, random reads, and bytes of sequential reads.
        """
        random = np.array([v.random_reads / PPM for v in self.estate.volumes])[:, None]
        reads, read_bytes = self.loads[:, :, 0], self.loads[:, :, 2]
        kinds = np.stack([reads * random, read_bytes * (1 - random)], axis=2)
        return np.concatenate([self.loads, kinds], axis=2)

    @cached_property
    def room(self) -> Floats:
        """Room before reduction, snapshots included (volumes,) [B]."""
        volumes = self.estate.volumes
        return np.array([demand.room(v, self.months) for v in volumes], dtype=float)

    @cached_property
    def copied(self) -> Floats:
        """What a move carries (volumes,) [B]."""
        months = demand.months_of_nights(self.estate)
        sizes = [demand.size(volume, months) for volume in self.estate.volumes]
        return np.array(sizes, dtype=float)

    @cached_property
    def hits(self) -> Floats:
        """Share of reads that each pool's array answers from its cache."""
        arrays = {array.name: array for array in self.estate.arrays}
        shares = [
            [
                kept_hits(v.read_hits, arrays[v.array], arrays[p.array])
                for p in self.estate.pools
            ]
            for v in self.estate.volumes
        ]
        return np.array(shares).reshape(-1, len(self.estate.pools))

    @cached_property
    def home(self) -> Ints:
        """Index of each volume's pool today (volumes,)."""
        index = {pool.id: i for i, pool in enumerate(self.estate.pools)}
        return np.array([index[v.home] for v in self.estate.volumes], dtype=np.int64)

    @cached_property
    def most_steps(self) -> int:
        """Most expansion steps any pool may buy."""
        return max((_steps(pool) for pool in self.estate.pools), default=0)


def limits(estate: Estate, months: int) -> tuple[Block, ...]:
    """Return all blocks that have an owner, in the order of the register."""
    date = Date(estate, months)
    return tuple(block for rule in RULES if (block := rule(date)).owners)


def pool_room(date: Date) -> Block:
    """``pool-room``: landed bytes within fill ceiling and least free."""
    pools = [pool for pool in date.estate.pools if _has_room_row(pool)]
    return _block(
        date,
        Kind("pool-room", "GiB", GIB),
        date.room[:, None, None],
        _by_pool(date, pools, capacity.room),
        lambda pool: (PPM / pool.reduction,),
    )


def pool_thin(date: Date) -> Block:
    """``pool-thin``: provisioned bytes within the ratio to usable."""
    pools = [pool for pool in date.estate.pools if pool.thin_at_most]
    provisioned = np.array([v.provisioned for v in date.estate.volumes], dtype=float)
    return _block(
        date,
        Kind("pool-thin", "GiB", GIB),
        provisioned[:, None, None],
        _by_pool(date, pools, capacity.thin_room),
        lambda _: (1.0,),
    )


def pool_busy(date: Date) -> Block:
    """``pool-busy``: drives kept busy in each hour within the ceiling."""
    costs = {pool.id: drives.busy_cost(pool) for pool in date.estate.pools}
    pools = [pool for pool in date.estate.pools if costs[pool.id]]
    return _block(
        date,
        Kind("pool-busy", "drives", load=True, hourly=True, reads=READS),
        date.drive_loads,
        _by_pool(date, pools, _busy_at_most),
        lambda pool: _factors(costs[pool.id]),
    )


def pool_wear(date: Date) -> Block:
    """``pool-wear``: bytes at the drives over the life asked within the budget."""
    pools = [pool for pool in date.estate.pools if flash.is_worn(pool)]
    return _block(
        date,
        Kind("pool-wear", "TB", TB, load=True),
        date.loads[:, :, 3].mean(axis=1)[:, None, None],
        _by_pool(date, pools, flash.budget),
        lambda pool: (
            float(flash.host_copies(pool)) * SECONDS_PER_DAY * pool.life_days,
        ),
        lambda pool: float(flash.move_copies(pool)),
    )


def controller_busy(date: Date) -> Block:
    """``controller-busy``: share of the controllers left after failures survived."""
    costs = {a.name: controllers.controller_cost(a) for a in date.estate.arrays}
    arrays = [array for array in date.estate.arrays if costs[array.name]]
    return _block(
        date,
        Kind("controller-busy", "%", PERCENT / PPM, load=True, hourly=True),
        date.loads,
        _by_array(date, arrays, lambda array: array.controller_ceiling / PPM),
        lambda pool: _controller_factors(costs[pool.array]),
    )


def array_volumes(date: Date) -> Block:
    """``array-volumes``: volumes on the array."""
    arrays = [array for array in date.estate.arrays if array.volumes_at_most]
    return _block(
        date,
        Kind("array-volumes", "volumes"),
        np.ones((len(date.estate.volumes), 1, 1)),
        _by_array(date, arrays, lambda array: float(array.volumes_at_most)),
        lambda _: (1.0,),
    )


RULES: tuple[Callable[[Date], Block], ...] = (
    pool_room,
    pool_thin,
    pool_busy,
    pool_wear,
    controller_busy,
    array_volumes,
)


def latent(date: Date) -> Floats:
    """Return what loads become (volumes, pools): saturated drives hold demand back."""
    policy, pools = date.estate.policy, date.estate.pools
    crowded = np.array([_saturated(date, i) for i in range(len(pools))])[date.home]
    faster = np.array([pool.media is Media.FLASH for pool in pools])
    return np.where(np.outer(crowded, faster), policy.latent_demand / PPM, 1.0)


def _saturated(date: Date, column: int) -> bool:
    """Return whether a spinning pool could not serve more today."""
    pool = date.estate.pools[column]
    cost = drives.busy_cost(pool)
    if pool.media is not Media.SPINNING or cost is None:
        return False
    if pool.busy_measured:
        return pool.busy_measured >= SATURATED * PPM
    today = Date(date.estate, 0)
    here = today.home == column
    missed = 1 - np.outer(today.hits[here, column], np.isin(np.arange(6), READS))
    asked = (today.drive_loads[here] * missed[:, None, :]).sum(axis=0)
    busy = asked @ np.array(_factors(cost)) / max(drives.busy_drives(pool), 1)
    return bool(busy.max(initial=0.0) >= SATURATED)


@dataclass(frozen=True, slots=True)
class Kind:
    """Rule of a block, unit of its report, and the limit's own units in one of it.

    ``load`` tells that the asks are load, which may swell on faster media; ``reads``
    which of the asks a read hit spares the owner.
    """

    code: str
    unit: str
    scale: float = 1.0
    load: bool = False
    hourly: bool = False
    reads: tuple[int, ...] = ()


@dataclass(frozen=True, slots=True)
class Owners:
    """Whose limits: what each owner is allowed by steps, and the owner of a pool."""

    limits: Mapping[str, Sequence[float]]
    of: Callable[[Pool], str]


def _by_pool(
    date: Date, pools: Sequence[Pool], limit: Callable[[Pool, int], float | Fraction]
) -> Owners:
    steps = range(date.most_steps + 1)
    limits = {p.id: [float(limit(p, min(k, _steps(p)))) for k in steps] for p in pools}
    return Owners(limits, lambda pool: pool.id)


def _by_array(
    date: Date, arrays: Sequence[Array], limit: Callable[[Array], float]
) -> Owners:
    """Expansion of pools does not change what an array is allowed."""
    limits = {a.name: [limit(a)] * (date.most_steps + 1) for a in arrays}
    return Owners(limits, lambda pool: pool.array)


def _block(
    date: Date,
    kind: Kind,
    asks: Floats,
    owners: Owners,
    cost: Callable[[Pool], Factors],
    move_cost: Callable[[Pool], float] = lambda _: 0.0,
) -> Block:
    names = tuple(owners.limits)
    held = [owners.of(pool) for pool in date.estate.pools]
    nothing: Factors = (0.0,) * asks.shape[2]
    pools = list(zip(held, date.estate.pools, strict=True))
    costs = np.array([cost(p) if o in owners.limits else nothing for o, p in pools])
    spared = np.isin(np.arange(asks.shape[2]), kind.reads)
    return Block(
        code=kind.code,
        owners=names,
        owner_of=np.array(
            [names.index(o) if o in owners.limits else NOBODY for o in held],
            dtype=np.int64,
        ),
        asks=asks,
        costs=costs,
        ease=costs * spared,
        eased=date.hits,
        swollen=latent(date) if kind.load else np.ones_like(date.hits),
        hourly=kind.hourly,
        limits=np.array([owners.limits[name] for name in names]),
        home=date.home,
        moved=date.copied,
        move_costs=np.array(
            [move_cost(p) if o in owners.limits else 0.0 for o, p in pools]
        ),
        unit=kind.unit,
        scale=kind.scale,
    )


def _steps(pool: Pool) -> int:
    return pool.expansion.at_most if pool.expansion else 0


def _has_room_row(pool: Pool) -> bool:
    return pool.takes_volumes or capacity.usable(pool) > 0


def _busy_at_most(pool: Pool, steps: int) -> float:
    return pool.busy_ceiling / PPM * drives.busy_drives(pool, steps)


def _factors(cost: drives.BusyCost | None) -> Factors:
    assert cost
    return astuple(cost)


def _controller_factors(cost: controllers.ControllerCost | None) -> Factors:
    assert cost
    return cost.read, cost.write, cost.byte, cost.byte
