"""Two hands, one answer: each response on each pool, told by the audit and the plan."""

import random
from dataclasses import replace

import numpy as np
import pytest
from oracle.tiny import estate

from placer.audit.case import Case
from placer.audit.response import Answers
from placer.candidates.table import candidates
from placer.estate import Estate, Load, Media, Pool, Volume
from placer.plan import Placed, Plan, Status


def varied(seed: int) -> Estate:
    """Return a tiny estate whose requests and drives are of many more kinds."""
    fleet, luck = estate(seed), random.Random(seed)
    volumes = tuple(_asking(luck, volume) for volume in fleet.volumes)
    pools = tuple(_built(luck, pool) for pool in fleet.pools)
    return replace(fleet, volumes=volumes, pools=pools)


def _asking(luck: random.Random, volume: Volume) -> Volume:
    return replace(
        volume,
        load=tuple(_load(luck) for _ in volume.load),
        random_reads=luck.randint(0, 1_000_000),
        read_hits=luck.choice([0, luck.randint(0, 1_000_000)]),
        large_share=luck.choice([0, luck.randint(1, 999_999)]),
        large_size=luck.choice([0, luck.randint(1, 2_000_000)]),
        response_measured=luck.choice([0, 0, 4_000]),
    )


def _load(luck: random.Random) -> Load:
    reads, writes = luck.choice([0, luck.randint(1, 400_000)]), luck.randint(1, 80_000)
    sizes = luck.randint(512, 500_000), luck.randint(512, 200_000)
    return Load(reads, writes, reads * sizes[0] // 1000, writes * sizes[1] // 1000)


def _built(luck: random.Random, pool: Pool) -> Pool:
    if pool.media is Media.FLASH:
        return replace(
            pool,
            in_place=luck.random() < 0.5,
            reads_at_most=luck.choice([0, pool.reads_at_most]),
            drive_rate=luck.choice([0, pool.drive_rate]),
        )
    return replace(
        pool,
        rpm=luck.choice([0, pool.rpm]),
        drive_rate=luck.choice([0, pool.drive_rate]),
        prefetch_unit=luck.choice([2**16, 2**20]),
    )


@pytest.mark.parametrize("seed", range(120))
def test_both_hands_tell_the_same_responses(seed: int) -> None:
    """Today, promised on every other pool, planned on any: to the microsecond."""
    fleet, luck = varied(seed), random.Random(seed)
    places = [luck.randrange(len(fleet.pools)) for _ in fleet.volumes]
    audit = Answers(Case(fleet, _plan(fleet, places)))
    other = candidates(fleet).responses
    planned = other.planned(
        np.array(places), np.zeros(len(fleet.pools), dtype=np.int64)
    )
    for at, volume in enumerate(fleet.volumes):
        assert audit.today(volume) == pytest.approx(other.today[at], abs=1)
        assert audit.planned(volume) == pytest.approx(planned[at], abs=1)
        for pool, promised in zip(fleet.pools, other.promised(at), strict=True):
            if pool.id != volume.home:
                assert audit.promised(volume, pool.id) == pytest.approx(promised, abs=1)


def _plan(fleet: Estate, places: list[int]) -> Plan:
    return Plan(
        inventory=fleet.name,
        digest=fleet.digest,
        version="",
        status=Status.WITHIN_GAP,
        placements=tuple(
            Placed(volume=volume.id, source=volume.home, target=fleet.pools[place].id)
            for volume, place in zip(fleet.volumes, places, strict=True)
        ),
    )
