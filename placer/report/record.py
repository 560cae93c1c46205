"""The plan as one JSON document, the same bytes for the same plan.

Keys, in this order:

``inventory``, ``digest``, ``version``, ``status``
    As in ``placer.plan.Plan``.
``placements``, ``bought``, ``moves``, ``bookings``, ``left``, ``uses``, ``goals``,
``shortages``
    Lists of the records of ``placer.plan``, with the names and units of their fields:
    sizes [B], rates [B/s], responses [µs], prices [hundredths of the currency].  The
    times ``starts``, ``ends``, ``cutover`` and ``released`` are ISO 8601 with the
    offset of the window's zone.  A number that is not finite is null.
``units``
    Of the fields whose unit does not stand beside them.
``totals``
    Sums of the inventory by array, the last one of all, as in ``placer.tally.Total``.
``assumptions``
    As in ``placer.estate.Assumption``.
``findings``
    ``severity``, ``code``, ``sheet``, ``cell``, ``sentence``, ``remedy``.
"""

import json
from collections.abc import Iterable
from dataclasses import asdict, fields
from math import isfinite
from typing import Any

from placer.estate import Estate
from placer.findings import Finding, in_order
from placer.plan import Plan
from placer.tally import totals
from placer.windows.clock import local

_TIMES = ("starts", "ends", "cutover", "released")
_UNITS = {
    "size": "B",
    "provisioned": "B",
    "occupied": "B",
    "rate": "B/s",
    "requests": "1/1000 s",
    "response_today": "us",
    "response_planned": "us",
    "response_limit": "us",
    "price": "1/100 of the currency",
}


def dump(plan: Plan, estate: Estate, findings: Iterable[Finding] = ()) -> str:
    """Return a plan as JSON text that ends with a line break."""
    zones = {w.name: w.zone for w in estate.windows}
    document: dict[str, Any] = {}
    for field in fields(plan):
        value = getattr(plan, field.name)
        document[field.name] = (
            [_record(record, zones, estate.policy.zone) for record in value]
            if isinstance(value, tuple)
            else value
        )
    document["units"] = _UNITS
    document["totals"] = [asdict(total) for total in totals(estate)]
    document["assumptions"] = [asdict(a) for a in estate.assumptions]
    document["findings"] = _findings(findings)
    return json.dumps(document, indent=2, allow_nan=False) + "\n"


def dump_findings(findings: Iterable[Finding]) -> str:
    """Return findings as JSON text, in the form they have in a plan's."""
    return json.dumps(_findings(findings), indent=2)


def _record(record: Any, zones: dict[str, str], zone: str) -> dict[str, Any]:
    """Return the fields of a record with its times in the zone of its window."""
    named = asdict(record)
    there = zones.get(named.get("window", ""), zone)
    return {
        name: local(value, there).isoformat() if name in _TIMES else _plain(value)
        for name, value in named.items()
    }


def _plain(value: Any) -> Any:
    return None if isinstance(value, float) and not isfinite(value) else value


def _findings(findings: Iterable[Finding]) -> list[dict[str, str]]:
    return [_finding(finding) for finding in in_order(findings)]


def _finding(finding: Finding) -> dict[str, str]:
    return {
        "severity": finding.severity.value,
        "code": finding.code,
        "sheet": finding.place.sheet,
        "cell": finding.place.cell,
        "sentence": finding.sentence,
        "remedy": finding.remedy,
    }
