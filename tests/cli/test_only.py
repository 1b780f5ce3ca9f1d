"""``check --only``, ``--format summary``, the sign of life, and completion."""

from __future__ import annotations

import io
import json
import os
import re
import subprocess
import sys
import time
from pathlib import Path

import pytest

from envcheck.__main__ import main
from envcheck.cli import progress
from envcheck.read.names_of import names_of
from envcheck.report import registry
from tests.report.fixture import JUDGED, PROJECT, RULESETS

ROOT = Path(__file__).parents[2]
REVIEW = str(ROOT / "projects/quillhaven-library/review.yaml")
PERMIT = str(ROOT / "projects/quillhaven-library/permit.yaml")
RENOVATION = str(ROOT / "projects/brannvik-warehouse/renovation.yaml")


@pytest.mark.parametrize(
    ("only", "status", "tags"),
    [
        (["N-D1"], 0, ["N-D1"]),
        (["N-W1"], 1, ["N-W1"]),
        (["F-G1"], 3, ["F-G1"]),
        (["F-*", "N-D1"], 3, ["F-G1", "N-D1", "F-F1"]),
        (["?-W3"], 1, ["E-W3"]),
        (["T-R4", "T-G2"], 0, ["T-R4", "T-G2"]),
    ],
)
def test_lines_status_and_summary_are_of_the_tags_asked_for(
    only: list[str], status: int, tags: list[str], capsys: pytest.CaptureFixture[str]
) -> None:
    options = [part for tag in only for part in ("--only", tag)]
    assert main(["check", REVIEW, "-f", "json", *options]) == status
    report = json.loads(capsys.readouterr().out)
    assert [row["tag"] for row in report["rows"]] == tags
    assert f"of 39 shown (only {', '.join(only)})" in report["summary"]
    over = sum(row["verdict"] == "fail" for row in report["rows"])
    assert f": {over} over their limit" in report["summary"]


@pytest.mark.parametrize("name", registry.names())
def test_every_format_says_that_not_all_is_shown(name: str, tmp_path: Path) -> None:
    output = tmp_path / "report"
    assert main(["check", PERMIT, "--only", "R-R2", "-f", name, "-o", str(output)]) == 0
    made = output.read_bytes()
    if name not in ("csv", "xlsx", "pdf"):
        assert re.search(rb"1\s+line\s+of\s+39\s+shown", made)
    if name == "csv":
        assert len(made.splitlines()) == 2


def test_what_is_shown_is_judged_with_the_whole_building(
    capsys: pytest.CaptureFixture[str],
) -> None:
    """The skylight's row stays closed by the area of the roof; the mean stays that of two roofs."""
    assert main(["check", REVIEW, "--only", "R-SK1"]) == 3
    assert "row closed by an area cap" in capsys.readouterr().out
    assert main(["check", PERMIT, "--only", "R-HT1"]) == 0
    assert "within (mean attic)" in capsys.readouterr().out


def test_an_unknown_tag_is_an_error_with_the_likely_one(
    capsys: pytest.CaptureFixture[str],
) -> None:
    assert main(["check", REVIEW, "--only", "N-W99", "--only", "Q-*", "--only", "N-W1"]) == 2
    said = capsys.readouterr()
    assert said.out == ""
    assert "'N-W99'" in said.err
    assert "'Q-*'" in said.err
    assert "did you mean" in said.err


def test_open_lines_fail_where_asked_of_these_lines_only() -> None:
    assert main(["check", REVIEW, "--only", "F-G1", "--fail-on", "open"]) == 1
    assert main(["check", REVIEW, "--only", "F-F1", "--fail-on", "open"]) == 0


# -------------------------------------------------------------------------------------- summary


