"""Sentences about a plan, the same in the file and on the terminal."""

from math import isinf

from placer.plan import Goal, Plan, Reason, Status, Stopped
from placer.units import CENTS
from placer.windows.clock import local

PROVEN_GAP = 1e-4
_TITLES = {
    "missed": "response limits missed",
    "relief": "relief, waiting saved",
    "effort": "copying, cutovers counted as GiB",
}
LIMITS = {
    "pool-room": "room",
    "pool-thin": "room provisioned",
    "pool-busy": "drives busy",
    "pool-wear": "wear",
    "controller-busy": "controllers busy",
    "array-volumes": "volumes",
    "array-hosts": "hosts",
}
_UNITS = {"steps": "steps of 10 %", "ms/s": "ms each second"}

REASONS = {
    Reason.CURE: "its pool, or a rule it stands under, is over a limit",
    Reason.LIMIT: "its response limit is missed by less, or kept",
    Reason.SAVE: "less has to be bought",
    Reason.RELIEF: "it waits less there, by enough to count",
    Reason.MAKE_ROOM: "others need its room or its share of the load",
}

CAUTIONS = (
    "No volume moves before a backup of it has been proven by a restore.",
    "Start only with an approved change in hand.",
    "Follow the vendor's guidance for host paths and for copy services.",
    "Only qualified staff carry out these steps.",
    "Have a tested way back for every cutover.",
    "Start nothing while a rebuild runs on either array.",
    "All figures are estimates from measured averages; watch the real ones.",
    "Where local rules differ from this sheet, local rules win.",
)


def clock(instant: int, zone: str) -> str:
    """Return an instant [min UTC] as ``2026-05-08 22:00+02:00``."""
    return local(instant, zone).isoformat(" ", "minutes")


def count(number: int, noun: str) -> str:
    """Return a number with its noun: ``1 move``, ``2 moves``."""
    return f"{number:,} {noun}" if number == 1 else f"{number:,} {noun}s"


def title(goal: Goal) -> str:
    """Return what a goal is called in front of people."""
    return _TITLES.get(goal.name, goal.name)


def value(goal: Goal, currency: str = "") -> str:
    """Return a goal's value with its unit; money in whole units of the currency."""
    if goal.name == "missed" and goal.value == 0:
        return "none"
    if goal.name == "money":
        return f"{goal.value / CENTS:,.2f} {currency}".rstrip()
    return f"{figure(goal.value)} {_UNITS.get(goal.unit, goal.unit)}".rstrip()


def told(goal: Goal, currency: str = "") -> str:
    """Return a goal with its value and its gap in one line."""
    return f"{title(goal)}: {value(goal, currency)}, {gap(goal)}"


def figure(number: float) -> str:
    """Return a number with as many digits as anybody reads."""
    return f"{number:,.0f}" if abs(number) >= 1000 else f"{number:.4g}"


def gap(goal: Goal) -> str:
    """Say how far a goal's value may be from the best that any plan could reach."""
    if isinf(goal.bound):
        words = "how far from the best possible is not known"
    elif goal.gap <= PROVEN_GAP:
        words = "proven best"
    else:
        words = f"within {_share(goal.gap)} of the best possible"
    ended = "" if goal.stopped is Stopped.DONE else f" ({goal.stopped})"
    return words + ended + _given_up(goal)


def _given_up(goal: Goal) -> str:
    lost = abs(goal.reached - goal.value)
    if lost <= PROVEN_GAP * abs(goal.reached) or goal.reached == 0:
        return ""
    return f", {_share(lost / abs(goal.reached))} of it given up for later goals"


def _share(part: float) -> str:
    percent = 100 * part
    return f"{percent:.2g} %" if percent < 10 else f"{percent:,.0f} %"


def stopped(plan: Plan) -> Stopped:
    """Return why the search ended: the first goal that was cut short says it."""
    cut = (g.stopped for g in plan.goals if g.stopped is not Stopped.DONE)
    return next(cut, Stopped.DONE)


def status(plan: Plan) -> str:
    """Say in one sentence whether the plan can be used."""
    if plan.status is Status.NO_PLAN:
        return f"No plan is possible: {count(len(plan.shortages), 'shortage')} listed."
    if not plan.moves and not plan.left:
        return "Nothing has to move."
    words = count(len(plan.moves), "move")
    if plan.left:
        words += f" and {len(plan.left)} left over"
    if plan.status is Status.PROVEN:
        return f"{words}: proven best."
    return f"{words}: the best found; how near the best possible is told by goal."
