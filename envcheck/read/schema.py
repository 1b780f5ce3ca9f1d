"""Holds data against a JSON Schema and words every mismatch as a problem with its line."""

from __future__ import annotations

import json
from collections.abc import Iterator
from functools import lru_cache
from pathlib import Path as FilePath
from typing import Any

from envcheck.errors import Problem
from envcheck.read.plain import Plans
from envcheck.read.schema_words import Path, worded
from envcheck.read.yaml_reader import Entry

MOST_PROBLEMS = 200
_FOLDER = FilePath(__file__).parent / "schemas"


def schema_text(name: str) -> str:
    """Give the text of a schema of the package: ``project`` or ``rules``."""
    return (_FOLDER / f"{name}.schema.json").read_text(encoding="utf-8")


@lru_cache(maxsize=4)
def _raw(name: str) -> dict[str, Any]:
    found: dict[str, Any] = json.loads(schema_text(name))
    return found


@lru_cache(maxsize=4)
def _plans(name: str) -> Plans:
    """Plans of a schema as it stands: what a sound file does not ask for is never laid out."""
    raw = _raw(name)
    return Plans(raw, raw.get("$defs", {}))


@lru_cache(maxsize=4)
def _schema(name: str) -> dict[str, Any]:
    """A schema with its references written out (a fifth of the cost of following them)."""
    raw = _raw(name)
    body = {key: value for key, value in raw.items() if key != "$defs"}
    whole: dict[str, Any] = _written_out(body, raw.get("$defs", {}), {})
    return whole


def _written_out(node: Any, defs: dict[str, Any], done: dict[str, Any]) -> Any:
    if isinstance(node, list):
        return [_written_out(item, defs, done) for item in node]
    if not isinstance(node, dict):
        return node
    if "$ref" in node:
        name = node["$ref"].removeprefix("#/$defs/")
        if name not in done:
            done[name] = _written_out(defs[name], defs, done)
        rest = {key: value for key, value in node.items() if key != "$ref"}
        return {**done[name], **rest} if rest else done[name]
    return {key: _written_out(value, defs, done) for key, value in node.items()}


def check(data: Entry, name: str, file: str) -> list[Problem]:
    """Hold ``data`` against the schema called ``name``; give all problems, 200 at most."""
    return [made for _, made in check_paths(data, name, file)]


def check_paths(data: Entry, name: str, file: str) -> list[tuple[Path, Problem]]:
    """Give all problems with the path of the entry that each is about."""
    if _plans(name).root.holds(data):
        return []
    schema = _schema(name)
    found: list[tuple[str, Path, Problem]] = []
    for error in _validator(name).iter_errors(data):
        for key, path, made in worded(error, data, file, schema):
            found.append((key, path, made))
        if len(found) >= MOST_PROBLEMS:
            break
    return _without_echoes(found)


@lru_cache(maxsize=4)
def _validator(name: str) -> Any:
    """Make a validator that passes over what is plainly valid."""
    from jsonschema import Draft202012Validator
    from jsonschema.validators import extend

    schema = _schema(name)
    plans = Plans(schema)

    def properties(validator: Any, subs: Any, data: Any, _: Any) -> Iterator[Any]:
        for key, sub in subs.items() if isinstance(data, dict) else ():
            if key in data and not plans.of(sub).holds(data[key]):
                yield from validator.descend(data[key], sub, path=key, schema_path=key)

    def items(validator: Any, sub: Any, data: Any, _: Any) -> Iterator[Any]:
        for index, item in enumerate(data if isinstance(data, list) else ()):
            if not plans.of(sub).holds(item):
                yield from validator.descend(item, sub, path=index)

    closed = Draft202012Validator.VALIDATORS["additionalProperties"]

    def additional(validator: Any, sub: Any, data: Any, whole: Any) -> Iterator[Any]:
        if not isinstance(sub, dict) or "properties" in whole or not isinstance(data, dict):
            yield from closed(validator, sub, data, whole)
            return
        for key, value in data.items():
            if not plans.of(sub).holds(value):
                yield from validator.descend(value, sub, path=key)

    own = {"properties": properties, "items": items, "additionalProperties": additional}
    make: Any = extend
    return make(Draft202012Validator, own)(schema)


@lru_cache(maxsize=4)
def quantities(name: str) -> dict[str, str]:
    """Keys that hold one quantity wherever they stand, with that quantity."""
    found: dict[str, set[str]] = {}

    def collect(node: Any) -> None:
        if isinstance(node, dict):
            for key, sub in node.get("properties", {}).items():
                if isinstance(sub, dict):
                    found.setdefault(key, set()).add(sub.get("x-quantity", ""))
            node = list(node.values())
        for inner in node if isinstance(node, list) else ():
            collect(inner)

    collect(_schema(name))
    return {key: next(iter(kinds)) for key, kinds in found.items() if len(kinds) == 1}


def _without_echoes(found: list[tuple[str, Path, Problem]]) -> list[tuple[Path, Problem]]:
    """Drop "lacks the key" where a misspelling of that very key is reported already."""
    meant = {
        (path, made.fix) for _, path, made in found if made.kind.id == "unknown-key" and made.fix
    }
    return [
        (path, made)
        for key, path, made in found
        if not (made.kind.id == "missing-key" and (path, f"did you mean {key!r}?") in meant)
    ]
