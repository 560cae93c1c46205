"""A week of 53 real disks, from inventory to audited plan (see ``measured``)."""

from dataclasses import dataclass
from pathlib import Path

import pytest
from measured import FILE, by, folded, half_hours, highest, inventory
from sheetfiles import as_folder

from placer import audit, planner
from placer.candidates.table import candidates
from placer.estate import Estate
from placer.findings import Finding, errors
from placer.plan import Moment, Plan, Status, Use
from placer.survey import survey
from placer.units import GIB, MILLI
from placer.workbook import planbook
from placer.workbook.intake import read

pytestmark = pytest.mark.skipif(
    not FILE.exists(), reason=f"the measurements are not at {FILE}"
)
SECONDS = 15


@dataclass(frozen=True)
class Planned:
    """An inventory as read, its findings, and the plan read back from its file."""

    estate: Estate
    findings: tuple[Finding, ...]
    plan: Plan


def planned(folder: Path, *, one_day: bool = False) -> Planned:
    found = read(as_folder(folder / "disks", inventory(half_hours(), one_day=one_day)))
    assert found.estate is not None, errors(found.findings)
    table = candidates(found.estate)
    made = planner.plan(table, SECONDS)
    file = planbook.write(folder / "plan.xlsx", found.estate, made)
    findings = (*found.findings, *survey(table))
    return Planned(found.estate, findings, planbook.read(file))


@pytest.fixture(scope="module")
def week(tmp_path_factory: pytest.TempPathFactory) -> Planned:
    return planned(tmp_path_factory.mktemp("week"))


def uses(plan: Plan, moment: Moment) -> list[Use]:
    return [use for use in plan.uses if use.moment is moment]


def test_the_peak_is_a_third_lower_in_a_folded_day() -> None:
    """62 157 requests/s in the busiest half hour, 40 893 in the busiest folded hour.

    Recomputed here from the measurements; the data set's own notes say the same.
    """
    disks = half_hours()
    assert highest(by(30, spans) for spans in disks.values()) == pytest.approx(
        62_157, abs=0.5
    )
    assert highest(folded(spans) for spans in disks.values()) == pytest.approx(
        40_893, abs=0.5
    )


def test_every_measured_hour_is_in_the_estate(week: Planned) -> None:
    """No hour was lost, moved or counted twice on the way in: requests and bytes."""
    disks = half_hours()
    assert {volume.name for volume in week.estate.volumes} == set(disks)
    for volume in week.estate.volumes:
        for slot, span in by(60, disks[volume.name]).items():
            asked = volume.load[slot]
            assert (asked.reads + asked.writes) / MILLI == pytest.approx(
                span.rate, abs=2 / MILLI
            )
            moved = (span.read_bytes + span.written_bytes) / span.seconds
            assert asked.read_bytes + asked.write_bytes == pytest.approx(
                moved, rel=1e-3, abs=20
            )


def test_nothing_is_wrong_with_the_inventory(week: Planned) -> None:
    assert errors(week.findings) == ()


def test_spinning_pools_are_over_their_ceilings_today(week: Planned) -> None:
    over = {
        use.where
        for use in uses(week.plan, Moment.TODAY)
        if use.limit == "pool-busy" and use.use > use.at_most
    }
    assert over == {"quay/bulk", "depot/deep", "depot/hold"}


def test_a_plan_is_found_that_its_audit_accepts(week: Planned) -> None:
    assert week.plan.status is not Status.NO_PLAN
    assert audit.judge(week.estate, week.plan) == ()


def test_disks_move_and_all_of_them_have_a_night(week: Planned) -> None:
    moving = {placed.volume for placed in week.plan.placements if placed.moves}
    assert {move.volume for move in week.plan.moves} == moving
    assert len(moving) > 5
    assert week.plan.left == ()
    gone = sum(move.size for move in week.plan.moves) / GIB
    assert gone > 1_000


def test_limits_of_three_kinds_bind_and_none_is_broken(week: Planned) -> None:
    """Room, wear and busy drives are nine tenths used somewhere, with nothing over."""
    tight = [u for u in uses(week.plan, Moment.PLANNED) if u.use >= 0.9 * u.at_most]
    assert {"pool-room", "pool-wear", "pool-busy"} <= {use.limit for use in tight}
    assert all(use.use <= use.at_most for use in uses(week.plan, Moment.PLANNED))


def test_the_hours_that_bind_are_hours_of_the_week(week: Planned) -> None:
    """Limits bind in different hours: no single peak would have found them."""
    busy = [
        use
        for use in uses(week.plan, Moment.PLANNED)
        if use.hour and use.use >= 0.5 * use.at_most
    ]
    assert len({use.hour for use in busy}) > 1
    assert {use.hour[:10] for use in busy} <= {
        f"2027-01-{day}" for day in range(11, 19)
    }


def test_a_plan_from_a_folded_day_breaks_limits_in_the_true_week(
    week: Planned, tmp_path: Path
) -> None:
    """Planned as if every day were the mean day, the drives are over their ceiling."""
    mean_day = planned(tmp_path, one_day=True)
    assert audit.judge(mean_day.estate, mean_day.plan) == ()
    broken = {f.code for f in audit.judge_placement(week.estate, mean_day.plan)}
    assert "pool-busy" in broken
