"""Rows of the sheet pools to pools."""

from collections.abc import Iterable, Iterator
from typing import Any

from placer.estate import Expansion, Media, Pool
from placer.units import GB
from placer.workbook.reading.names import Names
from placer.workbook.reading.table import Row

_SMALLEST_DRIVE = 100 * GB
_ROOM = {
    "usable before reduction": "usable",
    "fill ceiling": "fill_ceiling",
    "least free": "least_free",
    "provisioned / usable at most": "thin_at_most",
    "reduction here": "reduction",
    "requests at most": "requests_at_most",
}
_DRIVES = {
    "drives without spares": "drives",
    "drive size": "drive_size",
    "data per stripe": "data",
    "parity per stripe": "parity",
}
_LOAD = {
    "read time idle": "read_time",
    "write time idle": "write_time",
    "reads at most": "reads_at_most",
    "writes at most": "writes_at_most",
    "MB/s per drive": "drive_rate",
    "rpm": "rpm",
    "seek": "seek",
    "skew": "skew",
    "pool busy measured": "busy_measured",
    "measured factor": "measured_factor",
    "drive writes per day": "dwpd",
}
_WEAR = {
    "warranty": "warranty_days",
    "wear used": "wear_used",
    "life asked": "life_days",
    "array overhead": "array_overhead",
}
_EXPANSION = ("drives per step", "price per step", "steps at most")


def read_pools(rows: Iterable[Row], names: Names) -> tuple[Pool, ...]:
    """Return the pools; their ids are added to ``names``."""
    return tuple(_pool(row, names) for row in rows)


def _pool(row: Row, names: Names) -> Pool:
    said = row.text("media")
    media = Media(said) if said else Media.UNMODELLED
    numbers: dict[str, Any] = {
        field: row.whole(column, said) for column, field in _columns(row, media)
    }
    pool = Pool(
        array=row.text("array"),
        name=row.text("pool"),
        media=media,
        in_place=not row.given("writes in place") or row.switch("writes in place"),
        one_drive_lost=row.values.get("plan for a lost drive") is True,
        expansion=_expansion(row),
        place=row.place("pool"),
        **numbers,
    )
    if row.given("array") and row.given("pool"):
        names.add(pool.id, row.place("pool"))
    _assume_in_place(row, pool)
    _check_lost_drive(row, pool)
    _check_room(row, pool)
    return pool


def _columns(row: Row, media: Media) -> Iterator[tuple[str, str]]:
    """Return columns and fields that are filled or used; the rest keep the record's."""
    modelled = media in (Media.FLASH, Media.SPINNING)
    from_drives = not row.given("usable before reduction")
    by_drive = modelled and not row.given("requests at most")
    used = {
        **dict.fromkeys(_ROOM, True),
        **dict.fromkeys(_DRIVES, by_drive or (modelled and from_drives)),
        "overhead": modelled and from_drives,
        "busy ceiling": modelled,
        "prefetch unit": by_drive and media is Media.SPINNING,
        **dict.fromkeys(_LOAD, by_drive),
        **dict.fromkeys(_WEAR, row.exact("drive writes per day") > 0),
    }
    own = {
        "overhead": "overhead",
        "busy ceiling": "busy_ceiling",
        "prefetch unit": "prefetch_unit",
    }
    fields = _ROOM | _DRIVES | own | _LOAD | _WEAR
    for column, field in fields.items():
        if used[column] or row.given(column):
            yield column, field


def _assume_in_place(row: Row, pool: Pool) -> None:
    """Say that parity is taken to be updated in place, where it makes a difference."""
    matters = pool.parity > 0 and pool.data > 1 and not pool.requests_at_most
    if matters and not row.given("writes in place"):
        row.assume("writes in place")


def _check_lost_drive(row: Row, pool: Pool) -> None:
    """Say that all drives are taken to work; or that a lost one cannot be counted."""
    counted = pool.takes_volumes and pool.parity > 0 and not pool.requests_at_most
    if counted and not row.given("plan for a lost drive"):
        row.assume("plan for a lost drive")
    if pool.one_drive_lost and not counted and not row.faulty:
        row.remarks.warn(
            "lost-drive",
            row.place("plan for a lost drive"),
            f"a lost drive of {pool.id} cannot be counted: its drives or its parity "
            "are not known",
            "fill in data and parity per stripe and the drives, or write no",
        )


def _expansion(row: Row) -> Expansion | None:
    given = [column for column in _EXPANSION if row.given(column)]
    if not given:
        return None
    for column in _EXPANSION:
        if column not in given and column not in row.faulty:
            row.error(
                "blank",
                column,
                f"{given[0]} is filled in, but {column} is not",
                "fill in all three, or none where the pool cannot grow",
            )
    if row.given("requests at most") and not row.given("drives without spares"):
        row.error(
            "blank",
            "drives without spares",
            "a pool that can grow must say how many drives it has now",
            "fill in the drives",
        )
    return Expansion(
        drives=row.whole("drives per step"),
        price=row.whole("price per step"),
        at_most=row.whole("steps at most"),
        delivery_days=row.whole("delivery") + row.whole("ready after delivery"),
    )


def _check_room(row: Row, pool: Pool) -> None:
    _check_drive_size(row, pool)
    raw = pool.drives * pool.drive_size
    if raw and pool.usable > raw:
        row.error(
            "raw-capacity",
            "usable before reduction",
            "usable is more than all drives together hold",
            "give the usable room before compression and deduplication",
        )
    needed = ("drives without spares", "drive size")
    if pool.takes_volumes and not pool.usable and not raw:
        missing = [c for c in needed if not row.whole(c) and c not in row.faulty]
        if missing and "usable before reduction" not in row.faulty:
            row.error(
                "blank",
                missing[0],
                f"the room of the pool is not known: {' and '.join(missing)} missing",
                "fill in drives and drive size, or usable before reduction",
            )


def _check_drive_size(row: Row, pool: Pool) -> None:
    if not row.given("drive size") or pool.drive_size >= _SMALLEST_DRIVE:
        return
    say = row.remarks.warn if pool.usable else row.remarks.error
    say(
        "drive-size",
        row.place("drive size"),
        f"a drive of {pool.drive_size / GB:g} GB is very small: is it TB?",
        "write the size in GB, or head the column (TB); where it is right, give "
        "usable before reduction as well",
    )
