"""The JSON of a plan is valid, complete and the same each time."""

import json
from dataclasses import fields, replace

from smallplan import ESTATE, FINDINGS, PLAN

from placer.plan import Plan
from placer.report.record import dump, dump_findings


def test_it_holds_every_record_of_the_plan() -> None:
    document = json.loads(dump(PLAN, ESTATE, FINDINGS))
    assert list(document)[: len(fields(Plan))] == [f.name for f in fields(Plan)]
    for name in ("placements", "moves", "bookings", "left", "uses", "goals", "bought"):
        assert len(document[name]) == len(getattr(PLAN, name))
    assert len(document["findings"]) == 2


def test_fields_in_small_units_have_their_unit_told() -> None:
    """Whoever reads 7431 must not take it for milliseconds, nor bytes for GiB."""
    document = json.loads(dump(PLAN, ESTATE))
    for records in ("placements", "moves", "bookings", "bought", "totals"):
        numbers = {
            name
            for record in document[records]
            for name, value in record.items()
            if isinstance(value, int)
        }
        assert numbers - {"steps", "volumes"} <= set(document["units"])
    assert document["units"]["response_limit"] == "us"
    assert document["units"]["size"] == "B"


def test_findings_alone_have_the_form_they_have_in_a_plan() -> None:
    alone = json.loads(dump_findings(FINDINGS))
    assert alone == json.loads(dump(PLAN, ESTATE, FINDINGS))["findings"]


def test_times_are_iso_8601_with_the_offset_of_the_window() -> None:
    move = json.loads(dump(PLAN, ESTATE))["moves"][0]
    assert move["starts"] == "2027-01-26T22:00:00+01:00"


def test_the_same_plan_gives_the_same_bytes() -> None:
    assert dump(PLAN, ESTATE, FINDINGS) == dump(PLAN, ESTATE, FINDINGS)


def test_a_bound_that_is_not_finite_is_null() -> None:
    """RFC 8259, section 6: infinity and NaN are not permitted in JSON."""
    goal = replace(PLAN.goals[0], bound=float("inf"))
    document = json.loads(dump(replace(PLAN, goals=(goal,)), ESTATE))
    assert document["goals"][0]["bound"] is None
