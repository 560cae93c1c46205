"""Rules of the copies: when they may run, how fast, and how many at once."""

from collections import defaultdict
from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass
from itertools import pairwise

from placer.audit import words
from placer.audit.case import Case
from placer.audit.limits import SLACK
from placer.audit.moves import admits, said
from placer.estate import Array, Route
from placer.plan import Booking, Move


def window(case: Case) -> Iterator[str]:
    """Check that each booking lies inside its window, which is open to both arrays."""
    for booking, move in case.bookings:
        inside = [
            w
            for w in case.windows[booking.window]
            if w.start <= booking.starts < booking.ends <= w.end
        ]
        times = f"{said(case, booking.starts)} to {said(case, booking.ends)}"
        if not inside:
            yield f"{move.id} copies {times}, outside {booking.window}"
        elif not admits(inside[0], case, move):
            way = f"{move.source} to {move.target}"
            yield f"{move.id} copies {way} in {booking.window}, not open to both arrays"


def change_lead(case: Case) -> Iterator[str]:
    """Check that no copy starts before the change lead is over."""
    first = case.estate.policy.earliest
    for booking in case.plan.bookings:
        if booking.starts < first:
            when = said(case, booking.starts)
            yield f"{booking.move} starts {when}, the earliest is {said(case, first)}"


def one_copy(case: Case) -> Iterator[str]:
    """Check that a copy is no faster than one may be, and its pieces never overlap."""
    for booking, move in case.bookings:
        yield from _rated(case, booking, move)
    pieces: dict[str, list[Booking]] = defaultdict(list)
    for booking, _ in case.bookings:
        pieces[booking.move].append(booking)
    for name, booked in pieces.items():
        for one, other in pairwise(sorted(booked, key=lambda piece: piece.starts)):
            if other.starts < one.ends:
                yield f"{name} is copied twice from {said(case, other.starts)}"


def _rated(case: Case, booking: Booking, move: Move) -> Iterator[str]:
    ran = words.rate(booking.rate)
    if booking.rate <= 0:
        yield f"{move.id} copies at {ran}, which is no rate"
    for most in _fastest(case, move):
        if booking.rate > most * (1 + SLACK):
            yield f"{move.id} copies at {ran}, one copy may have {words.rate(most)}"


def _fastest(case: Case, move: Move) -> list[int]:
    """Return the lowest rate that binds one copy [B/s]; nothing where none does."""
    limits = [array.one_copy for array in _arrays(case, move)]
    if (way := _route(case, move)) is not None:
        limits.append(way.one_copy)
    return sorted(filter(None, limits))[:1]


def _arrays(case: Case, move: Move) -> tuple[Array, Array]:
    return case.array_of(move.source), case.array_of(move.target)


def _route(case: Case, move: Move) -> Route | None:
    source, target = _arrays(case, move)
    return None if source == target else case.route(move.source, move.target)


@dataclass(frozen=True, slots=True)
class Peak:
    """The most of something that runs at one time, and when it first does."""

    amount: int = 0
    minute: int = 0


def peaks(counted: Iterable[tuple[str, int, int, int]]) -> dict[str, Peak]:
    """Return the highest sum for each name of (name, starts, ends, amount).

    What ends at an instant gives before what starts there takes.
    """
    events: dict[str, dict[int, int]] = defaultdict(lambda: defaultdict(int))
    for name, starts, ends, amount in counted:
        events[name][starts] += amount
        events[name][ends] -= amount
    found = {}
    for name, changes in events.items():
        running, peak = 0, Peak()
        for minute in sorted(changes):
            running += changes[minute]
            if running > peak.amount:
                peak = Peak(running, minute)
        found[name] = peak
    return found


def shared(
    against: Callable[[Case, Booking, Move], Iterable[tuple[str, int]]],
    *,
    rates: bool,
) -> Callable[[Case], Iterator[str]]:
    """Return the rule that copies at one time stay within limits they share.

    Parameters
    ----------
    against
        Gives the names and limits (0: not limited) a booking counts against.
    rates
        Whether rates are added, or copies counted.
    """

    def rule(case: Case) -> Iterator[str]:
        limits: dict[str, int] = {}
        counted = []
        for booking, move in case.bookings:
            for name, limit in against(case, booking, move):
                limits[name] = limit
                amount = booking.rate if rates else 1
                counted.append((name, booking.starts, booking.ends, amount))
        for name, peak in peaks(counted).items():
            if 0 < limits[name] < peak.amount * (1 - SLACK):
                yield _exceeded(case, name, peak, limits[name], rates=rates)

    return rule


def _exceeded(case: Case, name: str, peak: Peak, limit: int, *, rates: bool) -> str:
    ran, most = (
        (words.rate(peak.amount), words.rate(limit))
        if rates
        else (f"{peak.amount} copies", f"{limit}")
    )
    return f"{name} runs {ran} of at most {most} from {said(case, peak.minute)}"


def _out(case: Case, _: Booking, move: Move) -> Iterator[tuple[str, int]]:
    array = case.array_of(move.source)
    yield f"out of {array.name}", array.copies_out


def _into(case: Case, _: Booking, move: Move) -> Iterator[tuple[str, int]]:
    array = case.array_of(move.target)
    yield f"into {array.name}", array.copies_in


def _over_route(case: Case, _: Booking, move: Move) -> Iterator[tuple[str, int]]:
    if (way := _route(case, move)) is not None:
        yield f"the route {way.source} to {way.target}", way.together


def _at_arrays(case: Case, _: Booking, move: Move) -> Iterator[tuple[str, int]]:
    for array in dict.fromkeys(_arrays(case, move)):
        yield array.name, array.copies_at_once


def _in_window(case: Case, booking: Booking, _: Move) -> Iterator[tuple[str, int]]:
    yield booking.window, case.windows[booking.window][0].at_once


def _rate_in_window(case: Case, booking: Booking, _: Move) -> Iterator[tuple[str, int]]:
    yield booking.window, case.windows[booking.window][0].rate


array_out = shared(_out, rates=True)
array_in = shared(_into, rates=True)
route_together = shared(_over_route, rates=True)
array_copies = shared(_at_arrays, rates=False)
window_copies = shared(_in_window, rates=False)
window_rate = shared(_rate_in_window, rates=True)
