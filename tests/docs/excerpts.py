"""Blocks of the docs that the program printed: ``python -m tests.docs.excerpts`` renews them.

``<!-- printed: COMMAND; from: A; to: B -->`` holds the lines from the first that begins with A up
to the one that begins with B; ``<!-- printed: COMMAND; lines: A -->`` those that begin with A.
Runs of spaces count as one. ``<!-- printed FILE.yaml -->`` holds the messages about that file.
"""

from __future__ import annotations

import os
import re
from pathlib import Path
from tempfile import TemporaryDirectory

from click.testing import CliRunner

from envcheck.cli import envcheck as program
from envcheck.errors import InputError
from tests.docs.pages import DOCS, PROJECT, ROOT, blocks, write_rule_sets

PAGES = ("hand-check.md", "project-format.md", "reports.md")
BLOCK = re.compile(r"(<!-- printed:? ([^\n]+) -->\n```\n)(.*?)(```)", re.DOTALL)


def printed(asked: str) -> str:
    """What the program prints for the mark of a block."""
    return messages(asked) if asked.endswith(".yaml") and " " not in asked else excerpt(asked)


def excerpt(asked: str) -> str:
    """The part of a report that a mark asks for; the command runs from the top of the checkout."""
    command, *rest = (part.strip() for part in asked.split(";"))
    wanted = dict(part.split(": ", 1) for part in rest)
    here = Path.cwd()
    os.chdir(ROOT)
    try:
        result = CliRunner().invoke(program, command.split(), standalone_mode=False)
    finally:
        os.chdir(here)
    assert result.exception is None, result.exception
    lines = result.output.splitlines()
    if "lines" in wanted:
        return "".join(f"{line}\n" for line in lines if _begins(line, wanted["lines"]))
    first = next(i for i, line in enumerate(lines) if _begins(line, wanted["from"]))
    end = next(i for i in range(first, len(lines)) if _begins(lines[i], wanted["to"]))
    return "\n".join(lines[first:end]).rstrip() + "\n"


def _begins(line: str, words: str) -> bool:
    return " ".join(line.lstrip(" -").split()).startswith(words)


def messages(name: str) -> str:
    """Every message about a broken project of the format page."""
    ((_, text),) = blocks(PROJECT, f"broken project {re.escape(name)}")
    here = Path.cwd()
    with TemporaryDirectory() as folder:
        os.chdir(folder)
        try:
            write_rule_sets(Path("rules"))
            Path(name).write_text(text, encoding="utf-8")
            arguments = ["check", name]
            result = CliRunner().invoke(program, arguments, standalone_mode=False)
        finally:
            os.chdir(here)
    assert isinstance(result.exception, InputError), result.exception
    return f"{result.exception}\n"


def renewed(page: str) -> str:
    """A page with all of its printed blocks as the program prints them now."""
    return BLOCK.sub(lambda m: f"{m[1]}{printed(m[2])}{m[4]}", page)


if __name__ == "__main__":
    for name in PAGES:
        page = DOCS / name
        page.write_text(renewed(page.read_text(encoding="utf-8")), encoding="utf-8")
