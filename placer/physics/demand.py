"""What volumes will ask for at a later date: growth of room and of load, apart."""

from decimal import Decimal, localcontext
from functools import cache

from placer.estate import Estate, Volume
from placer.units import MINUTES_PER_DAY, MONTHS_PER_YEAR, PPM, demand

MONTH_MINUTES = 30 * MINUTES_PER_DAY


@cache
def growth_factor(yearly: int, months: int) -> Decimal:
    """Return what a quantity has grown to: (1 + g)^(m/12).

    Parameters
    ----------
    yearly
        [ppm/year] growth rate, compounding.
    months
        [month] time that passes.
    """
    with localcontext(prec=50):
        base = Decimal(PPM + yearly) / PPM
        return base ** (Decimal(months) / MONTHS_PER_YEAR)


def size(volume: Volume, months: int) -> int:
    """Return the room [B] a volume needs before reduction, ``months`` from now.

    Thick volumes need all that is provisioned; thin ones what is occupied, grown, and
    never more than is provisioned.
    """
    if not volume.thin:
        return volume.provisioned
    factor = growth_factor(volume.capacity_growth, months)
    with localcontext(prec=50):
        return min(volume.provisioned, demand(volume.occupied * factor))


def room(volume: Volume, months: int) -> int:
    """Return the room [B] before reduction that a volume takes with its snapshots."""
    return size(volume, months) + volume.snapshots


def months_of_nights(estate: Estate) -> int:
    """Return the 30-day months begun until the last window ends; 0 without windows."""
    if not estate.windows:
        return 0
    minutes = max(window.end for window in estate.windows) - estate.policy.start
    return max(0, -(-minutes // MONTH_MINUTES))


def busiest_hour(volume: Volume) -> int:
    """Return the index of the first hour with the most requests."""
    requests = [load.reads + load.writes for load in volume.load]
    return requests.index(max(requests))
