"""Totals of what was read, and the owner's own totals held against them."""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from fractions import Fraction

from placer.estate import Control
from placer.units import GIB, MB, MILLI
from placer.workbook.reading.names import Names
from placer.workbook.reading.table import Row

_ALL = "all"
_TOLERANCE = Fraction(5, 1000)


@dataclass(frozen=True, slots=True)
class Total:
    """Sums over the volumes of one array, or of all, as typed.

    ``provisioned`` and ``occupied`` are [GiB], ``requests`` [1/s] and ``throughput``
    [MB/s].
    """

    what: str
    volumes: int
    provisioned: float
    occupied: float
    requests: float
    throughput: float


def totals(rows: Sequence[Row]) -> tuple[Total, ...]:
    """Return the totals of each array in the order of the rows, then of all."""
    by_array: dict[str, list[Row]] = {}
    for row in rows:
        if row.given("array"):
            by_array.setdefault(row.text("array"), []).append(row)
    return (*(_total(*item) for item in by_array.items()), _total(_ALL, rows))


def _total(what: str, rows: Sequence[Row]) -> Total:
    def summed(column: str, unit: int) -> float:
        return float(sum((row.exact(column) for row in rows), Fraction(0)) / unit)

    return Total(
        what,
        len(rows),
        summed("provisioned", GIB),
        summed("occupied", GIB),
        summed("requests", MILLI),
        summed("throughput", MB),
    )


def read_controls(
    rows: Iterable[Row], arrays: Names, volumes: Sequence[Row]
) -> tuple[Control, ...]:
    """Return the owner's totals; one that disagrees with the volumes is an error."""
    controls = []
    for row in rows:
        what = row.text("what")
        everything = what.casefold() == _ALL and what not in arrays
        known = bool(what) and (everything or arrays.check(what, row.place("what")))
        meant = [v for v in volumes if everything or v.text("array") == what]
        if known:
            _compare(row, meant)
        controls.append(_control(row, "" if everything else what))
    return tuple(controls)


def _control(row: Row, array: str) -> Control:
    def typed(column: str) -> int | None:
        return row.whole(column) if row.given(column) else None

    return Control(
        array,
        typed("volumes"),
        typed("provisioned"),
        typed("requests"),
        row.place("what"),
    )


def _compare(row: Row, volumes: Sequence[Row]) -> None:
    """Hold the count exactly and the sums to 0.5 %."""
    found = {
        "volumes": Fraction(len(volumes)),
        "provisioned": sum((v.exact("provisioned") for v in volumes), Fraction(0)),
        "requests": sum((v.exact("requests") for v in volumes), Fraction(0)),
    }
    for column, read in found.items():
        typed = row.exact(column)
        slack = 0 if column == "volumes" else typed * _TOLERANCE
        if row.given(column) and abs(read - typed) > slack:
            unit = {"volumes": 1, "provisioned": GIB, "requests": MILLI}[column]
            row.error(
                "control",
                column,
                f"{column} of {row.text('what')} should be {float(typed / unit):g}, "
                f"but the volumes read give {float(read / unit):g}",
                "look for volumes missing, doubled or in another unit",
            )
