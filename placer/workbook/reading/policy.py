"""Rows of the sheet policy to the policy, and what other readers need of it."""

from collections.abc import Sequence
from datetime import date, time, timedelta

from placer.estate import Aim, Policy
from placer.windows.clock import instant, working_days_later
from placer.workbook.column import GB_MEANS, Sheet, key
from placer.workbook.columns import SETTINGS
from placer.workbook.reading.headings import Headings, heading_row
from placer.workbook.reading.merged import say_merged
from placer.workbook.reading.raw import Cell, RawSheet
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.table import Row, read_row

_SHEET = Sheet(name="policy", meaning="settings, one column each", columns=SETTINGS)


def read_settings(
    raw: RawSheet | None, pairs: Sheet, remarks: Remarks
) -> tuple[Row, str]:
    """Return the policy as one row with a column per setting, and what GB means.

    Parameters
    ----------
    pairs
        The sheet with its columns for setting and value.
    """
    lines = _lines(raw, pairs, remarks) if raw else []
    gb = _gb_meaning(lines)
    headings = Headings(SETTINGS, remarks, gb, "setting").find(
        [cell for cell, _ in lines]
    )
    return read_row([value for _, value in lines], headings, _SHEET, remarks), gb


def _lines(raw: RawSheet, pairs: Sheet, remarks: Remarks) -> list[tuple[Cell, Cell]]:
    """Return the cells of setting and value."""
    start = heading_row(raw.rows, pairs.columns)
    found = {"setting": 0, "value": 1}
    if start is not None:
        headings = Headings(pairs.columns, remarks, "").find(raw.rows[start])
        found |= {heading.column.name: heading.index for heading in headings}
    rows = raw.rows[0 if start is None else start + 1 :]
    say_merged(raw.name, rows, remarks)
    return [
        (row[found["setting"]], row[found["value"]])
        for row in rows
        if len(row) > max(found.values())
    ]


def _gb_meaning(lines: Sequence[tuple[Cell, Cell]]) -> str:
    """Return the answer to what GB means, before any unit is read."""
    asked = next(c for c in SETTINGS if c.name == GB_MEANS)
    said = [v.text for setting, v in lines if key(setting.text) in asked.keys]
    return said[0] if said and said[0] in asked.words else ""


def start_date(row: Row, today: date) -> date:
    """Return the first day of the plan; without one it is the day of reading."""
    given = row.date("start date")
    if given:
        return given
    row.assume("start date", today.isoformat())
    return today


def read_policy(row: Row, start: date) -> Policy:
    """Return the policy for a start date."""
    zone = row.text("zone")
    lead = row.whole("change lead")
    return Policy(
        start=instant(start, time.min, zone),
        earliest=instant(working_days_later(start, lead), time.min, zone),
        zone=zone,
        horizon_months=row.whole("growth horizon"),
        budget=row.whole("budget"),
        currency=row.text("currency"),
        aim=Aim(row.text("aim")),
        least_gain=row.whole("least gain"),
        relief_given_up=row.whole("relief given up for fewer moves"),
        tolerance=row.whole("tolerance on limits"),
        cured_by=_day_after(row, "cured by", start, zone),
        finish_by=_day_after(row, "finish by", start, zone),
        hold_days=row.whole("hold"),
        nights_kept_free=row.whole("nights kept free"),
        cutover_minutes=row.whole("cutover, check and back-out"),
        cutover_counts_as=row.whole("one cutover counts as"),
        latent_demand=row.whole("latent demand"),
        seed=row.whole("seed"),
        time_limit=row.whole("time limit"),
    )


def _day_after(row: Row, column: str, start: date, zone: str) -> int:
    """Return the midnight after a day, 0 where there is none."""
    day = row.date(column)
    if day is None:
        return 0
    if day < start:
        row.error(
            "date",
            column,
            f"{column} {day} lies before the start date {start}",
            "give a later day, or an earlier start date",
        )
    return instant(day + timedelta(days=1), time.min, zone)
