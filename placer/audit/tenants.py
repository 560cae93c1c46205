"""How far the caps of tenants squeeze, or stretch, the loads of their volumes.

A factor belongs to a tenant, an hour and a date: it is told by all volumes of the
tenant, wherever they are, so no move changes it.
"""

from collections.abc import Mapping, Sequence
from fractions import Fraction

from placer.estate import Estate, Tenant

FREE = Fraction(1)


def factors(
    estate: Estate, grown: Mapping[str, Sequence[int]], grain: int
) -> dict[str, list[Fraction]]:
    """Return the factor of each capped tenant in each hour.

    Parameters
    ----------
    estate
        The inventory.
    grown
        Loads of the volumes with their growth: 4 parts of each hour in turn [1/grain].
    grain
        Into how many parts a thousandth of a request, or a byte, per second is cut.
    """
    capped = [tenant for tenant in estate.tenants if _caps(tenant) != (0, 0)]
    totals = {tenant.name: [0] * 4 * len(estate.hours) for tenant in capped}
    for volume in estate.volumes:
        if volume.tenant in totals:
            pairs = zip(totals[volume.tenant], grown[volume.id], strict=True)
            totals[volume.tenant] = [total + more for total, more in pairs]
    return {
        tenant.name: _hourly(tenant, totals[tenant.name], grain) for tenant in capped
    }


def _caps(tenant: Tenant) -> tuple[int, int]:
    return tenant.requests_cap, tenant.rate_cap


def _hourly(tenant: Tenant, total: Sequence[int], grain: int) -> list[Fraction]:
    parts = zip(total[0::4], total[1::4], total[2::4], total[3::4], strict=True)
    return [
        factor(tenant, (reads + writes, read + written), grain)
        for reads, writes, read, written in parts
    ]


def factor(tenant: Tenant, asked: tuple[int, int], grain: int = 1) -> Fraction:
    """Return by what the loads of a tenant are multiplied in one hour.

    Parameters
    ----------
    tenant
        The tenant with its caps; a cap of 0 is none.
    asked
        [1/1000 s], [B/s] what its volumes ask for together, in parts of 1/grain.
    grain
        Those parts.
    """
    terms = [
        Fraction(cap * grain, total)
        for cap, total in zip(_caps(tenant), asked, strict=True)
        if cap and total
    ]
    least = min(terms, default=FREE)
    return least if tenant.plan_for_cap else min(least, FREE)
