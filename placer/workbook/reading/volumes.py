"""Rows of the sheets volumes and classes to volumes with their busy hour."""

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from fractions import Fraction

from placer.estate import Importance, Load, Volume
from placer.units import KIB, MIB, MILLI, PPM, demand
from placer.workbook.reading.names import Names
from placer.workbook.reading.table import Row

_SMALLEST, _LARGEST = 512, 16 * MIB  # mean request, common practice, no source


@dataclass(frozen=True, slots=True)
class Sizes:
    """Mean sizes of a read and a write [B], unrounded."""

    read: Fraction
    write: Fraction

    def mean(self, reads: Fraction, writes: Fraction) -> Fraction:
        """Return the mean size [B] of so many reads and writes; 0 without any."""
        requests = reads + writes
        size = reads * self.read + writes * self.write
        return size / requests if requests else Fraction(0)

    def load(self, reads: Fraction, writes: Fraction) -> Load:
        """Return the load of so many reads and writes [1/1000 s]."""
        return Load(
            demand(reads),
            demand(writes),
            demand(reads / MILLI * self.read),
            demand(writes / MILLI * self.write),
        )


@dataclass(frozen=True, slots=True)
class Measured:
    """A volume with its busy hour, and the sizes that hold in its other hours."""

    volume: Volume
    sizes: Sizes
    row: Row


def read_classes(rows: Iterable[Row], names: Names) -> dict[str, Row]:
    """Return the rows of the classes of service by name."""
    classes: dict[str, Row] = {}
    for row in rows:
        name = row.text("class")
        if name:
            names.add(name, row.place("class"))
            classes.setdefault(name, row)
    return classes


def check_applications(rows: Iterable[Row], names: Names) -> None:
    """Gather the names of applications; nearly the same ones are errors."""
    for row in rows:
        for name in row.names("application"):
            names.meet(name, row.place("application"))


class VolumeReader:
    """Builds volumes; gathers the names of volumes and checks pools and classes.

    Parameters
    ----------
    hold_days
        [d] hold of the policy, where no class says otherwise.
    """

    def __init__(
        self,
        names: Names,
        pools: Names,
        class_names: Names,
        classes: Mapping[str, Row],
        hold_days: int,
    ) -> None:
        self._names = names
        self._pools = pools
        self._class_names = class_names
        self._classes = classes
        self._hold_days = hold_days

    def read(self, row: Row) -> Measured:
        """Return one volume; its load has one entry, the busy hour."""
        of_class = self._classes.get(row.text("class"))
        sizes = _sizes(row)
        reads = row.exact("requests") * row.exact("reads") / PPM
        writes = row.exact("requests") - reads
        volume = Volume(
            array=row.text("array"),
            name=row.text("volume"),
            pool=row.text("pool"),
            provisioned=row.whole("provisioned"),
            occupied=row.whole("occupied"),
            thin=row.switch("thin"),
            load=(sizes.load(reads, writes),),
            host=row.text("host"),
            applications=row.names("application"),
            tenant=row.text("tenant"),
            random_reads=row.whole("random reads"),
            read_hits=row.whole("read hits"),
            large_share=row.whole("large share"),
            large_size=row.whole("large size"),
            snapshots=row.whole("snapshots"),
            snapshot_days=_snapshot_days(row),
            service_class=row.text("class"),
            response_measured=_measured(row),
            response_limit=_limit(row, of_class),
            importance=_importance(row, of_class),
            capacity_growth=row.whole("capacity growth"),
            load_growth=row.whole("load growth"),
            stays=row.switch("leave where it is"),
            hold_days=self._hold(of_class),
            place=row.place("volume"),
        )
        self._check(row, volume)
        _check_large(row, sizes.mean(reads, writes))
        return Measured(volume, sizes, row)

    def _hold(self, of_class: Row | None) -> int:
        given = of_class is not None and of_class.given("hold")
        return of_class.whole("hold") if of_class and given else self._hold_days

    def _check(self, row: Row, volume: Volume) -> None:
        if row.given("array") and row.given("volume"):
            self._names.add(volume.id, volume.place)
        if row.given("array") and row.given("pool"):
            self._pools.check(volume.home, row.place("pool"))
        if volume.service_class:
            self._class_names.check(volume.service_class, row.place("class"))
        if volume.occupied > volume.provisioned and row.given("provisioned"):
            row.error(
                "bounds",
                "occupied",
                "more is occupied than provisioned",
                "check both columns and their units",
            )


def _sizes(row: Row) -> Sizes:
    """Return the sizes given; a blank one is throughput / requests."""
    requests = row.exact("requests") / MILLI
    if not requests and row.given("requests") and row.exact("throughput"):
        row.error(
            "bounds",
            "throughput",
            "there is throughput, but there are no requests",
            "check both columns",
        )
    mean = row.exact("throughput") / requests if requests else Fraction(0)
    if requests and row.given("throughput") and not _SMALLEST <= mean <= _LARGEST:
        row.remarks.warn(
            "size",
            row.place("throughput"),
            f"a request has {float(mean / KIB):g} KiB in the mean, which is odd",
            "check the units of requests and throughput",
        )
    return Sizes(_size(row, "read size", mean), _size(row, "write size", mean))


def _size(row: Row, column: str, mean: Fraction) -> Fraction:
    if row.given(column):
        return row.exact(column)
    row.assume(column)
    return mean


def _check_large(row: Row, mean: Fraction) -> None:
    """Hold the large requests against each other and the mean of all [B]."""
    share, size = row.exact("large share") / PPM, row.exact("large size")
    if row.faulty or (not share and not size):
        return
    if not share or not size:
        row.error(
            "blank",
            "large size" if share else "large share",
            "large share and large size belong together, but only one is filled in",
            "fill in both, or neither",
        )
    elif size < mean:
        row.error(
            "bounds",
            "large size",
            f"large requests are smaller than the mean, {float(mean / KIB):g} KiB",
            "check large size, requests and throughput, and their units",
        )
    elif mean and share * size > mean:
        row.remarks.warn(
            "size",
            row.place("large share"),
            "large requests alone are more than the throughput; they count as large "
            "as it allows",
            "check large share, large size, requests and throughput",
        )


def _measured(row: Row) -> int:
    if not row.given("response measured"):
        row.assume("response measured")
    return row.whole("response measured")


def _snapshot_days(row: Row) -> int:
    """Return the days; a blank is an assumption only where there are snapshots."""
    kept = row.given("snapshots") or row.given("snapshot days")
    return row.whole("snapshot days") if kept else 0


def _limit(row: Row, of_class: Row | None) -> int:
    source = _source(row, of_class, "response limit")
    if source is None:
        row.assume("response limit")
        return 0
    return source.whole("response limit")


def _importance(row: Row, of_class: Row | None) -> Importance:
    source = _source(row, of_class, "importance") or row
    return Importance(source.text("importance"))


def _source(row: Row, of_class: Row | None, column: str) -> Row | None:
    """Return the row that fills a column: the volume's own, else its class's."""
    own = (each for each in (row, of_class) if each is not None and each.given(column))
    return next(own, None)
