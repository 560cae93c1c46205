"""What came out, as text for a terminal: the whole on one screen, the verdict last."""

from collections import Counter
from collections.abc import Callable, Iterable, Iterator, Sequence
from itertools import islice

from placer.estate import Array, Estate
from placer.findings import Finding, Severity
from placer.plan import Moment, Plan, Status, Use
from placer.report.paragraphs import paragraph, table
from placer.tally import Total, finish, nights, share_of_limit, shares, totals
from placer.units import CENTS, MILLI, gib
from placer.words import clock, count, status, told

_LIMITS = (("room", "pool-room"), ("busiest hour", "pool-busy"), ("wear", "pool-wear"))
_SOME = 4
_IN_TABLE = "over-limit-today"
_HANGING = "    "

Uses = dict[tuple[str, str, Moment], Use]


def _growth(estate: Estate) -> str:
    return f"with the growth of {count(estate.policy.horizon_months, 'month')}"


_THEN: dict[Moment, Callable[[Estate], str]] = {
    Moment.PLANNED: lambda estate: f"planned: {_growth(estate)}",
    Moment.NEAREST: lambda estate: (
        f"nearest: least over the limits, {_growth(estate)}; no plan, do not carry out"
    ),
}


def plan_text(
    estate: Estate,
    plan: Plan,
    findings: Iterable[Finding] = (),
    verdict: str = "",
    width: int = 80,
) -> str:
    """Return the summary of a plan; an ordinary one fits 40 lines.

    Parameters
    ----------
    estate
        The inventory the plan was made for.
    plan
        The plan, or the shortages where no plan is possible.
    findings
        Remarks on the inventory and on the plan: counted, and where no plan is
        possible the warnings are told, for one of them may be the cause.
    verdict
        What the audit said, and where the files are; stands last.
    width
        [characters] how long a line may be.
    """
    found = tuple(findings)
    parts = [
        paragraph(inventory_line(estate, plan.inventory), width),
        _pools(estate, plan, width),
        _moves(estate, plan, width),
        _goals(estate, plan, width),
        _lacking(plan, width),
        _warnings(plan, found, width),
        _trust(estate, found, width),
        [
            *paragraph(status(plan), width),
            *(line for said in verdict.splitlines() for line in paragraph(said, width)),
        ],
    ]
    return "\n\n".join("\n".join(part) for part in parts if part) + "\n"


def inventory_line(estate: Estate, name: str) -> str:
    """Say what the inventory holds."""
    total = totals(estate)[-1]
    return (
        f"{name}: {count(total.volumes, 'volume')} in "
        f"{count(len(estate.pools), 'pool')} of {count(len(estate.arrays), 'array')}, "
        f"{amounts(total)}"
    )


def amounts(total: Total) -> str:
    """Say how much is stored and asked."""
    return (
        f"{gib(total.provisioned):,.0f} GiB provisioned, "
        f"{gib(total.occupied):,.0f} GiB occupied, "
        f"{total.requests / MILLI:,.0f} requests/s"
    )


def _pools(estate: Estate, plan: Plan, width: int) -> list[str]:
    """Return the use of pools and controllers today, and planned or nearest."""
    if not plan.uses:
        return []
    then = Moment.NEAREST if plan.status is Status.NO_PLAN else Moment.PLANNED
    uses = {(u.where, u.limit, u.moment): u for u in plan.uses}
    head = (f"% of limit, today -> {then}", *(word for word, _ in _LIMITS))
    rows = [
        (pool.id, *(_change(pool.id, limit, then, uses) for _, limit in _LIMITS))
        for pool in estate.pools
    ]
    rows += [
        (_controllers(array), "-", busy, "-")
        for array in estate.arrays
        if (busy := _change(array.name, "controller-busy", then, uses)) != "-"
    ]
    return [*table([head, *rows], width), *paragraph(_THEN[then](estate), width)]


def _controllers(array: Array) -> str:
    """Name the controllers of an array, and how many of them are counted as failed."""
    failed = array.failures_survived
    return f"{array.name} controllers" + (f", {failed} failed" if failed else "")


