"""What must hold of any placement that is proven best, whatever the estate."""

from collections.abc import Sequence
from dataclasses import replace
from random import Random

from hypothesis import assume, given, settings
from hypothesis import strategies as st
from smallestate import estate, load, policy, pool, volume

from placer.candidates.table import candidates
from placer.estate import Aim, Array, Estate, Importance, Media, Pool, Volume
from placer.placement.place import Placement, place
from placer.plan import Goal
from placer.units import GIB, MILLI, MS, PPM

SECONDS = 10.0
PROVEN = 1e-6
POOLS = ("quay/fast", "quay/slow", "depot/fast", "depot/slow")
modest = settings(derandomize=True, max_examples=40, deadline=None)


def pools() -> st.SearchStrategy[list[Pool]]:
    """Return two flash and two spinning pools that some volumes fill or keep busy."""
    flash = {"read_time": 150, "reads_at_most": 400 * MILLI, "skew": PPM}
    spinning = {"seek": 4_000, "rpm": 10_000, "skew": PPM}

    def made(drawn: Sequence[tuple[int, int]]) -> list[Pool]:
        media = (Media.FLASH, Media.SPINNING) * 2
        rated = (flash, spinning) * 2
        return [
            pool(name, medium, size, drives=drives, **figures)
            for name, medium, figures, (size, drives) in zip(
                POOLS, media, rated, drawn, strict=True
            )
        ]

    small = st.tuples(st.integers(20, 200), st.integers(2, 6))
    large = st.tuples(st.integers(200, 800), st.integers(8, 24))
    return st.tuples(small, large, small, large).map(made)


@st.composite
def volumes(draw: st.DrawFn, number: int) -> Volume:
    reads, writes = draw(st.integers(0, 300)), draw(st.integers(0, 60))
    hours = [load(reads, writes), load(reads // 3, 2 * writes)]
    drawn = volume(f"v{number}", draw(st.sampled_from(POOLS)), 1, *hours)
    size = draw(st.integers(5, 120)) * GIB
    return replace(
        drawn,
        provisioned=size,
        occupied=size,
        importance=draw(st.sampled_from(Importance)),
        response_limit=draw(st.sampled_from([0, 0, 1 * MS, 6 * MS, 12 * MS])),
    )


@st.composite
def estates(draw: st.DrawFn) -> Estate:
    count = draw(st.integers(2, 8))
    requests = draw(st.sampled_from([0, 400, 1_000])) * MILLI
    return estate(
        [draw(volumes(number)) for number in range(count)],
        draw(pools()),
        policy(draw(st.sampled_from(Aim)), relief_given_up=0),
        arrays=[
            Array(name=name, reads_at_most=requests, writes_at_most=requests)
            for name in ("quay", "depot")
        ],
    )


def goals(whole: Estate) -> tuple[Goal, ...] | None:
    found = place(candidates(whole), SECONDS)
    return found.goals if isinstance(found, Placement) else None


def no_worse(after: Sequence[Goal], before: Sequence[Goal]) -> bool:
    """Return whether goals are no worse in their order: the first that differs counts.

    What is not proven may be anywhere up to its bound.
    """
    for new, old in zip(after, before, strict=True):
        assert new.name == old.name
        sign = -1 if new.name == "relief" else 1
        spare = PROVEN * max(1.0, abs(old.reached))
        if sign * new.bound > sign * old.reached + spare:
            return False
        if sign * new.reached < sign * old.reached - spare or new.gap > PROVEN:
            return True
    return True


@modest
@given(estates(), st.sampled_from(POOLS), st.integers(1, 500))
def test_more_room_never_makes_the_goals_worse(
    whole: Estate, larger: str, more: int
) -> None:
    before = goals(whole)
    assume(before is not None)
    grown = tuple(
        replace(p, usable=p.usable + more * GIB) if p.id == larger else p
        for p in whole.pools
    )
    after = goals(replace(whole, pools=grown))
    assert after is not None
    assert before is not None
    assert no_worse(after, before)


@modest
@given(estates(), st.integers(700_001, PPM))
def test_higher_ceilings_of_controllers_never_make_the_goals_worse(
    whole: Estate, ceiling: int
) -> None:
    before = goals(whole)
    assume(before is not None)
    raised = tuple(replace(a, controller_ceiling=ceiling) for a in whole.arrays)
    after = goals(replace(whole, arrays=raised))
    assert after is not None
    assert before is not None
    assert no_worse(after, before)


@modest
@given(estates(), st.integers(1, 300))
def test_a_volume_that_must_stay_never_makes_the_goals_better(
    whole: Estate, number: int
) -> None:
    """A volume that must stay takes choices away."""
    after = goals(whole)
    stuck = number % len(whole.volumes)
    held = tuple(replace(v, stays=row == stuck) for row, v in enumerate(whole.volumes))
    before = goals(replace(whole, volumes=held))
    assume(before is not None)
    assert after is not None
    assert before is not None
    assert no_worse(after, before)


@modest
@given(estates(), st.randoms(use_true_random=False))
def test_the_order_of_volumes_and_pools_does_not_matter(
    whole: Estate, random: Random
) -> None:
    shuffled = replace(
        whole,
        volumes=tuple(random.sample(whole.volumes, len(whole.volumes))),
        pools=tuple(random.sample(whole.pools, len(whole.pools))),
    )
    assert_same(goals(whole), goals(shuffled))


@modest
@given(estates())
def test_names_do_not_matter(whole: Estate) -> None:
    """Names that sort the other way round give the same goals."""
    names = {array.name: f"z{9 - i}" for i, array in enumerate(whole.arrays)}
    pool_names = {"fast": "b", "slow": "a"}
    count = len(whole.volumes)
    renamed = replace(
        whole,
        arrays=tuple(replace(a, name=names[a.name]) for a in whole.arrays),
        pools=tuple(
            replace(p, array=names[p.array], name=pool_names[p.name])
            for p in whole.pools
        ),
        volumes=tuple(
            replace(
                v,
                array=names[v.array],
                pool=pool_names[v.pool],
                name=f"x{count - number:02}",
            )
            for number, v in enumerate(whole.volumes)
        ),
    )
    assert_same(goals(whole), goals(renamed))


def assert_same(first: Sequence[Goal] | None, second: Sequence[Goal] | None) -> None:
    assert (first is None) == (second is None)
    if first is not None and second is not None:
        assert no_worse(first, second)
        assert no_worse(second, first)


def test_most_of_the_estates_have_a_plan_and_a_gain() -> None:
    """The properties would prove little on estates that cannot or need not change."""
    kinds: list[str] = []

    @modest
    @given(estates())
    def look(whole: Estate) -> None:
        found = goals(whole)
        if found is None:
            kinds.append("none")
        elif any(goal.name == "effort" and goal.value for goal in found):
            kinds.append("moves")
        else:
            kinds.append("stays")

    look()
    assert kinds.count("moves") > len(kinds) / 3
    assert kinds.count("none") < len(kinds) / 2
