"""The lock of a rule-set folder: hashes of its files, who checked them, and when."""

from __future__ import annotations

import json
from collections.abc import Mapping
from hashlib import sha256
from pathlib import Path

from envcheck.errors import Problem, problem
from envcheck.model.ruleset import Lock

NAME = "ruleset.lock"
LARGEST = 1_000_000
"""Bytes; a lock has a line for each file."""


def digests(folder: Path) -> dict[str, str]:
    """SHA-256 of ``ruleset.yaml`` and of every CSV file of a folder.

    Errors: OSError for a file that cannot be read.
    """
    files = [folder / "ruleset.yaml", *sorted(folder.glob("*.csv"))]
    return {file.name: sha256(file.read_bytes()).hexdigest() for file in files}


def lock_text(ruleset: str, checked_by: str, on: str, files: Mapping[str, str]) -> str:
    """Text of the lock file."""
    members = {"ruleset": ruleset, "checked_by": checked_by, "on": on, "files": dict(files)}
    return json.dumps(members, indent=1, ensure_ascii=False) + "\n"


def read_lock(folder: Path, problems: list[Problem]) -> Lock | None:
    """Read the lock of a folder and say what changed since; None where it has none."""
    path = folder / NAME
    if not path.exists():
        return None
    try:
        if path.stat().st_size > LARGEST:
            raise ValueError
        stated = json.loads(path.read_text(encoding="utf-8"))
        files, by, on = stated["files"], stated["checked_by"], stated["on"]
        texts = [by, on, *files, *files.values()]
        if not all(isinstance(text, str) for text in texts):
            raise TypeError
        now = digests(folder)
    except (OSError, ValueError, KeyError, TypeError, AttributeError, RecursionError) as error:
        found = error.strerror if isinstance(error, OSError) and error.strerror else "no such text"
        problems.append(problem("broken-lock", path.as_posix(), None, found=found))
        return None
    changed = {name for name in now.keys() | files.keys() if now.get(name) != files.get(name)}
    return Lock(by, on, tuple(sorted(changed)))
