"""A rule set of 18,000 cells, invented: ready in how many seconds, and selected from how quickly.

Fifty tables of twenty rows and eighteen zones, with conditions, sums, alternatives and footnotes.
"""

from __future__ import annotations

import tempfile
from pathlib import Path
from statistics import median
from time import process_time

TABLES, ZONES = 50, 18
ROWS = (
    ("wall.steel_frame", "13+{n}ci or 0+15ci"), ("wall.mass", "{n}.5ci[a]"),
    ("wall.wood_frame", "20 or 13+{n}ci"), ("roof.above_deck", "{n}5ci"), ("roof.attic", "49"),
    ("floor.framed", "30[b]"), ("floor.mass", "{n}ci"), ("roof.rafter", "38"),
    ("floor.steel_joist", "NR"), ("wall.other", "13"),
)  # fmt: skip
READY = 0.25
"""s; selection for 1,000 elements may take as much again."""


def write(folder: Path, tables: int = TABLES) -> int:
    """Write the rule set ``large`` and give the number of its cells."""
    target = folder / "large"
    target.mkdir(parents=True)
    zones = [f"Z{i}" for i in range(ZONES)]
    entries, cells = [], 0
    for t in range(tables):
        lines = ["row,label,when:height," + ",".join(zones) + ",src"]
        for key, form in ROWS:
            for height in ("<10", ">=10"):
                figures = [form.format(n=(t + z) % 9 + 1) for z in range(ZONES)]
                lines.append(f"{key},{key} of table {t},{height},{','.join(figures)},P")
                cells += len(figures)
        (target / f"t{t}.csv").write_text("\n".join(lines) + "\n", encoding="utf-8")
        entries.append(
            f"  - {{id: T{t}, file: t{t}.csv, clause: Table {t}, when: {{use: u{t}}},\n"
            f"     rows: {{'*': {{metric: R_insulation, plus: [cavity, ci]}}}}}}"
        )
    uses = ", ".join(f"u{t}" for t in range(tables))
    (target / "ruleset.yaml").write_text(
        "ruleset: large\ndocument: {title: Large and invented, edition: '1'}\n"
        "jurisdiction: nowhere\neffective: {from: 2025-01-01, date_tested: permit}\n"
        "units: {R: h.ft2.F/Btu}\ndecimal: '.'\n"
        f"zones: {{scheme: many, chosen_by: map, order: [{', '.join(zones)}]}}\n"
        f"dimensions: {{height: {{type: number}}, use: {{values: [{uses}]}}}}\n"
        "tables:\n" + "\n".join(entries) + "\n"
        "notes: {'*': {a: {effect: info, text: as printed}, b: {effect: info, text: joists}}}\n"
        "sources: {P: {what: invented}}\n",
        encoding="utf-8",
    )
    return cells


def measure(runs: int = 5) -> tuple[int, float, float]:
    """Cells; median seconds until the set is ready; median seconds to select 1,000 elements.

    Processor time, without the cycle collector, which the command pauses too.
    """
    import gc

    from envcheck.judge.select import select
    from envcheck.pipeline import names
    from envcheck.read.rulesets import read_ruleset
    from tests.judge.test_selections import element, project

    known = names()
    gc.disable()
    ready, chosen = [], []
    with tempfile.TemporaryDirectory() as folder:
        cells = write(Path(folder))
        read_ruleset("large", [folder], None, known)  # imports and schema
        for _ in range(runs):
            start = process_time()
            ruleset = read_ruleset("large", [folder], None, known)
            ready.append(process_time() - start)
            project_ = project({"facts": {"height": 8.0}, "zone": "Z3", "date": "2025-06-01"})
            categories = [key for key, _ in ROWS]
            elements = [
                element({"category": categories[n % 10]})._replace(
                    tag=f"E{n}", facts=_facts(n), net_area=10.0 + n
                )
                for n in range(1000)
            ]
            start = process_time()
            found = [select(e, e.category, ruleset, project_) for e in elements]
            chosen.append(process_time() - start)
            assert all(s.outcomes[0].state == "found" for s in found)
    gc.enable()
    return cells, median(ready), median(chosen)


def _facts(n: int) -> tuple[object, ...]:
    from envcheck.model.project import Fact

    return (Fact("use", f"u{n // 10 % TABLES}", "", 1),)


if __name__ == "__main__":
    print("{} cells: ready in {:.3f} s, 1,000 elements in {:.3f} s".format(*measure()))
