"""Week-long measurements of real disks, and an inventory made of them.

The measurements are open data and stand beside the repository, never in it: half hours
of 53 virtual disks, computed in the public repository pbhandar2/BlockTraceFeatures from
the traces of C. Waldspurger, N. Park, A. Garthwaite, I. Ahmad, "Efficient MRC
construction with SHARDS", FAST 2015.

Measured are requests, bytes and the span of the addresses.  Everything else is made up:
the arrays, pools and windows, that every disk's own start is the midnight of one Monday
(``DAY_ONE``), and that a disk is as large as its span and full.
"""

import csv
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from datetime import date, timedelta
from itertools import cycle
from pathlib import Path

from placer.units import GIB, KIB, MB

FILE = Path(__file__).parents[2] / "shared" / "real" / "disks-half-hourly.csv"
DAY_ONE = date(2027, 1, 11)
LEAST_SECONDS = 900
HOURS_A_DAY = 24


@dataclass(frozen=True)
class Span:
    """What a disk was asked for from a minute of its own on."""

    minute: int
    seconds: int
    reads: int
    writes: int
    read_bytes: int
    written_bytes: int
    addresses: int

    @property
    def rate(self) -> float:
        """Requests per second of the true length."""
        return (self.reads + self.writes) / self.seconds


Disks = Mapping[str, Sequence[Span]]


def half_hours() -> Disks:
    """Return the intervals of every disk; those under 900 s are left out."""
    found: dict[str, list[Span]] = {}
    with FILE.open(newline="", encoding="utf-8") as file:
        for row in csv.DictReader(file):
            if int(row["seconds"]) >= LEAST_SECONDS:
                found.setdefault(row["disk"], []).append(_span(row))
    return found


def _span(row: Mapping[str, str]) -> Span:
    return Span(
        *(int(row[name]) for name in ("minute", "seconds", "reads", "writes")),
        *(int(row[n]) for n in ("read_bytes", "written_bytes", "address_span_bytes")),
    )


def by(minutes: int, spans: Iterable[Span]) -> dict[int, Span]:
    """Return intervals summed by the slot of so many minutes in which they start."""
    found: dict[int, Span] = {}
    for span in spans:
        slot = span.minute // minutes
        found[slot] = _sum(found[slot], span) if slot in found else span
    return found


def _sum(first: Span, second: Span) -> Span:
    return Span(
        first.minute,
        first.seconds + second.seconds,
        first.reads + second.reads,
        first.writes + second.writes,
        first.read_bytes + second.read_bytes,
        first.written_bytes + second.written_bytes,
        max(first.addresses, second.addresses),
    )


def folded(spans: Iterable[Span]) -> dict[int, Span]:
    """Return a disk's week folded to the 24 hours of one day."""
    found: dict[int, Span] = {}
    for slot, span in by(60, spans).items():
        hour = slot % HOURS_A_DAY
        found[hour] = _sum(found[hour], span) if hour in found else span
    return found


def highest(disks: Iterable[Mapping[int, Span]]) -> float:
    """Return the highest sum over the disks in any slot [1/s]."""
    total: dict[int, float] = {}
    for slots in disks:
        for slot, span in slots.items():
            total[slot] = total.get(slot, 0.0) + span.rate
    return max(total.values())


def inventory(disks: Disks, *, one_day: bool = False) -> dict[str, list[list[object]]]:
    """Return the sheets of an inventory; ``one_day`` folds the load to one day."""
    slots = {
        name: folded(spans) if one_day else by(60, spans)
        for name, spans in disks.items()
    }
    homes = _dealt(slots)
    return {
        "volumes": [
            _VOLUME_HEADS,
            *(_volume(name, homes[name], slots[name]) for name in homes),
        ],
        "pools": _table(POOLS),
        "arrays": _table(ARRAYS),
        "policy": [["setting", "value"], *([k, v] for k, v in POLICY.items())],
        "windows": _table(WINDOWS),
        "load": [
            _LOAD_HEADS,
            *(
                [homes[name][0], name, *_day(slot, one_day=one_day), *_load(span)]
                for name in homes
                for slot, span in slots[name].items()
            ),
        ],
    }


_VOLUME_HEADS: list[object] = [
    *("array", "volume", "pool", "provisioned (GiB)", "occupied (GiB)"),
    *("requests (1/s)", "reads (%)", "throughput (MB/s)"),
]
_LOAD_HEADS: list[object] = [
    *("array", "volume", "day", "hour begins", "reads (1/s)", "writes (1/s)"),
    *("read size (KiB)", "write size (KiB)"),
]


