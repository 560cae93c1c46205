"""Remarks on an estate as a whole: what single cells cannot show.

Each check is a function from candidates to findings; ``CHECKS`` lists them.
"""

from collections.abc import Callable, Iterator
from itertools import combinations

import numpy as np

from placer.candidates.table import Candidates
from placer.candidates.today import Compared, compare
from placer.candidates.uses import uses
from placer.estate import Level, Rule, RuleKind, Volume
from placer.findings import Finding, Place, Severity
from placer.physics import controllers, drives
from placer.plan import Moment
from placer.units import PPM
from placer.words import LIMITS, figure


def survey(candidates: Candidates) -> tuple[Finding, ...]:
    """Return the findings of all checks."""
    return tuple(finding for check in CHECKS for finding in check(candidates))


def controllers_left(candidates: Candidates) -> Iterator[Finding]:
    """Say where no controller is left after the failures that must be survived."""
    for array in candidates.estate.arrays:
        if array.controllers <= array.failures_survived:
            yield Finding(
                "controllers-left",
                Severity.ERROR,
                array.place,
                f"array {array.name} has {array.controllers} controllers and must "
                f"survive the failure of {array.failures_survived}: none is left",
                "enter fewer failures survived, or the true number of controllers",
            )


def too_large(candidates: Candidates) -> Iterator[Finding]:
    """Say which volumes are larger than every pool, the present one too."""
    for row, volume in enumerate(candidates.volumes):
        others = [
            candidates.reach.refusals(volume, pool)
            for pool in candidates.pools
            if pool.id != volume.home
        ]
        fits = any(all(r.code != "pool-room" for r in refusals) for refusals in others)
        if not fits and _overfills_home(candidates, row):
            yield Finding(
                "volume-too-large",
                Severity.ERROR,
                volume.place,
                f"volume {volume.id} is larger than every pool may hold",
                "check its size and unit, or add a pool that can hold it",
            )


def _overfills_home(candidates: Candidates, row: int) -> bool:
    for block in candidates.limits_today:
        owner = block.owner_of[candidates.home[row]]
        if block.code == "pool-room" and owner >= 0:
            alone = block.column(row, int(candidates.home[row])).max()
            return bool(alone > block.limits[owner].max())
    return False


def contradictions(candidates: Candidates) -> Iterator[Finding]:
    """Say which rules cannot hold at once, with both cells."""
    for first, second in combinations(candidates.estate.rules, 2):
        shared = set(first.volumes) & set(second.volumes)
        if _contradict(first, second, shared):
            yield _contradiction(first.place, first.said, second.place, second.said)
    yield from _against_staying(candidates)


def _against_staying(candidates: Candidates) -> Iterator[Finding]:
    volumes = {volume.id: volume for volume in candidates.volumes if volume.stays}
    for rule in candidates.estate.rules:
        for name in set(rule.volumes) & set(volumes):
            if _sends_away(rule, volumes[name]):
                said = f"{name} is to be left where it is"
                yield _contradiction(rule.place, rule.said, volumes[name].place, said)


def _sends_away(rule: Rule, volume: Volume) -> bool:
    here = volume.home in rule.pools
    return (rule.kind is RuleKind.ONLY_ON and not here) or (
        rule.kind is RuleKind.NEVER_ON and here
    )


def _contradict(first: Rule, second: Rule, shared: set[str]) -> bool:
    if not shared:
        return False
    kinds = {first.kind, second.kind}
    if kinds == {RuleKind.APART, RuleKind.TOGETHER}:
        return len(shared) > 1 and _cannot_part(first, second)
    pools, others = set(first.pools), set(second.pools)
    if kinds == {RuleKind.ONLY_ON}:
        return not pools & others
    if kinds == {RuleKind.ONLY_ON, RuleKind.NEVER_ON}:
        only, never = (
            (pools, others) if first.kind is RuleKind.ONLY_ON else (others, pools)
        )
        return only <= never
    return False


def _cannot_part(first: Rule, second: Rule) -> bool:
    """Return whether what is together in one rule is too near for the other.

    What shares a pool shares its array, and what shares an array its site.
    """
    apart, together = (
        (first, second) if first.kind is RuleKind.APART else (second, first)
    )
    levels = list(Level)
    return levels.index(together.level) <= levels.index(apart.level)


