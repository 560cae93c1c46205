"""Does the model explain today: modelled against measured, as text for a terminal."""

from collections.abc import Iterator, Sequence
from math import isfinite
from statistics import median
from typing import Protocol

from placer.report.paragraphs import paragraph, table

_TITLE = "Does the model explain today?"
_RESPONSE = "response"
_BUSY = ("busiest hour", "modelled", "measured", "measured / modelled")
_RESPONSES = ("median response", *_BUSY[1:], "volumes")


class Compared(Protocol):
    """One figure as modelled and as measured, in ``unit``.

    ``what`` is ``pool busy``, ``controller busy`` or ``response``; only a response has
    ``volumes``, how many were measured, and ``worst``, the one farthest off.
    """

    @property
    def where(self) -> str:
        """Id of the pool, or name of the array."""

    @property
    def what(self) -> str:
        """What is compared."""

    @property
    def modelled(self) -> float:
        """What the model says."""

    @property
    def measured(self) -> float:
        """What was measured."""

    @property
    def unit(self) -> str:
        """Unit of both."""

    @property
    def volumes(self) -> int:
        """Number of volumes measured."""

    @property
    def worst(self) -> str:
        """Id of the volume farthest off."""

    @property
    def ratio(self) -> float:
        """Measured over modelled; infinite where the model says nothing."""

    @property
    def near(self) -> bool:
        """Whether the model explains the measurement."""


def today_lines(compared: Sequence[Compared], width: int) -> list[str]:
    """Return busy shares, responses and how near the model comes, in lines."""
    if not compared:
        said = "Nothing to compare: no busy share and no response was measured."
        return [_TITLE, *paragraph(said, width, "  ", "  ")]
    busy = [each for each in compared if each.what != _RESPONSE]
    responses = [each for each in compared if each.what == _RESPONSE]
    return [
        _TITLE,
        *_table(_BUSY, [_figures(each) for each in busy], width),
        *_table(
            _RESPONSES,
            [(*_figures(each), f"{each.volumes:,}") for each in responses],
            width,
        ),
        *_worst(responses, width),
        *paragraph(_accuracy(compared), width, "  ", "  "),
    ]


def _table(
    heads: Sequence[str], rows: Sequence[Sequence[str]], width: int
) -> Iterator[str]:
    if rows:
        yield from (f"  {line}" for line in table([heads, *rows], width - 2))


def _figures(each: Compared) -> tuple[str, str, str, str]:
    named = each.where if each.what == _RESPONSE else f"{each.where}, {each.what}"
    return (
        named,
        f"{each.modelled:.3g} {each.unit}",
        f"{each.measured:.3g} {each.unit}",
        f"{each.ratio:.2f}" if isfinite(each.ratio) else "-",
    )


def _worst(responses: Sequence[Compared], width: int) -> list[str]:
    named = "; ".join(f"{each.worst} in {each.where}" for each in responses)
    said = f"Farthest off: {named}." if named else ""
    return paragraph(said, width, "  ", "      ")


def _accuracy(compared: Sequence[Compared]) -> str:
    """Say how many figures the model explains, and how far measurements spread."""
    near = sum(each.near for each in compared)
    said = f"The model explains {near} of {len(compared)} figures"
    ratios = [each.ratio for each in compared if isfinite(each.ratio)]
    if ratios:
        said += (
            f": measured is {min(ratios):.2f} to {max(ratios):.2f} of modelled, "
            f"{median(ratios):.2f} in the middle"
        )
    rest = " What it does not explain is a warning below."
    return f"{said}.{rest if near < len(compared) else ''}"
