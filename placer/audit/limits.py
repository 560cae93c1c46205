"""Every limit that volumes add up to, and how far a placement uses it.

A gauge turns each volume into whole numbers, one for each hour (or a single one), and
their sum into the unit in which the limit is stated.  What the volumes add does not
depend on the steps bought; what the sum is worth, or how much is allowed, does.
"""

from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from fractions import Fraction
from math import floor

from placer.audit import busy as drives
from placer.audit import machines
from placer.audit.case import Case
from placer.audit.demand import GRAIN, Demand, swollen
from placer.audit.groups import all_drives
from placer.estate import Array, Pool, Volume
from placer.units import GIB, PERCENT, PPM, SECONDS_PER_DAY, TB

SLACK = Fraction(1, 10**9)
"""Share by which a use may pass its limit, for rounding."""


@dataclass(frozen=True, slots=True)
class Gauge:
    """One limit at one place: what a volume adds in a pool, and what the sum means."""

    code: str
    where: str
    unit: str
    adds: Callable[[Volume, str], Sequence[int]]
    worth: Fraction
    at_most: Fraction
    hourly: bool = False

    @property
    def most(self) -> int:
        """The highest sum within the limit."""
        return floor(self.at_most * (1 + SLACK) / self.worth)


@dataclass(frozen=True, slots=True)
class Reading:
    """How far a placement uses a limit; ``shares`` has one entry for each hour."""

    code: str
    where: str
    unit: str
    shares: tuple[Fraction, ...]
    at_most: Fraction
    hourly: bool = False

    @property
    def use(self) -> Fraction:
        """The use in the hour that binds."""
        return max(self.shares)

    @property
    def hour(self) -> int | None:
        """Index of the hour that binds, None where the limit has no hours."""
        return self.shares.index(self.use) if self.hourly else None

    @property
    def over(self) -> bool:
        """Whether the limit is broken."""
        return self.use > self.at_most * (1 + SLACK)


@dataclass(frozen=True, slots=True)
class Scene:
    """A placement at a date with some steps bought.

    With ``latent`` volumes ask for what a saturated home could not serve.
    """

    case: Case
    demand: Demand
    where: Mapping[str, str]
    steps: Mapping[str, int]
    latent: bool = True

    def bought(self, pool: Pool) -> int:
        """Return the steps bought of a pool."""
        return self.steps.get(pool.id, 0)

    def load(self, volume: Volume, pool: str) -> Sequence[int]:
        """Return what a volume asks for in a pool: 4 parts of each hour [GRAIN]."""
        asked = self.demand.loads[volume.id]
        if not self.latent or not self.case.held_back(volume, pool):
            return asked
        return swollen(asked, self.case.estate.policy.latent_demand)


def room(scene: Scene, pool: Pool) -> Gauge | None:
    """Room: what lands after reduction, with the snapshots beside it.

    A pool that only gives and of which no room is known has no limit.
    """
    if not pool.takes_volumes and not machines.usable(pool, 0):
        return None
    return Gauge(
        "pool-room",
        pool.id,
        "GiB",
        lambda volume, _: (scene.demand.sizes[volume.id] + volume.snapshots,),
        Fraction(PPM, pool.reduction * GIB),
        machines.room(pool, scene.bought(pool)) / GIB,
    )


def thin(scene: Scene, pool: Pool) -> Gauge | None:
    """Room promised to hosts, whether taken or not."""
    if not pool.thin_at_most:
        return None
    whole = machines.usable(pool, scene.bought(pool))
    return Gauge(
        "pool-thin",
        pool.id,
        "GiB",
        lambda volume, _: (volume.provisioned,),
        Fraction(1, GIB),
        whole * pool.thin_at_most / PPM / GIB,
    )


def busy(scene: Scene, pool: Pool) -> Gauge | None:
    """Busy share of the drives of a pool, hour by hour, by the reads no cache has."""
    at_work = drives.busy(pool, scene.bought(pool), scene.case.caches)
    if at_work is None:
        return None
    return Gauge(
        "pool-busy",
        pool.id,
        "%",
        lambda volume, where: at_work.adds(volume, scene.load(volume, where)),
        100 * at_work.worth,
        Fraction(pool.busy_ceiling, PERCENT),
        hourly=True,
    )


