"""A program started as from a terminal: it can be interrupted, however the tests themselves run."""

from __future__ import annotations

import signal
import subprocess
from functools import partial
from pathlib import Path
from typing import Any


def started(command: list[str], folder: Path, **more: Any) -> subprocess.Popen[str]:
    """Start a program whose output is read.

    A shell that runs the tests in the background has them ignore Ctrl-C, and a child inherits that.
    """
    return subprocess.Popen(
        command, cwd=folder, stdout=subprocess.PIPE, stderr=subprocess.PIPE, text=True,
        preexec_fn=partial(signal.signal, signal.SIGINT, signal.SIG_DFL), **more,
    )  # fmt: skip
