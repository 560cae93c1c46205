"""Numbers as people and programs write them: exact, or refused."""

import re
from decimal import Decimal

_PLAIN = re.compile(r"[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d{1,3})?")
_AMBIGUOUS = re.compile(r"[+-]?[1-9]\d{0,2},\d{3}")
_GROUPED = (
    re.compile(r"[+-]?\d{1,3}(?P<mark>,)\d{3}(,\d{3})*(?P<point>\.)\d+"),
    re.compile(r"[+-]?\d{1,3}(?P<mark>\.)\d{3}(\.\d{3})*(?P<point>,)\d+"),
    re.compile(r"[+-]?\d{1,3}(?P<mark>,)\d{3}(,\d{3})+(?P<point>)"),
    re.compile(r"[+-]?\d{1,3}(?P<mark>\.)\d{3}(\.\d{3})+(?P<point>)"),
    re.compile(r"[+-]?\d{1,3}(?P<mark>[ '\u2019])\d{3}((?P=mark)\d{3})*(?P<point>)"),
    re.compile(
        r"[+-]?\d{1,3}(?P<mark>[ '\u2019])\d{3}((?P=mark)\d{3})*(?P<point>[.,])\d+"
    ),
    re.compile(r"[+-]?\d+(?P<mark>)(?P<point>,)\d+"),
)


class NotANumberError(ValueError):
    """The text is no number."""


class AmbiguousNumberError(ValueError):
    """The text has two readings: "1,234" is 1234 or 1.234."""


def number(text: str) -> Decimal:
    """Return a number written with or without thousands marks.

    Raises
    ------
    AmbiguousNumberError
        A comma may be a thousands mark or a decimal comma.
    NotANumberError
        The text is no number.
    """
    plain = " ".join(text.split()).replace("\u2212", "-")
    if _PLAIN.fullmatch(plain):
        return Decimal(plain)
    if _AMBIGUOUS.fullmatch(plain):
        raise AmbiguousNumberError(text)
    for pattern in _GROUPED:
        found = pattern.fullmatch(plain)
        if found:
            return _ungrouped(plain, found["mark"], found["point"])
    raise NotANumberError(text)


def _ungrouped(text: str, mark: str, point: str) -> Decimal:
    digits = text.replace(mark, "") if mark else text
    return Decimal(digits.replace(point, ".") if point else digits)
