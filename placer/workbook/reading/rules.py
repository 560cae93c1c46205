"""Rows of the sheet rules to rules, their volumes and pools looked up."""

from collections.abc import Callable, Iterable, Sequence

from placer.estate import Array, Level, Media, Pool, Rule, RuleKind, Volume
from placer.workbook.reading.names import Names
from placer.workbook.reading.remarks import Remarks
from placer.workbook.reading.roles import Roles
from placer.workbook.reading.table import Row
from placer.workbook.role import Role

_RELATIONS = (RuleKind.APART, RuleKind.TOGETHER)
_Lookup = dict[str, list[str]]


class Selector:
    """Words that pick things: a kind, and for each name what it stands for."""

    def __init__(
        self, column: str, kinds: dict[str, _Lookup], remarks: Remarks
    ) -> None:
        self._column = column
        self._kinds = kinds
        self._names = {kind: Names(kind, remarks, kinds[kind]) for kind in kinds}

    def pick(self, row: Row) -> tuple[str, ...] | None:
        """Return the ids a cell picks; None, and a finding, if it names what is not."""
        said, place = row.text(self._column), row.place(self._column)
        word, _, rest = said.partition(" ")
        kind = word.casefold()
        names = [name.strip() for name in rest.split(";") if name.strip()]
        if kind not in self._kinds or not names:
            row.error(
                "cell",
                self._column,
                f'{self._column} is "{said}"',
                f"write one of {', '.join(self._kinds)}, then names separated by ;",
            )
            return None
        found = [name for name in names if self._names[kind].check(name, place)]
        ids = (each for name in found for each in self._kinds[kind][name])
        return tuple(dict.fromkeys(ids)) if len(found) == len(names) else None


class RuleReader:
    """Reads the sheet rules against what the estate holds."""

    def __init__(
        self,
        volumes: Sequence[Volume],
        pools: Sequence[Pool],
        arrays: Sequence[Array],
        roles: Roles,
        remarks: Remarks,
    ) -> None:
        self._what = Selector("what", _volume_kinds(volumes, roles), remarks)
        self._where = Selector("where", _pool_kinds(pools, arrays), remarks)
        self._homeless = sorted(array.name for array in arrays if not array.site)

    def read(self, row: Row) -> Rule:
        """Return one rule."""
        kind = RuleKind(row.text("rule") or RuleKind.NEVER_ON)
        relation = kind in _RELATIONS
        volumes = self._volumes(row)
        if relation and len(volumes) == 1:
            row.error(
                "cell",
                "what",
                f"{kind.value} needs two volumes or more, and this names one",
                "name the others too",
            )
        return Rule(
            kind=kind,
            volumes=volumes,
            pools=() if relation else self._pools(row),
            level=self._level(row) if relation else Level.POOL,
            said=" ".join(filter(None, map(row.text, ("what", "rule", "where")))),
            why=row.text("why"),
            place=row.place("what"),
        )

    def _volumes(self, row: Row) -> tuple[str, ...]:
        picked = self._what.pick(row) if row.given("what") else None
        if picked == ():
            row.remarks.warn(
                "unknown",
                row.place("what"),
                f'"{row.text("what")}" is no volume of the inventory',
                "fill in the column role of the sheet volumes, or take the rule out",
            )
        return picked or ()

    def _pools(self, row: Row) -> tuple[str, ...]:
        if not row.given("rule"):
            return ()
        found = self._where.pick(row)
        if found == () and row.text("rule") == RuleKind.ONLY_ON:
            row.error(
                "unknown",
                "where",
                f'"{row.text("where")}" is no pool of the inventory',
                "name pools there are",
            )
        return found or ()

    def _level(self, row: Row) -> Level:
        said = row.text("where").casefold() or Level.POOL.value
        if said not in list(Level):
            row.error(
                "cell",
                "where",
                f'where is "{row.text("where")}"',
                f"write one of: {', '.join(Level)}",
            )
            return Level.POOL
        if said == Level.SITE and self._homeless:
            row.error(
                "blank",
                "where",
                f"these arrays have no site: {', '.join(self._homeless)}",
                "fill in the column site of the sheet arrays",
            )
        return Level(said)


def _volume_kinds(volumes: Iterable[Volume], roles: Roles) -> dict[str, _Lookup]:
    ways: dict[str, Callable[[Volume], Iterable[str]]] = {
        "volume": lambda volume: [volume.id],
        "application": lambda volume: volume.applications,
        "host": lambda volume: [volume.host],
        "tenant": lambda volume: [volume.tenant],
        "role": lambda volume: [roles[volume.id].value],
    }
    kinds: dict[str, _Lookup] = {kind: {} for kind in ways}
    kinds["role"] = {role.value: [] for role in Role}
    for volume in volumes:
        for kind, names_of in ways.items():
            for name in filter(None, names_of(volume)):
                kinds[kind].setdefault(name, []).append(volume.id)
    return kinds


def _pool_kinds(pools: Iterable[Pool], arrays: Iterable[Array]) -> dict[str, _Lookup]:
    sites = {array.name: array.site for array in arrays}
    ways: dict[str, Callable[[Pool], str]] = {
        "pool": lambda pool: pool.id,
        "media": lambda pool: pool.media.value,
        "array": lambda pool: pool.array,
        "site": lambda pool: sites.get(pool.array, ""),
    }
    kinds: dict[str, _Lookup] = {kind: {} for kind in ways}
    kinds["media"] = {media.value: [] for media in Media}
    for pool in pools:
        for kind, name_of in ways.items():
            if name_of(pool):
                kinds[kind].setdefault(name_of(pool), []).append(pool.id)
    return kinds
