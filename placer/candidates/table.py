"""The candidates of an estate: one table that placement, schedule and report share."""

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from placer.candidates import worth
from placer.candidates.block import Block, Floats, Ints
from placer.candidates.limits import Date, limits
from placer.candidates.reach import Reach
from placer.estate import Estate, Pool, Volume
from placer.physics.demand import months_of_nights
from placer.units import MS


@dataclass(frozen=True)
class Candidates:
    """Volumes x pools of one estate; rows follow its volumes, columns its pools.

    Attributes
    ----------
    allowed
        (volumes, pools) whether the place is allowed.
    missed
        (volumes, pools) weighted steps by which the response limit is missed.
    relief
        (volumes, pools) weighted waiting saved [ms/s].
    effort
        (volumes, pools) [GiB], 0 at home.
    """

    estate: Estate
    reach: Reach
    responses: worth.Responses
    allowed: NDArray[np.bool_]
    missed: Floats
    relief: Floats
    effort: Floats

    @property
    def volumes(self) -> tuple[Volume, ...]:
        """Volumes, in the order of the rows."""
        return self.estate.volumes

    @property
    def pools(self) -> tuple[Pool, ...]:
        """Pools, in the order of the columns."""
        return self.estate.pools

    @cached_property
    def home(self) -> Ints:
        """Column of each volume's pool today."""
        return self.horizon.home

    @cached_property
    def horizon(self) -> Date:
        """Sizes and loads that the planned placement must carry."""
        return Date(self.estate, self.estate.policy.horizon_months)

    @cached_property
    def copied(self) -> Floats:
        """What a move of each volume carries [B]."""
        return self.horizon.copied

    @cached_property
    def limits(self) -> tuple[Block, ...]:
        """Limits at the horizon."""
        return limits(self.estate, self.estate.policy.horizon_months)

    @cached_property
    def limits_today(self) -> tuple[Block, ...]:
        """Limits with the sizes and loads of today."""
        return limits(self.estate, 0)

    @cached_property
    def limits_in_nights(self) -> tuple[Block, ...]:
        """Limits with the sizes and loads of the last window."""
        return limits(self.estate, months_of_nights(self.estate))


def candidates(estate: Estate) -> Candidates:
    """Build the table of an estate."""
    reach, responses = Reach(estate), worth.Responses(estate)
    allowed = np.array(
        [[not reach.refusals(v, p) for p in estate.pools] for v in estate.volumes],
        dtype=bool,
    )
    promised = _promised(estate, responses)
    date = Date(estate, 0)
    return Candidates(
        estate=estate,
        reach=reach,
        responses=responses,
        allowed=allowed,
        missed=_missed(estate, promised),
        relief=_relief(estate, promised, responses),
        effort=_effort(estate, date),
    )


def _promised(estate: Estate, responses: worth.Responses) -> Ints:
    every = range(len(estate.volumes))
    table = np.array([responses.promised(v) for v in every], dtype=np.int64)
    home = Date(estate, 0).home
    table[np.arange(len(home)), home] = responses.today
    return table


def _missed(estate: Estate, promised: Ints) -> Floats:
    table = [
        [
            v.importance.weight * worth.steps_missed(v, int(then), estate.policy)
            for then in promised[i]
        ]
        for i, v in enumerate(estate.volumes)
    ]
    return np.array(table, dtype=float)


def _relief(estate: Estate, promised: Ints, responses: worth.Responses) -> Floats:
    """Weigh what each request gains by importance and requests of the busiest hour."""
    gains = [
        [worth.gain(today, int(then), estate.policy) for then in promised[i]]
        for i, today in enumerate(responses.today)
    ]
    weights = np.array([volume.importance.weight for volume in estate.volumes])
    weighed: Floats = np.array(gains) / MS * (weights * responses.requests)[:, None]
    return weighed


def _effort(estate: Estate, date: Date) -> Floats:
    each = np.array([worth.effort(size, estate.policy) for size in date.copied])
    table = np.repeat(each[:, None], len(estate.pools), axis=1)
    table[np.arange(len(each)), date.home] = 0.0
    return table
