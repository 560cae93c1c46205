"""The loads of all volumes as one array."""

import numpy as np
from numpy.typing import NDArray

from placer.estate import Estate, Load
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
    return grown


def _one(load: tuple[Load, ...]) -> Floats:
    parts = [(x.reads, x.writes, x.read_bytes, x.write_bytes) for x in load]
    return np.array(parts, dtype=float) / (MILLI, MILLI, 1, 1)
