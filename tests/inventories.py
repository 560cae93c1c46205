"""Makes the demonstration inventories: ``python tests/inventories.py [FOLDER]``.

Everything is drawn from one seed, so each run gives the same cells.
"""

import sys
from collections.abc import Iterable, Mapping, Sequence
from copy import deepcopy
from pathlib import Path
from random import Random

import ferry
from ferry import FAMILIES, SHAPES, Family
from ferrymeasured import HABITS, NOTHING, RESPONSES, TENANTS, Habit
from messy import plant
from openpyxl import Workbook
from openpyxl.styles import Font
from openpyxl.utils import get_column_letter

Row = dict[str, object]
Sheets = dict[str, list[Row]]

SEED = 20_270_111
LEAST = (
    *("array", "volume", "pool", "provisioned (GiB)", "occupied (GiB)"),
    *("requests (1/s)", "reads (%)", "throughput (MB/s)"),
)
LEAST_OF_POOLS = (
    *("pool", "array", "media", "drives without spares", "drive size (GB)"),
    *("data per stripe", "parity per stripe", "reduction here"),
)


def harbour() -> Sheets:
    """Return the whole estate: tight, with one pool over its ceiling, yet solvable."""
    random = Random(SEED)
    pairs = [
        (family, _volume(family, number, random))
        for family in FAMILIES
        for number in range(1, family.count + 1)
    ]
    volumes = [row for _, row in pairs]
    _set(volumes, "cam-07", {"provisioned (GiB)": 6200, "occupied (GiB)": 5700})
    _set(volumes, "arc-01", {"leave where it is": "yes"})
    return {
        "volumes": volumes,
        "pools": _rows(ferry.POOLS),
        "arrays": _rows(ferry.ARRAYS),
        "policy": [{"setting": k, "value": v} for k, v in ferry.POLICY.items()],
        "windows": _rows(ferry.WINDOWS),
        "classes": _rows(ferry.CLASSES),
        "tenants": _rows(TENANTS),
        "load": [row for family, v in pairs for row in _load(family, v)],
        "hosts": _hosts(volumes),
        "routes": _rows(ferry.ROUTES),
        "rules": _rows(ferry.RULES),
        "freezes": _rows(ferry.FREEZES),
        "control": _control(volumes),
    }


def _rows(rows: Iterable[Mapping[str, object]]) -> list[Row]:
    return [dict(row) for row in rows]


def _volume(family: Family, number: int, random: Random) -> Row:
    array, pool = family.pool.split("/")
    size = random.randrange(family.size[0], family.size[1] + 1, 10)
    requests = random.randint(*family.requests)
    name = f"{family.prefix}-{number:02}"
    occupied = round(size * (family.filled + random.randint(-6, 6)) / 100)
    return {
        "array": array,
        "volume": name,
        "pool": pool,
        "host": f"{family.prefix}-host-{1 + number % family.hosts}",
        "application": family.application or None,
        "class": family.service,
        "provisioned (GiB)": size,
        "occupied (GiB)": occupied,
        "thin": "yes",
        "requests (1/s)": requests,
        "reads (%)": family.reads,
        "throughput (MB/s)": round(requests * family.kib * 1.024 / 1000, 2),
        "capacity growth (%/year)": family.growth,
        "load growth (%/year)": 5 if family.shape else 0,
        "leave where it is": None,
        **_habit(HABITS.get(family.prefix, NOTHING), occupied),
        "response measured (ms)": RESPONSES.get(name),
    }


def _habit(habit: Habit, occupied: int) -> Row:
    return {
        "tenant": habit.tenant,
        "role": habit.role,
        "random reads (%)": habit.random,
        "read hits (%)": habit.hits,
        "snapshots (GiB)": round(occupied * habit.snapshots / 100) or None,
        "snapshot days": habit.days,
    }


def _set(rows: list[Row], name: str, values: Row) -> None:
    next(row for row in rows if row["volume"] == name).update(values)


