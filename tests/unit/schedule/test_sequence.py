"""The search for an order in which room and load let every unit go."""

import numpy as np
from smallestate import estate, pool, volume

from placer.candidates.table import candidates
from placer.estate import Estate, Media
from placer.plan import Reason, Transfer
from placer.schedule.books import Books
from placer.schedule.sequence import sequence
from placer.schedule.unit import units

RING = {"v": ("c", "a"), "w": ("a", "b"), "x": ("b", "a")}
"""W and x trade places by the one free place of a, which v could take as well."""


def order(names: str, idle: int = 0) -> list[str]:
    """Return the order found for volumes of 1 GiB, those of the ring and idle ones.

    Idle ones go from a roomy pool to another.
    """
    ways = {name: RING[name] for name in names}
    ways |= {f"i{number:02}": ("d", "e") for number in range(idle)}
    rooms = {"a": 2, "b": 1, "c": 1, "d": 100, "e": 100}
    pools = [pool(f"a/{name}", Media.SPINNING, room) for name, room in rooms.items()]
    made = estate([volume(n, f"a/{home}", 1) for n, (home, _) in ways.items()], pools)
    return [list(ways)[number] for number in found(made, ways)]


def found(made: Estate, ways: dict[str, tuple[str, str]]) -> list[int]:
    table = candidates(made)
    books = Books(table, np.zeros(len(made.pools), dtype=np.int64))
    moving = [
        Transfer(
            id=name,
            volume=f"a/{name}",
            source=f"a/{home}",
            target=f"a/{target}",
            size=1,
            reason=Reason.MAKE_ROOM,
            group=number,
        )
        for number, (name, (home, target)) in enumerate(ways.items())
    ]
    return sequence(units(table, moving, books.levels, books.lanes))


def test_an_order_that_works_is_kept() -> None:
    assert order("xwv") == ["x", "w", "v"]


def test_a_first_step_into_a_dead_end_is_taken_back() -> None:
    assert order("vwx") == ["x", "w", "v"]


def test_those_who_harm_nobody_do_not_multiply_the_dead_ends() -> None:
    """Without that, 2 to the power of 30 states would lie before the way back."""
    names = order("vwx", idle=30)
    assert [name for name in names if name in RING] == ["x", "w", "v"]


def test_no_units_have_an_order_too() -> None:
    assert sequence([]) == []
