"""Bytes of an input file, or of standard input, with a size limit and errors in words."""

from __future__ import annotations

import sys
from pathlib import Path

from envcheck.errors import InputError, problem

LARGEST = 64 * 1024 * 1024
"""Bytes; a project of ten thousand assemblies takes about 15 MB."""
STDIN = "<stdin>"


def read_bytes(path: str) -> tuple[bytes, str, Path]:
    """Give the bytes, the name for messages, and the folder that the file lies in.

    ``-`` reads standard input, whose folder is the current one. Errors: InputError.
    """
    stdin = path == "-"
    shown, folder = (STDIN, Path()) if stdin else (path, Path(path).parent)
    raw = _bytes(shown, stdin=stdin)
    if len(raw) > LARGEST:
        expected = f"at most {LARGEST // 1024**2} MB"
        raise InputError([problem("file-too-large", shown, None, expected=expected)])
    return raw, shown, folder


def _bytes(shown: str, *, stdin: bool) -> bytes:
    kind, found = "file-unreadable", ""
    try:
        if stdin:
            return sys.stdin.buffer.read(LARGEST + 1)
        with Path(shown).open("rb") as file:
            return file.read(LARGEST + 1)
    except FileNotFoundError:
        kind = "file-missing"
    except IsADirectoryError:
        kind = "file-is-folder"
    except (OSError, ValueError, AttributeError) as error:
        found = getattr(error, "strerror", None) or str(error)  # a closed stdin is None
    raise InputError([problem(kind, shown, None, found=found)])
