"""Units of headings.

Sources: IEC 80000-13 (binary prefixes), SI brochure 9th edition, table 7 (decimal
prefixes), both from memory; a byte is 8 bits.
"""

import pytest

from placer.workbook.column import Column
from placer.workbook.columns import sheet
from placer.workbook.reading.scales import asks_gb, scale, unit_named


def column(sheet_name: str, name: str) -> Column:
    return sheet(sheet_name).column(name)


@pytest.mark.parametrize(
    ("unit", "size"),
    [
        *(("KiB", 1024), ("MiB", 1_048_576), ("GiB", 1_073_741_824)),
        *(("TiB", 1_099_511_627_776), ("PiB", 1_125_899_906_842_624)),
        *(("KB", 1000), ("MB", 1_000_000), ("GB", 1_000_000_000)),
        ("TB", 1_000_000_000_000),
    ],
)
def test_sizes_are_those_of_the_standards(unit: str, size: int) -> None:
    assert scale(column("pools", "drive size"), unit) == size


@pytest.mark.parametrize(
    ("unit", "rate"),
    [("Mbit/s", 125_000), ("Gbit/s", 125_000_000), ("MiB/s", 1_048_576)],
)
def test_bits_are_eighths_of_bytes(unit: str, rate: int) -> None:
    assert scale(column("volumes", "throughput"), unit) == rate


@pytest.mark.parametrize(
    ("spelt", "unit"),
    [
        *(("Mb/s", "Mbit/s"), ("MB/s", "MB/s"), ("Mbps", "Mbit/s"), ("MBps", "MB/s")),
        *(("IOPS", "1/s"), ("\u00b5s", "us"), ("\u03bcs", "us"), ("gib", "GiB")),
        *(("1/s per drive", "1/s"), ("MB/s per controller", "MB/s")),
    ],
)
def test_spellings_of_the_trade_are_known(spelt: str, unit: str) -> None:
    assert unit_named(spelt) == unit


@pytest.mark.parametrize("spelt", ["mb/s", "mbps", "blocks", "", "furlongs"])
def test_a_unit_that_could_be_bits_or_bytes_is_not_guessed(spelt: str) -> None:
    assert unit_named(spelt) is None


def test_a_unit_of_another_kind_does_not_fit() -> None:
    assert scale(column("volumes", "throughput"), "GiB") is None
    assert scale(column("volumes", "reads"), "1/s") is None


def test_only_a_heading_that_should_say_gib_asks_what_gb_means() -> None:
    assert asks_gb(column("volumes", "provisioned"), "GB")
    assert asks_gb(column("volumes", "provisioned"), "TB")
    assert not asks_gb(column("volumes", "provisioned"), "TiB")
    assert not asks_gb(column("pools", "drive size"), "TB")
