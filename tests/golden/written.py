"""A placement program as text: one row a line, compared whatever the order and scale.

``pool-room quay/fast #0: 50 a@quay/fast + 100 b@quay/fast <= 400``: the rule, whose
limit it is and which hour, then coefficients with the names of their columns, then the
side.  Columns are ``volume@pool``, ``pool*2`` (its second step is bought),
``host@array`` and ``?volume`` (its application moves); members of one item or
application are joined by ``+``.
"""

import re
from dataclasses import dataclass
from math import isclose

from placer.candidates.table import candidates
from placer.estate import Estate
from placer.placement import rows
from placer.placement.layout import Layout, layout

SHRUNK = 1e-5


@dataclass(frozen=True)
class Row:
    """One inequality or equation, scaled so that its largest figure is 1."""

    name: str
    sense: str
    terms: dict[str, float]
    side: float

    def same(self, other: "Row") -> bool:
        """Return whether two rows say the same."""
        return (
            (self.name, self.sense) == (other.name, other.sense)
            and self.terms.keys() == other.terms.keys()
            and all(_near(self.terms[c], other.terms[c]) for c in self.terms)
            and _near(self.side, other.side)
        )


def _near(one: float, other: float) -> bool:
    return isclose(one, other, rel_tol=SHRUNK, abs_tol=1e-12)


def _row(name: str, sense: str, terms: dict[str, float], side: float) -> Row:
    terms = {column: value for column, value in terms.items() if value}
    scale = max([abs(side), *map(abs, terms.values())]) or 1.0
    return Row(name, sense, {c: v / scale for c, v in terms.items()}, side / scale)


def parsed(text: str) -> list[Row]:
    """Return the rows that a text holds; a row goes on with a sign."""
    whole = re.sub(r"\n\s*(?=[+-])", " ", text)
    return [_parsed_line(line.strip()) for line in whole.splitlines() if line.strip()]


def _parsed_line(line: str) -> Row:
    match = re.fullmatch(r"(.+): (.+) (<=|=) (\S+)", line)
    assert match, line
    name, left, sense, side = match.groups()
    terms: dict[str, float] = {}
    for sign, value, column in re.findall(r"([+-]? ?)([\d.]+) ([^ ]+)", left):
        terms[column] = float(sign.strip() + value)
    return _row(name, sense, terms, float(side))


def built(estate: Estate) -> list[Row]:
    """Return the rows of the program of an estate."""
    plan = layout(candidates(estate))
    program, names = rows.program(plan), _columns(plan)
    found = []
    for number, key in enumerate(program.keys):
        start, end = program.matrix.indptr[number : number + 2]
        columns = [names[c] for c in program.matrix.indices[start:end]]
        terms = dict(zip(columns, program.matrix.data[start:end], strict=True))
        hour = f"#{key.hour}" if key.hour >= 0 else ""
        name = " ".join(part for part in (key.code, key.owner, hour) if part)
        low, high = program.low[number], program.high[number]
        found.append(_row(name, "=" if low == high else "<=", terms, float(high)))
    return found


def _columns(plan: Layout) -> list[str]:
    pools, volumes = plan.estate.pools, plan.estate.volumes
    named = {
        column: f"{_joined(plan, plan.items.members[item])}@{pools[pool].id}"
        for (item, pool), column in plan.place_column.items()
    }
    named |= {c: f"{pools[pool].id}*{k}" for (pool, k), c in plan.step_column.items()}
    named |= {c: f"{host}@{array}" for (host, array), c in plan.host_column.items()}
    named |= {
        plan.group_column(i): f"?{_joined(plan, group)}"
        for i, group in enumerate(plan.groups)
    }
    assert len(named) == plan.columns
    assert len({v.name for v in volumes}) == len(volumes)
    return [named[column] for column in range(plan.columns)]


def _joined(plan: Layout, members: tuple[int, ...]) -> str:
    return "+".join(plan.estate.volumes[row].name for row in members)


def apart_from(found: list[Row], wanted: list[Row]) -> list[Row]:
    """Return the rows found that are not wanted, each wanted row met once."""
    rest = list(wanted)
    left = []
    for row in found:
        match = next((other for other in rest if row.same(other)), None)
        if match is None:
            left.append(row)
        else:
            rest.remove(match)
    return left
