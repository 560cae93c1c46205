"""Programs in which one limit acts that adds up over volumes, or counts hosts."""

from collections.abc import Callable
from dataclasses import replace

from golden.case import FAST, NEAR, SLOW, Case
from smallestate import estate, load, volume

from placer.estate import Array, Load
from placer.units import MB, MILLI, PPM, TB


def one_place() -> Case:
    """Each volume is in exactly one pool."""
    whole = estate(
        [volume("a", "depot/slow", 0), volume("b", "quay/fast", 0)], [FAST, SLOW]
    )
    return (
        whole,
        """
        one-place 0: 1 a@quay/fast + 1 a@depot/slow = 1
        one-place 1: 1 b@quay/fast + 1 b@depot/slow = 1
        pool-room quay/fast #0: 0 a@quay/fast <= 500
        pool-room depot/slow #0: 0 a@depot/slow <= 500
    """,
    )


def pool_room() -> Case:
    """What lands in a pool, after its reduction, is within ceiling and least free."""
    # 80 % of 500 GiB are 400, 500 less 50 are 450: 400 counts.  100 and 200 GiB land
    # as 50 and 100 at 2:1.
    fast = replace(FAST, fill_ceiling=800_000, least_free=50 * 2**30, reduction=2 * PPM)
    whole = estate(
        [volume("a", "depot/slow", 100), volume("b", "depot/slow", 200)], [fast, SLOW]
    )
    return (
        whole,
        """
        one-place 0: 1 a@quay/fast + 1 a@depot/slow = 1
        one-place 1: 1 b@quay/fast + 1 b@depot/slow = 1
        pool-room quay/fast #0: 50 a@quay/fast + 100 b@quay/fast <= 400
        pool-room depot/slow #0: 100 a@depot/slow + 200 b@depot/slow <= 500
    """,
    )


def least_free() -> Case:
    """Where least free leaves less than the fill ceiling, it is what counts."""
    # 80 % of 500 GiB are 400, 500 less 150 are 350.
    fast = replace(FAST, fill_ceiling=800_000, least_free=150 * 2**30)
    whole = estate([volume("a", "quay/fast", 50)], [fast])
    return (
        whole,
        """
        one-place 0: 1 a@quay/fast = 1
        pool-room quay/fast #0: 50 a@quay/fast <= 350
    """,
    )


def pool_thin() -> Case:
    """What is provisioned in a pool is within its ratio of usable."""
    # 1.5 x 500 GiB usable are 750; the volumes are empty and take no room.
    fast = replace(FAST, thin_at_most=1_500_000)
    empty = [
        replace(volume(name, "depot/slow", size), thin=True, occupied=0)
        for name, size in (("a", 150), ("b", 300))
    ]
    return (
        estate(empty, [fast, SLOW]),
        """
        one-place 0: 1 a@quay/fast + 1 a@depot/slow = 1
        one-place 1: 1 b@quay/fast + 1 b@depot/slow = 1
        pool-room quay/fast #0: 0 a@quay/fast <= 500
        pool-room depot/slow #0: 0 a@depot/slow <= 500
        pool-thin quay/fast #0: 150 a@quay/fast + 300 b@quay/fast <= 750
    """,
    )


def pool_busy_flash() -> Case:
    """In each hour a flash pool keeps no more drives busy than its ceiling."""
    # Mirrored: a write is two at the drives.  a at 09:00: 100 reads of 1000 and
    # 2 x 50 writes of 500 keep 0.3 drives busy, with skew 1.2 0.36; at 10:00 300 reads
    # 0.36.  b: 200 reads 0.24, then nothing.  70 % of 4 drives are 2.8; all values are
    # multiples of 0.12, so 2.8 is rounded down to 23 x 0.12 = 2.76.
    fast = replace(
        FAST,
        drives=4,
        parity=1,
        reads_at_most=1_000 * MILLI,
        writes_at_most=500 * MILLI,
    )
    whole = estate(
        [
            volume("a", "depot/slow", 0, load(100, 50, 0), load(300, 0, 0)),
            volume("b", "depot/slow", 0, load(200, 0, 0), load(0, 0, 0)),
        ],
        [fast, SLOW],
    )
    return (
        whole,
        """
        one-place 0: 1 a@quay/fast + 1 a@depot/slow = 1
        one-place 1: 1 b@quay/fast + 1 b@depot/slow = 1
        pool-room quay/fast #0: 0 a@quay/fast <= 500
        pool-room depot/slow #0: 0 a@depot/slow <= 500
        pool-busy quay/fast #0: 0.36 a@quay/fast + 0.24 b@quay/fast <= 2.76
        pool-busy quay/fast #1: 0.36 a@quay/fast <= 2.52
    """,
    )


def pool_busy_spinning() -> Case:
    """In each hour a spinning pool keeps no more drives busy than its ceiling."""
    # Seek 4 ms and half a turn at 15 000/min 2 ms: 6 ms each.  One parity in place: a
    # write is four at the drives.  100 reads and 10 writes: 140 x 6 ms = 0.84 drives.
    # 60 % of 7 drives are 4.2 = 5 x 0.84.
    slow = replace(
        SLOW,
        drives=7,
        data=6,
        parity=1,
        seek=4_000,
        rpm=15_000,
        skew=PPM,
        busy_ceiling=600_000,
    )
    whole = estate([volume("a", "depot/slow", 0, load(100, 10, 0))], [slow])
    return (
        whole,
        """
        one-place 0: 1 a@depot/slow = 1
        pool-room depot/slow #0: 0 a@depot/slow <= 500
        pool-busy depot/slow #0: 0.84 a@depot/slow <= 4.2
    """,
    )


