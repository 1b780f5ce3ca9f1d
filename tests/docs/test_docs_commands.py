"""docs/exit-status.md: statuses, streams, colour, completion and the script do what it says."""

from __future__ import annotations

import os
import re
import shutil
import subprocess
import sys
from pathlib import Path

import pytest
from click.testing import CliRunner

from envcheck.cli import envcheck as program
from tests.docs.pages import DOCS, ROOT, blocks, complete_project


def _at_exit(folder: Path, arguments: list[str], stdin: str = "") -> tuple[int, str, str]:
    done = subprocess.run(
        [sys.executable, "-m", "envcheck", *arguments],
        cwd=folder,
        env={**os.environ, "PYTHONPATH": str(ROOT), "PYTHONDONTWRITEBYTECODE": "1"},
        input=stdin,
        capture_output=True,
        text=True,
        check=False,
    )
    return done.returncode, done.stdout, done.stderr


def test_standard_input_is_a_project(folder: Path) -> None:
    status, out, err = _at_exit(folder, ["check", "-"], complete_project())
    assert (status, err) == (0, "")
    assert "Garden room" in out
    status, out, err = _at_exit(folder, ["check", "-"], "envcheck: 1\nprojct: {}\n")
    assert (status, out) == (2, "")
    assert err.startswith("<stdin>:")


@pytest.mark.skipif(shutil.which("sh") is None, reason="needs a POSIX shell")
def test_script_names_every_status(folder: Path) -> None:
    ((_, script),) = blocks((DOCS / "exit-status.md").read_text(encoding="utf-8"), "script")
    within = complete_project()
    permits = folder / "permits"
    permits.mkdir()
    (permits / "a.yaml").write_text(within, encoding="utf-8")
    (permits / "b.yaml").write_text(within.replace("R-21", "R-11"), encoding="utf-8")
    (permits / "c.yaml").write_text(
        within.replace(", zones: [{zone: C2, source: county map}]", ""), encoding="utf-8"
    )
    (permits / "d.yaml").write_text("envcheck: 2\n", encoding="utf-8")
    program_file = folder / "envcheck"
    program_file.write_text(
        f'#!/bin/sh\nexec "{sys.executable}" -m envcheck "$@"\n', encoding="utf-8"
    )
    program_file.chmod(0o755)
    environment = {
        **os.environ,
        "PATH": f"{folder}{os.pathsep}{os.environ['PATH']}",
        "PYTHONPATH": str(ROOT),
    }
    done = subprocess.run(
        ["sh", "-c", script],
        cwd=folder,
        env=environment,
        capture_output=True,
        text=True,
        check=True,
    )
    assert done.stdout.splitlines() == [
        "permits/a.yaml within",
        "permits/b.yaml over",
        "permits/c.yaml open",
        "permits/d.yaml unreadable",
    ]
    assert (permits / "a.csv").is_file()
    assert not (permits / "d.csv").exists()
    assert "d.yaml" in (permits / "d.log").read_text(encoding="utf-8")


@pytest.mark.parametrize("shell", ["bash", "zsh", "fish"])
def test_completion_line_is_served(shell: str) -> None:
    page = (DOCS / "exit-status.md").read_text(encoding="utf-8")
    assert f"_ENVCHECK_COMPLETE={shell}_source envcheck" in page
    done = subprocess.run(
        [sys.executable, "-m", "envcheck"],
        cwd=ROOT,
        env={**os.environ, "_ENVCHECK_COMPLETE": f"{shell}_complete", "COMP_WORDS": "envcheck ex",
             "COMP_CWORD": "1" if shell != "fish" else "ex"},
        capture_output=True,
        text=True,
        check=False,
    )  # fmt: skip
    assert "explain" in done.stdout
    assert "check," not in done.stdout


def test_colour_follows_the_page(folder: Path) -> None:
    (folder / "p.yaml").write_text(complete_project(), encoding="utf-8")

    def coloured(arguments: list[str], **variables: str) -> bool:
        result = CliRunner(env={"NO_COLOR": None, "FORCE_COLOR": None, **variables}).invoke(
            program,
            ["check", str(folder / "p.yaml"), *arguments],
            standalone_mode=False,
            color=True,
        )
        assert result.exception is None
        return "\x1b[" in result.output

    assert not coloured([])
    assert coloured([], FORCE_COLOR="1")
    assert not coloured([], FORCE_COLOR="1", NO_COLOR="1")
    assert coloured(["--color", "always"], NO_COLOR="1")
    assert not coloured(["--color", "never"], FORCE_COLOR="1")


def test_links_between_pages_lead_somewhere() -> None:
    links = [
        (page, link)
        for page in DOCS.glob("*.md")
        for link in re.findall(r"\]\(([^)#:]+)\)", page.read_text(encoding="utf-8"))
    ]
    assert links
    assert [(page.name, link) for page, link in links if not (page.parent / link).exists()] == []
