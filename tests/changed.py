"""Records of the model with some fields changed, for tests."""

from __future__ import annotations

import dataclasses
from typing import Any, TypeVar

Record = TypeVar("Record")


def changed(record: Record, **fields: Any) -> Record:
    """A copy with these fields; named tuples and dataclasses alike."""
    if hasattr(record, "_replace"):
        return record._replace(**fields)
    return dataclasses.replace(record, **fields)
