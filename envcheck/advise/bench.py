"""An assembly on the bench: what becomes of its lines when it is changed.

Every change is solved by the method that the rule set prescribes and judged like the drawn one,
so that what is promised is what a check of the changed project says.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import replace

from envcheck.judge.building import ratios
from envcheck.judge.lines import classes_of, judge_lines
from envcheck.model.judged import Line, Ratio
from envcheck.model.project import Assembly, Element, Project
from envcheck.model.ruleset import RuleSet
from envcheck.model.solved import Properties, Solved
from envcheck.solve.assembly import solve
from envcheck.solve.bracket import TOLERANCE, can_narrow, narrow
from envcheck.solve.properties import properties
from envcheck.solve.solver import Solver


class Bench:
    """One project and its rule sets, to try changed assemblies on."""

    def __init__(
        self,
        project: Project,
        rulesets: Mapping[str, RuleSet],
        made_of: Mapping[str, Properties],
        metrics: Mapping[str, str],
    ) -> None:
        self.project = project
        self.rulesets = rulesets
        self._made_of = made_of
        self._metrics = metrics
        self._ratios: dict[str, tuple[Ratio, ...]] = {}
        first = rulesets[project.rule_sets[0].id]
        self._compressed = first.conventions.tables.get("compressed_batts", ())

    def value(self, line: Line, assembly: Assembly) -> float | None:
        """The value that would decide a line if its assembly were this one, SI."""
        found = self.solved(line, assembly)
        return found.high if found.decided_by_bracket and found.high is not None else found.value

    def solved(self, line: Line, assembly: Assembly) -> Solved:
        """What a line's assembly would give if it were this one; a bracket that decides narrow."""
        assert line.solved is not None
        setting, ruleset = line.solved.setting, self.rulesets[line.ruleset]
        element = self.project.elements[line.element]
        area = element.net_area if element.bridges else None
        found = solve(assembly, setting, ruleset.conventions, element.bridges, area)
        if line.solved.decided_by_bracket and can_narrow(found, TOLERANCE):
            return narrow(assembly, setting, ruleset.conventions, found, TOLERANCE)
        return found

    def judged(self, assembly: Assembly) -> list[Line]:
        """Every line of the elements that use the assembly, were it this one."""
        elements = {
            tag: element
            for tag, element in self.project.elements.items()
            if element.assembly == assembly.id
        }
        project = replace(
            self.project,
            elements=elements,
            assemblies={**self.project.assemblies, assembly.id: assembly},
        )
        made_of = {
            **self._made_of,
            assembly.id: properties(assembly, self._compressed, weighed=True),
        }
        found = []
        for choice in self.project.rule_sets:
            ruleset = self.rulesets[choice.id]
            classes = classes_of(project, ruleset, made_of)
            solver = _Bracketed(project, self._metrics)
            found += judge_lines(
                project, ruleset, choice, made_of, classes, self._ratios_by(ruleset),
                self._metrics, solver.solve,
            )  # fmt: skip
        return found

    def _ratios_by(self, ruleset: RuleSet) -> Sequence[Ratio]:
        if ruleset.id not in self._ratios:
            classes = classes_of(self.project, ruleset, self._made_of)
            judged_as = {tag: each.category for tag, each in classes.items()}
            self._ratios[ruleset.id] = ratios(self.project, ruleset, judged_as)
        return self._ratios[ruleset.id]


def lines_of(project: Project, lines: Sequence[Line], wanted: Sequence[str]) -> list[Line]:
    """Lines of elements that are asked for by tag or by assembly; all where nothing is."""
    return [
        line
        for line in lines
        if (element := project.elements.get(line.element)) is not None
        and (not wanted or line.element in wanted or element.assembly in wanted)
    ]


class _Bracketed(Solver):
    """A solver that gives the narrow bracket at once where it decides."""

    def solve(
        self, element: Element, assembly: Assembly, category: str, metric: str, ruleset: RuleSet
    ) -> Solved:
        """Solve like the plain one, and narrow a bracket that decides."""
        found = super().solve(element, assembly, category, metric, ruleset)
        if found.decided_by_bracket:
            self.narrow(found, ruleset, TOLERANCE)
            found = super().solve(element, assembly, category, metric, ruleset)
        return found
