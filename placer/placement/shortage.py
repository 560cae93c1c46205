"""When no placement keeps every limit: how much of which limit is missing, and where.

The limits are allowed to be overrun at a price, each in shares of itself; what is left
over at the least price is the shortage, in trade units.
"""

from collections import Counter
from dataclasses import dataclass

import numpy as np

from placer.candidates.block import Block, Floats, Ints
from placer.candidates.table import Candidates
from placer.candidates.uses import limit_of
from placer.physics.drives import busy_drives
from placer.placement import nights, rows, solver
from placer.placement.layout import Layout
from placer.placement.matrix import Program, RowKey
from placer.plan import Shortage
from placer.units import GIB
from placer.words import count, figure

SMALLEST = 1e-5
REMEDIES = {
    "pool-room": "free room in the pool, buy drives, or raise its fill ceiling",
    "pool-thin": "raise the provisioned ratio, or shrink what is provisioned",
    "pool-busy": "add drives of this media, or take load off in this hour",
    "pool-wear": "add drives, ask for a shorter life, or keep heavy writers elsewhere",
    "controller-busy": (
        "take requests off this array in this hour or add controllers; "
        "a shelf of drives is no remedy"
    ),
    "array-volumes": "raise the number of volumes the array may hold, or merge volumes",
    "array-hosts": "raise the number of hosts the array may serve",
    "nights-in": "more or longer windows, or more MB/s into the array",
    "nights-out": "more or longer windows, or more MB/s out of the array",
    "nights-rate": "more or longer windows, or more MB/s in them",
    "nights-cutovers": "more windows, or more cutovers in each",
}


@dataclass(frozen=True)
class Nearest:
    """The solution that overruns its limits least, and by how much each row.

    ``short`` holds (what the row stands for, share of the limit).
    """

    x: Floats
    short: tuple[tuple[RowKey, float], ...]


def homeless(candidates: Candidates) -> tuple[Shortage, ...]:
    """Name the volumes that no pool may take, each with the reasons."""
    return tuple(
        _homeless_one(candidates, int(row))
        for row in np.flatnonzero(~candidates.allowed.any(axis=1))
    )


def _homeless_one(candidates: Candidates, row: int) -> Shortage:
    volume = candidates.volumes[row]
    said = [
        (refusal.code, f"{pool.id}: {refusal.sentence}")
        for pool in candidates.pools
        for refusal in candidates.reach.refusals(volume, pool)
    ]
    commonest = Counter(code for code, _ in said).most_common(1)[0][0]
    return Shortage(
        limit=commonest,
        where=volume.id,
        amount=1,
        unit="volumes",
        sentence=f"no pool may take {volume.id}: " + "; ".join(s for _, s in said),
        remedy="relax one of the rules named, or add a pool that they allow",
    )


def contradiction() -> tuple[Shortage, ...]:
    """Say that the rules themselves leave no placement, whatever the limits."""
    return (
        Shortage(
            limit="rules",
            where="",
            amount=1,
            unit="placements",
            sentence="the rules (apart, together, only on, never on, leave where it is)"
            " contradict each other: even without any limit no placement keeps them",
            remedy="relax the rules one at a time",
        ),
    )


def nearest(layout: Layout, seconds: float) -> Nearest | None:
    """Return the placement with the least sum of overruns, None if rules forbid all."""
    program = rows.program(layout, guarded=False)
    soft = np.array(
        [i for i, k in enumerate(program.keys) if _may_overrun(program, i, k)]
    )
    elastic = program.elastic(soft)
    cost = np.concatenate([np.zeros(program.columns), np.ones(len(soft))])
    answer = solver.solve(elastic, cost, seconds=seconds, gap=1e-3)
    if answer.x is None:
        return None
    over = answer.x[program.columns :]
    short = [
        (program.keys[soft[i]], float(over[i])) for i in np.flatnonzero(over > SMALLEST)
    ]
    return Nearest(answer.x[: program.columns], tuple(short))


def _may_overrun(program: Program, row: int, key: RowKey) -> bool:
    """Rules stay hard, and rows that set a marker: only those take one off."""
    start, end = program.matrix.indptr[row : row + 2]
    sets_marker = key.hour < 0 and bool((program.matrix.data[start:end] < 0).any())
    return key.code in REMEDIES and not sets_marker


