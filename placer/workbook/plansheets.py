"""The tables of a plan workbook: which record stands where, under which headers.

One description serves the writer and the reader.  A column with a field is read back;
two columns with one field are the two halves of an id; a column without one is only
shown.
"""

from collections.abc import Callable
from dataclasses import dataclass, field
from typing import Any

from placer.estate import Estate
from placer.plan import (
    Booking,
    Bought,
    Goal,
    Left,
    Moment,
    Move,
    Placed,
    Reason,
    Shortage,
    Stopped,
    Use,
)
from placer.tally import share_of_limit
from placer.words import told
from placer.workbook.cellkinds import (
    GIBIBYTES,
    MEGABYTES_PER_SECOND,
    MILLISECONDS,
    MONEY,
    REAL,
    TEXT,
    TIME,
    WHOLE,
    Kind,
    Raw,
    blank_if_zero,
    choice,
)

SUMMARY = "summary"


@dataclass(frozen=True, slots=True)
class Scope:
    """What a record of the plan needs from the inventory to be shown."""

    ids: dict[str, tuple[str, str]]
    zones: dict[str, str]
    zone: str
    currency: str

    @classmethod
    def of(cls, estate: Estate) -> "Scope":
        """Return the scope of an inventory."""
        return cls(
            {v.id: (v.array, v.name) for v in estate.volumes},
            {w.name: w.zone for w in estate.windows},
            estate.policy.zone,
            estate.policy.currency,
        )

    def halves(self, volume: str) -> tuple[str, str]:
        """Return array and name of a volume's id, by the inventory where it knows."""
        array, slash, name = volume.partition("/")
        split = (array, name) if slash and array else ("", volume)
        return self.ids.get(volume, split)

    def zone_of(self, record: object) -> str:
        """Return the zone in which a record's times are shown."""
        return self.zones.get(getattr(record, "window", ""), self.zone)


Show = Callable[[Any, Scope], Any]


@dataclass(frozen=True, slots=True)
class Column:
    """One column: header, kind of cell, and how its value comes out of the record."""

    header: str
    kind: Kind
    field: str = ""
    show: Show | None = None

    def cell(self, record: object, scope: Scope) -> Raw:
        """Return what stands in this column for a record."""
        value = self.show(record, scope) if self.show else getattr(record, self.field)
        return self.kind.cell(value, scope.zone_of(record))


@dataclass(frozen=True, slots=True)
class Table:
    """One table: its sheet, the record of a row, and the field of the plan it fills."""

    sheet: str
    fills: str
    record: Callable[..., Any]
    columns: tuple[Column, ...]
    optional: bool = False
    headers: tuple[str, ...] = field(init=False)

    def __post_init__(self) -> None:
        headers = tuple(column.header for column in self.columns)
        object.__setattr__(self, "headers", headers)


def _volume() -> tuple[Column, Column]:
    return (
        Column("array", TEXT, "volume", lambda r, scope: scope.halves(r.volume)[0]),
        Column("volume", TEXT, "volume", lambda r, scope: scope.halves(r.volume)[1]),
    )


_FROM = Column("from", TEXT, "source")
_TO = Column("to", TEXT, "target")
_RESPONSE = blank_if_zero(MILLISECONDS)

GOALS = Table(
    SUMMARY,
    "goals",
    Goal,
    (
        Column("goal", TEXT, "name"),
        Column("in this plan", REAL, "value"),
        Column("unit", TEXT, "unit"),
        Column("in words", TEXT, show=lambda goal, scope: told(goal, scope.currency)),
        Column("best found", REAL, "reached"),
        Column("no plan is better than", REAL, "bound"),
        Column("search ended", choice(Stopped), "stopped"),
    ),
)
BOUGHT = Table(
    SUMMARY,
    "bought",
    Bought,
    (
        Column("bought for pool", TEXT, "pool"),
        Column("steps", WHOLE, "steps"),
        Column("price", MONEY, "price"),
    ),
    optional=True,
)
PLACEMENT = Table(
    "placement",
    "placements",
    Placed,
    (
        *_volume(),
        _FROM,
        _TO,
        Column("reason", choice(Reason), "reason"),
        Column("response today (ms)", _RESPONSE, "response_today"),
        Column("response planned, at least (ms)", _RESPONSE, "response_planned"),
        Column("response limit (ms)", _RESPONSE, "response_limit"),
    ),
)
POOLS = Table(
    "pools",
    "uses",
    Use,
    (
        Column("where", TEXT, "where"),
        Column("limit", TEXT, "limit"),
        Column("when (planned: with growth)", choice(Moment), "moment"),
        Column("used", REAL, "use"),
        Column("at most", REAL, "at_most"),
        Column("unit", TEXT, "unit"),
        Column(
            "share of limit (%)", REAL, show=lambda use, _scope: share_of_limit(use)
        ),
        Column("worst hour", TEXT, "hour"),
    ),
)
MOVES = Table(
    "moves",
    "moves",
    Move,
    (
        Column("move", TEXT, "id"),
        *_volume(),
        _FROM,
        _TO,
        Column("copy (GiB)", GIBIBYTES, "size"),
        Column("starts", TIME, "starts"),
        Column("ends", TIME, "ends"),
        Column("window of cutover", TEXT, "window"),
        Column("cutover", TIME, "cutover"),
        Column("released", TIME, "released"),
    ),
)
BOOKINGS = Table(
    "bookings",
    "bookings",
    Booking,
    (
        Column("move", TEXT, "move"),
        Column("window", TEXT, "window"),
        Column("starts", TIME, "starts"),
        Column("ends", TIME, "ends"),
        Column("rate (MB/s)", MEGABYTES_PER_SECOND, "rate"),
    ),
)
LEFT = Table(
    "left over",
    "left",
    Left,
    (
        Column("volume", TEXT, "volume"),
        _FROM,
        _TO,
        Column("what it lacks", TEXT, "lacks"),
    ),
    optional=True,
)
SHORTAGES = Table(
    "shortages",
    "shortages",
    Shortage,
    (
        Column("limit", TEXT, "limit"),
        Column("where", TEXT, "where"),
        Column("hour", TEXT, "hour"),
        Column("amount", REAL, "amount"),
        Column("unit", TEXT, "unit"),
        Column("sentence", TEXT, "sentence"),
        Column("remedy", TEXT, "remedy"),
    ),
    optional=True,
)
TABLES = (GOALS, BOUGHT, PLACEMENT, POOLS, MOVES, BOOKINGS, LEFT, SHORTAGES)
