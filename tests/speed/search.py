"""Measures the placement's search on tight estates: ``python tests/speed/search.py``.

Arguments: volumes, pools, seconds, then seeds.  Prints the gap of each goal.
"""

import sys
import time

from estates import estate

from placer.candidates.table import candidates
from placer.placement.place import Placement, place


def measure(volumes: int, pools: int, seconds: float, seed: int) -> str:
    """Return one line of the table."""
    table = candidates(estate(volumes, pools, seed))
    begin = time.monotonic()
    found = place(table, seconds)
    took = time.monotonic() - begin
    if not isinstance(found, Placement):
        return f"{volumes:>7} {pools:>5} {seed:>4}  no plan found in {took:.1f} s"
    gaps = {goal.name: 100 * goal.gap for goal in found.goals}
    return (
        f"{volumes:>7} {pools:>5} {seed:>4} {gaps['relief']:>10.4f} "
        f"{gaps['effort']:>10.4f} {took:>7.1f}"
    )


def main() -> None:
    """Print the table."""
    volumes, pools, seconds = int(sys.argv[1]), int(sys.argv[2]), float(sys.argv[3])
    print("volumes pools seed  relief [%] effort [%]  time [s]")  # noqa: T201
    for seed in sys.argv[4:]:
        print(measure(volumes, pools, seconds, int(seed)), flush=True)  # noqa: T201


if __name__ == "__main__":
    main()
