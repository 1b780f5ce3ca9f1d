"""Days as numbers, so that a period is an interval like any other."""

from datetime import date


def ordinal(text: str) -> float | None:
    """Give the ordinal of a day such as 2026-03-02; None for what is no day."""
    try:
        return float(date.fromisoformat(text).toordinal())
    except ValueError:
        return None
