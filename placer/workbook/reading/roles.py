"""Roles of volumes to rules: logs and quorums apart from the data they serve.

Apart forbids any two volumes of a rule to share a place, and data volumes may share
theirs; so there is one rule for each pair.
"""

from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass

from placer.estate import Level, Rule, RuleKind, Volume
from placer.workbook.reading.names import Names
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.table import Row
from placer.workbook.role import Role

Roles = Mapping[str, Role]


@dataclass(frozen=True, slots=True)
class Group:
    """Volumes that belong together: those of an application, a cluster or a host."""

    kind: str
    name: str


def read_roles(volumes: Sequence[Volume], rows: Sequence[Row]) -> dict[str, Role]:
    """Return the role of each volume by its id; the rows are those of the volumes."""
    pairs = zip(volumes, rows, strict=True)
    return {volume.id: Role(row.text("role")) for volume, row in pairs}


def read_clusters(rows: Iterable[Row], remarks: Remarks) -> dict[str, str]:
    """Return the cluster of each host that has one."""
    names = Names("cluster", remarks)
    clusters = {}
    for row in rows:
        if row.given("cluster"):
            names.meet(row.text("cluster"), row.place("cluster"))
            clusters[row.text("host")] = row.text("cluster")
    return clusters


class RoleReader:
    """Makes the rules that follow from roles.

    Parameters
    ----------
    clusters
        The cluster of each host that has one.
    """

    def __init__(
        self, volumes: Sequence[Volume], roles: Roles, clusters: Mapping[str, str]
    ) -> None:
        self._roles = roles
        self._clusters = clusters
        self._data: dict[Group, list[str]] = {}
        for volume in volumes:
            if roles[volume.id] is Role.DATA:
                for group in (*_applications(volume), *self._hosts(volume)):
                    self._data.setdefault(group, []).append(volume.id)

    def read(self, volume: Volume, row: Row) -> tuple[Rule, ...]:
        """Return the rules of one volume; a group that is not known is a warning."""
        role = self._roles[volume.id]
        if role is Role.LOG:
            _say_alone(row, "application", _applications(volume))
            return tuple(self._apart(volume, row, _applications(volume), Level.POOL))
        if role is Role.QUORUM:
            _say_alone(row, "host", self._hosts(volume))
            return tuple(self._apart(volume, row, self._hosts(volume), Level.ARRAY))
        return ()

    def _apart(
        self, volume: Volume, row: Row, groups: Iterable[Group], level: Level
    ) -> Iterator[Rule]:
        role = self._roles[volume.id]
        data = {other: g for g in groups for other in self._data.get(g, ())}
        for other, group in data.items():
            yield Rule(
                kind=RuleKind.APART,
                volumes=(volume.id, other),
                level=level,
                said=f"{role.value} {volume.id} of {group.kind} {group.name} "
                f"apart from its data {other}",
                why=f"a lost {level.value} must not take {role.value} and data",
                place=row.place("role"),
            )

    def _hosts(self, volume: Volume) -> tuple[Group, ...]:
        """Return the cluster of the volume's host, or the host alone."""
        if volume.host in self._clusters:
            return (Group("cluster", self._clusters[volume.host]),)
        return (Group("host", volume.host),) if volume.host else ()


def _applications(volume: Volume) -> tuple[Group, ...]:
    return tuple(Group("application", name) for name in volume.applications)


def _say_alone(row: Row, column: str, groups: Sequence[Group]) -> None:
    if not groups:
        row.remarks.warn(
            "blank",
            row.place(column),
            f"a {row.text('role')} volume without {column}: nothing keeps it apart",
            f"fill in the {column}, so that its data is known",
        )