def shortages(layout: Layout, found: Nearest) -> tuple[Shortage, ...]:
    """Word the overruns: for each limit and owner the hour that lacks most."""
    # Of hours that lack the same the first is named: it comes last and stays.
    by_share = sorted(found.short, key=lambda pair: (pair[1], -pair[0].hour))
    worst = {(key.code, key.owner): key.hour for key, _ in by_share}
    words = Words(layout, layout.places(found.x), layout.bought(found.x))
    return tuple(words.say(*where, hour) for where, hour in sorted(worst.items()))


class Words:
    """Puts the overruns of one placement into trade units."""

    def __init__(self, layout: Layout, places: Ints, bought: Ints) -> None:
        self._layout, self._candidates = layout, layout.candidates
        self._places, self._bought = places, bought
        self._blocks = {block.code: block for block in self._candidates.limits}

    def say(self, code: str, owner: str, hour: int) -> Shortage:
        """Return the shortage of one limit."""
        block = self._blocks.get(code)
        if block is None:
            hosts = code == "array-hosts"
            return self._of_hosts(owner) if hosts else self._of_nights(code, owner)
        at = block.owners.index(owner)
        use = float(block.use(self._places)[at, hour])
        limit = limit_of(block, at, self._bought)
        amount, unit = self._amount(block, at, hour, use, limit)
        label = self._candidates.estate.hours[hour].label if block.hourly else ""
        when = f" at {label}" if label else ""
        return Shortage(
            limit=code,
            where=owner,
            amount=amount,
            unit=unit,
            hour=label,
            sentence=f"{owner}: {figure(amount)} {unit} short{when}",
            remedy=REMEDIES[code],
        )

    def _amount(
        self, block: Block, owner: int, hour: int, use: float, limit: float
    ) -> tuple[float, str]:
        if block.code == "controller-busy":
            requests = self._requests(block, owner, hour)
            return requests * (use - limit) / use, "requests/s"
        if block.code == "pool-busy":
            drives = max(self._drives(block, owner), 1)
            return 100 * (use - limit) / drives, "busy-percent"
        return (use - limit) / block.scale, block.unit

    def _requests(self, block: Block, owner: int, hour: int) -> float:
        """Return the requests/s that the owner's controllers are asked for."""
        there = block.owner_of[self._places] == owner
        return float(block.asks[there, hour, :2].sum())

    def _drives(self, block: Block, owner: int) -> int:
        pool = int(np.flatnonzero(block.owner_of == owner)[0])
        return busy_drives(self._candidates.pools[pool], int(self._bought[pool]))

    def _of_nights(self, code: str, owner: str) -> Shortage:
        amount, unit = self._missing_in_nights(code, owner)
        where = owner or "all windows"
        return Shortage(
            limit=code,
            where=where,
            amount=amount,
            unit=unit,
            sentence=f"{where}: the windows carry {figure(amount)} {unit} too little",
            remedy=REMEDIES[code],
        )

    def _missing_in_nights(self, code: str, owner: str) -> tuple[float, str]:
        candidates = self._candidates
        moving = np.flatnonzero(self._places != candidates.home)
        for known, who, moved, most in nights.capacities(candidates):
            if (known, who) == (code, owner):
                total = sum(moved(int(v), int(self._places[v])) for v in moving)
                return (total - most) / GIB, "GiB"
        groups = sum(not set(moving).isdisjoint(g) for g in self._layout.groups)
        return groups - (nights.cutovers(candidates.estate) or 0), "cutovers"

    def _of_hosts(self, owner: str) -> Shortage:
        candidates = self._candidates
        array = candidates.reach.arrays[owner]
        here = {
            volume.host
            for volume, pool in zip(candidates.volumes, self._places, strict=True)
            if candidates.pools[pool].array == owner and volume.host
        }
        missing = len(here) - array.hosts_at_most
        return Shortage(
            limit="array-hosts",
            where=owner,
            amount=missing,
            unit="hosts",
            sentence=f"{owner}: {count(missing, 'host')} short",
            remedy=REMEDIES["array-hosts"],
        )
