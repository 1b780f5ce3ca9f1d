"""Words for what a JSON Schema refuses: one problem per mistake, with its line."""

from __future__ import annotations

import re
from collections.abc import Iterator
from typing import Any

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.read.yaml_reader import Entries, Entry, line_of
from envcheck.units import UNITS

Path = tuple[str | int, ...]


_SINGULAR = {
    "assemblies": "assembly", "elements": "element", "materials": "material",
    "surfaces": "surface", "layers": "layer", "wall_layers": "layer", "floor_layers": "layer",
    "pieces": "piece", "voids": "air voids", "bridges": "bridge",
    "fasteners": "fasteners",
    "extras": "extra", "zones": "zone", "rule_sets": "rule set", "exceptions": "exception",
    "answers": "answer", "facts": "fact", "tables": "table", "stock": "stock", "costs": "costs",
}  # fmt: skip
_TYPE_WORDS = {
    "string": "text", "number": "a number", "integer": "a whole number", "array": "a list",
    "object": "an entry with keys", "boolean": "true or false", "null": "nothing",
}  # fmt: skip


def where(path: Path) -> str:
    """Name a place in words: ``layer 2 of assembly 'W1'``."""
    parts: list[str] = []
    names = iter(path)
    for name in names:
        if isinstance(name, str) and name in _SINGULAR:
            inner = next(names, None)
            if inner is None:
                parts.append(name)
            elif isinstance(inner, int):
                parts.append(f"{_SINGULAR[name]} {inner + 1}")
            else:
                parts.append(f"{_SINGULAR[name]} {inner!r}")
        else:
            parts.append(f"item {name + 1}" if isinstance(name, int) else name)
    return " of ".join(reversed(parts)) or "the file"


def describe(value: Any) -> str:
    """Say what stands there, shortly."""
    if value is None:
        return "nothing"
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, dict):
        return "an entry with keys"
    if isinstance(value, list):
        return "a list"
    return f"{value!r}" if isinstance(value, str) else f"the number {value}"


def worded(
    error: Any, data: Entry, file: str, schema: dict[str, Any]
) -> Iterator[tuple[str, Path, Problem]]:
    """Turn one error of jsonschema into problems: (key, path of the mapping, problem)."""
    path: Path = tuple(error.absolute_path)
    line = line_of(data, path)
    key = str(path[-1]) if path else ""
    if path and isinstance(path[-1], int):
        key = where(path)
    if error.validator == "additionalProperties":
        yield from _unknown_keys(error, path, data, file, schema)
        return
    if error.validator == "enum" and not isinstance(error.instance, str):
        return  # the type is wrong as well, and says more
    if error.validator == "required":
        for name in error.validator_value:
            if name not in error.instance:
                hint = _example(error.schema.get("properties", {}).get(name, {}))
                made = problem("missing-key", file, line, key=name, where=where(path), hint=hint)
                if name in error.message:
                    yield name, path, made
        return
    if error.instance.__class__ is str and isinstance(_at(data, path), dict):
        line, key = line_of(data, (*path, error.instance)), error.instance[:40]
    yield key, path, _value_problem(error, file, line, key)


def _at(data: Any, path: Path) -> Any:
    for step in path:
        data = data[step]
    return data


def _example(schema: dict[str, Any]) -> str:
    name = schema.get("x-quantity")
    if name:
        return f", {UNITS[name].example}"
    return f", {one_of(schema['enum'])}" if "enum" in schema else ""


def _unknown_keys(
    error: Any, path: Path, data: Entry, file: str, schema: dict[str, Any]
) -> Iterator[tuple[str, Path, Problem]]:
    known = list(error.schema.get("properties", ()))
    patterns = tuple(error.schema.get("patternProperties", ()))
    for name in error.instance:
        if name in known or any(re.search(pattern, name) for pattern in patterns):
            continue
        others = _kinds_with(name, error, schema)
        hint = did_you_mean(name, [k for k in known if k not in error.instance])
        if others:
            hint = f"{name!r} belongs to kind {' or '.join(others)}; check the kind"
        hint = hint or did_you_mean(name, known) or "delete the key, or use one of the known ones"
        line = line_of(data, (*path, name))
        made = problem(
            "unknown-key",
            file,
            line,
            found=name,
            expected=one_of(known),
            key=name[:40],
            where=where(path),
            hint=hint,
        )
        yield name, path, made


