"""What volumes ask for at a date: sizes and loads with their growth and caps.

Loads are carried as whole numbers, ``GRAIN`` of them to a thousandth of a request per
second or to a byte per second, rounded up, so that sums over volumes stay exact.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from decimal import Decimal, localcontext
from fractions import Fraction
from math import ceil

from placer.audit.tenants import factors
from placer.estate import Estate, Load, Volume
from placer.units import MINUTES_PER_DAY, MONTHS_PER_YEAR, PPM

GRAIN = 10**9
MINUTES_PER_MONTH = 30 * MINUTES_PER_DAY


@dataclass(frozen=True, slots=True)
class Demand:
    """Sizes [B] and loads [4 parts of each hour in turn, GRAIN] some months on."""

    months: int
    sizes: dict[str, int]
    loads: dict[str, tuple[int, ...]]


def demand_at(estate: Estate, months: int) -> Demand:
    """Return what every volume asks for some months after today."""
    loads = {volume.id: grown(volume, months) for volume in estate.volumes}
    by_tenant = factors(estate, loads, GRAIN)
    for volume in estate.volumes:
        if volume.tenant in by_tenant:
            loads[volume.id] = capped(loads[volume.id], by_tenant[volume.tenant])
    sizes = {volume.id: size(volume, months) for volume in estate.volumes}
    return Demand(months, sizes, loads)


def months_of_nights(estate: Estate) -> int:
    """Return the 30-day months begun from the start to the end of the last window."""
    if not estate.windows:
        return 0
    minutes = max(window.end for window in estate.windows) - estate.policy.start
    return max(0, -(-minutes // MINUTES_PER_MONTH))


def growth(yearly: int, months: int) -> Fraction:
    """Return (1 + yearly growth [ppm])^(months / 12), to 40 places where irrational."""
    base = max(0, PPM + yearly)
    if months % MONTHS_PER_YEAR == 0:
        return Fraction(base, PPM) ** (months // MONTHS_PER_YEAR)
    with localcontext(prec=80):
        power = (Decimal(base) / PPM) ** (Decimal(months) / MONTHS_PER_YEAR)
        return Fraction(round(power, 40))


def size(volume: Volume, months: int) -> int:
    """Return what a volume takes before reduction [B]."""
    if not volume.thin:
        return volume.provisioned
    grown = ceil(volume.occupied * growth(volume.capacity_growth, months))
    return min(volume.provisioned, grown)


def grown(volume: Volume, months: int) -> tuple[int, ...]:
    """Return reads, writes, bytes read, bytes written of each hour in turn [GRAIN].

    Nothing is capped yet.
    """
    factor = growth(volume.load_growth, months) * GRAIN
    top, bottom = factor.numerator, factor.denominator
    return tuple(-(-part * top // bottom) for load in volume.load for part in _of(load))


def capped(load: Sequence[int], factor: Sequence[Fraction]) -> tuple[int, ...]:
    """Return a load (4 parts of each hour in turn) times a factor of each hour."""
    terms = [each.as_integer_ratio() for each in factor for _ in range(4)]
    return tuple(
        -(-part * top // bottom)
        for part, (top, bottom) in zip(load, terms, strict=True)
    )


def swollen(load: Sequence[int], factor: int) -> tuple[int, ...]:
    """Return a load (4 parts of each hour in turn) times a factor [ppm]."""
    return tuple(-(-part * factor // PPM) for part in load)


def _of(load: Load) -> tuple[int, int, int, int]:
    return load.reads, load.writes, load.read_bytes, load.write_bytes


def busiest(volume: Volume) -> int:
    """Return the index of the first hour with the most requests, as measured."""
    asked = [load.reads + load.writes for load in volume.load]
    return asked.index(max(asked))


def busiest_load(volume: Volume) -> Load:
    """Return the load of the busiest hour, as measured."""
    return volume.load[busiest(volume)]


def busiest_requests(volume: Volume) -> int:
    """Return reads and writes of the busiest hour, as measured [1/1000 s]."""
    load = busiest_load(volume)
    return load.reads + load.writes
