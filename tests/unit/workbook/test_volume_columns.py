"""Volumes: tenant, sequential reads, read hits, snapshots; blank is the safe case."""

from pathlib import Path

import pytest
from sheetfiles import estate, intake, least, only_error

from placer.estate import Volume
from placer.units import GIB, KIB, MIB

Sheets = dict[str, list[list[object]]]
EFFECT = "decides how much load a pool or an array carries"


def with_columns(**cells: object) -> Sheets:
    """Return the least inventory; the first volume has the cells, the others none."""
    sheets = least()
    sheets["volumes"][0] += list(cells)
    sheets["volumes"][1] += list(cells.values())
    return sheets


def volume(tmp_path: Path, **cells: object) -> Volume:
    return estate(tmp_path, with_columns(**cells)).volumes[0]


def test_what_is_typed_is_read(tmp_path: Path) -> None:
    found = volume(
        tmp_path,
        **{
            "tenant": "ferries",
            "random reads (%)": "12.5%",
            "read hits (%)": 40,
            "snapshots (GiB)": 12.5,
            "snapshot days": 30,
        },
    )
    assert (found.random_reads, found.read_hits) == (125_000, 400_000)
    assert (found.snapshots, found.snapshot_days) == (25 * GIB // 2, 30)
    assert found.tenant == "ferries"


def test_a_blank_cell_is_random_missed_and_without_snapshots(tmp_path: Path) -> None:
    blank = estate(tmp_path, with_columns(**{"read hits (%)": 40})).volumes[1]
    assert (blank.random_reads, blank.read_hits) == (1_000_000, 0)
    assert (blank.snapshots, blank.snapshot_days, blank.tenant) == (0, 0, "")


def test_blank_shares_are_assumptions_that_count_the_cells(tmp_path: Path) -> None:
    sheets = with_columns(**{"random reads (%)": 20, "read hits (%)": 40})
    assumed = {a.column: a for a in estate(tmp_path, sheets).assumptions}
    for column, value in (("random reads", "100 %"), ("read hits", "0 %")):
        found = assumed[column]
        assert (found.value, found.cells, found.effect) == (value, 2, EFFECT)
    assert (assumed["snapshots"].value, assumed["snapshots"].cells) == ("0 GiB", 3)


def test_days_are_read_without_snapshots_too(tmp_path: Path) -> None:
    assert volume(tmp_path, **{"snapshot days": 30}).snapshot_days == 30


def test_days_are_assumed_only_for_snapshots_there_are(tmp_path: Path) -> None:
    sheets = with_columns(**{"snapshots (GiB)": 5})
    assumed = {a.column: a.cells for a in estate(tmp_path, sheets).assumptions}
    assert assumed["snapshot days"] == 1


def test_shares_are_rounded_to_the_safe_side(tmp_path: Path) -> None:
    """Random reads cost more (up), hits save (down)."""
    found = volume(
        tmp_path, **{"random reads (%)": "33.33333%", "read hits (%)": "33.33333%"}
    )
    assert (found.random_reads, found.read_hits) == (333_334, 333_333)


@pytest.mark.parametrize("column", ["random reads (%)", "read hits (%)"])
@pytest.mark.parametrize(("typed", "code"), [(101, "bounds"), (0.5, "percent")])
def test_a_share_above_all_or_without_its_sign_is_asked(
    tmp_path: Path, column: str, typed: object, code: str
) -> None:
    error = only_error(intake(tmp_path, with_columns(**{column: typed})))
    assert (error.code, error.place.cell) == (code, "I2")


def test_large_requests_are_a_share_and_a_size(tmp_path: Path) -> None:
    found = volume(tmp_path, **{"large share (%)": "2.5%", "large size (KiB)": 256})
    assert (found.large_share, found.large_size) == (25_000, 256 * KIB)
    plain = volume(tmp_path)
    assert (plain.large_share, plain.large_size) == (0, 0)


def test_large_size_may_be_in_mib(tmp_path: Path) -> None:
    found = volume(tmp_path, **{"large share (%)": "1%", "large size (MiB)": 1})
    assert found.large_size == MIB


@pytest.mark.parametrize(
    ("share", "size", "cell"),
    [("5%", None, "J2"), (None, 256, "I2"), (0, 256, "I2"), ("5%", 0, "J2")],
)
def test_a_large_share_needs_a_large_size_and_the_other_way_round(
    tmp_path: Path, share: object, size: object, cell: str
) -> None:
    sheets = with_columns(**{"large share (%)": share, "large size (KiB)": size})
    error = only_error(intake(tmp_path, sheets))
    assert (error.code, error.place.cell) == ("blank", cell)


def test_large_requests_are_not_below_the_mean(tmp_path: Path) -> None:
    """24.5 MB/s in 1500 requests/s are 15.95 KiB each."""
    for size, there in ((15, 1), (16, 0)):
        sheets = with_columns(**{"large share (%)": "5%", "large size (KiB)": size})
        found = intake(tmp_path, sheets).findings
        assert [(f.code, f.place.cell) for f in found] == [("bounds", "J2")] * there


def test_large_requests_above_the_throughput_are_said(tmp_path: Path) -> None:
    """10 % of 160 KiB are 16 KiB, of 15.95 KiB in the mean; 9 % are 14.4 KiB."""
    for share, there in ((10, 1), (9, 0)):
        sheets = with_columns(**{"large share (%)": share, "large size (KiB)": 160})
        found = intake(tmp_path, sheets)
        assert found.estate is not None
        said = [(f.severity, f.code, f.place.cell) for f in found.findings]
        assert said == [("warning", "size", "I2")] * there


@pytest.mark.parametrize("typed", [-1, 2.5, "a week"])
def test_snapshot_days_are_whole_and_not_negative(
    tmp_path: Path, typed: object
) -> None:
    error = only_error(intake(tmp_path, with_columns(**{"snapshot days": typed})))
    assert error.place.cell == "I2"


def test_snapshots_in_gb_are_asked_as_every_size_is(tmp_path: Path) -> None:
    sheets = with_columns(**{"snapshots (GB)": 10})
    assert only_error(intake(tmp_path, sheets)).code == "unit"


def test_a_role_that_is_none_is_refused_with_the_words_there_are(
    tmp_path: Path,
) -> None:
    error = only_error(intake(tmp_path, with_columns(role="journal")))
    assert (error.code, error.place.cell) == ("cell", "I2")
    assert "quorum" in error.remedy


def test_unknown_caches_are_said_where_any_read_hits_one(tmp_path: Path) -> None:
    def unknown(hits: int, *caches: list[object]) -> list[int]:
        sheets = with_columns(**{"read hits (%)": hits})
        sheets["arrays"] = [["array", "cache (GiB)"], *caches]
        assumed = estate(tmp_path, sheets).assumptions
        return [a.cells for a in assumed if a.column == "cache"]

    assert unknown(40, ["K", None]) == [2]
    assert unknown(40, ["K", 256]) == [1]
    assert unknown(40, ["K", 256], ["L", 64]) == []
    assert unknown(0, ["K", None]) == []
