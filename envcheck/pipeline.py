"""The stages called in order: read -> solve -> judge. Nothing else happens here."""

from __future__ import annotations

import gc
from collections.abc import Iterable, Iterator, Mapping, Sequence
from contextlib import contextmanager
from dataclasses import dataclass
from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING

from envcheck.errors import InputError, Problem
from envcheck.judge import crosschecks
from envcheck.judge.building import closed_rows, closings, ratios, take_means
from envcheck.judge.classes import Class, classify
from envcheck.judge.select import select
from envcheck.judge.verdict import Case, judge
from envcheck.judge.zones import zone_problems
from envcheck.model.judged import Finding, Judged, Line, Mean, Ratio
from envcheck.model.names import Names
from envcheck.model.patterns import matches
from envcheck.model.project import Assembly, Bridge, Element, Project
from envcheck.model.ruleset import RuleSet
from envcheck.model.solved import Properties, Setting, Solved
from envcheck.read.materials import categories
from envcheck.read.project import read_project
from envcheck.read.rulesets import default_folders, read_ruleset
from envcheck.solve.assembly import solve
from envcheck.solve.conventions import Resolver
from envcheck.solve.properties import properties
from envcheck.solve.registry import prescribable

if TYPE_CHECKING:
    import pandas

COMPLIES, OVER, OPEN = 0, 1, 3
"""Exit status of a run: none over and none open; at least one over; none over, some open."""

SOLVED_METRICS = ("U_assembly", "U_product", "C_factor", "F_factor", "R_total")


@dataclass(frozen=True, slots=True)
class Run:
    """One project judged by its rule sets."""

    project: Project
    rulesets: dict[str, RuleSet]
    judged: Judged
    properties: dict[str, Properties]
    """By assembly id."""
    solved: dict[str, Solved]
    """By assembly id: one solution of each, for what the report lists."""
    exit_status: int

    def to_frame(self) -> pandas.DataFrame:
        """A row per line, for notebooks: values in SI, comparison in the printed unit."""
        import pandas

        return pandas.DataFrame([_record(self.project, line) for line in self.judged.lines])


def _record(project: Project, line: Line) -> dict[str, object]:
    element, comparison, solved = project.elements[line.element], line.comparison, line.solved
    return {
        "rule_set": line.ruleset,
        "element": line.element,
        "assembly": element.assembly,
        "category": line.category,
        "sheet": element.sheet,
        "surface": element.surface,
        "net_area_m2": element.net_area,
        "metric": line.metric,
        "value_si": solved.value if solved is not None else None,
        "low_si": solved.low if solved is not None else None,
        "high_si": solved.high if solved is not None else None,
        "compared": comparison.compared if comparison is not None else None,
        "limit": comparison.limit if comparison is not None else None,
        "printed_unit": comparison.unit if comparison is not None else "",
        "room_left": comparison.margin if comparison is not None else None,
        "verdict": line.verdict,
        "reasons": "; ".join(line.reasons),
    }


@cache
def names() -> Names:
    """The names that the registries know, for ``read`` to check and suggest."""
    return Names(
        methods=prescribable(),
        categories=tuple(categories()),
        film_sets=("iso6946", "handbook"),
        findings=(*(check.id for check in crosschecks.checks()), "class-claimed"),
    )


def run(path: str, folders: Sequence[str] = ()) -> Run:
    """Check one project file.

    path: of the project, ``-`` for standard input. folders: where rule sets are looked up; else
    the nearest folder ``rules`` at or above the project file.
    Errors: InputError with every problem of the project and of its rule sets.
    """
    with _no_cycles_to_collect():
        return _run(path, folders)


@contextmanager
def _no_cycles_to_collect() -> Iterator[None]:
    """Pause the cycle collector: a run makes 10^5 objects and hardly a cycle among them."""
    enabled = gc.isenabled()
    gc.disable()
    try:
        yield
    finally:
        if enabled:
            gc.enable()


def _run(path: str, folders: Sequence[str]) -> Run:
    project = read_project(path, names())
    rulesets = _read_rulesets(project, default_folders(path, folders))
    compressed = rulesets[project.rule_sets[0].id].conventions.tables.get("compressed_batts", ())
    weighed = _weighed(project, rulesets)
    made_of = {
        name: properties(assembly, compressed, name in weighed)
        for name, assembly in project.assemblies.items()
    }
    solver = _Solver(project)
    lines: list[Line] = []
    all_ratios: list[Ratio] = []
    means: list[Mean] = []
    found: list[Finding] = []
    for choice in project.rule_sets:
        ruleset = rulesets[choice.id]
        classes = {
            tag: classify(
                element, assembly_of(project, element), made_of[element.assembly], ruleset
            )
            for tag, element in project.elements.items()
        }
        if choice.decides:
            found += _merged(c.finding for c in classes.values() if c.finding is not None)
        measured = ratios(project, ruleset, {tag: c.category for tag, c in classes.items()})
        own = _judge_all(project, ruleset, choice.decides, made_of, classes, measured, solver)
        own, taken = take_means(own, project, ruleset)
        lines += own
        all_ratios += measured
        means += taken
    closed = closings(project)
    solver.drawn_only(rulesets[project.rule_sets[0].id])
    facts = crosschecks.Facts(
        project,
        rulesets,
        tuple(lines),
        made_of,
        solver.first,
        closed,
        tuple(all_ratios),
        tuple(means),
    )
    findings = (*found, *crosschecks.findings(facts))
    judged = Judged(
        lines=tuple(lines),
        findings=findings,
        ratios=tuple(all_ratios),
        means=tuple(means),
        closings=closed,
        remarks=_remarks(project, rulesets),
    )
    return Run(project, rulesets, judged, made_of, solver.first, exit_status(judged))


