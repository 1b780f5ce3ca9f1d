"""envcheck: U-factors of building envelopes held against user-supplied limit tables."""

from __future__ import annotations

from collections.abc import Sequence
from os import PathLike, fspath
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from envcheck.pipeline import Run

__version__ = "0.1.0"
__all__ = ["__version__", "check"]


def check(project_path: str | PathLike[str], rules: Sequence[str | PathLike[str]] = ()) -> Run:
    """Check a project file against its rule sets.

    project_path: of the YAML file. rules: folders in which rule sets are looked up; without any,
    the nearest folder ``rules`` at or above the project file.
    Returns the run: ``judged.lines`` with their verdicts, ``judged.findings``, ``exit_status``, and
    ``to_frame()`` for a pandas table. Numbers are SI, comparisons in the printed unit.
    Errors: :class:`envcheck.errors.InputError` with every problem of the files at once.
    """
    from envcheck.pipeline import run

    return run(fspath(project_path), [fspath(folder) for folder in rules])
