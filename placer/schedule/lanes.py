"""How much copying each minute still has room for: rates and running copies."""

from dataclasses import dataclass

import numpy as np

from placer.candidates.block import Ints
from placer.candidates.reach import Reach
from placer.estate import Estate, Route
from placer.schedule.timeline import Span
from placer.units import MB

WHERE_UNLIMITED = 200 * MB
"""Rate of a copy that no limit bounds [B/s] (common practice, no source)."""

Lane = tuple[str, str, str]
"""Something that running copies share: a kind and the names of its owner."""


@dataclass(frozen=True, slots=True)
class Copy:
    """What a copy from one array to another uses.

    Attributes
    ----------
    rates
        Lanes on which the rates of copies add up.
    places
        Lanes that count running copies.
    top
        The highest rate of a single copy [B/s], 0 where not limited.
    """

    rates: tuple[Lane, ...]
    places: tuple[Lane, ...]
    top: int


@dataclass(frozen=True, slots=True)
class Piece:
    """A piece of a copy in one window: [starts, ends) [min UTC] at one rate [B/s]."""

    span: Span
    starts: int
    ends: int
    rate: int


class Lanes:
    """Free rates [B/s] and free places of all lanes that are limited."""

    def __init__(self, estate: Estate, reach: Reach, spans: tuple[Span, ...]) -> None:
        self._reach = reach
        every = slice(0, max((span.minutes.stop for span in spans), default=0))
        self._free: dict[Lane, tuple[int, Ints]] = {}
        for array in estate.arrays:
            self._limit(("out", array.name, ""), array.copies_out, every)
            self._limit(("in", array.name, ""), array.copies_in, every)
            self._limit(("copies", array.name, ""), array.copies_at_once, every)
        for route in estate.routes:
            way = ("route", route.source, route.target)
            self._limit(way, route.together, every)
        for span in spans:
            name = span.window.name
            self._limit(("rate", name, ""), span.window.rate, span.minutes)
            self._limit(("at once", name, ""), span.window.at_once, span.minutes)

    def copy(self, source: str, target: str) -> Copy:
        """Return what a copy from array to array uses."""
        route = self._reach.route(source, target) or Route(source=source, target=target)
        alone = [self._reach.arrays[name].one_copy for name in (source, target)]
        limits = [limit for limit in (*alone, route.one_copy) if limit]
        return Copy(
            rates=(
                ("out", source, ""),
                ("in", target, ""),
                ("route", route.source, route.target),
            ),
            places=tuple(("copies", name, "") for name in sorted({source, target})),
            top=min(limits, default=0),
        )

    def free(self, copy: Copy, span: Span) -> Ints:
        """Return the highest rate in each minute of a window, 0 where no place is."""
        shared = [self._part(lane, span) for lane in self._rates(copy, span)]
        highest = copy.top or (np.iinfo(np.int64).max if shared else WHERE_UNLIMITED)
        found = np.full(span.end - span.start, highest, dtype=np.int64)
        for part in shared:
            np.minimum(found, part, out=found)
        for lane in self._places(copy, span):
            found[self._part(lane, span) < 1] = 0
        return found

    def take(self, copy: Copy, piece: Piece) -> None:
        """Use the rate and the places of a piece."""
        self._change(copy, piece, -1)

    def give(self, copy: Copy, piece: Piece) -> None:
        """Give back the rate and the places of a piece."""
        self._change(copy, piece, 1)

    def _limit(self, lane: Lane, limit: int, minutes: slice) -> None:
        if limit:
            row = np.full(minutes.stop - minutes.start, limit, dtype=np.int64)
            self._free[lane] = (minutes.start, row)

    def _change(self, copy: Copy, piece: Piece, sign: int) -> None:
        span = piece.span
        minutes = slice(piece.starts - span.start, piece.ends - span.start)
        for lane in self._rates(copy, span):
            self._part(lane, span)[minutes] += sign * piece.rate
        for lane in self._places(copy, span):
            self._part(lane, span)[minutes] += sign

    def _rates(self, copy: Copy, span: Span) -> list[Lane]:
        lanes = (*copy.rates, ("rate", span.window.name, ""))
        return [lane for lane in lanes if lane in self._free]

    def _places(self, copy: Copy, span: Span) -> list[Lane]:
        lanes = (*copy.places, ("at once", span.window.name, ""))
        return [lane for lane in lanes if lane in self._free]

    def _part(self, lane: Lane, span: Span) -> Ints:
        """Return a lane's row in the minutes of a window, as a view."""
        first, row = self._free[lane]
        return row[span.minutes.start - first : span.minutes.stop - first]
