"""A full disk, an unwritable folder, a killed run: the old report stays, in every format."""

from __future__ import annotations

import os
import signal
import subprocess
import sys
from pathlib import Path

import pytest

from envcheck.report import registry

ROOT = Path(__file__).parents[2]
PROJECT = str(ROOT / "projects/starter/starter.yaml")
OLD = b"the old report"
COMMAND = [sys.executable, "-m", "envcheck", "check", PROJECT]
NO_ROOM = """
import resource, sys
from envcheck.__main__ import main
resource.setrlimit(resource.RLIMIT_FSIZE, (64, 64))
sys.exit(main(sys.argv[1:]))
"""
"""The system refuses every byte beyond the 64th of a file, as a full disk would."""
KILLED = """
import os, signal, sys
from pathlib import Path
from envcheck.__main__ import main
Path.replace = lambda self, target: os.kill(os.getpid(), signal.SIGKILL)
sys.exit(main(sys.argv[1:]))
"""
"""Killed when all is written beside the target, and nothing is put in place."""
KILLED_EARLY = """
import os, signal, sys
from envcheck.report import view
view.build = lambda *given: os.kill(os.getpid(), signal.SIGKILL)
from envcheck.__main__ import main
sys.exit(main(sys.argv[1:]))
"""
EVERY = pytest.mark.parametrize("name", registry.names())


def run(script: str, name: str, output: Path) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, "-c", script, "check", PROJECT, "-f", name, "-o", str(output)],
        capture_output=True, text=True, check=False, cwd=ROOT,
        env={**os.environ, "PYTHONDONTWRITEBYTECODE": "1"},
    )  # fmt: skip


@pytest.fixture
def output(tmp_path: Path) -> Path:
    file = tmp_path / "report"
    file.write_bytes(OLD)
    return file


@EVERY
def test_a_full_disk_leaves_the_old_report_and_no_half_file(name: str, output: Path) -> None:
    done = run(NO_ROOM, name, output)
    assert done.returncode == 2, done.stderr
    assert "cannot be written" in done.stderr
    assert "Traceback" not in done.stderr
    assert output.read_bytes() == OLD
    assert [path.name for path in output.parent.iterdir()] == ["report"]


@pytest.mark.parametrize("script", [KILLED, KILLED_EARLY])
@EVERY
def test_a_killed_run_leaves_the_old_report(name: str, script: str, output: Path) -> None:
    done = run(script, name, output)
    assert done.returncode == -signal.SIGKILL
    assert output.read_bytes() == OLD
    others = [path.name for path in output.parent.iterdir() if path != output]
    assert all(other.startswith(".report.") for other in others), others


@EVERY
def test_a_folder_that_takes_no_file(name: str, tmp_path: Path) -> None:
    """Nobody can write into /proc, the user of every right included."""
    folder = Path("/proc") if Path("/proc").is_dir() else tmp_path / "shut"
    if folder.name == "shut":
        folder.mkdir(mode=0o555)
    done = subprocess.run(
        [*COMMAND, "-f", name, "-o", str(folder / "report")], capture_output=True, text=True,
        check=False, cwd=ROOT,
    )  # fmt: skip
    assert done.returncode == 2
    assert "cannot be written" in done.stderr
    assert done.stderr.count("\n") == 1


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="the system has no full device")
@pytest.mark.parametrize("name", registry.names())
def test_a_full_standard_output_is_one_line_and_2(name: str) -> None:
    with open("/dev/full", "wb") as full:  # noqa: PTH123
        done = subprocess.run(
            [*COMMAND, "-f", name], stdout=full, stderr=subprocess.PIPE, text=True, check=False,
            cwd=ROOT,
        )  # fmt: skip
    assert done.returncode == 2
    assert "cannot be written (No space left on device)" in done.stderr
    assert "internal error" not in done.stderr
    assert done.stderr.count("\n") == 1


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="the system has no full device")
@pytest.mark.parametrize("arguments", [["--help"], ["check", "--help"], ["--version"]])
def test_help_into_a_full_device_is_no_fault_of_ours(arguments: list[str]) -> None:
    with open("/dev/full", "wb") as full:  # noqa: PTH123
        done = subprocess.run(
            [sys.executable, "-m", "envcheck", *arguments], stdout=full, stderr=subprocess.PIPE,
            text=True, check=False, cwd=ROOT,
        )  # fmt: skip
    assert done.returncode == 2
    assert "internal error" not in done.stderr
