"""Counts and sums over an estate and its plan, as every report says them.

No limit is judged here: the sums are for reading and for comparing with other sources.
"""

from collections import defaultdict
from collections.abc import Iterable, Sequence
from dataclasses import dataclass

from placer.estate import Estate, Volume, Window
from placer.plan import Booking, Move, Plan, Reason, Use


@dataclass(frozen=True, slots=True)
class Total:
    """Sums over the volumes of one array, or of all where ``array`` is empty.

    Sizes [B]; ``requests`` [1/1000 s] adds up the busiest hour of each volume.
    """

    array: str
    volumes: int
    provisioned: int
    occupied: int
    requests: int


@dataclass(frozen=True, slots=True)
class Night:
    """What one window carries: copies, bytes, cutovers and the top rate [B/s]."""

    window: Window
    copies: int
    carried: int
    cutovers: int
    busiest: int


@dataclass(frozen=True, slots=True)
class Share:
    """How many moves have one reason, and what they copy [B]."""

    reason: Reason
    moves: int
    copied: int


def totals(estate: Estate) -> tuple[Total, ...]:
    """Return one total per array in the order of the inventory, then one of all."""
    parts = [
        _total(array.name, [v for v in estate.volumes if v.array == array.name])
        for array in estate.arrays
    ]
    return (*parts, _total("", estate.volumes))


def _total(array: str, volumes: Sequence[Volume]) -> Total:
    return Total(
        array,
        len(volumes),
        sum(v.provisioned for v in volumes),
        sum(v.occupied for v in volumes),
        sum(max((h.reads + h.writes for h in v.load), default=0) for v in volumes),
    )


def nights(estate: Estate, plan: Plan) -> tuple[Night, ...]:
    """Return the windows that copy or cut over something, in order of time."""
    used = {b.window for b in plan.bookings} | {m.window for m in plan.moves}
    windows = sorted((w for w in estate.windows if w.name in used), key=_begin)
    return tuple(_night(window, estate, plan) for window in windows)


def _begin(window: Window) -> tuple[int, str]:
    return window.start, window.name


def _night(window: Window, estate: Estate, plan: Plan) -> Night:
    bookings = [b for b in plan.bookings if b.window == window.name]
    cut_over = {m.volume for m in plan.moves if m.window == window.name}
    return Night(
        window,
        len({b.move for b in bookings}),
        sum(carried(b) for b in bookings),
        len({_unit(v) for v in estate.volumes if v.id in cut_over}),
        _busiest(bookings),
    )


def _unit(volume: Volume) -> tuple[str, ...]:
    """Return what cuts over together: the applications, or the volume by itself."""
    return volume.applications or (volume.id,)


def carried(booking: Booking) -> int:
    """Return the bytes [B] that one booking copies."""
    return booking.rate * (booking.ends - booking.starts) * 60


def _busiest(bookings: Sequence[Booking]) -> int:
    return max((_rate_at(b.starts, bookings) for b in bookings), default=0)


def _rate_at(instant: int, bookings: Iterable[Booking]) -> int:
    return sum(b.rate for b in bookings if b.starts <= instant < b.ends)


def shares(plan: Plan) -> tuple[Share, ...]:
    """Return the moves by reason, in the order of the reasons; none without a move."""
    sizes: dict[Reason, list[int]] = defaultdict(list)
    reasons = {p.volume: p.reason for p in plan.placements}
    for move in plan.moves:
        sizes[reasons.get(move.volume, Reason.STAYS)].append(move.size)
    return tuple(Share(r, len(sizes[r]), sum(sizes[r])) for r in Reason if r in sizes)


def finish(moves: Iterable[Move]) -> int | None:
    """Return the last cutover [min UTC], None where nothing moves."""
    return max((m.cutover for m in moves), default=None)


def share_of_limit(use: Use) -> float:
    """Return a use in percent of its limit [%]; nothing of a limit of 0 is 0."""
    if use.at_most == 0:
        return 0.0 if use.use == 0 else float("inf")
    return round(100 * use.use / use.at_most, 1)
