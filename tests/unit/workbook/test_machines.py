"""Arrays, hosts and routes: defaults, and names that must be known."""

from pathlib import Path

import pytest
from sheetfiles import estate, intake, least, only_error

from placer.units import GIB, MB

Sheets = dict[str, list[list[object]]]


def with_sheet(name: str, *lines: list[object]) -> Sheets:
    return least() | {name: list(lines)}


def test_an_array_without_a_row_has_every_default(tmp_path: Path) -> None:
    array = estate(tmp_path, least()).arrays[0]
    assert (array.controllers, array.failures_survived) == (2, 1)
    assert (array.controller_ceiling, array.uneven) == (700_000, 1_150_000)
    assert (array.write_answer, array.copies_at_once) == (500, 2)
    assert (array.copies_in, array.copies_out) == (200 * MB, 200 * MB)
    assert (array.reads_at_most, array.volumes_at_most) == (0, 0)


@pytest.mark.parametrize(
    ("together_in", "together_out", "at_once", "one_copy"),
    [
        (200, 200, 2, 200 * MB),
        (200, 100, 3, 50 * MB),
        (100, 200, 5, 33_333_333),
        (90, 200, 1, 90 * MB),
    ],
)
def test_one_copy_gets_two_shares_of_all(
    tmp_path: Path, together_in: int, together_out: int, at_once: int, one_copy: int
) -> None:
    sheets = with_sheet(
        "arrays",
        [
            *("array", "all copies in together (MB/s)"),
            *("all copies out together (MB/s)", "copies at once"),
        ],
        ["K", together_in, together_out, at_once],
    )
    assert estate(tmp_path, sheets).arrays[0].one_copy == one_copy


def test_more_failures_than_controllers_is_an_error(tmp_path: Path) -> None:
    sheets = with_sheet("arrays", ["array", "controllers"], ["K", 1])
    assert only_error(intake(tmp_path, sheets)).code == "bounds"


@pytest.mark.parametrize(
    ("sheet", "head", "row"),
    [
        ("hosts", ["host", "arrays reached"], ["h1", "K; M"]),
        ("routes", ["from", "to"], ["K", "M"]),
        ("control", ["what", "volumes"], ["M", 1]),
    ],
)
def test_arrays_named_elsewhere_must_be_known(
    tmp_path: Path, sheet: str, head: list[object], row: list[object]
) -> None:
    error = only_error(intake(tmp_path, with_sheet(sheet, head, row)))
    assert (error.code, error.place.sheet) == ("unknown", sheet)


def test_a_host_that_is_not_listed_is_said_where_others_are(tmp_path: Path) -> None:
    sheets = with_sheet("hosts", ["host", "arrays reached"], ["h1", None])
    sheets["volumes"][0].append("host")
    for row, host in zip(sheets["volumes"][1:], ("h1", "h2", "h2"), strict=True):
        row.append(host)
    found = intake(tmp_path, sheets)
    assert found.estate is not None
    assert found.estate.hosts[0].arrays == ()
    assert [(f.severity, f.code) for f in found.findings] == [("warning", "unknown")]
    del sheets["hosts"]
    assert intake(tmp_path, sheets).findings == ()
    sheets["volumes"][1][-1] = "H2"
    assert only_error(intake(tmp_path, sheets)).code == "id"


def test_what_an_array_answers_from_its_cache(tmp_path: Path) -> None:
    sheets = with_sheet(
        "arrays",
        [
            "array",
            "read hit answer (us)",
            "cache (GiB)",
            "controller busy measured (%)",
        ],
        ["K", 150, 256, 44],
    )
    typed, blank = estate(tmp_path, sheets).arrays
    assert (typed.read_hit_answer, typed.cache) == (150, 256 * GIB)
    assert typed.busy_measured == 440_000
    assert (blank.read_hit_answer, blank.cache, blank.busy_measured) == (200, 0, 0)


def test_a_cache_in_gb_is_asked(tmp_path: Path) -> None:
    sheets = with_sheet("arrays", ["array", "cache (GB)"], ["K", 256])
    assert only_error(intake(tmp_path, sheets)).code == "unit"


def test_a_host_that_names_no_arrays_is_an_assumption(tmp_path: Path) -> None:
    sheets = with_sheet(
        "hosts", ["host", "arrays reached"], ["h1", "K"], ["h2", None], ["h3", None]
    )
    found = estate(tmp_path, sheets)
    assert [host.arrays for host in found.hosts] == [("K",), (), ()]
    said = [a for a in found.assumptions if a.column == "arrays reached"]
    assert [(a.sheet, a.value, a.cells) for a in said] == [("hosts", "every array", 2)]
    assert "arrays a volume may move to" in said[0].effect


def test_what_a_read_hit_takes_is_assumed_only_where_reads_hit(tmp_path: Path) -> None:
    def assumed(hits: object, *answers: list[object]) -> list[tuple[str, int]]:
        sheets = with_sheet("arrays", ["array", "read hit answer (us)"], *answers)
        sheets["volumes"][0].append("read hits (%)")
        sheets["volumes"][1].append(hits)
        found = estate(tmp_path, sheets)
        assert found.arrays[1].read_hit_answer == 200
        return [
            (a.value, a.cells)
            for a in found.assumptions
            if a.column == "read hit answer"
        ]

    assert assumed(40, ["K", None]) == [("200 us", 2)]
    assert assumed(40, ["K", 150]) == [("200 us", 1)]
    assert assumed(0, ["K", None]) == []
    assert assumed(None, ["K", 150]) == []
