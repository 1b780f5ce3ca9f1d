"""Every broken rule set says what is wrong, where, and in which words; one mistake each."""

from __future__ import annotations

from datetime import date
from pathlib import Path

import pytest
import yaml

from envcheck.errors import InputError
from envcheck.read.rulesets import read_ruleset
from tests.read.names import NAMES

BROKEN = Path(__file__).parent.parent / "cases" / "broken_rules"
CASES = yaml.safe_load((BROKEN / "index.yaml").read_text(encoding="utf-8"))


@pytest.mark.parametrize("case", CASES, ids=lambda case: case["case"])
def test_broken_rule_set_names_its_mistake(case: dict) -> None:
    folder = BROKEN / case["case"]
    with pytest.raises(InputError) as caught:
        read_ruleset(case["ruleset"], [folder], date(2026, 3, 2), NAMES)
    text = str(caught.value)
    first = caught.value.problems[0]
    line = None if case["line"] == "none" else case["line"]
    place = Path(first.file).relative_to(folder).as_posix()
    assert (first.kind.id, place, first.line) == (case["id"], case["file"], line), text
    for word in case["words"]:
        assert word in str(first), text
    assert {p.kind.id for p in caught.value.problems} == {case["id"]}, text


def test_every_broken_rule_set_is_in_the_index() -> None:
    there = {path.name for path in BROKEN.iterdir() if path.is_dir()}
    assert there == {case["case"] for case in CASES}


def test_all_problems_of_all_sheets_come_at_once(tmp_path: Path) -> None:
    for name in ("blank-cell", "zone-misspelt"):
        (tmp_path / name).mkdir()
    source = BROKEN / "blank-cell" / "town"
    target = tmp_path / "blank-cell" / "town"
    target.mkdir()
    sheet = (source / "opaque.csv").read_text().replace("13,0.060", "13g,0.060")
    (target / "opaque.csv").write_text(sheet)
    meaning = (source / "ruleset.yaml").read_text()
    (target / "ruleset.yaml").write_text(meaning + "conventions: {films: iso6947}\n")
    with pytest.raises(InputError) as caught:
        read_ruleset("town", [tmp_path / "blank-cell"], None, NAMES)
    kinds = [p.kind.id for p in caught.value.problems]
    assert kinds == ["blank-cell", "trailing-letter", "unknown-film-set"]
