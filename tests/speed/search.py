"""Measures the placement's search on tight estates: ``python tests/speed/search.py``.

Arguments: volumes, pools, seconds, share by which limits exceed the hidden placement's
use, then seeds.  Prints the gap of each goal.
"""

import sys
import time

from estates import estate

from placer.candidates.table import candidates
from placer.placement.place import Placement, place


def measure(size: tuple[int, int], seconds: float, spare: float, seed: int) -> str:
    """Return one line of the table."""
    volumes, pools = size
    table = candidates(estate(volumes, pools, seed, spare))
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
    size = int(sys.argv[1]), int(sys.argv[2])
    seconds, spare = float(sys.argv[3]), float(sys.argv[4])
    print("volumes pools seed  relief [%] effort [%]  time [s]")  # noqa: T201
    for seed in sys.argv[5:]:
        print(measure(size, seconds, spare, int(seed)), flush=True)  # noqa: T201


if __name__ == "__main__":
    main()
