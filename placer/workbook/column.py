"""What can be said of one column of the inventory, before any file is read."""

import re
import unicodedata
from dataclasses import dataclass
from decimal import Decimal
from enum import Enum, IntEnum

from placer.units import Side


class Kind(Enum):
    """How the cells of a column are read."""

    ID = "name"
    TEXT = "text"
    LIST = "names, separated by ; or ,"
    NUMBER = "number"
    COUNT = "whole number"
    PERCENT = "percent"
    RATIO = "number, or as in 2:1"
    SWITCH = "yes or no"
    WORD = "one of the words"
    DAY = "day of the week or date"
    DATE = "date"
    CLOCK = "time of day"
    ZONE = "time zone"
    ANY = "as the setting asks"


class Effect(IntEnum):
    """What a wrong default could do to the plan, the gravest first."""

    CALENDAR = 0
    NIGHTS = 1
    REACH = 2
    ROOM = 3
    BUSY = 4
    RESPONSE = 5
    COPYING = 6
    WEAR = 7
    GROWTH = 8
    GOALS = 9
    NONE = 10

    @property
    def sentence(self) -> str:
        """Return the effect in words; blank where there is none to speak of."""
        return _SENTENCES[self]


_SENTENCES = {
    Effect.CALENDAR: "decides on which nights anything can move at all",
    Effect.NIGHTS: "decides when moves can begin and how many fit a night",
    Effect.REACH: "decides which arrays a volume may move to",
    Effect.ROOM: "decides how much fits into a pool",
    Effect.BUSY: "decides how much load a pool or an array carries",
    Effect.RESPONSE: "decides which volumes gain from a move",
    Effect.COPYING: "decides how fast copies run and how many nights they take",
    Effect.WEAR: "decides how many writes flash drives may take",
    Effect.GROWTH: "decides how full and how busy pools become later",
    Effect.GOALS: "decides which of several valid plans is called best",
    Effect.NONE: "",
}

NOT_LIMITED = "not limited"
GB_MEANS = "GB in this export means"


@dataclass(frozen=True, slots=True, kw_only=True)
class Column:
    """One column (or one setting of the policy).

    Attributes
    ----------
    unit
        The unit in which it is typed; blank where it has none.
    default
        What an empty cell means, as the user would type it.
    by_media
        Defaults that hold for one medium only: pairs of medium and default.
    derived
        Whether ``default`` is a sentence: the reader computes it from other cells.
    lowest, highest
        Bounds of what can be meant, in the unit typed.
    side
        Which way the number is rounded when it becomes a whole number.
    read_as
        Other words that may stand in a cell, each with the one it is read as.
    effect
        What a wrong default could do; the assumptions are listed in this order.
    """

    name: str
    kind: Kind
    meaning: str
    unit: str = ""
    default: str = ""
    by_media: tuple[tuple[str, str], ...] = ()
    derived: bool = False
    required: bool = False
    lowest: int | Decimal = 0
    highest: int = 10**9
    side: Side = Side.NEUTRAL
    words: tuple[str, ...] = ()
    read_as: tuple[tuple[str, str], ...] = ()
    synonyms: tuple[str, ...] = ()
    effect: Effect = Effect.NONE

    @property
    def header(self) -> str:
        """Return the heading of the column, its unit in brackets."""
        if not self.unit or self.name.startswith(self.unit):
            return self.name
        return f"{self.name} ({self.unit})"

    @property
    def shown_default(self) -> str:
        """Return what an empty cell means, for people."""
        return self.default or ", ".join(" ".join(pair) for pair in self.by_media)

    @property
    def keys(self) -> frozenset[str]:
        """Return every spelling that names this column, as ``key`` makes it."""
        return frozenset(key(name) for name in (self.name, *self.synonyms))


@dataclass(frozen=True, slots=True, kw_only=True)
class Sheet:
    """One sheet of the inventory; ``of_totals``: its rows are totals of others."""

    name: str
    meaning: str
    columns: tuple[Column, ...]
    required: bool = False
    of_totals: bool = False

    def column(self, name: str) -> Column:
        """Return a column by its own name."""
        return next(column for column in self.columns if column.name == name)


def key(text: str) -> str:
    """Return a heading without case, blanks, punctuation and bracketed unit."""
    plain = unicodedata.normalize("NFKC", text).casefold()
    return re.sub(r"[\W_]+", "", re.sub(r"[(\[].*?[)\]]", "", plain))
