"""Counts for people agree with sums by hand."""

from dataclasses import replace

from smallplan import ESTATE, NO_PLAN, PLAN, at

from placer.plan import Moment, Reason, Use
from placer.tally import Share, finish, nights, share_of_limit, shares, totals
from placer.units import GIB, MB


def test_totals_add_up_by_array_and_in_all() -> None:
    quay, both = totals(ESTATE)
    assert (quay.array, both.array) == ("quay", "")
    assert (both.volumes, both.provisioned, both.occupied) == (3, 300 * GIB, 180 * GIB)
    assert both.requests == 2_700_000


def test_nights_carry_what_is_booked_in_them() -> None:
    """100 MB/s for 3 h and 1 B/s for 3.5 h; both at work from 22:30; by hand."""
    first, second = nights(ESTATE, PLAN)
    assert (first.copies, first.cutovers, first.busiest) == (1, 0, 123_456_789)
    assert second.carried == 100 * MB * 10_800 + 12_600
    assert second.busiest == 100 * MB + 1
    assert second.copies == 2


def test_volumes_of_one_application_are_one_cutover() -> None:
    assert nights(ESTATE, PLAN)[1].cutovers == 1
    alone = tuple(replace(v, applications=()) for v in ESTATE.volumes)
    assert nights(replace(ESTATE, volumes=alone), PLAN)[1].cutovers == 2


def test_moves_are_counted_by_reason() -> None:
    assert shares(PLAN) == (
        Share(Reason.LIMIT, 1, 60 * GIB),
        Share(Reason.RELIEF, 1, 60 * GIB),
    )


def test_the_finish_is_the_last_cutover() -> None:
    assert finish(PLAN.moves) == at("2027-01-28 02:30")
    assert finish(NO_PLAN.moves) is None


def test_share_of_a_limit_of_nothing() -> None:
    use = Use(
        where="p", limit="pool-room", moment=Moment.TODAY, use=0, at_most=0, unit="GiB"
    )
    assert share_of_limit(use) == 0
    assert share_of_limit(replace(use, use=1)) == float("inf")
    assert share_of_limit(replace(use, use=1, at_most=8)) == 12.5
