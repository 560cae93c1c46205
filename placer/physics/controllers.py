"""Controllers: their busy share after the failures that must be survived."""

from dataclasses import dataclass

from placer.estate import Array
from placer.units import MILLI, PPM


@dataclass(frozen=True, slots=True)
class ControllerCost:
    """Share of the remaining controllers per read/s, write/s and byte/s."""

    read: float
    write: float
    byte: float


def controller_cost(array: Array) -> ControllerCost | None:
    """Return the array's factors, None where no rating limits its controllers."""
    rates = (array.reads_at_most, array.writes_at_most, array.controller_rate)
    left = array.controllers - array.failures_survived
    if not any(rates) or left <= 0:
        return None
    share = array.uneven / PPM / left
    read, write, byte = (1 / rate if rate else 0.0 for rate in rates)
    return ControllerCost(read * MILLI * share, write * MILLI * share, byte * share)
