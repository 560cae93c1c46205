"""The values of the goals that a placement reaches."""

from collections.abc import Mapping
from fractions import Fraction
from math import ceil

from placer.audit.case import Case
from placer.audit.demand import GRAIN, busiest
from placer.audit.placement import spent
from placer.audit.response import Answers
from placer.estate import Aim, Estate, Volume
from placer.plan import Plan
from placer.units import GIB, MILLI, MS, PPM

UNITS = {"missed": "steps", "money": "hundredths", "relief": "ms/s", "effort": "GiB"}
MOST_STEPS = 10
ORDER = {
    Aim.BEST_USE: ("missed", "money", "relief", "effort"),
    Aim.LEAST_CHANGE: ("missed", "money", "effort", "relief"),
}


def goal_values(estate: Estate, plan: Plan) -> Mapping[str, Fraction]:
    """Return the value of each goal, in the order in which goals are solved."""
    case = Case(estate, plan)
    values = values_of(case, Answers(case))
    return {name: values[name] for name in ORDER[estate.policy.aim]}


def values_of(case: Case, answers: Answers) -> dict[str, Fraction]:
    """Return missed [steps], money [hundredths], relief [ms/s] and effort [GiB]."""
    places = [(volume, case.targets[volume.id]) for volume in case.estate.volumes]
    missed = sum(
        volume.importance.weight * missed_steps(case, answers, volume, pool)
        for volume, pool in places
    )
    relief = sum(weighted(case, answers, volume, pool) for volume, pool in places)
    return {
        "missed": Fraction(missed),
        "money": Fraction(spent(case)),
        "relief": Fraction(relief),
        "effort": effort(case),
    }


def missed_steps(case: Case, answers: Answers, volume: Volume, pool: str) -> int:
    """Return by how many steps of 10 % a volume misses its response limit."""
    if not volume.response_limit:
        return 0
    promised = answers.promised(volume, pool)
    allowed = 1 + Fraction(case.estate.policy.tolerance, PPM)
    over = Fraction(promised, volume.response_limit) - allowed
    return max(0, min(MOST_STEPS, ceil(over * 10)))


def gain(case: Case, answers: Answers, volume: Volume, pool: str) -> int:
    """Return the waiting saved per request [µs]: small gains are none, losses count."""
    today, promised = answers.today(volume), answers.promised(volume, pool)
    if pool == volume.home or not today or not promised:
        return 0
    saved = today - promised
    counts_from = Fraction(case.estate.policy.least_gain, PPM) * today
    return 0 if 0 <= saved < counts_from else saved


def weighted(case: Case, answers: Answers, volume: Volume, pool: str) -> Fraction:
    """Return what a volume adds to relief [ms/s]."""
    saved = gain(case, answers, volume, pool) * _asked(case, volume)
    return Fraction(volume.importance.weight * saved, GRAIN * MILLI * MS)


def _asked(case: Case, volume: Volume) -> int:
    """Return what a volume asks for today in its busiest hour [1/1000 s, GRAIN]."""
    first = 4 * busiest(volume)
    return sum(case.today.loads[volume.id][first : first + 2])


def effort(case: Case) -> Fraction:
    """Return the bytes moved and what the cutovers count as [GiB]."""
    cutovers = len(case.movers) * case.estate.policy.cutover_counts_as
    copied = sum(case.nights.sizes[volume.id] for volume in case.movers)
    return Fraction(copied + cutovers, GIB)
