"""Builders of small estates for tests: one line a volume, a pool, an array."""

from dataclasses import replace

from placer.candidates.table import candidates
from placer.estate import (
    Aim,
    Array,
    Estate,
    Hour,
    Load,
    Media,
    Policy,
    Pool,
    Volume,
    Window,
)
from placer.units import GIB, KIB, MILLI, MINUTES_PER_DAY, MINUTES_PER_HOUR, MS, PPM

START = 20_000 * MINUTES_PER_DAY
ALL_DAY = Hour(None, 9, "09:00")


def load(reads: float, writes: float = 0, kib: float = 8) -> Load:
    """Return a load of ``reads`` and ``writes`` [1/s], each of ``kib`` [KiB]."""
    size = kib * KIB
    return Load(
        round(reads * MILLI),
        round(writes * MILLI),
        round(reads * size),
        round(writes * size),
    )


def volume(
    name: str, home: str, size: int, *loads: Load, measured: float = 0
) -> Volume:
    """Return a thick volume of ``size`` [GiB] in ``home`` = array/pool.

    ``measured`` is its response today [ms], 0 where nobody has measured it.
    """
    array, pool = home.split("/")
    return Volume(
        array=array,
        name=name,
        pool=pool,
        provisioned=size * GIB,
        occupied=size * GIB,
        thin=False,
        load=loads or (load(0),),
        response_measured=round(measured * MS),
    )


def pool(id_: str, media: Media, size: int, **others: int | bool) -> Pool:
    """Return a pool that may be filled with ``size`` [GiB] to the last byte."""
    array, name = id_.split("/")
    whole = Pool(
        array=array, name=name, media=media, usable=size * GIB, fill_ceiling=PPM
    )
    return replace(whole, **others)  # type: ignore[arg-type]


def window(day: int, hours: int = 8) -> Window:
    """Return a night of that many days after the start, without limits of its own."""
    opens = START + day * MINUTES_PER_DAY + 22 * MINUTES_PER_HOUR
    return Window(
        name=f"night {day}",
        night=f"night {day}",
        opens=opens,
        start=opens,
        end=opens + hours * MINUTES_PER_HOUR,
        zone="UTC",
        cutovers=0,
    )


def policy(aim: Aim = Aim.BEST_USE, **others: int) -> Policy:
    """Return a policy that starts at once, for today's sizes and loads."""
    least = Policy(start=START, earliest=START, horizon_months=0, aim=aim)
    return replace(least, **others)  # type: ignore[arg-type]


def estate(
    volumes: list[Volume],
    pools: list[Pool],
    wishes: Policy | None = None,
    arrays: list[Array] | None = None,
    windows: tuple[Window, ...] | None = None,
) -> Estate:
    """Return an estate; its arrays are named by the pools, its hours by the loads."""
    hours = len(volumes[0].load) if volumes else 1
    names = dict.fromkeys(p.array for p in pools)
    return Estate(
        name="small",
        digest="0",
        hours=tuple(replace(ALL_DAY, hour=h, label=f"{h:02}:00") for h in range(hours)),
        volumes=tuple(volumes),
        pools=tuple(pools),
        arrays=tuple(arrays or [Array(name=name) for name in names]),
        policy=wishes or policy(),
        windows=tuple(map(window, range(1, 61))) if windows is None else windows,
    )


def drives_busy(where: Pool, asked: Load) -> float:
    """Return how many drives of a pool one volume with a load keeps busy."""
    table = candidates(estate([volume("one", where.id, 1, asked)], [where]))
    busy = next(block for block in table.limits_today if block.code == "pool-busy")
    return float(busy.use(table.home).max())
