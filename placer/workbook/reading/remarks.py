"""What reading gathers beside the records: findings, and defaults that stood in."""

from placer.estate import Assumption
from placer.findings import Finding, Place, Severity, in_order
from placer.workbook.column import GB_MEANS, Column, Effect

_Default = tuple[Effect, str, str, str]


class Remarks:
    """Gathers findings and assumptions in the order they are made."""

    def __init__(self) -> None:
        self._findings: list[Finding] = []
        self._defaults: dict[_Default, set[Place]] = {}
        self._gb_asked = False

    def error(self, code: str, place: Place, sentence: str, remedy: str = "") -> None:
        """Record what stops planning."""
        self._findings.append(Finding(code, Severity.ERROR, place, sentence, remedy))

    def warn(self, code: str, place: Place, sentence: str, remedy: str = "") -> None:
        """Record what may well be wrong."""
        self._findings.append(Finding(code, Severity.WARNING, place, sentence, remedy))

    def note(self, code: str, place: Place, sentence: str, remedy: str = "") -> None:
        """Record what is worth knowing."""
        self._findings.append(Finding(code, Severity.NOTE, place, sentence, remedy))

    def ask_gb(self, place: Place, heading: str) -> None:
        """Ask what GB means, once for the whole inventory."""
        if not self._gb_asked:
            self.error(
                "unit",
                place,
                f'"{heading}": does GB mean 10^9 or 2^30 bytes in this export?',
                f'answer once in the sheet policy: "{GB_MEANS}", 10^9 or 2^30',
            )
        self._gb_asked = True

    def default(self, column: Column, value: str, row: Place) -> None:
        """Record that a default stood in for the empty cell of a row, once per row."""
        if column.effect is not Effect.NONE:
            self.assume(column.effect, column.name, value, row)

    def assume(self, effect: Effect, what: str, value: str, row: Place) -> None:
        """Record anything that was taken to hold without being told."""
        self._defaults.setdefault((effect, row.sheet, what, value), set()).add(row)

    @property
    def findings(self) -> tuple[Finding, ...]:
        """Return all findings, errors first."""
        return in_order(self._findings)

    @property
    def assumptions(self) -> tuple[Assumption, ...]:
        """Return each default once with its cells, the gravest effect first."""
        gravest = sorted(self._defaults.items(), key=lambda item: item[0][0])
        return tuple(
            Assumption(sheet, what, value, len(rows), effect.sentence)
            for (effect, sheet, what, value), rows in gravest
        )
