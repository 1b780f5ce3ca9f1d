"""The floors of the house: a room imports only from floors below it."""

from __future__ import annotations

import ast
from pathlib import Path

import pytest

import envcheck

PACKAGE = Path(envcheck.__file__).parent
FLOORS = [
    {"errors", "error_kinds", "model", "formulas"},
    {"units"},
    {"solve"},
    {"read", "judge", "lint", "report"},
    {"advise"},
    {"pipeline", "typing_desk"},
    {"cli", "__init__", "__main__"},
]
HEIGHT = {room: height for height, rooms in enumerate(FLOORS) for room in rooms}
APART = {"read", "solve", "judge", "lint", "report"}
"""Rooms that never import one another."""
ONLY = {
    "click": {"cli", "__main__"},
    "yaml": {"read"},
    "jsonschema": {"read"},
    "tabulate": {"report"},
}
"""Packages that one room owns."""
NOWHERE = {"numpy", "pandas", "scipy"}
"""Packages that no module imports at its start, but for the room of the field."""
FIELD = "solve/field/"


def modules() -> list[Path]:
    return sorted(PACKAGE.rglob("*.py"))


def room_of(path: Path) -> str:
    part = path.relative_to(PACKAGE).parts[0]
    return part.removesuffix(".py")


def imports(path: Path, at_start: bool = False) -> set[tuple[str, ...]]:
    """All imports of a module, or those that run when it is imported."""
    found = set()
    tree = ast.parse(path.read_text(encoding="utf-8"))
    for node in tree.body if at_start else ast.walk(tree):
        if isinstance(node, ast.Import):
            found |= {tuple(alias.name.split(".")) for alias in node.names}
        elif isinstance(node, ast.ImportFrom) and node.module:
            assert node.level == 0, f"{path}: relative imports hide the room"
            names = node.module.split(".")
            found |= {(*names, alias.name) for alias in node.names}
    return found


@pytest.mark.parametrize("path", modules(), ids=lambda p: str(p.relative_to(PACKAGE)))
def test_imports_from_floors_below(path: Path) -> None:
    room = room_of(path)
    heavy = {name[0] for name in imports(path, at_start=True)} & NOWHERE
    if FIELD not in path.as_posix():
        assert not heavy, f"{path} imports {heavy} when it is imported"
    for name in imports(path):
        if name[:3] == ("envcheck", "solve", "field") and FIELD not in path.as_posix():
            assert name not in imports(path, at_start=True), f"{path} loads the field at its start"
        if name[0] != "envcheck":
            owners = ONLY.get(name[0], {room})
            assert room in owners, f"{path} imports {name[0]}, which belongs to {owners}"
            continue
        if len(name) < 2 or name[1] not in HEIGHT:
            continue
        other = name[1]
        assert HEIGHT[other] <= HEIGHT[room], f"{path} imports {'.'.join(name)} from above"
        apart = other != room and {room, other} <= APART
        assert not apart, f"{path} imports {'.'.join(name)} from beside"
    if room in ("solve", "judge", "lint"):
        touched = {name[0] for name in imports(path)} & {"os", "pathlib", "time", "datetime", "io"}
        assert not touched, f"{path} touches {touched}"


def test_no_module_is_more_than_a_room() -> None:
    long = {
        str(path.relative_to(PACKAGE)): length
        for path in modules()
        if (length := len(path.read_text(encoding="utf-8").splitlines())) > 400
    }
    assert not long
