"""Rows of the sheets windows and freezes to windows with the freezes cut out."""

from collections.abc import Sequence
from datetime import date, time, timedelta

from placer.estate import Window
from placer.findings import Place
from placer.windows.calendar import FreezeRule, WindowRule, expand
from placer.windows.spans import Recurring, Span, spans
from placer.workbook.column import Effect
from placer.workbook.reading.names import Names
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.table import Row

_WEEKS = 26


class NightReader:
    """Reads the calendar of a policy.

    Parameters
    ----------
    start
        First day of the plan.
    finish
        Last day of cutovers, or None.
    """

    def __init__(
        self,
        zone: str,
        start: date,
        finish: date | None,
        arrays: Names,
        remarks: Remarks,
    ) -> None:
        self._zone = zone
        self._start = start
        horizon = start + timedelta(weeks=_WEEKS)
        self._last = max(horizon, finish or horizon)
        self._arrays = arrays
        self._remarks = remarks

    def read(
        self, windows: Sequence[Row], freezes: Sequence[Row]
    ) -> tuple[Window, ...]:
        """Return the windows; a row with a fault is a finding and left out."""
        rules = [self._window(row) for row in windows if self._usable(row, "closes at")]
        frozen = [self._freeze(row) for row in freezes if self._usable(row, "ends at")]
        good = [rule for rule in rules if self._opens(rule)]
        closed = [
            rule
            for rule in frozen
            if self._spans(rule.recurring, rule.place) is not None
        ]
        if not windows:
            good = [self._usual()]
        try:
            return expand(good, closed, self._start, self._last)
        except ValueError as error:
            self._remarks.error("window", Place("windows"), str(error))
            return ()

    def _usable(self, row: Row, end: str) -> bool:
        """Return whether a row can be read on; one of length zero cannot."""
        begin = end.replace("closes", "opens").replace("ends", "starts")
        at = row.clock(end)
        if at is not None and at == row.clock(begin):
            row.error(
                "window",
                end,
                f"{begin} and {end} are the same: it is open for no time",
                "give lasts (24 for a whole day), or another time",
            )
            return False
        return not row.faulty

    def _window(self, row: Row) -> WindowRule:
        place = row.place("arrays")
        return WindowRule(
            name=row.text("window"),
            opens_on=row.text("opens on"),
            opens_at=row.clock("opens at") or time.min,
            lasts_minutes=_minutes(row),
            closes_at=row.clock("closes at"),
            zone=row.text("zone") or self._zone,
            first=row.date("from"),
            until=row.date("until"),
            rate=row.whole("copies together"),
            at_once=row.whole("copies at once"),
            cutovers=row.whole("cutovers at most"),
            arrays=tuple(
                n for n in row.names("arrays") if self._arrays.check(n, place)
            ),
            place=row.place("window"),
        )

    def _freeze(self, row: Row) -> FreezeRule:
        return FreezeRule(
            name=row.text("freeze"),
            starts_on=row.text("starts on"),
            starts_at=row.clock("starts at") or time.min,
            lasts_minutes=_minutes(row),
            ends_at=row.clock("ends at"),
            zone=row.text("zone") or self._zone,
            first=row.date("from"),
            until=row.date("until"),
            why=row.text("why"),
            place=row.place("freeze"),
        )

    def _usual(self) -> WindowRule:
        """Return the windows assumed where there are none."""
        self._remarks.assume(
            Effect.CALENDAR,
            "opens on",
            f"Saturdays 22:00 to 06:00 {self._zone}, for {_WEEKS} weeks",
            Place("windows"),
        )
        return WindowRule(
            name="assumed",
            opens_on="Sat",
            opens_at=time(22),
            closes_at=time(6),
            zone=self._zone,
            place=Place("windows"),
        )

    def _opens(self, rule: WindowRule) -> bool:
        """Return whether a window opens at all."""
        found = self._spans(rule.recurring, rule.place)
        if found == ():
            self._remarks.warn(
                "window",
                rule.place,
                f'the window "{rule.name}" never opens from {self._start} to '
                f"{self._last}",
                "check its days, from and until",
            )
        return bool(found)

    def _spans(self, recurring: Recurring, place: Place) -> tuple[Span, ...] | None:
        """Return the occurrences; None, with a finding, where the rule is wrong."""
        try:
            return spans(recurring, self._start, self._last)
        except ValueError as error:
            self._remarks.error("window", place, str(error))
            return None


def _minutes(row: Row) -> int | None:
    return row.whole("lasts") if row.given("lasts") else None
