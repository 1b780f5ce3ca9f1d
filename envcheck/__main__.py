"""The program ``envcheck``: runs a command and turns what happened into an exit status.

0 no line over its limit and none open; 1 at least one over its limit; 2 input or usage; 3 none
over, at least one open; 70 a fault of envcheck itself; 130 interrupted; 141 the reader of the
output went away. Nothing else ends with 1, except 3 where the user asked ``--fail-on open``.
"""

from __future__ import annotations

import errno
import gc
import os
import sys
from collections.abc import Sequence

INPUT = 2
FAULT = 70
INTERRUPTED = 130
CLOSED_PIPE = 141
"""What a shell reports for a program whose output was no longer wanted (128 + SIGPIPE)."""


FULL = (errno.ENOSPC, errno.EDQUOT, errno.EFBIG)
"""A full disk, a quota, a file that may not grow."""


def main(arguments: Sequence[str] | None = None) -> int:
    """Run the command line and give the exit status; never raises, whatever the input."""
    try:
        return _run(list(sys.argv[1:] if arguments is None else arguments))
    except KeyboardInterrupt:
        return INTERRUPTED
    except BrokenPipeError:
        return _closed_pipe()
    except OSError as error:
        return _full(error) if error.errno in FULL else _fault(error)
    except Exception as error:
        return _fault(error)


def program() -> int:
    """Run the command line as a program of its own.

    A run is short and makes hardly any cycle of references, so that looking for some, while it
    goes on and when it ends, would only cost time.
    """
    gc.disable()
    status = main()
    gc.freeze()
    return status


def _run(arguments: list[str]) -> int:
    import click

    from envcheck.cli import envcheck
    from envcheck.errors import InputError

    for stream in (sys.stdout, sys.stderr):
        if hasattr(stream, "reconfigure"):
            stream.reconfigure(errors="backslashreplace")
    try:
        status = envcheck.main(arguments, prog_name="envcheck", standalone_mode=False)
        sys.stdout.flush()
        return status if isinstance(status, int) else 0
    except InputError as error:
        print(error, file=sys.stderr)
        return INPUT
    except click.exceptions.Abort:
        return INTERRUPTED
    except click.ClickException as error:
        error.show(sys.stderr)
        return INPUT
    except SystemExit as done:
        # click ends so where a shell asked for completions, or where its pipe is closed
        if "_ENVCHECK_COMPLETE" in os.environ:
            return INPUT if done.code else 0
        return _closed_pipe()


def _full(error: OSError) -> int:
    """Say that there was no room for the output; what it still holds is given up."""
    print(f"Error: output cannot be written ({error.strerror})", file=sys.stderr)
    _closed_pipe()
    return INPUT


def _closed_pipe() -> int:
    """Keep the interpreter from complaining when it flushes a closed standard output at exit."""
    try:
        nowhere = os.open(os.devnull, os.O_WRONLY)
        os.dup2(nowhere, sys.stdout.fileno())
    except (OSError, ValueError):
        pass
    return CLOSED_PIPE


def _fault(error: Exception) -> int:
    if os.environ.get("ENVCHECK_DEBUG"):
        import traceback

        traceback.print_exc()
    what = " ".join(str(error).split())[:200]
    print(
        f"envcheck: internal error {type(error).__name__}: {what}. This is a fault of envcheck, "
        "not of your file: please report it with the file that shows it "
        "(ENVCHECK_DEBUG=1 prints where it happened).",
        file=sys.stderr,
    )
    return FAULT


if __name__ == "__main__":
    sys.exit(program())
