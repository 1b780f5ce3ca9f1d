"""Two judged revisions held against each other: lines that changed, and what caused each.

The causes are found by comparing the two project models field by field, never by their text: what
differs in an element, its assembly and materials, the facts, zone and limits that its line asks
for. A difference that a line does not look at is no cause of it.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable, Mapping

from envcheck.advise import causes
from envcheck.advise.differences import same
from envcheck.advise.revisions import (
    Revision,
    moved,
    of_projects,
    renamed_assemblies,
    renamed_elements,
    rule_set_pairs,
    translated,
)
from envcheck.model.compared import Compared, Difference
from envcheck.model.judged import Finding, Group, Judged, Line, Ratio
from envcheck.model.project import Project

Pairs = list[tuple[Line, Line]]


def compare(old: Revision, new: Revision) -> Compared:
    """Compare two revisions, each judged by its own rule sets.

    An element whose tag alone changed is one element; so is an assembly whose id alone changed.
    """
    assemblies = renamed_assemblies(old.project, new.project)
    first = translated(old.project, assemblies, {})
    tags = renamed_elements(first, new.project)
    first = translated(first, {}, tags)
    old = Revision(first, old.rulesets, _with_tags(old.judged, tags))
    pairs = rule_set_pairs(first, new.project)
    differences = (
        *_renamed("assembly", assemblies),
        *_renamed("element", tags),
        *of_projects(old, new, pairs),
    )
    together, dropped, added = _paired(old.judged.lines, new.judged.lines, pairs)
    finder = causes.Finder(old, new, differences)
    changes = [finder.change(a, b) for a, b in together]
    changed = tuple(c for c in changes if c.aspects)
    settled, found = _findings(old.judged.findings, new.judged.findings)
    return Compared(
        changed=changed,
        added=tuple(added),
        dropped=tuple(dropped),
        unchanged=len(changes) - len(changed),
        differences=differences,
        same=_unchanged(first, new.project, differences),
        renamed=tuple(tags.items()),
        moved=moved(first, new.project),
        settled=settled,
        new=found,
        ratios=_ratios(old.judged.ratios, new.judged.ratios),
        groups=_groups(old.judged.groups, new.judged.groups, pairs),
        rule_sets=tuple(pairs.items()),
    )


def _with_tags(judged: Judged, tags: Mapping[str, str]) -> Judged:
    from dataclasses import replace

    lines = tuple(x._replace(element=tags.get(x.element, x.element)) for x in judged.lines)
    return replace(judged, lines=lines)


def _renamed(kind: str, names: Mapping[str, str]) -> list[Difference]:
    return [Difference(kind, b, (), "", "renamed", a, b) for a, b in names.items()]


def _paired(
    old: Iterable[Line], new: Iterable[Line], pairs: Mapping[str, str]
) -> tuple[Pairs, list[Line], list[Line]]:
    """Lines of both by rule set, element, metric and scope; then a lone other line of an element.

    One element may have several lines on one metric: its own, and that of a mean.
    """
    waiting: dict[tuple[str, ...], list[Line]] = {}
    for line in new:
        waiting.setdefault(_key(line, line.ruleset), []).append(line)
    together, left = [], []
    for line in old:
        twins = waiting.get(_key(line, pairs.get(line.ruleset, line.ruleset)))
        if twins:
            together.append((line, twins.pop(0)))
        else:
            left.append(line)
    added = [line for lines in waiting.values() for line in lines]
    dropped = []
    for line in left:
        name = pairs.get(line.ruleset, line.ruleset)
        others = [x for x in added if (x.ruleset, x.element) == (name, line.element)]
        mine = [x for x in left if (x.ruleset, x.element) == (line.ruleset, line.element)]
        if len(others) == len(mine) == 1:
            together.append((line, others[0]))
            added.remove(others[0])
        else:
            dropped.append(line)
    return together, dropped, added


def _key(line: Line, ruleset: str) -> tuple[str, ...]:
    scope = line.limit.applies_to if line.limit is not None else "each_component"
    return ruleset, line.element, line.metric, scope


def _findings(
    old: Iterable[Finding], new: Iterable[Finding]
) -> tuple[tuple[Finding, ...], tuple[Finding, ...]]:
    """Findings by check and subject: settled, and new. An answer given settles one too."""
    before = {(f.check, f.subject): f for f in old if not f.answered}
    after = {(f.check, f.subject): f for f in new if not f.answered}
    return (
        tuple(f for key, f in before.items() if key not in after),
        tuple(f for key, f in after.items() if key not in before),
    )


def _ratios(
    old: Iterable[Ratio], new: Iterable[Ratio]
) -> tuple[tuple[Ratio | None, Ratio | None], ...]:
    before, after = {r.name: r for r in old}, {r.name: r for r in new}
    return tuple(
        (before.get(name), after.get(name))
        for name in dict.fromkeys((*before, *after))
        if not _same_ratio(before.get(name), after.get(name))
    )


def _same_ratio(a: Ratio | None, b: Ratio | None) -> bool:
    if a is None or b is None:
        return False
    return same((a.value, a.most, a.passed), (b.value, b.most, b.passed))


def _groups(
    old: Iterable[Group], new: Iterable[Group], pairs: Mapping[str, str]
) -> tuple[tuple[Group | None, Group | None], ...]:
    """Means and sums by kind and name that another sum, limit or state tells apart."""
    before = {(pairs.get(g.ruleset, g.ruleset), g.kind, g.name): g for g in old}
    after = {(g.ruleset, g.kind, g.name): g for g in new}
    found = []
    for key in dict.fromkeys((*before, *after)):
        a, b = before.get(key), after.get(key)
        alike = a and b and same((a.state, a.drawn, a.table), (b.state, b.drawn, b.table))
        if not alike:
            found.append((a, b))
    return tuple(found)


def _unchanged(
    old: Project, new: Project, differences: Iterable[Difference]
) -> tuple[tuple[str, int], ...]:
    """How many assemblies, elements, surfaces ... are the same in both."""
    touched = {(d.kind, d.name) for d in differences if d.what != "renamed"}
    both: Counter[str] = Counter()
    for kind, a, b in (
        ("assembly", old.assemblies, new.assemblies),
        ("element", old.elements, new.elements),
        ("surface", old.surfaces, new.surfaces),
        ("material", old.materials, new.materials),
        ("fact", {f.name: f for f in old.facts}, {f.name: f for f in new.facts}),
    ):
        both[kind] = sum(name in b and (kind, name) not in touched for name in a)
    return tuple(both.items())
