"""The rows of the placement program, one function per rule of the register.

``ROWS`` is the list to audit by eye.
"""

from collections.abc import Callable, Iterator
from math import gcd

import numpy as np

from placer.candidates.block import Block
from placer.estate import Estate, Level, Rule, RuleKind
from placer.placement import nights
from placer.placement.layout import Layout
from placer.placement.matrix import Builder, Program, RowKey


def one_place(builder: Builder, layout: Layout) -> None:
    """``one-place``: each item in exactly one pool."""
    every = range(len(layout.estate.pools))
    for item in range(len(layout.items.members)):
        columns = layout.columns_in(item, every)
        builder.equal(RowKey("one-place", str(item)), columns, np.ones(len(columns)), 1)


def limits(builder: Builder, layout: Layout) -> None:
    """Add the limits that add up over volumes, hour by hour, less what steps add."""
    for block in layout.candidates.limits:
        for owner in range(len(block.owners)):
            _add_limit(builder, layout, block, owner)


def _add_limit(builder: Builder, layout: Layout, block: Block, owner: int) -> None:
    places = [
        (column, item, pool)
        for (item, pool), column in layout.place_column.items()
        if block.owner_of[pool] == owner
    ]
    if not places:
        return
    uses = np.array(
        [layout.items.column(block, item, pool) for _, item, pool in places]
    )
    steps = _gains(layout, block, owner)
    columns = [column for column, _, _ in places] + [column for column, _ in steps]
    gains = np.array([-gain for _, gain in steps])
    for hour in range(block.hours):
        key = RowKey(block.code, block.owners[owner], hour)
        values = np.concatenate([uses[:, hour], gains])
        builder.at_most(key, columns, values, float(block.limits[owner, 0]))


def _gains(layout: Layout, block: Block, owner: int) -> list[tuple[int, float]]:
    """Return what each step of the owner's pool adds to its limit."""
    gained = np.diff(block.limits[owner])
    return [
        (column, float(gained[k - 1]))
        for (pool, k), column in layout.step_column.items()
        if block.owner_of[pool] == owner
    ]


def array_hosts(builder: Builder, layout: Layout) -> None:
    """``array-hosts``: distinct hosts on an array."""
    for array in layout.estate.arrays:
        if array.hosts_at_most:
            columns = [c for (_, a), c in layout.host_column.items() if a == array.name]
            key = RowKey("array-hosts", array.name)
            builder.at_most(key, columns, np.ones(len(columns)), array.hosts_at_most)
    for volume, item in zip(layout.estate.volumes, layout.items.of_volume, strict=True):
        for name, pools in _pools_of(layout.estate, Level.ARRAY).items():
            marker = layout.host_column.get((volume.host, name))
            columns = layout.columns_in(int(item), pools)
            if marker is not None and columns:
                _implies(builder, RowKey("array-hosts", volume.id), columns, marker)


def apart(builder: Builder, layout: Layout) -> None:
    """``apart``: at most one of the volumes in each pool, array or site."""
    for rule, group in _groups(layout, RuleKind.APART):
        for name, pools in _pools_of(layout.estate, rule.level).items():
            columns = [c for item in group for c in layout.columns_in(item, pools)]
            if len(columns) > 1:
                key = RowKey("apart", f"{rule.place} {name}")
                builder.at_most(key, columns, np.ones(len(columns)), 1)


def together(builder: Builder, layout: Layout) -> None:
    """``together`` on arrays and sites: the first member decides for the others."""
    for rule, group in _groups(layout, RuleKind.TOGETHER):
        for name, pools in _pools_of(layout.estate, rule.level).items():
            first = layout.columns_in(group[0], pools)
            for item in set(group[1:]) - {group[0]}:
                columns = layout.columns_in(item, pools)
                values = np.repeat([1.0, -1.0], [len(first), len(columns)])
                key = RowKey("together", f"{rule.place} {name}")
                builder.equal(key, first + columns, values, 0)


