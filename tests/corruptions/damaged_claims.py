"""Damages that the rules of trust must find."""

from dataclasses import replace

from corruptions.damage import (
    both,
    damage,
    estate,
    goal,
    placed,
    plan,
    policy,
    pool,
    use,
)
from corruptions.sailing import PLAN
from placer.estate import Aim, Control
from placer.plan import Bought, Moment, Reason
from placer.units import GIB, MILLI

GONE = tuple(u for u in PLAN.uses if (u.where, u.limit) != ("new", "controller-busy"))
OF_PIPES = tuple(replace(u, unit="MB") if u.unit == "TB" else u for u in PLAN.uses)

LOWERED = tuple(
    replace(u, at_most=180.0) if (u.where, u.limit) == ("new/spin", "pool-room") else u
    for u in PLAN.uses
)
NEAREST = (*PLAN.uses, replace(PLAN.uses[0], moment=Moment.NEAREST))

DAMAGES = (
    damage("digest", "another inventory", estate(digest="d2")),
    damage("digest", "none named", plan(digest="")),
    damage("control", "nine volumes", estate(controls=(Control("", 9, None, None),))),
    damage(
        "control",
        "0.6 % more provisioned",
        estate(controls=(Control("inland", None, 503 * GIB, None),)),
    ),
    damage(
        "control",
        "0.6 % fewer requests",
        estate(controls=(Control("", None, None, 1_267 * MILLI),)),
    ),
    damage(
        "control", "no such array", estate(controls=(Control("pier", 1, None, None),))
    ),
    damage(
        "claim-goals",
        "effort too small",
        goal("effort", value=769, reached=769, bound=769),
    ),
    damage("claim-goals", "relief in another unit", goal("relief", unit="s")),
    damage("claim-goals", "a goal is not stated", plan(goals=PLAN.goals[1:])),
    damage(
        "claim-goals",
        "solved in another order",
        policy(aim=Aim.LEAST_CHANGE),
        "claim-bound",
    ),
    damage(
        "claim-goals",
        "the step is priced low",
        plan(bought=(Bought("new/flash", 1, 1),)),
    ),
    damage("claim-bound", "money below its bound", goal("money", bound=50_001.0)),
    damage("claim-bound", "relief above its bound", goal("relief", bound=15_750)),
    damage("claim-bound", "more than was reached", goal("relief", reached=15_600)),
    damage("claim-uses", "called nearest in a plan", plan(uses=NEAREST)),
    damage("claim-bound", "a gap of 0.1 % is no proof", goal("effort", bound=769.2)),
    damage(
        "claim-bound",
        "6 % of relief spent",
        goal("relief", reached=16_717, bound=16_717),
    ),
    damage(
        "claim-uses", "0.1 % low", use("old/spin", "pool-busy", "planned", use=23.97)
    ),
    damage(
        "claim-uses", "a higher limit", use("new", "array-hosts", "today", at_most=5)
    ),
    damage(
        "claim-uses",
        "another hour",
        use("old", "controller-busy", "today", hour="02:00"),
    ),
    damage("claim-uses", "in another unit", plan(uses=OF_PIPES)),
    damage("claim-uses", "left out", plan(uses=GONE)),
    damage(
        "claim-uses",
        "181 GiB of 180, said truly, is no plan",
        both(pool("new/spin", fill_ceiling=180_000), plan(uses=LOWERED)),
        "pool-room",
    ),
    damage("claim-uses", "stated twice", plan(uses=(*PLAN.uses, PLAN.uses[0]))),
    damage(
        "claim-responses",
        "today is 2 % better",
        placed("old/tickets-1", response_today=12_729),
    ),
    damage(
        "claim-responses",
        "planned at the ceiling's response",
        placed("old/tickets-2", response_planned=1_849),
    ),
    damage(
        "claim-responses",
        "1 µs of nothing known",
        placed("old/relics", response_today=1),
    ),
    damage(
        "claim-responses", "1 µs off a limit", placed("new/books", response_limit=4_001)
    ),
    damage(
        "claim-responses",
        "known on a black box",
        placed("old/mail", response_planned=900),
    ),
    damage(
        "claim-responses", "another limit", placed("new/books", response_limit=5_000)
    ),
    damage(
        "claim-reasons", "no limit is missed", placed("old/mail", reason=Reason.LIMIT)
    ),
    damage("claim-reasons", "logs lose", placed("new/logs", reason=Reason.RELIEF)),
    damage(
        "claim-reasons", "the attic is well", placed("old/relics", reason=Reason.CURE)
    ),
    damage(
        "claim-reasons",
        "nothing saved where no step is bought",
        plan(bought=(Bought("new/flash", 0, 0),)),
        "claim-goals",
        "claim-uses",
        "claim-responses",
    ),
    damage(
        "claim-reasons", "no reason given", placed("old/relics", reason=Reason.STAYS)
    ),
    damage(
        "claim-reasons", "a reason to stay", placed("new/books", reason=Reason.RELIEF)
    ),
)
