"""Records of the inventory: what there is, where it is, and what is asked of it.

Knows no file format and no formula.  Every record is frozen, holds whole numbers of the
small units of ``placer.units`` and remembers the cell it came from.  Local time ends
before this module: instants are minutes since 1970-01-01 UTC [min].
"""

from dataclasses import dataclass, field
from enum import StrEnum

from placer.findings import Place


class Media(StrEnum):
    """What a pool is made of; the last two are only ever sources."""

    FLASH = "flash"
    SPINNING = "spinning"
    MIXED = "mixed"
    UNMODELLED = "unmodelled"


class Importance(StrEnum):
    """How much a volume's waiting counts."""

    VITAL = "vital"
    HIGH = "high"
    NORMAL = "normal"
    LOW = "low"

    @property
    def weight(self) -> int:
        """Weight in the sums over volumes: 8, 4, 2, 1."""
        return {"vital": 8, "high": 4, "normal": 2, "low": 1}[self.value]


class Aim(StrEnum):
    """Whether relief or standing still comes first."""

    BEST_USE = "best use"
    LEAST_CHANGE = "least change"


class RuleKind(StrEnum):
    """Relations a user may ask for."""

    ONLY_ON = "only on"
    NEVER_ON = "never on"
    APART = "apart"
    TOGETHER = "together"


class Level(StrEnum):
    """At which level volumes are kept apart or together."""

    POOL = "pool"
    ARRAY = "array"
    SITE = "site"


@dataclass(frozen=True, slots=True)
class Hour:
    """One hour of demand on the estate's clock (the zone of the policy).

    ``weekday`` is 0 for Monday to 6 for Sunday, or None where the hour stands for every
    day.  A measured hour keeps its own ``label`` and still has a weekday and an hour:
    several hours of an estate may share them.
    """

    weekday: int | None
    hour: int
    label: str


@dataclass(frozen=True, slots=True)
class Load:
    """What a volume's hosts ask of it in one hour: [1/1000 s] and [B/s]."""

    reads: int
    writes: int
    read_bytes: int
    write_bytes: int


@dataclass(frozen=True, slots=True, kw_only=True)
class Volume:
    """A volume, where it is today, and what is asked of it.

    ``load`` has one entry per hour of the estate.  ``response_limit`` 0 means none.
    ``random_reads`` and ``read_hits`` are shares of the reads [ppm]; ``large_share``
    [ppm] of all requests has ``large_size`` [B]; ``snapshots`` [B] take room beside the
    volume and are not copied with it.
    """

    array: str
    name: str
    pool: str
    provisioned: int
    occupied: int
    thin: bool
    load: tuple[Load, ...]
    profiled: bool = False
    host: str = ""
    applications: tuple[str, ...] = ()
    tenant: str = ""
    random_reads: int = 1_000_000
    read_hits: int = 0
    large_share: int = 0
    large_size: int = 0
    snapshots: int = 0
    snapshot_days: int = 0
    service_class: str = ""
    response_measured: int = 0
    response_limit: int = 0
    importance: Importance = Importance.NORMAL
    capacity_growth: int = 0
    load_growth: int = 0
    stays: bool = False
    hold_days: int = 14
    place: Place = Place()

    @property
    def id(self) -> str:
        """Key of the volume: ``array/volume``."""
        return f"{self.array}/{self.name}"

    @property
    def home(self) -> str:
        """Id of the pool where the volume is now: ``array/pool``."""
        return f"{self.array}/{self.pool}"

    @property
    def days_held(self) -> int:
        """Days its source is kept after a move: for the way back and its snapshots."""
        return max(self.hold_days, self.snapshot_days)


@dataclass(frozen=True, slots=True, kw_only=True)
class Expansion:
    """Drives a pool could be given, in steps: price [hundredths], delivery [days]."""

    drives: int
    price: int
    at_most: int
    delivery_days: int = 0


@dataclass(frozen=True, slots=True, kw_only=True)
class Pool:
    """One kind of media in one array under one protection.

    Zero means "not limited" for ``reads_at_most``, ``writes_at_most`` [1/1000 s per
    drive], ``drive_rate`` [B/s per drive], ``thin_at_most`` [ppm], ``requests_at_most``
    [1/1000 s, whole pool] and ``dwpd`` [ppm, drive writes per day]; times are [µs],
    sizes [B], shares and ratios [ppm].  ``busy_measured`` 0 means not measured;
    ``measured_factor`` is what measured times are of modelled ones; with
    ``one_drive_lost`` the busy ceiling must hold in a group that lost a drive.
    """

    array: str
    name: str
    media: Media
    drives: int = 0
    data: int = 1
    parity: int = 0
    drive_size: int = 0
    usable: int = 0
    overhead: int = 30_000
    fill_ceiling: int = 850_000
    least_free: int = 0
    thin_at_most: int = 0
    reduction: int = 1_000_000
    in_place: bool = True
    one_drive_lost: bool = False
    busy_ceiling: int = 700_000
    skew: int = 1_200_000
    read_time: int = 0
    write_time: int = 0
    reads_at_most: int = 0
    writes_at_most: int = 0
    drive_rate: int = 0
    dwpd: int = 0
    warranty_days: int = 0
    wear_used: int = 0
    life_days: int = 0
    array_overhead: int = 1_100_000
    rpm: int = 0
    seek: int = 0
    prefetch_unit: int = 2**20
    busy_measured: int = 0
    measured_factor: int = 1_000_000
    requests_at_most: int = 0
    expansion: Expansion | None = None
    place: Place = Place()

    @property
    def id(self) -> str:
        """Key of the pool: ``array/pool``."""
        return f"{self.array}/{self.name}"

    @property
    def takes_volumes(self) -> bool:
        """Whether volumes may be placed here: mixed and unmodelled pools only give."""
        return self.media in (Media.FLASH, Media.SPINNING)