def _change(where: str, limit: str, then: Moment, uses: Uses) -> str:
    """Return ``81 -> 93 (Mon 10)``, a dash where the pool has no such limit."""
    today = uses.get((where, limit, Moment.TODAY))
    later = uses.get((where, limit, then))
    if today is None and later is None:
        return "-"
    hour = f" ({later.hour})" if later and later.hour else ""
    return f"{_share(today)} -> {_share(later)}{hour}"


def _share(use: Use | None) -> str:
    return "-" if use is None else f"{share_of_limit(use):.0f}"


def _moves(estate: Estate, plan: Plan, width: int) -> list[str]:
    """Return how many moves there are, why, when, and what is bought."""
    if not plan.moves:
        return []
    sums = ", ".join(
        f"{s.reason or 'no reason'} {s.moves} ({gib(s.copied):,.0f} GiB)"
        for s in shares(plan)
    )
    copied = gib(sum(move.size for move in plan.moves))
    said = [f"Moves: {len(plan.moves)}, {copied:,.0f} GiB: {sums}", _when(estate, plan)]
    said += _bought(estate, plan)
    return [line for text in said for line in paragraph(text, width, rest=_HANGING)]


def _when(estate: Estate, plan: Plan) -> str:
    zone = estate.policy.zone
    used = [night.window for night in nights(estate, plan)]
    offered = len({window.night for window in estate.windows})
    first = clock(used[0].start, used[0].zone) if used else "none"
    last = clock(finish(plan.moves) or 0, zone)
    released = clock(max(move.released for move in plan.moves), zone)
    return (
        f"Nights: {len({window.night for window in used})} of {offered}, first opens "
        f"{first}, last cutover {last}, last source released {released}"
    )


def _bought(estate: Estate, plan: Plan) -> list[str]:
    if not plan.bought:
        return []
    policy = estate.policy
    drives = {p.id: p.expansion.drives for p in estate.pools if p.expansion}
    steps = ", ".join(
        f"{count(b.steps, 'step')} of {count(drives[b.pool], 'drive')} for {b.pool}"
        for b in plan.bought
    )
    price = sum(b.price for b in plan.bought) / CENTS
    budget = f"{price:,.2f} of {policy.budget / CENTS:,.2f} {policy.currency}".rstrip()
    return [f"To buy: {steps}: {budget}"]


def _goals(estate: Estate, plan: Plan, width: int) -> list[str]:
    """Return each goal in the order of solving, with the gap in words."""
    return [
        line
        for goal in plan.goals
        for line in paragraph(told(goal, estate.policy.currency), width, rest=_HANGING)
    ]


def _lacking(plan: Plan, width: int) -> list[str]:
    """Return what is missing for a plan, and what could not be scheduled."""
    said = ["; ".join(filter(None, (s.sentence, s.remedy))) for s in plan.shortages]
    said += [
        f"{left.volume} cannot go to {left.target}: {left.lacks}" for left in plan.left
    ]
    return list(_some(said, width))


def _some(said: Sequence[str], width: int) -> Iterator[str]:
    for text in islice(said, _SOME):
        yield from paragraph(text, width, "- ", "  ")
    if len(said) > _SOME:
        yield f"  and {len(said) - _SOME} more, in the plan file"


def _warnings(plan: Plan, findings: Sequence[Finding], width: int) -> list[str]:
    """Return the warnings that may explain why there is no plan."""
    if plan.status is not Status.NO_PLAN:
        return []
    said = [
        f"{finding.place}: {finding.sentence}"
        for finding in findings
        if finding.severity is Severity.WARNING and finding.code != _IN_TABLE
    ]
    return ["Warnings about the inventory", *_some(said, width)] if said else []


def _trust(estate: Estate, findings: Iterable[Finding], width: int) -> list[str]:
    """Return how much was assumed and remarked."""
    cells = sum(a.cells for a in estate.assumptions)
    assumed = f"Assumed: {count(len(estate.assumptions), 'default')} in "
    assumed += f"{count(cells, 'empty cell')}, see the sheet assumptions"
    return [
        *paragraph(assumed, width),
        *paragraph(f"Findings: {counted(findings)}", width),
    ]


def counted(findings: Iterable[Finding]) -> str:
    """Return how many findings there are of each severity."""
    counts = Counter(f.severity for f in findings)
    return ", ".join(count(counts[s], s.value) for s in Severity)