def wear(scene: Scene, pool: Pool) -> Gauge | None:
    """Bytes written to flash over the life asked, the moves' own writes once."""
    if not machines.wears(pool, scene.bought(pool)):
        return None
    hours = len(scene.case.estate.hours)
    lasts = SECONDS_PER_DAY * pool.life_days
    writes = int(all_drives(pool).writes * pool.data)

    def adds(volume: Volume, where: str) -> tuple[int]:
        hosts = sum(scene.load(volume, where)[3::4]) * lasts * writes
        if volume.home == pool.id:
            return (hosts,)
        copied = scene.case.nights.sizes[volume.id] * (pool.data + pool.parity)
        return (hosts + copied * hours * GRAIN,)

    return Gauge(
        "pool-wear",
        pool.id,
        "TB",
        adds,
        Fraction(pool.array_overhead, pool.reduction * pool.data * hours * GRAIN * TB),
        machines.wear_budget(pool, scene.bought(pool)) / TB,
    )


def controllers(scene: Scene, array: Array) -> Gauge:
    """Busy share of the controllers that must carry an array, hour by hour."""
    form = machines.controller_form(array)
    return Gauge(
        "controller-busy",
        array.name,
        "%",
        lambda volume, where: form.of(scene.load(volume, where)),
        Fraction(100, form.unit * GRAIN),
        Fraction(array.controller_ceiling, PERCENT),
        hourly=True,
    )


def volumes(_: Scene, array: Array) -> Gauge | None:
    """Volumes on an array."""
    if not array.volumes_at_most:
        return None
    most = Fraction(array.volumes_at_most)
    one = Fraction(1)
    return Gauge("array-volumes", array.name, "volumes", lambda *_: (1,), one, most)


def hosts(scene: Scene, array: Array) -> Reading | None:
    """Named hosts with volumes on an array; a host counts once, so this is no sum."""
    if not array.hosts_at_most:
        return None
    there = {
        volume.host
        for volume in scene.case.estate.volumes
        if volume.host and scene.case.pools[scene.where[volume.id]].array == array.name
    }
    most = Fraction(array.hosts_at_most)
    return Reading("array-hosts", array.name, "hosts", (Fraction(len(there)),), most)


POOL_GAUGES: dict[str, Callable[[Scene, Pool], Gauge | None]] = {
    "pool-room": room,
    "pool-thin": thin,
    "pool-busy": busy,
    "pool-wear": wear,
}
ARRAY_GAUGES: dict[str, Callable[[Scene, Array], Gauge | None]] = {
    "controller-busy": controllers,
    "array-volumes": volumes,
}
CODES = (*POOL_GAUGES, *ARRAY_GAUGES, "array-hosts")


def readings(scene: Scene, code: str) -> Iterator[Reading]:
    """Yield the use of one limit at every place that has it."""
    if code == "array-hosts":
        rows = (hosts(scene, array) for array in scene.case.estate.arrays)
        yield from (row for row in rows if row is not None)
    standing = scene.case.members(scene.where)
    for gauge, pools in gauges(scene, code):
        there = ((volume, pool) for pool in pools for volume in standing[pool])
        yield reading(scene, gauge, added(gauge, there))


def gauges(scene: Scene, code: str) -> Iterator[tuple[Gauge, tuple[str, ...]]]:
    """Yield the gauge of one limit at every place, with the pools it covers."""
    case = scene.case
    if code in POOL_GAUGES:
        for pool in case.estate.pools:
            if at_pool := POOL_GAUGES[code](scene, pool):
                yield at_pool, (pool.id,)
    if code in ARRAY_GAUGES:
        for array in case.estate.arrays:
            if at_array := ARRAY_GAUGES[code](scene, array):
                covered = [p.id for p in case.estate.pools if p.array == array.name]
                yield at_array, tuple(covered)


def added(gauge: Gauge, members: Iterator[tuple[Volume, str]]) -> list[int]:
    """Return the sum of what volumes add in pools, hour by hour; [] for no volumes."""
    total: Sequence[int] = []
    for volume, pool in members:
        total = plus(total, gauge.adds(volume, pool))
    return list(total)


def plus(total: Sequence[int], more: Sequence[int], sign: int = 1) -> list[int]:
    """Return a sum hour by hour; the total may be empty."""
    if not total:
        return [sign * new for new in more]
    return [old + sign * new for old, new in zip(total, more, strict=True)]


def reading(scene: Scene, gauge: Gauge, total: Sequence[int]) -> Reading:
    """Return a sum in the unit of the limit."""
    hours = len(scene.case.estate.hours) if gauge.hourly else 1
    shares = tuple(part * gauge.worth for part in total or [0] * hours)
    return Reading(
        gauge.code, gauge.where, gauge.unit, shares, gauge.at_most, gauge.hourly
    )
