"""A quick yes for what is plainly valid, so that JSON Schema runs only where something is wrong.

The plain cases of a schema (type, enum, const, lengths, bounds, closed objects, items, and kinds
told apart by if/then on a const) are laid out once as plans. A plan never says yes to what the
schema refuses; where it says no, jsonschema decides and words the error.
"""

from __future__ import annotations

import re
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
            found = self.kinds.get(kind) if kind.__class__ is str else None
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

    def _other(self, key: str) -> Plan | None:
        for pattern, sub in self.patterns:
            if pattern.search(key):
                return sub
        return self.others if self.key_shortest <= len(key) <= self.key_longest else None


class Plans:
    """Plans of all subschemas of one schema whose references are written out."""

    def __init__(self, schema: dict[str, Any]) -> None:
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
            return Plan(never=True)
        plan = Plan(never=bool(schema.keys() - _KNOWN - _NOTES))
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
        plan.keys = {key: self.of(sub) for key, sub in schema.get("properties", {}).items()}
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
            plan.kinds[test["const"]] = self.of(branch["then"])
            if "required" not in branch["if"]:
                plan.kind_default = test["const"]
