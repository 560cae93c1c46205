"""What each column of the placement program means."""

from collections.abc import Iterable
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from placer.candidates.block import Floats, Ints
from placer.candidates.groups import groups
from placer.candidates.table import Candidates
from placer.estate import Estate
from placer.placement import nights
from placer.placement.items import Items, items


@dataclass(frozen=True)
class Layout:
    """Columns: item places, then expansion steps, hosts on arrays, groups that move.

    Attributes
    ----------
    items
        The items to place; their places are the first columns.
    steps
        (pool, k): step k of a pool is bought, and all before it.
    hosts
        (host, array): the host has volumes on the array.
    groups
        Applications, as sets of rows that cut over together; none where cutovers are
        not limited.
    """

    items: Items
    steps: tuple[tuple[int, int], ...]
    hosts: tuple[tuple[str, str], ...]
    groups: tuple[tuple[int, ...], ...]

    @property
    def candidates(self) -> Candidates:
        """The table behind the columns."""
        return self.items.candidates

    @property
    def estate(self) -> Estate:
        """The estate behind the columns."""
        return self.candidates.estate

    @cached_property
    def columns(self) -> int:
        """Number of columns."""
        return len(self.first_group_base) + len(self.groups)

    @cached_property
    def first_group_base(self) -> range:
        """Columns before the groups."""
        return range(len(self.items.places) + len(self.steps) + len(self.hosts))

    @cached_property
    def place_column(self) -> dict[tuple[int, int], int]:
        """Column of each (item, pool)."""
        return {place: i for i, place in enumerate(self.items.places)}

    @cached_property
    def step_column(self) -> dict[tuple[int, int], int]:
        """Column of each (pool, step)."""
        start = len(self.items.places)
        return {step: start + i for i, step in enumerate(self.steps)}

    @cached_property
    def host_column(self) -> dict[tuple[str, str], int]:
        """Column of each (host, array)."""
        start = len(self.items.places) + len(self.steps)
        return {pair: start + i for i, pair in enumerate(self.hosts)}

    def group_column(self, group: int) -> int:
        """Return the column that tells whether a group moves at all."""
        return len(self.first_group_base) + group

    def columns_in(self, item: int, pools: Iterable[int]) -> list[int]:
        """Return the columns that put an item into one of the pools."""
        keys = ((item, pool) for pool in pools)
        return [self.place_column[k] for k in keys if k in self.place_column]

    def places(self, x: Floats) -> Ints:
        """Return the pool of each volume in a solution."""
        found = np.zeros(len(self.candidates.volumes), dtype=np.int64)
        for column in np.flatnonzero(x[: len(self.items.places)] > 0.5):
            item, pool = self.items.places[column]
            found[list(self.items.members[item])] = pool
        return found

    def bought(self, x: Floats) -> Ints:
        """Return the expansion steps of each pool in a solution."""
        found = np.zeros(len(self.estate.pools), dtype=np.int64)
        for (pool, _), column in self.step_column.items():
            found[pool] += int(x[column] > 0.5)
        return found

    def solution(self, places: Ints, bought: Ints) -> Floats:
        """Return the solution that means this placement."""
        x = np.zeros(self.columns)
        for i, members in enumerate(self.items.members):
            x[self.place_column[i, int(places[members[0]])]] = 1.0
        for (pool, k), column in self.step_column.items():
            x[column] = float(k <= bought[pool])
        self._mark_hosts(x, places)
        self._mark_groups(x, places)
        return x

    def _mark_hosts(self, x: Floats, places: Ints) -> None:
        pools = self.estate.pools
        for volume, pool in zip(self.estate.volumes, places, strict=True):
            column = self.host_column.get((volume.host, pools[pool].array))
            if column is not None:
                x[column] = 1.0

    def _mark_groups(self, x: Floats, places: Ints) -> None:
        home = self.candidates.home
        for i, group in enumerate(self.groups):
            rows = list(group)
            x[self.group_column(i)] = float((places[rows] != home[rows]).any())


def layout(candidates: Candidates) -> Layout:
    """Lay out the columns for the candidates of an estate."""
    estate = candidates.estate
    steps = tuple(
        (i, k)
        for i, pool in enumerate(estate.pools)
        if pool.expansion
        for k in range(1, pool.expansion.at_most + 1)
    )
    hosts = sorted({volume.host for volume in estate.volumes if volume.host})
    limited = [array.name for array in estate.arrays if array.hosts_at_most]
    pairs = tuple((host, array) for array in limited for host in hosts)
    limited_cutovers = nights.cutovers(estate) is not None
    every = range(len(estate.volumes)) if limited_cutovers else ()
    return Layout(items(candidates), steps, pairs, tuple(groups(estate.volumes, every)))