def exit_status(judged: Judged) -> int:
    """1 where a deciding line is over its limit, 3 where something is open, else 0."""
    deciding = [line for line in judged.lines if line.decides]
    if any(line.verdict == "fail" for line in deciding):
        return OVER
    unsettled = any(f.severity == "E" and not f.answered for f in judged.findings)
    return OPEN if unsettled or any(line.open for line in deciding) else COMPLIES


def _read_rulesets(project: Project, folders: Sequence[Path]) -> dict[str, RuleSet]:
    """Read every rule set that the project names; all their problems at once."""
    found: dict[str, RuleSet] = {}
    problems: list[Problem] = []
    for choice in project.rule_sets:
        try:
            found[choice.id] = read_ruleset(
                choice.id,
                folders,
                project.permit_application_date,
                names(),
                asked=(project.file, choice.line),
            )
        except InputError as error:
            problems += error.problems
    problems = problems or zone_problems(project, found.values())
    if problems:
        raise InputError(problems)
    return found


def _weighed(project: Project, rulesets: Mapping[str, RuleSet]) -> set[str]:
    """Assemblies whose class some rule set tests by weight or heat capacity."""
    patterns = {
        test.category
        for ruleset in rulesets.values()
        for test in ruleset.conventions.class_tests
        if test.measure in ("heat_capacity", "weight")
    }
    return {
        element.assembly
        for element in project.elements.values()
        if any(matches(pattern, element.category) for pattern in patterns)
    }


def _merged(findings: Iterable[Finding]) -> list[Finding]:
    """Say once what was seen the same way of several elements."""
    found: dict[tuple[str, str], Finding] = {}
    for finding in findings:
        key = (finding.check, finding.seen)
        known = found.get(key)
        subject = finding.subject if known is None else f"{known.subject}, {finding.subject}"
        found[key] = (known or finding)._replace(subject=subject)
    return list(found.values())


def assembly_of(project: Project, element: Element) -> Assembly:
    """The assembly that an element is made of."""
    return project.assemblies[element.assembly]


def _judge_all(
    project: Project,
    ruleset: RuleSet,
    decides: bool,
    made_of: Mapping[str, Properties],
    classes: Mapping[str, Class],
    measured: Sequence[Ratio],
    solver: _Solver,
) -> list[Line]:
    """Judge every element by one rule set."""
    closed = closed_rows(ruleset, measured)
    derived = {ratio.name: ratio.value for ratio in measured if not ratio.missing}
    lines = []
    for tag, element in project.elements.items():
        assembly, found = assembly_of(project, element), classes[tag]
        selection = select(element, found.category, ruleset, project, derived)
        case = Case(
            project,
            ruleset,
            decides,
            element,
            assembly,
            made_of[assembly.id],
            found,
            selection,
            closed,
        )
        for metric in selection.metrics or (categories()[found.category].metric,):
            solved = None
            if metric in SOLVED_METRICS:
                solved = solver.solve(element, assembly, found.category, metric, ruleset)
            lines.append(judge(case, metric, solved))
    return lines


class _Solver:
    """Solves each assembly once per distinct setting, and once per element with own bridges."""

    def __init__(self, project: Project) -> None:
        self._project = project
        self._found: dict[tuple[str, Setting, tuple[Bridge, ...], float | None], Solved] = {}
        self._resolvers: dict[str, Resolver] = {}
        self.first: dict[str, Solved] = {}
        """By assembly id: its first solution, for what the report lists."""

    def solve(
        self, element: Element, assembly: Assembly, category: str, metric: str, ruleset: RuleSet
    ) -> Solved:
        resolver = self._resolvers.get(ruleset.id)
        if resolver is None:
            resolver = self._resolvers[ruleset.id] = Resolver(ruleset.conventions, ruleset.id)
        setting = resolver.resolve(element, assembly, category, metric)
        area = element.net_area if element.bridges else None
        key = (assembly.id, setting, element.bridges, area)
        if key not in self._found:
            self._found[key] = solve(assembly, setting, ruleset.conventions, element.bridges, area)
        self.first.setdefault(assembly.id, self._found[key])
        return self._found[key]

    def drawn_only(self, ruleset: RuleSet) -> None:
        """Solve what a surface shows with its host but no element was entered for."""
        for surface in self._project.surfaces.values():
            for mark in surface.shows:
                host = self._project.elements.get(mark.host)
                assembly = self._project.assemblies.get(mark.tag)
                if host is None or assembly is None or assembly.id in self.first:
                    continue
                metric = categories()[host.category].metric
                element = host._replace(tag=mark.tag, assembly=mark.tag)
                self.solve(element, assembly, host.category, metric, ruleset)


def _remarks(project: Project, rulesets: Mapping[str, RuleSet]) -> tuple[str, ...]:
    found = []
    for choice in project.rule_sets:
        ruleset = rulesets[choice.id]
        if ruleset.tradeoff:
            found.append(f"{ruleset.title}: {ruleset.tradeoff}")
        found += [f"{ruleset.title}: {remark}" for remark in ruleset.remarks]
        if not choice.decides:
            found.append(f"{ruleset.title} is for information: it sets no exit status")
    return tuple(found)
