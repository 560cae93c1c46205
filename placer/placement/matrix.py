"""An integer program as arrays: columns, rows, and a sparse matrix between them.

Knows no volume and no pool.  Rows are scaled so that their sides are about one, which
keeps solver tolerances harmless.
"""

from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray
from scipy import sparse

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]

INFINITY = float("inf")
SHRINK = 3e-6
LEAST_UNIT = 1e-5
ROUNDING = 1e-9


@dataclass(frozen=True, slots=True)
class RowKey:
    """What a row stands for: rule, whose limit, which hour (-1: none)."""

    code: str
    owner: str = ""
    hour: int = -1


@dataclass(frozen=True)
class Program:
    """Rows ``low <= matrix @ x <= high`` over binary columns.

    Attributes
    ----------
    matrix
        (rows, columns) sparse.
    low, high
        (rows,) sides; infinite where open.
    keys
        What each row stands for.
    choices
        How many of the first columns are choices; the others follow from them.
    overruns_allowed
        How many of the last columns are not binary but overruns, from 0 up.
    """

    matrix: sparse.csr_array
    low: Floats
    high: Floats
    keys: tuple[RowKey, ...]
    choices: int
    overruns_allowed: int = 0

    @property
    def columns(self) -> int:
        """Number of columns."""
        return int(self.matrix.shape[1])

    def elastic(self, rows: Ints) -> "Program":
        """Return the program in which each given row may be overrun, by its column."""
        shape = (len(self.keys), len(rows))
        entries = (-np.ones(len(rows)), (rows, np.arange(len(rows))))
        slack = sparse.coo_array(entries, shape=shape)
        return Program(
            sparse.csr_array(sparse.hstack([self.matrix, slack])),
            self.low,
            self.high,
            self.keys,
            self.choices,
            overruns_allowed=len(rows),
        )

    def with_row(self, key: RowKey, cost: Floats, at_most: float) -> "Program":
        """Return the program with one more row ``cost @ x <= at_most``."""
        scale = max(abs(at_most), float(np.abs(cost).max(initial=0)), 1e-12)
        row = sparse.csr_array(cost[None, :] / scale)
        return Program(
            sparse.csr_array(sparse.vstack([self.matrix, row])),
            np.append(self.low, -INFINITY),
            np.append(self.high, at_most / scale),
            (*self.keys, key),
            self.choices,
            self.overruns_allowed,
        )

    def restricted(self, free: Ints, x: Floats) -> "Program":
        """Return the program over the free columns, the others held as x has them."""
        held = x.copy()
        held[free] = 0.0
        used = self.matrix @ held
        return Program(
            sparse.csr_array(self.matrix[:, free]),
            self.low - used,
            self.high - used,
            self.keys,
            int((free < self.choices).sum()),
        )

    def holds(self, x: Floats, within: float = 1e-7) -> bool:
        """Return whether a solution keeps every row."""
        return bool(self.overruns(x).max(initial=0.0) <= within)

    def overruns(self, x: Floats) -> Floats:
        """Return by how much each row is broken, scaled (rows,)."""
        use = self.matrix @ x
        over: Floats = np.maximum(np.maximum(use - self.high, self.low - use), 0.0)
        return over


def common_unit(values: Floats) -> float:
    """Return the largest number that all values are multiples of (Euclid).

    Values are at most about one; 0 where there is no such number above ``LEAST_UNIT``.
    """
    unit = 0.0
    for value in np.unique(np.abs(values[values != 0])):
        rest = float(value)
        while rest > ROUNDING:
            unit, rest = rest, abs(unit - round(unit / rest) * rest)
        if unit < LEAST_UNIT:
            return 0.0
        unit = value / round(value / unit)
    return unit


@dataclass
class Builder:
    """Collects rows while a program is put together.

    Unless ``guarded``, limits are taken as they are: right for measuring overruns.
    """

    columns: int
    choices: int
    guarded: bool = True
    _keys: list[RowKey] = field(default_factory=list)
    _low: list[float] = field(default_factory=list)
    _high: list[float] = field(default_factory=list)
    _rows: list[Ints] = field(default_factory=list)
    _cols: list[Ints] = field(default_factory=list)
    _values: list[Floats] = field(default_factory=list)

    def at_most(
        self, key: RowKey, columns: Sequence[int], values: Floats, limit: float
    ) -> None:
        """Add ``values @ x <= limit`` so that solver tolerance cannot break it.

        Where all values are multiples of one unit, so is their sum: the limit is
        rounded down to whole units, and what fills it to the last one still fits.
        Other limits are shrunk by more than the tolerance.
        """
        scale = max(abs(limit), float(np.abs(values).max(initial=0.0)), 1e-12)
        side = limit / scale
        if self.guarded:
            side = _guarded(side, common_unit(values / scale))
        self._add(key, columns, values / scale, -INFINITY, side)

    def equal(
        self, key: RowKey, columns: Sequence[int], values: Floats, to: float
    ) -> None:
        """Add ``values @ x = to``."""
        self._add(key, columns, values, to, to)

    def build(self) -> Program:
        """Return the program with the rows so far."""
        shape = (len(self._keys), self.columns)
        values = np.concatenate([np.zeros(0), *self._values])
        rows = np.concatenate([np.zeros(0, dtype=np.int64), *self._rows])
        cols = np.concatenate([np.zeros(0, dtype=np.int64), *self._cols])
        return Program(
            sparse.csr_array(sparse.coo_array((values, (rows, cols)), shape=shape)),
            np.array(self._low),
            np.array(self._high),
            tuple(self._keys),
            self.choices,
        )

    def _add(
        self,
        key: RowKey,
        columns: Sequence[int],
        values: Floats,
        low: float,
        high: float,
    ) -> None:
        row = len(self._keys)
        self._keys.append(key)
        self._low.append(low)
        self._high.append(high)
        self._rows.append(np.full(len(columns), row))
        self._cols.append(np.asarray(columns, dtype=np.int64))
        self._values.append(np.asarray(values, dtype=float))


def _guarded(side: float, unit: float) -> float:
    """Return a side that solver tolerance cannot break."""
    if unit:
        return float(unit * np.floor(side / unit + ROUNDING))
    return side * (1 - SHRINK)
