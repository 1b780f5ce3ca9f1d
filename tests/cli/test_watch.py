"""``check --watch``: again on every change, errors shown and waited on, until Ctrl-C."""

from __future__ import annotations

import io
import os
import re
import shutil
import signal
import sys
import threading
import time
from collections.abc import Iterator
from pathlib import Path

import pytest

from envcheck.__main__ import main
from envcheck.cli import watching
from tests.cli.started import started

ROOT = Path(__file__).parents[2]
PATIENCE = 30.0


class Watched:
    """A running ``check --watch`` whose output is gathered as it comes."""

    def __init__(self, folder: Path, *arguments: str) -> None:
        self.project = folder / "starter.yaml"
        shutil.copy(ROOT / "projects/starter/starter.yaml", self.project)
        shutil.copytree(ROOT / "rules", folder / "rules")
        command = [sys.executable, "-m", "envcheck", "check", "starter.yaml", "--watch"]
        env = {**os.environ, "PYTHONPATH": str(ROOT)}
        self.program = started([*command, *arguments], folder, env=env)
        self.out: list[str] = []
        self.err: list[str] = []
        pairs = ((self.program.stdout, self.out), (self.program.stderr, self.err))
        self._readers = [threading.Thread(target=self._read, args=pair) for pair in pairs]
        for reader in self._readers:
            reader.start()

    @staticmethod
    def _read(stream: object, texts: list[str]) -> None:
        assert isinstance(stream, io.TextIOBase)
        with stream:
            for line in stream:
                texts.append(line)  # one by one, as they come

    def waits(self, times: int) -> None:
        """Until it has said so often that it waits."""
        end = time.monotonic() + PATIENCE
        while sum("waiting for a change" in line for line in self.err) < times:
            assert self.program.poll() is None, self.err
            assert time.monotonic() < end, self.err
            time.sleep(0.05)
        time.sleep(0.1)

    def edit(self, old: str, new: str) -> None:
        text = self.project.read_text(encoding="utf-8")
        assert old in text
        beside = self.project.with_suffix(".tmp")
        beside.write_text(text.replace(old, new), encoding="utf-8")
        beside.replace(self.project)

    def stop(self) -> None:
        self.program.kill()
        self.program.wait()
        for reader in self._readers:
            reader.join()

    def interrupt(self) -> int:
        self.program.send_signal(signal.SIGINT)
        return self.program.wait(PATIENCE)


@pytest.fixture
def watched(tmp_path: Path) -> Iterator[Watched]:
    running = Watched(tmp_path)
    yield running
    running.stop()


def test_a_broken_file_is_shown_and_waited_on_until_it_is_mended(watched: Watched) -> None:
    watched.waits(1)
    assert sum("Lines\n" in line for line in watched.out) == 1
    watched.edit("kind: framed", "kind: frammed")
    watched.waits(2)
    assert "did you mean 'framed'?" in "".join(watched.err)
    assert sum("Lines\n" in line for line in watched.out) == 1
    watched.edit("kind: frammed", "kind: framed")
    watched.waits(3)
    assert sum("Lines\n" in line for line in watched.out) == 2
    separators = [line for line in watched.err if line.startswith("---")]
    assert [re.findall(r"check (\d) of starter.yaml, \d\d:\d\d:\d\d", s) for s in separators] == [
        ["2"], ["3"],
    ]  # fmt: skip
    assert watched.interrupt() == 130
    assert "Traceback" not in "".join(watched.err)


def test_a_change_of_a_rule_set_is_seen_and_a_rest_is_not_checked(watched: Watched) -> None:
    watched.waits(1)
    time.sleep(4 * watching.EVERY)
    assert sum("waiting" in line for line in watched.err) == 1
    rules = watched.project.parent / "rules"
    table = next(rules.rglob("*.csv"))
    table.write_text(table.read_text(encoding="utf-8") + "\n", encoding="utf-8")
    watched.waits(2)
    assert watched.interrupt() == 130


def test_a_file_that_is_gone_for_a_while_is_waited_for(watched: Watched) -> None:
    watched.waits(1)
    away = watched.project.with_name("away")
    watched.project.rename(away)
    watched.waits(2)
    away.rename(watched.project)
    watched.waits(3)
    assert sum("Lines\n" in line for line in watched.out) == 2
    assert watched.interrupt() == 130


def test_standard_input_cannot_be_watched(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["check", "-", "--watch"]) == 2
    assert "--watch needs a project file" in capsys.readouterr().err


def test_stamps_tell_every_file_that_matters(tmp_path: Path) -> None:
    shutil.copytree(ROOT / "rules", tmp_path / "rules")
    project = tmp_path / "p.yaml"
    before = watching.stamps(str(project), ())
    assert str(project) not in before
    assert any(name.endswith("table-1.csv") for name in before)
    project.write_text("envcheck: 1\n")
    assert watching.stamps(str(project), ()) != before
