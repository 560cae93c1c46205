"""Why a unit found no night, in the units of the trade."""

from collections.abc import Sequence

from placer.estate import Estate
from placer.schedule.books import Books
from placer.schedule.levels import Change, earliest, merged
from placer.schedule.pieces import carried, filled
from placer.schedule.sayings import clock, short, where
from placer.schedule.timeline import Span
from placer.schedule.unit import Unit
from placer.units import gib


def lacks(estate: Estate, books: Books, unit: Unit) -> str:
    """Return which limit keeps a unit out of the windows, as a sentence."""
    room = merged([change for part in unit.parts for change in part.taken])
    needed = [*room, *unit.load]
    usable = [s for s in books.spans if s.start <= s.latest and s.admits(*unit.arrays)]
    return (
        _window(books, unit, usable)
        or _limit(estate, needed)
        or _late(estate, needed, usable)
        or _cutovers(estate, books, unit, usable)
        or _copying(estate, books, unit, usable)
    )


def _window(books: Books, unit: Unit, usable: Sequence[Span]) -> str:
    if usable:
        return ""
    if any(span.admits(*unit.arrays) for span in books.spans):
        return "Every window left is shorter than a cutover."
    if books.spans:
        return f"No window admits all of {', '.join(unit.arrays)}."
    return "No window is left between the change lead and the date to finish by."


def _limit(estate: Estate, needed: Change) -> str:
    """Say what is missing for as long as the plan lasts."""
    for level, change in needed:
        if level.earliest(change) is None:
            return f"{short(estate, level, *level.lacking(change))}."
    return ""


def _late(estate: Estate, needed: Change, usable: Sequence[Span]) -> str:
    """Say which limit lets it in only after the last window."""
    last = max(span.latest for span in usable)
    for level, change in needed:
        opens = level.earliest(change)
        if opens is not None and opens > last:
            since = clock(estate, opens)
            return f"{where(level)}: enough from {since} on, after the last window."
    return ""


def _cutovers(estate: Estate, books: Books, unit: Unit, usable: Sequence[Span]) -> str:
    opens = max(minute for minute in books.opens(unit) if minute is not None)
    later = [span for span in usable if span.latest >= opens]
    if any(books.may_cut_over(unit, span) for span in later):
        return ""
    since = clock(estate, max(opens, later[0].start))
    return f"No cutover is left in the nights from {since} on."


def _copying(estate: Estate, books: Books, unit: Unit, usable: Sequence[Span]) -> str:
    """Say how much of its longest copy the windows still carry."""
    last = max(span.latest for span in usable if books.may_cut_over(unit, span))
    until = clock(estate, last)
    for part in unit.parts:
        size = part.transfer.size
        spans = [span for span in books.spans if span.admits(*part.arrays)]
        opens = earliest(part.taken)
        assert opens is not None
        limits = (opens, last)
        fits = sum(map(carried, filled(books.lanes, part.copy, size, spans, limits)))
        if fits < size:
            return (
                f"The windows until {until} carry {gib(fits):,.4g} of the "
                f"{gib(size):,.4g} GiB of {part.transfer.volume}."
            )
    whole = gib(sum(part.transfer.size for part in unit.parts))
    return f"The windows until {until} do not carry its {whole:,.4g} GiB together."
