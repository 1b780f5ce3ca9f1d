"""A sign of life on a terminal for work that takes longer than a second."""

from __future__ import annotations

import os
import sys
from collections.abc import Iterator
from contextlib import contextmanager

AFTER = 1.0
"""Seconds without a word."""


@contextmanager
def progress(what: str) -> Iterator[None]:
    """Say what is being done, and for how long, on standard error where that is a terminal.

    Nothing is said in the first second, and the line is taken back at the end.
    """
    if not sys.stderr.isatty() or os.environ.get("TERM") == "dumb":
        yield
        return
    from threading import Event, Thread

    done = Event()
    teller = Thread(target=_tell, args=(what, done), daemon=True)
    teller.start()
    try:
        yield
    finally:
        done.set()
        teller.join()


def _tell(what: str, done: object) -> None:
    from threading import Event

    assert isinstance(done, Event)
    seconds, text = 0, ""
    while not done.wait(AFTER):
        seconds += 1
        text = f"{what}, {seconds} s"
        sys.stderr.write(f"\r{text}")
        sys.stderr.flush()
    if text:
        sys.stderr.write(f"\r{' ' * len(text)}\r")
        sys.stderr.flush()
