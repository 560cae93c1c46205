"""Why each volume moves, as named in the plan."""

import numpy as np

from placer.candidates.block import Ints
from placer.candidates.table import Candidates
from placer.candidates.uses import uses
from placer.estate import Estate, Level, Rule, RuleKind
from placer.plan import Moment, Reason


def reasons(candidates: Candidates, places: Ints) -> list[Reason]:
    """Return the reason of every volume, ``STAYS`` where it stays."""
    strained = _strained(candidates)
    broken = _broken(candidates.estate)
    return [
        _reason(candidates, v, int(p), strained, broken) for v, p in enumerate(places)
    ]


def _reason(
    candidates: Candidates, row: int, pool: int, strained: set[int], broken: set[str]
) -> Reason:
    home = int(candidates.home[row])
    volume = candidates.volumes[row]
    if pool == home:
        return Reason.STAYS
    if volume.id in broken or home in strained:
        return Reason.CURE
    if candidates.missed[row, home] > candidates.missed[row, pool]:
        return Reason.LIMIT
    if candidates.relief[row, pool] > 0:
        return Reason.RELIEF
    return Reason.MAKE_ROOM


def _strained(candidates: Candidates) -> set[int]:
    """Return pools over a limit of theirs or their array's, if nothing moves.

    Today and at the horizon count.
    """
    nothing = np.zeros(len(candidates.pools), dtype=np.int64)
    over = {
        use.where
        for blocks in (candidates.limits_today, candidates.limits)
        for use in uses(candidates, blocks, candidates.home, nothing, Moment.TODAY)
        if use.use > use.at_most
    }
    return {
        p for p, pool in enumerate(candidates.pools) if over & {pool.id, pool.array}
    }


def _broken(estate: Estate) -> set[str]:
    """Return volumes of rules that today's places break."""
    return {
        v for rule in estate.rules if _is_broken(estate, rule) for v in rule.volumes
    }


def _is_broken(estate: Estate, rule: Rule) -> bool:
    sites = {array.name: array.site for array in estate.arrays}
    names = {
        volume.id: {
            Level.POOL: volume.home,
            Level.ARRAY: volume.array,
            Level.SITE: sites[volume.array],
        }[rule.level]
        for volume in estate.volumes
    }
    here = [names[volume] for volume in rule.volumes]
    if rule.kind is RuleKind.APART:
        return len(set(here)) < len(here)
    if rule.kind is RuleKind.TOGETHER:
        return len(set(here)) > 1
    return any((v in rule.pools) == (rule.kind is RuleKind.NEVER_ON) for v in here)
