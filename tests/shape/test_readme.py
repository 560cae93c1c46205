"""What the README says is so."""

import re
from pathlib import Path

from placer.cli import main

ROOT = Path(__file__).parents[2]
README = (ROOT / "README.md").read_text(encoding="utf-8")


def test_readme_names_every_command() -> None:
    assert {name for name in main.commands if f"placer {name}" not in README} == set()


def test_readme_opens_with_one_paragraph_and_two_commands() -> None:
    opening, rest = README.split("```", 1)
    paragraphs = [p for p in opening.split("\n\n") if p.strip() and p[0] != "#"]
    assert len(paragraphs[0]) > 300
    block = rest.split("```", 1)[0]
    assert len([line for line in block.splitlines()[1:] if line.strip()]) == 2


def test_top_level_holds_what_was_agreed() -> None:
    agreed = {"README.md", "DEVELOPERS.md", "pyproject.toml", "placer", "tests"}
    agreed |= {"inventories", "output"}
    found = {p.name for p in ROOT.iterdir() if not p.name.startswith(".")}
    made_by_tools = {
        name for name in found if re.fullmatch(r"build|.*\.egg-info", name)
    }
    assert found - made_by_tools == agreed
