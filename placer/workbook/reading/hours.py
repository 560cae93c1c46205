"""The sheet load to hours of the estate, and each volume's load in them."""

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field, replace
from datetime import date, datetime, time, timedelta
from enum import Enum
from zoneinfo import ZoneInfo

from placer.estate import Hour, Load, Volume
from placer.findings import Place
from placer.units import MINUTES_PER_HOUR
from placer.workbook.column import Effect
from placer.workbook.reading.names import Names
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.table import Row
from placer.workbook.reading.volumes import Measured, Sizes

_DAY_NAMES = ("Mon", "Tue", "Wed", "Thu", "Fri", "Sat", "Sun")
_HOURS = 24
_WEEK = 7 * _HOURS
_NOTHING = Load(0, 0, 0, 0)


class Days(Enum):
    """What the days of the sheet are; the value is the number of slots, 0 any."""

    EVERY = _HOURS
    WEEKDAYS = _WEEK
    DATES = 0


@dataclass(frozen=True, slots=True)
class Clock:
    """The zone the hours of the estate are in, and the day its offset is taken from."""

    zone: str
    start: date

    def later(self, zone: str) -> int:
        """Return how far [min] this clock is ahead of another zone's."""
        return self._offset(self.zone) - self._offset(zone)

    def _offset(self, zone: str) -> int:
        noon = datetime.combine(self.start, time(12), ZoneInfo(zone))
        offset = noon.utcoffset() or timedelta()
        return offset // timedelta(minutes=1)


@dataclass(slots=True)
class Profile:
    """What the sheet says of one volume, by slot.

    ``daily`` counts hours of a day, ``exact`` those of a week or since the first date.
    """

    daily: dict[int, Load] = field(default_factory=dict)
    exact: dict[int, Load] = field(default_factory=dict)

    def at(self, slot: int) -> Load | None:
        """Return the load of a slot; its own day's wins over every day's."""
        return self.exact.get(slot) or self.daily.get(slot % _HOURS)

    def highest(self, slot: int) -> Load | None:
        """Return the highest load of the same hour of any day."""
        alike = [load for s, load in self.exact.items() if (s - slot) % _HOURS == 0]
        return _highest(alike) if alike else None


class LoadReader:
    """Reads the sheet load.

    Parameters
    ----------
    names
        The volumes there are.
    """

    def __init__(self, names: Names, clock: Clock, remarks: Remarks) -> None:
        self._names = names
        self._clock = clock
        self._remarks = remarks

    def read(
        self, rows: Sequence[Row], measured: Sequence[Measured]
    ) -> tuple[tuple[Hour, ...], tuple[Volume, ...]]:
        """Return the hours of the estate and the volumes with their load in each."""
        days = _days_of(rows)
        sizes = {each.volume.id: each.sizes for each in measured}
        profiles: dict[str, Profile] = {}
        for row in self._usable(rows, days):
            name = _volume(row)
            load = _load(row, sizes[name])
            self._enter(row, load, profiles.setdefault(name, Profile()), days)
        slots = _slots(days, profiles)
        hours = tuple(_hour(slot, days) for slot in slots)
        volumes = (
            self._spread(each.volume, profiles.get(each.volume.id), slots)
            for each in measured
        )
        return hours, tuple(volumes)

    def _usable(self, rows: Sequence[Row], days: Days) -> Iterator[Row]:
        """Yield the rows that can be used; the others are findings."""
        seen: dict[tuple[object, ...], str] = {}
        for row in rows:
            known = row.given("volume") and row.given("array")
            if not known or not self._names.check(_volume(row), row.place("volume")):
                continue
            if self._twice(row, seen) or self._mixed(row, days) or row.faulty:
                continue
            yield row

    def _twice(self, row: Row, seen: dict[tuple[object, ...], str]) -> bool:
        day, hour = row.values.get("day"), row.whole("hour begins")
        place = str(row.place("volume"))
        first = seen.setdefault((_volume(row), day, hour, self._zone(row)), place)
        if first != place:
            row.error(
                "duplicate",
                "hour begins",
                f"this hour of {_volume(row)} stands already at {first}",
                "keep one of the rows",
            )
        return first != place

    def _mixed(self, row: Row, days: Days) -> bool:
        mixed = days is Days.DATES and not isinstance(row.values.get("day"), date)
        if mixed and "day" not in row.faulty:
            row.error(
                "load",
                "day",
                "other rows have dates, this one has none",
                "use dates in all rows, or weekdays and blanks in all",
            )
        return mixed

    def _zone(self, row: Row) -> str:
        return row.text("zone") or self._clock.zone

    def _enter(self, row: Row, load: Load, profile: Profile, days: Days) -> None:
        """Put the load of a row into each hour of the estate that it touches."""
        day = row.values.get("day")
        hours = profile.daily if day is None else profile.exact
        period = _HOURS if day is None else days.value
        later = self._clock.later(self._zone(row))
        for slot in _touched(_slot(day, row.whole("hour begins")), later):
            place = slot % period if period else slot
            hours[place] = _highest([load, hours.get(place, _NOTHING)])

    def _spread(
        self, volume: Volume, profile: Profile | None, slots: Sequence[int]
    ) -> Volume:
        """Return the volume with a load for every hour of the estate."""
        if profile is None:
            self._remarks.assume(
                Effect.BUSY, "hour begins", "the busy hour holds all day", _row(volume)
            )
            return replace(volume, load=volume.load * len(slots))
        loads = [profile.at(slot) or profile.highest(slot) for slot in slots]
        missing = loads.count(None)
        if missing:
            self._remarks.warn(
                "load",
                volume.place,
                f"{volume.id} has no load in {missing} of {len(slots)} hours; it "
                "counts as idle then",
                "add the hours to the sheet load, or take the volume out of it",
            )
        whole = tuple(load or _NOTHING for load in loads)
        return replace(volume, load=whole, profiled=True)