def _load(family: Family, volume: Row) -> list[Row]:
    """Return the hours of a volume's day; its busy hour is what volumes says."""
    if not family.shape:
        return []
    requests = _number(volume["requests (1/s)"])
    reads = requests * family.reads / 100
    return [
        {
            "array": volume["array"],
            "volume": volume["volume"],
            "hour begins": hour,
            "reads (1/s)": round(reads * share / 100, 2),
            "writes (1/s)": round((requests - reads) * share / 100, 2),
        }
        for hour, share in enumerate(SHAPES[family.shape])
    ]


def _number(value: object) -> float:
    if not isinstance(value, int | float):
        raise TypeError(value)
    return value


def _hosts(volumes: list[Row]) -> list[Row]:
    """Return the hosts; those of the gates stand too far from the inland hall."""
    names = sorted({str(row["host"]) for row in volumes})
    near = "quay; old-pier"
    return [
        {"host": name, "arrays reached": near if name.startswith("gate") else None}
        for name in names
    ]


def _control(volumes: list[Row]) -> list[Row]:
    arrays = sorted({str(row["array"]) for row in volumes})
    return [_total(name, volumes) for name in ("all", *arrays)]


def _total(name: str, volumes: list[Row]) -> Row:
    counted = [row for row in volumes if name in ("all", row["array"])]
    return {
        "what": name,
        "volumes": len(counted),
        "provisioned (GiB)": sum(_number(r["provisioned (GiB)"]) for r in counted),
        "requests (1/s)": sum(_number(r["requests (1/s)"]) for r in counted),
    }


def short() -> Sheets:
    """Return the same estate asked for what it cannot give: room, hours and money."""
    sheets = deepcopy(harbour())
    for row in sheets["volumes"]:
        row["capacity growth (%/year)"] = 80
        row["load growth (%/year)"] = 60
    policy = {"growth horizon (months)": 24, "budget": 0, "time limit (s)": 15}
    for row in sheets["policy"]:
        row["value"] = policy.get(str(row["setting"]), row["value"])
    cameras = next(r for r in sheets["rules"] if r["what"] == "application cameras")
    cameras.update({"rule": "only on", "why": "the harbour office wants them at once"})
    return sheets


def least() -> Sheets:
    """Return what people really have, taken in a quiet month: half the requests."""
    whole = harbour()
    volumes = [{name: row[name] for name in LEAST} for row in whole["volumes"]]
    for row in volumes:
        for name in ("requests (1/s)", "throughput (MB/s)"):
            row[name] = _number(row[name]) / 2
    pools = [{n: row[n] for n in LEAST_OF_POOLS if n in row} for row in whole["pools"]]
    return {"volumes": volumes, "pools": pools}


def workbook(sheets: Sheets) -> Workbook:
    """Return the rows as a workbook, headers in bold and always in view."""
    book = Workbook()
    book.remove(book.worksheets[0])
    for title, rows in sheets.items():
        sheet = book.create_sheet(title)
        headers = _headers(rows)
        for column, name in enumerate(headers, start=1):
            sheet.cell(1, column, name).font = Font(bold=True)
            sheet.column_dimensions[get_column_letter(column)].width = len(name) + 3
        for number, row in enumerate(rows, start=2):
            for column, name in enumerate(headers, start=1):
                sheet.cell(number, column, row.get(name))
        sheet.freeze_panes = "A2"
    return book


def _headers(rows: Sequence[Row]) -> list[str]:
    """Return the headers of rows that need not all have every column."""
    return list(dict.fromkeys(name for row in rows for name in row))


def messy() -> tuple[Workbook, list[tuple[str, str, str]]]:
    """Return the harbour with its faults, and sheet, cell and code of each."""
    book = workbook(harbour())
    return book, plant(book)


def main(folder: Path) -> None:
    """Write all demonstration inventories into a folder."""
    folder.mkdir(parents=True, exist_ok=True)
    makers = {"harbour": harbour, "harbour-short": short, "harbour-least": least}
    for name, make in makers.items():
        workbook(make()).save(folder / f"{name}.xlsx")
    messy()[0].save(folder / "harbour-messy.xlsx")


PLANTED = messy()[1]

if __name__ == "__main__":
    main(Path(sys.argv[1] if len(sys.argv) > 1 else "inventories"))
