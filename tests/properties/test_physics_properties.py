"""What must hold of busy shares, whatever the loads, the drives and their number."""

from collections.abc import Sequence
from dataclasses import astuple, replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray
from smallestate import estate, load, pool, volume

from placer.candidates.worth import Responses
from placer.estate import Estate, Expansion, Load, Media, Pool, Tenant, Volume
from placer.units import GB, MB, MILLI, PPM

POOLS = ("quay/fast", "quay/slow", "depot/box")
SCHEMES = ((1, 0), (1, 1), (4, 1), (6, 2))
modest = settings(derandomize=True, max_examples=150, deadline=None)


@st.composite
def pools(draw: st.DrawFn, name: str) -> Pool:
    """Return a pool of flash, of spinning drives, or known by its requests alone."""
    data, parity = draw(st.sampled_from(SCHEMES))
    return pool(
        name,
        Media.FLASH if name == POOLS[0] else Media.SPINNING,
        1_000,
        drives=draw(st.integers(1, 60)),
        data=data,
        parity=parity,
        in_place=draw(st.booleans()),
        skew=draw(st.integers(PPM, 2 * PPM)),
        drive_rate=draw(st.sampled_from([0, 150 * MB, 2 * GB])),
        seek=draw(st.integers(500, 9_000)),
        rpm=draw(st.sampled_from([0, 7_200, 15_000])),
        reads_at_most=draw(st.integers(1, 100_000)) * MILLI,
        writes_at_most=draw(st.sampled_from([0, 20_000 * MILLI])),
        measured_factor=draw(st.integers(PPM // 2, 2 * PPM)),
        requests_at_most=5_000 * MILLI if name == POOLS[2] else 0,
    )


@st.composite
def volumes(draw: st.DrawFn, number: int) -> Volume:
    hours = [
        load(
            draw(st.integers(0, 900)),
            draw(st.integers(0, 300)),
            draw(st.integers(1, 512)),
        )
        for _ in range(2)
    ]
    drawn = volume(f"v{number}", draw(st.sampled_from(POOLS)), 1, *hours)
    return replace(
        drawn,
        random_reads=draw(st.integers(0, PPM)),
        read_hits=draw(st.integers(0, PPM)),
        tenant=draw(st.sampled_from(["", "ferries"])),
    )


@st.composite
def estates(draw: st.DrawFn) -> Estate:
    whole = estate(
        [draw(volumes(number)) for number in range(draw(st.integers(1, 6)))],
        [draw(pools(name)) for name in POOLS],
    )
    tenant = Tenant(
        name="ferries",
        requests_cap=draw(st.sampled_from([0, 400 * MILLI])),
        rate_cap=draw(st.sampled_from([0, MB])),
    )
    return replace(whole, tenants=(tenant,))


def shares(whole: Estate, steps: Sequence[int] = (0, 0, 0)) -> NDArray[np.float64]:
    """Return busy shares of pools and hours where volumes are today."""
    index = {each.id: i for i, each in enumerate(whole.pools)}
    places = np.array([index[v.home] for v in whole.volumes], dtype=np.int64)
    return Responses(whole).shares(places, np.array(steps, dtype=np.int64))


def times(whole: Estate, factor: int) -> Estate:
    """Return so many times the loads, caps, drives, and requests of a black box."""
    return replace(
        whole,
        volumes=tuple(
            replace(
                v, load=tuple(Load(*(factor * x for x in astuple(h))) for h in v.load)
            )
            for v in whole.volumes
        ),
        pools=tuple(
            replace(
                p,
                drives=factor * p.drives,
                requests_at_most=factor * p.requests_at_most,
            )
            for p in whole.pools
        ),
        tenants=tuple(
            replace(
                t, requests_cap=factor * t.requests_cap, rate_cap=factor * t.rate_cap
            )
            for t in whole.tenants
        ),
    )


@modest
@given(estates(), st.integers(2, 50))
def test_twice_the_load_on_twice_the_drives_keeps_them_as_busy(
    whole: Estate, factor: int
) -> None:
    """And so for any number of times; the caps of tenants grow with their loads."""
    assert shares(times(whole, factor)) == pytest.approx(shares(whole), rel=1e-9)


@modest
@given(estates(), st.integers(1, 100))
def test_more_drives_never_raise_a_share(whole: Estate, more: int) -> None:
    """A pool known by its requests alone does as many whatever its drives."""
    grown = tuple(replace(p, drives=p.drives + more) for p in whole.pools)
    after, before = shares(replace(whole, pools=grown)), shares(whole)
    assert (after <= before * (1 + 1e-12)).all()
    assert (after[:2] < before[:2])[before[:2] > 0].all()


@modest
@given(estates(), st.integers(1, 20))
def test_steps_that_are_bought_lower_every_share(whole: Estate, drives: int) -> None:
    """A step of as many drives as there are halves the share."""
    step = Expansion(drives=drives, price=1, at_most=3)
    for_sale = tuple(replace(p, expansion=step) for p in whole.pools)
    sold = replace(whole, pools=for_sale)
    none, one, two = (shares(sold, (k, k, k)) for k in range(3))
    assert (two[none > 0] < one[none > 0]).all()
    for i, each in enumerate(whole.pools):
        expected = none[i] * each.drives / (each.drives + drives)
        assert one[i] == pytest.approx(expected, rel=1e-9)


@modest
@given(estates(), st.integers(1, 6))
def test_shares_grow_as_the_loads_do(whole: Estate, factor: int) -> None:
    """Without caps, and whatever waits: busy time is the sum of service times."""
    free = replace(whole, tenants=())
    busier = replace(free, volumes=times(free, factor).volumes)
    assert shares(busier) == pytest.approx(factor * shares(free), rel=1e-9)


def test_the_estates_drawn_keep_every_kind_of_pool_busy() -> None:
    """The properties would prove little of idle drives."""
    seen: list[NDArray[np.bool_]] = []

    @modest
    @given(estates())
    def look(whole: Estate) -> None:
        seen.append(shares(whole).max(axis=1) > 0)

    look()
    assert (np.mean(seen, axis=0) > 0.3).all()
