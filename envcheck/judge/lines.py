"""All elements of a project judged by one rule set."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping, Sequence

from envcheck.judge.before import Case
from envcheck.judge.building import closed_rows
from envcheck.judge.classes import Class, classify
from envcheck.judge.select import select
from envcheck.judge.tradeoff import elects
from envcheck.judge.verdict import judge
from envcheck.model.judged import Finding, Judged, Line, Ratio
from envcheck.model.metrics import METRICS
from envcheck.model.patterns import matches
from envcheck.model.project import Assembly, Element, Project, RuleSetChoice
from envcheck.model.ruleset import RuleSet, TradeOff
from envcheck.model.solved import Properties, Solved

EACH = "each_component"
COMPLIES, OVER, OPEN = 0, 1, 3
"""Exit status of a run: none over and none open; at least one over; none over, some open."""
SolveOne = Callable[[Element, Assembly, str, str, RuleSet], Solved]
"""(element, assembly, category, metric, rule set) -> its solution."""


def weighed(project: Project, rulesets: Mapping[str, RuleSet]) -> set[str]:
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


def classes_of(
    project: Project, ruleset: RuleSet, made_of: Mapping[str, Properties]
) -> dict[str, Class]:
    """By tag, the class in which each element is judged."""
    return {
        tag: classify(
            element, project.assemblies[element.assembly], made_of[element.assembly], ruleset
        )
        for tag, element in project.elements.items()
    }


def merged(findings: Iterable[Finding]) -> list[Finding]:
    """Say once what was seen the same way of several elements."""
    found: dict[tuple[str, str], Finding] = {}
    for finding in findings:
        key = (finding.check, finding.seen)
        known = found.get(key)
        subject = finding.subject if known is None else f"{known.subject}, {finding.subject}"
        found[key] = (known or finding)._replace(subject=subject)
    return list(found.values())


def judge_lines(
    project: Project,
    ruleset: RuleSet,
    choice: RuleSetChoice,
    made_of: Mapping[str, Properties],
    classes: Mapping[str, Class],
    measured: Sequence[Ratio],
    metrics: Mapping[str, str],
    solve: SolveOne,
) -> list[Line]:
    """Judge every element, a line for each metric that its row speaks of.

    metrics: by category, the metric of an element for whose heat flow no row gives a limit. An
    elected trade-off that charges openings above their allowance closes no row.
    """
    traded = ruleset.tradeoff is not None and ruleset.tradeoff.charges and elects(choice)
    closed = {} if traded else closed_rows(ruleset, measured)
    derived = {ratio.name: ratio.value for ratio in measured if not ratio.missing}
    lines = []
    for tag, element in project.elements.items():
        assembly, found = project.assemblies[element.assembly], classes[tag]
        selection = select(element, found.category, ruleset, project, derived)
        case = Case(
            project,
            ruleset,
            choice.decides,
            element,
            assembly,
            made_of[assembly.id],
            found,
            selection,
            closed,
        )
        own = metrics[found.category]
        asked = selection.held
        if not any(METRICS[metric].key for metric, _ in asked):
            asked = ((own, EACH), *asked)
        for metric, applies_to in asked:
            by = METRICS[metric].solved_as
            solved = None
            if by:
                solves = metric if by == "own" else own
                solved = solve(element, assembly, found.category, solves, ruleset)
            scope = selection.of_scope(metric, applies_to)
            own_case = case if scope is selection else case._replace(selection=scope)
            lines.append(judge(own_case, metric, solved))
    return lines


def undecided_by_bracket(line: Line) -> bool:
    """Whether the limit lies inside a bracket that decides."""
    solved = line.solved
    return line.verdict == "too_close" and solved is not None and solved.decided_by_bracket


def hangs_on_bracket(line: Line) -> bool:
    """Whether the bracket decides, or the limit inside of it flags the choice of method."""
    decides = line.solved is not None and line.solved.decided_by_bracket
    return decides or undecided_by_bracket(line) or "method" in line.flags


def exit_status(judged: Judged) -> int:
    """1 where a deciding line is over its limit, 3 where something is open, else 0."""
    deciding = [line for line in judged.lines if line.decides]
    if any(line.verdict == "fail" for line in deciding):
        return OVER
    unsettled = any(finding.unsettled for finding in judged.findings)
    return OPEN if unsettled or any(line.open for line in deciding) else COMPLIES


def remarks(project: Project, rulesets: Mapping[str, RuleSet]) -> tuple[str, ...]:
    """What the rule sets offer or hold that is not judged here."""
    found = []
    for choice in project.rule_sets:
        ruleset = rulesets[choice.id]
        if ruleset.tradeoff is not None and not ruleset.tradeoff.taken:
            found.append(f"{ruleset.title}: {_not_taken(ruleset.tradeoff)}")
        found += [f"{ruleset.title}: {remark}" for remark in ruleset.remarks]
        if not choice.decides:
            found.append(f"{ruleset.title} is for information: it sets no exit status")
    return tuple(found)


def _not_taken(tradeoff: TradeOff) -> str:
    """What is said of a trade-off that is offered and not computed."""
    clause = f"{tradeoff.clause}: " if tradeoff.clause else ""
    rule = f" ({tradeoff.rule})" if tradeoff.rule else ""
    say = f"; {tradeoff.say}" if tradeoff.say else ""
    kind = tradeoff.kind.replace("_", " ")
    return f"{clause}the code also offers a trade-off, {kind}{rule}; it is not computed here{say}"
