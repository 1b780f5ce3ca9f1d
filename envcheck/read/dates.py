"""Dates as typed: year-month-day, and nothing else."""

from __future__ import annotations

import re
from datetime import date

_DATE = re.compile(r"[0-9]{4}-[0-9]{2}-[0-9]{2}")


def read_date(text: str) -> date:
    """Read a date such as 2026-03-02. Errors: ValueError for what is no day of the calendar."""
    if not _DATE.fullmatch(text):
        raise ValueError(text)
    return date.fromisoformat(text)
