"""The stages called in order: read -> solve -> judge. Nothing else happens here."""

from __future__ import annotations

import gc
from collections.abc import Callable, Iterator, Mapping, Sequence
from contextlib import contextmanager
from dataclasses import dataclass, replace
from functools import cache, partial
from pathlib import Path
from typing import TYPE_CHECKING, NamedTuple

from envcheck.errors import InputError, Problem
from envcheck.judge import crosschecks
from envcheck.judge.building import closings, ratios
from envcheck.judge.classes import Class
from envcheck.judge.groups import take_groups
from envcheck.judge.lines import (
    classes_of,
    exit_status,
    hangs_on_bracket,
    judge_lines,
    merged,
    remarks,
    undecided_by_bracket,
    weighed,
)
from envcheck.judge.swaps import differing, swaps, turned
from envcheck.judge.zones import zone_problems
from envcheck.model.judged import Difference, Group, Judged, Line, Ratio, Turn
from envcheck.model.names import Names
from envcheck.model.project import Project, RuleSetChoice
from envcheck.model.ruleset import RuleSet
from envcheck.model.solved import Properties, Reasons, Solved
from envcheck.read.materials import categories, rows
from envcheck.read.project import read_project
from envcheck.read.rulesets import default_folders, read_ruleset
from envcheck.solve.bracket import CLOSE, TOLERANCE
from envcheck.solve.properties import properties
from envcheck.solve.registry import prescribable
from envcheck.solve.solver import Solver

if TYPE_CHECKING:
    import pandas

    from envcheck.advise.bench import Bench
    from envcheck.model.advised import Advice, Change
    from envcheck.model.compared import Compared
    from envcheck.model.details import Extras, SolvedDetail
    from envcheck.model.moisture import Check
    from envcheck.model.sure import Room, Sureness


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
        findings=(*(check.id for check in crosschecks.checks()), "class-claimed"),
    )


def run(path: str, folders: Sequence[str] = (), bounds: bool = False, close: str = "") -> Run:
    """Check one project file.

    path: of the project, ``-`` for standard input. folders: where rule sets are looked up; else
    the nearest folder ``rules`` at or above the project file. bounds: solve every drawn section
    or box, not only those on which a verdict hangs. close: tag or assembly whose bounds shall lie
    as close as those of a verdict that hangs on them.
    Errors: InputError with every problem of the project and of its rule sets.
    """
    with _no_cycles_to_collect():
        return _run(path, folders, bounds, close)


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


def _run(path: str, folders: Sequence[str], bounds: bool, close: str) -> Run:
    project = read_project(path, names())
    rulesets = _read_rulesets(project, default_folders(path, folders))
    project = _with_criteria(project, rulesets)
    compressed = rulesets[project.rule_sets[0].id].conventions.tables.get("compressed_batts", ())
    asked = weighed(project, rulesets)
    made_of = {
        name: properties(assembly, compressed, name in asked)
        for name, assembly in project.assemblies.items()
    }
    metrics = {name: category.metric for name, category in categories().items()}
    solver = Solver(project, metrics)
    judge_by = partial(_judged_by, project, made_of, metrics, solver, bounds, close)
    by_set = {choice.id: judge_by(choice, rulesets[choice.id]) for choice in project.rule_sets}
    lines = [line for each in by_set.values() for line in each.lines]
    all_ratios = [ratio for each in by_set.values() for ratio in each.ratios]
    groups = [group for each in by_set.values() for group in each.groups]
    found = [
        finding
        for choice in project.rule_sets
        if choice.decides
        for finding in merged(c.finding for c in by_set[choice.id].classes.values() if c.finding)
    ]
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
        tuple(groups),
        _details(project),
    )
    findings = (*found, *crosschecks.findings(facts))
    changes, turns = _compared(project, rulesets, by_set, judge_by)
    judged = Judged(
        lines=tuple(lines),
        findings=findings,
        ratios=tuple(all_ratios),
        groups=tuple(groups),
        closings=closed,
        remarks=remarks(project, rulesets),
        changes=tuple(changes),
        turns=tuple(turns),
    )
    return Run(project, rulesets, judged, made_of, solver.first, exit_status(judged))


def _with_criteria(project: Project, rulesets: Mapping[str, RuleSet]) -> Project:
    """Work out the zone by the criteria that rule sets name."""
    named = dict.fromkeys(r.zones.criteria for r in rulesets.values() if r.zones.criteria)
    if not named:
        return project
    from envcheck.solve.climate_zone import with_criteria  # only where a rule set asks

    return replace(project, site=with_criteria(project.site, named))


class _Outcome(NamedTuple):
    """A project judged by one rule set."""

    lines: list[Line]
    groups: list[Group]
    ratios: tuple[Ratio, ...]
    classes: dict[str, Class]


def _judged_by(
    project: Project,
    made_of: Mapping[str, Properties],
    metrics: Mapping[str, str],
    solver: Solver,
    bounds: bool,
    close: str,
    choice: RuleSetChoice,
    ruleset: RuleSet,
) -> _Outcome:
    classes = classes_of(project, ruleset, made_of)
    measured = ratios(project, ruleset, {tag: c.category for tag, c in classes.items()})
    judge_again = partial(
        judge_lines, project, ruleset, choice, made_of, classes, measured, metrics, solver.solve
    )
    own = _with_narrow_brackets(judge_again, solver, ruleset, bounds, close)
    own, groups = take_groups(own, project, ruleset, choice, measured)
    return _Outcome(own, groups, measured, classes)


