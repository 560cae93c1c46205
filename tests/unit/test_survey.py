"""Each check of an estate fires where it should, and is silent where it should be."""

from dataclasses import replace

import pytest
from smallestate import START, estate, load, policy, pool, volume, window

from placer.candidates.table import candidates
from placer.estate import (
    Array,
    Estate,
    Expansion,
    Host,
    Level,
    Media,
    Policy,
    Pool,
    Rule,
    RuleKind,
    Volume,
)
from placer.findings import Finding, Place, Severity
from placer.survey import survey
from placer.units import MILLI, PPM

RATED = {"drives": 10, "seek": 4_000, "rpm": 15_000, "skew": PPM}
SLOW = pool("depot/slow", Media.SPINNING, 500, **RATED)
FAST = pool("quay/fast", Media.FLASH, 300, drives=4, reads_at_most=1_000 * MILLI)
AT = Place("pools", "B7")


def array(name: str, **limits: int) -> Array:
    return replace(
        Array(name=name, reads_at_most=10**9, place=Place("arrays", name)),
        **limits,  # type: ignore[arg-type]
    )


BOTH = [array("depot"), array("quay")]


def whole(
    *volumes: Volume,
    pools: list[Pool] | None = None,
    arrays: list[Array] | None = None,
    rules: tuple[Rule, ...] = (),
) -> Estate:
    some = list(volumes) or [volume("a", "depot/slow", 50)]
    return replace(
        estate(some, pools or [SLOW, FAST], arrays=arrays or BOTH), rules=rules
    )


def found(fleet: Estate) -> list[str]:
    return [finding.code for finding in survey(candidates(fleet))]


def only(fleet: Estate) -> Finding:
    (finding,) = survey(candidates(fleet))
    assert finding.remedy
    return finding


def test_an_estate_in_order_has_no_findings() -> None:
    assert found(whole()) == []


def test_controllers_that_may_all_fail_are_an_error() -> None:
    """Two of which one may fail are enough."""
    none_left = array("depot", controllers=1, failures_survived=1)
    findings = survey(candidates(whole(arrays=[none_left, array("quay")])))
    assert findings[0].code == "controllers-left"
    assert findings[0].severity is Severity.ERROR
    assert findings[0].place == Place("arrays", "depot")
    two_left = array("depot", controllers=3, failures_survived=1)
    assert found(whole(arrays=[two_left, array("quay")])) == []


def test_a_volume_larger_than_every_pool_is_an_error() -> None:
    large = replace(volume("a", "quay/fast", 501), place=AT)
    findings = survey(candidates(whole(large)))
    assert [f.code for f in findings] == ["volume-too-large", "over-limit-today"]
    assert (findings[0].severity, findings[0].place) == (Severity.ERROR, AT)
    assert "quay/a" in findings[0].sentence


def test_a_volume_that_one_pool_can_hold_is_none() -> None:
    """Too large for its home only, or for the other pool only."""
    assert found(whole(volume("a", "quay/fast", 500))) == ["over-limit-today"]
    assert found(whole(volume("a", "depot/slow", 500))) == []


def test_a_home_that_could_be_enlarged_is_large_enough() -> None:
    step = Expansion(drives=10, price=1, at_most=1)
    larger = replace(SLOW, expansion=step)
    lone = volume("a", "depot/slow", 900)
    assert "volume-too-large" in found(whole(lone))
    assert "volume-too-large" not in found(whole(lone, pools=[larger, FAST]))


A, B, C = "depot/a", "depot/b", "depot/c"
PAIR = [volume("a", "depot/slow", 1), volume("b", "depot/slow", 1)]


def rule(
    kind: RuleKind, *names: str, to: tuple[str, ...] = (), level: Level = Level.POOL
) -> Rule:
    return Rule(
        kind=kind,
        volumes=names,
        pools=to,
        level=level,
        said=f"{kind} {level}",
        place=Place("rules", kind.value),
    )


def apart(level: Level, *names: str) -> Rule:
    return rule(RuleKind.APART, *names, level=level)


