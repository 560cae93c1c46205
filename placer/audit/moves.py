"""Rules of the moves themselves: each is there, whole, and cut over in its time."""

from collections import Counter
from collections.abc import Iterator
from datetime import UTC, datetime, timedelta
from zoneinfo import ZoneInfo

from placer.audit import words
from placer.audit.case import Case
from placer.audit.limits import SLACK
from placer.estate import Window
from placer.plan import Booking, Move

SECONDS_PER_MINUTE = 60


def said(case: Case, minute: int) -> str:
    """Return an instant on the clock of the policy."""
    return words.clock(minute, case.estate.policy.zone)


def move_list(case: Case) -> Iterator[str]:
    """Check that one move for each volume that changes its pool, none for others."""
    yield from _counted(case)
    for move in case.plan.moves:
        if move.volume in case.volumes:
            yield from _agrees(case, move)
    for left in case.plan.left:
        home, target = case.homes.get(left.volume), case.targets.get(left.volume)
        if (left.source, left.target) != (home, target) or home == target:
            way = f"{left.source} to {left.target}"
            yield f"{left.volume} is left over from {way}, which is not planned"
    ids, named = Counter(move.id for move in case.plan.moves), case.windows
    yield from (
        f"{times} moves are called {move}" for move, times in ids.items() if times > 1
    )
    for booking in case.plan.bookings:
        if booking.move not in ids:
            yield f"a booking names {booking.move}, which is no move"
        if booking.window not in named:
            yield f"a booking of {booking.move} names {booking.window}, no window"


def _counted(case: Case) -> Iterator[str]:
    listed = Counter(move.volume for move in case.plan.moves)
    listed.update(left.volume for left in case.plan.left)
    moving = {volume.id for volume in case.movers}
    for name in sorted(moving | listed.keys()):
        wanted = int(name in moving)
        if listed[name] != wanted:
            yield f"{name} has {listed[name]} moves, the placement asks for {wanted}"


def _agrees(case: Case, move: Move) -> Iterator[str]:
    ends = case.homes[move.volume], case.targets[move.volume]
    if (move.source, move.target) != ends:
        way = f"{move.source} to {move.target}"
        yield f"{move.id} takes {move.volume} {way}, planned is {' to '.join(ends)}"
    size = case.nights.sizes[move.volume]
    if abs(move.size - size) > size * SLACK:
        carried, needed = words.gib(move.size), words.gib(size)
        yield f"{move.id} carries {carried}, {move.volume} will have {needed}"


def copy_whole(case: Case) -> Iterator[str]:
    """Check that the bookings of a move carry it, and that it spans them."""
    booked: dict[str, list[Booking]] = {move: [] for move in case.moves}
    for booking in case.plan.bookings:
        if booking.move in booked:
            booked[booking.move].append(booking)
    for move in case.moves.values():
        pieces = booked[move.id]
        carried = sum(_bytes(piece) for piece in pieces)
        if carried < move.size * (1 - SLACK):
            yield f"{move.id} copies {words.gib(carried)} of {words.gib(move.size)}"
        if pieces:
            yield from _bounds(case, move, pieces)


def _bytes(piece: Booking) -> int:
    return (piece.ends - piece.starts) * SECONDS_PER_MINUTE * piece.rate


def _bounds(case: Case, move: Move, pieces: list[Booking]) -> Iterator[str]:
    first = min(piece.starts for piece in pieces)
    last = max(piece.ends for piece in pieces)
    if (move.starts, move.ends) != (first, last):
        stated = f"{said(case, move.starts)} to {said(case, move.ends)}"
        booked = f"{said(case, first)} to {said(case, last)}"
        yield f"{move.id} is said to copy {stated} but is booked {booked}"


def cutover_time(case: Case) -> Iterator[str]:
    """Check that a cutover follows its copy and is done before its window closes."""
    lasts = case.estate.policy.cutover_minutes
    for move in case.moves.values():
        when = said(case, move.cutover)
        if move.cutover < move.ends:
            yield f"{move.id} cuts over {when}, before its copy ends"
        admitting = [
            w for w in case.windows.get(move.window, []) if admits(w, case, move)
        ]
        fits = (w.start <= move.cutover <= w.end - lasts for w in admitting)
        if not any(fits):
            yield f"{move.id} cuts over {when}, which {move.window} cannot hold"


def admits(window: Window, case: Case, move: Move) -> bool:
    """Whether a window is open to both arrays of a move."""
    both = {case.pools[move.source].array, case.pools[move.target].array}
    return not window.arrays or both <= set(window.arrays)


def cutover_together(case: Case) -> Iterator[str]:
    """Check that an application cuts over at one instant in one window, none left."""
    by_volume = {move.volume: move for move in case.moves.values()}
    for chain in case.chains(case.movers):
        moves = [by_volume[name] for name in sorted(chain) if name in by_volume]
        left = {left.volume for left in case.plan.left} & chain
        if moves and left:
            yield f"{words.names(left)} stays behind while its application is cut over"
        if len({(move.window, move.cutover) for move in moves}) > 1:
            times = ", ".join(f"{m.volume} {said(case, m.cutover)}" for m in moves)
            yield f"volumes of one application are cut over apart: {times}"


def window_cutovers(case: Case) -> Iterator[str]:
    """Check that no more applications are cut over in a night than it allows."""
    chains = case.chains(case.estate.volumes)
    chain_of = {name: at for at, chain in enumerate(chains) for name in chain}
    nights: dict[str, set[int]] = {}
    for move in case.moves.values():
        for window in case.windows.get(move.window, [])[:1]:
            nights.setdefault(window.night, set()).add(chain_of[move.volume])
    limits = {window.night: window.cutovers for window in case.estate.windows}
    for night, cut_over in nights.items():
        if 0 < limits[night] < len(cut_over):
            yield f"{night} has {len(cut_over)} cutovers of at most {limits[night]}"


def hold(case: Case) -> Iterator[str]:
    """Check that a source is kept for its hold, or as long as its snapshots."""
    for move in case.moves.values():
        volume = case.volumes[move.volume]
        days = max(volume.hold_days, volume.snapshot_days)
        for window in case.windows.get(move.window, [])[:1]:
            due = max(move.cutover, days_later(window.opens, days, window.zone))
            if move.released != due:
                wrong, right = said(case, move.released), said(case, due)
                yield f"{move.id} is released {wrong}, {days} days of hold say {right}"


def days_later(minute: int, days: int, zone: str) -> int:
    """Return the instant of the same wall time some days later [min UTC].

    Where the clocks skip that time, it counts with the offset before the change (as
    RFC 5545 has it); where it comes twice, the first counts.
    """
    place = ZoneInfo(zone)
    local = datetime.fromtimestamp(minute * SECONDS_PER_MINUTE, UTC).astimezone(place)
    later = (local + timedelta(days=days)).replace(fold=0)
    return int(later.timestamp()) // SECONDS_PER_MINUTE


def finish_by(case: Case) -> Iterator[str]:
    """Check that nothing is cut over after the date to finish by."""
    last = case.estate.policy.finish_by
    for move in case.moves.values():
        if 0 < last < move.cutover:
            when = said(case, move.cutover)
            yield f"{move.id} cuts over {when}, to be finished by {said(case, last)}"
