"""JSON for programs; its form is fixed by ``schemas/report.schema.json``."""

from __future__ import annotations

import json
from dataclasses import fields, is_dataclass
from functools import cache

from envcheck.report.rows import Figure
from envcheck.report.view import View

NAME = "json"
TITLE = "JSON, versioned, with a schema"
EXTENSION = "json"
DETAILS = True
SCHEMA_VERSION = 1
LAYOUT = ("colour", "width", "bounds")
"""Fields of a view that say how to print, not what."""


def render(view: View) -> str:
    """Write the view as one JSON object; same view, same bytes."""
    kept = {name: plain(getattr(view, name)) for name in _names(View) if name not in LAYOUT}
    members = {"schema_version": SCHEMA_VERSION, **kept}
    return (
        "{\n" + ",\n".join(f'"{key}": {_member(each)}' for key, each in members.items()) + "\n}\n"
    )


def _member(value: object) -> str:
    """One member of the report; of an array one item a line, which keeps differences readable."""
    if not isinstance(value, list) or not value:
        return json.dumps(value)
    return "[\n " + ",\n ".join(map(json.dumps, value)) + "\n]"


@cache
def _names(kind: type) -> tuple[str, ...]:
    return tuple(field.name for field in fields(kind))


def plain(value: object) -> object:
    """Dataclasses as objects, tuples as arrays; a figure also carries its number."""
    if isinstance(value, str | int | float) or value is None:
        return value
    if isinstance(value, Figure):
        return {"text": value.text, "number": value.number, "unit": value.unit}
    if isinstance(value, tuple):
        return [plain(item) for item in value]
    if is_dataclass(value) and not isinstance(value, type):
        return {name: plain(getattr(value, name)) for name in _names(type(value))}
    raise TypeError(f"nothing of JSON: {type(value).__name__}")
