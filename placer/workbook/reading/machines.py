"""Rows of the sheets arrays, hosts and routes to their records."""

from collections.abc import Iterable, Iterator, Sequence

from placer.estate import Array, Host, Route
from placer.findings import Place
from placer.units import supply
from placer.workbook.columns import sheet
from placer.workbook.reading.names import Names
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.table import Row


def read_arrays(
    rows: Iterable[Row],
    others: Iterable[tuple[str, Place]],
    names: Names,
    remarks: Remarks,
    *,
    hits: bool,
) -> tuple[Array, ...]:
    """Return the arrays of the sheet, then those only named elsewhere, by default.

    Parameters
    ----------
    others
        Arrays named in other sheets, with the cell.
    hits
        Whether the reads of any volume hit a cache.
    """
    listed = []
    sites = Names("site", remarks)
    for row in rows:
        listed.append(_array(row, hits=hits))
        if row.given("array"):
            names.add(row.text("array"), row.place("array"))
        if row.given("site"):
            sites.meet(row.text("site"), row.place("site"))
    unlisted = _unlisted(others, names, remarks)
    return (*listed, *(_array(row, hits=hits) for row in unlisted))


def _unlisted(
    others: Iterable[tuple[str, Place]], names: Names, remarks: Remarks
) -> Iterator[Row]:
    for name, place in others:
        if name and names.meet(name, place):
            described = sheet("arrays")
            yield Row(
                described, {"array": name}, {"array": place}, frozenset(), remarks
            )


def _array(row: Row, *, hits: bool) -> Array:
    if "/" in row.text("array"):
        row.error(
            "id",
            "array",
            f'the array "{row.text("array")}" has a / in its name',
            "name it without /: it stands between array and volume",
        )
    copies_in = row.whole("all copies in together")
    copies_out = row.whole("all copies out together")
    at_once = row.whole("copies at once")
    _check_controllers(row)
    return Array(
        name=row.text("array"),
        site=row.text("site"),
        controllers=row.whole("controllers"),
        failures_survived=row.whole("controller failures survived"),
        reads_at_most=row.whole("reads at most"),
        writes_at_most=row.whole("writes at most"),
        controller_rate=row.whole("MB/s per controller"),
        controller_ceiling=row.whole("controller ceiling"),
        uneven=row.whole("uneven"),
        write_answer=row.whole("write answer"),
        read_hit_answer=row.whole("read hit answer", matters=hits),
        cache=_cache(row, hits=hits),
        busy_measured=row.whole("controller busy measured"),
        one_copy=_one_copy(row, min(copies_in, copies_out), at_once),
        copies_in=copies_in,
        copies_out=copies_out,
        copies_at_once=at_once,
        volumes_at_most=row.whole("volumes at most"),
        hosts_at_most=row.whole("hosts at most"),
        largest_volume=row.whole("largest volume"),
        place=row.place("array"),
    )


def _cache(row: Row, *, hits: bool) -> int:
    """Return the cache; one that is unknown matters only where reads hit any."""
    cache = row.whole("cache")
    if hits and not cache:
        row.assume("cache")
    return cache


def _one_copy(row: Row, together: int, at_once: int) -> int:
    """Return what one copy may take: two shares of what all may take together."""
    if row.given("one copy at most"):
        return row.whole("one copy at most")
    row.assume("one copy at most")
    return supply(together // max(1, -(-at_once // 2)))


def _check_controllers(row: Row) -> None:
    survived = row.whole("controller failures survived")
    if not row.faulty and survived >= row.whole("controllers"):
        row.error(
            "bounds",
            "controller failures survived",
            f"{survived} of {row.whole('controllers')} controllers fail: none is left",
            "give the number of controllers, and how many of them may fail",
        )


def read_hosts(rows: Iterable[Row], arrays: Names, names: Names) -> tuple[Host, ...]:
    """Return the hosts; the arrays they reach must be known."""
    hosts = []
    for row in rows:
        if not row.given("arrays reached") and not row.faulty:
            row.assume("arrays reached")
        reached = row.names("arrays reached")
        known = [n for n in reached if arrays.check(n, row.place("arrays reached"))]
        host = Host(name=row.text("host"), arrays=tuple(known), place=row.place("host"))
        if host.name:
            names.add(host.name, host.place)
        hosts.append(host)
    return tuple(hosts)


def read_routes(rows: Iterable[Row], places: Names) -> tuple[Route, ...]:
    """Return the routes; both ends must be a known array or site."""
    return tuple(_route(row, places) for row in rows)


def _route(row: Row, places: Names) -> Route:
    for column in ("from", "to"):
        if row.given(column):
            places.check(row.text(column), row.place(column))
    return Route(
        source=row.text("from"),
        target=row.text("to"),
        possible=row.switch("possible"),
        one_copy=row.whole("one copy at most"),
        together=row.whole("together"),
        place=row.place("from"),
    )


def say_unlisted_hosts(
    volumes: Iterable[Row], hosts: Sequence[Host], names: Names, remarks: Remarks
) -> None:
    """Say which hosts of volumes are not in the sheet hosts, where it has any."""
    for row in volumes:
        name, place = row.text("host"), row.place("host")
        new = bool(name) and names.meet(name, place)
        if new and hosts:
            remarks.warn(
                "unknown",
                place,
                f'the host "{name}" is not in the sheet hosts and is taken to reach '
                "every array",
                "add it to the sheet hosts",
            )


def places_of(arrays: Sequence[Array], remarks: Remarks) -> Names:
    """Return the names of arrays and sites, which routes speak of."""
    named = [array.name for array in arrays] + [array.site for array in arrays]
    return Names("array or site", remarks, filter(None, named))
