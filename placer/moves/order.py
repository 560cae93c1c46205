"""The order of groups: who gives room comes before those who wait for it.

Room is followed without time.  A group that does not fit waits for groups that sit in
the pools it lacks, and these may wait in turn: a directed graph leads from each group
over the limits it lacks to those who give there, and the nearest one that fits goes
first.  A ring of groups that wait for each other begins where free room allows.
"""

from collections.abc import Iterable, Sequence

import networkx as nx
import numpy as np
from numpy.typing import NDArray

from placer.moves.room import Room


def in_order(room: Room) -> list[int]:
    """Return the numbers of groups so that room is given before it is taken.

    Groups stand in order of rank.  That order is kept but for those who give room;
    groups that no order helps come last.
    """
    ranked = range(len(room.takes))
    order, blocked = _followed(room, ranked)
    if blocked:
        rings = _rings(room)
        other, still = _followed(room, sorted(ranked, key=lambda g: g not in rings))
        if len(still) < len(blocked):
            order, blocked = other, still
    return order + blocked


def _followed(room: Room, ranked: Iterable[int]) -> tuple[list[int], list[int]]:
    """Let groups go one after the other; return their order and who never fits."""
    pending, order, free = list(ranked), [], room.free.copy()
    while pending:
        lacks = (room.takes > free) & (room.takes > 0)
        group = _next(room, pending, lacks)
        if group is None:
            break
        pending.remove(group)
        order.append(group)
        free += room.gives[group] - room.takes[group]
    return order, pending


def _next(room: Room, pending: Sequence[int], lacks: NDArray[np.bool_]) -> int | None:
    """Return the first group that fits, or the nearest one that others wait for."""
    if not lacks[pending[0]].any():
        return pending[0]
    rank = {group: number for number, group in enumerate(pending)}
    waiting = _graph(room, pending, lacks)
    for first in pending:
        steps: dict[tuple[str, int], int] = dict(
            nx.single_source_shortest_path_length(waiting, ("group", first))
        )
        fitting = [
            (far, rank[number], number)
            for (kind, number), far in steps.items()
            if kind == "group" and not lacks[number].any()
        ]
        if fitting:
            return min(fitting)[2]
    return None


def _graph(
    room: Room, groups: Sequence[int], lacks: NDArray[np.bool_]
) -> "nx.DiGraph[tuple[str, int]]":
    """Return who waits for whom: group -> limit it lacks -> groups that give there."""
    graph: nx.DiGraph[tuple[str, int]] = nx.DiGraph()
    for group in groups:
        graph.add_node(("group", group))
        for owner in np.flatnonzero(lacks[group]):
            graph.add_edge(("group", group), ("limit", int(owner)))
        for owner in np.flatnonzero(room.gives[group]):
            graph.add_edge(("limit", int(owner)), ("group", group))
    return graph


def _rings(room: Room) -> set[int]:
    """Return the groups that wait for each other once all others have gone in."""
    short = room.takes.sum(axis=0) > room.free
    lacks = (room.takes > 0) & short
    graph = _graph(room, range(len(room.takes)), lacks)
    return {
        number
        for part in nx.strongly_connected_components(graph)
        for kind, number in part
        if kind == "group" and len(part) > 1
    }
