"""Sends volumes back home whose move turns out to be needless."""

import numpy as np

from placer.candidates.block import Ints
from placer.placement.layout import Layout
from placer.placement.matrix import Program


def settle(program: Program, layout: Layout, places: Ints, bought: Ints) -> Ints:
    """Return the placement without moves that no row and no goal asks for.

    ``program`` holds the goals reached as rows, so a volume goes home only where every
    limit and every goal before the effort allows it.
    """
    home = layout.candidates.home
    for item in _movers(layout, places):
        members = list(layout.items.members[item])
        tried = places.copy()
        tried[members] = home[members]
        at_home = len(set(home[members])) == 1 and (
            (item, int(home[members[0]])) in layout.place_column
        )
        if at_home and program.holds(layout.solution(tried, bought)):
            places = tried
    return places


def _movers(layout: Layout, places: Ints) -> list[int]:
    """Return items away from home, the most laborious first."""
    home, effort = layout.candidates.home, layout.candidates.effort
    rows = np.flatnonzero(places != home)
    labour: dict[int, float] = {}
    for row in rows:
        item = int(layout.items.of_volume[row])
        labour[item] = labour.get(item, 0.0) + float(effort[row, places[row]])
    return sorted(labour, key=lambda item: -labour[item])
