"""Rules: volumes and pools are looked up, wrong words are said."""

from pathlib import Path

import pytest
from sheetfiles import estate, intake, least, only_error

from placer.estate import Level, Rule, RuleKind

Sheets = dict[str, list[list[object]]]


def sheets(what: object, rule: object, where: object = None) -> Sheets:
    made = least()
    made["volumes"][0] += ["application", "host"]
    made["volumes"][1] += ["tickets; gates", "h1"]
    made["volumes"][2] += ["gates", "h2"]
    made["arrays"] = [["array", "site"], ["K", "harbour"], ["L", "inland"]]
    made["rules"] = [["what", "rule", "where", "why"], [what, rule, where, "so"]]
    return made


def rule(tmp_path: Path, what: str, kind: str, where: str | None = None) -> Rule:
    return estate(tmp_path, sheets(what, kind, where)).rules[0]


@pytest.mark.parametrize(
    ("what", "volumes"),
    [
        ("volume K/db01; L/web01", ("K/db01", "L/web01")),
        ("Application gates", ("K/db01", "K/db02")),
        ("application tickets; gates", ("K/db01", "K/db02")),
        ("host h2", ("K/db02",)),
    ],
)
def test_what_names_volumes(
    tmp_path: Path, what: str, volumes: tuple[str, ...]
) -> None:
    found = rule(tmp_path, what, "never on", "array L")
    assert found.kind is RuleKind.NEVER_ON
    assert found.volumes == volumes
    assert found.said == f"{what} never on array L"
    assert found.why == "so"


@pytest.mark.parametrize(
    ("where", "pools"),
    [
        ("pool K/S1; L/F1", ("K/S1", "L/F1")),
        ("media flash", ("L/F1",)),
        ("media mixed", ()),
        ("array K", ("K/S1",)),
        ("site inland", ("L/F1",)),
    ],
)
def test_where_names_pools(tmp_path: Path, where: str, pools: tuple[str, ...]) -> None:
    assert rule(tmp_path, "volume K/db01", "never on", where).pools == pools


@pytest.mark.parametrize(
    ("where", "level"),
    [(None, Level.POOL), ("Array", Level.ARRAY), ("site", Level.SITE)],
)
def test_apart_and_together_have_a_level(
    tmp_path: Path, where: str | None, level: Level
) -> None:
    assert rule(tmp_path, "application gates", "together", where).level is level


@pytest.mark.parametrize(
    ("what", "kind", "where", "code"),
    [
        ("K/db01", "never on", "array L", "cell"),
        ("volume", "never on", "array L", "cell"),
        ("volume K/db09", "never on", "array L", "unknown"),
        ("host H1", "never on", "array L", "id"),
        ("volume K/db01", "never on", "array M", "unknown"),
        ("volume K/db01", "only on", "moon", "cell"),
        ("volume K/db01", "only on", None, "cell"),
        ("volume K/db01", "only on", "media mixed", "unknown"),
        ("volume K/db01; K/db09", "apart", None, "unknown"),
        ("volume K/db01", "near", "array L", "cell"),
        ("volume K/db01", "apart", None, "cell"),
        ("application gates", "apart", "rack", "cell"),
    ],
)
def test_wrong_words_are_said(
    tmp_path: Path, what: str, kind: str, where: str | None, code: str
) -> None:
    error = only_error(intake(tmp_path, sheets(what, kind, where)))
    assert (error.code, error.place.sheet) == (code, "rules")


def test_apart_by_site_needs_sites(tmp_path: Path) -> None:
    made = sheets("application gates", "apart", "site")
    made["arrays"][1][1] = None
    error = only_error(intake(tmp_path, made))
    assert error.code == "blank"
    assert "K" in error.sentence
