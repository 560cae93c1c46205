"""Values of cells once they are understood."""

from dataclasses import dataclass
from datetime import date, time
from decimal import Decimal
from fractions import Fraction


@dataclass(frozen=True, slots=True)
class Quantity:
    """A number as typed, and how many small units one of its unit holds."""

    number: Decimal
    scale: int

    @property
    def exact(self) -> Fraction:
        """Return it in small units, unrounded."""
        return Fraction(self.number) * self.scale


Value = str | bool | int | Quantity | date | time | tuple[str, ...]


class CellFaultError(ValueError):
    """A cell cannot be understood: a code, a sentence and a remedy."""

    def __init__(self, code: str, sentence: str, remedy: str = "") -> None:
        super().__init__(sentence)
        self.code = code
        self.sentence = sentence
        self.remedy = remedy


class GbUnknownError(CellFaultError):
    """A cell says GB where it may mean 10^9 or 2^30 bytes."""
