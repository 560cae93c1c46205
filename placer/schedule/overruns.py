"""Limits that the nights do not bring back under their ceilings by the date asked."""

from collections.abc import Iterable, Iterator

from placer.estate import Estate
from placer.plan import Shortage
from placer.schedule.level import Level, Overrun
from placer.schedule.sayings import clock, short

_REMEDY = (
    "Ask for the cure later, open more windows before it, or hold sources shorter."
)


def overruns(estate: Estate, levels: Iterable[Level]) -> Iterator[Shortage]:
    """Yield every limit that is overrun on the date of the cure or later."""
    cure = estate.policy.cured_by
    for level in levels if cure else ():
        found = level.overrun(cure)
        if found:
            yield _shortage(estate, level, found)


def _shortage(estate: Estate, level: Level, found: Overrun) -> Shortage:
    block = level.block
    since = clock(estate, estate.policy.cured_by)
    until = "the end" if found.until is None else clock(estate, found.until)
    what = short(estate, level, found.amount, found.hour)
    return Shortage(
        limit=block.code,
        where=level.owner,
        amount=found.amount / block.scale,
        unit=block.unit,
        sentence=f"{what} from the date of the cure, {since}, until {until}.",
        remedy=_REMEDY,
        hour=estate.hours[found.hour].label if block.hourly else "",
    )
