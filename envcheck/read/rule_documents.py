"""Rule sets as documents: found by id, read as text with lines, chained from amendment to base."""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from contextlib import suppress
from datetime import date
from hashlib import sha256
from pathlib import Path
from typing import Any, NamedTuple

from envcheck import units
from envcheck.errors import InputError, Problem, did_you_mean, one_of, problem
from envcheck.read.dates import read_date
from envcheck.read.files import read_bytes
from envcheck.read.schema import check
from envcheck.read.yaml_reader import Entry, line_of, read_yaml

MEANING = "ruleset.yaml"
LARGEST = 2_000_000
"""Bytes of a ``ruleset.yaml``; figures stand in its sheets."""
_ID = re.compile(r"[a-z0-9][a-z0-9-]*")
_NOTHING = ("", "null", "~")


class Document(NamedTuple):
    """One ``ruleset.yaml`` with the lines of its keys."""

    id: str
    folder: Path
    name: str
    """File as shown in messages."""
    data: Entry
    sha256: str
    """Of ``ruleset.yaml`` and the sheets in its folder."""

    def line(self, *path: str | int) -> int:
        """Line of a key, or of its nearest parent."""
        return line_of(self.data, path)

    def get(self, *path: str) -> Any:
        """Value at a path of keys; None where a key is missing or empty."""
        value: Any = self.data
        for key in path:
            value = value.get(key) if isinstance(value, Mapping) else None
        return None if isinstance(value, str) and value in _NOTHING else value

    def date(self, *path: str) -> date | None:
        """Date at a path. Errors: ValueError for what is no date."""
        text = self.get(*path)
        return read_date(text) if isinstance(text, str) else None

    def figure(
        self, text: str, quantity: str, at: Sequence[str | int], problems: list[Problem]
    ) -> float | None:
        """Read a quantity typed at a path of keys, SI; None after a problem."""
        try:
            return units.parse(text, quantity)
        except units.UnitError as error:
            fill = {"found": error.found, "expected": error.expected, "fix": error.fix}
            problems.append(problem("unreadable-figure", self.name, self.line(*at), **fill))
            return None

    def shown(self, file: str) -> str:
        """Name of a file of the folder, as shown in messages."""
        return (Path(self.name).parent / file).as_posix()


def default_folders(project_file: str, given: Sequence[str] = ()) -> tuple[Path, ...]:
    """Folders to look in: those given, else the nearest ``rules`` at or above the project file.

    ``-`` as project file stands for standard input and is looked up from the current folder.
    """
    if given:
        return tuple(Path(folder) for folder in given)
    start = Path.cwd() if project_file == "-" else Path(project_file).resolve().parent
    for folder in (start, *start.parents):
        if (folder / "rules").is_dir():
            return (_shortened(folder / "rules"),)
    return ()


def _shortened(folder: Path) -> Path:
    """Give the folder relative to the current one where it lies below it."""
    here = Path.cwd()
    return folder.relative_to(here) if folder.is_relative_to(here) else folder


def known_ids(folders: Sequence[Path]) -> tuple[str, ...]:
    """Ids of all rule sets in the folders."""
    found = (path.parent.name for f in folders if f.is_dir() for path in f.glob(f"*/{MEANING}"))
    return tuple(sorted(name for name in set(found) if _ID.fullmatch(name)))


def find(
    ruleset: str, folders: Sequence[Path], asked: tuple[str, int | None] = ("", None)
) -> tuple[Path | None, Problem | None]:
    """Give the folder of a rule set, or the problem; ``asked`` is the file and line that ask."""
    file, line = asked[0] or "rule sets", asked[1]
    if not _ID.fullmatch(ruleset):
        return None, problem("rule-set-not-id", file, line, found=ruleset)
    for folder in folders:
        if (folder / ruleset / MEANING).is_file():
            return folder / ruleset, None
    known = known_ids(folders)
    where = ", ".join(f.as_posix() for f in folders) or "no folder named rules"
    expected = f"{one_of(known)} in {where}" if known else f"a rule set in {where}"
    fix = did_you_mean(ruleset, known)
    return None, problem("unknown-rule-set", file, line, found=ruleset, expected=expected, fix=fix)


def read_document(folder: Path, problems: list[Problem]) -> Document | None:
    """Read and check one ``ruleset.yaml``; None where it cannot be used."""
    path = folder / MEANING
    shown = path.as_posix()
    try:
        raw, *_ = read_bytes(shown)
    except InputError as error:
        problems += error.problems
        return None
    if len(raw) > LARGEST:
        found, expected = f"{len(raw)} bytes", f"at most {LARGEST} bytes"
        problems.append(problem("file-too-large", shown, None, found=found, expected=expected))
        return None
    data, wrong = read_yaml(raw, shown, text_only=True)
    problems += wrong
    if data is None:
        return None
    wrong = check(data, "rules", shown)
    problems += wrong
    if wrong:
        return None
    digest = sha256(raw)
    for sheet in sorted(folder.glob("*.csv")):
        with suppress(OSError):  # one that a table names says so where it is read
            digest.update(sheet.read_bytes())
    document = Document(folder.name, folder, shown, data, digest.hexdigest())
    stated = document.get("ruleset")
    if stated != folder.name:
        line = document.line("ruleset")
        fill = {"found": stated, "expected": folder.name}
        problems.append(problem("rule-set-id-differs", shown, line, **fill))
    _check_dates(document, problems)
    return document


def _check_dates(document: Document, problems: list[Problem]) -> None:
    """Dates exist in the calendar, and the last day comes after the first."""
    found: dict[str, date] = {}
    for key in ("from", "until"):
        try:
            value = document.date("effective", key)
        except ValueError:
            line = document.line("effective", key)
            text = document.get("effective", key)
            problems.append(problem("bad-date", document.name, line, found=text, key=key))
            continue
        if value is not None:
            found[key] = value
    if len(found) == 2 and found["until"] <= found["from"]:
        line = document.line("effective", "until")
        end, expected = found["until"], f"a day after {found['from']}"
        p = problem("dates-reversed", document.name, line, found=end, expected=expected)
        problems.append(p)


def read_chain(
    ruleset: str,
    folders: Sequence[Path],
    asked: tuple[str, int | None],
    problems: list[Problem],
) -> tuple[Document, ...]:
    """Read a rule set and what it amends, base first; empty where a link is missing."""
    chain: list[Document] = []
    wanted: str | None = ruleset
    while wanted is not None:
        if wanted in (document.id for document in chain):
            names = " over ".join(d.id for d in chain) + f" over {wanted}"
            problems.append(problem("circular-base", asked[0], asked[1], found=names))
            return ()
        folder, missing = find(wanted, folders, asked)
        if missing is not None:
            problems.append(missing)
        document = read_document(folder, problems) if folder is not None else None
        if document is None:
            return ()
        chain.append(document)
        wanted = document.get("overlay", "base")
        asked = (document.name, document.line("overlay", "base"))
    return tuple(reversed(chain))
