"""The README keeps its promises: its first project and rule set, its sample, its commands."""

from __future__ import annotations

import re
from pathlib import Path

from click.testing import CliRunner

from envcheck.cli import envcheck as program

ROOT = Path(__file__).parent.parent
README = (ROOT / "README.md").read_text(encoding="utf-8")


def block(mark: str) -> str:
    """The fenced block behind a mark."""
    found = re.search(rf"<!-- {re.escape(mark)} -->\n```\w*\n(.*?)```", README, re.DOTALL)
    assert found, mark
    return found[1]


def checked(*arguments: str) -> tuple[int, str]:
    result = CliRunner().invoke(program, list(arguments), standalone_mode=False)
    assert result.exception is None
    return result.return_value, result.output


def test_first_project_and_rule_set(tmp_path: Path) -> None:
    rules = tmp_path / "rules" / "example-town"
    rules.mkdir(parents=True)
    (rules / "ruleset.yaml").write_text(block("first-rules ruleset.yaml"), encoding="utf-8")
    (rules / "table-1.csv").write_text(block("first-rules table-1.csv"), encoding="utf-8")
    project = tmp_path / "project.yaml"
    project.write_text(block("first-project"), encoding="utf-8")
    assert len(block("first-project").splitlines()) <= 30
    status, output = checked("check", str(project))
    assert status == 0
    assert "3 lines: 0 over their limit, 0 open." in output


def test_sample_is_what_the_program_prints() -> None:
    status, output = checked("check", str(ROOT / "projects/quillhaven-library/review.yaml"))
    assert status == 1
    printed = output.splitlines()
    sample = block("sample").splitlines()
    assert len(sample) > 20
    rest = iter(printed)  # in its order
    missing = [line for line in sample if line.strip() != "..." and line not in rest]
    assert not missing


def test_every_linked_page_exists() -> None:
    links = re.findall(r"\]\(([^)#]+)\)", README)
    assert links
    assert [link for link in links if not (ROOT / link).exists()] == []
