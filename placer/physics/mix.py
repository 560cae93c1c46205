"""The mix of requests on a drive, and what is left of the one in service.

A request that arrives finds the drive busy with another of any kind; what is left of
that one is E[s^2] / (2 E[s]) on average.

References
----------
.. [1] Renewal theory, mean residual life: L. Kleinrock, "Queueing Systems", vol. 1,
   1975, section 5.2 (from memory).
"""

from dataclasses import dataclass
from enum import IntEnum

import numpy as np
from numpy.typing import NDArray

from placer.estate import Media, Pool
from placer.physics import drives, protection
from placer.units import MILLI

Floats = NDArray[np.float64]


class Request(IntEnum):
    """What hosts ask of drives, as far as drives tell them apart."""

    RANDOM_READ = 0
    SEQUENTIAL_READ = 1
    WRITE = 2


@dataclass(frozen=True, slots=True)
class Operation:
    """What one host request makes a drive do.

    ``count`` such operations per request, each occupying a drive for ``fixed`` [s] and
    ``per_byte`` [s/B] of its bytes.
    """

    request: Request
    count: float
    fixed: float
    per_byte: float


def operations(pool: Pool) -> tuple[Operation, ...]:
    """Return what requests make the drives of a pool do."""
    cost = protection.of_pool(pool)
    read, write = _occupied(pool)
    return (
        Operation(Request.RANDOM_READ, 1.0, *read),
        Operation(Request.SEQUENTIAL_READ, 1.0, *_streamed(pool, read)),
        Operation(Request.WRITE, float(cost.reads), *read),
        Operation(Request.WRITE, float(cost.writes), *write),
    )


def residual(pool: Pool, moments: Floats) -> Floats:
    """Return the mean rest of the request in service [s], 0 without any [1]_.

    Parameters
    ----------
    pool
        Whose drives they are.
    moments
        (..., requests, 3) per kind of request: how many per second, their bytes, and
        the sum of the squares of their bytes.
    """
    first = np.zeros(moments.shape[:-2])
    second = np.zeros(moments.shape[:-2])
    for each in operations(pool):
        number, size, square = np.moveaxis(moments[..., each.request, :], -1, 0)
        fixed, per_byte = each.fixed, each.per_byte
        first += each.count * (fixed * number + per_byte * size)
        second += each.count * (
            fixed**2 * number + 2 * fixed * per_byte * size + per_byte**2 * square
        )
    return np.divide(second, 2 * first, out=np.zeros_like(first), where=first > 0)


def _occupied(pool: Pool) -> tuple[tuple[float, float], tuple[float, float]]:
    """Return (fixed, per byte) of a random read and of a write."""
    byte = drives.transfer(1, pool)
    if pool.media is Media.FLASH:
        reads, writes = pool.reads_at_most, pool.writes_at_most
        return (
            (MILLI / reads if reads else 0.0, byte),
            (MILLI / writes if writes else 0.0, byte),
        )
    positioned = (drives.positioning(pool), byte)
    return positioned, positioned


def _streamed(pool: Pool, read: tuple[float, float]) -> tuple[float, float]:
    """Return (fixed, per byte) of a sequential read, which seldom positions."""
    if pool.media is Media.FLASH:
        return read
    unit = pool.prefetch_unit
    return 0.0, read[1] + (drives.positioning(pool) / unit if unit else 0.0)
