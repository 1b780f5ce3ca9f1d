"""Exit statuses, streams, and output that is written whole or not at all."""

from __future__ import annotations

import os
import signal
import subprocess
import sys
import time
from pathlib import Path
from types import SimpleNamespace

import pytest

import envcheck
from envcheck.__main__ import main
from envcheck.errors import InputError, problem
from tests.cli.started import started
from tests.report.fixture import JUDGED, PROJECT, RULESETS

COMMAND = [sys.executable, "-m", "envcheck"]
ROOT = Path(envcheck.__file__).parents[1]


@pytest.fixture
def run(monkeypatch: pytest.MonkeyPatch) -> SimpleNamespace:
    """A pipeline that gives the shared fixture with the exit status asked for, or raises."""
    wanted = SimpleNamespace(status=1, error=None, asked=None)

    def fake(
        path: str, folders: object = (), bounds: bool = False, close: str = ""
    ) -> SimpleNamespace:
        wanted.asked = (path, folders)
        if wanted.error is not None:
            raise wanted.error
        return SimpleNamespace(
            project=PROJECT, rulesets=RULESETS, judged=JUDGED, exit_status=wanted.status
        )

    module = SimpleNamespace(run=fake, why=lambda solved: None, extras=lambda run, subject: None)
    monkeypatch.setitem(sys.modules, "envcheck.pipeline", module)
    monkeypatch.setattr(envcheck, "pipeline", module, raising=False)
    return wanted


@pytest.mark.parametrize("status", [0, 1, 3])
def test_check_ends_with_the_status_of_the_run(run: SimpleNamespace, status: int) -> None:
    run.status = status
    assert main(["check", "hall.yaml"]) == status


def test_open_lines_fail_only_where_asked(run: SimpleNamespace) -> None:
    run.status = 3
    assert main(["check", "hall.yaml", "--fail-on", "open"]) == 1
    run.status = 0
    assert main(["check", "hall.yaml", "--fail-on", "open"]) == 0


def test_input_errors_go_to_stderr_all_at_once(
    run: SimpleNamespace, capsys: pytest.CaptureFixture[str], tmp_path: Path
) -> None:
    run.error = InputError(
        [
            problem("unknown-key", "a.yaml", 9, key="b", where="x", hint="y"),
            problem("unknown-key", "a.yaml", 3, key="c", where="x", hint="y"),
        ]
    )
    output = tmp_path / "out.txt"
    assert main(["check", "a.yaml", "--output", str(output)]) == 2
    said = capsys.readouterr()
    assert said.out == ""
    assert [line.split(" ")[0] for line in said.err.splitlines()] == ["a.yaml:3:", "a.yaml:9:"]
    assert not output.exists()


@pytest.mark.parametrize(
    "arguments",
    [["frobnicate"], ["check"], ["check", "x", "--format", "papyrus"], ["check", "x", "--nope"],
     ["check", "x", "--date", "yesterday"], ["schema", "nothing"], [], ["explain", "x"],
     ["check", "x", "--rules", "/no/such/folder"], ["methods", "magic"], ["materials", "zzzz"]],
)  # fmt: skip
def test_usage_errors_end_with_2(
    arguments: list[str], capsys: pytest.CaptureFixture[str], run: SimpleNamespace
) -> None:
    assert main(arguments) == 2
    said = capsys.readouterr()
    assert said.out == ""
    assert said.err


def test_a_misspelt_command_is_suggested(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["chekc", "x.yaml"]) == 2
    assert "did you mean 'check'?" in capsys.readouterr().err


