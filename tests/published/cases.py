"""The printed cases of this folder, and a count of their figures by topic.

``python -m tests.published.cases`` prints the count.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator
from functools import cache
from pathlib import Path
from typing import Any, NamedTuple

import yaml

FOLDER = Path(__file__).parent
COVERAGE = FOLDER / "coverage.yaml"
"""Which cases stand behind which method; no case itself."""
Case = dict[str, Any]


class Figure(NamedTuple):
    """One printed figure of one point of one case."""

    case: Case
    point: str
    inputs: dict[str, Any]
    name: str
    expected: float
    tolerance: float

    @property
    def id(self) -> str:
        return f"{self.case['id']}/{self.point}/{self.name}"


@cache
def cases() -> tuple[Case, ...]:
    """All cases, in the order of their files."""
    return tuple(
        yaml.safe_load(path.read_text(encoding="utf-8"))
        for path in sorted(FOLDER.glob("*.yaml"))
        if path != COVERAGE
    )


def figures() -> Iterator[Figure]:
    """Every expected figure, with the inputs shared by its case."""
    for case in cases():
        for point in case["points"]:
            inputs = {**case.get("common", {}), **point["inputs"]}
            for name, expected in point["expect"].items():
                tolerance = point["tol"]
                if isinstance(tolerance, dict):
                    tolerance = tolerance[name]
                yield Figure(case, str(point["id"]), inputs, name, expected, tolerance)


def printed(figure: Figure) -> bool:
    """Whether the figure stands in a document, rather than being an independent computation."""
    return bool(figure.case.get("published", True))


def count() -> Counter[str]:
    """Printed figures by topic."""
    return Counter(figure.case["topic"] for figure in figures() if printed(figure))


if __name__ == "__main__":
    for topic, number in sorted(count().items()):
        print(f"{number:5}  {topic}")
    print(f"{sum(count().values()):5}  printed figures")
