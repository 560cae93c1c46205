"""Reads an inventory: a workbook or a folder of CSV files to an estate and findings."""

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from datetime import date, datetime
from difflib import get_close_matches
from pathlib import Path
from zoneinfo import ZoneInfo

from placer.estate import Array, Estate, Host, Hour, Policy, Pool, Route, Rule, Volume
from placer.findings import Finding, Place, errors
from placer.workbook.column import key
from placer.workbook.columns import GUIDE, SHEETS, sheet
from placer.workbook.reading.control import Total, read_controls, totals
from placer.workbook.reading.digest import digest
from placer.workbook.reading.hours import Clock, LoadReader
from placer.workbook.reading.machines import (
    places_of,
    read_arrays,
    read_hosts,
    read_routes,
    say_unlisted_hosts,
)
from placer.workbook.reading.names import Names
from placer.workbook.reading.nights import NightReader
from placer.workbook.reading.policy import read_policy, read_settings, start_date
from placer.workbook.reading.pools import read_pools
from placer.workbook.reading.raw import RawSheet
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.roles import RoleReader, read_clusters, read_roles
from placer.workbook.reading.rules import RuleReader
from placer.workbook.reading.source import read_source
from placer.workbook.reading.table import Row, read_table
from placer.workbook.reading.tenants import read_tenants
from placer.workbook.reading.volumes import (
    VolumeReader,
    check_applications,
    read_classes,
)

Tables = Mapping[str, tuple[Row, ...]]


@dataclass(frozen=True, slots=True)
class Intake:
    """What reading an inventory gave.

    Attributes
    ----------
    estate
        None where any finding is an error.
    totals
        Sums per array and of all, to compare with the spreadsheet's own.
    """

    estate: Estate | None
    findings: tuple[Finding, ...]
    totals: tuple[Total, ...]


def read(path: Path, today: date | None = None) -> Intake:
    """Return what an inventory holds; bad data and files are findings.

    Parameters
    ----------
    path
        A workbook, or a folder with a CSV file per sheet.
    today
        The start date where the policy has none; by default the day in its zone.
    """
    remarks = Remarks()
    sheets = read_source(path, remarks)
    if not any(each.readable for each in sheets):
        return Intake(None, remarks.findings, ())
    raw = _by_name(sheets, remarks)
    settings, gb = read_settings(raw.get("policy"), sheet("policy"), remarks)
    tables = {
        each.name: read_table(raw.get(each.name), each, remarks, gb)
        for each in SHEETS
        if each.name != "policy"
    }
    _say_empty(raw, tables, remarks)
    tables["policy"] = (settings,)
    estate = _estate(path.stem, tables, remarks, today)
    failed = bool(errors(remarks.findings))
    return Intake(
        None if failed else estate, remarks.findings, totals(tables["volumes"])
    )


def _by_name(sheets: Iterable[RawSheet], remarks: Remarks) -> dict[str, RawSheet]:
    """Return the sheets that are known; the others are said to be not used."""
    known = {key(each.name): each.name for each in SHEETS}
    found: dict[str, RawSheet] = {}
    for raw in sheets:
        name = known.get(key(raw.name))
        if name is None:
            _say_not_used(raw, known, remarks)
        elif name in found:
            remarks.error("sheet", Place(raw.name), f"{name} stands twice", "keep one")
        else:
            found[name] = raw
    return found


def _say_not_used(raw: RawSheet, known: Iterable[str], remarks: Remarks) -> None:
    if key(raw.name) == GUIDE:
        return
    near = get_close_matches(key(raw.name), known, n=1, cutoff=0.8)
    remedy = f'is it "{near[0]}"?' if near else ""
    remarks.note(
        "not-used", Place(raw.name), f"the sheet {raw.name} is not used", remedy
    )


def _say_empty(raw: Mapping[str, RawSheet], tables: Tables, remarks: Remarks) -> None:
    """Say which sheets are there, as they must be, but hold nothing."""
    for each in SHEETS:
        read_empty = each.name in raw and raw[each.name].readable
        if each.required and read_empty and not tables[each.name]:
            remarks.error(
                "sheet",
                Place(each.name),
                f"there are no {each.name}",
                f"fill in {each.meaning}",
            )


