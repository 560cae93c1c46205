"""Groups: volumes that cut over together, since they share applications."""

from collections.abc import Iterable, Sequence

import networkx as nx

from placer.estate import Volume


def groups(volumes: Sequence[Volume], rows: Iterable[int]) -> list[tuple[int, ...]]:
    """Return the rows chained together by shared applications.

    A row without an application is a group of its own.  Groups come in the order of
    their first row.
    """
    graph: nx.Graph[tuple[str, int | str]] = nx.Graph()
    for row in rows:
        graph.add_node(("row", row))
        for application in volumes[row].applications:
            graph.add_edge(("row", row), ("application", application))
    parts = (
        tuple(sorted(int(key) for kind, key in part if kind == "row"))
        for part in nx.connected_components(graph)
    )
    return sorted(parts)
