"""Which reads never reach a drive, on cases worked by hand."""

from fractions import Fraction

import pytest

from placer.audit.caches import Caches
from placer.estate import Array, Estate, Policy, Volume
from placer.units import GIB

SIZES = {"small": 32, "large": 64, "odd": 21, "unknown": 0, "strange": 0}


def caches() -> Caches:
    """Return arrays with caches of some sizes [GiB], two of them not known."""
    arrays = tuple(Array(name=name, cache=size * GIB) for name, size in SIZES.items())
    return Caches(
        Estate(
            name="e",
            digest="",
            hours=(),
            volumes=(),
            pools=(),
            arrays=arrays,
            policy=Policy(start=0, earliest=0),
        )
    )


def at(home: str, hits: int = 400_000) -> Volume:
    """Return a volume of which 40 % of the reads hit at home."""
    return Volume(
        array=home,
        name="v",
        pool="p",
        provisioned=0,
        occupied=0,
        thin=False,
        load=(),
        read_hits=hits,
    )


@pytest.mark.parametrize(
    ("home", "array", "percent"),
    [
        ("small", "small", 40),
        ("small", "large", 40),
        ("large", "small", 20),
        ("large", "odd", Fraction(105, 8)),
        ("odd", "small", 40),
        ("small", "odd", Fraction(105, 4)),
    ],
)
def test_a_smaller_cache_keeps_its_part_and_a_larger_one_adds_none(
    home: str, array: str, percent: Fraction | int
) -> None:
    """40 % with caches of 32 and 64 GiB: 40 % one way, 20 % the other."""
    assert caches().hits(at(home), array) == Fraction(percent) / 100


@pytest.mark.parametrize(
    ("home", "array", "percent"),
    [
        ("unknown", "unknown", 40),
        ("unknown", "large", 0),
        ("large", "unknown", 0),
        ("unknown", "strange", 0),
    ],
)
def test_nothing_hits_elsewhere_where_a_cache_is_unknown(
    home: str, array: str, percent: int
) -> None:
    assert caches().hits(at(home), array) == Fraction(percent, 100)


@pytest.mark.parametrize("array", SIZES)
def test_hits_and_misses_are_whole_parts_and_make_up_all_reads(array: str) -> None:
    cached = caches()
    volume = at("large", 333_333)
    missed = Fraction(cached.misses(volume, array), cached.whole)
    assert missed + cached.hits(volume, array) == 1
    assert cached.misses(at("large", 1_000_000), "large") == 0
    assert cached.misses(at("large", 0), array) == cached.whole
