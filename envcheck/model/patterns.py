"""Category patterns: ``wall.*`` covers every wall."""

from collections.abc import Iterable
from fnmatch import fnmatchcase

EXACT = 1000
"""Closeness of a pattern that is the name itself; more than any name is long."""


def closeness(pattern: str, name: str) -> int:
    """How closely a pattern fits a name: the letters that it fixes; -1 where it does not fit."""
    if pattern == name:
        return EXACT
    return len(pattern.replace("*", "")) if _fits(pattern, name) else -1


def matches(pattern: str, name: str) -> bool:
    """Whether a name falls under a pattern such as ``wall.*`` or ``*``."""
    return pattern == name or _fits(pattern, name)


def _fits(pattern: str, name: str) -> bool:
    """``fnmatchcase``, which makes a regular expression of each pattern, for the unusual ones."""
    head, star, rest = pattern.partition("*")
    if rest or "?" in head or "[" in head:
        return fnmatchcase(name, pattern)
    return name.startswith(head) if star else name == head


def fits_any(pattern: str, names: Iterable[str]) -> bool:
    """Whether a pattern fits at least one name."""
    return any(matches(pattern, name) for name in names)


def best_pattern(name: str, patterns: Iterable[str]) -> str | None:
    """Give the most specific pattern that a name fits; None without one."""
    fitting = [pattern for pattern in patterns if matches(pattern, name)]
    return max(fitting, key=lambda pattern: (closeness(pattern, name), pattern), default=None)


def in_words(pattern: str) -> str:
    """Write a category or pattern for a reader: ``wall (steel frame)``, ``any roof``."""
    group, _, kind = pattern.partition(".")
    if group == "*":
        return "everything"
    if not kind:
        return group.replace("_", " ")
    return f"any {group}" if kind == "*" else f"{group} ({kind.replace('_', ' ')})"
