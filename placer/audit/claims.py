"""Whether what the plan says of itself is so."""

from collections.abc import Iterator
from fractions import Fraction
from math import isclose

from placer.audit import words
from placer.audit.case import Case
from placer.audit.goals import ORDER, UNITS, gain, missed_steps, values_of
from placer.audit.limits import CODES, Reading, Scene, readings
from placer.audit.placement import breach, spent
from placer.audit.response import Answers, answers_of
from placer.estate import Volume
from placer.plan import Goal, Moment, Placed, Reason, Status, Use
from placer.units import PPM

CLAIM = 1e-6
ANSWER = 0.01
GAP = 1e-4


def differs(stated: float, right: Fraction) -> bool:
    """Whether a stated figure is off by more than a millionth of the right one."""
    return not isclose(stated, right, rel_tol=CLAIM, abs_tol=1e-9)


def goals(case: Case) -> Iterator[str]:
    """Check that the goals stand in order with the values the placement gives."""
    if not case.plan.placements:
        return
    order = ORDER[case.estate.policy.aim]
    stated = tuple(goal.name for goal in case.plan.goals)
    if stated != order:
        yield f"the plan states the goals {stated}, solved in order are {order}"
    values = values_of(case, answers_of(case))
    for goal in case.plan.goals:
        right = values.get(goal.name)
        if right is None:
            continue
        if differs(goal.value, right) or goal.unit != UNITS[goal.name]:
            said = words.figure(goal.value, goal.unit)
            yield f"{goal.name} is {words.figure(right, UNITS[goal.name])}, not {said}"
    priced = sum(row.price for row in case.plan.bought)
    if priced != spent(case):
        right_price, wrong = f"{spent(case) / 100:,.2f}", f"{priced / 100:,.2f}"
        yield f"the steps bought cost {right_price}, the plan prices them {wrong}"


def bound(case: Case) -> Iterator[str]:
    """Check that what was reached keeps its bound, and the plan what was reached."""
    for goal in case.plan.goals:
        stated, found, best = (
            words.figure(part, goal.unit)
            for part in (goal.value, goal.reached, goal.bound)
        )
        sign = -1 if goal.name == "relief" else 1
        near = CLAIM * max(abs(goal.reached), 1)
        if sign * (goal.bound - goal.reached) > near:
            yield f"{goal.name} reached {found}, better than its bound {best}"
        worse = sign * (goal.value - goal.reached)
        if worse < -near:
            yield f"{goal.name} is {stated}, better than the {found} reached"
        if worse > near + _given_up(case, goal):
            yield f"{goal.name} is {stated}, more was given up of {found} than allowed"
        if case.plan.status is Status.PROVEN and goal.gap > GAP:
            yield f"{goal.name} could be {best}, so nothing is proven best"


def _given_up(case: Case, goal: Goal) -> float:
    """Return the relief that may be spent on fewer moves where effort comes after."""
    order = ORDER[case.estate.policy.aim]
    if goal.name != "relief" or order[-1] == "relief":
        return 0.0
    return abs(goal.reached) * case.estate.policy.relief_given_up / PPM


def uses(case: Case) -> Iterator[str]:
    """Check that uses are stated, right, and none over its limit is called planned.

    What belongs to a shortage ("nearest") claims nothing.
    """
    right = _right_uses(case)
    for use in case.plan.uses:
        if use.moment is Moment.NEAREST and not case.plan.placements:
            continue
        row = right.pop((use.where, use.limit, use.moment), None)
        if row is None:
            yield f"{use.where} has no {use.limit} {use.moment}, or it is stated twice"
        else:
            yield from _checked(case, use, row)
    if case.plan.placements:
        for (where, limit, moment), row in right.items():
            if row.use:
                yield f"the {limit} of {where} {moment} is not stated"


def _right_uses(case: Case) -> dict[tuple[str, str, Moment], Reading]:
    scenes = {Moment.TODAY: Scene(case, case.today, case.homes, {})}
    if case.plan.placements:
        planned = Scene(case, case.horizon, case.targets, case.steps)
        scenes[Moment.PLANNED] = planned
    return {
        (row.where, code, moment): row
        for moment, scene in scenes.items()
        for code in CODES
        for row in readings(scene, code)
    }


