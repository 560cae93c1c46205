"""Takes small estates from a placement to nights, and asks the audit what it thinks."""

from collections import Counter
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np

from placer.audit import judge, judge_placement
from placer.candidates.table import candidates
from placer.estate import Estate, Volume
from placer.findings import Finding
from placer.moves import transfers
from placer.plan import Booking, Bought, Move, Placed, Plan, Reason, Status, Transfer
from placer.schedule import Schedule, book
from placer.units import GB


@dataclass(frozen=True)
class Case:
    """An estate, what was to move, and the nights found for it."""

    estate: Estate
    transfers: tuple[Transfer, ...]
    schedule: Schedule
    plan: Plan

    @property
    def broken(self) -> set[str]:
        """Rules of the nights that the audit finds broken."""
        return codes(self.estate, self.plan)

    @property
    def moves(self) -> dict[str, Move]:
        """Moves by the name of the volume."""
        return {move.volume.split("/")[1]: move for move in self.schedule.moves}

    @property
    def left(self) -> dict[str, str]:
        """What each volume left over lacks, by name."""
        return {x.volume.split("/")[1]: x.lacks for x in self.schedule.left}

    def pieces(self, name: str) -> list[Booking]:
        """Return the bookings of one volume."""
        number = self.moves[name].id
        return [each for each in self.schedule.bookings if each.move == number]


def codes(estate: Estate, plan: Plan) -> set[str]:
    """Return the rules of the nights a plan breaks, not those of its placement."""
    placed = Counter(map(_said, judge_placement(estate, plan)))
    every = Counter(map(_said, judge(estate, plan))) - placed
    trust = ("claim-", "digest", "control")
    return {code for code, _ in every if not code.startswith(trust)}


def _said(finding: Finding) -> tuple[str, str]:
    return finding.code, finding.sentence


def booked(
    estate: Estate,
    ways: Mapping[str, str],
    bought: Mapping[str, int] | None = None,
    order: Sequence[str] = (),
) -> Case:
    """Find nights for volumes that go to pools (``array/pool``), by their names.

    ``order`` replaces the order in which the volumes are tried, where given.
    """
    table = candidates(estate)
    columns = {pool.id: column for column, pool in enumerate(estate.pools)}
    homes = [ways.get(v.name, v.home) for v in estate.volumes]
    steps = [(bought or {}).get(pool.id, 0) for pool in estate.pools]
    reasons = [
        Reason.MAKE_ROOM if v.name in ways else Reason.STAYS for v in estate.volumes
    ]
    places = np.array([columns[home] for home in homes])
    moving = transfers(table, places, reasons)
    if order:
        moving = tuple(
            sorted(moving, key=lambda t: order.index(t.volume.split("/")[1]))
        )
    schedule = book(table, moving, np.array(steps))
    placed = tuple(
        Placed(volume=v.id, source=v.home, target=home, reason=reason)
        for v, home, reason in zip(estate.volumes, homes, reasons, strict=True)
    )
    plan = Plan(
        inventory=estate.name,
        digest=estate.digest,
        version="",
        status=Status.WITHIN_GAP,
        placements=placed,
        bought=tuple(Bought(p, n, 0) for p, n in (bought or {}).items()),
        moves=schedule.moves,
        bookings=schedule.bookings,
        left=schedule.left,
    )
    return Case(estate, moving, schedule, plan)


def of_bytes(volume: Volume, gigabytes: int, hold: int = 0) -> Volume:
    """Return a volume of decimal gigabytes, for round times at round rates."""
    size = gigabytes * GB
    return replace(volume, provisioned=size, occupied=size, hold_days=hold)
