"""Replay of the nights: every limit at every instant, by the first-day rule.

Each place keeps a ledger of what stands or is served there.  A copy takes its room in
the target from its start and in the source until it is released; load moves at the
cutover.  All changes of one instant count at once, so what is given back is there for
what is taken.
"""

from collections import defaultdict
from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass

from placer.audit import words
from placer.audit.case import Case
from placer.audit.limits import (
    SLACK,
    Gauge,
    Scene,
    added,
    gauges,
    plus,
    reading,
)
from placer.audit.moves import said
from placer.plan import Move
from placer.units import MINUTES_PER_DAY

REPLAYED = ("pool-room", "pool-thin", "array-volumes", "pool-busy", "controller-busy")
SERVED = ("pool-busy", "controller-busy")
EVER = 2**62


@dataclass(frozen=True, slots=True)
class Span:
    """The sum at one place between two instants, under the gauge that holds then."""

    since: int
    until: int
    gauge: Gauge
    total: Sequence[int]
    today: Sequence[int]

    def whole(self) -> list[int]:
        """Return the highest sum within the limit, the same in every hour."""
        return [self.gauge.most] * len(self.total)

    def allowed(self) -> list[int]:
        """Return the highest sum the first-day rule allows in each hour."""
        most, (part, of) = self.gauge.most, SLACK.as_integer_ratio()
        return [max(most, before + before * part // of) for before in self.today]

    def worst(self, most: Sequence[int]) -> int | None:
        """Return the first hour that is furthest over what it may be, if any is."""
        beyond = [part - may for part, may in zip(self.total, most, strict=True)]
        top = max(beyond, default=0)
        return beyond.index(top) if top > 0 else None


def spans(case: Case, code: str) -> Iterator[Span]:
    """Yield the spans of every place that has a limit, in the order of time."""
    standing = case.members(case.homes)
    before = Scene(case, case.nights, case.homes, {})
    after = Scene(case, case.nights, case.homes, case.steps)
    sooner = {gauge.where: gauge for gauge, _ in gauges(before, code)}
    for gauge, pools in gauges(after, code):
        there = ((volume, pool) for pool in pools for volume in standing[pool])
        start = added(gauge, there)
        changes = _changes(case, gauge, pools)
        yield from _walk(case, start, changes, (sooner.get(gauge.where), gauge))


def _arrival(case: Case, where: str) -> int:
    pool = case.pools.get(where)
    if pool is None or pool.expansion is None or not case.steps.get(where):
        return EVER
    return case.estate.policy.start + pool.expansion.delivery_days * MINUTES_PER_DAY


def _changes(
    case: Case, gauge: Gauge, pools: Sequence[str]
) -> dict[int, list[tuple[int, Move]]]:
    """Return by instant what comes (1) to a place and what goes (-1)."""
    changes: dict[int, list[tuple[int, Move]]] = defaultdict(list)
    served = gauge.code in SERVED
    for move in case.moves.values():
        if move.target in pools:
            changes[move.cutover if served else move.starts].append((1, move))
        if move.source in pools:
            changes[move.cutover if served else move.released].append((-1, move))
    return changes


def _walk(
    case: Case,
    start: Sequence[int],
    changes: dict[int, list[tuple[int, Move]]],
    gauge_of: tuple[Gauge | None, Gauge],
) -> Iterator[Span]:
    """Yield the spans of one place; its gauge is another once bought room arrives."""
    before, after = gauge_of
    arrives = _arrival(case, after.where)
    instants = sorted({*changes, arrives} - {EVER})
    total, since = start, min([case.estate.policy.start, *instants])
    for until in [*instants, EVER]:
        gauge = after if since >= arrives else before
        if gauge and since < until and total:
            today = start or [0] * len(total)
            yield Span(since, until, gauge, total, today)
        for sign, move in changes.get(until, ()):
            where = move.target if sign > 0 else move.source
            total = plus(total, after.adds(case.volumes[move.volume], where), sign)
        since = until


def first_day(code: str) -> Callable[[Case], Iterator[str]]:
    """Return the rule that one limit is kept, or not passed further than today."""

    def rule(case: Case) -> Iterator[str]:
        told = set()
        for span in spans(case, code):
            hour = span.worst(span.allowed())
            if hour is not None and span.gauge.where not in told:
                told.add(span.gauge.where)
                yield _said(case, span, hour)

    return rule


def cured_by(case: Case) -> Iterator[str]:
    """From the date of the cure on, every limit is kept without allowance.

    What the plan itself names as a shortage is no surprise.
    """
    cured = case.estate.policy.cured_by
    if not cured:
        return
    named = {(shortage.limit, shortage.where) for shortage in case.plan.shortages}
    for code in REPLAYED:
        told = {where for limit, where in named if limit == code}
        for span in spans(case, code):
            hour = span.worst(span.whole())
            late = span.until > cured and span.gauge.where not in told
            if late and hour is not None and span.total[hour] <= span.allowed()[hour]:
                told.add(span.gauge.where)
                yield f"{_said(case, span, hour)}, to be cured by {said(case, cured)}"


def _said(case: Case, span: Span, hour: int) -> str:
    scene = Scene(case, case.nights, case.homes, {})
    row = reading(scene, span.gauge, span.total)
    use, most = (
        words.figure(row.shares[hour], row.unit),
        words.figure(row.at_most, row.unit),
    )
    at = f" in {case.estate.hours[hour].label}" if row.hourly else ""
    when = said(case, span.since)
    return f"{row.where} uses {use} of at most {most} of {row.code}{at} from {when}"
