"""Values of a project file typed anew, everything else left as it stands, letter by letter."""

from __future__ import annotations

from collections.abc import Iterable

import yaml

from envcheck.model.advised import Edit, Path
from envcheck.units import parse
from envcheck.units.respell import respelled


class NotThere(Exception):
    """The value that should be changed is not stated in the file; the text says what is missing."""


def edited(text: str, edits: Iterable[Edit]) -> str:
    """Give the text of a project file with the values of ``edits``, typed in their own units.

    Comments, order and layout stay. Errors: NotThere.
    """
    root = yaml.compose(text, Loader=yaml.SafeLoader)
    changes: dict[tuple[int, int], str] = {}
    for edit in edits:
        node, typed = _typed(root, edit)
        changes[node.start_mark.index, node.end_mark.index] = _quoted(typed, node)
    for (start, end), typed in sorted(changes.items(), reverse=True):
        text = text[:start] + typed + text[end:]
    return text


def _typed(root: yaml.Node | None, edit: Edit) -> tuple[yaml.ScalarNode, str]:
    """The scalar to be replaced, and what is typed there."""
    if edit.path[-1] == "conductivity" and _found(root, edit.path) is None:
        parent = edit.path[:-1]
        node = _scalar(root, (*parent, "resistance"))
        thickness = parse(_scalar(root, (*parent, "thickness")).value, "length")
        resistance = thickness / edit.value
        return node, respelled(node.value, resistance, "resistance", not edit.up)
    node = _scalar(root, edit.path)
    return node, respelled(node.value, edit.value, edit.quantity, edit.up)


def _scalar(root: yaml.Node | None, path: Path) -> yaml.ScalarNode:
    found = _found(root, path)
    if not isinstance(found, yaml.ScalarNode):
        raise NotThere(" / ".join(map(str, path)))
    return found


def _found(node: yaml.Node | None, path: Path) -> yaml.Node | None:
    for step in path:
        if isinstance(node, yaml.MappingNode):
            node = next((value for key, value in node.value if key.value == step), None)
        elif isinstance(node, yaml.SequenceNode) and isinstance(step, int):
            node = node.value[step] if step < len(node.value) else None
        else:
            return None
    return node


def _quoted(typed: str, node: yaml.ScalarNode) -> str:
    return f"{node.style}{typed}{node.style}" if node.style in ("'", '"') else typed
