"""Damages to what is told of a lost drive and of what saturated drives held back."""

from dataclasses import replace

from corruptions.damage import Pair, Sound, both, damage, pool
from corruptions.pier import ESTATE, PLAN
from placer.units import MB

USES = "claim-uses"
ANSWERS = "claim-responses"
GOALS = "claim-goals"
PIER = Sound(ESTATE, PLAN)


def deck(percent: float) -> Pair:
    """State another busy share of `pier/deck` planned, which is 9.784375 %."""
    return PIER.use("pier/deck", "pool-busy", "planned", use=percent)


def worn(percent: float) -> Pair:
    """State another busy share of `pier/worn` today, which is 89 %."""
    return PIER.use("pier/worn", "pool-busy", "today", use=percent)


def wear(written: float) -> Pair:
    """State another wear of `pier/deck` planned, which is 19.842653184 TB."""
    return PIER.use("pier/deck", "pool-wear", "planned", use=written)


def controllers(moment: str, percent: float) -> Pair:
    """State another busy share of the controllers: 10.8 % today, planned 13.2 %."""
    return PIER.use("pier", "controller-busy", moment, use=percent)


def fading(pair: Pair) -> Pair:
    """Let fares ask half as much in a year: 0.94 times at the end of the nights."""
    fares, *others = pair[0].volumes
    volumes = (replace(fares, load_growth=-500_000), *others)
    return replace(pair[0], volumes=volumes), pair[1]


DAMAGES = (
    damage(USES, "fares ask on flash what was measured", deck(7.25625)),
    damage(USES, "flash with all drives: 0.4 + 0.075 + 0.04375", deck(5.1875)),
    damage(USES, "flash on five of four drives: 9.784375 x 4/5", deck(7.8275)),
    damage(USES, "bytes of flash with all drives: + 0.04375", deck(9.375)),
    damage(USES, "stripes with all drives: 0.8 + 0.075 + 0.08375", deck(9.5875)),
    damage(USES, "bells ask for more where they are: 500 reads", deck(11.984375)),
    damage(USES, "disks with all drives: 360 + 4 x 40", worn(52)),
    damage(USES, "disks on five of four drives", worn(71.2)),
    damage(USES, "small writes as with all drives: 720 + 5 x 40", worn(92)),
    damage(USES, "reads as with all drives: 450 + 4.25 x 40", worn(62)),
    damage(USES, "disks as measured", worn(96)),
    damage(USES, "tides ask for more at home", worn(109.25)),
    damage(USES, "controllers as measured", controllers("planned", 10.8)),
    damage(USES, "controllers swollen today", controllers("today", 13.2)),
    damage(USES, "controllers swollen for tides: 16.2", controllers("planned", 15.2)),
    damage(USES, "writes as measured: 12.96 TB", wear(13.362653184)),
    damage(USES, "writes of a lost drive: 24.3 TB", wear(24.702653184)),
    damage(USES, "a copy that swells", wear(20.043979776)),
    damage(USES, "fares would ask double", PIER.policy(latent_demand=2_000_000)),
    damage(USES, "nothing is held back", PIER.policy(latent_demand=1_000_000)),
    damage(USES, "94.9999 % busy", PIER.pool("pier/worn", busy_measured=949_999)),
    damage(USES, "modelled at 89 %", PIER.pool("pier/worn", busy_measured=0)),
    damage(
        USES,
        "songs leave disks measured 95 % busy",
        pool("mole/disks", busy_measured=950_000),
    ),
    damage(
        USES,
        "deck keeps all its drives",
        PIER.pool("pier/deck", one_drive_lost=False),
        ANSWERS,
    ),
    damage(
        USES,
        "worn keeps all its drives",
        PIER.pool("pier/worn", one_drive_lost=False),
        ANSWERS,
        GOALS,
    ),
    damage(
        ANSWERS,
        "fares wait for their latent demand: 0.0978 / 0.9022 x 618.6",
        PIER.placed("pier/fares", response_planned=343),
    ),
    damage(
        ANSWERS,
        "fares wait at drives none of which is lost: 0.03825 / 0.96175 x 618.6",
        PIER.placed("pier/fares", response_planned=305),
    ),
    damage(
        ANSWERS,
        "bells wait for the latent demand of fares",
        PIER.placed("pier/bells", response_planned=368),
    ),
    damage(
        ANSWERS,
        "tides wait at drives none of which is lost: 0.24 / 0.76 x 5,000",
        PIER.placed("pier/tides", response_planned=10_304),
    ),
    damage(
        GOALS,
        "relief for what fares would ask",
        PIER.goal("relief", value=29_226.12, reached=29_226.12, bound=29_226.12),
    ),
    damage(
        "pool-busy",
        "9.784375 % of 9.7843",
        PIER.pool("pier/deck", busy_ceiling=97_843),
        USES,
        GOALS,
    ),
    damage(
        "pool-busy",
        "40.5 % of 40.4999, with all drives 24",
        PIER.pool("pier/worn", busy_ceiling=404_999),
        USES,
    ),
    damage(
        "pool-busy",
        "in the nights 9.36 % of 9, later half, and 6.97 as measured",
        fading(PIER.pool("pier/deck", busy_ceiling=90_000)),
        USES,
        GOALS,
    ),
    damage(
        "pool-wear",
        "19.84 TB of 18.25, as measured 13.36",
        PIER.pool("pier/deck", drive_size=1_000 * MB),
        USES,
    ),
    damage(
        "controller-busy",
        "13.2 % of 13.1999",
        PIER.array("pier", controller_ceiling=131_999),
        USES,
    ),
    damage(
        "controller-busy",
        "in the nights 12.79 % of 12.5, where today's placement has 10.53",
        fading(PIER.array("pier", controller_ceiling=125_000)),
        USES,
    ),
)

CLEAN: dict[str, Pair] = {
    "95 % measured": PIER.pool("pier/worn", busy_measured=950_000),
    "a group that lost a drive as busy as it may be": both(
        PIER.pool("pier/worn", busy_ceiling=405_000),
        PIER.stated("pier/worn", "pool-busy", 40.5),
    ),
    "controllers that latent demand makes as busy as they may be": both(
        PIER.array("pier", controller_ceiling=132_000),
        PIER.stated("pier", "controller-busy", 13.2),
    ),
    "disks measured 94.9999 % busy": pool("mole/disks", busy_measured=949_999),
    "flash measured saturated": pool("new/flash", busy_measured=1_000_000),
    "no parity, no loss to plan for": pool("berth/flash", one_drive_lost=True),
    "a black box with a lost drive": pool(
        "inland/box", data=4, parity=1, one_drive_lost=True
    ),
}
