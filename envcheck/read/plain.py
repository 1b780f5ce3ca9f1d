"""A quick yes for what is plainly valid, so that JSON Schema runs only where something is wrong.

The plain cases of a schema (type, enum, const, lengths, bounds, closed objects, items, and kinds
told apart by if/then on a const) are laid out once as plans, each when data first asks for it: a
file uses a small part of the keys and kinds that its schema knows. A plan never says yes to what
the schema refuses; where it says no, jsonschema decides and words the error.
"""

from __future__ import annotations

import re
from collections.abc import Callable
from dataclasses import dataclass, field
from typing import Any

from envcheck.read.yaml_reader import Entries, Entry

_TYPES: dict[str, tuple[type, ...]] = {
    "string": (str,),
    "integer": (int,),
    "number": (int, float),
    "boolean": (bool,),
    "null": (type(None),),
    "object": (Entry, dict),
    "array": (Entries, list),
}
_NOTES = frozenset({"title", "description", "x-quantity", "$schema", "$defs", "examples"})
_KNOWN = frozenset(
    {
        "type", "enum", "const", "minLength", "maxLength", "minimum", "maximum",
        "exclusiveMinimum", "properties", "patternProperties", "required", "minProperties",
        "additionalProperties", "propertyNames", "items", "minItems", "maxItems", "allOf",
    }
)  # fmt: skip


@dataclass(slots=True)
class Plan:
    """The plain cases of one schema."""

    types: frozenset[type] = frozenset()
    words: frozenset[str] = frozenset()
    shortest: int = 0
    longest: int = 1 << 30
    low: float = float("-inf")
    above: float = float("-inf")
    high: float = float("inf")
    keys: dict[str, Plan] = field(default_factory=dict)
    """Of ``properties``, those met so far."""
    properties: dict[str, Any] = field(default_factory=dict)
    patterns: tuple[tuple[re.Pattern[str], Plan], ...] = ()
    others: Plan | None = None
    key_shortest: int = 0
    key_longest: int = 1 << 30
    needed: frozenset[str] = frozenset()
    fewest: int = 0
    most: int = 1 << 30
    items: Plan | None = None
    kind_key: str = ""
    kind_default: str | None = None
    kinds: dict[str, Plan] = field(default_factory=dict)
    """Those met so far."""
    branches: dict[str, Any] = field(default_factory=dict)
    """Kind -> its schema."""
    of: Callable[[Any], Plan] = field(kw_only=True)
    """Gives the plan of a subschema."""
    never: bool = False

    def holds(self, value: Any) -> bool:
        """Whether the value is plainly valid; False where that takes more to say."""
        kind = value.__class__
        if kind not in self.types or self.never:
            return False
        if kind is str:
            if self.words:
                return value in self.words
            return self.shortest <= len(value) <= self.longest
        if kind is Entry or kind is dict:
            return self._holds_mapping(value)
        if kind is Entries or kind is list:
            return self.fewest <= len(value) <= self.most and (
                self.items is None or all(map(self.items.holds, value))
            )
        if kind is bool or value is None:
            return True
        return bool(self.low <= value <= self.high and value > self.above)

    def _holds_mapping(self, value: dict[str, Any]) -> bool:
        plan = self
        if self.kind_key:
            kind = value.get(self.kind_key, self.kind_default)
            if kind.__class__ is not str:
                return False
            found = self.kinds.get(kind) or self._kind(kind)
            if found is None:
                return False
            plan = found
        if len(value) < plan.fewest or not value.keys() >= plan.needed:
            return False
        keys = plan.keys
        for key, inner in value.items():
            sub = keys.get(key) or plan._other(key)
            if sub is None:
                return False
            if inner.__class__ is str and not sub.words and str in sub.types:
                if not sub.shortest <= len(inner) <= sub.longest or sub.never:
                    return False
            elif not sub.holds(inner):
                return False
        return True

    def _kind(self, kind: str) -> Plan | None:
        """Plan of a kind that is met for the first time; None for one that nobody knows."""
        if kind not in self.branches:
            return None
        return self.kinds.setdefault(kind, self.of(self.branches[kind]))

    def _other(self, key: str) -> Plan | None:
        """Plan of a key that is met for the first time, or that has no name of its own."""
        if key in self.properties:
            return self.keys.setdefault(key, self.of(self.properties[key]))
        for pattern, sub in self.patterns:
            if pattern.search(key):
                return sub
        return self.others if self.key_shortest <= len(key) <= self.key_longest else None


