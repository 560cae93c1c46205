"""The use of one limit over time, as steps, and when more of it is free for good."""

from dataclasses import dataclass, field
from itertools import pairwise

import numpy as np
from numpy.typing import NDArray

from placer.candidates.block import Block, Floats, Ints

ALWAYS = -(2**40)
FORGIVEN = 1e-12


@dataclass(frozen=True, slots=True)
class Overrun:
    """By how much a limit is overrun at worst, in which hour, until when [min]."""

    amount: float
    hour: int
    until: int | None


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

    def overrun(self, since: int) -> Overrun | None:
        """Return the largest overrun from a step of time on, None without one.

        Parameters
        ----------
        since
            One of the instants of ``bounds`` [min].
        """
        times, free = self._free()
        later = free[times >= since]
        bad = np.flatnonzero((later < -self._forgiven).any(axis=1))
        if not len(bad):
            return None
        ends = [*times[times >= since][1:], None]
        worst = later.min(axis=0)
        until = ends[bad[-1]]
        return Overrun(
            amount=-float(worst.min()),
            hour=int(worst.argmin()),
            until=None if until is None else int(until),
        )

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
        if self.changes:
            minutes, changes = zip(*self.changes, strict=True)
            np.add.at(used, np.searchsorted(times, minutes), np.stack(changes))
        limits = np.empty_like(used)
        ends = (*(minute for minute, _ in self.bounds), np.inf)
        for (start, end), (_, limit) in zip(pairwise(ends), self.bounds, strict=True):
            limits[(times >= start) & (times < end)] = limit
        return times, limits - np.cumsum(used, axis=0)


def _fits(change: Floats, free: Floats, forgiven: Floats) -> NDArray[np.bool_]:
    return (change <= forgiven) | (change <= free + forgiven)
