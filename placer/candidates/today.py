"""Does the model explain today? What was measured against what the model says."""

from collections.abc import Iterator
from dataclasses import dataclass
from statistics import median

import numpy as np

from placer.candidates.limits import Date, controller_busy
from placer.candidates.table import Candidates
from placer.estate import Array, Pool
from placer.units import MS, PERCENT, PPM

NEAR = 0.2


@dataclass(frozen=True, slots=True, kw_only=True)
class Compared:
    """One figure as modelled and as measured, in ``unit``.

    For responses both are medians over the ``volumes`` that were measured, and
    ``worst`` is the volume farthest off.
    """

    where: str
    what: str
    modelled: float
    measured: float
    unit: str
    volumes: int = 0
    worst: str = ""

    @property
    def ratio(self) -> float:
        """What measured is of modelled; infinite where the model says nothing."""
        return self.measured / self.modelled if self.modelled else float("inf")

    @property
    def near(self) -> bool:
        """Whether the model is within 20 % of the measurement."""
        return abs(self.ratio - 1) <= NEAR


def compare(candidates: Candidates) -> tuple[Compared, ...]:
    """Return every comparison that the inventory's measurements allow."""
    return (
        *_pools(candidates),
        *_controllers(candidates),
        *_responses(candidates),
    )


def _pools(candidates: Candidates) -> Iterator[Compared]:
    """Compare busy shares of pools in their busiest hour, the skew taken out."""
    nothing = np.zeros(len(candidates.pools), dtype=np.int64)
    shares = candidates.responses.shares(candidates.home, nothing).max(axis=1)
    for pool, share in zip(candidates.pools, shares, strict=True):
        if pool.busy_measured and share:
            yield Compared(
                where=pool.id,
                what="pool busy",
                modelled=100 * float(share) / _skew(pool),
                measured=pool.busy_measured / PERCENT,
                unit="%",
            )


def _skew(pool: Pool) -> float:
    return 1.0 if pool.requests_at_most else pool.skew / PPM


def _controllers(candidates: Candidates) -> Iterator[Compared]:
    """Compare controllers with all of them at work, evenly."""
    block = controller_busy(Date(candidates.estate, 0))
    worst = block.use(candidates.home).max(axis=1) if block.owners else ()
    shares = dict(zip(block.owners, worst, strict=True))
    for array in candidates.estate.arrays:
        if array.busy_measured and array.name in shares:
            yield Compared(
                where=array.name,
                what="controller busy",
                modelled=100 * float(shares[array.name]) * _all_at_work(array),
                measured=array.busy_measured / PERCENT,
                unit="%",
            )


def _all_at_work(array: Array) -> float:
    left = array.controllers - array.failures_survived
    return left / array.controllers * PPM / array.uneven


def _responses(candidates: Candidates) -> Iterator[Compared]:
    """Compare responses of the measured volumes of each pool."""
    modelled = candidates.responses.modelled_today
    for column, pool in enumerate(candidates.pools):
        rows = [
            row
            for row, volume in enumerate(candidates.volumes)
            if candidates.home[row] == column
            and volume.response_measured
            and modelled[row]
        ]
        if rows:
            yield _response(candidates, pool, rows, modelled)


def _response(
    candidates: Candidates, pool: Pool, rows: list[int], modelled: list[int]
) -> Compared:
    measured = {row: candidates.volumes[row].response_measured for row in rows}
    off = {row: abs(np.log(measured[row] / modelled[row])) for row in rows}
    return Compared(
        where=pool.id,
        what="response",
        modelled=median(modelled[row] for row in rows) / MS,
        measured=median(measured.values()) / MS,
        unit="ms",
        volumes=len(rows),
        worst=candidates.volumes[max(rows, key=off.__getitem__)].id,
    )
