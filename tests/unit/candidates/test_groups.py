"""Volumes that share an application cut over together, through others too."""

from dataclasses import replace

from smallestate import volume

from placer.candidates.groups import groups

PLAIN = volume("a", "depot/slow", 1)


def grouped(*applications: tuple[str, ...]) -> list[tuple[int, ...]]:
    volumes = [replace(PLAIN, applications=names) for names in applications]
    return groups(volumes, range(len(volumes)))


def test_a_volume_without_an_application_is_alone() -> None:
    assert grouped((), (), ("fares",)) == [(0,), (1,), (2,)]


def test_volumes_of_one_application_are_one_group() -> None:
    assert grouped(("fares",), (), ("fares",)) == [(0, 2), (1,)]


def test_applications_are_chained_by_volumes_of_several() -> None:
    assert grouped(("fares",), ("crew",), ("fares", "crew"), ("crew", "fuel")) == [
        (0, 1, 2, 3)
    ]


def test_only_rows_asked_for_count() -> None:
    """The one that chains the two does not move."""
    names = (("fares",), ("fares", "crew"), ("crew",))
    volumes = [replace(PLAIN, applications=a) for a in names]
    assert groups(volumes, [0, 2]) == [(0,), (2,)]
    assert groups(volumes, []) == []


def test_an_application_may_be_called_like_a_row() -> None:
    assert grouped(("1",), ()) == [(0,), (1,)]
