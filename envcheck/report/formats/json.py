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
    return json.dumps({"schema_version": SCHEMA_VERSION, **kept}, indent=1) + "\n"


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
