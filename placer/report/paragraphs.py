"""Plain text in lines of a given width: paragraphs and tables."""

from collections.abc import Sequence
from textwrap import wrap

_GAP = "  "
_GLUED = "\N{NO-BREAK SPACE}%"


def paragraph(text: str, width: int, first: str = "", rest: str = "") -> list[str]:
    """Return text in lines no longer than the width, a long word cut if it must be.

    No line begins with a percent sign that belongs to the number before it.
    """
    lines = wrap(
        text.replace(" %", _GLUED),
        width,
        initial_indent=first,
        subsequent_indent=rest,
        break_on_hyphens=False,
    )
    return [line.replace(_GLUED, " %") for line in lines]


def table(rows: Sequence[Sequence[str]], width: int) -> list[str]:
    """Return rows in columns: the first to the left, the others to the right.

    The first column gives way where the width is too small.
    """
    widths = [max(map(len, column)) for column in zip(*rows, strict=True)]
    others = sum(widths[1:]) + len(_GAP) * (len(widths) - 1)
    widths[0] = min(widths[0], max(width - others, 1))
    return [_line(row, widths) for row in rows]


def _line(row: Sequence[str], widths: Sequence[int]) -> str:
    first = shortened(row[0], widths[0]).ljust(widths[0])
    others = [cell.rjust(w) for cell, w in zip(row[1:], widths[1:], strict=True)]
    return _GAP.join((first, *others)).rstrip()


def shortened(text: str, width: int) -> str:
    """Return text cut to a width, with a sign that something is missing."""
    return text if len(text) <= width else text[: width - 1] + "\N{HORIZONTAL ELLIPSIS}"
