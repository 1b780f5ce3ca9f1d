"""The stages for those who type tables, called in order: read -> lint. Nothing else is here."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import date
from pathlib import Path
from typing import NamedTuple

from envcheck.errors import InputError, problem
from envcheck.lint import Sheets, lint
from envcheck.lint.editions import compare
from envcheck.model.editions import CellChange
from envcheck.model.ruleset import RuleSet
from envcheck.model.typed import Fault, TypedSet
from envcheck.pipeline import names
from envcheck.read.locks import NAME, digests, lock_text
from envcheck.read.rule_documents import find
from envcheck.read.rulesets import default_folders, read_ruleset
from envcheck.read.typed import folders_of, plausible_ranges, read_typed


class Linted(NamedTuple):
    """One folder with its findings."""

    folder: str
    set: TypedSet | None
    faults: tuple[Fault, ...]

    @property
    def errors(self) -> int:
        """Number of findings that stop a check."""
        return sum(fault.severity == "error" for fault in self.faults)


def lint_folders(given: Sequence[str]) -> tuple[Linted, ...]:
    """Lint rule-set folders, and every rule set of a folder that holds some.

    Errors: InputError for a folder that is none.
    """
    ranges = plausible_ranges()
    found = []
    for folder in folders_of(given):
        typed = read_typed(folder, names())
        sheets = Sheets(typed.set, ranges) if typed.set is not None else None
        found.append(Linted(folder.as_posix(), typed.set, lint(sheets, typed.problems)))
    return tuple(found)


def folder_of(id_or_folder: str, rules: Sequence[str]) -> Path:
    """Folder of a rule set that is named by its id or by the folder itself.

    Errors: InputError where there is none.
    """
    path = Path(id_or_folder)
    if (path / "ruleset.yaml").is_file():
        return path
    found, missing = find(id_or_folder, default_folders("-", rules))
    if found is None:
        assert missing is not None
        fix = missing.fix or "name the folder of the rule set, or its id with --rules"
        raise InputError([missing._replace(fix=fix)])
    return found


def typed_set(folder: Path) -> TypedSet:
    """Give a rule set as typed, for printing. Errors: InputError where it has errors."""
    typed = read_typed(folder, names())
    if typed.set is None or typed.problems:
        raise InputError(typed.problems)
    return typed.set


def rule_set(folder: Path) -> RuleSet:
    """Give a rule set with all that it amends, as if everything were in force.

    Errors: InputError.
    """
    folder = folder if folder.name else folder.resolve()
    return read_ruleset(folder.name, [folder.parent], None, names(), (folder.as_posix(), None))


def lock(folder: Path, checked_by: str, on: date) -> tuple[Path, str]:
    """Give the lock file of a folder and its text. Errors: InputError where it has errors."""
    typed = typed_set(folder)
    try:
        files = digests(folder)
    except OSError as error:
        found = error.strerror or "?"
        raise InputError([problem("file-unreadable", typed.file, None, found=found)]) from error
    return folder / NAME, lock_text(typed.id, checked_by, on.isoformat(), files)


def differences(old: RuleSet, new: RuleSet) -> tuple[CellChange, ...]:
    """Every cell in which two rule sets differ."""
    return compare(old.limits, new.limits)
