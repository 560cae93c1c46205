"""Tools to damage one record of an estate or a plan, and the row of a damage."""

from collections.abc import Callable
from dataclasses import dataclass, replace
from typing import Any

from corruptions.harbour import ESTATE
from corruptions.sailing import PLAN
from placer.estate import Estate, Tenant
from placer.plan import Plan

Pair = tuple[Estate, Plan]


@dataclass(frozen=True, slots=True)
class Damage:
    """One damage, the rule that must find it, and what else it cannot help to break."""

    code: str
    name: str
    pair: Pair
    also: frozenset[str] = frozenset()


def damage(code: str, name: str, pair: Pair, *also: str) -> Damage:
    """Return the row of one damage."""
    return Damage(code, name, pair, frozenset(also))


def estate(**changes: Any) -> Pair:
    """Return the pair with parts of the estate replaced."""
    return replace(ESTATE, **changes), PLAN


def plan(**changes: Any) -> Pair:
    """Return the pair with parts of the plan replaced."""
    return ESTATE, replace(PLAN, **changes)


def policy(**changes: Any) -> Pair:
    """Return the pair with settings of the policy replaced."""
    return estate(policy=replace(ESTATE.policy, **changes))


def both(one: Pair, other: Pair) -> Pair:
    """Return the damaged estate of one pair with the damaged plan of another."""
    return one[0], other[1]


def _edited(records: tuple[Any, ...], of: Callable[[Any], bool], edit: Any) -> Any:
    hits = sum(map(of, records))
    assert hits, "the record to damage is not there"
    return tuple(replace(r, **edit) if of(r) else r for r in records)


def volume(name: str, **changes: Any) -> Pair:
    """Return the pair with one volume changed."""
    return estate(volumes=_edited(ESTATE.volumes, lambda v: v.id == name, changes))


def pool(name: str, **changes: Any) -> Pair:
    """Return the pair with one pool changed."""
    return estate(pools=_edited(ESTATE.pools, lambda p: p.id == name, changes))


def array(name: str, **changes: Any) -> Pair:
    """Return the pair with one array changed."""
    return estate(arrays=_edited(ESTATE.arrays, lambda a: a.name == name, changes))


def window(name: str, **changes: Any) -> Pair:
    """Return the pair with one window changed."""
    return estate(windows=_edited(ESTATE.windows, lambda w: w.name == name, changes))


def route(source: str, target: str, **changes: Any) -> Pair:
    """Return the pair with one route changed."""
    ends = source, target
    routes = _edited(ESTATE.routes, lambda r: (r.source, r.target) == ends, changes)
    return estate(routes=routes)


def rule(at: int, **changes: Any) -> Pair:
    """Return the pair with one relation changed."""
    wishes = _edited(ESTATE.rules, lambda r: r is ESTATE.rules[at], changes)
    return estate(rules=wishes)


def placed(name: str, **changes: Any) -> Pair:
    """Return the pair with one placement changed."""
    placements = _edited(PLAN.placements, lambda p: p.volume == name, changes)
    return plan(placements=placements)


def move(name: str, **changes: Any) -> Pair:
    """Return the pair with one move changed."""
    return plan(moves=_edited(PLAN.moves, lambda m: m.id == name, changes))


def moves(changes: dict[str, dict[str, Any]]) -> tuple[Any, ...]:
    """Return the moves of the plan, some of them changed."""
    return tuple(replace(m, **changes.get(m.id, {})) for m in PLAN.moves)


def bookings(changes: dict[int, dict[str, Any]]) -> tuple[Any, ...]:
    """Return the bookings of the plan, some of them changed, by their order."""
    return tuple(
        replace(piece, **changes.get(at, {})) for at, piece in enumerate(PLAN.bookings)
    )


def booking(at: int, **changes: Any) -> Pair:
    """Return the pair with one booking changed."""
    return plan(bookings=bookings({at: changes}))


def goal(name: str, **changes: Any) -> Pair:
    """Return the pair with one goal changed."""
    return plan(goals=_edited(PLAN.goals, lambda g: g.name == name, changes))


def use(where: str, limit: str, moment: str, **changes: Any) -> Pair:
    """Return the pair with one stated use changed."""
    key = where, limit, moment
    uses = _edited(PLAN.uses, lambda u: (u.where, u.limit, u.moment) == key, changes)
    return plan(uses=uses)


def stated(where: str, limit: str, at_most: float) -> Pair:
    """Return the pair with one limit stated otherwise, for today and planned."""
    place = where, limit
    changes = {"at_most": at_most}
    return plan(uses=_edited(PLAN.uses, lambda u: (u.where, u.limit) == place, changes))


def tenant(name: str, **caps: Any) -> Pair:
    """Return the pair with one volume the only one of a tenant of its own."""
    theirs = volume(name, tenant="own")[0].volumes
    tenants = (*ESTATE.tenants, Tenant(name="own", **caps))
    return estate(volumes=theirs, tenants=tenants)
