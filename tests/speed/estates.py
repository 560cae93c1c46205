"""Seeded estates of any size with tight limits, for measuring the search.

A hidden placement is drawn first; every limit is its use and 5 to 8 percent more, in
all hours the same.  Today's placement is the hidden one with 38 % of the bytes thrown
about, so most pools are over a limit today and a plan is known to exist.
"""

from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from placer.candidates.limits import limits
from placer.estate import (
    Array,
    Estate,
    Hour,
    Importance,
    Load,
    Media,
    Policy,
    Pool,
    Volume,
    Window,
)
from placer.units import GIB, MB, MILLI, MINUTES_PER_DAY, PPM, TB

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]

HOURS = 24
DRIVES = 100
LIFE_DAYS = 1825
WEIGHTS = {"high": 4, "normal": 2, "low": 1}
CENTRES, WIDTHS = (12, 2, 0, 20), (3.5, 2.5, 99.0, 2.0)


@dataclass(frozen=True)
class Draw:
    """What is drawn for each volume: sizes [GiB], requests [1/s], shares, profiles."""

    size: Floats
    requests: Floats
    reads: Floats
    block: Floats
    importance: list[str]
    profile: Floats


def estate(volumes: int, pools: int, seed: int, spare: float = 0.05) -> Estate:
    """Return an estate; the same arguments give the same estate.

    Each limit is ``spare`` and up to 3 % more above the use of the hidden placement.
    """
    rng = np.random.default_rng(seed)
    drawn = _draw(rng, volumes)
    hidden = _hidden(rng, drawn, pools)
    home = _scattered(rng, drawn, hidden, pools)
    open_pools = [_pool(p, pools) for p in range(pools)]
    made = _estate(seed, _volumes(drawn, home, open_pools), open_pools)
    return replace(made, pools=_tight(rng, made, hidden, spare))


def _draw(rng: np.random.Generator, count: int) -> Draw:
    small, hot = rng.normal(size=count), rng.normal(size=count)
    return Draw(
        size=100 * np.exp(1.3 * small),
        requests=40 * np.exp(1.5 * (0.3 * small + 0.95 * hot)),
        reads=rng.beta(4, 2, count),
        block=12 * 1024 * np.exp(0.5 * rng.normal(size=count)),
        importance=list(rng.choice(list(WEIGHTS), count, p=[0.1, 0.3, 0.6])),
        profile=np.array([_profile(rng) for _ in range(count)]),
    )


def _profile(rng: np.random.Generator) -> Floats:
    """Return a day shape with mean 1: office, night batch, flat or evening."""
    kind = rng.choice(4, p=[0.45, 0.25, 0.2, 0.1])
    centre = CENTRES[kind] + rng.normal()
    away = (np.arange(HOURS) - centre + 12) % HOURS - 12
    shape = 0.15 + np.exp(-0.5 * (away / WIDTHS[kind]) ** 2)
    shape = np.clip(shape * (1 + 0.08 * rng.normal(size=HOURS)), 0.01, None)
    return np.asarray(shape / shape.mean())