def pool_wear() -> Case:
    """Writes over the life asked, with the copies in, are within the rating left."""
    # 2 drives x 1 TB x 1 a day x 365 days, a tenth used: 657 TB.  1 MB/s over 100 days
    # are 8.64 TB; a moves in: 100 GiB more = 0.1073741824 TB.  Nothing keeps the drives
    # busy, for no rate is stated: 70 % of 2 drives.
    fast = replace(
        FAST,
        drives=2,
        drive_size=TB,
        dwpd=PPM,
        warranty_days=365,
        wear_used=100_000,
        life_days=100,
        array_overhead=PPM,
    )
    writing = Load(0, 1_000 * MILLI, 0, MB)
    whole = estate(
        [
            volume("a", "depot/slow", 100, writing),
            volume("b", "quay/fast", 100, writing),
        ],
        [fast, SLOW],
    )
    return (
        whole,
        """
        one-place 0: 1 a@quay/fast + 1 a@depot/slow = 1
        one-place 1: 1 b@quay/fast + 1 b@depot/slow = 1
        pool-room quay/fast #0: 100 a@quay/fast + 100 b@quay/fast <= 500
        pool-room depot/slow #0: 100 a@depot/slow + 100 b@depot/slow <= 500
        pool-busy quay/fast #0: 0 a@quay/fast <= 1.4
        pool-wear quay/fast #0: 8.7473741824 a@quay/fast + 8.64 b@quay/fast <= 657
    """,
    )


def controller_busy() -> Case:
    """All pools of an array share the controllers that are left after failures."""
    # One controller of two is left: 1000 reads of 10 000, x 1.15, are 11.5 %; with
    # 500 writes of 5000 b asks 11.5 % too.  70 % hold six times 11.5 %, that is 69 %.
    quay = Array(name="quay", reads_at_most=10**7, writes_at_most=5 * 10**6)
    whole = estate(
        [
            volume("a", "depot/slow", 0, load(1_000)),
            volume("b", "quay/near", 0, load(0, 500)),
        ],
        [FAST, NEAR, SLOW],
        arrays=[quay, Array(name="depot")],
    )
    return (
        whole,
        """
        one-place 0: 1 a@quay/fast + 1 a@quay/near + 1 a@depot/slow = 1
        one-place 1: 1 b@quay/fast + 1 b@quay/near + 1 b@depot/slow = 1
        pool-room quay/fast #0: 0 a@quay/fast <= 500
        pool-room quay/near #0: 0 a@quay/near <= 500
        pool-room depot/slow #0: 0 a@depot/slow <= 500
        controller-busy quay #0: 11.5 a@quay/fast + 11.5 a@quay/near
            + 11.5 b@quay/fast + 11.5 b@quay/near <= 69
    """,
    )


def array_volumes() -> Case:
    """All volumes in an array, in whatever pool, are no more than it may hold."""
    quay = Array(name="quay", volumes_at_most=2)
    whole = estate(
        [volume("a", "quay/fast", 0), volume("b", "quay/near", 0)],
        [FAST, NEAR],
        arrays=[quay],
    )
    return (
        whole,
        """
        one-place 0: 1 a@quay/fast + 1 a@quay/near = 1
        one-place 1: 1 b@quay/fast + 1 b@quay/near = 1
        pool-room quay/fast #0: 0 a@quay/fast <= 500
        pool-room quay/near #0: 0 a@quay/near <= 500
        array-volumes quay #0: 1 a@quay/fast + 1 a@quay/near + 1 b@quay/fast
            + 1 b@quay/near <= 2
    """,
    )


def array_hosts() -> Case:
    """A host is on an array if one of its volumes is; those are at most so many."""
    quay = Array(name="quay", hosts_at_most=1)
    volumes = [volume("a", "depot/slow", 0), volume("b", "quay/fast", 0)]
    hosts = ("pilot", "crane")
    whole = estate(
        [replace(v, host=h) for v, h in zip(volumes, hosts, strict=True)],
        [FAST, NEAR, SLOW],
        arrays=[quay, Array(name="depot")],
    )
    return (
        whole,
        """
        one-place 0: 1 a@quay/fast + 1 a@quay/near + 1 a@depot/slow = 1
        one-place 1: 1 b@quay/fast + 1 b@quay/near + 1 b@depot/slow = 1
        pool-room quay/fast #0: 0 a@quay/fast <= 500
        pool-room quay/near #0: 0 a@quay/near <= 500
        pool-room depot/slow #0: 0 a@depot/slow <= 500
        array-hosts quay: 1 pilot@quay + 1 crane@quay <= 1
        array-hosts depot/a: 1 a@quay/fast + 1 a@quay/near - 1 pilot@quay <= 0
        array-hosts quay/b: 1 b@quay/fast + 1 b@quay/near - 1 crane@quay <= 0
    """,
    )


CASES: tuple[Callable[[], Case], ...] = (
    one_place,
    pool_room,
    least_free,
    pool_thin,
    pool_busy_flash,
    pool_busy_spinning,
    pool_wear,
    controller_busy,
    array_volumes,
    array_hosts,
)
