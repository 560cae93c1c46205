"""The code keeps the size it promises: short functions, files that tell one story."""

import ast
from collections.abc import Iterator
from pathlib import Path
from statistics import median, quantiles

ROOT = Path(__file__).parents[2]
FILES = sorted((ROOT / "placer").rglob("*.py"))
Function = ast.FunctionDef | ast.AsyncFunctionDef


def functions() -> Iterator[tuple[str, Function]]:
    for path in FILES:
        for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
            if isinstance(node, ast.FunctionDef | ast.AsyncFunctionDef):
                yield f"{path.relative_to(ROOT)}:{node.name}", node


def length(node: Function) -> int:
    """Lines of a function without its docstring."""
    assert node.end_lineno is not None
    whole = node.end_lineno - node.lineno + 1
    first = node.body[0]
    if ast.get_docstring(node) is None or first.end_lineno is None:
        return whole
    return whole - (first.end_lineno - first.lineno + 1)


LENGTHS = {name: length(node) for name, node in functions()}


def test_median_function_has_at_most_eight_lines() -> None:
    assert median(LENGTHS.values()) <= 8


def test_nine_in_ten_functions_have_at_most_36_lines() -> None:
    assert quantiles(LENGTHS.values(), n=10)[-1] <= 36


def test_no_function_has_more_than_60_lines() -> None:
    assert {name: n for name, n in LENGTHS.items() if n > 60} == {}


def test_no_file_has_more_than_400_lines() -> None:
    lines = {p.name: len(p.read_text(encoding="utf-8").splitlines()) for p in FILES}
    assert {name: n for name, n in lines.items() if n > 400} == {}
