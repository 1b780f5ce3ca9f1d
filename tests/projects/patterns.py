"""The error patterns of ``tests/cases/patterns``: a folder each, with good and bad projects.

``expect.yaml`` names for each bad project the finding, the input error, or the verdict with words
of its reason; a good project gives no finding and passes.
"""

from __future__ import annotations

from functools import cache
from pathlib import Path
from typing import Any, NamedTuple

import yaml

from envcheck.errors import InputError
from envcheck.pipeline import Run, run
from envcheck.report.formats import text
from envcheck.report.view import ViewOptions, build

FOLDER = Path(__file__).parent.parent / "cases" / "patterns"
WIDE = 10_000
"""Columns, so that a finding stands in one line."""


class Pattern(NamedTuple):
    """One error pattern."""

    number: int
    title: str
    folder: Path
    bad: dict[str, dict[str, Any]]
    """Project -> what it must give."""
    good: tuple[str, ...]


@cache
def patterns() -> tuple[Pattern, ...]:
    """All patterns in order."""
    return tuple(_pattern(path) for path in sorted(FOLDER.glob("[0-9]*")))


def _pattern(folder: Path) -> Pattern:
    expected = yaml.safe_load((folder / "expect.yaml").read_text(encoding="utf-8"))
    title = expected.pop("title")
    good = tuple(sorted(path.stem for path in folder.glob("good*.yaml")))
    return Pattern(int(folder.name[:2]), title, folder, expected, good)


@cache
def judged(folder: Path, name: str) -> Run:
    """Run one project."""
    return run(str(folder / f"{name}.yaml"))


def printed(folder: Path, name: str, expected: dict[str, Any]) -> str:
    """What ``check`` says of it: of a finding what was seen, and what it suggests."""
    if "error" in expected:
        try:
            judged(folder, name)
        except InputError as error:
            said = [str(p) for p in error.problems if p.kind.id == expected["error"]]
            return said[0].replace(f"{folder}/", "") if said else ""
        return ""
    done = judged(folder, name)
    page = text.render(build(done.project, done.rulesets, done.judged, ViewOptions(width=WIDE)))
    lines = [line.strip().removeprefix("- ") for line in page.splitlines()]
    words = f"[{expected['finding']}]" if "finding" in expected else expected["says"]
    at = next((number for number, line in enumerate(lines) if words in line), None)
    if at is None or "finding" not in expected:
        return lines[at] if at is not None else ""
    return f"{lines[at]}; {lines[at + 1]}"


def caught_by(expected: dict[str, Any]) -> str:
    """Where a case is caught: a cross-check, an input error, a verdict."""
    if "finding" in expected:
        return f"`{expected['finding']}`"
    if "error" in expected:
        return f"input error `{expected['error']}`"
    return f"verdict {expected['verdict'].replace('_', ' ')}"
