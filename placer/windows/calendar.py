"""The calendar: rules for windows and freezes, and the windows that come of them."""

from collections import Counter
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from datetime import date, time, timedelta

from placer.estate import Window
from placer.findings import Place
from placer.windows.clock import local
from placer.windows.spans import Piece, Recurring, Span, cut, spans


@dataclass(frozen=True, slots=True, kw_only=True)
class WindowRule:
    """Times when copies and cutovers may happen.

    Either ``lasts_minutes`` (exact, whatever the clocks do) or ``closes_at`` (a wall
    time, the next day where it is not after ``opens_at``) is given.  ``first`` is also
    where a rule with an interval counts from.  Limits as in `placer.estate.Window`.
    """

    name: str
    opens_on: str
    opens_at: time
    lasts_minutes: int | None = None
    closes_at: time | None = None
    zone: str = "UTC"
    first: date | None = None
    until: date | None = None
    rate: int = 0
    at_once: int = 0
    cutovers: int = 4
    arrays: tuple[str, ...] = ()
    place: Place = Place()

    @property
    def recurring(self) -> Recurring:
        """When it is open, without its limits."""
        return Recurring(
            name=self.name,
            on=self.opens_on,
            at=self.opens_at,
            lasts=self.lasts_minutes,
            ends_at=self.closes_at,
            zone=self.zone,
            first=self.first,
            until=self.until,
        )


@dataclass(frozen=True, slots=True, kw_only=True)
class FreezeRule:
    """Times when nothing may happen; the same ways of saying them as for windows."""

    name: str
    starts_on: str
    starts_at: time = time.min
    lasts_minutes: int | None = None
    ends_at: time | None = None
    zone: str = "UTC"
    first: date | None = None
    until: date | None = None
    why: str = ""
    place: Place = Place()

    @property
    def recurring(self) -> Recurring:
        """When it holds."""
        return Recurring(
            name=self.name,
            on=self.starts_on,
            at=self.starts_at,
            lasts=self.lasts_minutes,
            ends_at=self.ends_at,
            zone=self.zone,
            first=self.first,
            until=self.until,
        )


def expand(
    windows: Iterable[WindowRule],
    freezes: Iterable[FreezeRule],
    start: date,
    last: date,
) -> tuple[Window, ...]:
    """Return the windows that open on the days from ``start`` to ``last``, by start.

    Freezes are cut out by instants; what is wholly frozen vanishes.

    Raises
    ------
    ValueError
        A rule is wrong, or two windows of one name open at the same time.
    """
    whole = [(w, span) for w in windows for span in spans(w.recurring, start, last)]
    frozen = _frozen(freezes, [span for _, span in whole])
    nights = _nights(whole)
    pieces = [
        piece
        for (rule, span), night in zip(whole, nights, strict=True)
        for piece in _pieces(rule, span, night, frozen)
    ]
    return tuple(sorted(pieces, key=lambda window: (window.start, window.name)))


def _frozen(freezes: Iterable[FreezeRule], open_: Sequence[Span]) -> list[Piece]:
    """Return all that is frozen from the first opening to the last closing."""
    begins = min((span.start for span in open_), default=0)
    ends = max((span.end for span in open_), default=0)
    return [
        (span.start, span.end)
        for freeze in freezes
        for span in _holding(freeze.recurring, begins, ends)
    ]


def _holding(freeze: Recurring, begins: int, ends: int) -> tuple[Span, ...]:
    """Return the occurrences of a freeze that may touch a stretch of time."""
    first = local(begins, freeze.zone).date() - timedelta(days=freeze.days_at_most)
    return spans(freeze, first, local(ends, freeze.zone).date())


def _nights(whole: Sequence[tuple[WindowRule, Span]]) -> list[str]:
    """Return one name per opening: its date, with the time where dates repeat."""
    short = [f"{rule.name} {span.day}" for rule, span in whole]
    times = [f"{rule.opens_at:%H:%M}" for rule, _ in whole]
    uses = Counter(short)
    nights = [
        f"{name} {at}" if uses[name] > 1 else name
        for name, at in zip(short, times, strict=True)
    ]
    twice = [night for night, count in Counter(nights).items() if count > 1]
    if twice:
        raise ValueError(f'two windows are called "{twice[0]}": name them differently')
    return nights


def _pieces(
    rule: WindowRule, span: Span, night: str, frozen: Iterable[Piece]
) -> list[Window]:
    """Return what is left of one opening, numbered where it is more than one piece."""
    left = cut((span.start, span.end), frozen)
    return [
        Window(
            name=f"{night} ({number})" if len(left) > 1 else night,
            night=night,
            opens=span.start,
            start=start,
            end=end,
            zone=rule.zone,
            rate=rule.rate,
            at_once=rule.at_once,
            cutovers=rule.cutovers,
            arrays=rule.arrays,
            place=rule.place,
        )
        for number, (start, end) in enumerate(left, 1)
    ]
