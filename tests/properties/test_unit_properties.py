"""An inventory typed in other units is the same inventory, and its plan the same plan.

Factors are those of IEC 80000-13 and of the SI prefixes: 1 TiB = 1024 GiB, 1 GiB =
1.073741824 GB, 1 MiB = 1.048576 MB.
"""

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, fields, is_dataclass, replace
from decimal import Context, Decimal
from enum import Enum
from pathlib import Path
from tempfile import TemporaryDirectory

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from sheetfiles import TODAY, Lines, as_folder

from placer import planner
from placer.candidates.table import candidates
from placer.estate import Estate
from placer.findings import errors
from placer.units import GB, GIB, KIB, MB, MIB
from placer.workbook.intake import read

Sheets = Mapping[str, Lines]
SECONDS = 10.0
DIGITS = Context(prec=9)
GB_MEANS = "GB in this export means"
some = settings(derandomize=True, max_examples=25, deadline=None)
few = settings(derandomize=True, max_examples=6, deadline=None)


@dataclass(frozen=True)
class Change:
    """A unit of ours, another, and how many of the other one of ours is.

    ``gb`` is what the policy says GB means, blank where nothing.
    """

    ours: str
    other: str
    factor: Decimal
    gb: str = ""


def change(ours: str, other: str, size: int, other_size: int, gb: str = "") -> Change:
    return Change(ours, other, Decimal(size) / other_size, gb)


CHANGES = (
    change("GiB", "TiB", 1, KIB),
    change("GiB", "MiB", KIB, 1),
    change("GiB", "GB", GIB, GB, gb="10^9"),
    change("GiB", "GB", 1, 1, gb="2^30"),
    change("GB", "TB", 1, 1_000),
    change("GB", "GiB", GB, GIB),
    change("MB/s", "MiB/s", MB, MIB),
    change("MB/s", "Mbit/s", 8, 1),
    change("ms", "us", 1_000, 1),
    change("us", "ms", 1, 1_000),
    change("KiB", "B", KIB, 1),
)


VOLUMES: list[object] = [
    *("array", "volume", "pool", "provisioned (GiB)", "occupied (GiB)"),
    *("requests (1/s)", "reads (%)", "throughput (MB/s)"),
    *("response limit (ms)", "snapshots (GiB)"),
]
POOLS: list[list[object]] = [
    [
        *("pool", "array", "media", "drives without spares", "drive size (GB)"),
        *("read time idle (us)", "seek (ms)", "rpm", "MB/s per drive"),
        *("reads at most (1/s per drive)", "least free (GiB)"),
    ],
    ["fast", "quay", "flash", 6, 960, 120, None, None, 500, 50_000, 10],
    ["slow", "quay", "spinning", 24, 1200, None, 4.2, 10_000, 150, None, 20.5],
    ["deep", "depot", "spinning", 12, 2000, None, 8.5, 7_200, 180, None, None],
]
ARRAYS: list[list[object]] = [
    [
        *("array", "site", "write answer (us)", "cache (GiB)"),
        *("one copy at most (MB/s)", "MB/s per controller"),
    ],
    ["quay", "harbour", 350, 256, 200, 2_400],
    ["depot", "inland", 450.0, 128, 150, 1_600],
]
POLICY: list[list[object]] = [
    ["setting", "value"],
    ["start date", TODAY.isoformat()],
    ["growth horizon (months)", 0],
    ["zone", "UTC"],
]
WINDOWS: list[list[object]] = [
    ["window", "opens on", "opens at", "lasts (h)", "all copies together (MB/s)"],
    ["night", "FREQ=DAILY", "22:00", 8, 400],
]
LOAD_HEADS: list[object] = [
    *("array", "volume", "hour begins", "reads (1/s)", "writes (1/s)"),
    *("read size (KiB)", "write size (KiB)"),
]


@st.composite
def inventories(draw: st.DrawFn) -> Sheets:
    """Return a few volumes; sizes and rates have up to two decimals."""

    def cents(low: int, high: int) -> float:
        return draw(st.integers(100 * low, 100 * high)) / 100

    volumes, load = [VOLUMES], [LOAD_HEADS]
    for number in range(draw(st.integers(2, 6))):
        array, pool = draw(st.sampled_from(["quay/slow", "depot/deep"])).split("/")
        name, size = f"v{number}", cents(10, 300)
        requests = draw(st.integers(5, 150))
        limit = draw(st.sampled_from([None, 2.5, 8]))
        moved = requests * draw(st.integers(4, 64)) / 1_000
        volumes.append(
            [array, name, pool, size, size, requests, 70, moved, limit, cents(0, 9)]
        )
        kib = [cents(4, 64), cents(4, 64)]
        if number % 2:  # the others' sizes are those of their throughput
            load += [[array, name, h, requests, requests / 4, *kib] for h in range(24)]
    return {
        "volumes": volumes,
        "pools": POOLS,
        "arrays": ARRAYS,
        "policy": POLICY,
        "windows": WINDOWS,
        "load": load,
    }


