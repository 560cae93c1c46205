"""Cells as they stand in a file, each with its address, not yet understood."""

from dataclasses import dataclass
from enum import Enum

from placer.findings import Place


class Trouble(Enum):
    """What may stand in a cell instead of a value."""

    NO_STORED_VALUE = "a formula without a stored value"


@dataclass(frozen=True, slots=True)
class Cell:
    """One cell.

    Attributes
    ----------
    value
        Text, number, truth value, date, time, ``Trouble``, or None where it is blank.
    percent
        Whether a number is formatted as a percentage.
    merged
        The area of merged cells, where the value really stands in another of them.
    """

    value: object
    place: Place
    percent: bool = False
    merged: str = ""

    @property
    def blank(self) -> bool:
        """Whether nothing stands there."""
        return self.value is None or not str(self.value).strip()

    @property
    def text(self) -> str:
        """Return the value as text, with single blanks and none around it."""
        return "" if self.value is None else " ".join(str(self.value).split())


@dataclass(frozen=True, slots=True)
class RawSheet:
    """A sheet: its name and its rows, all of one length; wholly blank ones may lack.

    One that is not readable has no rows, and a finding that says so.
    """

    name: str
    rows: tuple[tuple[Cell, ...], ...]
    readable: bool = True
