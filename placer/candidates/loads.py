"""The loads of all volumes as one array, grown and within their tenants' caps."""

import numpy as np
from numpy.typing import NDArray

from placer.estate import Estate, Load, Tenant
from placer.physics.demand import growth_factor
from placer.units import MILLI

Floats = NDArray[np.float64]


def loads(estate: Estate, months: int) -> Floats:
    """Return what volumes ask for, ``months`` from now.

    Returns
    -------
    ndarray
        Shape (volumes, hours, 4): reads [1/s], writes [1/s], bytes read and bytes
        written [B/s].
    """
    rows = [_one(volume.load) for volume in estate.volumes]
    today = np.stack(rows) if rows else np.zeros((0, len(estate.hours), 4))
    factors = [float(growth_factor(v.load_growth, months)) for v in estate.volumes]
    grown: Floats = today * np.array(factors).reshape(-1, 1, 1)
    for tenant in estate.tenants:
        mine = [v.tenant == tenant.name for v in estate.volumes]
        grown[mine] *= share_of_cap(tenant, grown[mine].sum(axis=0))[:, None]
    return grown


def share_of_cap(tenant: Tenant, asked: Floats) -> Floats:
    """Return by what a tenant's load is multiplied in each hour, (hours,).

    Parameters
    ----------
    tenant
        The caps.
    asked
        (hours, 4) what all volumes of the tenant ask for together.
    """
    requests, rate = asked[:, :2].sum(axis=1), asked[:, 2:].sum(axis=1)
    allowed = np.full(len(asked), np.inf)
    for cap, total in (
        (tenant.requests_cap / MILLI, requests),
        (tenant.rate_cap, rate),
    ):
        if cap:
            used = total > 0
            allowed[used] = np.minimum(allowed[used], cap / total[used])
    most = np.inf if tenant.plan_for_cap else 1.0
    return np.minimum(np.where(np.isinf(allowed), 1.0, allowed), most)


def _one(load: tuple[Load, ...]) -> Floats:
    parts = [(x.reads, x.writes, x.read_bytes, x.write_bytes) for x in load]
    return np.array(parts, dtype=float) / (MILLI, MILLI, 1, 1)
