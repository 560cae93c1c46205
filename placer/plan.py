"""Records of the result: who lives where, which copy runs when, and what is claimed.

Knows how a plan looks, not how it is found.  Times are minutes since 1970-01-01 UTC
[min], sizes [B], rates [B/s].
"""

from dataclasses import dataclass
from enum import StrEnum


class Reason(StrEnum):
    """Why a volume moves; a volume that stays has none."""

    CURE = "cure"
    LIMIT = "limit"
    SAVE = "save"
    RELIEF = "relief"
    MAKE_ROOM = "make room"
    STAYS = ""


class Status(StrEnum):
    """Whether the answer can be used."""

    PROVEN = "proven best"
    WITHIN_GAP = "within the gap"
    NO_PLAN = "no plan"


class Stopped(StrEnum):
    """Why the search ended."""

    DONE = "nothing left to search"
    NEAR = "near enough"
    TIME = "time limit"
    INTERRUPT = "interrupted"


class Moment(StrEnum):
    """When a use of a limit is stated; "nearest" belongs to a shortage."""

    TODAY = "today"
    PLANNED = "planned"
    NEAREST = "nearest"


@dataclass(frozen=True, slots=True, kw_only=True)
class Placed:
    """One volume's place.  Responses are means of the busiest hour [µs], 0 unknown."""

    volume: str
    source: str
    target: str
    reason: Reason = Reason.STAYS
    response_today: int = 0
    response_planned: int = 0
    response_limit: int = 0

    @property
    def moves(self) -> bool:
        """Whether the volume changes its pool."""
        return self.source != self.target


@dataclass(frozen=True, slots=True, kw_only=True)
class Transfer:
    """A move before it has a time: what is copied from where to where, and why.

    Transfers of one ``group`` cut over together.  ``worth`` is what the move gains per
    day it is done earlier [ms/s, weighted], 0 where it gains nothing by itself.
    """

    id: str
    volume: str
    source: str
    target: str
    size: int
    reason: Reason
    group: int
    worth: float = 0.0


@dataclass(frozen=True, slots=True, kw_only=True)
class Move:
    """One volume's way: copied from ``starts`` to ``ends``, cut over, released."""

    id: str
    volume: str
    source: str
    target: str
    size: int
    starts: int
    ends: int
    window: str
    cutover: int
    released: int


@dataclass(frozen=True, slots=True, kw_only=True)
class Booking:
    """One piece of a copy in one window at one rate: [starts, ends)."""

    move: str
    window: str
    starts: int
    ends: int
    rate: int


@dataclass(frozen=True, slots=True, kw_only=True)
class Use:
    """Use of one limit at one place and moment, in the unit named.

    ``hour`` is the label of the hour that binds, blank where the limit has no hours.
    """

    where: str
    limit: str
    moment: Moment
    use: float
    at_most: float
    unit: str
    hour: str = ""


@dataclass(frozen=True, slots=True, kw_only=True)
class Goal:
    """One goal's value in the plan and the proven bound on what any plan could reach.

    Goals are minimised, but for relief, which is maximised: its bound is never below
    its value.  Goals stand in the order in which they were solved.

    Attributes
    ----------
    value
        What the plan as it stands has.
    reached
        What the search reached for this goal; later goals may have spent some of it.
    bound
        What no plan within the goals before can surpass.
    """

    name: str
    value: float
    reached: float
    bound: float
    unit: str
    stopped: Stopped = Stopped.DONE

    @property
    def gap(self) -> float:
        """Distance of what was reached from the bound, as a share of it."""
        distance = abs(self.reached - self.bound)
        return 0.0 if distance == 0 else distance / max(abs(self.reached), 1e-12)


@dataclass(frozen=True, slots=True)
class Bought:
    """Expansion steps of one pool and their price [hundredths of the currency]."""

    pool: str
    steps: int
    price: int


@dataclass(frozen=True, slots=True, kw_only=True)
class Shortage:
    """What is missing for a plan: how much of which limit, where and when."""

    limit: str
    where: str
    amount: float
    unit: str
    sentence: str
    remedy: str = ""
    hour: str = ""


@dataclass(frozen=True, slots=True)
class Left:
    """A move that no window could carry, and what it lacks."""

    volume: str
    source: str
    target: str
    lacks: str


@dataclass(frozen=True, slots=True, kw_only=True)
class Plan:
    """The whole result for one inventory.

    ``start`` is the day the plan starts from, as year-month-day in the policy's zone.
    """

    inventory: str
    digest: str
    version: str
    status: Status
    start: str = ""
    placements: tuple[Placed, ...] = ()
    bought: tuple[Bought, ...] = ()
    moves: tuple[Move, ...] = ()
    bookings: tuple[Booking, ...] = ()
    left: tuple[Left, ...] = ()
    uses: tuple[Use, ...] = ()
    goals: tuple[Goal, ...] = ()
    shortages: tuple[Shortage, ...] = ()