def _estate(name: str, tables: Tables, remarks: Remarks, today: date | None) -> Estate:
    settings = tables["policy"][0]
    zone = settings.text("zone")
    start = start_date(settings, today or datetime.now(ZoneInfo(zone)).date())
    policy = read_policy(settings, start)
    machines = _machines(tables, remarks)
    demand = _demand(tables, machines, policy, Clock(zone, start), remarks)
    nights = NightReader(
        zone, start, settings.date("finish by"), machines.array_names, remarks
    )
    return Estate(
        name=name,
        digest=digest(tables[each.name] for each in SHEETS),
        hours=demand.hours,
        volumes=demand.volumes,
        pools=machines.pools,
        arrays=machines.arrays,
        policy=policy,
        hosts=machines.hosts,
        routes=machines.routes,
        tenants=read_tenants(tables["tenants"], tables["volumes"], remarks),
        rules=_rules(tables, machines, demand.volumes, remarks),
        windows=nights.read(tables["windows"], tables["freezes"]),
        controls=read_controls(
            tables["control"], machines.array_names, tables["volumes"]
        ),
        assumptions=remarks.assumptions,
    )


@dataclass(frozen=True, slots=True)
class _Machines:
    """What volumes can stand on, and the names to look up."""

    pools: tuple[Pool, ...]
    pool_names: Names
    arrays: tuple[Array, ...]
    array_names: Names
    hosts: tuple[Host, ...]
    host_names: Names
    routes: tuple[Route, ...]


def _machines(tables: Tables, remarks: Remarks) -> _Machines:
    pool_names = Names("pool", remarks, needed=True)
    array_names, host_names = Names("array", remarks), Names("host", remarks)
    pools = read_pools(tables["pools"], pool_names)
    named = [
        (row.text("array"), row.place("array"))
        for row in (*tables["pools"], *tables["volumes"])
    ]
    hits = any(row.exact("read hits") for row in tables["volumes"])
    arrays = read_arrays(tables["arrays"], named, array_names, remarks, hits=hits)
    return _Machines(
        pools,
        pool_names,
        arrays,
        array_names,
        read_hosts(tables["hosts"], array_names, host_names),
        host_names,
        read_routes(tables["routes"], places_of(arrays, remarks)),
    )


@dataclass(frozen=True, slots=True)
class _Demand:
    hours: tuple[Hour, ...]
    volumes: tuple[Volume, ...]


def _demand(
    tables: Tables, machines: _Machines, policy: Policy, clock: Clock, remarks: Remarks
) -> _Demand:
    class_names = Names("class", remarks)
    volume_names = Names("volume", remarks, needed=True)
    reader = VolumeReader(
        volume_names,
        machines.pool_names,
        class_names,
        read_classes(tables["classes"], class_names),
        policy.hold_days,
    )
    measured = tuple(map(reader.read, tables["volumes"]))
    hours, volumes = LoadReader(volume_names, clock, remarks).read(
        tables["load"], measured
    )
    rows = tables["volumes"]
    say_unlisted_hosts(rows, machines.hosts, machines.host_names, remarks)
    check_applications(rows, Names("application", remarks))
    return _Demand(hours, volumes)


def _rules(
    tables: Tables, machines: _Machines, volumes: Sequence[Volume], remarks: Remarks
) -> tuple[Rule, ...]:
    """Return the rules the user wrote down, then those that follow from roles."""
    rows = tables["volumes"]
    roles = read_roles(volumes, rows)
    written = RuleReader(volumes, machines.pools, machines.arrays, roles, remarks)
    implied = RoleReader(volumes, roles, read_clusters(tables["hosts"], remarks))
    pairs = zip(volumes, rows, strict=True)
    return (
        *map(written.read, tables["rules"]),
        *(rule for volume, row in pairs for rule in implied.read(volume, row)),
    )
