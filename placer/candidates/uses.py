"""How much of every limit a placement uses, as people read it."""

from collections.abc import Iterable, Iterator

import numpy as np

from placer.candidates.block import Block, Floats, Ints
from placer.candidates.table import Candidates
from placer.physics.drives import busy_drives
from placer.plan import Moment, Use


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
            if _scale(candidates, block, owner, bought)
        ),
        *_hosts(candidates, places, moment),
    )


def limit_of(block: Block, owner: int, bought: Ints) -> float:
    """Return what an owner is allowed, with the steps bought in its own pool."""
    steps = [int(bought[p]) for p, o in enumerate(block.owner_of) if o == owner]
    return float(block.limits[owner, steps[0] if len(steps) == 1 else 0])


def _use(
    candidates: Candidates,
    block: Block,
    owner: int,
    used: Floats,
    bought: Ints,
    moment: Moment,
) -> Use:
    hour = int(used.argmax())
    scale = _scale(candidates, block, owner, bought)
    label = candidates.estate.hours[hour].label if block.hourly else ""
    return Use(
        where=block.owners[owner],
        limit=block.code,
        moment=moment,
        use=float(used[hour]) / scale,
        at_most=limit_of(block, owner, bought) / scale,
        unit="%" if block.code == "pool-busy" else block.unit,
        hour=label,
    )


def _scale(candidates: Candidates, block: Block, owner: int, bought: Ints) -> float:
    """Return the limit's own units in one of the report's; 0 without any drives."""
    if block.code != "pool-busy":
        return block.scale
    pool = int(np.flatnonzero(block.owner_of == owner)[0])
    return busy_drives(candidates.pools[pool], int(bought[pool])) / 100


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