def together(level: Level, *names: str) -> Rule:
    return rule(RuleKind.TOGETHER, *names, level=level)


def only_on(*pools: str) -> Rule:
    return rule(RuleKind.ONLY_ON, A, to=pools)


def never_on(*pools: str) -> Rule:
    return rule(RuleKind.NEVER_ON, A, to=pools)


CONTRADICTING = [
    (apart(Level.POOL, A, B), together(Level.POOL, A, B)),
    (apart(Level.ARRAY, A, B), together(Level.ARRAY, B, A)),
    (apart(Level.ARRAY, A, B), together(Level.POOL, A, B)),
    (apart(Level.SITE, A, B), together(Level.ARRAY, A, B)),
    (apart(Level.SITE, A, B), together(Level.POOL, A, B)),
    (only_on("depot/slow"), only_on("quay/fast")),
    (only_on("quay/fast"), never_on("quay/fast")),
    (only_on("depot/slow", "quay/fast"), never_on("quay/fast", "depot/slow")),
]

AGREEING = [
    (apart(Level.POOL, A, B), together(Level.ARRAY, A, B)),
    (apart(Level.ARRAY, A, B), together(Level.SITE, A, B)),
    (apart(Level.POOL, A, B), together(Level.POOL, B, C)),
    (apart(Level.POOL, A, B), apart(Level.POOL, A, B)),
    (only_on("depot/slow", "quay/fast"), only_on("quay/fast")),
    (only_on("depot/slow", "quay/fast"), never_on("depot/slow")),
    (never_on("quay/fast"), never_on("depot/slow")),
    (only_on("depot/slow"), rule(RuleKind.ONLY_ON, B, to=("quay/fast",))),
]


@pytest.mark.parametrize("swapped", [False, True])
@pytest.mark.parametrize("pair", CONTRADICTING)
def test_rules_that_cannot_both_hold_are_an_error(
    pair: tuple[Rule, Rule], swapped: bool
) -> None:
    rules = pair[::-1] if swapped else pair
    finding = only(whole(*PAIR, volume("c", "depot/slow", 1), rules=rules))
    assert (finding.code, finding.severity) == ("rule-contradiction", Severity.ERROR)
    assert finding.place == rules[0].place
    assert all(each.said in finding.sentence for each in rules)
    assert str(rules[1].place) in finding.sentence


@pytest.mark.parametrize("swapped", [False, True])
@pytest.mark.parametrize("pair", AGREEING)
def test_rules_that_can_both_hold_are_none(
    pair: tuple[Rule, Rule], swapped: bool
) -> None:
    rules = pair[::-1] if swapped else pair
    assert found(whole(*PAIR, volume("c", "depot/slow", 1), rules=rules)) == []


@pytest.mark.parametrize("wish", [only_on("quay/fast"), never_on("depot/slow")])
def test_a_volume_to_stay_that_a_rule_sends_away_is_an_error(wish: Rule) -> None:
    held = replace(PAIR[0], stays=True, place=AT)
    finding = only(whole(held, rules=(wish,)))
    assert finding.code == "rule-contradiction"
    assert "depot/a is to be left where it is" in finding.sentence
    assert str(AT) in finding.sentence
    assert found(whole(replace(held, stays=False), rules=(wish,))) == []


@pytest.mark.parametrize("wish", [only_on("depot/slow"), never_on("quay/fast")])
def test_a_volume_to_stay_that_a_rule_leaves_at_home_is_none(wish: Rule) -> None:
    assert found(whole(replace(PAIR[0], stays=True), rules=(wish,))) == []


def test_a_pool_too_full_today_is_a_warning() -> None:
    """600 of 500 GiB, said with its figures at the pool's own cell."""
    slow = replace(SLOW, place=AT)
    volumes = [volume("a", "depot/slow", 300), volume("b", "depot/slow", 300)]
    finding = only(whole(*volumes, pools=[slow, FAST]))
    assert (finding.code, finding.severity) == ("over-limit-today", Severity.WARNING)
    assert finding.place == AT
    assert "room 600 of 500 GiB" in finding.sentence
    assert "600 of 500 GiB" in finding.sentence


