"""The fingerprint tells apart what the estate would tell apart."""

from placer.workbook.columns import sheet
from placer.workbook.reading.digest import digest
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.table import Row
from placer.workbook.reading.values import Value


def row(name: str = "volumes", **values: Value) -> Row:
    return Row(sheet(name), values, {}, frozenset(), Remarks())


def test_values_of_one_row_differ_from_the_same_in_two() -> None:
    one = [row(array="K", volume="db01")]
    two = [row(array="K"), row(volume="db01")]
    assert digest([one]) != digest([two])


def test_the_order_of_columns_makes_no_difference() -> None:
    one, other = row(array="K", volume="db01"), row(volume="db01", array="K")
    assert digest([[one]]) == digest([[other]])


def test_sheet_and_column_count() -> None:
    found = {
        digest([[row(array="K")]]),
        digest([[row(volume="K")]]),
        digest([[row("pools", array="K")]]),
        digest([[]]),
    }
    assert len(found) == 4