@dataclass(frozen=True, slots=True, kw_only=True)
class Array:
    """Controllers and front end.  Zero means "not limited" for every limit.

    Requests are [1/1000 s] and rates [B/s] per controller; copy rates [B/s] are of the
    whole array; shares and ratios [ppm]; answers [µs]; ``cache`` [B], 0 unknown.
    """

    name: str
    site: str = ""
    controllers: int = 2
    failures_survived: int = 1
    reads_at_most: int = 0
    writes_at_most: int = 0
    controller_rate: int = 0
    controller_ceiling: int = 700_000
    uneven: int = 1_150_000
    write_answer: int = 0
    read_hit_answer: int = 0
    cache: int = 0
    busy_measured: int = 0
    one_copy: int = 0
    copies_in: int = 0
    copies_out: int = 0
    copies_at_once: int = 0
    volumes_at_most: int = 0
    hosts_at_most: int = 0
    largest_volume: int = 0
    place: Place = Place()


@dataclass(frozen=True, slots=True, kw_only=True)
class Host:
    """A host; it reaches every array where ``arrays`` is empty."""

    name: str
    arrays: tuple[str, ...] = ()
    place: Place = Place()


@dataclass(frozen=True, slots=True, kw_only=True)
class Tenant:
    """Caps of a tenant: [1/1000 s] and [B/s], 0 where not capped.

    With ``plan_for_cap`` the plan provides what the tenant may ask for, not what was
    measured.
    """

    name: str
    requests_cap: int = 0
    rate_cap: int = 0
    plan_for_cap: bool = False
    place: Place = Place()


@dataclass(frozen=True, slots=True, kw_only=True)
class Route:
    """A way of copying between two places, each an array or a site.

    ``one_copy`` and ``together`` are [B/s], 0 where not limited.  Where the inventory
    has no routes at all, every copy is possible; where it has any, only those listed
    (inside one array a copy is always possible).
    """

    source: str
    target: str
    possible: bool = True
    one_copy: int = 0
    together: int = 0
    place: Place = Place()


@dataclass(frozen=True, slots=True, kw_only=True)
class Rule:
    """A relation the user asks for, with its volumes and pools already looked up.

    ``pools`` are the pools of "only on" and "never on"; ``level`` belongs to "apart"
    and "together"; ``said`` is the user's own wording.
    """

    kind: RuleKind
    volumes: tuple[str, ...]
    pools: tuple[str, ...] = ()
    level: Level = Level.POOL
    said: str = ""
    why: str = ""
    place: Place = Place()


@dataclass(frozen=True, slots=True, kw_only=True)
class Window:
    """A time when copies and cutovers may happen: [start, end) [min UTC].

    Freezes are already cut out: a window cut in two has two records with one ``night``.
    ``opens`` is where the uncut window starts; the hold counts from there.  ``rate``
    [B/s], ``at_once`` and ``cutovers`` are 0 where not limited; ``arrays`` empty means
    all.
    """

    name: str
    night: str
    opens: int
    start: int
    end: int
    zone: str
    rate: int = 0
    at_once: int = 0
    cutovers: int = 4
    arrays: tuple[str, ...] = ()
    place: Place = Place()


@dataclass(frozen=True, slots=True, kw_only=True)
class Policy:
    """What the owner asks for.

    ``start`` is the local midnight of the start date, ``earliest`` the local midnight
    of the first day on which the change lead lets a copy start, ``finish_by`` and
    ``cured_by`` local midnights *after* the dates named (0 where blank), all [min UTC].
    """

    start: int
    earliest: int
    zone: str = "UTC"
    horizon_months: int = 12
    budget: int = 0
    currency: str = ""
    aim: Aim = Aim.BEST_USE
    least_gain: int = 300_000
    relief_given_up: int = 50_000
    tolerance: int = 100_000
    cured_by: int = 0
    finish_by: int = 0
    hold_days: int = 14
    nights_kept_free: int = 200_000
    cutover_minutes: int = 60
    cutover_counts_as: int = 10 * 2**30
    latent_demand: int = 1_500_000
    seed: int = 1
    time_limit: int = 60


@dataclass(frozen=True, slots=True)
class Control:
    """Totals typed by the owner from another source; ``array`` empty means all."""

    array: str
    volumes: int | None
    provisioned: int | None
    requests: int | None
    place: Place = Place()


@dataclass(frozen=True, slots=True)
class Assumption:
    """A default that stood in for empty cells, and how many cells it filled."""

    sheet: str
    column: str
    value: str
    cells: int
    effect: str


@dataclass(frozen=True, slots=True, kw_only=True)
class Estate:
    """All that one inventory describes."""

    name: str
    digest: str
    hours: tuple[Hour, ...]
    volumes: tuple[Volume, ...]
    pools: tuple[Pool, ...]
    arrays: tuple[Array, ...]
    policy: Policy
    hosts: tuple[Host, ...] = ()
    routes: tuple[Route, ...] = ()
    tenants: tuple[Tenant, ...] = ()
    rules: tuple[Rule, ...] = ()
    windows: tuple[Window, ...] = ()
    controls: tuple[Control, ...] = ()
    assumptions: tuple[Assumption, ...] = field(default=())
