"""What every kind of input error has."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Kind:
    """One kind of error."""

    id: str
    what: str
    fix: str
    about: str
