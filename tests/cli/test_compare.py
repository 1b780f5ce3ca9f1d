"""``envcheck compare``: exit status, both files' errors at once, output whole or not at all."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

from envcheck.__main__ import main

ROOT = Path(__file__).parents[2]
LIBRARY = ROOT / "projects/quillhaven-library"
REVIEW, PERMIT = str(LIBRARY / "review.yaml"), str(LIBRARY / "permit.yaml")


def test_the_status_is_0_whatever_changed(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["compare", REVIEW, PERMIT]) == 0
    assert "25 changed" in capsys.readouterr().out
    assert main(["compare", PERMIT, REVIEW]) == 0
    assert main(["compare", PERMIT, PERMIT]) == 0
    assert "The two say the same" in " ".join(capsys.readouterr().out.split())


def test_errors_of_both_files_come_at_once_with_their_names(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    text = Path(PERMIT).read_text(encoding="utf-8")
    first, second = tmp_path / "old.yaml", tmp_path / "new.yaml"
    first.write_text(text.replace("thickness: 2.5 in", "thickness: 2.5 inn"), encoding="utf-8")
    second.write_text(text.replace("surface: North", "surface: Nort"), encoding="utf-8")
    output = tmp_path / "changes.html"
    output.write_text("old")
    arguments = ["compare", str(first), str(second), "--rules", str(ROOT / "rules")]
    assert main([*arguments, "-f", "html", "-o", str(output)]) == 2
    said = capsys.readouterr()
    assert said.out == ""
    assert re.search(rf"^{re.escape(str(first))}:\d+: ", said.err, re.M)
    assert re.search(rf"^{re.escape(str(second))}:\d+: .*did you mean 'North'", said.err, re.M)
    assert output.read_text() == "old"


def test_a_missing_file_is_said_beside_the_other_files_errors(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    broken = tmp_path / "new.yaml"
    broken.write_text("envcheck: 1\n")
    assert main(["compare", str(tmp_path / "no.yaml"), str(broken)]) == 2
    said = capsys.readouterr().err
    assert "no.yaml" in said
    assert "new.yaml" in said


def test_standard_input_stands_for_one_of_the_two(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["compare", "-", "-"]) == 2
    assert "not both" in capsys.readouterr().err


@pytest.mark.parametrize("name", ["review.yaml", "permit.yaml"])
def test_neither_file_is_overwritten(name: str, capsys: pytest.CaptureFixture[str]) -> None:
    before = (LIBRARY / name).read_bytes()
    assert main(["compare", REVIEW, PERMIT, "-o", str(LIBRARY / name)]) == 2
    assert "is the input" in capsys.readouterr().err
    assert (LIBRARY / name).read_bytes() == before


def test_the_building_as_designed_against_another_project(
    capsys: pytest.CaptureFixture[str],
) -> None:
    """Each file is judged by its own rule sets: lines of both, none in common."""
    other = str(ROOT / "projects/brannvik-warehouse/renovation.yaml")
    assert main(["compare", PERMIT, other]) == 0
    page = " ".join(capsys.readouterr().out.split())
    assert "39 lines before, 9 now: 0 changed" in page
    assert "9 added, 39 dropped" in page
