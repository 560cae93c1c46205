"""Rules of the planned placement, judged at the growth horizon."""

from collections import Counter
from collections.abc import Callable, Iterator
from itertools import combinations

from placer.audit import limits, words
from placer.audit.case import Case
from placer.estate import Level, Rule, RuleKind


def one_place(case: Case) -> Iterator[str]:
    """Check that every volume stands once, from its present pool to a known one."""
    times = Counter(placed.volume for placed in case.plan.placements)
    for name in sorted(case.volumes.keys() | times.keys()):
        if name not in case.volumes:
            yield f"{name} is placed but is no volume of the inventory"
        elif times[name] != 1:
            yield f"{name} stands {times[name]} times in the placement"
    for placed in case.plan.placements:
        home = case.homes.get(placed.volume, placed.source)
        if placed.source != home:
            yield f"{placed.volume} is said to leave {placed.source} but is on {home}"
        if placed.target not in case.pools:
            yield f"{placed.volume} goes to {placed.target}, which is no pool"


def kept(code: str) -> Callable[[Case], Iterator[str]]:
    """Return the rule that one limit is kept whole at the horizon."""

    def rule(case: Case) -> Iterator[str]:
        scene = limits.Scene(case, case.horizon, case.targets, case.steps)
        for row in limits.readings(scene, code):
            if row.over:
                yield f"{_said(case, row)} after {case.horizon.months} months"

    return rule


def _said(case: Case, row: limits.Reading) -> str:
    hour = "" if row.hour is None else f" in {case.estate.hours[row.hour].label}"
    use, most = words.figure(row.use, row.unit), words.figure(row.at_most, row.unit)
    return f"{row.where} uses {use} of at most {most}{hour}"


def largest_volume(case: Case) -> Iterator[str]:
    """Check that no volume moves into an array that cannot hold one of its size."""
    for volume in case.movers:
        array = case.array_of(case.targets[volume.id])
        if case.changes_array(volume) and 0 < array.largest_volume < volume.provisioned:
            size, most = words.gib(volume.provisioned), words.gib(array.largest_volume)
            yield f"{volume.id} has {size}, {array.name} takes volumes up to {most}"


def source_only(case: Case) -> Iterator[str]:
    """Check that nothing moves into a pool that only gives."""
    for volume in case.movers:
        target = case.pools[case.targets[volume.id]]
        if not target.takes_volumes:
            yield f"{volume.id} moves into {target.id}, which is {target.media}"


def host_reach(case: Case) -> Iterator[str]:
    """Check that the host of a volume that changes its array reaches the new one."""
    reach = {host.name: host.arrays for host in case.estate.hosts}
    for volume in filter(case.changes_array, case.movers):
        array = case.array_of(case.targets[volume.id]).name
        arrays = reach.get(volume.host, ())
        if arrays and array not in arrays:
            yield f"{volume.id} goes to {array}, which {volume.host} does not reach"


def route(case: Case) -> Iterator[str]:
    """Check that a volume that changes its array has a route."""
    if not case.estate.routes:
        return
    for volume in filter(case.changes_array, case.movers):
        target = case.targets[volume.id]
        way = case.route(volume.home, target)
        if way is None or not way.possible:
            lacks = "no route" if way is None else "a route that is not possible"
            yield f"{volume.id} has {lacks} from {volume.home} to {target}"


def asked(kind: RuleKind) -> Callable[[Case], Iterator[str]]:
    """Return the rule that relations of one kind hold."""

    def rule(case: Case) -> Iterator[str]:
        for wish in case.estate.rules:
            if wish.kind is kind and (broken := breach(case, wish, case.targets)):
                yield f"{broken}, against the rule {wish.said or wish.kind}"

    return rule


def breach(case: Case, wish: Rule, where: dict[str, str]) -> str:
    """Return how a placement breaks a relation, or nothing."""
    if wish.kind in (RuleKind.ONLY_ON, RuleKind.NEVER_ON):
        wanted = wish.kind is RuleKind.ONLY_ON
        wrong = [v for v in wish.volumes if (where[v] in wish.pools) is not wanted]
        return ", ".join(f"{name} is on {where[name]}" for name in wrong)
    shared = wish.kind is RuleKind.TOGETHER
    wrong_pairs = [
        f"{one} on {where[one]} and {other} on {where[other]}"
        for one, other in combinations(wish.volumes, 2)
        if (
            _spot(case, where[one], wish.level) == _spot(case, where[other], wish.level)
        )
        is not shared
    ]
    return "; ".join(wrong_pairs)


def _spot(case: Case, pool: str, level: Level) -> str:
    spots = {
        Level.POOL: pool,
        Level.ARRAY: case.pools[pool].array,
        Level.SITE: case.site_of(pool),
    }
    return spots[level]


def stays(case: Case) -> Iterator[str]:
    """Check that a volume marked to be left where it is does not move."""
    for volume in case.movers:
        if not volume.stays:
            continue
        target = case.targets[volume.id]
        yield f"{volume.id} is to be left on {volume.home} but moves to {target}"


def spent(case: Case) -> int:
    """Return what the steps bought cost [hundredths of the currency]."""
    return sum(
        steps * expansion.price
        for pool, steps in case.steps.items()
        if pool in case.pools and (expansion := case.pools[pool].expansion)
    )


def budget(case: Case) -> Iterator[str]:
    """Check that no more is spent than there is."""
    money, most = spent(case), case.estate.policy.budget
    if money > most:
        currency = case.estate.policy.currency
        yield (
            f"the plan spends {money / 100:,.2f} {currency} of at most "
            f"{most / 100:,.2f} {currency}"
        )


def steps(case: Case) -> Iterator[str]:
    """Check that no pool is given more drives than it could have."""
    for name, bought in case.steps.items():
        pool = case.pools.get(name)
        most = pool.expansion.at_most if pool and pool.expansion else 0
        if not 0 <= bought <= most:
            yield f"{bought} steps are bought for {name}, which could have {most}"