def _compared(
    project: Project,
    rulesets: Mapping[str, RuleSet],
    by_set: Mapping[str, _Outcome],
    judge_by: Callable[[RuleSetChoice, RuleSet], _Outcome],
) -> tuple[list[Difference], list[Turn]]:
    """Hold the first rule set that decides against each other one, convention by convention."""
    changes: list[Difference] = []
    turns: list[Turn] = []
    if len(project.rule_sets) < 2:
        return changes, turns
    first, *others = sorted(project.rule_sets, key=lambda choice: not choice.decides)
    for other in others:
        changes += differing(by_set[first.id].lines, by_set[other.id].lines)
        for one, two in ((first, other), (other, first)):
            for name, variant in swaps(rulesets[one.id], rulesets[two.id]):
                swapped = judge_by(one, variant).lines
                turns += turned(by_set[one.id].lines, swapped, name, one.id, two.id)
    return changes, turns


def _with_narrow_brackets(
    judge_again: Callable[[], list[Line]],
    solver: Solver,
    ruleset: RuleSet,
    bounds: bool,
    close: str,
) -> list[Line]:
    """Judge; ask for narrower brackets where a verdict hangs on them; judge again."""

    def closer(line: Line) -> bool:
        assembly = line.solved.assembly if line.solved is not None else ""
        return undecided_by_bracket(line) or (close != "" and close in (line.element, assembly))

    lines = judge_again()
    for tolerance, asked in (
        (TOLERANCE, (lambda line: True) if bounds else hangs_on_bracket),
        (CLOSE, closer),
    ):
        wanted = [line.solved for line in lines if line.solved is not None and asked(line)]
        if wanted:
            for solved in wanted:
                solver.narrow(solved, ruleset, tolerance)
            lines = judge_again()
    return lines


def why(solved: Solved) -> Reasons | None:
    """Why a solved value is what it is; None where it has no worksheet of its own."""
    from envcheck.solve.why import reasons

    return reasons(solved)


def remedies(run: Run) -> tuple[Advice, ...]:
    """What would bring each line that is over its limit, or too close to it, within it."""
    from envcheck.advise.remedies import advise

    least = float(rows("material_classes")["insulation"]["low"])
    return advise(bench(run), run.judged.lines, least)


def rooms(run: Run, wanted: Sequence[str] = ()) -> tuple[Room, ...]:
    """How far the assemblies of lines may move: of the tags and assemblies wanted, or of all."""
    from envcheck.advise.room import rooms as found

    return found(bench(run), run.judged.lines, wanted)


def sureness(run: Run, wanted: Sequence[str] = ()) -> tuple[Sureness, ...]:
    """What the verdicts of lines hang on: of the tags and assemblies wanted, or of all."""
    from envcheck.advise.sure import sureness as found

    bands, classes = rows("evidence_bands"), rows("material_classes")
    return found(bench(run), run.judged.lines, wanted, bands, classes)


def bench(run: Run) -> Bench:
    """A bench to try changed assemblies of a run on."""
    from envcheck.advise.bench import Bench

    metrics = {name: category.metric for name, category in categories().items()}
    return Bench(run.project, run.rulesets, run.properties, metrics)


def only(run: Run, patterns: Sequence[str]) -> Run:
    """The lines of elements whose tags fit, with their exit status. Errors: InputError."""
    from envcheck.judge.only import only as kept

    project, judged = kept(run.project, run.judged, patterns)
    return replace(run, project=project, judged=judged, exit_status=exit_status(judged))


def compared(old: Run, new: Run) -> Compared:
    """Hold two revisions of a project, or two projects, against each other."""
    from envcheck.advise.compare import compare
    from envcheck.advise.revisions import Revision

    return compare(
        Revision(old.project, old.rulesets, old.judged),
        Revision(new.project, new.rulesets, new.judged),
    )


def run_both(old: str, new: str, folders: Sequence[str] = ()) -> tuple[Run, Run]:
    """Check two files, each by its own rule sets. Errors: InputError with the problems of both."""
    runs: list[Run] = []
    problems: list[Problem] = []
    for path in (old, new):
        try:
            runs.append(run(path, folders))
        except InputError as error:
            problems += error.problems
    if problems:
        raise InputError(dict.fromkeys(problems))
    return runs[0], runs[1]


def applied(text: str, changes: Sequence[Change]) -> str:
    """Type changes into the text of a project file. Errors: NotThere."""
    from envcheck.read.edit import edited

    return edited(text, [edit for change in changes for edit in change.edits])


def _details(project: Project) -> dict[str, SolvedDetail]:
    """Details that bridges take their psi from, loaded only where there are any."""
    if not project.details:
        return {}
    from envcheck.solve.detail import asked_by_bridges, solved_details

    return solved_details(project, asked_by_bridges(project))


def extras(run: Run, subject: str) -> Extras:
    """Solve what a page about one element, assembly or detail shows beside its lines."""
    from envcheck.solve.extras import extras as solved

    conventions = {name: ruleset.conventions for name, ruleset in run.rulesets.items()}
    levels = rows("workmanship")
    return solved(run.project, conventions, run.judged.lines, subject, levels)


def moisture(run: Run) -> Check:
    """Surface humidity and condensation by month: advisory, by the rule set judged first."""
    from envcheck.solve.moisture import check_project

    return check_project(run.project, run.rulesets, run.judged.lines)


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
