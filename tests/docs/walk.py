"""The worked example of docs/rule-tools.md, done again: ``python -m tests.docs.walk`` rewrites its
outputs (and, with ``--faults``, the table of seeded faults).
"""

from __future__ import annotations

import os
import re
import shlex
import sys
from collections.abc import Iterator
from pathlib import Path
from tempfile import TemporaryDirectory

from click.testing import CliRunner

from envcheck.cli import envcheck as program
from tests.docs.pages import DOCS, ROOT, blocks

PAGE = DOCS / "rule-tools.md"
LIBRARY = ROOT / "projects" / "quillhaven-library" / "permit.yaml"
SLIP = ("0.77", "0.077")
LINES = {"empty": 12, "changed": 5}
"""How many lines of a long output the page shows."""


def library() -> str:
    """The permit set of the library with the rule set of the example in place of its own."""
    text = LIBRARY.read_text(encoding="utf-8")
    old = "rule_sets: [quillhaven-2025-3]"
    zones = '  zones: [{zone: V3w, source: "zone map on G-002", rule_set: quillhaven-2025-3}]\n'
    assert old in text and zones in text
    return text.replace(old, "rule_sets: [fenmark-2026]").replace(zones, "")


def steps(page: str) -> Iterator[tuple[str, int, str]]:
    """(name, exit status, output) of every command of the page, in a folder of its own."""
    files = {m[1]: text for m, text in blocks(page, r"walk file (\S+)")}
    ((_, meaning),) = blocks(page, "walk meaning")
    before = Path.cwd()
    with TemporaryDirectory() as folder:
        os.chdir(folder)
        try:
            for found, text in blocks(page, r"walk command (\w+)"):
                name, own = found[1], Path("rules") / "fenmark-2026"
                if name == "slip":
                    for file, sheet in files.items():
                        (own / file).write_text(sheet, encoding="utf-8")
                    (own / "ruleset.yaml").write_text(meaning, encoding="utf-8")
                if name == "clean":
                    fixed = files["table-1.csv"].replace(*SLIP)
                    (own / "table-1.csv").write_text(fixed, encoding="utf-8")
                if name == "check":
                    Path("library.yaml").write_text(library(), encoding="utf-8")
                if name == "changed":
                    sheet = (own / "table-2.csv").read_text(encoding="utf-8")
                    (own / "table-2.csv").write_text(sheet.replace("0.42", "0.43"))
                arguments = shlex.split(text)[1:]
                result = CliRunner().invoke(program, arguments, standalone_mode=False)
                assert result.exception is None, (text, result.exception)
                lines = result.output.rstrip().splitlines()
                yield name, int(result.return_value or 0), "\n".join(_shown(name, lines)) + "\n"
        finally:
            os.chdir(before)


def _shown(name: str, lines: list[str]) -> list[str]:
    """What the page shows of an output; of a report its head and the first lines of its table."""
    if name == "check":
        table = lines.index("Lines")
        return [*lines[:5], "...", "", *lines[table : table + 10], "..."]
    shown = lines[: LINES.get(name, len(lines))]
    return shown if len(shown) == len(lines) else [*shown, "..."]


def renewed(page: str) -> str:
    """The page with every output as it is printed now."""
    for name, _, output in steps(page):
        mark = re.compile(rf"(<!-- walk output {name} -->\n```\n).*?(```)", re.DOTALL)
        page = mark.sub(lambda m, text=output: f"{m[1]}{text}{m[2]}", page)
    return page


def with_faults(page: str) -> str:
    """The page with the table of seeded faults measured now."""
    from tests.benchmarks.faults import CONTROL, counted

    counts = counted([])
    rows = [f"| {kind} | {found} of {of} |" for kind, (found, of) in counts.items()]
    found, of = (sum(c[i] for k, c in counts.items() if k != CONTROL) for i in (0, 1))
    rows.append(f"| **all but the control** | **{found} of {of} ({found / of:.1%})** |")
    head = "<!-- faults -->\n| fault | found |\n|---|---|\n"
    return re.sub(rf"{re.escape(head)}(\|.*\n)*", head + "\n".join(rows) + "\n", page)


if __name__ == "__main__":
    text = renewed(PAGE.read_text(encoding="utf-8"))
    PAGE.write_text(with_faults(text) if "--faults" in sys.argv else text, encoding="utf-8")