def budget(builder: Builder, layout: Layout) -> None:
    """``budget`` and ``steps``: price of all steps; no step without the one before."""
    if not layout.steps:
        return
    prices = [_price(layout, pool) for pool, _ in layout.steps]
    unit = gcd(*prices) or 1
    values = np.array(prices, dtype=float) / unit
    columns = list(layout.step_column.values())
    budget = layout.estate.policy.budget // unit
    builder.at_most(RowKey("budget"), columns, values, budget)
    for (pool, k), column in layout.step_column.items():
        if k > 1:
            before = layout.step_column[pool, k - 1]
            _implies(builder, RowKey("steps"), [column], before)


def carried(builder: Builder, layout: Layout) -> None:
    """Add the bytes and cutovers that the windows carry (see ``nights``)."""
    for code, owner, moves, at_most in nights.capacities(layout.candidates):
        places = [
            (column, sum(moves(v, pool) for v in layout.items.members[item]))
            for (item, pool), column in layout.place_column.items()
        ]
        used = [(column, value) for column, value in places if value]
        columns, values = [c for c, _ in used], np.array([v for _, v in used])
        builder.at_most(RowKey(code, owner), columns, values, at_most)
    _cutovers(builder, layout)


def _cutovers(builder: Builder, layout: Layout) -> None:
    most = nights.cutovers(layout.estate)
    if most is None or not layout.groups:
        return
    home = layout.candidates.home
    for number, group in enumerate(layout.groups):
        marker = layout.group_column(number)
        for volume in group:
            item = int(layout.items.of_volume[volume])
            away = [p for p in range(len(layout.estate.pools)) if p != home[volume]]
            columns = layout.columns_in(item, away)
            if columns:
                _implies(builder, RowKey("nights-cutovers"), columns, marker)
    columns = [layout.group_column(i) for i in range(len(layout.groups))]
    builder.at_most(RowKey("nights-cutovers"), columns, np.ones(len(columns)), most)


ROWS: tuple[Callable[[Builder, Layout], None], ...] = (
    one_place,
    limits,
    array_hosts,
    apart,
    together,
    budget,
    carried,
)


def program(layout: Layout, *, guarded: bool = True) -> Program:
    """Return the whole placement program; unguarded for measuring overruns."""
    builder = Builder(layout.columns, len(layout.items.places), guarded)
    for rows in ROWS:
        rows(builder, layout)
    return builder.build()


def _implies(builder: Builder, key: RowKey, columns: list[int], marker: int) -> None:
    """Add sum of columns <= marker (at most one of the columns is 1)."""
    values = np.append(np.ones(len(columns)), -1.0)
    builder.at_most(key, [*columns, marker], values, 0)


def _price(layout: Layout, pool: int) -> int:
    expansion = layout.estate.pools[pool].expansion
    return expansion.price if expansion else 0


def _groups(layout: Layout, kind: RuleKind) -> Iterator[tuple[Rule, list[int]]]:
    """Yield rules of a kind with the items of their volumes.

    A rule that keeps volumes together in one pool is in the items already.
    """
    row = {volume.id: i for i, volume in enumerate(layout.estate.volumes)}
    for rule in layout.estate.rules:
        pooled = kind is RuleKind.TOGETHER and rule.level is Level.POOL
        if rule.kind is kind and not pooled:
            yield rule, [int(layout.items.of_volume[row[v]]) for v in rule.volumes]


def _pools_of(estate: Estate, level: Level) -> dict[str, list[int]]:
    """Return the pools of each pool, array or site."""
    sites = {array.name: array.site for array in estate.arrays}
    found: dict[str, list[int]] = {}
    for i, pool in enumerate(estate.pools):
        names = {
            Level.POOL: pool.id,
            Level.ARRAY: pool.array,
            Level.SITE: sites[pool.array],
        }
        found.setdefault(names[level], []).append(i)
    return found
