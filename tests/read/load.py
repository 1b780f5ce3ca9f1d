"""Load every rule set of the folders given, by hand: ``python -m tests.read.load FOLDER...``.

Prints for each set whether it loads, its printed cells, the limits they become, how many of these
wait for the official, and every problem. The folders may lie anywhere; nothing of them is kept.
"""

from __future__ import annotations

import sys
from collections import Counter
from collections.abc import Iterable
from pathlib import Path
from time import perf_counter

from envcheck.errors import InputError
from envcheck.model.ruleset import RuleSet
from envcheck.pipeline import names
from envcheck.read.rule_documents import known_ids, read_document
from envcheck.read.rulesets import read_ruleset
from envcheck.read.sheets import read_sheet


def printed_cells(name: str, folder: Path) -> int:
    """Number of typed cells of a rule set's own sheets; blanks and unchanged ones are left out."""
    document = read_document(folder / name, [])
    assert document is not None
    count = 0
    for entry in document.get("tables") or ():
        like = next((t for t in document.get("tables") if t["id"] == entry.get("like")), {})
        settings = {**like, **entry}
        rows, separator = int(settings.get("header_rows", "1")), document.get("separator") or ","
        path = document.folder / settings["file"]
        sheet = read_sheet(path, settings["file"], separator, rows, [])
        cells = [cell for row in (sheet.rows if sheet is not None else ()) for cell in row.cells]
        count += sum(cell not in ("", ".") for cell in cells)
    return count


def summary(ruleset: RuleSet) -> str:
    """One line on a rule set that loads."""
    kinds = Counter(limit.kind for limit in ruleset.limits)
    official = sum(any(n.by_official for n in x.notes) for x in ruleset.limits)
    metrics = ", ".join(dict.fromkeys(x.metric for x in ruleset.limits))
    return (
        f"{len(ruleset.limits)} limits "
        f"({kinds['number']} figures, {kinds['no_requirement']} NR, {kinds['not_covered']} none), "
        f"{official} for the official; {metrics}; {len(ruleset.remarks)} remarks"
    )


def load(folders: Iterable[str]) -> int:
    """Load and report; the number of sets that do not load."""
    failed = 0
    for folder in map(Path, folders):
        for name in known_ids([folder]):
            start = perf_counter()
            try:
                ruleset = read_ruleset(name, [folder], None, names())
            except InputError as error:
                failed += 1
                print(f"{name}: does not load, {len(error.problems)} problems")
                for problem in error.problems:
                    print(f"    {problem}")
                continue
            took, cells = (perf_counter() - start) * 1000, printed_cells(name, folder)
            print(f"{name}: {cells} cells, {summary(ruleset)} [{took:.0f} ms]")
            for remark in ruleset.remarks:
                print(f"    remark: {remark}")
    return failed


if __name__ == "__main__":
    sys.exit(1 if load(sys.argv[1:]) else 0)
