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


def both(one: Pair, other: Pair) -> Pair:
    """Return the damaged estate of one pair with the damaged plan of another."""
    return one[0], other[1]


def _edited(records: tuple[Any, ...], of: Callable[[Any], bool], edit: Any) -> Any:
    hits = sum(map(of, records))
    assert hits, "the record to damage is not there"
    return tuple(replace(r, **edit) if of(r) else r for r in records)


def damage(code: str, name: str, pair: Pair, *also: str) -> Damage:
    """Return the row of one damage."""
    return Damage(code, name, pair, frozenset(also))


@dataclass(frozen=True, slots=True)
class Sound:
    """An estate and a plan without a fault, to be damaged."""

    sound: Estate
    sailed: Plan

    def estate(self, **changes: Any) -> Pair:
        """Return the pair with parts of the estate replaced."""
        return replace(self.sound, **changes), self.sailed

    def plan(self, **changes: Any) -> Pair:
        """Return the pair with parts of the plan replaced."""
        return self.sound, replace(self.sailed, **changes)

    def policy(self, **changes: Any) -> Pair:
        """Return the pair with settings of the policy replaced."""
        return self.estate(policy=replace(self.sound.policy, **changes))

    def volume(self, name: str, **changes: Any) -> Pair:
        """Return the pair with one volume changed."""
        return self.estate(
            volumes=_edited(self.sound.volumes, lambda v: v.id == name, changes)
        )

    def pool(self, name: str, **changes: Any) -> Pair:
        """Return the pair with one pool changed."""
        return self.estate(
            pools=_edited(self.sound.pools, lambda p: p.id == name, changes)
        )

    def array(self, name: str, **changes: Any) -> Pair:
        """Return the pair with one array changed."""
        return self.estate(
            arrays=_edited(self.sound.arrays, lambda a: a.name == name, changes)
        )

    def window(self, name: str, **changes: Any) -> Pair:
        """Return the pair with one window changed."""
        return self.estate(
            windows=_edited(self.sound.windows, lambda w: w.name == name, changes)
        )

    def route(self, source: str, target: str, **changes: Any) -> Pair:
        """Return the pair with one route changed."""
        ends = source, target
        routes = _edited(
            self.sound.routes, lambda r: (r.source, r.target) == ends, changes
        )
        return self.estate(routes=routes)

    def rule(self, at: int, **changes: Any) -> Pair:
        """Return the pair with one relation changed."""
        wishes = _edited(self.sound.rules, lambda r: r is self.sound.rules[at], changes)
        return self.estate(rules=wishes)

    def placed(self, name: str, **changes: Any) -> Pair:
        """Return the pair with one placement changed."""
        placements = _edited(
            self.sailed.placements, lambda p: p.volume == name, changes
        )
        return self.plan(placements=placements)

    def move(self, name: str, **changes: Any) -> Pair:
        """Return the pair with one move changed."""
        return self.plan(
            moves=_edited(self.sailed.moves, lambda m: m.id == name, changes)
        )

    def moves(self, changes: dict[str, dict[str, Any]]) -> tuple[Any, ...]:
        """Return the moves of the plan, some of them changed."""
        return tuple(replace(m, **changes.get(m.id, {})) for m in self.sailed.moves)

    def bookings(self, changes: dict[int, dict[str, Any]]) -> tuple[Any, ...]:
        """Return the bookings of the plan, some of them changed, by their order."""
        return tuple(
            replace(piece, **changes.get(at, {}))
            for at, piece in enumerate(self.sailed.bookings)
        )

    def booking(self, at: int, **changes: Any) -> Pair:
        """Return the pair with one booking changed."""
        return self.plan(bookings=self.bookings({at: changes}))

    def goal(self, name: str, **changes: Any) -> Pair:
        """Return the pair with one goal changed."""
        return self.plan(
            goals=_edited(self.sailed.goals, lambda g: g.name == name, changes)
        )

    def use(self, where: str, limit: str, moment: str, **changes: Any) -> Pair:
        """Return the pair with one stated use changed."""
        key = where, limit, moment
        uses = _edited(
            self.sailed.uses, lambda u: (u.where, u.limit, u.moment) == key, changes
        )
        return self.plan(uses=uses)

    def stated(self, where: str, limit: str, at_most: float) -> Pair:
        """Return the pair with one limit stated otherwise, for today and planned."""
        place = where, limit
        changes = {"at_most": at_most}
        return self.plan(
            uses=_edited(
                self.sailed.uses, lambda u: (u.where, u.limit) == place, changes
            )
        )

    def tenant(self, name: str, **caps: Any) -> Pair:
        """Return the pair with one volume the only one of a tenant of its own."""
        theirs = self.volume(name, tenant="own")[0].volumes
        tenants = (*self.sound.tenants, Tenant(name="own", **caps))
        return self.estate(volumes=theirs, tenants=tenants)


_HARBOUR = Sound(ESTATE, PLAN)
estate = _HARBOUR.estate
plan = _HARBOUR.plan
policy = _HARBOUR.policy
volume = _HARBOUR.volume
pool = _HARBOUR.pool
array = _HARBOUR.array
window = _HARBOUR.window
route = _HARBOUR.route
rule = _HARBOUR.rule
placed = _HARBOUR.placed
move = _HARBOUR.move
moves = _HARBOUR.moves
bookings = _HARBOUR.bookings
booking = _HARBOUR.booking
goal = _HARBOUR.goal
use = _HARBOUR.use
stated = _HARBOUR.stated
tenant = _HARBOUR.tenant
