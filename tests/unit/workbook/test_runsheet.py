"""The run sheet has every step once, in clock order, under its window."""

from dataclasses import replace

import pytest
from openpyxl.worksheet.worksheet import Worksheet
from smallplan import ESTATE, NO_PLAN, PLAN, at, window

from placer.words import CAUTIONS
from placer.workbook.planbook import build
from placer.workbook.runsheet import sections


def rows(sheet: Worksheet) -> list[list[str]]:
    return [[str(c.value or "") for c in row] for row in sheet.iter_rows()]


def test_steps_stand_in_clock_order_under_their_window() -> None:
    first, second, third = sections(ESTATE, PLAN)
    assert [s.what for s in first.steps] == ["start copy", "pause"]
    assert [(s.move.id, s.what) for s in second.steps] == [
        ("M001", "go on"),
        ("M002", "start copy"),
        ("M001", "copy ends"),
        ("M002", "copy ends"),
        ("M001", "cut over booking"),
        ("M002", "cut over booking"),
    ]
    assert third.window is ESTATE.windows[2]
    assert [s.what for s in third.steps] == ["release source", "release source"]


def test_at_one_instant_a_copy_ends_before_its_volume_is_cut_over() -> None:
    end = PLAN.moves[0].cutover
    booking = replace(PLAN.bookings[1], ends=end)
    plan = replace(PLAN, moves=PLAN.moves[:1], bookings=(booking,))
    steps = [s.what for s in sections(ESTATE, plan)[0].steps]
    assert steps == ["start copy", "copy ends", "cut over booking"]


def test_the_latest_start_of_a_cutover_leaves_its_minutes_in_the_window() -> None:
    """Window to 04:00, cutover of 60 min: latest start 03:00, by hand."""
    latest = [s.latest for part in sections(ESTATE, PLAN) for s in part.steps]
    assert {instant for instant in latest if instant} == {at("2027-01-28 03:00")}


def test_a_release_outside_the_windows_stands_under_its_day() -> None:
    estate = replace(ESTATE, windows=ESTATE.windows[:2])
    last = sections(estate, PLAN)[-1]
    assert last.window is None
    headings = [row[0] for row in rows(build(estate, PLAN)["run sheet"])]
    assert "Wed 2027-02-10, outside the windows" in headings


def test_a_new_rate_within_a_window_is_a_step_without_a_pause() -> None:
    whole = PLAN.bookings[0]
    middle = at("2027-01-27 00:00")
    pieces = replace(whole, ends=middle), replace(whole, starts=middle, rate=7)
    plan = replace(PLAN, bookings=pieces)
    what = [(s.what, s.rate) for s in sections(ESTATE, plan)[0].steps]
    assert what == [
        ("start copy", whole.rate),
        ("go on at new rate", 7),
        ("copy ends", None),
    ]


def test_an_hour_after_the_clocks_change_carries_its_offset() -> None:
    """Clocks go back at 03:00 on 2027-10-31: EU directive 2000/84/EC, last Sunday."""
    night = window("dst", "2027-10-30 22:00", "2027-10-31 05:00")
    moved = replace(PLAN.moves[0], window="dst", cutover=night.start + 7 * 60)
    estate = replace(ESTATE, windows=(night,))
    plan = replace(PLAN, moves=(moved,), bookings=())
    times = [row[0] for row in rows(build(estate, plan)["run sheet"])]
    assert "Sun 04:00+01:00" in times


def test_the_sheet_opens_with_the_cautions_and_the_owners_totals() -> None:
    text = rows(build(ESTATE, PLAN)["run sheet"])
    opening = "\n".join(row[0] for row in text[:17])
    assert all(caution in opening for caution in CAUTIONS)
    controls = [row[1:4] for row in text if row[0] == "all"]
    assert controls == [
        ["volumes", "3.0", "3.0"],
        ["GiB", "300.0", "300.0"],
        ["requests/s", "2700.0", "2700.0"],
    ]


@pytest.mark.parametrize(
    ("verdict", "said"),
    [
        ("", "This plan has not been audited: do not carry it out."),
        ("The audit REFUSES this plan.\n  hold: M001", "The audit REFUSES this plan."),
    ],
)
def test_the_sheet_says_what_the_audit_said(verdict: str, said: str) -> None:
    """A refused plan must not look on paper like one to carry out."""
    text = rows(build(ESTATE, PLAN, verdict=verdict)["run sheet"])
    assert said in [row[0] for row in text[:4]]


def test_a_step_names_the_host_of_its_volume() -> None:
    first, *others = ESTATE.volumes
    estate = replace(ESTATE, volumes=(replace(first, host="bk-01"), *others))
    sheet = rows(build(estate, PLAN)["run sheet"])
    head = next(row for row in sheet if row[0] == "time")
    hosts = {row[head.index("host")] for row in sheet if row[3] == first.id}
    assert hosts == {"bk-01"}


def test_each_window_begins_a_page_and_repeats_the_headers() -> None:
    sheet = build(ESTATE, PLAN)["run sheet"]
    text = rows(sheet)
    title = next(n for n, row in enumerate(text, 1) if row[0] == "time")
    assert sheet.print_title_rows == f"${title}:${title}"
    broken = [text[b.id][0] for b in sheet.row_breaks.brk]
    assert len(broken) == 2
    assert "weekday 2" in broken[0]
    assert "weekday 3" in broken[1]


def test_without_a_plan_there_is_nothing_to_do() -> None:
    assert sections(ESTATE, NO_PLAN) == []
