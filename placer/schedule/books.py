"""The books of the nights: a unit goes in whole, or not at all."""

from collections import Counter
from collections.abc import Sequence

from placer.candidates.block import Ints
from placer.candidates.table import Candidates
from placer.plan import Booking, Move
from placer.schedule.lanes import Lanes, Piece
from placer.schedule.levels import Levels, earliest
from placer.schedule.pieces import pieces
from placer.schedule.timeline import Span, timeline
from placer.schedule.unit import Part, Unit
from placer.windows.clock import days_later

Opens = tuple[int | None, ...]
"""From when on a unit may cut over, and each of its copies start; None: never."""

Draft = list[tuple[Part, list[Piece]]]


class Books:
    """What is booked so far, and what the windows and limits have left.

    Attributes
    ----------
    spans
        The windows, in order of their start.
    moves, bookings
        In the order in which they were booked.
    """

    def __init__(self, candidates: Candidates, bought: Ints) -> None:
        estate = candidates.estate
        self.spans = timeline(estate)
        self.lanes = Lanes(estate, candidates.reach, self.spans)
        self.levels = Levels(candidates, bought)
        self.moves: list[Move] = []
        self.bookings: list[Booking] = []
        self._cutovers: Counter[str] = Counter()

    def opens(self, unit: Unit) -> Opens:
        """Return from when on room and load allow each step of a unit."""
        return earliest(unit.load), *(earliest(part.taken) for part in unit.parts)

    def insert(self, unit: Unit, opens: Opens) -> bool:
        """Book a unit in the first window that can carry it; say whether one can."""
        known = [minute for minute in opens if minute is not None]
        if len(known) < len(opens):
            return False
        for number, span in enumerate(self.spans):
            if not self.may_cut_over(unit, span) or span.latest < max(known):
                continue
            draft = self._draft(unit, self.spans[: number + 1])
            if draft is not None:
                self._commit(unit, draft, span, known[0])
                return True
        return False

    def may_cut_over(self, unit: Unit, span: Span) -> bool:
        """Whether a window has time and a cutover left for a unit."""
        window = span.window
        free = not window.cutovers or self._cutovers[window.night] < window.cutovers
        return free and span.start <= span.latest and span.admits(*unit.arrays)

    def _draft(self, unit: Unit, spans: Sequence[Span]) -> Draft | None:
        """Take what the copies of a unit need for a cutover in the last window."""
        draft: Draft = []
        for part in unit.parts:
            found = self._pieces(part, spans)
            if found is None:
                self._undo(draft)
                return None
            self._take(part, found)
            draft.append((part, found))
        return draft

    def _pieces(self, part: Part, spans: Sequence[Span]) -> list[Piece] | None:
        opens = earliest(part.taken)
        if opens is None:
            return None
        usable = [span for span in spans if span.admits(*part.arrays)]
        limits = (opens, spans[-1].latest)
        size = max(1, part.transfer.size)
        return pieces(self.lanes, part.copy, size, usable, limits)

    def _take(self, part: Part, found: Sequence[Piece]) -> None:
        for piece in found:
            self.lanes.take(part.copy, piece)
        for level, room in part.taken:
            level.add(found[0].starts, room)

    def _undo(self, draft: Draft) -> None:
        for part, found in reversed(draft):
            for piece in found:
                self.lanes.give(part.copy, piece)
            for level, _ in part.taken:
                level.undo()

    def _commit(self, unit: Unit, draft: Draft, span: Span, opens: int) -> None:
        """Cut a unit over as soon as its copies and its load allow."""
        copied = max(found[-1].ends for _, found in draft)
        cutover = max(span.start, opens, copied)
        self._cutovers[span.window.night] += 1
        for level, load in unit.load:
            level.add(cutover, load)
        for part, found in draft:
            released = max(cutover, _held(span, part.hold_days))
            for level, room in part.given:
                level.add(released, -room)
            self.moves.append(_move(part, found, span, cutover, released))
            self.bookings += _bookings(part, found)


def _held(span: Span, days: int) -> int:
    """Return when the hold of a source ends that was cut over in a window [min UTC]."""
    return days_later(span.window.opens, days, span.window.zone)


def _move(
    part: Part, found: Sequence[Piece], span: Span, cutover: int, released: int
) -> Move:
    return Move(
        id=part.transfer.id,
        volume=part.transfer.volume,
        source=part.transfer.source,
        target=part.transfer.target,
        size=part.transfer.size,
        starts=found[0].starts,
        ends=found[-1].ends,
        window=span.window.name,
        cutover=cutover,
        released=released,
    )


def _bookings(part: Part, found: Sequence[Piece]) -> list[Booking]:
    return [
        Booking(
            move=part.transfer.id,
            window=piece.span.window.name,
            starts=piece.starts,
            ends=piece.ends,
            rate=piece.rate,
        )
        for piece in found
    ]
