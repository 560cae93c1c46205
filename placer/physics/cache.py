"""Read hits: what of a volume's hits an array with another cache keeps."""

from placer.estate import Array
from placer.units import PPM


def kept_hits(read_hits: int, home: Array, target: Array) -> float:
    """Return the share of reads [1] that hit the target's cache.

    Hits shrink with the cache and never grow with it; where either cache is unknown
    nothing is promised.

    Parameters
    ----------
    read_hits
        [ppm] share of reads that hit the cache at home.
    home, target
        The arrays; on its own array a volume keeps its hits.
    """
    if target.name == home.name:
        return read_hits / PPM
    if not home.cache or not target.cache:
        return 0.0
    return read_hits / PPM * min(1.0, target.cache / home.cache)
