"""Programs in which the nights limit what moves."""

from collections.abc import Callable
from dataclasses import replace

from golden.case import FAST, NEAR, SLOW, Case
from smallestate import START, estate, volume, window

from placer.estate import Array, Estate
from placer.units import MB


def crossing(array: Array, rate: int = 0) -> Estate:
    """Return 100 GiB in the depot and 60 GiB on the quay, one night of 1 h."""
    night = replace(window(1, hours=1), rate=rate)
    return estate(
        [volume("a", "depot/slow", 100), volume("b", "quay/fast", 60)],
        [FAST, NEAR, SLOW],
        arrays=[array, Array(name="depot")],
        windows=(night,),
    )


ROOM_OF_PAIR = """
        one-place 0: 1 a@quay/fast + 1 a@quay/near + 1 a@depot/slow = 1
        one-place 1: 1 b@quay/fast + 1 b@quay/near + 1 b@depot/slow = 1
        pool-room quay/fast #0: 100 a@quay/fast + 60 b@quay/fast <= 500
        pool-room quay/near #0: 100 a@quay/near + 60 b@quay/near <= 500
        pool-room depot/slow #0: 100 a@depot/slow + 60 b@depot/slow <= 500
"""


def nights_in() -> Case:
    """Moves into the array, from without or within, are what the windows carry in."""
    # 100 MB/s for an hour less 20 % are 288 GB = 268.2 GiB; all moves are multiples of
    # 20 GiB, so 260.
    return (
        crossing(Array(name="quay", copies_in=100 * MB)),
        ROOM_OF_PAIR
        + """
        nights-in quay: 100 a@quay/fast + 100 a@quay/near + 60 b@quay/near <= 260
    """,
    )


def nights_out() -> Case:
    """What moves out of a pool of the array is what the windows carry out."""
    # As above, but 60 GiB is the only size that leaves: four of them are 240.
    return (
        crossing(Array(name="quay", copies_out=100 * MB)),
        ROOM_OF_PAIR
        + """
        nights-out quay: 60 b@quay/near + 60 b@depot/slow <= 240
    """,
    )


def nights_by_copies_at_once() -> Case:
    """Copies at once, each at its highest rate, limit both directions of an array."""
    # 2 copies at 50 MB/s, held down by 25 MB/s of the window: 72 GB = 67.06 GiB.
    quay = Array(name="quay", one_copy=50 * MB, copies_at_once=2)
    return (
        crossing(quay, rate=25 * MB),
        ROOM_OF_PAIR
        + """
        nights-in quay: 100 a@quay/fast + 100 a@quay/near + 60 b@quay/near <= 60
        nights-out quay: 60 b@quay/near + 60 b@depot/slow <= 60
        nights-rate: 100 a@quay/fast + 100 a@quay/near + 60 b@quay/near
            + 60 b@depot/slow <= 60
    """,
    )


def nights_rate() -> Case:
    """Everything that moves is what the windows carry together."""
    # The copies start half an hour late and end a quarter early: 15 minutes at
    # 400 MB/s less 20 % are 288 GB = 268.2 GiB, in steps of 20 GiB 260.
    whole = crossing(Array(name="quay"), rate=400 * MB)
    night = whole.windows[0]
    wishes = replace(
        whole.policy, earliest=night.start + 30, finish_by=night.end - 15, start=START
    )
    return (
        replace(whole, policy=wishes),
        ROOM_OF_PAIR
        + """
        nights-rate: 100 a@quay/fast + 100 a@quay/near + 60 b@quay/near
            + 60 b@depot/slow <= 260
    """,
    )


def nights_cutovers() -> Case:
    """Applications of which any volume moves are no more than the nights cut over."""
    # Three nights of two cutovers, 20 % kept free: 4.8, so 4.
    volumes = [volume(name, "depot/slow", 0) for name in "abc"]
    tickets = [replace(v, applications=("tickets",)) for v in volumes[:2]]
    nights = tuple(replace(window(day), cutovers=2) for day in (1, 2, 3))
    whole = estate([*tickets, volumes[2]], [FAST, SLOW], windows=nights)
    return (
        whole,
        """
        one-place 0: 1 a@quay/fast + 1 a@depot/slow = 1
        one-place 1: 1 b@quay/fast + 1 b@depot/slow = 1
        one-place 2: 1 c@quay/fast + 1 c@depot/slow = 1
        pool-room quay/fast #0: 0 a@quay/fast <= 500
        pool-room depot/slow #0: 0 a@depot/slow <= 500
        nights-cutovers: 1 a@quay/fast - 1 ?a+b <= 0
        nights-cutovers: 1 b@quay/fast - 1 ?a+b <= 0
        nights-cutovers: 1 c@quay/fast - 1 ?c <= 0
        nights-cutovers: 1 ?a+b + 1 ?c <= 4
    """,
    )


CASES: tuple[Callable[[], Case], ...] = (
    nights_in,
    nights_out,
    nights_by_copies_at_once,
    nights_rate,
    nights_cutovers,
)
