"""From moves to nights: serial insertion of whole applications, in several orders."""

from collections.abc import Callable, Sequence
from dataclasses import dataclass

from placer.candidates.block import Ints
from placer.candidates.table import Candidates
from placer.plan import Left, Reason, Shortage, Transfer
from placer.schedule.books import Books, Opens
from placer.schedule.lacks import lacks
from placer.schedule.overruns import overruns
from placer.schedule.result import Schedule
from placer.schedule.sequence import sequence
from placer.schedule.unit import Unit, units

FORCED = (Reason.CURE, Reason.LIMIT)
ORDERS_AT_MOST = 12
INSERTIONS_AT_MOST = 1_500
"""Bounds on the search for an order that leaves nothing; counted, never timed."""

Progress = Callable[[int, int], None]


def book(
    candidates: Candidates,
    transfers: Sequence[Transfer],
    bought: Ints,
    progress: Progress = lambda done, total: None,
) -> Schedule:
    """Find nights for transfers, in the order given, whole applications at a time.

    What is left over is tried first in the next order.  Orders are tried as long as
    anything is left over, or not cured by the date asked, and the best is kept.

    Parameters
    ----------
    candidates
        The table of the estate.
    transfers
        In the order in which they should be tried.
    bought
        (pools,) expansion steps.
    progress
        Told how many transfers have a night, and how many there are.
    """
    best = _booked(candidates, transfers, bought, progress)
    groups = len({transfer.group for transfer in transfers})
    order = _workable(candidates, transfers, bought) if best.wanting else []
    tried: list[list[Transfer]] = []
    for _ in range(min(ORDERS_AT_MOST, INSERTIONS_AT_MOST // max(1, groups))):
        if not best.wanting or order in tried:
            break
        tried.append(order)
        outcome = _booked(candidates, order, bought, progress)
        best = min(best, outcome, key=lambda each: each.value)
        left = {unit.group for unit in outcome.left}
        order = sorted(order, key=lambda transfer: transfer.group not in left)
    return _schedule(candidates, best, transfers)


@dataclass(frozen=True, slots=True)
class _Outcome:
    """The books after one order, and the units that found no night."""

    books: Books
    left: list[Unit]
    overruns: tuple[Shortage, ...]

    @property
    def wanting(self) -> bool:
        """Whether another order might do more."""
        return bool(self.left or self.overruns)

    @property
    def value(self) -> tuple[float, ...]:
        """What is not cured or left over, forced first, then how late the rest is."""
        left = [part.transfer for unit in self.left for part in unit.parts]
        forced = sum(transfer.reason in FORCED for transfer in left)
        late = sum(move.cutover for move in self.books.moves)
        worth = sum(transfer.worth for transfer in left)
        return len(self.overruns), forced, worth, len(left), late


def _workable(
    candidates: Candidates, transfers: Sequence[Transfer], bought: Ints
) -> list[Transfer]:
    """Return transfers in an order in which each fits once those before are done."""
    books = Books(candidates, bought)
    found = units(candidates, transfers, books.levels, books.lanes)
    ordered = (found[number] for number in sequence(found))
    return [part.transfer for unit in ordered for part in unit.parts]


def _booked(
    candidates: Candidates,
    transfers: Sequence[Transfer],
    bought: Ints,
    progress: Progress,
) -> _Outcome:
    """Insert unit after unit; who waits is tried again once it may start earlier."""
    books = Books(candidates, bought)
    waiting: list[tuple[Unit, Opens]] = []
    for unit in units(candidates, transfers, books.levels, books.lanes):
        opens = books.opens(unit)
        if books.insert(unit, opens):
            waiting = _retried(books, waiting)
            progress(len(books.moves), len(transfers))
        else:
            waiting.append((unit, opens))
    left = [unit for unit, _ in waiting]
    found = overruns(candidates.estate, books.levels.every)
    return _Outcome(books, left, tuple(found))


def _retried(
    books: Books, waiting: list[tuple[Unit, Opens]]
) -> list[tuple[Unit, Opens]]:
    """Return who still waits; a unit's chances only grow when its limits ease."""
    number = 0
    while number < len(waiting):
        unit, before = waiting[number]
        opens = books.opens(unit)
        if opens != before and books.insert(unit, opens):
            waiting = waiting[:number] + waiting[number + 1 :]
            number = 0
        else:
            waiting[number] = (unit, opens)
            number += 1
    return waiting


def _schedule(
    candidates: Candidates, outcome: _Outcome, transfers: Sequence[Transfer]
) -> Schedule:
    books, estate = outcome.books, candidates.estate
    reasons = {unit.group: lacks(estate, books, unit) for unit in outcome.left}
    return Schedule(
        moves=tuple(sorted(books.moves, key=lambda m: (m.starts, m.id))),
        bookings=tuple(sorted(books.bookings, key=lambda b: (b.starts, b.move))),
        left=tuple(
            Left(t.volume, t.source, t.target, reasons[t.group])
            for t in transfers
            if t.group in reasons
        ),
        overruns=outcome.overruns,
    )
