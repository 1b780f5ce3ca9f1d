"""The commands around the main job, and a new user's path through them."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from jsonschema import Draft202012Validator

from envcheck.__main__ import main
from envcheck.cli import new
from envcheck.solve import registry


@pytest.mark.parametrize("name", ["project", "rules", "report"])
def test_schemas_are_valid_json_schema(name: str, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["schema", name]) == 0
    Draft202012Validator.check_schema(json.loads(capsys.readouterr().out))


def test_materials_are_found_by_every_word(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["materials", "brick", "FACING"]) == 0
    page = capsys.readouterr().out
    assert "face_brick" in page
    assert "xps" not in page
    assert "Sources" in page


def test_materials_in_ip(capsys: pytest.CaptureFixture[str]) -> None:
    """1 W/(m K) = 6.933 Btu in/(h ft2 F): 0.9 W/(m K) is 6.24."""
    assert main(["materials", "face_brick", "--units", "IP"]) == 0
    assert " 6.24 " in capsys.readouterr().out


def test_every_method_is_listed_with_its_source(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["methods"]) == 0
    page = capsys.readouterr().out
    for method in registry.methods().values():
        assert f"{method.name}: " in page
    assert main(["methods", "parallel_path"]) == 0
    one = capsys.readouterr().out
    assert "ISO 6946" in one
    assert "may be prescribed" in one
    assert main(["methods", "paralel_path"]) == 2
    assert "did you mean 'parallel_path'?" in capsys.readouterr().err


def test_new_writes_a_project_that_checks(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    project = tmp_path / "room.yaml"
    assert main(["new", str(project), "--with-rules"]) == 0
    said = capsys.readouterr()
    assert said.out == ""
    assert str(project) in said.err
    assert main(["check", str(project)]) == 0
    page = capsys.readouterr().out
    assert "3 lines: 0 over their limit, 0 open." in page
    assert "Findings" not in page
    assert len(project.read_text().splitlines()) <= 36


def test_a_new_user_edits_errs_and_mends(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    project = tmp_path / "room.yaml"
    main(["new", str(project), "--with-rules"])
    text = project.read_text()
    thinner = text.replace("material: xps, thickness: 1 in", "material: xps, thickness: 1/2 in")
    assert thinner != text
    project.write_text(thinner.replace("kind: framed ", "kind: frammed "))
    capsys.readouterr()
    assert main(["check", str(project)]) == 2
    said = capsys.readouterr()
    assert said.out == ""
    assert "did you mean 'framed'?" in said.err
    line = 1 + thinner[: thinner.index("kind: framed")].count("\n")
    assert f"room.yaml:{line}: " in said.err
    project.write_text(thinner)
    main(["check", str(project)])
    assert "Wood 2x6 wall" in capsys.readouterr().out


def test_new_overwrites_nothing(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    project = tmp_path / "room.yaml"
    project.write_text("mine")
    assert main(["new", str(project)]) == 2
    assert project.read_text() == "mine"
    other = tmp_path / "other.yaml"
    rules = tmp_path / "rules" / new.RULE_SET / "ruleset.yaml"
    rules.parent.mkdir(parents=True)
    rules.write_text("mine too")
    assert main(["new", str(other), "--with-rules"]) == 2
    assert rules.read_text() == "mine too"
    assert not other.exists()
    assert "exists already" in capsys.readouterr().err


def test_new_names_the_schema_for_editors(tmp_path: Path) -> None:
    project = tmp_path / "room.yaml"
    main(["new", str(project)])
    first = project.read_text().splitlines()[0]
    assert first.startswith("# yaml-language-server: $schema=file:")
    assert first.endswith("project.schema.json")


@pytest.mark.parametrize("arguments", [["new"], ["check", "p.yaml", "-o"]])
def test_a_name_that_is_too_long_is_said(
    arguments: list[str],
    tmp_path: Path,
    capsys: pytest.CaptureFixture[str],
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    monkeypatch.chdir(tmp_path)
    assert main(["new", "p.yaml", "--with-rules"]) == 0
    before = sorted(tmp_path.rglob("*"))
    assert main([*arguments, "n" * 300 + ".yaml"]) == 2
    assert "cannot be written" in capsys.readouterr().err
    assert sorted(tmp_path.rglob("*")) == before