def _kinds_with(name: str, error: Any, schema: Any) -> list[str]:
    """Other kinds of the same thing that know the key."""
    steps = list(error.absolute_schema_path)
    if len(steps) < 4 or steps[-4] != "allOf":
        return []
    for step in steps[:-3]:
        schema = schema[step]
    found = []
    for branch in schema:
        ((_, test),) = branch["if"]["properties"].items()
        if name in branch["then"]["properties"]:
            found.append(repr(test["const"]))
    return found


def _value_problem(error: Any, file: str, line: int, key: str) -> Problem:
    value, rule, limit = error.instance, error.validator, error.validator_value
    found = describe(value)
    if rule == "type":
        return _type_problem(error, file, line, key)
    if rule == "const":
        hint = f"write {limit!r}"
        kind = "unknown-version" if key == "envcheck" else "unknown-word"
        return problem(kind, file, line, found=found, expected=limit, key=key, hint=hint)
    if rule == "enum":
        hint = did_you_mean(str(value), map(str, limit)) or "use one of the known words"
        expected = one_of(map(str, limit))
        return problem(
            "unknown-word", file, line, found=found, expected=expected, key=key, hint=hint
        )
    if rule in ("maxLength", "maxItems", "maxProperties"):
        size = f"{len(value)} {'characters' if isinstance(value, str) else 'items'}"
        return problem("too-long", file, line, found=size, expected=f"at most {limit}", key=key)
    if rule in ("minLength", "minItems", "minProperties"):
        found = found if value else f"an empty {'text' if isinstance(value, str) else 'list'}"
        return problem("too-few", file, line, found=found, expected=f"at least {limit}", key=key)
    if rule in ("minimum", "exclusiveMinimum", "maximum", "exclusiveMaximum"):
        bounds = {
            "minimum": f"{limit} or more", "exclusiveMinimum": f"more than {limit}",
            "maximum": f"{limit} or less", "exclusiveMaximum": f"less than {limit}",
        }  # fmt: skip
        hint = "check the number and its decimal point"
        return problem(
            "out-of-range", file, line, found=found, expected=bounds[rule], key=key, hint=hint
        )
    hint = "see the description of the format"
    return problem(
        "wrong-form", file, line, found=found, expected=f"{rule} {limit}", key=key, hint=hint
    )


def _type_problem(error: Any, file: str, line: int, key: str) -> Problem:
    value, wanted = error.instance, error.validator_value
    types = [wanted] if isinstance(wanted, str) else list(wanted)
    number = isinstance(value, (int, float)) and not isinstance(value, bool)
    quantity = error.schema.get("x-quantity")
    if quantity and number:
        example = UNITS[quantity].example
        expected = f"{UNITS[quantity].words} such as {example}"
        hint = f"add the unit, for example {example}"
        return problem("missing-unit", file, line, found=value, expected=expected, hint=hint)
    expected = " or ".join(_TYPE_WORDS[name] for name in types)
    if value is None:
        hint = "give a value, or delete the key"
    elif number and "string" in types:
        hint = f"put it in quotes: '{value}'"
    elif types == ["boolean"]:
        hint = "write true or false"
    elif types == ["array"]:
        hint = "start each item with '- ', or put the items in [ ]"
    elif isinstance(value, (Entry, Entries)):
        hint = f"write {expected} behind the colon"
    else:
        hint = f"write {expected}"
    found = describe(value)
    return problem("wrong-type", file, line, found=found, expected=expected, key=key, hint=hint)
