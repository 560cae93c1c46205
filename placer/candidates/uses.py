"""How much of every limit a placement uses, as people read it."""

from collections.abc import Iterable, Iterator

import numpy as np

from placer.candidates.block import Block, Floats, Ints
from placer.candidates.table import Candidates
from placer.plan import Moment, Use
from placer.units import PPM


def uses(
    candidates: Candidates,
    blocks: Iterable[Block],
    places: Ints,
    bought: Ints,
    moment: Moment,
) -> tuple[Use, ...]:
    """Return one use per pool or array and limit, at the hour that binds.

    Parameters
    ----------
    candidates
        The table of the estate.
    blocks
        Limits at the date of the moment.
    places, bought
        (volumes,) pools and (pools,) steps of the placement.
    moment
        What the placement is.
    """
    return (
        *(
            _use(candidates, block, owner, used, bought, moment)
            for block in blocks
            for owner, used in enumerate(block.use(places))
        ),
        *_hosts(candidates, places, moment),
    )


def limit_of(block: Block, owner: int, bought: Ints) -> float:
    """Return what an owner is allowed, with the steps bought in its own pool."""
    steps = [int(bought[p]) for p, o in enumerate(block.owner_of) if o == owner]
    return float(block.limits[owner, steps[0] if len(steps) == 1 else 0])


def over(block: Block, places: Ints, bought: Ints) -> Iterator[int]:
    """Yield the owners that a placement takes over their limit."""
    worst = block.use(places).max(axis=1)
    for owner in range(len(block.owners)):
        if worst[owner] > limit_of(block, owner, bought):
            yield owner


def in_percent(candidates: Candidates, block: Block, owner: int) -> float:
    """Return the ceiling [%] that a pool's busy limit stands for."""
    pool = int(np.flatnonzero(block.owner_of == owner)[0])
    return 100 * candidates.pools[pool].busy_ceiling / PPM


def _use(
    candidates: Candidates,
    block: Block,
    owner: int,
    used: Floats,
    bought: Ints,
    moment: Moment,
) -> Use:
    hour = int(used.argmax())
    limit, unit, scale = limit_of(block, owner, bought), block.unit, block.scale
    if block.code == "pool-busy":
        percent = in_percent(candidates, block, owner)
        unit, scale = "%", (limit or 1.0) / percent
    label = candidates.estate.hours[hour].label if block.hourly else ""
    return Use(
        where=block.owners[owner],
        limit=block.code,
        moment=moment,
        use=float(used[hour]) / scale,
        at_most=limit / scale,
        unit=unit,
        hour=label,
    )


def _hosts(candidates: Candidates, places: Ints, moment: Moment) -> Iterator[Use]:
    pools = candidates.pools
    for array in candidates.estate.arrays:
        if array.hosts_at_most:
            here = {
                volume.host
                for volume, pool in zip(candidates.volumes, places, strict=True)
                if volume.host and pools[pool].array == array.name
            }
            yield Use(
                where=array.name,
                limit="array-hosts",
                moment=moment,
                use=float(len(here)),
                at_most=float(array.hosts_at_most),
                unit="hosts",
            )
