"""Each limit stands in all its places: guide, row or refusal, and audit."""

import re
from pathlib import Path

from placer import audit

ROOT = Path(__file__).parents[2]


def registered() -> set[str]:
    """Codes in the tables of the contributors' guide."""
    text = (ROOT / "DEVELOPERS.md").read_text(encoding="utf-8")
    rows = re.findall(r"^\| ((?:`[a-z-]+`(?: \(first day\))?(?:, )?)+)", text, re.M)
    return {code for row in rows for code in re.findall(r"`([a-z-]+)`", row)}


def test_every_registered_rule_is_audited() -> None:
    assert registered() == set(audit.CODES)


def test_every_rule_of_the_placement_has_a_row_or_a_refusal() -> None:
    """Each code of the first table is named where rows or refusals are built."""
    text = (ROOT / "DEVELOPERS.md").read_text(encoding="utf-8")
    table = text.split("Placement, judged at the horizon")[1].split("Nights, judged")[0]
    codes = set(re.findall(r"^\| `([a-z-]+)`", table, re.M))
    sources = [
        path.read_text(encoding="utf-8")
        for folder in ("candidates", "placement")
        for path in (ROOT / "placer" / folder).glob("*.py")
    ]
    assert {c for c in codes if not any(f'"{c}"' in s for s in sources)} <= {"only-on"}
