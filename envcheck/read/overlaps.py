"""Rows that could hold at once: a slip of the rule set, never a choice at run time."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable
from itertools import combinations

from envcheck.errors import Problem, problem
from envcheck.model.ruleset import Condition, Limit
from envcheck.read.rule_documents import Document
from envcheck.read.rule_parts import intersect

Group = tuple[str, str, str, str, str]


def check_overlaps(limits: Iterable[Limit], document: Document, problems: list[Problem]) -> None:
    """Report limits for the same zone, category, metric and path whose conditions overlap."""
    groups: dict[Group, list[Limit]] = defaultdict(list)
    for limit in limits:
        for category in limit.categories:
            key = (limit.zone, category, limit.metric, limit.path, limit.applies_to)
            groups[key].append(limit)
    seen: set[tuple[str, int, str, int]] = set()
    for group in groups.values():
        for a, b in combinations(group, 2):
            places = (a.file, a.line, b.file, b.line)
            if places in seen or not _both_hold(a.when, b.when):
                continue
            seen.add(places)
            problems.append(_overlap(a, b, document))


def _both_hold(a: tuple[Condition, ...], b: tuple[Condition, ...]) -> bool:
    others = {c.dimension: c for c in b}
    return all(c.dimension not in others or intersect(c, others[c.dimension]) for c in a)


def _overlap(a: Limit, b: Limit, document: Document) -> Problem:
    """The later row is the one reported."""
    folder = document.folder.parent
    file = (folder / b.file).as_posix()
    conditions = ", ".join(f"{c.dimension} {c.text}" for c in b.when) or "no condition"
    where = f"line {a.line}" if a.file == b.file else f"{a.file}:{a.line}"
    what = f"{b.metric}, row {b.row!r}, zone {b.zone!r}, {conditions}"
    return problem("conditions-overlap", file, b.line, found=what, where=where)