def test_summary_has_one_line_for_each_and_the_counts(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", REVIEW, "-f", "summary"]) == 1
    lines = capsys.readouterr().out.splitlines()
    first = "over N-W1 (A-201): U 0.065, limit <= 0.060 Btu/(h ft2 F); over its limit "
    assert lines[0] == first + "[quillhaven-2025-3]"
    words = [line.partition(" ")[0] for line in lines[:-1]]
    findings = [line for line in lines if ": finding: " in line]
    assert words.count("over") == 10
    assert words.count("open") == 12 + 12
    assert len(findings) == 12
    assert lines[-1].startswith("39 lines: 10 over their limit, 12 open; 12 findings")


def test_summary_of_a_clean_set_is_the_counts_alone(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", PERMIT, "-f", "summary"]) == 0
    (line,) = capsys.readouterr().out.splitlines()
    assert line.startswith("39 lines: 0 over their limit, 0 open.")


def test_summary_of_the_shared_fixture() -> None:
    from envcheck.report import view

    text = registry.format_named("summary").render(view.build(PROJECT, RULESETS, JUDGED))
    assert isinstance(text, str)
    *lines, counts = text.splitlines()
    deciding = [line for line in JUDGED.lines if line.decides]
    assert sum(x.startswith("over ") for x in lines) == sum(x.verdict == "fail" for x in deciding)
    assert re.match(rf"{len(deciding)} lines: ", counts)
    assert all(re.match(r"(over|open) .+", line) for line in lines)


# ------------------------------------------------------------------------------------- progress


class Terminal(io.StringIO):
    def isatty(self) -> bool:
        return True


def test_long_work_gives_a_sign_of_life_and_takes_it_back(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    shown = Terminal()
    monkeypatch.setattr(sys, "stderr", shown)
    monkeypatch.setattr(progress, "AFTER", 0.05)
    monkeypatch.delenv("TERM", raising=False)
    with progress.progress("checking hall.yaml"):
        time.sleep(0.18)
    text = shown.getvalue()
    assert "\rchecking hall.yaml, 1 s" in text
    assert text.endswith(" \r")
    shown.truncate(0)
    shown.seek(0)
    with progress.progress("checking hall.yaml"):
        pass
    assert shown.getvalue() == ""


def test_no_sign_of_life_where_nobody_looks(monkeypatch: pytest.MonkeyPatch) -> None:
    shown = io.StringIO()
    monkeypatch.setattr(sys, "stderr", shown)
    monkeypatch.setattr(progress, "AFTER", 0.01)
    with progress.progress("checking hall.yaml"):
        time.sleep(0.05)
    assert shown.getvalue() == ""


def test_the_sign_of_life_goes_when_the_work_fails(monkeypatch: pytest.MonkeyPatch) -> None:
    shown = Terminal()
    monkeypatch.setattr(sys, "stderr", shown)
    monkeypatch.setattr(progress, "AFTER", 0.02)
    monkeypatch.delenv("TERM", raising=False)
    with pytest.raises(ValueError, match="no"), progress.progress("checking"):
        time.sleep(0.07)
        raise ValueError("no")
    assert shown.getvalue().endswith(" \r")


# ----------------------------------------------------------------------------------- completion


def completed(*words: str) -> list[str]:
    made = subprocess.run(
        [sys.executable, "-m", "envcheck"], capture_output=True, text=True, check=False, cwd=ROOT,
        env={**os.environ, "_ENVCHECK_COMPLETE": "bash_complete",
             "COMP_WORDS": " ".join(("envcheck", *words)), "COMP_CWORD": str(len(words))},
    )  # fmt: skip
    assert made.stderr == ""
    return [line.partition(",")[2] for line in made.stdout.split()]


def test_tags_and_ids_are_completed_from_the_project_named() -> None:
    project = "projects/quillhaven-library/review.yaml"
    assert completed("check", project, "--only", "N-W") == ["N-W1", "N-W7", "N-WN1", "N-W5"]
    assert set(completed("explain", project, "W")) == {
        "W-WN1", "W-W2", "W-W1", "WN1", "WN2", *(f"W{n}" for n in range(1, 10)),
    }  # fmt: skip
    assert completed("explain", "no-such.yaml", "W") == []


@pytest.mark.parametrize("path", [REVIEW, PERMIT, RENOVATION])
def test_names_by_lines_are_those_of_the_reader(path: str) -> None:
    from envcheck.pipeline import names
    from envcheck.read.project import read_project

    project = read_project(path, names())
    text = Path(path).read_text(encoding="utf-8")
    assert names_of(text, ("elements",)) == list(project.elements)
    assert names_of(text, ("assemblies",)) == list(project.assemblies)


def test_names_of_a_file_that_is_being_typed() -> None:
    text = (
        "elements:\n    A-1: {assembly: W\n    'B 2':\n      net_area: 3\n  # C: \n"
        "    D-\n\t:x\nx:\n  E: 1\n"
    )
    assert names_of(text, ("elements",)) == ["A-1", "B 2"]


def test_completion_loads_no_reader_of_yaml() -> None:
    made = subprocess.run(
        [sys.executable, "-X", "importtime", "-m", "envcheck"], capture_output=True, text=True,
        check=False, cwd=ROOT,
        env={**os.environ, "_ENVCHECK_COMPLETE": "bash_complete", "COMP_CWORD": "3",
             "COMP_WORDS": "envcheck explain projects/starter/starter.yaml "},
    )  # fmt: skip
    assert made.stdout
    assert not re.search(r"\| +(yaml|jsonschema|numpy)$", made.stderr, re.M)
