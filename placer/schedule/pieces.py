"""One copy cut into pieces for the windows, as late as its cutover allows."""

from collections.abc import Iterator, Sequence

import numpy as np

from placer.candidates.block import Ints
from placer.schedule.lanes import Copy, Lanes, Piece
from placer.schedule.timeline import Span
from placer.units import MB

SHARES = (100, 75, 50, 35, 25)
"""Rates tried, in percent of the highest."""

SECONDS = 60


def pieces(
    lanes: Lanes, copy: Copy, size: int, spans: Sequence[Span], limits: tuple[int, int]
) -> list[Piece] | None:
    """Return the pieces of a copy in order of time, None where it does not fit.

    The last window is filled first; what it cannot carry goes to the ones before, for
    both sides are written from the start of a copy on and nothing is copied again after
    a pause.

    Parameters
    ----------
    lanes
        What the minutes have left.
    copy
        What the copy uses.
    size
        Bytes to carry [B].
    spans
        Windows that may be used, in order of time.
    limits
        No piece starts before the first minute or ends after the second [min UTC].
    """
    found = filled(lanes, copy, size, spans, limits)
    return found if sum(map(carried, found)) >= size else None


def filled(
    lanes: Lanes, copy: Copy, size: int, spans: Sequence[Span], limits: tuple[int, int]
) -> list[Piece]:
    """Return as many pieces of a copy as fit, in order of time; see `pieces`."""
    found: list[Piece] = []
    opens, closes = limits
    for span in reversed(spans):
        if size <= 0 or span.end <= opens:
            break
        piece = _piece(lanes, copy, size, span, (opens, closes))
        if piece is not None:
            found.insert(0, piece)
            size -= carried(piece)
            closes = piece.starts
    return found


def carried(piece: Piece) -> int:
    """Return the bytes [B] a piece carries."""
    return piece.rate * SECONDS * (piece.ends - piece.starts)


def _piece(
    lanes: Lanes, copy: Copy, size: int, span: Span, limits: tuple[int, int]
) -> Piece | None:
    """Return the piece that carries all and ends first, else the one of most bytes."""
    start, end = max(span.start, limits[0]), min(span.end, limits[1])
    if start >= end:
        return None
    free = lanes.free(copy, span)[start - span.start : end - span.start]
    whole, most = [], []
    for rate, first, last in _runs(free):
        needed = -(-size // (rate * SECONDS))
        if needed <= last - first:
            whole.append((first + needed, -rate, first))
        else:
            most.append((-rate * (last - first), first, last, rate))
    if whole:
        ends, rate, first = min(whole)
        return Piece(span, start + first, start + ends, -rate)
    if most:
        _, first, last, rate = min(most)
        return Piece(span, start + first, start + last, rate)
    return None


def _runs(free: Ints) -> Iterator[tuple[int, int, int]]:
    """Yield each rate with the stretches [first, last) in which it is free."""
    for rate in _rates(int(free.max(initial=0))):
        edges = np.flatnonzero(np.diff(free >= rate, prepend=False, append=False))
        yield from ((rate, int(a), int(b)) for a, b in edges.reshape(-1, 2))


def _rates(top: int) -> list[int]:
    """Return the rates to try, highest first, in whole MB/s where that leaves any."""
    shares = (top * share // 100 for share in SHARES)
    whole = (rate // MB * MB or rate for rate in shares)
    return sorted({rate for rate in whole if rate > 0}, reverse=True)
