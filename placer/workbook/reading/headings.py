"""Headings of a sheet: which column each one is, and in which unit."""

import re
from collections.abc import Sequence
from dataclasses import dataclass
from difflib import get_close_matches

from placer.workbook.column import Column, key
from placer.workbook.reading.measures import MEASURES
from placer.workbook.reading.raw import Cell
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.scales import (
    asks_gb,
    is_rate,
    own_scale,
    scale,
    unit_matters,
    unit_named,
)

_HEADING_ROWS = 20
_PERCENT_SIGN = re.compile(r"^\s*%(?!/)|%\s*$")


@dataclass(frozen=True, slots=True)
class Heading:
    """A column found in a sheet: where, the scale of its unit, what GB means there."""

    column: Column
    index: int
    scale: int
    gb: str = ""


@dataclass(frozen=True, slots=True)
class Spoken:
    """A heading taken apart: its key, its unit, and a bracket that is no unit."""

    key: str
    unit: str | None
    unknown: str = ""


def heading_row(
    rows: Sequence[Sequence[Cell]], columns: Sequence[Column]
) -> int | None:
    """Return the index of the row that names most columns, of the first twenty."""
    known = frozenset[str]().union(*(column.keys for column in columns))
    hits = [
        len(known & {spoken.key for cell in row for spoken in readings(cell.text)})
        for row in rows[:_HEADING_ROWS]
    ]
    return hits.index(max(hits)) if any(hits) else None


def readings(text: str) -> tuple[Spoken, ...]:
    """Return the ways to take a heading apart, the likeliest first.

    The unit stands in brackets; or there is none; or it is the first word, as in
    "MiB/s per drive", or the last; or a percent sign at either end.
    """
    brackets = re.findall(r"[(\[](.*?)[)\]]", text)
    units = [unit for unit in map(unit_named, brackets) if unit]
    if not brackets and _PERCENT_SIGN.search(text):
        units = ["%"]
    unknown = brackets[-1] if brackets and not units else ""
    words = re.sub(r"[(\[].*?[)\]]", " ", text).split()
    found = [Spoken(key(text), units[-1] if units else None, unknown)]
    if words and is_rate(unit_named(words[0])):
        unit = units[-1] if units else unit_named(words[0])
        ours = key(" ".join(["MB/s", *words[1:]]))
        found.insert(0, Spoken(ours, unit, unknown))
    if len(words) > 1 and unit_named(words[-1]) and not units:
        found.append(Spoken(key(" ".join(words[:-1])), unit_named(words[-1]), unknown))
    return tuple(found)


class Headings:
    """Finds the columns of one sheet; what it cannot place it says once.

    Parameters
    ----------
    gb
        What GB means in this export, as the policy says it; blank where it does not.
    noun
        What one heading is: a column, or a setting.
    """

    def __init__(
        self, columns: Sequence[Column], remarks: Remarks, gb: str, noun: str = "column"
    ) -> None:
        self._noun = noun
        self._columns = columns
        self._remarks = remarks
        self._gb = gb

    def find(self, row: Sequence[Cell]) -> tuple[Heading, ...]:
        """Return the columns found in a row of headings."""
        found: dict[str, Heading] = {}
        strangers = []
        for index, cell in enumerate(row):
            heading = None if cell.blank else self.one(cell, index)
            if heading and heading.column.name in found:
                self._say_twice(cell, heading.column)
            elif heading:
                found[heading.column.name] = heading
            elif not cell.blank:
                strangers.append(cell)
        missing = [c for c in self._columns if c.name not in found]
        for cell in strangers:
            self._say_not_used(cell, missing)
        return tuple(found.values())

    def one(self, cell: Cell, index: int = 0) -> Heading | None:
        """Return the column that one heading names, or None."""
        for spoken in readings(cell.text):
            for column in self._columns:
                if spoken.key in column.keys:
                    scale_ = self._scale(cell, column, spoken)
                    return Heading(column, index, scale_, self._gb)
        return None

    def _scale(self, cell: Cell, column: Column, spoken: Spoken) -> int:
        if spoken.unit is None:
            self._say_no_unit(cell, column, spoken.unknown)
            return own_scale(column)
        if asks_gb(column, spoken.unit) and not self._gb:
            self._remarks.ask_gb(cell.place, cell.text)
        found = scale(column, spoken.unit, self._gb)
        if found is None and column.kind in MEASURES:
            needed = column.unit or "none"
            self._remarks.error(
                "unit",
                cell.place,
                f'"{cell.text}" is in {spoken.unit}; {column.name} needs {needed}',
                f'head it "{column.header}" and convert the numbers',
            )
        return found or own_scale(column)

    def _say_no_unit(self, cell: Cell, column: Column, bracket: str) -> None:
        if bracket and column.unit:
            self._remarks.error(
                "unit",
                cell.place,
                f'the unit "{bracket}" is not known',
                f'head the column "{column.header}"',
            )
        elif unit_matters(column) and not column.name.startswith(column.unit):
            self._remarks.warn(
                "unit",
                cell.place,
                f'"{cell.text}" names no unit and is read in {column.unit}',
                f'head it "{column.header}"',
            )

    def _say_twice(self, cell: Cell, column: Column) -> None:
        self._remarks.error(
            "column",
            cell.place,
            f'"{cell.text}" is a second {self._noun} for {column.name}',
            "keep one of them",
        )

    def _say_not_used(self, cell: Cell, missing: Sequence[Column]) -> None:
        near = nearest(cell.text, missing)
        self._remarks.note(
            "not-used",
            cell.place,
            f'the {self._noun} "{cell.text}" is not used',
            f'is it "{near.header}"?' if near else "",
        )


def nearest(text: str, columns: Sequence[Column]) -> Column | None:
    """Return the column whose name is spelt nearly like a text."""
    spelt = {spelling: column for column in columns for spelling in column.keys}
    close = get_close_matches(key(text), spelt, n=1, cutoff=0.8)
    return spelt[close[0]] if close else None
