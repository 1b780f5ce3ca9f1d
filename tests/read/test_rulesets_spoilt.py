"""A rule set with anything dropped, exchanged or typed over is read, or refused in words."""

from __future__ import annotations

import shutil
from collections.abc import Iterator
from datetime import date
from pathlib import Path
from tempfile import TemporaryDirectory
from typing import Any

import pytest
import yaml
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from envcheck.errors import InputError
from envcheck.model.names import Names
from envcheck.read.rulesets import read_ruleset
from tests.read.test_rulesets import NAMES, SHIPPED

DAY = date(2026, 3, 2)
MEANING = yaml.load(
    (SHIPPED / "merrow-2025" / "ruleset.yaml").read_text(encoding="utf-8"), yaml.BaseLoader
)
SHEET = (SHIPPED / "merrow-2025" / "table-1.csv").read_text(encoding="utf-8")
WORDS = st.sampled_from(
    ["", "wall.mass", "x", "-1", "1e9", "[a", "no", "2025-13-01", "{}", "<0", "/"]
)
QUICK = settings(max_examples=60, deadline=None, suppress_health_check=list(HealthCheck))


def paths(node: Any, at: tuple[Any, ...] = ()) -> Iterator[tuple[Any, ...]]:
    steps = node.items() if isinstance(node, dict) else enumerate(node)
    for step, inner in steps if isinstance(node, dict | list) else ():
        yield (*at, step)
        yield from paths(inner, (*at, step))


PATHS = list(paths(MEANING))


def read_or_refuse(folder: Path, names: Names = NAMES) -> None:
    try:
        read_ruleset("merrow-2025", [folder], DAY, names)
    except InputError as error:
        in_words(error)


def in_words(error: InputError) -> None:
    assert error.problems
    for problem in error.problems:
        assert problem.fix and str(problem).isprintable(), problem


@QUICK
@given(st.sampled_from(PATHS), st.sampled_from(["drop", "word", "list", "entry"]), WORDS)
def test_meaning(path: tuple[Any, ...], how: str, word: str) -> None:
    data = yaml.safe_load(yaml.safe_dump(MEANING))
    parent = data
    for step in path[:-1]:
        parent = parent[step]
    if how == "drop":
        del parent[path[-1]]
    else:
        parent[path[-1]] = {"word": word, "list": [word], "entry": {word: word}}[how]
    with TemporaryDirectory() as name:
        folder = Path(name) / "rules"
        shutil.copytree(SHIPPED / "merrow-2025", folder / "merrow-2025")
        text = yaml.safe_dump(data, sort_keys=False)
        (folder / "merrow-2025" / "ruleset.yaml").write_text(text, encoding="utf-8")
        read_or_refuse(folder)


@QUICK
@given(st.integers(0, len(SHEET) - 1), st.integers(0, 12), st.text(max_size=4))
def test_sheet(start: int, length: int, typed: str) -> None:
    text = SHEET[:start] + typed + SHEET[start + length :]
    with TemporaryDirectory() as name:
        folder = Path(name) / "rules"
        shutil.copytree(SHIPPED / "merrow-2025", folder / "merrow-2025")
        raw = text.encode("utf-8", "surrogatepass")
        (folder / "merrow-2025" / "table-1.csv").write_bytes(raw)
        read_or_refuse(folder)


@pytest.mark.parametrize("file", ["films.csv", "cavity_factors.csv", "f_factors.csv"])
def test_coefficient_tables(file: str, tmp_path: Path) -> None:
    shutil.copytree(SHIPPED / "merrow-2025", tmp_path / "merrow-2025")
    sheet = tmp_path / "merrow-2025" / file
    text = sheet.read_text()
    for spoilt in (
        "",
        "a",
        text.replace("0", "x", 1),
        text.replace(",", ";"),
        text[: len(text) // 2],
    ):
        sheet.write_text(spoilt)
        with pytest.raises(InputError) as caught:
            read_ruleset("merrow-2025", [tmp_path], DAY, NAMES)
        in_words(caught.value)
