"""Category patterns: ``wall.*`` covers every wall."""

from __future__ import annotations


def matches(pattern: str, category: str) -> bool:
    """Whether a category falls under a pattern such as ``wall.*`` or ``*``."""
    if pattern.endswith("*"):
        return category.startswith(pattern[:-1])
    return pattern == category


def in_words(pattern: str) -> str:
    """Write a category or pattern for a reader: ``wall (steel frame)``, ``any roof``."""
    group, _, kind = pattern.partition(".")
    if group == "*":
        return "everything"
    if not kind:
        return group.replace("_", " ")
    return f"any {group}" if kind == "*" else f"{group} ({kind.replace('_', ' ')})"
