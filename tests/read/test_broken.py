"""Every broken project file says what is wrong, where, and in which words."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest
import yaml

from envcheck.errors import InputError
from envcheck.read.project import read_project
from tests.read.names import NAMES

BROKEN = Path(__file__).parent.parent / "cases" / "broken"
CASES = yaml.safe_load((BROKEN / "index.yaml").read_text(encoding="utf-8"))


@pytest.mark.parametrize("case", CASES, ids=lambda case: case["file"])
def test_broken_file_names_its_mistake(case: dict[str, Any]) -> None:
    with pytest.raises(InputError) as caught:
        read_project(str(BROKEN / case["file"]), NAMES)
    problems = caught.value.problems
    text = str(caught.value)
    line = None if case["line"] == "none" else case["line"]
    assert (problems[0].kind.id, problems[0].line) == (case["id"], line), text
    message = str(problems[0])
    for word in case["words"]:
        assert word in message, message
    assert f"[{case['id']}]" in message and "Fix: " in message
    assert all(character.isprintable() for character in message), message
    assert len(message) < 1000


SINGLE = [c for c in CASES if c["file"] not in {"alias-bomb.yaml", "self-alias.yaml"}]
"""Beside each alias stands an anchor, and both are refused."""


@pytest.mark.parametrize("case", SINGLE, ids=lambda case: case["file"])
def test_one_mistake_gives_one_problem(case: dict[str, Any]) -> None:
    with pytest.raises(InputError) as caught:
        read_project(str(BROKEN / case["file"]), NAMES)
    assert len(caught.value.problems) == 1, str(caught.value)


def test_every_broken_project_is_in_the_index() -> None:
    there = {path.name for path in BROKEN.glob("*.yaml")} - {"index.yaml"}
    assert there == {case["file"] for case in CASES}


def test_all_problems_come_at_once_in_order_of_line(tmp_path: Path) -> None:
    text = (BROKEN.parent / "sound" / "shed.yaml").read_text(encoding="utf-8")
    for old, new in (
        ("material: plywood", "material: plywod"),
        ("spacing: 16 in", "spacing: 16"),
        ("category: wall.mass", "category: wall.mas"),
        ("report_date: 2026-03-09", "report_date: 2026-02-30"),
        ("frame_width: 100 mm", "frame_with: 100 mm"),
        ("    title: Block wall", "    title: Block wall\n    title: Again"),
    ):
        assert text.count(old) >= 1
        text = text.replace(old, new, 1)
    file = tmp_path / "several.yaml"
    file.write_text(text, encoding="utf-8")
    with pytest.raises(InputError) as caught:
        read_project(str(file), NAMES)
    problems = caught.value.problems
    assert [p.kind.id for p in problems] == [
        "bad-date",
        "unknown-material",
        "missing-unit",
        "duplicate-key",
        "unknown-key",
        "unknown-category",
    ]
    lines = [p.line or 0 for p in problems]
    assert lines == sorted(lines)