def _dealt(slots: Mapping[str, Mapping[int, Span]]) -> dict[str, list[str]]:
    """Return array and pool of each disk: the busiest first, dealt out like cards."""
    peak = {name: max(span.rate for span in s.values()) for name, s in slots.items()}
    names = sorted(peak, key=lambda name: -peak[name])
    dealt = zip(names, cycle(HOMES), strict=False)
    return {name: home.split("/") for name, home in dealt}


def _volume(name: str, home: list[str], slots: Mapping[int, Span]) -> list[object]:
    array, pool = home
    size = -(-max(span.addresses for span in slots.values()) // GIB)
    busy = max(slots.values(), key=lambda span: span.rate)
    requests = busy.reads + busy.writes
    moved = (busy.read_bytes + busy.written_bytes) / busy.seconds / MB
    reads = f"{busy.reads / requests:.2%}"
    return [array, name, pool, size, size, busy.rate, reads, moved]


def _day(slot: int, *, one_day: bool) -> list[object]:
    days, hour = divmod(slot, HOURS_A_DAY)
    return ["" if one_day else (DAY_ONE + timedelta(days)).isoformat(), hour]


def _load(span: Span) -> list[object]:
    return [
        span.reads / span.seconds,
        span.writes / span.seconds,
        span.read_bytes / max(span.reads, 1) / KIB,
        span.written_bytes / max(span.writes, 1) / KIB,
    ]


def _table(rows: Sequence[Mapping[str, object]]) -> list[list[object]]:
    heads = list(dict.fromkeys(name for row in rows for name in row))
    return [list(heads), *([row.get(name, "") for name in heads] for row in rows)]


_FLASH: dict[str, object] = {
    "media": "flash",
    "drive size (GB)": 800,
    "writes in place": "no",
    "read time idle (us)": 120,
    "reads at most (1/s per drive)": 600_000,
    "writes at most (1/s per drive)": 100_000,
    "MB/s per drive": 7_000,
    "warranty (years)": 5,
    "life asked (years)": 5,
}
_SPINNING: dict[str, object] = {
    "media": "spinning",
    "drives without spares": 48,
    "drive size (GB)": 1200,
    "rpm": 10_000,
    "seek (ms)": 4.2,
    "MB/s per drive": 150,
    "data per stripe": 1,
    "parity per stripe": 1,
}
POOLS: tuple[dict[str, object], ...] = (
    {
        **_FLASH,
        "pool": "fast",
        "array": "quay",
        "drives without spares": 12,
        "data per stripe": 4,
        "parity per stripe": 2,
        "drive writes per day": 10,
    },
    {
        **_FLASH,
        "pool": "swift",
        "array": "depot",
        "drives without spares": 9,
        "data per stripe": 7,
        "parity per stripe": 2,
        "drive writes per day": 3,
    },
    {**_SPINNING, "pool": "bulk", "array": "quay"},
    {**_SPINNING, "pool": "deep", "array": "depot"},
    {
        **_SPINNING,
        "pool": "hold",
        "array": "depot",
        "data per stripe": 6,
        "parity per stripe": 2,
        "rpm": 7200,
        "seek (ms)": 8.5,
    },
)
HOMES = (
    *("quay/fast", "depot/swift", "quay/fast", "depot/swift"),
    *("quay/bulk", "depot/deep", "depot/hold"),
)
ARRAYS: tuple[dict[str, object], ...] = tuple(
    {
        "array": name,
        "site": site,
        "controllers": controllers,
        "reads at most (1/s per controller)": 200_000,
        "writes at most (1/s per controller)": 100_000,
        "MB/s per controller": 12_000,
        "write answer (us)": 400,
        "one copy at most (MB/s)": 200,
        "all copies in together (MB/s)": 600,
        "all copies out together (MB/s)": 600,
        "copies at once": 4,
    }
    for name, site, controllers in (("quay", "harbour", 8), ("depot", "inland", 6))
)
WINDOWS: tuple[dict[str, object], ...] = (
    {
        "window": "night",
        "opens on": "FREQ=WEEKLY;BYDAY=MO,TU,WE,TH",
        "opens at": "22:00",
        "lasts (h)": 6,
        "cutovers at most": 8,
    },
)
POLICY: dict[str, object] = {
    "start date": DAY_ONE.isoformat(),
    "zone": "Europe/Berlin",
    "growth horizon (months)": 0,
    "change lead (working days)": 5,
    "finish by": "2027-03-31",
    "time limit (s)": 15,
}
