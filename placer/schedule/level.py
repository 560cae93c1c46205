"""The use of one limit over time, as steps, and when more of it is free for good."""

from dataclasses import dataclass, field
from itertools import pairwise

import numpy as np
from numpy.typing import NDArray

from placer.candidates.block import Block, Floats, Ints

ALWAYS = -(2**40)
FORGIVEN = 1e-12


@dataclass(slots=True, eq=False)
class Level:
    """Use and limit of one pool or array, in each hour, from step to step of time.

    Steps of one minute count together, so what is given back at a minute is there for
    what starts at it.

    Attributes
    ----------
    owner
        Whose limit it is.
    block
        The rule, its hours and its unit.
    use
        (hours,) use before the first change.
    bounds
        Instants [min] from which a limit (hours,) holds, the first one ``ALWAYS``.
    """

    block: Block
    owner: str
    use: Floats
    bounds: list[tuple[int, Floats]]
    changes: list[tuple[int, Floats]] = field(default_factory=list)
    _steps: tuple[Ints, Floats] | None = None

    def add(self, minute: int, change: Floats) -> None:
        """Change the use from a minute on."""
        self.changes.append((minute, change))
        self._steps = None

    def undo(self) -> None:
        """Forget the last change."""
        self.changes.pop()
        self._steps = None

    def earliest(self, change: Floats) -> int | None:
        """Return from when on a change fits for good [min], None if never.

        A change that lowers the use in an hour always fits there.
        """
        times, free = self._free()
        bad = np.flatnonzero(~_fits(change, free, self._forgiven).all(axis=1))
        if not len(bad):
            return ALWAYS
        return int(times[bad[-1] + 1]) if bad[-1] + 1 < len(times) else None

    def lacking(self, change: Floats) -> tuple[float, int]:
        """Return how much a change is too much in the end, and in which hour."""
        over = np.where(change > 0, change - self._free()[1][-1], -np.inf)
        return float(over.max()), int(over.argmax())

    def loosest(self) -> Floats:
        """Return what the highest of its limits leaves before any change (hours,)."""
        free: Floats = np.max([limit for _, limit in self.bounds], axis=0) - self.use
        return free

    @property
    def _forgiven(self) -> Floats:
        """What binary fractions may add."""
        share: Floats = FORGIVEN * np.maximum(self.bounds[0][1], 1e-3)
        return share

    def _free(self) -> tuple[Ints, Floats]:
        """Return the instants of the steps, and what is free then (steps, hours)."""
        if self._steps is None:
            self._steps = self._summed()
        return self._steps

    def _summed(self) -> tuple[Ints, Floats]:
        marks = [minute for minute, _ in (*self.bounds, *self.changes)]
        times = np.unique(np.array(marks, dtype=np.int64))
        used = np.zeros((len(times), len(self.use)))
        used[0] = self.use
        for minute, change in self.changes:
            used[np.searchsorted(times, minute)] += change
        limits = np.empty_like(used)
        ends = (*(minute for minute, _ in self.bounds), np.inf)
        for (start, end), (_, limit) in zip(pairwise(ends), self.bounds, strict=True):
            limits[(times >= start) & (times < end)] = limit
        return times, limits - np.cumsum(used, axis=0)


def _fits(change: Floats, free: Floats, forgiven: Floats) -> NDArray[np.bool_]:
    return (change <= forgiven) | (change <= free + forgiven)
