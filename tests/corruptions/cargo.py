"""The volumes of the ferry company."""

from placer.estate import Importance, Load, Volume
from placer.units import GIB, MILLI


def load(reads: int, writes: int) -> Load:
    """Return requests of 10 kB each [1/s]."""
    return Load(reads * MILLI, writes * MILLI, reads * 10_000, writes * 10_000)


VOLUMES = (
    Volume(
        array="old",
        name="tickets-1",
        pool="spin",
        provisioned=200 * GIB,
        occupied=100 * GIB,
        thin=True,
        host="quay",
        applications=("tickets",),
        load=(load(20, 5), load(100, 25)),
        response_limit=5_000,
        importance=Importance.VITAL,
    ),
    Volume(
        array="old",
        name="tickets-2",
        pool="spin",
        provisioned=100 * GIB,
        occupied=80 * GIB,
        thin=False,
        host="quay",
        applications=("tickets",),
        load=(load(0, 0), load(100, 0)),
    ),
    Volume(
        array="old",
        name="charts",
        pool="spin",
        provisioned=400 * GIB,
        occupied=350 * GIB,
        thin=False,
        host="office",
        load=(load(0, 0), load(100, 25)),
        response_limit=9_000,
        load_growth=200_000,
        stays=True,
    ),
    Volume(
        array="old",
        name="mail",
        pool="spin",
        provisioned=300 * GIB,
        occupied=300 * GIB,
        thin=False,
        host="depot",
        applications=("mail",),
        load=(load(50, 0), load(50, 0)),
    ),
    Volume(
        array="old",
        name="relics",
        pool="attic",
        provisioned=50 * GIB,
        occupied=50 * GIB,
        thin=False,
        host="depot",
        load=(load(5, 0), load(5, 0)),
    ),
    Volume(
        array="new",
        name="books",
        pool="spin",
        provisioned=300 * GIB,
        occupied=100 * GIB,
        thin=True,
        host="office",
        load=(load(100, 50), load(100, 50)),
        response_limit=4_000,
        capacity_growth=210_000,
    ),
    Volume(
        array="new",
        name="logs",
        pool="flash",
        provisioned=60 * GIB,
        occupied=60 * GIB,
        thin=False,
        host="office",
        load=(load(10, 10), load(10, 10)),
        importance=Importance.LOW,
    ),
    Volume(
        array="inland",
        name="backup",
        pool="box",
        provisioned=500 * GIB,
        occupied=500 * GIB,
        thin=False,
        host="depot",
        load=(load(0, 200), load(0, 0)),
        response_measured=8_000,
    ),
)