def _row(volume: Volume) -> Place:
    return Place("load", volume.id)


def _volume(row: Row) -> str:
    return f"{row.text('array')}/{row.text('volume')}"


def _days_of(rows: Sequence[Row]) -> Days:
    days = [row.values.get("day") for row in rows]
    if any(isinstance(day, date) for day in days):
        return Days.DATES
    return Days.WEEKDAYS if any(day is not None for day in days) else Days.EVERY


def _load(row: Row, busy: Sizes) -> Load:
    """Return the load of a row; a blank size is that of the busy hour."""
    for column in ("read size", "write size"):
        if not row.given(column):
            row.assume(column)
    read = row.exact("read size") if row.given("read size") else busy.read
    write = row.exact("write size") if row.given("write size") else busy.write
    return Sizes(read, write).load(row.exact("reads"), row.exact("writes"))


def _slot(day: object, hour: int) -> int:
    if isinstance(day, date):
        return day.toordinal() * _HOURS + hour
    return day * _HOURS + hour if isinstance(day, int) else hour


def _touched(slot: int, later: int) -> tuple[int, ...]:
    """Return the hours that an hour touches on a clock that is ahead [min]."""
    first, into = divmod(slot * MINUTES_PER_HOUR + later, MINUTES_PER_HOUR)
    return (first, first + 1) if into else (first,)


def _highest(loads: Sequence[Load]) -> Load:
    """Return the highest of each part."""
    return Load(
        max(load.reads for load in loads),
        max(load.writes for load in loads),
        max(load.read_bytes for load in loads),
        max(load.write_bytes for load in loads),
    )


def _slots(days: Days, profiles: Mapping[str, Profile]) -> Sequence[int]:
    if days is Days.DATES:
        return sorted({slot for p in profiles.values() for slot in p.exact})
    return range(days.value)


def _hour(slot: int, days: Days) -> Hour:
    day, hour = divmod(slot, _HOURS)
    if days is Days.EVERY:
        return Hour(None, hour, f"{hour:02}:00")
    if days is Days.WEEKDAYS:
        return Hour(day, hour, f"{_DAY_NAMES[day]} {hour:02}:00")
    when = date.fromordinal(day)
    return Hour(when.weekday(), hour, f"{when.isoformat()} {hour:02}:00")
