"""How a caller follows a search and ends it early."""

from collections.abc import Callable
from dataclasses import dataclass

from placer.plan import Goal


def _nothing(_: Goal) -> None:
    """Tell nobody."""


def _never() -> bool:
    return False


@dataclass(frozen=True)
class Watch:
    """What a search tells, and what it asks between its steps.

    Attributes
    ----------
    tell
        Called with each goal when it is solved.
    halted
        Once it returns true, the best so far is kept.
    """

    tell: Callable[[Goal], None] = _nothing
    halted: Callable[[], bool] = _never


UNWATCHED = Watch()
