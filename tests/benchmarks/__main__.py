"""``python -m tests.benchmarks``: every budget as a ratio against its yardstick.

Each figure is the median of fresh processes run in turn (yardstick, envcheck, yardstick ...), since
machines are noisy and drift. Nothing here asserts; the exit status is 1 where a budget is missed.
"""

from __future__ import annotations

import os
import resource
import subprocess
import sys
import tempfile
import time
from pathlib import Path
from statistics import median

from tests.benchmarks import rules
from tests.benchmarks.generate import project

ROOT = Path(__file__).parent.parent.parent
RULES = ROOT / "rules"
CHECK = [sys.executable, "-m", "envcheck", "check", "--rules", str(RULES)]
REMEDY, ROOM, SURE = ([*CHECK[:3], command, *CHECK[4:]] for command in ("remedy", "room", "sure"))
REVIEW = str(ROOT / "projects/quillhaven-library/review.yaml")
IMPORT_CLICK = [sys.executable, "-c", "import click"]
IMPORT_FOUR = [sys.executable, "-c", "import click, yaml, jsonschema, tabulate"]
LOAD = "import sys, yaml; yaml.load(open(sys.argv[1], encoding='utf-8'), Loader=yaml.CSafeLoader)"


def seconds(command: list[str]) -> float:
    """Wall time of one fresh process, bytecode cached, output thrown away."""
    env = {k: v for k, v in os.environ.items() if k != "PYTHONDONTWRITEBYTECODE"}
    start = time.perf_counter()
    done = subprocess.run(command, cwd=ROOT, env=env, stdout=subprocess.DEVNULL, check=False)
    took = time.perf_counter() - start
    assert done.returncode in (0, 1), command  # 1: a line over its limit
    return took


def pair(ours: list[str], yardstick: list[str], runs: int) -> tuple[float, float, float]:
    """Medians of both, and the median of the ratios pair by pair, after one warm-up."""
    seconds(ours), seconds(yardstick)
    pairs = [(seconds(ours), seconds(yardstick)) for _ in range(runs)]
    a, b = zip(*pairs, strict=True)
    return median(a), median(b), median(x / y for x, y in pairs)


def peak_mib(command: list[str]) -> float:
    """Largest memory of a process and its children, MiB."""
    script = (
        "import resource, subprocess, sys; subprocess.run(sys.argv[1:], stdout=subprocess.DEVNULL);"
        "print(resource.getrusage(resource.RUSAGE_CHILDREN).ru_maxrss)"
    )
    made = subprocess.run(
        [sys.executable, "-c", script, *command], cwd=ROOT, capture_output=True, text=True
    )
    return float(made.stdout) / 1024.0


def section_seconds(tolerance: float) -> float:
    """Median time to bound a C-stud of 1.1 mm steel in a bay of 406 mm, imports left out."""
    from envcheck.solve.field.bound import bound
    from tests.solve.field.sections import c_stud

    times = []
    for _ in range(6):
        start = time.perf_counter()
        bound(c_stud(), tolerance)
        times.append(time.perf_counter() - start)
    return median(times[1:])


def crossing_seconds(tolerance: float) -> float:
    """Median time to bound a steel stud under a Z-girt in three dimensions, imports left out."""
    from envcheck.solve.field.box_bound import bound_box
    from tests.solve.field.boxes import crossing

    times = []
    for _ in range(3):
        start = time.perf_counter()
        found = bound_box(crossing(), tolerance)
        times.append(time.perf_counter() - start)
        assert found.stopped_by == "tolerance"
    return median(times)


CROSSING = (
    "from envcheck.solve.field.box_bound import bound_box; "
    "from tests.solve.field.boxes import crossing; bound_box(crossing(), {tolerance})"
)


