"""Every kind of input error, by its stable id, and the exception that carries them all at once.

A kind is data: the sentence that says what is wrong, the likely fix, and a paragraph for the
docs (``docs/errors.md`` is written from this table). A problem is one kind met at one place. The
stages collect problems and raise them together, sorted by file and line, so that a person
mends a file in one round.
"""

from __future__ import annotations

from collections.abc import Iterable
from typing import NamedTuple

MOST_NAMES = 12
LONGEST = 1000
"""Characters of one part of a message."""


class Kind(NamedTuple):
    """One kind of error: ``what`` and ``fix`` are templates, ``about`` explains it in the docs."""

    id: str
    what: str
    fix: str
    about: str


class Problem(NamedTuple):
    """One kind of error met at one place."""

    kind: Kind
    file: str
    line: int | None
    """Line in the file, counted from 1; None where the file as a whole is meant."""
    what: str
    found: str
    expected: str
    fix: str

    def __str__(self) -> str:
        place = self.file if self.line is None else f"{self.file}:{self.line}"
        facts = "; ".join(
            part
            for part in (
                f"found {self.found}" if self.found else "",
                f"expected {self.expected}" if self.expected else "",
            )
            if part
        )
        facts = f" ({facts})" if facts else ""
        return f"{place}: {self.what}{facts}. Fix: {self.fix} [{self.kind.id}]"


class InputError(Exception):
    """All problems of one run, in order of file and line."""

    def __init__(self, problems: Iterable[Problem]) -> None:
        self.problems = tuple(sorted(problems, key=lambda p: (p.file, p.line or 0, p.kind.id)))
        super().__init__("\n".join(map(str, self.problems)))


def problem(
    kind_id: str,
    file: str,
    line: int | None,
    *,
    found: object = "",
    expected: object = "",
    fix: str = "",
    **fill: object,
) -> Problem:
    """Make one problem; ``fill`` completes the kind's sentence and, unless given, its fix.

    Errors: KeyError for an id that the catalogue does not know (a fault of ours, not the user's).
    """
    from envcheck.error_kinds import KINDS  # only where something is wrong

    kind = KINDS[kind_id]
    return Problem(
        kind,
        file,
        line,
        visible(kind.what.format(**fill), LONGEST),
        visible(str(found)),
        visible(str(expected), LONGEST),
        visible(fix or kind.fix.format(**fill), LONGEST),
    )


def visible(text: str, longest: int = 80) -> str:
    """Text as it may stand in a message: control characters escaped, long words cut."""
    shown = "".join(c if c.isprintable() else f"\\x{ord(c):02x}" for c in text)
    return shown if len(shown) <= longest else shown[: longest - 3] + "..."


def did_you_mean(name: str, known: Iterable[str]) -> str:
    """Say which of the known names was likely meant, as ``did you mean 'x'?`` or nothing."""
    from difflib import get_close_matches

    close = get_close_matches(name, list(known), n=1, cutoff=0.6)
    return f"did you mean {close[0]!r}?" if close else ""


def one_of(known: Iterable[str]) -> str:
    """List the known names for the ``expected`` part, cut where there are many."""
    names = list(known)
    more = f", ... ({len(names)} in all)" if len(names) > MOST_NAMES else ""
    return "one of " + ", ".join(names[:MOST_NAMES]) + more
