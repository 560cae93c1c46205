"""The windows on one row of open minutes, so that arrays of minutes stay short."""

from dataclasses import dataclass

from placer.estate import Estate, Window


@dataclass(frozen=True, slots=True)
class Span:
    """What is left of a window between the change lead and the date to finish by.

    Attributes
    ----------
    window
        The window; two that overlap share their minutes.
    start, end
        [start, end) of the copies [min UTC].
    latest
        The last minute at which a cutover may be [min UTC].
    first
        Place of the minute ``start`` on the row of open minutes.
    """

    window: Window
    start: int
    end: int
    latest: int
    first: int

    @property
    def minutes(self) -> slice:
        """Where the window is on the row of open minutes."""
        return slice(self.first, self.first + self.end - self.start)

    def admits(self, *arrays: str) -> bool:
        """Whether copies between these arrays may run."""
        return not self.window.arrays or set(arrays) <= set(self.window.arrays)


def timeline(estate: Estate) -> tuple[Span, ...]:
    """Return the windows in order of their start."""
    policy = estate.policy
    finish = policy.finish_by or max((w.end for w in estate.windows), default=0)
    found: list[Span] = []
    closes = used = 0
    for window in sorted(estate.windows, key=lambda w: (w.start, w.name)):
        start, end = max(window.start, policy.earliest), min(window.end, finish)
        if start >= end:
            continue
        first = used if start >= closes else used - (closes - start)
        latest = min(window.end - policy.cutover_minutes, finish)
        found.append(Span(window, start, end, latest, first))
        used, closes = max(used, first + end - start), max(closes, end)
    return tuple(found)
