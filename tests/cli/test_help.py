"""Help and start: nothing heavy is loaded before it is needed."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest
from click.testing import CliRunner

from envcheck import __version__
from envcheck.cli import COMMANDS, envcheck

HEAVY = {"pandas", "numpy", "scipy", "yaml", "jsonschema", "tabulate"}
LOADED = """
import sys
from envcheck.__main__ import main
status = main(sys.argv[1:])
print(status, *sorted(name for name in sys.modules if "." not in name or "envcheck" in name))
"""


def loaded(*arguments: str) -> tuple[str, set[str]]:
    made = subprocess.run(
        [sys.executable, "-c", LOADED, *arguments], capture_output=True, text=True, check=True
    )
    status, *modules = made.stdout.splitlines()[-1].split()
    return status, set(modules)


@pytest.mark.parametrize("arguments", [["--help"], ["-h"], ["--version"]])
def test_help_loads_click_and_nothing_heavy(arguments: list[str]) -> None:
    status, modules = loaded(*arguments)
    assert status == "0"
    assert "click" in modules
    assert not modules & HEAVY
    rooms = ("report", "read", "solve", "judge", "pipeline", "model")
    assert not {m for m in modules if m.startswith(tuple(f"envcheck.{room}" for room in rooms))}


def test_help_of_check_loads_no_reader_and_no_solver() -> None:
    status, modules = loaded("check", "--help")
    assert status == "0"
    assert not modules & HEAVY
    assert not {m for m in modules if m.startswith(("envcheck.read", "envcheck.solve"))}


ROOT = Path(__file__).parent.parent.parent


@pytest.mark.parametrize(
    ("project", "scientific"),
    [
        ("projects/starter/starter.yaml", False),
        ("projects/brannvik-warehouse/renovation.yaml", True),  # its dormer cheek hangs on it
    ],
)
def test_check_loads_scipy_only_for_a_section(project: str, scientific: bool) -> None:
    _, modules = loaded("check", str(ROOT / project))
    assert bool(modules & {"numpy", "scipy"}) is scientific
    assert any(m.startswith("envcheck.solve.field") for m in modules) is scientific


@pytest.mark.parametrize("name", COMMANDS)
@pytest.mark.parametrize("option", ["-h", "--help"])
def test_every_command_shows_one_worked_line(name: str, option: str) -> None:
    made = CliRunner().invoke(envcheck, [name, option], prog_name="envcheck")
    assert made.exit_code == 0
    assert made.output.count("A worked line:") == 1
    assert f"\n    envcheck {name} " in made.output


def test_the_line_of_help_is_the_first_of_the_command() -> None:
    whole = CliRunner().invoke(envcheck, ["--help"], prog_name="envcheck").output
    for name, (_, line) in COMMANDS.items():
        assert f"{name} " in whole
        assert line in whole


def test_the_version_is_printed_short() -> None:
    made = CliRunner().invoke(envcheck, ["--version"])
    assert made.output == f"envcheck {__version__}\n"