def test_a_fault_of_ours_is_one_line_and_70(
    run: SimpleNamespace, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.delenv("ENVCHECK_DEBUG", raising=False)
    run.error = ZeroDivisionError("division\nby zero")
    assert main(["check", "hall.yaml"]) == 70
    said = capsys.readouterr()
    assert said.out == ""
    assert said.err.count("\n") == 1
    assert "internal error ZeroDivisionError: division by zero" in said.err
    assert "Traceback" not in said.err
    monkeypatch.setenv("ENVCHECK_DEBUG", "1")
    assert main(["check", "hall.yaml"]) == 70
    assert "Traceback" in capsys.readouterr().err


@pytest.mark.parametrize("error", [KeyboardInterrupt(), EOFError()])
def test_an_interrupt_ends_with_130_and_no_traceback(
    run: SimpleNamespace, capsys: pytest.CaptureFixture[str], error: BaseException
) -> None:
    run.error = error
    assert main(["check", "hall.yaml"]) == 130
    assert capsys.readouterr().err.strip() == ""


def test_ctrl_c_ends_a_waiting_program_quietly() -> None:
    """The program waits for standard input; the signal comes as from a terminal."""
    made = started([*COMMAND, "check", "-"], ROOT, stdin=subprocess.PIPE)
    time.sleep(2.0)
    made.send_signal(signal.SIGINT)
    out, err = made.communicate(timeout=20)
    assert made.returncode == 130
    assert out == ""
    assert err.strip() == ""


@pytest.mark.parametrize("arguments", [["materials"], ["--help"], ["schema", "project"]])
def test_a_closed_pipe_ends_quietly(arguments: list[str]) -> None:
    reading, writing = os.pipe()
    os.close(reading)
    try:
        made = subprocess.run(
            [*COMMAND, *arguments], cwd=ROOT, stdout=writing, stderr=subprocess.PIPE, text=True,
            check=False,
        )  # fmt: skip
    finally:
        os.close(writing)
    assert made.returncode in (0, 141)
    assert made.stderr == ""


# -------------------------------------------------------------------------------- output file


def test_the_report_goes_to_the_file_and_nothing_to_stdout(
    run: SimpleNamespace, capsys: pytest.CaptureFixture[str], tmp_path: Path
) -> None:
    output = tmp_path / "report.csv"
    output.write_text("old")
    output.chmod(0o640)
    assert main(["check", "hall.yaml", "--format", "csv", "--output", str(output)]) == 1
    assert capsys.readouterr().out == ""
    assert output.read_text().startswith("rule set,")
    assert output.stat().st_mode & 0o777 == 0o640
    assert [path.name for path in tmp_path.iterdir()] == ["report.csv"]


def test_a_failed_write_leaves_the_old_file(
    run: SimpleNamespace, monkeypatch: pytest.MonkeyPatch, tmp_path: Path
) -> None:
    output = tmp_path / "report.txt"
    output.write_text("old")

    def full(self: Path, target: Path) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(Path, "replace", full)
    assert main(["check", "hall.yaml", "--output", str(output)]) == 2
    assert output.read_text() == "old"
    assert [path.name for path in tmp_path.iterdir()] == ["report.txt"]


def test_the_input_is_never_overwritten(
    run: SimpleNamespace, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    project = tmp_path / "hall.yaml"
    project.write_text("mine")
    link = tmp_path / "link.yaml"
    link.symlink_to(project)
    for output in (project, link):
        assert main(["check", str(project), "--output", str(output)]) == 2
        assert "is the input" in capsys.readouterr().err
    assert project.read_text() == "mine"


def test_an_output_that_is_no_file_is_refused(
    run: SimpleNamespace, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["check", "hall.yaml", "--output", str(tmp_path)]) == 2
    assert main(["check", "hall.yaml", "--output", str(tmp_path / "no" / "such.txt")]) == 2
    assert main(["check", "hall.yaml", "--output", os.devnull]) == 2
    assert "cannot be written" in capsys.readouterr().err
    assert Path(os.devnull).is_char_device()


# ------------------------------------------------------------------------------------ options


def test_options_reach_the_report(
    run: SimpleNamespace, capsys: pytest.CaptureFixture[str], tmp_path: Path
) -> None:
    arguments = ["check", "-", "--rules", str(tmp_path), "--units", "si", "--date", "2027-01-31"]
    main([*arguments, "--details", "--bounds"])
    page = capsys.readouterr().out
    assert run.asked == ("-", (str(tmp_path),))
    assert "2027-01-31" in page
    assert "U 0.368" in page
    assert "Assembly W1" in page
    assert " bounds " in page


def test_colour_is_asked_for_or_for_a_terminal_only(
    run: SimpleNamespace, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    def coloured(*more: str) -> bool:
        main(["check", "hall.yaml", *more])
        return "\x1b[" in capsys.readouterr().out

    for name in ("NO_COLOR", "FORCE_COLOR"):
        monkeypatch.delenv(name, raising=False)
    assert not coloured()
    assert coloured("--color", "always")
    monkeypatch.setenv("FORCE_COLOR", "1")
    assert coloured()
    assert not coloured("--color", "never")
    monkeypatch.setenv("NO_COLOR", "1")
    assert not coloured()


def test_explain_ends_with_0_and_suggests_names(
    run: SimpleNamespace, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["explain", "hall.yaml", "N-1"]) == 0
    assert "Worksheet" in capsys.readouterr().out
    assert main(["explain", "hall.yaml", "N-11"]) == 2
    assert "did you mean 'N-1'?" in capsys.readouterr().err
