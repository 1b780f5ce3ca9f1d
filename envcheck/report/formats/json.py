"""JSON for programs; ``schemas/report.schema.json`` and ``explain.schema.json`` fix its form."""

from __future__ import annotations

import json

from envcheck.report.answer import Answer
from envcheck.report.rows import Figure
from envcheck.report.view import View

NAME = "json"
TITLE = "JSON, versioned, with a schema"
EXTENSION = "json"
DETAILS = True
SCHEMA_VERSION = 1
LAYOUT = ("lead", "colour", "width", "bounds", "workings", "right", "wrap", "tones")
"""Fields of records that say how to print, or again what others say."""


def render(view: View) -> str:
    """Write the view as one JSON object; same view, same bytes."""
    kept = {name: plain(getattr(view, name)) for name in View._fields if name not in LAYOUT}
    if view.moisture is None:
        del kept["moisture"]
    return _written({"schema_version": SCHEMA_VERSION, **kept})


def answer(made: Answer, width: int) -> str:
    """Write the data of another command."""
    return _written({"schema_version": SCHEMA_VERSION, **_members(made.data)})


def _members(data: dict[str, object]) -> dict[str, object]:
    return {key: plain(value) for key, value in data.items()}


def _written(members: dict[str, object]) -> str:
    return (
        "{\n" + ",\n".join(f'"{key}": {_member(each)}' for key, each in members.items()) + "\n}\n"
    )


def _member(value: object) -> str:
    """One member of the report; of an array one item a line, which keeps differences readable."""
    if not isinstance(value, list) or not value:
        return json.dumps(value)
    return "[\n " + ",\n ".join(map(json.dumps, value)) + "\n]"


def plain(value: object) -> object:
    """Records as objects, tuples as arrays; a figure also carries its number."""
    if isinstance(value, str | int | float) or value is None:
        return value
    if isinstance(value, Figure):
        return {"text": value.text, "number": value.number, "unit": value.unit}
    if isinstance(value, dict):
        return _members(value)
    if isinstance(value, tuple | list):
        names = getattr(value, "_fields", None)
        if names is None:
            return [plain(item) for item in value]
        pairs = zip(names, value, strict=True)
        return {name: plain(item) for name, item in pairs if name not in LAYOUT}
    raise TypeError(f"nothing of JSON: {type(value).__name__}")
