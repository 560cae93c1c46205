"""Tiny random estates: few enough placements to try them all."""

import random

from placer.estate import (
    Aim,
    Array,
    Estate,
    Expansion,
    Hour,
    Importance,
    Level,
    Load,
    Media,
    Policy,
    Pool,
    Rule,
    RuleKind,
    Tenant,
    Volume,
    Window,
)
from placer.units import GIB, KIB

HOURS = (Hour(None, 9, "09:00"), Hour(None, 21, "21:00"))


def estate(seed: int) -> Estate:
    """Return an estate of three to five volumes in three pools on two arrays."""
    luck = random.Random(seed)
    pools = (
        _flash(luck),
        _spinning(luck, "old", "disks"),
        _spinning(luck, "new", "bulk"),
    )
    volumes = tuple(
        _volume(luck, number, pools) for number in range(luck.randint(3, 5))
    )
    return Estate(
        name=f"tiny {seed}",
        digest=str(seed),
        hours=HOURS,
        volumes=volumes,
        pools=pools,
        arrays=(_array(luck, "old"), _array(luck, "new")),
        rules=_rules(luck, volumes, pools),
        tenants=(_tenant(luck),),
        windows=(_window(),),
        policy=_policy(luck),
    )


def _volume(luck: random.Random, number: int, pools: tuple[Pool, ...]) -> Volume:
    home = luck.choice(pools)
    size = luck.randint(50, 400) * GIB
    return Volume(
        array=home.array,
        name=f"v{number}",
        pool=home.name,
        host=luck.choice(["h1", "h2", "h3"]),
        provisioned=size,
        occupied=size * luck.randint(5, 10) // 10,
        thin=luck.random() < 0.7,
        load=tuple(_load(luck) for _ in HOURS),
        response_measured=luck.choice([0, 0, 4000, 12000]),
        response_limit=luck.choice([0, 0, 1000, 5000, 9000]),
        importance=luck.choice(list(Importance)),
        capacity_growth=luck.choice([0, 200_000]),
        load_growth=luck.choice([0, 100_000]),
        stays=luck.random() < 0.05,
        tenant=luck.choice(["", "", "t"]),
        random_reads=luck.choice([1_000_000, 250_000]),
        read_hits=luck.choice([0, 0, 400_000]),
        snapshots=luck.choice([0, 0, 30 * GIB]),
        large_share=luck.choice([0, 0, 50_000, 300_000]),
        large_size=luck.choice([0, 4, 256, 1024]) * KIB,
    )


def _load(luck: random.Random) -> Load:
    reads, writes = luck.randint(0, 400_000), luck.randint(1, 80_000)
    return Load(reads, writes, reads * 8, writes * 16)


def _flash(luck: random.Random) -> Pool:
    steps = Expansion(drives=3, price=luck.choice([1, 7]) * 100_000, at_most=2)
    return Pool(
        array="new",
        name="flash",
        media=Media.FLASH,
        drives=6,
        data=2,
        parity=1,
        drive_size=luck.randint(60, 200) * GIB,
        reduction=luck.choice([1_000_000, 1_500_000]),
        read_time=150,
        write_time=50,
        reads_at_most=luck.choice([400_000, 80_000_000]),
        writes_at_most=30_000_000,
        drive_rate=10**9,
        dwpd=luck.choice([0, 2_000, 30_000]),
        warranty_days=1825,
        life_days=1825,
        one_drive_lost=luck.random() < 0.3,
        expansion=steps if luck.random() < 0.4 else None,
    )


def _spinning(luck: random.Random, array: str, name: str) -> Pool:
    return Pool(
        array=array,
        name=name,
        media=Media.SPINNING,
        drives=luck.choice([luck.randint(16, 60), luck.randint(5, 25)]),
        data=luck.choice([1, 4]),
        parity=1,
        usable=luck.randint(700, 2000) * GIB,
        thin_at_most=luck.choice([0, 0, 1_000_000]),
        rpm=luck.choice([7200, 10_000]),
        seek=luck.choice([4500, 8500]),
        measured_factor=luck.choice([1_000_000, 1_000_000, 1_300_000]),
        busy_measured=luck.choice([0, 960_000]),
        one_drive_lost=luck.random() < 0.3,
        drive_rate=150 * 10**6,
    )


def _array(luck: random.Random, name: str) -> Array:
    return Array(
        name=name,
        site=name,
        reads_at_most=luck.choice([0, 3_000_000]),
        writes_at_most=luck.choice([0, 2_000_000]),
        write_answer=500,
        read_hit_answer=200,
        cache=luck.choice([0, 64, 128]) * GIB,
        volumes_at_most=luck.choice([0, 0, 3]),
        hosts_at_most=luck.choice([0, 0, 2]),
        largest_volume=luck.choice([0, 0, 300 * GIB]),
    )


def _rules(
    luck: random.Random, volumes: tuple[Volume, ...], pools: tuple[Pool, ...]
) -> tuple[Rule, ...]:
    pair = tuple(volume.id for volume in luck.sample(volumes, 2))
    pool = luck.choice(pools).id
    rules = (
        Rule(kind=RuleKind.APART, volumes=pair, level=luck.choice(list(Level))),
        Rule(kind=RuleKind.TOGETHER, volumes=pair, level=luck.choice(list(Level))),
        Rule(kind=RuleKind.NEVER_ON, volumes=pair[:1], pools=(pool,)),
        Rule(kind=RuleKind.ONLY_ON, volumes=pair[:1], pools=(pool,)),
    )
    return tuple(rule for rule in rules if luck.random() < 0.15)


def _tenant(luck: random.Random) -> Tenant:
    return Tenant(
        name="t",
        requests_cap=luck.choice([0, 300_000, 900_000]),
        rate_cap=luck.choice([0, 4_000_000]),
        plan_for_cap=luck.random() < 0.3,
    )


def _window() -> Window:
    return Window(
        name="w", night="w", opens=600, start=600, end=10**6, zone="UTC", cutovers=0
    )


def _policy(luck: random.Random) -> Policy:
    return Policy(
        start=0,
        earliest=0,
        horizon_months=luck.choice([0, 12]),
        budget=luck.choice([0, 100_000, 150_000, 10**7]),
        aim=luck.choice(list(Aim)),
        relief_given_up=luck.choice([0, 50_000]),
        nights_kept_free=0,
        latent_demand=luck.choice([1_500_000, 2_000_000]),
    )
