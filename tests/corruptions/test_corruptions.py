import re
from collections import Counter
from pathlib import Path

import pytest

from corruptions import (
    damaged_claims,
    damaged_demand,
    damaged_nights,
    damaged_pier,
    damaged_placement,
    damaged_replay,
    pier,
)
from corruptions.borderline import CLEAN
from corruptions.damage import Damage
from corruptions.harbour import ESTATE
from corruptions.sailing import PLAN
from placer.audit import CODES, judge
from placer.findings import Severity

DAMAGES = (
    *damaged_placement.DAMAGES,
    *damaged_nights.DAMAGES,
    *damaged_replay.DAMAGES,
    *damaged_claims.DAMAGES,
    *damaged_demand.DAMAGES,
    *damaged_pier.DAMAGES,
)
SOUND = CLEAN | damaged_pier.CLEAN
REGISTER = Path(__file__).parents[2] / "DEVELOPERS.md"


def test_the_plans_worked_by_hand_are_clean() -> None:
    assert judge(ESTATE, PLAN) == ()
    assert judge(pier.ESTATE, pier.PLAN) == ()


@pytest.mark.parametrize("damage", DAMAGES, ids=lambda d: f"{d.code}: {d.name}")
def test_a_damage_raises_its_rule_and_no_other(damage: Damage) -> None:
    found = judge(*damage.pair)
    assert {finding.code for finding in found} == {damage.code} | damage.also
    assert {finding.severity for finding in found} == {Severity.ERROR}
    assert all(finding.sentence for finding in found)


@pytest.mark.parametrize("name", SOUND)
def test_a_limit_that_is_only_reached_is_no_finding(name: str) -> None:
    assert judge(*SOUND[name]) == ()


def test_every_rule_has_two_damages() -> None:
    counted = Counter(damage.code for damage in DAMAGES)
    assert {code: counted[code] for code in CODES if counted[code] < 2} == {}


def test_no_two_damages_are_the_same() -> None:
    names = [(damage.code, damage.name) for damage in DAMAGES]
    assert len(set(names)) == len(names)


def test_the_codes_are_those_of_the_register_in_its_order() -> None:
    text = REGISTER.read_text(encoding="utf-8").split("## Register of rules")[1]
    cells = re.findall(r"^\| (`[^|]*) \|", text, flags=re.MULTILINE)
    listed = [code for cell in cells for code in re.findall(r"`([a-z-]+)`", cell)]
    assert tuple(dict.fromkeys(listed)) == CODES
