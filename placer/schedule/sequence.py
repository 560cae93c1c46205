"""An order in which every unit fits once all before it are done, without time.

Room and load can hold each other up: one unit waits for room where another must first
take load away.  A search in depth, nearest to the order given, finds such an order or
the longest one it meets.
"""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from placer.candidates.block import Floats
from placer.schedule.level import FORGIVEN
from placer.schedule.levels import Change
from placer.schedule.unit import Unit

STATES_AT_MOST = 4_000
"""Bound on the search; counted, never timed."""


@dataclass(frozen=True, slots=True)
class _Ask:
    """What units ask of all limits and hours side by side.

    Attributes
    ----------
    free
        (columns,) what is free today.
    needs
        (units, columns) what must be free when a unit goes.
    nets
        (units, columns) what is gone once it is done.
    """

    free: Floats
    needs: Floats
    nets: Floats

    def fitting(self, free: Floats, pending: list[int]) -> list[int]:
        """Return who fits; only the first of those who harm nobody, if there is one."""
        needs = self.needs[pending]
        forgiven = FORGIVEN * np.maximum(1.0, np.abs(self.free))
        fits = ((needs <= forgiven) | (needs <= free + forgiven)).all(axis=1)
        scarce = np.maximum(needs, 0.0).sum(axis=0) > free
        harmless = fits & (self.nets[pending][:, scarce] <= 0).all(axis=1)
        if harmless.any():
            return [pending[int(harmless.argmax())]]
        return [pending[number] for number in np.flatnonzero(fits)]


def sequence(units: Sequence[Unit]) -> list[int]:
    """Return the numbers of units in an order that works, the rest at the end.

    Parameters
    ----------
    units
        In the order to keep as far as may be.
    """
    ask = _ask(units)
    best: list[int] = []
    open_: list[list[int]] = [[]]
    seen: set[frozenset[int]] = set()
    while open_ and len(best) < len(units) and len(seen) < STATES_AT_MOST:
        order = open_.pop()
        done = frozenset(order)
        if done in seen:
            continue
        seen.add(done)
        best = max(best, order, key=len)
        pending = [unit for unit in range(len(units)) if unit not in done]
        free = ask.free - ask.nets[order].sum(axis=0)
        if pending:
            fitting = ask.fitting(free, pending)
            open_ += [[*order, unit] for unit in reversed(fitting)]
    gone = set(best)
    return best + [unit for unit in range(len(units)) if unit not in gone]


def _ask(units: Sequence[Unit]) -> _Ask:
    takes = [[part for p in unit.parts for part in p.taken] for unit in units]
    gives = [[part for p in unit.parts for part in p.given] for unit in units]
    loads = [unit.load for unit in units]
    levels = dict.fromkeys(level for change in (*takes, *loads) for level, _ in change)
    first, width = {}, 0
    for level in levels:
        first[level] = width
        width += len(level.use)

    def table(changes: Sequence[Change]) -> Floats:
        rows = np.zeros((len(units), width))
        for row, change in zip(rows, changes, strict=True):
            for level, part in change:
                if level in first:
                    row[first[level] : first[level] + len(part)] += part
        return rows

    free = [level.loosest() for level in levels]
    needs = table(takes) + table(loads)
    return _Ask(np.concatenate([np.zeros(0), *free]), needs, needs - table(gives))
