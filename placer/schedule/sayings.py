"""How the nights say which limit is short, and when."""

from placer.estate import Estate
from placer.schedule.level import Level
from placer.windows.clock import local

_SHORT = {
    "pool-room": ("Room in pool", "GiB too little"),
    "pool-thin": ("Room to provision in pool", "GiB too little"),
    "array-volumes": ("Volumes on array", "too many"),
    "pool-busy": ("Drives kept busy in pool", "above the ceiling"),
    "controller-busy": ("Controllers of array", "% above the ceiling"),
}


def where(level: Level) -> str:
    """Return what a limit is of."""
    return f"{_SHORT[level.block.code][0]} {level.owner}"


def short(estate: Estate, level: Level, amount: float, hour: int) -> str:
    """Return by how much a limit is short, and in which hour where it has hours."""
    when = f" at {estate.hours[hour].label}" if level.block.hourly else ""
    figure = f"{amount / level.block.scale:,.4g} {_SHORT[level.block.code][1]}"
    return f"{where(level)}{when}: {figure}"


def clock(estate: Estate, minute: int) -> str:
    """Return an instant [min UTC] as local time with its offset."""
    return local(minute, estate.policy.zone).isoformat(" ", "minutes")
