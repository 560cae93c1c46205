"""The steps of the nights in clock order, window by window, for the operator.

A step outside every window (a source whose hold ends) stands under its day.
"""

from collections import defaultdict
from collections.abc import Iterator
from dataclasses import dataclass, replace
from itertools import pairwise

from placer.estate import Estate, Window
from placer.plan import Booking, Move, Plan
from placer.windows.clock import local

_ORDER = ("release source", "copy ends", "pause", "cut over", "go on", "start copy")


@dataclass(frozen=True, slots=True)
class Step:
    """One thing to do at one instant [min UTC]; rate [B/s] and latest may be absent.

    ``host`` is the one that uses the volume, blank where the inventory names none.
    """

    instant: int
    what: str
    move: Move
    rate: int | None = None
    latest: int | None = None
    host: str = ""

    @property
    def rank(self) -> tuple[int, int, str]:
        """Clock order; at one instant what frees something stands first."""
        kind = next(i for i, word in enumerate(_ORDER) if self.what.startswith(word))
        return self.instant, kind, self.move.id


@dataclass(frozen=True, slots=True)
class Section:
    """The steps of one window, or of one day outside them where ``window`` is None."""

    window: Window | None
    zone: str
    steps: tuple[Step, ...]

    @property
    def begins(self) -> int:
        """Where the section stands in time [min UTC]."""
        return self.window.start if self.window else self.steps[0].instant


def sections(estate: Estate, plan: Plan) -> list[Section]:
    """Return all steps of a plan in order of time."""
    windows = {w.name: w for w in estate.windows}
    by_window: dict[str, list[Step]] = defaultdict(list)
    by_day: dict[str, list[Step]] = defaultdict(list)
    zone = estate.policy.zone
    hosts = {v.id: v.host for v in estate.volumes}
    for name, bare in _steps(estate, plan):
        step = replace(bare, host=hosts.get(bare.move.volume, ""))
        home = name if name in windows else _window_at(step.instant, estate.windows)
        day = local(step.instant, zone).date().isoformat()
        (by_window[home] if home else by_day[day]).append(step)
    nights = [
        Section(windows[name], windows[name].zone, _sorted(steps))
        for name, steps in by_window.items()
    ]
    days = [Section(None, zone, _sorted(steps)) for steps in by_day.values()]
    return sorted(nights + days, key=lambda section: section.begins)


def _sorted(steps: list[Step]) -> tuple[Step, ...]:
    return tuple(sorted(steps, key=lambda step: step.rank))


def _window_at(instant: int, windows: tuple[Window, ...]) -> str:
    """Return the window open at an instant, blank where none is."""
    return next((w.name for w in windows if w.start <= instant < w.end), "")


def _steps(estate: Estate, plan: Plan) -> Iterator[tuple[str, Step]]:
    """Yield every step with its window; a release has none of its own."""
    pieces: dict[str, list[Booking]] = defaultdict(list)
    for booking in sorted(plan.bookings, key=lambda b: b.starts):
        pieces[booking.move].append(booking)
    applications = {v.id: v.applications for v in estate.volumes}
    ends = {w.name: w.end for w in estate.windows}
    for move in plan.moves:
        yield from _copy_steps(move, pieces[move.id])
        latest = ends.get(move.window, move.cutover) - estate.policy.cutover_minutes
        what = _cutover(applications.get(move.volume, ()))
        yield move.window, Step(move.cutover, what, move, latest=latest)
        yield "", Step(move.released, "release source", move)


def _cutover(applications: tuple[str, ...]) -> str:
    return f"cut over {', '.join(applications)}" if applications else "cut over"


def _copy_steps(move: Move, pieces: list[Booking]) -> Iterator[tuple[str, Step]]:
    """Yield start, pauses and end of one copy from its bookings in order of time."""
    if not pieces:
        return
    first, last = pieces[0], pieces[-1]
    yield first.window, Step(first.starts, "start copy", move, first.rate)
    for piece, following in pairwise(pieces):
        if following.starts > piece.ends:
            yield piece.window, Step(piece.ends, "pause", move)
        what = "go on" if following.starts > piece.ends else "go on at new rate"
        yield following.window, Step(following.starts, what, move, following.rate)
    yield last.window, Step(last.ends, "copy ends", move)
