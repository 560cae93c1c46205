"""Names as keys: each once, never told apart by case or blanks alone."""

from collections.abc import Iterable, Iterator
from difflib import get_close_matches

from placer.findings import Place
from placer.workbook.reading.remarks import Remarks


class Names:
    """The names of one kind of thing, and findings on those that are not among them.

    Parameters
    ----------
    noun
        What the names are names of, for the sentences.
    known
        Names that are known from the start; they are not checked again.
    needed
        Whether having no names at all is a fault said elsewhere: then no single name
        is at fault.
    """

    def __init__(
        self,
        noun: str,
        remarks: Remarks,
        known: Iterable[str] = (),
        *,
        needed: bool = False,
    ) -> None:
        self._noun = noun
        self._needed = needed
        self._remarks = remarks
        self._places = dict.fromkeys(known, Place())
        self._folded = {_folded(name): name for name in self._places}

    def __contains__(self, name: str) -> bool:
        return name in self._places

    def __iter__(self) -> Iterator[str]:
        return iter(self._places)

    def add(self, name: str, place: Place) -> None:
        """Take in a name; one that stands already, or nearly so, is an error."""
        twin = self._folded.setdefault(_folded(name), name)
        if name in self._places:
            self._remarks.error(
                "duplicate",
                place,
                f'the {self._noun} "{name}" stands already at {self._places[name]}',
                "keep one row, or give them different names",
            )
        elif twin != name:
            self._say_twin(name, twin, place)
        self._places.setdefault(name, place)

    def meet(self, name: str, place: Place) -> bool:
        """Take in a name that may be said often, and return whether it is new."""
        new = name not in self._places
        if new:
            self.add(name, place)
        return new

    def check(self, name: str, place: Place) -> bool:
        """Return whether a name is known; one that is not is an error."""
        if name in self._places:
            return True
        if self._needed and not self._places:
            return False
        twin = self._folded.get(_folded(name))
        if twin:
            self._say_twin(name, twin, place)
            return False
        near = get_close_matches(name, self._places, n=1, cutoff=0.7)
        self._remarks.error(
            "unknown",
            place,
            f'there is no {self._noun} "{name}"',
            f'is it "{near[0]}"?' if near else f"add the {self._noun} to its sheet",
        )
        return False

    def _say_twin(self, name: str, twin: str, place: Place) -> None:
        at = f" at {self._places[twin]}" if self._places[twin].sheet else ""
        self._remarks.error(
            "id",
            place,
            f'the {self._noun} "{name}" differs from "{twin}"{at} only in case or '
            "blanks",
            "write it the same everywhere, or give it another name",
        )


def _folded(name: str) -> str:
    return "".join(name.casefold().split())
