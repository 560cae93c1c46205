"""From candidates to a placement with its goals, or to what is missing."""

from dataclasses import dataclass

import numpy as np

from placer.candidates.block import Floats, Ints
from placer.candidates.table import Candidates
from placer.placement import goals, rows, shortage
from placer.placement.layout import Layout, layout
from placer.placement.reasons import reasons
from placer.placement.search import NEAR_ENOUGH, Found, at_solution, search
from placer.placement.settle import settle
from placer.placement.watch import UNWATCHED, Watch
from placer.plan import Goal, Reason, Shortage


@dataclass(frozen=True)
class Placement:
    """Where every volume shall be.

    Attributes
    ----------
    places
        (volumes,) column of the pool.
    bought
        (pools,) expansion steps.
    reasons
        Why each volume moves.
    goals
        Values and bounds, in the order of solving.
    """

    places: Ints
    bought: Ints
    reasons: tuple[Reason, ...]
    goals: tuple[Goal, ...]


@dataclass(frozen=True)
class Nothing:
    """No placement keeps every limit: what is missing, and the nearest placement.

    ``timed_out`` tells that the search ended before it knew; ``places`` and ``bought``
    are None where even the nearest placement is not known.
    """

    shortages: tuple[Shortage, ...]
    places: Ints | None = None
    bought: Ints | None = None
    timed_out: bool = False


def place(
    candidates: Candidates,
    seconds: float,
    watch: Watch = UNWATCHED,
    near_enough: float = NEAR_ENOUGH,
) -> Placement | Nothing:
    """Solve the placement of an estate.

    Parameters
    ----------
    candidates
        The table of the estate.
    seconds
        [s] time for the search.
    watch
        Told of each goal when it is solved, asked between steps whether to halt.
    near_enough
        [1] distance from the bound at which a goal needs no more search.
    """
    homeless = shortage.homeless(candidates)
    if homeless:
        return Nothing(homeless)
    plan = layout(candidates)
    program = rows.program(plan)
    start = _staying(plan)
    costs = goals.costs(plan)
    found = search(program, costs, seconds, start, watch, near_enough)
    if found.x is None:
        return _nothing(plan, seconds, timed_out=not found.impossible)
    return _placement(plan, found, costs)


def _staying(plan: Layout) -> Floats | None:
    """Return the solution in which nothing moves, None where a rule forbids it."""
    nothing_bought = np.zeros(len(plan.estate.pools), dtype=np.int64)
    try:
        return plan.solution(plan.candidates.home, nothing_bought)
    except KeyError:
        return None


def _placement(plan: Layout, found: Found, costs: tuple[goals.Cost, ...]) -> Placement:
    assert found.x is not None
    bought = plan.bought(found.x)
    places = settle(found.program, plan, plan.places(found.x), bought)
    x = plan.solution(places, bought)
    return Placement(
        places=places,
        bought=bought,
        reasons=tuple(reasons(plan.candidates, places)),
        goals=tuple(
            at_solution(cost, goal, x)
            for cost, goal in zip(costs, found.goals, strict=True)
        ),
    )


def _nothing(plan: Layout, seconds: float, *, timed_out: bool) -> Nothing:
    """Find the placement that overruns its limits least, and name the overruns."""
    nearest = shortage.nearest(plan, seconds)
    if nearest is None:
        return Nothing(shortage.contradiction(), timed_out=timed_out)
    return Nothing(
        shortage.shortages(plan, nearest),
        plan.places(nearest.x),
        plan.bought(nearest.x),
        timed_out=timed_out and not nearest.short,
    )
