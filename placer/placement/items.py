"""Items: volumes that must be placed in one pool together, as one thing to place."""

from dataclasses import dataclass
from functools import cached_property

import networkx as nx
import numpy as np

from placer.candidates.block import Block, Floats, Ints
from placer.candidates.table import Candidates
from placer.estate import Estate, Level, RuleKind


@dataclass(frozen=True)
class Items:
    """The items of an estate, each a tuple of rows of the candidates."""

    candidates: Candidates
    members: tuple[tuple[int, ...], ...]

    @cached_property
    def places(self) -> tuple[tuple[int, int], ...]:
        """Every allowed (item, pool)."""
        allowed = self.candidates.allowed
        return tuple(
            (i, p)
            for i, members in enumerate(self.members)
            for p in range(allowed.shape[1])
            if allowed[list(members), p].all()
        )

    @cached_property
    def of_volume(self) -> Ints:
        """Item of each volume."""
        found = np.zeros(len(self.candidates.volumes), dtype=np.int64)
        for i, members in enumerate(self.members):
            found[list(members)] = i
        return found

    def worth(self, table: Floats) -> Floats:
        """Return a (volumes, pools) table summed over the members of each place."""
        return np.array([table[list(self.members[i]), p].sum() for i, p in self.places])

    def column(self, block: Block, item: int, pool: int) -> Floats:
        """Return the use of a block by an item in a pool, (hours,)."""
        parts = [block.column(v, pool) for v in self.members[item]]
        total: Floats = np.sum(parts, axis=0)
        return total


def items(candidates: Candidates) -> Items:
    """Merge volumes that a rule places together in one pool."""
    row = {volume.id: i for i, volume in enumerate(candidates.volumes)}
    graph: nx.Graph[int] = nx.Graph()
    graph.add_nodes_from(range(len(candidates.volumes)))
    for group in pooled(candidates.estate):
        nx.add_path(graph, [row[volume] for volume in group])
    parts = sorted(tuple(sorted(part)) for part in nx.connected_components(graph))
    return Items(candidates, tuple(parts))


def pooled(estate: Estate) -> list[tuple[str, ...]]:
    """Return the volumes of each rule that asks for one pool."""
    return [
        rule.volumes
        for rule in estate.rules
        if rule.kind is RuleKind.TOGETHER and rule.level is Level.POOL
    ]
