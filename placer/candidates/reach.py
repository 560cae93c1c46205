"""Which volumes may go to which pools, and why not."""

from collections.abc import Iterator
from dataclasses import dataclass
from functools import cached_property

from placer.estate import Array, Estate, Host, Pool, Route, Rule, RuleKind, Volume
from placer.physics import demand
from placer.physics.capacity import landed, room


@dataclass(frozen=True, slots=True)
class Refusal:
    """Why a volume may not be in a pool: the rule's code and a sentence."""

    code: str
    sentence: str


class Reach:
    """Looks up hosts, routes and rules of one estate."""

    def __init__(self, estate: Estate) -> None:
        self._estate = estate
        self._months = estate.policy.horizon_months

    @cached_property
    def _hosts(self) -> dict[str, Host]:
        return {host.name: host for host in self._estate.hosts}

    @cached_property
    def arrays(self) -> dict[str, Array]:
        """Arrays by name."""
        return {array.name: array for array in self._estate.arrays}

    @cached_property
    def _rules(self) -> dict[str, list[Rule]]:
        found: dict[str, list[Rule]] = {}
        for rule in self._estate.rules:
            if rule.kind in (RuleKind.ONLY_ON, RuleKind.NEVER_ON):
                for volume in rule.volumes:
                    found.setdefault(volume, []).append(rule)
        return found

    def refusals(self, volume: Volume, pool: Pool) -> tuple[Refusal, ...]:
        """Return every reason against this place; none where it is allowed."""
        found = list(self._by_rule(volume, pool))
        if pool.id != volume.home:
            found += self._by_leaving(volume, pool)
            if pool.array != volume.array:
                found += self._by_crossing(volume, pool)
        return tuple(found)

    def route(self, source: str, target: str) -> Route | None:
        """Return the route from array to array, the most exact one; None if none.

        Inside one array, and where the inventory lists no routes, a free one.
        """
        if source == target or not self._estate.routes:
            return Route(source=source, target=target)
        sites = {name: array.site for name, array in self.arrays.items()}
        for a in (source, sites[source]):
            for b in (target, sites[target]):
                route = self._listed.get((a, b))
                if route is not None:
                    return route if route.possible else None
        return None

    @cached_property
    def _listed(self) -> dict[tuple[str, str], Route]:
        return {(route.source, route.target): route for route in self._estate.routes}

    def _by_rule(self, volume: Volume, pool: Pool) -> Iterator[Refusal]:
        for rule in self._rules.get(volume.id, ()):
            inside = pool.id in rule.pools
            if inside == (rule.kind is RuleKind.NEVER_ON):
                code = rule.kind.value.replace(" ", "-")
                yield Refusal(code, f"rule {rule.place}: {rule.said}")

    def _by_leaving(self, volume: Volume, pool: Pool) -> Iterator[Refusal]:
        if volume.stays:
            yield Refusal("stays", "marked to be left where it is")
        if not pool.takes_volumes:
            yield Refusal("source-only", f"{pool.media} pools only give volumes away")
        most = room(pool, pool.expansion.at_most if pool.expansion else 0)
        if landed(demand.room(volume, self._months), pool) > most:
            yield Refusal("pool-room", "larger than the whole pool may hold")

    def _by_crossing(self, volume: Volume, pool: Pool) -> Iterator[Refusal]:
        largest = self.arrays[pool.array].largest_volume
        if largest and volume.provisioned > largest:
            yield Refusal("largest-volume", "larger than the array's largest volume")
        host = self._hosts.get(volume.host)
        if host and host.arrays and pool.array not in host.arrays:
            yield Refusal("host-reach", f"host {host.name} does not reach {pool.array}")
        if self.route(volume.array, pool.array) is None:
            yield Refusal("route", f"no route from {volume.array} to {pool.array}")