class Plans:
    """Plans of the subschemas of one schema."""

    def __init__(self, schema: dict[str, Any], defs: dict[str, Any] | None = None) -> None:
        """``defs``: what its references refer to; none where they are written out."""
        self._defs = defs or {}
        self._by_id: dict[int, Plan] = {}
        self.root = self.of(schema)

    def of(self, schema: Any) -> Plan:
        """Give the plan of a subschema."""
        known = self._by_id.get(id(schema))
        if known is None:
            known = self._by_id[id(schema)] = self._make(schema)
        return known

    def _make(self, schema: Any) -> Plan:
        if not isinstance(schema, dict):
            return Plan(of=self.of, never=True)
        if "$ref" in schema:
            target = self._defs[schema["$ref"].removeprefix("#/$defs/")]
            rest = {key: value for key, value in schema.items() if key != "$ref"}
            return self._make({**target, **rest}) if rest else self.of(target)
        plan = Plan(of=self.of, never=bool(schema.keys() - _KNOWN - _NOTES))
        names = schema.get("type", "object" if "properties" in schema else ())
        for name in (names,) if isinstance(names, str) else names:
            plan.types |= frozenset(_TYPES[name])
        self._values(plan, schema)
        self._mapping(plan, schema)
        self._kinds(plan, schema)
        if isinstance(schema.get("items"), dict):
            plan.items = self.of(schema["items"])
        plan.fewest = max(schema.get("minItems", 0), schema.get("minProperties", 0))
        plan.most = schema.get("maxItems", plan.most)
        return plan

    def _values(self, plan: Plan, schema: dict[str, Any]) -> None:
        plan.shortest = schema.get("minLength", 0)
        plan.longest = schema.get("maxLength", plan.longest)
        plan.low = schema.get("minimum", plan.low)
        plan.high = schema.get("maximum", plan.high)
        plan.above = schema.get("exclusiveMinimum", plan.above)
        words = schema.get("enum", [schema["const"]] if "const" in schema else [])
        if all(isinstance(word, str) for word in words):
            plan.words = frozenset(words)
            plan.types = plan.types or (frozenset({str}) if words else plan.types)
        elif words == [1]:
            plan.types, plan.low, plan.high = frozenset({int}), 1, 1
        else:
            plan.never = True

    def _mapping(self, plan: Plan, schema: dict[str, Any]) -> None:
        plan.properties = schema.get("properties", {})
        plan.patterns = tuple(
            (re.compile(pattern), self.of(sub))
            for pattern, sub in schema.get("patternProperties", {}).items()
        )
        names = schema.get("propertyNames", {})
        plan.key_shortest = names.get("minLength", 0)
        plan.key_longest = names.get("maxLength", plan.key_longest)
        plan.needed = frozenset(schema.get("required", ()))
        others = schema.get("additionalProperties")
        plan.others = self.of(others) if isinstance(others, dict) else None

    def _kinds(self, plan: Plan, schema: dict[str, Any]) -> None:
        """Kinds told apart by ``if: {properties: {KEY: {const: WORD}}}, then: ...``."""
        for branch in schema.get("allOf", ()):
            tests = branch.get("if", {}).get("properties", {})
            if len(tests) != 1 or "then" not in branch or "else" in branch:
                plan.never = True
                return
            ((key, test),) = tests.items()
            if not isinstance(test.get("const"), str) or plan.kind_key not in ("", key):
                plan.never = True
                return
            plan.kind_key = key
            plan.branches[test["const"]] = branch["then"]
            if "required" not in branch["if"]:
                plan.kind_default = test["const"]
