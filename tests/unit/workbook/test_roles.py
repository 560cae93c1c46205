"""Roles become rules: logs apart from their data, quorums from their cluster's."""

from pathlib import Path

import pytest
from sheetfiles import estate, intake, least

from placer.estate import Level, Rule, RuleKind
from placer.findings import Place

Sheets = dict[str, list[list[object]]]
Told = tuple[str, str | None, str | None, str | None]


def sheets(*told: Told) -> Sheets:
    """Return volumes of name, role, application and host, all in pool K/S1."""
    made = least()
    head, row = made["volumes"][:2]
    made["volumes"] = [[*head, "role", "application", "host"]]
    made["volumes"] += [["K", name, *row[2:], *rest] for name, *rest in told]
    return made


def rules(tmp_path: Path, *told: Told) -> tuple[Rule, ...]:
    return estate(tmp_path, sheets(*told)).rules


def pairs(found: tuple[Rule, ...]) -> list[tuple[str, ...]]:
    return [rule.volumes for rule in found]


def test_a_log_is_apart_from_each_data_volume_of_its_application(
    tmp_path: Path,
) -> None:
    found = rules(
        tmp_path,
        ("d1", None, "booking", None),
        ("d2", "Data", "booking", None),
        ("l", "log", "booking", None),
        ("other", None, "mail", None),
    )
    assert pairs(found) == [("K/l", "K/d1"), ("K/l", "K/d2")]
    assert {(rule.kind, rule.level) for rule in found} == {(RuleKind.APART, Level.POOL)}
    assert found[0].place == Place("volumes", "I4")
    assert found[0].said == "log K/l of application booking apart from its data K/d1"


def test_data_volumes_may_share_a_pool_and_so_may_logs(tmp_path: Path) -> None:
    told = [(f"d{n}", None, "booking", None) for n in range(3)]
    logs = [(f"l{n}", "log", "booking", None) for n in range(2)]
    found = pairs(rules(tmp_path, *told, *logs))
    assert found == [(f"K/l{m}", f"K/d{n}") for m in range(2) for n in range(3)]


@pytest.mark.parametrize(
    "role", ["log", "boot", "replica", "clone parent", "backup", "quorum"]
)
def test_only_data_keeps_a_log_away(tmp_path: Path, role: str) -> None:
    told: Told = ("x", role, "booking", "h1")
    assert rules(tmp_path, ("l", "log", "booking", "h2"), told) == ()


def test_a_log_of_two_applications_names_each_data_volume_once(
    tmp_path: Path,
) -> None:
    found = rules(
        tmp_path,
        ("d1", None, "booking; tickets", None),
        ("d2", None, "tickets", None),
        ("l", "log", "booking; tickets", None),
    )
    assert pairs(found) == [("K/l", "K/d1"), ("K/l", "K/d2")]


def test_a_quorum_is_on_another_array_than_the_data_of_its_cluster(
    tmp_path: Path,
) -> None:
    made = sheets(
        ("d1", None, None, "h1"),
        ("d2", None, None, "h2"),
        ("d3", None, None, "h3"),
        ("q", "quorum", None, "h1"),
    )
    made["hosts"] = [["host", "cluster"], ["h1", "bridge"], ["h2", "bridge"]]
    made["hosts"] += [["h3", "engine"]]
    found = estate(tmp_path, made).rules
    assert pairs(found) == [("K/q", "K/d1"), ("K/q", "K/d2")]
    assert {(rule.kind, rule.level) for rule in found} == {
        (RuleKind.APART, Level.ARRAY)
    }
    assert "cluster bridge" in found[0].said


def test_without_a_cluster_the_host_stands_for_it(tmp_path: Path) -> None:
    made = sheets(
        ("d1", None, None, "h1"),
        ("d2", None, None, "h2"),
        ("q", "quorum", None, "h1"),
    )
    assert pairs(estate(tmp_path, made).rules) == [("K/q", "K/d1")]
    made["hosts"] = [["host", "cluster"], ["h2", "h1"], ["h1", None]]
    assert pairs(estate(tmp_path, made).rules) == [("K/q", "K/d1")]


def test_clusters_told_apart_by_case_alone_are_refused(tmp_path: Path) -> None:
    made = sheets(("d1", None, None, "h1"))
    made["hosts"] = [["host", "cluster"], ["h1", "bridge"], ["h2", "Bridge"]]
    assert [f.code for f in intake(tmp_path, made).findings] == ["id"]


@pytest.mark.parametrize(
    ("told", "cell"),
    [
        (("l", "log", None, "h1"), "J2"),
        (("q", "quorum", "booking", None), "K2"),
    ],
)
def test_a_role_whose_data_is_not_known_is_said(
    tmp_path: Path, told: Told, cell: str
) -> None:
    found = intake(tmp_path, sheets(told))
    assert found.estate is not None
    said = [(f.severity, f.code, f.place.cell) for f in found.findings]
    assert said == [("warning", "blank", cell)]


def test_written_rules_stand_before_those_of_roles(tmp_path: Path) -> None:
    made = sheets(("d1", None, "booking", None), ("l", "log", "booking", None))
    made["rules"] = [["what", "rule", "where"], ["role log", "only on", "media flash"]]
    found = estate(tmp_path, made).rules
    assert [rule.volumes for rule in found] == [("K/l",), ("K/l", "K/d1")]
    assert found[0].pools == ("L/F1",)


def test_a_rule_on_a_role_nobody_has_is_said(tmp_path: Path) -> None:
    made = sheets(("d1", None, None, None))
    made["rules"] = [["what", "rule", "where"], ["role log", "only on", "media flash"]]
    found = intake(tmp_path, made)
    assert found.estate is not None
    assert [(f.severity, f.code, f.place.cell) for f in found.findings] == [
        ("warning", "unknown", "A2")
    ]


def test_a_rule_may_name_a_tenant(tmp_path: Path) -> None:
    made = sheets(("d1", None, None, None), ("d2", None, None, None))
    made["volumes"][0].append("tenant")
    made["volumes"][2].append("ferries")
    made["tenants"] = [["tenant"], ["ferries"]]
    made["rules"] = [["what", "rule", "where"]]
    made["rules"] += [["tenant ferries", "never on", "array L"]]
    assert estate(tmp_path, made).rules[0].volumes == ("K/d2",)
