"""Cross-checks: the mistakes that submittals make, each found by one function.

A file in this folder with a tuple ``CHECKS`` is found; there is no list to keep. A check says what
was seen, what it suggests, how sure that is, and what would settle it; it never changes a figure.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping
from functools import cache
from importlib import import_module
from pkgutil import iter_modules
from types import MappingProxyType
from typing import TYPE_CHECKING, NamedTuple

from envcheck.model.judged import Closing, Finding, Group, Line, Ratio
from envcheck.model.project import Project
from envcheck.model.ruleset import RuleSet
from envcheck.model.solved import Properties, Solved

if TYPE_CHECKING:
    from envcheck.model.details import SolvedDetail


class Facts(NamedTuple):
    """What a check may look at."""

    project: Project
    rulesets: Mapping[str, RuleSet]
    lines: tuple[Line, ...]
    properties: Mapping[str, Properties]
    """By assembly id."""
    solved: Mapping[str, Solved]
    """By assembly id: the first solution of the deciding rule set; assemblies without an
    element are solved with the category of their own kind where that is possible."""
    closings: tuple[Closing, ...]
    ratios: tuple[Ratio, ...]
    groups: tuple[Group, ...]
    details: Mapping[str, SolvedDetail] = MappingProxyType({})
    """By detail id: the drawn details that some bridge takes its psi from."""


class Check(NamedTuple):
    """One cross-check."""

    id: str
    title: str
    run: Callable[[Facts], Iterable[Finding]]
    sure: str
    """How sure its findings are, where they do not say so themselves."""


@cache
def checks() -> tuple[Check, ...]:
    """All cross-checks, in the order of their files."""
    names = sorted(info.name for info in iter_modules(__path__))
    return tuple(check for name in names for check in import_module(f"{__name__}.{name}").CHECKS)


def findings(facts: Facts) -> tuple[Finding, ...]:
    """Run every check; findings that the project answers carry the answer."""
    answers = dict(facts.project.accepted)
    found = [(check, finding) for check in checks() for finding in check.run(facts)]
    return tuple(
        finding._replace(
            answered=answers.get(f"{finding.check} {finding.subject}", ""),
            title=check.title,
            sure=finding.sure or check.sure,
        )
        for check, finding in found
    )
