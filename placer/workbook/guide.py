"""The guide inside the empty inventory: which sheet, which columns first."""

from collections.abc import Iterator

from placer.workbook.columns import SHEETS

_EXAMPLES = (
    (
        "volumes",
        "K | db01 | S1 | 2000 | 1400 | 1500 | 70 % | 24.5",
        "array | volume | pool | provisioned | occupied | requests | reads | "
        "throughput",
    ),
    (
        "pools",
        "S1 | K | spinning | 24 | 5 | 1 | 1200",
        "pool | array | media | drives without spares | data per stripe | parity per "
        "stripe | drive size",
    ),
    (
        "policy",
        "start date | 2026-03-02",
        "setting | value",
    ),
)


def lines() -> Iterator[tuple[str, bool]]:
    """Yield the lines of the guide, and whether each is a heading."""
    yield "Inventory of volumes, pools and arrays", True
    yield from (
        (text, False)
        for text in (
            "Fill in volumes and pools first, one row each. Every other sheet can stay "
            "empty: what a blank cell means is in the note on its heading, and placer "
            "lists every default it used.",
            "Keep the headings and their units. Columns may be moved or left out, and "
            "columns of your own are not used.",
            "Write shares with a percent sign (25 %) or as a number above 1; reduction "
            "as 2 or 2:1; dates as 2026-03-02; times as 22:00.",
            "Array and volume together are the key of a volume: write names the same "
            "everywhere, also in upper and lower case.",
        )
    )
    yield from _sheets()
    yield from _examples()


def _sheets() -> Iterator[tuple[str, bool]]:
    for sheet in SHEETS:
        needed = ", ".join(c.header for c in sheet.columns if c.required)
        yield f"{sheet.name}{' (needed)' if sheet.required else ''}", True
        yield f"{sheet.meaning[0].upper()}{sheet.meaning[1:]}.", False
        yield f"Fill in at least: {needed}.", False


def _examples() -> Iterator[tuple[str, bool]]:
    yield "Examples of rows", True
    for name, row, headings in _EXAMPLES:
        yield f"{name}: {headings}", False
        yield f"{name}: {row}", False
