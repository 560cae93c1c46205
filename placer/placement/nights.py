"""What the windows can carry, as a necessary condition on the placement.

The share ``nights kept free`` is held back, for copies do not fill windows to the last
minute.
"""

from collections.abc import Callable, Iterator
from fractions import Fraction

from placer.candidates.table import Candidates
from placer.estate import Array, Estate, Window
from placer.units import PPM

Bytes = Callable[[int, int], float]
Capacity = tuple[str, str, Bytes, float]


def capacities(candidates: Candidates) -> Iterator[Capacity]:
    """Yield rows as (rule, owner, bytes of a volume in a pool, bytes at most)."""
    estate = candidates.estate
    for array in estate.arrays:
        for code, limit in (
            ("nights-in", array.copies_in),
            ("nights-out", array.copies_out),
        ):
            carried = _carried(estate, array, limit)
            if carried is not None:
                yield code, array.name, _bytes(candidates, code, array.name), carried
    if estate.windows and all(window.rate for window in estate.windows):
        total = sum(_seconds(estate, w) * w.rate for w in estate.windows)
        yield (
            "nights-rate",
            "",
            _bytes(candidates, "nights-rate", ""),
            _kept(estate, total),
        )


def cutovers(estate: Estate) -> int | None:
    """Return the cutovers that the nights allow, None where one has no limit."""
    nights = {w.night: w for w in estate.windows if _seconds(estate, w)}
    if not all(window.cutovers for window in nights.values()):
        return None
    return int(_kept(estate, sum(window.cutovers for window in nights.values())))


def _bytes(candidates: Candidates, code: str, array: str) -> Bytes:
    """Return the function that tells what a place adds to one of the rows."""
    pools, home, copied = candidates.pools, candidates.home, candidates.copied

    def moved(volume: int, pool: int) -> float:
        ends = {
            "nights-in": pools[pool].array,
            "nights-out": pools[home[volume]].array,
            "nights-rate": array,
        }
        counts = pool != home[volume] and ends[code] == array
        return float(copied[volume]) if counts else 0.0

    return moved


def _carried(estate: Estate, array: Array, together: int) -> float | None:
    """Return the bytes all windows carry for one direction of an array."""
    limits = [together, array.copies_at_once * array.one_copy]
    known = [limit for limit in limits if limit]
    if not known:
        return None
    total = sum(
        _seconds(estate, window) * min([*known, *filter(None, [window.rate])])
        for window in estate.windows
        if not window.arrays or array.name in window.arrays
    )
    return _kept(estate, total)


def _seconds(estate: Estate, window: Window) -> int:
    """Return the seconds of a window between change lead and finish."""
    policy = estate.policy
    end = min(window.end, policy.finish_by) if policy.finish_by else window.end
    return max(0, end - max(window.start, policy.earliest)) * 60


def _kept(estate: Estate, total: int) -> float:
    return float(Fraction(total * (PPM - estate.policy.nights_kept_free), PPM))
