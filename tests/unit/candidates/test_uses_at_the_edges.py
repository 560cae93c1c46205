"""Pools that have no drives yet, and pools that must not be busy at all."""

from dataclasses import replace

import numpy as np
import pytest
from smallestate import estate, load, pool, volume

from placer import audit, planner
from placer.candidates.table import candidates
from placer.candidates.uses import uses
from placer.estate import Expansion, Media
from placer.plan import Moment
from placer.units import GIB

SLOW = pool("depot/slow", Media.SPINNING, 500, drives=4, seek=8_500, rpm=7_200)
SHELF = replace(
    pool("quay/fast", Media.FLASH, 500),
    drives=0,
    usable=0,
    drive_size=200 * GIB,
    expansion=Expansion(drives=4, price=100, at_most=1),
)


def test_a_pool_without_drives_today_is_planned_and_audited() -> None:
    """Nothing can be busy where there is no drive, so nothing is stated of it."""
    whole = estate([volume("a", "depot/slow", 10, load(10))], [SLOW, SHELF])
    assert audit.judge(whole, planner.plan(candidates(whole), 5)) == ()


def test_a_ceiling_of_nothing_is_stated_in_percent_of_the_drives() -> None:
    still = replace(SLOW, busy_ceiling=0)
    table = candidates(estate([volume("a", "depot/slow", 10, load(10))], [still]))
    nothing = np.zeros(1, dtype=np.int64)
    found = uses(table, table.limits_today, table.home, nothing, Moment.TODAY)
    busy = next(use for use in found if use.limit == "pool-busy")
    plain = candidates(estate([volume("a", "depot/slow", 10, load(10))], [SLOW]))
    share = plain.responses.shares(plain.home, nothing).max()
    assert busy.use == pytest.approx(100 * share)
    assert busy.at_most == 0
