"""Which pools were saturated: what is measured there is less than hosts would ask."""

from fractions import Fraction

from placer.audit.busy import busy
from placer.audit.caches import Caches
from placer.audit.demand import Demand
from placer.estate import Estate, Media, Pool
from placer.units import PPM

SATURATED = Fraction(95, 100)


def saturated(estate: Estate, caches: Caches, today: Demand) -> frozenset[str]:
    """Return the spinning pools that could hardly serve more than is measured today."""
    return frozenset(
        pool.id
        for pool in estate.pools
        if pool.media is Media.SPINNING
        and _busiest(estate, caches, today, pool) >= SATURATED
    )


def _busiest(estate: Estate, caches: Caches, today: Demand, pool: Pool) -> Fraction:
    """Return the busy share of a pool as measured, else as modelled [1]."""
    if pool.busy_measured:
        return Fraction(pool.busy_measured, PPM)
    drives = busy(pool, 0, caches)
    if drives is None:
        return Fraction(0)
    parts = [
        drives.adds(volume, today.loads[volume.id])
        for volume in estate.volumes
        if volume.home == pool.id
    ]
    return max(map(sum, zip(*parts, strict=True)), default=0) * drives.worth
