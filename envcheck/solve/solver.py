"""Solves each assembly once per distinct setting, and once per element with bridges of its own."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from envcheck.model.project import Assembly, Bridge, Element, Project
from envcheck.model.ruleset import Conventions, RuleSet
from envcheck.model.solved import Setting, Solved
from envcheck.solve.assembly import solve
from envcheck.solve.bracket import can_narrow, narrow
from envcheck.solve.conventions import Resolver

RESOLVED: dict[str, Any] = {
    "films": (),
    "film_set": "",
    "methods": (),
    "framing_shares": (),
    "class_tests": (),
    "accepted_evidence": {},
    "dimensions_measured": "",
    "where": {},
}
"""Conventions that a setting holds already, or that fix no value."""
_Key = tuple[str, Setting, tuple[Bridge, ...], float | None]


class Solver:
    """Remembers what it solved in one run.

    metrics: by category, what an element of that class is measured in where no row says.
    """

    def __init__(self, project: Project, metrics: Mapping[str, str]) -> None:
        self._project = project
        self._metrics = metrics
        self._found: dict[_Key, Solved] = {}
        self._keys: dict[int, _Key] = {}
        """Of each solution, by its identity."""
        self._resolvers: list[tuple[Conventions, Resolver]] = []
        self.first: dict[str, Solved] = {}
        """By assembly id: its first solution, for what the report lists."""

    def solve(
        self, element: Element, assembly: Assembly, category: str, metric: str, ruleset: RuleSet
    ) -> Solved:
        """Solve the assembly of one element by one rule set's conventions."""
        resolver = self._resolver(ruleset.conventions)
        setting = resolver.resolve(element, assembly, category, metric)
        area = element.net_area if element.bridges else None
        key = (assembly.id, setting, element.bridges, area)
        found = self._found.get(key)
        if found is None:
            found = self._found[key] = self._solved(assembly, ruleset, key)
            self._keys[id(found)] = key
        self.first.setdefault(assembly.id, found)
        return found

    def _solved(self, assembly: Assembly, ruleset: RuleSet, key: _Key) -> Solved:
        _, setting, bridges, area = key
        solved = solve(assembly, setting, ruleset.conventions, bridges, area)
        if self._project.ranged:
            solved = self._with_range(assembly, solved, ruleset, key)
        return solved

    def _with_range(
        self,
        assembly: Assembly,
        solved: Solved,
        ruleset: RuleSet,
        key: _Key,
        tolerance: float = 0.0,
    ) -> Solved:
        """Add what stated ranges make of the value; each end as narrow as the value itself."""
        from envcheck.solve.ranges import with_range

        _, setting, bridges, area = key

        def again(changed: Assembly) -> Solved:
            found = solve(changed, setting, ruleset.conventions, bridges, area)
            if tolerance and can_narrow(found, tolerance):
                return narrow(changed, setting, ruleset.conventions, found, tolerance)
            return found

        return with_range(assembly, solved, again)

    def _resolver(self, conventions: Conventions) -> Resolver:
        """The resolver of some conventions; those that count alike share their solutions."""
        for known, resolver in self._resolvers:
            if known is conventions:
                return resolver
        counted = conventions._replace(**RESOLVED)
        number = next(
            (
                n
                for n, (known, _) in enumerate(self._resolvers)
                if known._replace(**RESOLVED) == counted
            ),
            len(self._resolvers),
        )
        resolver = Resolver(conventions, f"conventions {number}")
        self._resolvers.append((conventions, resolver))
        return resolver

    def narrow(self, solved: Solved, ruleset: RuleSet, tolerance: float) -> None:
        """Put a narrower bracket in place of a solution's; the next ``solve`` gives it back."""
        key = self._keys.get(id(solved))
        if key is None or self._found[key] is not solved or not can_narrow(solved, tolerance):
            return  # narrowed already for another element, or nothing to narrow
        assembly = self._project.assemblies[solved.assembly]
        narrowed = narrow(assembly, solved.setting, ruleset.conventions, solved, tolerance)
        if self._project.ranged and solved.decided_by_bracket:
            narrowed = self._with_range(assembly, narrowed, ruleset, key, tolerance)
        self._found[key] = narrowed
        self._keys[id(narrowed)] = key
        if self.first.get(assembly.id) is solved:
            self.first[assembly.id] = narrowed

    def drawn_only(self, ruleset: RuleSet) -> None:
        """Solve what a surface shows with its host but no element was entered for."""
        for surface in self._project.surfaces.values():
            for mark in surface.shows:
                host = self._project.elements.get(mark.host)
                assembly = self._project.assemblies.get(mark.tag)
                if host is None or assembly is None or assembly.id in self.first:
                    continue
                metric = self._metrics[host.category]
                element = host._replace(tag=mark.tag, assembly=mark.tag)
                self.solve(element, assembly, host.category, metric, ruleset)
