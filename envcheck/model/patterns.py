"""Category patterns: ``wall.*`` covers every wall."""

from __future__ import annotations


def matches(pattern: str, category: str) -> bool:
    """Whether a category falls under a pattern such as ``wall.*`` or ``*``."""
    if pattern.endswith("*"):
        return category.startswith(pattern[:-1])
    return pattern == category
