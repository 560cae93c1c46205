"""The pipeline from an estate to a plan; it only calls the stages."""

import numpy as np

from placer import __version__
from placer.candidates.block import Ints
from placer.candidates.table import Candidates
from placer.candidates.uses import uses
from placer.estate import Estate
from placer.moves import transfers
from placer.placement.place import Nothing, Placement, place
from placer.placement.watch import UNWATCHED, Watch
from placer.plan import Bought, Goal, Moment, Placed, Plan, Status, Use
from placer.schedule import book
from placer.windows.clock import local
from placer.words import PROVEN_GAP


def plan(
    candidates: Candidates,
    seconds: float,
    watch: Watch = UNWATCHED,
) -> Plan:
    """Plan an estate: placement, moves, nights.

    Parameters
    ----------
    candidates
        The table of the estate.
    seconds
        [s] time for the search of the placement.
    watch
        Told of each goal when it is solved, asked between steps whether to halt.
    """
    found = place(candidates, seconds, watch)
    if isinstance(found, Nothing):
        return _no_plan(candidates, found)
    moving = transfers(candidates, found.places, found.reasons)
    schedule = book(candidates, moving, found.bought)
    return Plan(
        inventory=candidates.estate.name,
        digest=candidates.estate.digest,
        version=__version__,
        status=_status(found.goals),
        start=_start(candidates.estate),
        placements=_placed(candidates, found),
        bought=_bought(candidates.estate, found.bought),
        moves=schedule.moves,
        bookings=schedule.bookings,
        left=schedule.left,
        uses=_today(candidates)
        + _planned(candidates, found.places, found.bought, Moment.PLANNED),
        goals=found.goals,
        shortages=schedule.overruns,
    )


def _no_plan(candidates: Candidates, found: Nothing) -> Plan:
    nearest: tuple[Use, ...] = ()
    if found.places is not None and found.bought is not None:
        nearest = _planned(candidates, found.places, found.bought, Moment.NEAREST)
    return Plan(
        inventory=candidates.estate.name,
        digest=candidates.estate.digest,
        version=__version__,
        status=Status.NO_PLAN,
        start=_start(candidates.estate),
        uses=_today(candidates) + nearest,
        shortages=found.shortages,
    )


def _start(estate: Estate) -> str:
    return local(estate.policy.start, estate.policy.zone).date().isoformat()


def _status(goals: tuple[Goal, ...]) -> Status:
    proven = all(goal.gap <= PROVEN_GAP for goal in goals)
    return Status.PROVEN if proven else Status.WITHIN_GAP


def _placed(candidates: Candidates, found: Placement) -> tuple[Placed, ...]:
    planned = candidates.responses.planned(found.places, found.bought)
    return tuple(
        Placed(
            volume=volume.id,
            source=volume.home,
            target=candidates.pools[found.places[row]].id,
            reason=found.reasons[row],
            response_today=candidates.responses.today[row],
            response_planned=planned[row],
            response_limit=volume.response_limit,
        )
        for row, volume in enumerate(candidates.volumes)
    )


def _bought(estate: Estate, steps: Ints) -> tuple[Bought, ...]:
    return tuple(
        Bought(pool.id, int(count), int(count) * pool.expansion.price)
        for pool, count in zip(estate.pools, steps, strict=True)
        if count and pool.expansion
    )


def _today(candidates: Candidates) -> tuple[Use, ...]:
    nothing = np.zeros(len(candidates.pools), dtype=np.int64)
    blocks = candidates.limits_today
    return uses(candidates, blocks, candidates.home, nothing, Moment.TODAY)


def _planned(
    candidates: Candidates, places: Ints, bought: Ints, moment: Moment
) -> tuple[Use, ...]:
    return uses(candidates, candidates.limits, places, bought, moment)
