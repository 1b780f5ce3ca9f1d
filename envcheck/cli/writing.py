"""Where a finished report goes: standard output, or a file that is written whole or not at all."""

from __future__ import annotations

import os
import sys
from contextlib import suppress
from pathlib import Path

import click


def deliver(made: str | bytes, output: str | None, inputs: tuple[str, ...] = ()) -> None:
    """Write a report. ``inputs`` are files that must not be overwritten by it.

    Errors: click.ClickException where the file cannot be written, or a terminal cannot show it.
    """
    if output is None or output == "-":
        _show(made)
        return
    target = Path(os.path.realpath(output))
    try:
        if target.exists() and not target.is_file():
            raise click.ClickException(f"{output}: is no regular file. Fix: name a file to write")
        for name in inputs:
            if name != "-" and target.exists() and Path(name).exists() and target.samefile(name):
                what = f"{output}: is the input. Fix: name another file to write"
                raise click.ClickException(what)
        write_whole(made, target)
    except OSError as error:
        reason = error.strerror or str(error)
        raise click.ClickException(f"{output}: cannot be written ({reason})") from error


def _show(made: str | bytes) -> None:
    if not isinstance(made, str) and sys.stdout.isatty():
        raise click.ClickException("a terminal cannot show this format. Fix: add --output FILE")
    try:
        if isinstance(made, str):
            sys.stdout.write(made)
        else:
            sys.stdout.buffer.write(made)
        sys.stdout.flush()
    except BrokenPipeError:
        raise
    except OSError as error:
        reason = error.strerror or str(error)
        raise click.ClickException(f"standard output: cannot be written ({reason})") from error


def write_whole(made: str | bytes, target: Path) -> None:
    """Write beside the target and put it in place in one step."""
    import tempfile  # costs more to load than the rest of a small report

    handle, name = tempfile.mkstemp(dir=target.parent, prefix=f".{target.name}.")
    try:
        with open(handle, "wb") as file:  # noqa: PTH123  # Path cannot open a file handle
            file.write(made.encode("utf-8") if isinstance(made, str) else made)
        Path(name).chmod(_mode(target))
        Path(name).replace(target)
    except BaseException:
        with suppress(OSError):
            Path(name).unlink()
        raise


def _mode(target: Path) -> int:
    """Permissions of the file that is replaced, or those of a new file."""
    if target.exists():
        return target.stat().st_mode & 0o777
    umask = os.umask(0)
    os.umask(umask)
    return 0o666 & ~umask
