"""``check --watch``: check again whenever the project or a file of its rule sets changes."""

from __future__ import annotations

import gc
import sys
import time
from collections.abc import Callable, Iterator, Sequence
from pathlib import Path
from typing import NoReturn

import click

EVERY = 0.4
"""Seconds between two looks at the files."""
SUFFIXES = (".yaml", ".yml", ".csv")
Stamp = dict[str, tuple[int, int]]


def until_interrupted(project: str, folders: Sequence[str], check: Callable[[], int]) -> NoReturn:
    """Check, then again after every change, until somebody interrupts.

    Messages stand on standard error: a line between two runs, errors, and that it waits. An error
    of the input ends nothing: it is shown, and the next change is waited for. Never returns;
    KeyboardInterrupt ends it.
    """
    number = 0
    while True:
        number += 1
        seen = stamps(project, folders)
        if number > 1:
            say(f"--- check {number} of {project}, {time.strftime('%H:%M:%S')} ---")
        _one_check(check)
        gc.collect()
        say("waiting for a change; Ctrl-C ends")
        wait_for_change(project, folders, seen)


def _one_check(check: Callable[[], int]) -> None:
    from envcheck.errors import InputError

    try:
        check()
    except InputError as error:
        say(str(error))
    except click.ClickException as error:
        error.show(sys.stderr)


def wait_for_change(project: str, folders: Sequence[str], seen: Stamp) -> None:
    """Return once a file has changed and none has changed since the last look."""
    last = seen
    while True:
        now = stamps(project, folders)
        if now != seen and now == last:
            return
        last = now
        time.sleep(EVERY)


def stamps(project: str, folders: Sequence[str]) -> Stamp:
    """Time and size of the project file and of every file of the rule sets that are there."""
    found: Stamp = {}
    for path in _files(project, folders):
        try:
            state = path.stat()
        except OSError:  # between two steps of an editor that saves
            continue
        found[str(path)] = (state.st_mtime_ns, state.st_size)
    return found


def _files(project: str, folders: Sequence[str]) -> Iterator[Path]:
    from envcheck.read.rulesets import default_folders

    yield Path(project)
    for folder in default_folders(project, folders):
        if folder.is_dir():
            yield from (path for path in folder.rglob("*") if path.suffix in SUFFIXES)


def say(text: str) -> None:
    """Write a message between reports; what went before it is shown first."""
    sys.stdout.flush()
    print(text, file=sys.stderr, flush=True)
