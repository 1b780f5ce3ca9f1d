"""Patterns over names: ``wall.*`` stands for every wall."""

from __future__ import annotations

from collections.abc import Iterable
from fnmatch import fnmatchcase
from functools import lru_cache


@lru_cache(maxsize=1024)
def fits_any(pattern: str, names: tuple[str, ...]) -> bool:
    """Whether a pattern fits at least one name."""
    return any(name == pattern or fnmatchcase(name, pattern) for name in names)


def best_pattern(name: str, patterns: Iterable[str]) -> str | None:
    """Give the most specific pattern that a name fits; None without one."""
    fits = [p for p in patterns if name == p or fnmatchcase(name, p)]
    return max(fits, key=lambda p: (p == name, len(p.replace("*", "")), p), default=None)
