"""A part of what was judged: the lines of some elements, and what speaks of them alone."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import replace

from envcheck.errors import InputError, Problem, did_you_mean, one_of, problem
from envcheck.model.judged import Finding, Judged
from envcheck.model.patterns import fits_any, matches
from envcheck.model.project import Project


def only(project: Project, judged: Judged, patterns: Sequence[str]) -> tuple[Project, Judged]:
    """Keep the lines of elements whose tag fits a pattern (``N-*``, ``*``, ``?``, ``[...]``).

    The whole building was judged before: area caps, means and sums hold as they did. Findings on
    these elements and their assemblies stay; those on anything else, claims and sums of other
    elements, and areas of the building are left out. Errors: InputError for patterns that fit none.
    """
    unknown = list(_unknown(project, patterns))
    if unknown:
        raise InputError(unknown)
    tags = {tag for tag in project.elements if any(matches(p, tag) for p in patterns)}
    names = tags | {project.elements[tag].assembly for tag in tags}
    claims = tuple(claim for claim in project.exceptions if claim.element in tags)
    return replace(project, exceptions=claims), replace(
        judged,
        lines=tuple(line for line in judged.lines if line.element in tags),
        findings=tuple(f for f in judged.findings if _speaks_of(f, names)),
        ratios=(),
        closings=(),
        groups=tuple(g for g in judged.groups if {part.element for part in g.parts} <= tags),
        changes=tuple(c for c in judged.changes if c.element in tags),
        turns=tuple(t for t in judged.turns if t.element in tags),
    )


def _unknown(project: Project, patterns: Iterable[str]) -> Iterable[Problem]:
    tags = tuple(project.elements)
    for name in patterns:
        if not fits_any(name, tags):
            hint = did_you_mean(name, tags) or "name a tag, or a pattern such as 'N-*'"
            expected = one_of(tags)
            yield problem(
                "unknown-element", project.file, None, name=name, expected=expected, hint=hint
            )


def _speaks_of(finding: Finding, names: set[str]) -> bool:
    return any(subject in names for subject in finding.subject.split(", "))
