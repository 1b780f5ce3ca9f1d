"""Rows that could hold at once: a slip of the rule set, never a choice at run time."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Iterator, Sequence
from itertools import combinations

from envcheck.errors import Problem, problem
from envcheck.model.ruleset import Condition, Limit
from envcheck.read.rule_documents import Document
from envcheck.read.rule_parts import intersect

FEW = 24
"""Limits that are compared pair by pair; more are first told apart by one dimension."""
MOST = 200
"""Overlaps that are reported."""


def check_overlaps(limits: Iterable[Limit], document: Document, problems: list[Problem]) -> None:
    """Report limits for the same zone, category, metric and path whose conditions overlap."""
    groups: dict[tuple[str, tuple[str, ...], str, str, str, bool], list[Limit]] = defaultdict(list)
    for x in limits:
        groups[x.zone, x.categories, x.metric, x.path, x.applies_to, x.otherwise].append(x)
    by_category: dict[tuple[str, str, str, str, str, bool], list[list[Limit]]] = defaultdict(list)
    for (zone, categories, metric, path, applies_to, otherwise), group in groups.items():
        for category in categories:
            by_category[zone, category, metric, path, applies_to, otherwise].append(group)
    seen: set[tuple[str, int, str, int]] = set()
    met: set[tuple[int, ...]] = set()
    for parts in by_category.values():
        group = parts[0] if len(parts) == 1 else [x for part in parts for x in part]
        rows = tuple([id(x.when) for x in group])
        if len(group) == 1 or rows in met:  # the same rows in another zone
            continue
        met.add(rows)
        for a, b in _pairs(group):
            places = (a.file, a.line, b.file, b.line)
            if places in seen or not _both_hold(a.when, b.when):
                continue
            seen.add(places)
            problems.append(_overlap(a, b, document))
            if len(seen) > MOST:
                return


def _both_hold(a: tuple[Condition, ...], b: tuple[Condition, ...]) -> bool:
    for x in a:
        for y in b:
            if x.dimension == y.dimension and not intersect(x, y):
                return False
    return True


def _pairs(group: Sequence[Limit]) -> Iterator[tuple[Limit, Limit]]:
    """Pairs that could overlap: all of a few, else those that one dimension leaves together."""
    if len(group) <= FEW:
        yield from combinations(group, 2)
        return
    name = _telling(group)
    if not name:
        yield from combinations(group, 2)
        return
    own = [(next(c for c in x.when if c.dimension == name), x) for x in group]
    yield from _by_word(own) if own[0][0].words else _by_interval(own)


def _telling(group: Sequence[Limit]) -> str:
    """The dimension that all limits of a group state, and most of them differently."""
    texts: dict[str, dict[str, int]] = defaultdict(lambda: defaultdict(int))
    for x in group:
        for name in {c.dimension for c in x.when}:
            texts[name][next(c.text for c in x.when if c.dimension == name)] += 1
    whole = {n: t for n, t in texts.items() if sum(t.values()) == len(group) and len(t) > 1}
    return max(whole, key=lambda n: len(whole[n]), default="")


def _by_word(own: Sequence[tuple[Condition, Limit]]) -> Iterator[tuple[Limit, Limit]]:
    by_word: dict[str, list[Limit]] = defaultdict(list)
    for condition, x in own:
        for word in condition.words:
            by_word[word].append(x)
    for together in by_word.values():
        yield from _pairs(together) if len(together) < len(own) else combinations(together, 2)


def _by_interval(own: Sequence[tuple[Condition, Limit]]) -> Iterator[tuple[Limit, Limit]]:
    """Sweep from below: each meets only those that reach up to where it begins."""
    low = float("-inf")
    ordered = sorted(own, key=lambda item: low if item[0].low is None else item[0].low)
    open_: list[tuple[Condition, Limit]] = []
    for condition, x in ordered:
        start = low if condition.low is None else condition.low
        open_ = [(c, y) for c, y in open_ if c.high is None or c.high >= start]
        yield from ((y, x) for _, y in open_)
        open_.append((condition, x))


def _overlap(a: Limit, b: Limit, document: Document) -> Problem:
    """The later row is the one reported."""
    folder = document.folder.parent
    file = (folder / b.file).as_posix()
    conditions = ", ".join(f"{c.dimension} {c.text}" for c in b.when) or "no condition"
    where = f"line {a.line}" if a.file == b.file else f"{a.file}:{a.line}"
    what = f"{b.metric}, row {b.row!r}, zone {b.zone!r}, {conditions}"
    return problem("conditions-overlap", file, b.line, found=what, where=where)