def typed(sheets: Sheets, each: Change, digits: Context | None = None) -> Sheets:
    """Return the sheets in another unit, each number with so many digits, or all."""
    found = {name: _sheet(lines, each, digits) for name, lines in sheets.items()}
    if each.gb:
        found["policy"] = [*found["policy"], [GB_MEANS, each.gb]]
    return found


def _sheet(lines: Lines, each: Change, digits: Context | None) -> Lines:
    heads, *rows = lines
    found = [_heading(str(head), each) for head in heads]
    changed = [head != str(old) for head, old in zip(found, heads, strict=True)]
    return [
        found,
        *(
            [
                _number(cell, each, digits) if touched else cell
                for cell, touched in zip(row, changed, strict=True)
            ]
            for row in rows
        ),
    ]


def _heading(head: str, each: Change) -> str:
    if head.startswith(f"{each.ours} "):
        return each.other + head.removeprefix(each.ours)
    return head.replace(f"({each.ours})", f"({each.other})")


def _number(cell: object, each: Change, digits: Context | None) -> object:
    if cell is None:
        return None
    exact = Decimal(str(cell)) * each.factor
    return f"{digits.plus(exact) if digits else exact:f}"


def estate(sheets: Sheets) -> Estate:
    """Return the estate without what tells one file from another."""
    with TemporaryDirectory() as folder:
        found = read(as_folder(Path(folder) / "disks", sheets), TODAY)
    assert found.estate is not None, errors(found.findings)
    return replace(found.estate, digest="", assumptions=())


def numbers(record: object) -> Iterator[int]:
    """Yield all whole numbers of a record, in order."""
    if is_dataclass(record):
        for field in fields(record):
            yield from numbers(getattr(record, field.name))
    elif isinstance(record, Sequence) and not isinstance(record, str):
        for item in record:
            yield from numbers(item)
    elif isinstance(record, int) and not isinstance(record, Enum):
        yield record


def decisions(whole: Estate) -> list[tuple[object, ...]]:
    """Return where every volume goes and why, and what the goals reach."""
    plan = planner.plan(candidates(whole), SECONDS)
    return [
        *((p.volume, p.target, p.reason) for p in plan.placements),
        *((move.volume, move.source, move.target) for move in plan.moves),
        (plan.status, len(plan.left)),
    ]


@pytest.mark.parametrize("each", CHANGES, ids=lambda c: f"{c.ours}-{c.other}{c.gb}")
def test_every_change_touches_a_column(each: Change) -> None:
    sheets = {"pools": POOLS, "arrays": ARRAYS, "load": [LOAD_HEADS]}
    assert typed({**sheets, "policy": POLICY}, each) != {**sheets, "policy": POLICY}


@some
@given(inventories(), st.sampled_from(CHANGES))
def test_other_units_make_the_same_records(sheets: Sheets, each: Change) -> None:
    """To the byte, where every digit of the converted number is typed."""
    assert estate(typed(sheets, each)) == estate(sheets)


@some
@given(inventories(), st.sampled_from(CHANGES))
def test_nine_digits_make_the_same_records_but_for_rounding(
    sheets: Sheets, each: Change
) -> None:
    """Half a unit of the ninth digit, and one of the small unit."""
    found = list(numbers(estate(typed(sheets, each, DIGITS))))
    assert found == pytest.approx(list(numbers(estate(sheets))), rel=1e-8, abs=1)


@few
@given(inventories(), st.sampled_from(CHANGES))
def test_other_units_make_the_same_decisions(sheets: Sheets, each: Change) -> None:
    """Typed with nine digits, as exports are."""
    expected = decisions(estate(sheets))
    assert decisions(estate(typed(sheets, each, DIGITS))) == expected


def test_the_inventories_drawn_make_volumes_move() -> None:
    """The same decisions would say little if nothing were decided."""
    moving: list[bool] = []

    @few
    @given(inventories())
    def look(sheets: Sheets) -> None:
        plan = planner.plan(candidates(estate(sheets)), SECONDS)
        moving.append(bool(plan.moves))

    look()
    assert sum(moving) > len(moving) / 3