def _hidden(rng: np.random.Generator, drawn: Draw, pools: int) -> Ints:
    """Place the hottest per GiB on flash up to 22 % of the bytes, others elsewhere."""
    flash = max(1, pools // 3)
    weight = np.array([WEIGHTS[name] for name in drawn.importance])
    heat = np.log(weight * drawn.requests / drawn.size)
    order = np.argsort(-(heat + 0.5 * rng.normal(size=len(heat))))
    on_flash = np.cumsum(drawn.size[order]) < 0.22 * drawn.size.sum()
    places = np.zeros(len(heat), dtype=np.int64)
    parts = rng.dirichlet(5 * np.ones(flash)), rng.dirichlet(5 * np.ones(pools - flash))
    places[order] = np.where(
        on_flash,
        rng.choice(flash, len(heat), p=parts[0]),
        flash + rng.choice(pools - flash, len(heat), p=parts[1]),
    )
    return places


def _scattered(rng: np.random.Generator, drawn: Draw, hidden: Ints, pools: int) -> Ints:
    order = rng.permutation(len(hidden))
    thrown = order[np.cumsum(drawn.size[order]) < 0.38 * drawn.size.sum()]
    home = hidden.copy()
    home[thrown] = rng.integers(pools, size=len(thrown))
    return home


def _volumes(drawn: Draw, home: Ints, pools: list[Pool]) -> tuple[Volume, ...]:
    return tuple(
        Volume(
            array=pools[p].array,
            name=f"v{v}",
            pool=pools[p].name,
            provisioned=int(drawn.size[v] * GIB),
            occupied=int(drawn.size[v] * GIB),
            thin=False,
            load=_loads(drawn, v),
            profiled=True,
            importance=Importance(drawn.importance[v]),
        )
        for v, p in enumerate(home)
    )


def _loads(drawn: Draw, volume: int) -> tuple[Load, ...]:
    requests = drawn.requests[volume] * drawn.profile[volume]
    reads, size = drawn.reads[volume], drawn.block[volume]
    return tuple(
        Load(
            int(MILLI * r * reads),
            int(MILLI * r * (1 - reads)),
            int(r * reads * size),
            int(r * (1 - reads) * size),
        )
        for r in requests
    )


def _pool(number: int, pools: int) -> Pool:
    """Return a pool whose limits are still wide open."""
    flash = number < max(1, pools // 3)
    fast = number % 2
    return Pool(
        array=f"a{number % max(1, pools // 2)}",
        name=f"p{number}",
        media=Media.FLASH if flash else Media.SPINNING,
        drives=DRIVES,
        drive_size=4 * TB,
        usable=10**15,
        fill_ceiling=PPM,
        skew=PPM,
        dwpd=PPM if flash else 0,
        warranty_days=LIFE_DAYS,
        life_days=LIFE_DAYS,
        data=(4, 1, 6)[number % 3],
        parity=(1, 1, 2)[number % 3],
        read_time=150,
        write_time=50,
        reads_at_most=80_000 * MILLI,
        writes_at_most=30_000 * MILLI,
        drive_rate=1000 * MB if flash else 150 * MB,
        rpm=0 if flash else (7200, 10_000)[fast],
        seek=0 if flash else (8500, 4500)[fast],
    )


def _tight(
    rng: np.random.Generator, made: Estate, hidden: Ints, least: float
) -> tuple[Pool, ...]:
    """Close every limit to the hidden placement's use and a little more."""
    used = {block.code: block for block in limits(made, 0)}
    room = used["pool-room"].use(hidden)[:, 0]
    busy = used["pool-busy"].use(hidden).max(axis=1)
    wear = used["pool-wear"].use(hidden)[:, 0]
    spare = rng.uniform(1 + least, 1.03 + least, size=(3, len(made.pools)))
    return tuple(
        replace(
            pool,
            usable=int(room[p] * spare[0, p]),
            skew=int(0.7 * DRIVES * PPM / (busy[p] * spare[1, p])),
            dwpd=int(PPM * wear[p] * spare[2, p] / (DRIVES * 4 * TB * LIFE_DAYS))
            if pool.dwpd
            else 0,
        )
        for p, pool in enumerate(made.pools)
    )


def _estate(seed: int, volumes: tuple[Volume, ...], pools: list[Pool]) -> Estate:
    return Estate(
        name=f"tight {seed}",
        digest=str(seed),
        hours=tuple(Hour(None, hour, f"{hour:02d}:00") for hour in range(HOURS)),
        volumes=volumes,
        pools=tuple(pools),
        arrays=tuple(
            Array(name=name, write_answer=400)
            for name in sorted({pool.array for pool in pools})
        ),
        windows=tuple(_window(day) for day in range(1, 181)),
        policy=Policy(start=0, earliest=0, horizon_months=0),
    )


def _window(day: int) -> Window:
    start = day * MINUTES_PER_DAY
    return Window(
        name=f"w{day}",
        night=f"w{day}",
        opens=start,
        start=start,
        end=start + 480,
        zone="UTC",
        cutovers=0,
    )
