"""One plan before the audit, with the look-ups every rule needs."""

from collections.abc import Iterable, Mapping
from functools import cached_property

from placer.audit.caches import Caches
from placer.audit.demand import Demand, demand_at, months_of_nights
from placer.audit.latent import saturated
from placer.estate import Array, Estate, Media, Route, Volume, Window
from placer.plan import Booking, Move, Placed, Plan


class Case:
    """An estate and a plan for it.

    A plan may say anything: what names nothing known is left out of the look-ups and
    is said by the rules ``one-place`` and ``move-list``.
    """

    def __init__(self, estate: Estate, plan: Plan) -> None:
        self.estate = estate
        self.plan = plan
        self.volumes = {volume.id: volume for volume in estate.volumes}
        self.pools = {pool.id: pool for pool in estate.pools}
        self.arrays = {array.name: array for array in estate.arrays}
        self.homes = {volume.id: volume.home for volume in estate.volumes}

    @cached_property
    def today(self) -> Demand:
        """Demand of today."""
        return demand_at(self.estate, 0)

    @cached_property
    def nights(self) -> Demand:
        """Demand at the end of the last window."""
        return demand_at(self.estate, months_of_nights(self.estate))

    @cached_property
    def horizon(self) -> Demand:
        """Demand at the growth horizon."""
        return demand_at(self.estate, self.estate.policy.horizon_months)

    @cached_property
    def caches(self) -> Caches:
        """The caches of the arrays."""
        return Caches(self.estate)

    @cached_property
    def saturated(self) -> frozenset[str]:
        """Pools whose volumes would ask for more, were they served by flash."""
        return saturated(self.estate, self.caches, self.today)

    @cached_property
    def placed(self) -> dict[str, Placed]:
        """The first usable place the plan states for each volume."""
        known = (
            placed
            for placed in reversed(self.plan.placements)
            if placed.volume in self.volumes and placed.target in self.pools
        )
        return {placed.volume: placed for placed in known}

    @cached_property
    def targets(self) -> dict[str, str]:
        """Pool of every volume after the plan."""
        return self.homes | {
            name: placed.target for name, placed in self.placed.items()
        }

    @cached_property
    def movers(self) -> tuple[Volume, ...]:
        """Volumes that change their pool, in the order of the inventory."""
        return tuple(
            volume
            for volume in self.estate.volumes
            if self.targets[volume.id] != volume.home
        )

    @cached_property
    def steps(self) -> dict[str, int]:
        """Expansion steps bought of each pool."""
        bought: dict[str, int] = {}
        for row in self.plan.bought:
            bought[row.pool] = bought.get(row.pool, 0) + row.steps
        return bought

    @cached_property
    def moves(self) -> dict[str, Move]:
        """Moves between known pools by id, the first of each volume only."""
        first: dict[str, Move] = {}
        for move in self.plan.moves:
            known = {move.source, move.target} <= self.pools.keys()
            if known and move.volume in self.volumes:
                first.setdefault(move.volume, move)
        return {move.id: move for move in first.values()}

    @cached_property
    def windows(self) -> dict[str, list[Window]]:
        """Windows by name."""
        named: dict[str, list[Window]] = {}
        for window in self.estate.windows:
            named.setdefault(window.name, []).append(window)
        return named

    @cached_property
    def bookings(self) -> tuple[tuple[Booking, Move], ...]:
        """Bookings of known moves in known windows."""
        return tuple(
            (booking, self.moves[booking.move])
            for booking in self.plan.bookings
            if booking.move in self.moves and booking.window in self.windows
        )

    def array_of(self, pool: str) -> Array:
        """Return the array a pool belongs to."""
        return self.arrays[self.pools[pool].array]

    def site_of(self, pool: str) -> str:
        """Return the site a pool stands at."""
        return self.array_of(pool).site

    def changes_array(self, volume: Volume) -> bool:
        """Whether the plan takes a volume to another array."""
        return self.pools[self.targets[volume.id]].array != volume.array

    def route(self, source: str, target: str) -> Route | None:
        """Return the most exact route between two pools of different arrays."""
        near, far = self.array_of(source), self.array_of(target)
        ends = [
            (start, end)
            for start in (near.name, near.site)
            for end in (far.name, far.site)
        ]
        listed = {(r.source, r.target): r for r in reversed(self.estate.routes)}
        return next((listed[pair] for pair in ends if pair in listed), None)

    def held_back(self, volume: Volume, pool: str) -> bool:
        """Whether a volume asks more in a pool than its saturated home could serve."""
        flash = self.pools[pool].media is Media.FLASH
        return flash and volume.home in self.saturated

    def members(self, where: Mapping[str, str]) -> dict[str, list[Volume]]:
        """Return the volumes that stand in each pool."""
        standing: dict[str, list[Volume]] = {pool: [] for pool in self.pools}
        for volume in self.estate.volumes:
            standing[where[volume.id]].append(volume)
        return standing

    def chains(self, volumes: Iterable[Volume]) -> list[set[str]]:
        """Return ids of volumes that share applications, directly or by a chain."""
        chains: list[tuple[set[str], set[str]]] = []
        for volume in volumes:
            names, ids = set(volume.applications), {volume.id}
            apart = []
            for chained, members in chains:
                if names & chained:
                    names |= chained
                    ids |= members
                else:
                    apart.append((chained, members))
            chains = [*apart, (names, ids)]
        return [ids for _, ids in chains]