def _checked(case: Case, use: Use, row: Reading) -> Iterator[str]:
    what = f"the {use.limit} of {use.where} {use.moment}"
    stated = words.figure(use.use, use.unit), words.figure(use.at_most, use.unit)
    right = words.figure(row.use, row.unit), words.figure(row.at_most, row.unit)
    wrong = differs(use.use, row.use) or differs(use.at_most, row.at_most)
    if wrong or use.unit != row.unit:
        yield f"{what} is {right[0]} of {right[1]}, not {stated[0]} of {stated[1]}"
    elif not _binds(case, use, row):
        yield f"{what} does not bind in '{use.hour}'"
    if use.moment is Moment.PLANNED and use.use > use.at_most * (1 + CLAIM):
        yield f"{what} is planned at {stated[0]}, over its limit {stated[1]}"


def _binds(case: Case, use: Use, row: Reading) -> bool:
    if not row.hourly or not row.use:
        return not use.hour or row.hourly
    enough = row.use * (1 - CLAIM)
    labels = (hour.label for hour in case.estate.hours)
    return use.hour in {
        label
        for label, share in zip(labels, row.shares, strict=True)
        if share >= enough
    }


def responses(case: Case) -> Iterator[str]:
    """Check that the responses stated are right, and the unknown are not stated."""
    answers = answers_of(case)
    for name, placed in case.placed.items():
        volume = case.volumes[name]
        right = {
            "today": (placed.response_today, answers.today(volume)),
            "planned": (placed.response_planned, answers.planned(volume)),
        }
        for what, (stated, true) in right.items():
            if not isclose(stated, true, rel_tol=ANSWER, abs_tol=min(1, true)):
                said, meant = words.wait(stated), words.wait(true)
                yield f"the response {what} of {name} is {meant}, not {said}"
        if placed.response_limit != volume.response_limit:
            yield f"the response limit of {name} is {words.wait(volume.response_limit)}"


def reasons(case: Case) -> Iterator[str]:
    """Check that every move has a reason, and the reason holds."""
    answers = answers_of(case)
    sore = _Sore(case)
    for name, placed in case.placed.items():
        volume = case.volumes[name]
        moves = placed.target != volume.home
        if not moves and placed.reason is not Reason.STAYS:
            yield f"{name} stays but is given the reason {placed.reason}"
        elif moves and not _holds(case, answers, sore, placed):
            given = placed.reason or "no reason"
            yield f"{name} moves to {placed.target} for {given}, which does not hold"


def _holds(case: Case, answers: Answers, sore: "_Sore", placed: Placed) -> bool:
    volume, target = case.volumes[placed.volume], placed.target
    if placed.reason is Reason.LIMIT:
        staying = missed_steps(case, answers, volume, volume.home)
        return missed_steps(case, answers, volume, target) < staying
    if placed.reason is Reason.RELIEF:
        return gain(case, answers, volume, target) > 0
    if placed.reason is Reason.CURE:
        return sore.home(volume)
    if placed.reason is Reason.SAVE:
        return any(steps > 0 for steps in case.steps.values())
    return placed.reason is Reason.MAKE_ROOM


class _Sore:
    """What is over its limit, now or at the horizon, if nothing moves."""

    def __init__(self, case: Case) -> None:
        scenes = [
            Scene(case, demand, case.homes, {}) for demand in (case.today, case.horizon)
        ]
        self.places = {
            row.where
            for scene in scenes
            for code in CODES
            for row in readings(scene, code)
            if row.over
        }
        self.volumes = {
            name
            for wish in case.estate.rules
            if breach(case, wish, case.homes)
            for name in wish.volumes
        }

    def home(self, volume: Volume) -> bool:
        """Whether the volume, its pool or its array has something to be cured."""
        return volume.id in self.volumes or bool(
            self.places & {volume.home, volume.array}
        )