def _contradiction(place: Place, said: str, other: Place, also: str) -> Finding:
    return Finding(
        "rule-contradiction",
        Severity.ERROR,
        place,
        f"'{said}' and '{also}' ({other}) cannot both hold",
        "take one of the two back",
    )


def over_today(candidates: Candidates) -> Iterator[Finding]:
    """Say which limits are broken today: their use may not rise, and must be cured."""
    nothing = np.zeros(len(candidates.pools), dtype=np.int64)
    blocks = candidates.limits_today
    for use in uses(candidates, blocks, candidates.home, nothing, Moment.TODAY):
        if use.use > use.at_most:
            when = f" at {use.hour}" if use.hour else ""
            yield Finding(
                "over-limit-today",
                Severity.WARNING,
                _place(candidates, use.where),
                f"{use.where} is over a limit today: {LIMITS[use.limit]} "
                f"{figure(use.use)} of {figure(use.at_most)} {use.unit}{when}",
                "the plan never lets it rise, and brings it under the limit",
            )


def _place(candidates: Candidates, owner: str) -> Place:
    places = {pool.id: pool.place for pool in candidates.pools}
    arrays = {array.name: array.place for array in candidates.estate.arrays}
    return {**arrays, **places}[owner]


def model_off(candidates: Candidates) -> Iterator[Finding]:
    """Say where the model does not explain today, and offer one factor per pool."""
    for each in compare(candidates):
        if not each.near:
            yield Finding(
                "model-off",
                Severity.WARNING,
                _place(candidates, each.where),
                f"{each.where}: {each.what} was measured at {each.measured:.3g} "
                f"{each.unit}, the model says {each.modelled:.3g} {each.unit}",
                _offered(candidates, each),
            )


def _offered(candidates: Candidates, each: Compared) -> str:
    """Word the remedy: only a pool's busy share has a factor to offer."""
    if each.what != "pool busy":
        return "check the ratings, the loads and the times they were measured at"
    factors = {pool.id: pool.measured_factor for pool in candidates.pools}
    factor = each.ratio * factors[each.where] / PPM
    return (
        f"check drives and loads; or enter measured factor {factor:.2f} for this "
        "pool, and the plan counts with it"
    )


def no_busy_limit(candidates: Candidates) -> Iterator[Finding]:
    """Say where nothing is known about how busy a pool or its controllers may be."""
    for pool in candidates.pools:
        if pool.takes_volumes and drives.busy_cost(pool) is None:
            yield Finding(
                "no-busy-limit",
                Severity.WARNING,
                pool.place,
                f"pool {pool.id} has no drives and no requests at most: "
                "the plan does not limit how busy it gets",
                "enter its drives, or the requests it serves at most",
            )
    for array in candidates.estate.arrays:
        if controllers.controller_cost(array) is None:
            yield Finding(
                "no-controller-limit",
                Severity.NOTE,
                array.place,
                f"array {array.name} has no rating of its controllers: "
                "the plan does not limit how busy they get",
                "enter reads, writes or MB/s at most per controller",
            )


def unreached(candidates: Candidates) -> Iterator[Finding]:
    """Say which hosts use a volume on an array they are not said to reach."""
    hosts = {host.name: host for host in candidates.estate.hosts}
    for volume in candidates.volumes:
        host = hosts.get(volume.host)
        if host and host.arrays and volume.array not in host.arrays:
            yield Finding(
                "host-unreached",
                Severity.WARNING,
                volume.place,
                f"host {host.name} uses {volume.id} but is not said to reach "
                f"array {volume.array}",
                "complete the arrays reached of the host",
            )


def late_windows(candidates: Candidates) -> Iterator[Finding]:
    """Say when no window is left between the change lead and the finish."""
    estate = candidates.estate
    last = estate.policy.finish_by or max((w.end for w in estate.windows), default=0)
    open_ = [
        w for w in estate.windows if w.end > estate.policy.earliest and w.start < last
    ]
    if not open_:
        yield Finding(
            "no-window",
            Severity.WARNING,
            Place("windows"),
            "no window is open between the change lead and the finish: "
            "nothing can be moved",
            "enter windows, a shorter change lead, or a later finish",
        )


Check = Callable[[Candidates], Iterator[Finding]]

CHECKS: tuple[Check, ...] = (
    controllers_left,
    too_large,
    contradictions,
    over_today,
    model_off,
    no_busy_limit,
    unreached,
    late_windows,
)