def test_a_pool_filled_to_its_limit_is_none() -> None:
    assert found(whole(volume("a", "depot/slow", 500))) == []


def test_a_pool_too_full_at_the_horizon_only_is_none() -> None:
    """Today's limits are meant: what grows is the plan's affair."""
    thin = replace(volume("a", "depot/slow", 900), thin=True, occupied=499 * 2**30)
    growing = replace(thin, capacity_growth=PPM)
    fleet = replace(whole(growing), policy=policy(horizon_months=12))
    assert found(fleet) == []


def test_the_hour_of_busy_drives_is_said() -> None:
    """10 drives, 6 ms a read: 1500 reads/s are 90 % of 70."""
    hours = load(10, kib=0), load(1_500, kib=0)
    finding = only(whole(volume("a", "depot/slow", 1, *hours)))
    assert "90 of 70 %" in finding.sentence
    assert "01:00" in finding.sentence


def test_an_array_with_too_many_volumes_or_hosts_is_a_warning() -> None:
    named = [
        replace(each, host=host)
        for each, host in zip(PAIR, ("crane", "pilot"), strict=True)
    ]
    for limit in ("volumes_at_most", "hosts_at_most"):
        tight = [array("depot", **{limit: 1}), array("quay")]
        finding = only(whole(*named, arrays=tight))
        assert finding.code == "over-limit-today"
        assert finding.place == Place("arrays", "depot")
        assert "2 of 1" in finding.sentence
        wide = [array("depot", **{limit: 2}), array("quay")]
        assert found(whole(*named, arrays=wide)) == []


def test_a_pool_whose_load_nobody_limits_is_a_warning() -> None:
    bare = pool("depot/slow", Media.SPINNING, 500)
    finding = only(whole(pools=[replace(bare, place=AT), FAST]))
    assert (finding.code, finding.severity) == ("no-busy-limit", Severity.WARNING)
    assert finding.place == AT
    boxed = replace(bare, requests_at_most=1_000 * MILLI)
    heap = replace(bare, media=Media.MIXED)
    assert found(whole(pools=[boxed, FAST])) == []
    assert found(whole(pools=[heap, FAST])) == []


def test_an_array_whose_controllers_nobody_limits_is_a_note() -> None:
    finding = only(whole(arrays=[array("depot"), array("quay", reads_at_most=0)]))
    assert (finding.code, finding.severity) == ("no-controller-limit", Severity.NOTE)
    assert finding.place == Place("arrays", "quay")


@pytest.mark.parametrize(
    ("hosts", "codes"),
    [
        ((Host(name="crane", arrays=("quay",)),), ["host-unreached"]),
        ((Host(name="crane", arrays=("quay", "depot")),), []),
        ((Host(name="crane"),), []),
        ((Host(name="pilot", arrays=("quay",)),), []),
    ],
)
def test_a_host_that_uses_what_it_does_not_reach_is_a_warning(
    hosts: tuple[Host, ...], codes: list[str]
) -> None:
    fleet = replace(whole(replace(PAIR[0], host="crane", place=AT)), hosts=hosts)
    assert found(fleet) == codes
    if codes:
        assert only(fleet).place == AT
        assert only(fleet).severity is Severity.WARNING


NIGHT = window(5)


@pytest.mark.parametrize(
    ("wishes", "codes"),
    [
        (policy(), []),
        (policy(earliest=NIGHT.end - 1), []),
        (policy(earliest=NIGHT.end), ["no-window"]),
        (policy(finish_by=NIGHT.start + 1), []),
        (policy(finish_by=NIGHT.start), ["no-window"]),
        (policy(finish_by=START), ["no-window"]),
    ],
)
def test_windows_outside_lead_and_finish_are_a_warning(
    wishes: Policy, codes: list[str]
) -> None:
    fleet = replace(whole(), windows=(NIGHT,), policy=wishes)
    assert found(fleet) == codes


def test_no_windows_at_all_are_a_warning() -> None:
    finding = only(replace(whole(), windows=()))
    assert (finding.code, finding.severity) == ("no-window", Severity.WARNING)
