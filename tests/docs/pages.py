"""Blocks and tables of the written pages of ``docs/``, found by the comment before them.

``<!-- rule set ID FILE -->`` and ``<!-- project FILE -->`` mark complete files; blocks of one file
follow each other. ``<!-- project part -->`` marks sections that are put into the complete project,
``<!-- layers CATEGORY -->`` the layers of one assembly.
"""

from __future__ import annotations

import re
from collections.abc import Iterator
from pathlib import Path

ROOT = Path(__file__).parent.parent.parent
DOCS = ROOT / "docs"
PROJECT = (DOCS / "project-format.md").read_text(encoding="utf-8")
RULES = "".join(
    (DOCS / name).read_text(encoding="utf-8")
    for name in ("ruleset-format.md", "ruleset-conventions.md")
)
ENTRIES = ("materials", "assemblies", "surfaces", "elements")
"""Sections whose entries a part adds to those of the project; it replaces all others."""


def blocks(page: str, mark: str) -> list[tuple[re.Match[str], str]]:
    """Every fenced block behind a mark (a pattern), with the match of the mark."""
    pattern = re.compile(rf"<!-- {mark} -->\n```\w*\n(.*?)```", re.DOTALL)
    return [(found, found[found.re.groups]) for found in pattern.finditer(page)]


def table(page: str, mark: str) -> list[list[str]]:
    """Cells of the table behind a mark, without its head; ticks are taken off."""
    found = re.search(rf"<!-- {mark} -->\n((?:\|.*\n)+)", page)
    assert found, mark
    rows = found[1].splitlines()[2:]
    return [[cell.strip() for cell in row.strip("|").split("|")] for row in rows]


def ticked(text: str) -> list[str]:
    """What stands between backticks."""
    return re.findall(r"`([^`]+)`", text)


def rule_set_files() -> dict[tuple[str, str], str]:
    """(id, file) -> text of every complete rule set."""
    files: dict[tuple[str, str], str] = {}
    for found, text in blocks(RULES, r"rule set (\S+) (\S+)"):
        key = (found[1], found[2])
        files[key] = files.get(key, "") + text
    return files


def write_rule_sets(folder: Path) -> tuple[str, ...]:
    """Write all rule sets of the docs into a folder; give their ids."""
    for (name, file), text in rule_set_files().items():
        (folder / name).mkdir(parents=True, exist_ok=True)
        (folder / name / file).write_text(text, encoding="utf-8")
    return tuple(dict.fromkeys(name for name, _ in rule_set_files()))


def complete_project() -> str:
    """The complete project of the format page."""
    ((_, text),) = blocks(PROJECT, r"project room.yaml")
    return text


def sections(text: str) -> dict[str, str]:
    """Top-level key -> its lines."""
    parts = re.split(r"(?m)^(?=\w+:)", text)
    return {part.partition(":")[0]: part for part in parts if ":" in part}


def with_part(part: str) -> str:
    """The complete project with some of its sections replaced, or with entries added."""
    whole = sections(complete_project())
    for name, text in sections(part).items():
        if name in ENTRIES and name in whole:
            whole[name] += text.partition("\n")[2]
        else:
            whole[name] = text
    return "".join(whole.values())


def with_layers(layers: str, category: str) -> str:
    """The complete project with an assembly of these layers, and an element of it."""
    indented = "".join(f"      {line}\n" for line in layers.splitlines())
    element = f"  X: {{assembly: X, category: {category}, net_area: 10 m2}}\n"
    return with_part(
        f"assemblies:\n  X:\n    title: example\n    layers:\n{indented}elements:\n{element}"
    )


def keys_of(schema: object) -> Iterator[str]:
    """Every key that a schema names, at any depth."""
    if isinstance(schema, dict):
        yield from schema.get("properties", {})
        for value in schema.values():
            yield from keys_of(value)
    elif isinstance(schema, list):
        for value in schema:
            yield from keys_of(value)