def main() -> int:
    """Measure and print; 1 where a budget is missed."""
    with tempfile.TemporaryDirectory() as folder:
        files = {}
        for size in (10, 1000, 2000):
            files[size] = Path(folder) / f"project-{size}.yaml"
            files[size].write_text(project(size), encoding="utf-8")
        small, large, double = (str(files[size]) for size in (10, 1000, 2000))
        load = [sys.executable, "-c", LOAD]
        rows = [
            ("--help / import click", [*CHECK[:3], "--help"], IMPORT_CLICK, 2.0, 9),
            ("check of 10 / four imports", [*CHECK, small], IMPORT_FOUR, 1.6, 9),
            ("check of 1,000 x 10 / C load", [*CHECK, large], [*load, large], 1.0, 7),
            ("check of 2,000 / of 1,000", [*CHECK, double], [*CHECK, large], 2.2, 5),
            ("remedies of review / its check", [*REMEDY, REVIEW], [*CHECK, REVIEW], 2.0, 7),
            ("room of review / its check", [*ROOM, REVIEW], [*CHECK, REVIEW], 2.0, 7),
            ("sure of review / its check", [*SURE, REVIEW], [*CHECK, REVIEW], 2.0, 7),
        ]
        missed = 0
        print(f"{'what':32} {'ours s':>8} {'yard s':>8} {'ratio':>7} {'budget':>7}")
        for title, ours, yardstick, budget, runs in rows:
            a, b, ratio = pair(ours, yardstick, runs)
            over = ratio > budget
            missed += over
            print(f"{title:32} {a:8.3f} {b:8.3f} {ratio:7.2f} {budget:7.2f}{'  MISSED' * over}")
        for title, tolerance, budget in (("0.1 %", 1e-3, 0.2), ("0.01 %", 1e-4, 2.0)):
            took = section_seconds(tolerance)
            missed += took > budget
            words = f"C-stud section to {title}, after imports"
            print(f"{words:49} {took:7.3f} s of {budget:g} s{'  MISSED' * (took > budget)}")
        took = crossing_seconds(1e-2)
        missed += took > 5.0
        words = "stud x girt in three dimensions to 1 %"
        print(f"{words:49} {took:7.3f} s of 5 s{'  MISSED' * (took > 5.0)}")
        for words, tolerance in (("1 %", 1e-2), ("0.25 %", 2.5e-3)):
            peak = peak_mib([sys.executable, "-c", CROSSING.format(tolerance=tolerance)])
            missed += peak > 300
            print(f"peak memory, stud x girt to {words}: {peak:.0f} MiB of 300")
        cells, ready, chosen = rules.measure()
        for words, took in (
            (f"rule set of {cells:,} cells, ready", ready),
            ("selection for 1,000 elements from it", chosen),
        ):
            missed += took > rules.READY
            over = "  MISSED" * (took > rules.READY)
            print(f"{words:49} {took:7.3f} s of {rules.READY:g} s{over}")
        print(f"peak memory, check of 1,000: {peak_mib([*CHECK, large]):.0f} MiB")
        print(f"peak memory, C load of it:   {peak_mib([*load, large]):.0f} MiB")
        missed += many()
    return 1 if missed else 0


MOST_MEMORY = 300.0
"""MiB of a process that bounds sections."""
SECTIONS = (
    "from tests.benchmarks.measures import mixed_sections, bound, c_stud\n"
    "[bound(of) for of in mixed_sections()]; bound(c_stud(), 1e-4)"
)


def many() -> int:
    """Print many sections, the even mesh and a sweep; give how many budgets are missed."""
    from tests.benchmarks import measures

    mixed, memory = measures.mixed_seconds(), peak_mib([sys.executable, "-c", SECTIONS])
    mesh, swept = measures.against_even_mesh(), measures.swept()
    ratio, share = mesh.even / mesh.ours, swept.rate / swept.ceiling
    missed = 0
    for words, found, budget, over in (
        ("100 mixed sections to 0.1 %", f"{mixed:.3f} s", "10 s", mixed > 10.0),
        ("peak memory of these", f"{memory:.0f} MiB", "300 MiB", memory > MOST_MEMORY),
        ("even mesh / bounds at equal true error", f"{ratio:.1f}", "at least 10", ratio < 10.0),
        ("1e6 walls / memory bandwidth", f"{share:.2f}", "at least 0.25", share < 0.25),
    ):
        missed += over
        print(f"{words:42} {found:>14} of {budget}{'  MISSED' * over}")
    print(
        f"    even mesh: {mesh.cells} cells, {mesh.even:.3f} s, {mesh.even_error * 100:.3f} % off; "
        f"bounds {mesh.ours:.3f} s, the worse {mesh.error * 100:.3f} % off\n"
        f"    walls: {swept.seconds:.3f} s, {swept.rate / 1e9:.1f} of "
        f"{swept.ceiling / 1e9:.1f} GB/s"
    )
    return missed


if __name__ == "__main__":
    resource.setrlimit(resource.RLIMIT_CORE, (0, 0))
    sys.exit(main())
