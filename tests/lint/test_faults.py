"""Faults seeded into the sheets of the project, and the clean sheets themselves.

The whole measurement is ``python -m tests.benchmarks.faults``; here a few of each class and sheet.
"""

from __future__ import annotations

from collections import defaultdict
from pathlib import Path
from time import perf_counter

import pytest

from envcheck.typing_desk import lint_folders
from tests.benchmarks.faults import CONTROL, FOLDERS, ROOT, SEEDERS, WANTED, measure

SETS = [path for folder in FOLDERS if (path := ROOT / folder).is_dir()]
STILL_TO_BE_TYPED = "template"


def test_clean_sets_have_no_finding_but_confirmed_ones() -> None:
    start = perf_counter()
    found = lint_folders([str(folder) for folder in SETS])
    assert perf_counter() - start < 5.0
    assert len(found) >= 9
    for entry in found:
        if Path(entry.folder).name != STILL_TO_BE_TYPED:
            assert [f for f in entry.faults if not f.confirmed] == [], entry.folder


def test_the_template_waits_for_its_figures_and_nothing_else() -> None:
    (entry,) = lint_folders([str(ROOT / "rules" / STILL_TO_BE_TYPED)])
    assert {fault.check for fault in entry.faults} == {"L01"}


@pytest.mark.parametrize("folder", ["rules/merrow-2025", "tests/cases/rules/example-2024"])
def test_most_seeded_faults_are_found(folder: str) -> None:
    counts: dict[str, list[bool]] = defaultdict(list)
    for kind, _, found in measure(ROOT / folder, 2):
        counts[kind].append(found)
    every = [found for kind, of in counts.items() if kind != CONTROL for found in of]
    assert len(every) >= 40
    assert sum(every) >= WANTED * len(every)
    for kind in ("decimal mark lost (0.35 -> 35)", "cell blank", "row typed twice"):
        assert all(counts[kind]), kind
    assert set(counts) <= set(SEEDERS)
