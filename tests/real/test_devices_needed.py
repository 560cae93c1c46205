"""Spinning drives that a week of real disks needs, by three ways of looking at it.

Only the hours in which disks really are busy together say how many drives are needed:
summed peaks never come at once and buy too many; a day folded from the week flattens
the peaks and buys too few (see ``measured``; ``pytest -s`` prints the table).  Hours in
which a disk was not measured count as the highest of that hour on its other days; what
they add stands beside.
"""

import sys
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from math import ceil
from pathlib import Path

import numpy as np
import pytest
from measured import FILE, HOURS_A_DAY, Span, by, folded, half_hours, inventory
from numpy.typing import NDArray
from sheetfiles import as_folder

from placer.candidates.block import Block
from placer.candidates.limits import Date, pool_busy
from placer.estate import Estate, Media, Pool
from placer.findings import errors
from placer.units import PPM
from placer.workbook.intake import read

pytestmark = pytest.mark.skipif(
    not FILE.exists(), reason=f"the measurements are not at {FILE}"
)

Rates = NDArray[np.float64]
IDLE = np.zeros(4)


@dataclass(frozen=True)
class Needed:
    """Drives of one pool that all disks together need."""

    folded: int
    real: int
    summed: int


@dataclass(frozen=True)
class Disks:
    """Busy drives that all disks would need in a pool, by the estate's own limit."""

    estate: Estate
    block: Block

    def by_hours(self, pool: int) -> float:
        """Return the drives busy in the hour with most of them."""
        places = np.full(len(self.estate.volumes), pool)
        return float(self.block.use(places)[self.block.owner_of[pool]].max())

    def by_peaks(self, pool: int) -> float:
        """Return the drives busy if every disk had its peak at once."""
        rows = range(len(self.estate.volumes))
        return sum(float(self.block.column(row, pool).max()) for row in rows)


def disks(folder: Path, *, one_day: bool) -> Disks:
    found = read(as_folder(folder, inventory(half_hours(), one_day=one_day)))
    assert found.estate is not None, errors(found.findings)
    return Disks(found.estate, pool_busy(Date(found.estate, 0)))


def drives(busy: float, pool: Pool) -> int:
    return ceil(busy / (pool.busy_ceiling / PPM))


@pytest.fixture(scope="module")
def week(tmp_path_factory: pytest.TempPathFactory) -> Disks:
    return disks(tmp_path_factory.mktemp("week"), one_day=False)


@pytest.fixture(scope="module")
def needed(week: Disks, tmp_path_factory: pytest.TempPathFactory) -> dict[str, Needed]:
    day = disks(tmp_path_factory.mktemp("day"), one_day=True)
    assert day.estate.pools == week.estate.pools
    return {
        pool.id: Needed(
            folded=drives(day.by_hours(i), pool),
            real=drives(week.by_hours(i), pool),
            summed=drives(week.by_peaks(i), pool),
        )
        for i, pool in enumerate(week.estate.pools)
        if pool.media is Media.SPINNING
    }


def rates(span: Span) -> Rates:
    """Return reads, writes and bytes of each, per second."""
    parts = (span.reads, span.writes, span.read_bytes, span.written_bytes)
    return np.array(parts) / span.seconds


def week_of(spans: Sequence[Span], hours: Iterable[int]) -> dict[int, Rates]:
    """Return all hours; one not measured has the highest of that hour on other days."""
    known = {slot: rates(span) for slot, span in by(60, spans).items()}

    def alike(hour: int) -> Rates:
        same = [r for h, r in known.items() if (h - hour) % HOURS_A_DAY == 0]
        return np.max(same or [IDLE], axis=0)  # type: ignore[no-any-return]

    return {hour: known.get(hour, alike(hour)) for hour in hours}


def busy_drives(asked: Rates, pool: Pool) -> float:
    """Return the drives that a load keeps busy, by hand."""
    copies = 2 if pool.data == 1 else 2 * (pool.parity + 1)
    reads, writes, read_bytes, written_bytes = asked
    positioning = pool.seek / 1_000_000 + 30 / pool.rpm
    busy = (reads + copies * writes) * positioning
    busy += (read_bytes + copies * written_bytes) / pool.drive_rate
    return float(busy * pool.skew / PPM)


def busiest(slots: Sequence[Mapping[int, Rates]], pool: Pool) -> float:
    """Return the drives busy in the slot with most of them."""
    every = {slot for disk in slots for slot in disk}
    together = [
        sum(busy_drives(disk[slot], pool) for disk in slots if slot in disk)
        for slot in every
    ]
    return max(together)


def by_hand(pool: Pool) -> Needed:
    """Return the drives needed straight from the measurements."""
    every = half_hours().values()
    hours = sorted({slot for spans in every for slot in by(60, spans)})
    weeks = [week_of(spans, hours) for spans in every]
    days = [{h: rates(s) for h, s in folded(spans).items()} for spans in every]
    peaks = [max(busy_drives(r, pool) for r in week.values()) for week in weeks]
    return Needed(
        folded=drives(busiest(days, pool), pool),
        real=drives(busiest(weeks, pool), pool),
        summed=drives(sum(peaks), pool),
    )


def measured_alone(pool: Pool) -> int:
    """Return the drives needed if disks were idle in hours without measurements."""
    known = [
        {hour: rates(span) for hour, span in by(60, spans).items()}
        for spans in half_hours().values()
    ]
    return drives(busiest(known, pool), pool)


def table(needed: Mapping[str, Needed], measured: Mapping[str, int]) -> str:
    heads = ("folded day", "measured hours", "all hours", "summed peaks")
    rows = [f"{'spinning drives':16}" + "".join(f"{head:>16}" for head in heads)]
    rows += [
        f"{pool:16}{n.folded:16}{measured[pool]:16}{n.real:16}{n.summed:16}"
        for pool, n in needed.items()
    ]
    return "\n" + "\n".join(rows) + "\n"


def test_real_hours_need_more_than_a_folded_day_and_less_than_summed_peaks(
    week: Disks, needed: dict[str, Needed]
) -> None:
    """By half and more each way: neither short cut is near."""
    measured = {p.id: measured_alone(p) for p in week.estate.pools if p.id in needed}
    sys.stdout.write(table(needed, measured))
    assert set(needed) == {"quay/bulk", "depot/deep", "depot/hold"}
    for pool, each in needed.items():
        assert each.folded < measured[pool] < each.real < each.summed
        assert 1.5 * each.folded < each.real < each.summed / 1.5


def test_the_drives_needed_are_those_reckoned_by_hand(
    week: Disks, needed: dict[str, Needed]
) -> None:
    """From the measurements themselves, to a drive: records are whole numbers."""
    for pool in week.estate.pools:
        if pool.id in needed:
            expected, found = by_hand(pool), needed[pool.id]
            assert found.folded == pytest.approx(expected.folded, abs=1)
            assert found.real == pytest.approx(expected.real, abs=1)
            assert found.summed == pytest.approx(expected.summed, abs=1)
