"""Several rule sets on one project: lines that differ and why, conventions that turn a verdict."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import NamedTuple

from envcheck.model.judged import Difference, Turn
from envcheck.report import numbers, wording
from envcheck.report.header import RuleSetView
from envcheck.report.inert import clean
from envcheck.report.parts import Block, Grid, Paragraph, Section
from envcheck.report.rows import Row

MOST_TAGS = 24


class ChangeView(NamedTuple):
    """A line with another verdict under another rule set."""

    tag: str
    metric: str
    symbol: str
    rule_set: str
    other: str
    before: str
    after: str
    why: str


class TurnView(NamedTuple):
    """Lines to which one convention of another rule set alone gives another verdict."""

    tags: tuple[str, ...]
    symbol: str
    rule_set: str
    other: str
    convention: str
    before: str
    after: str


def changes(found: Iterable[Difference]) -> tuple[ChangeView, ...]:
    """Write the lines that differ."""
    return tuple(
        ChangeView(
            clean(each.element),
            each.metric,
            numbers.symbol(each.metric),
            clean(each.ruleset),
            clean(each.other),
            wording.VERDICTS[each.before],
            wording.VERDICTS[each.after],
            clean("; ".join(each.why)),
        )
        for each in found
    )


def turns(found: Iterable[Turn]) -> tuple[TurnView, ...]:
    """Write what turns a verdict, lines that the same turns together."""
    tags: dict[tuple[str, ...], dict[str, None]] = {}
    for each in found:
        key = (
            numbers.symbol(each.metric), clean(each.ruleset), clean(each.other), each.convention,
            wording.VERDICTS[each.before], wording.VERDICTS[each.after],
        )  # fmt: skip
        tags.setdefault(key, {})[clean(each.element)] = None
    return tuple(TurnView(tuple(names), *key) for key, names in tags.items())


def sections(
    rows: Iterable[Row],
    rule_sets: Sequence[RuleSetView],
    changed: Sequence[ChangeView],
    turned: Sequence[TurnView],
) -> tuple[Section, ...]:
    """Both tables; nothing of a single rule set."""
    if len(rule_sets) < 2:
        return ()
    turning = _turning(turned) if turned else Paragraph(wording.NO_TURN)
    return (
        Section(
            "Verdicts that differ between the rule sets", (_differing(rows, rule_sets, changed),)
        ),
        Section("A single convention that turns a verdict", (turning,)),
    )


def _differing(
    rows: Iterable[Row], rule_sets: Sequence[RuleSetView], changed: Sequence[ChangeView]
) -> Block:
    found: dict[tuple[str, str], dict[str, Row]] = {}
    for row in rows:
        found.setdefault((row.tag, row.symbol), {})[row.rule_set] = row
    why: dict[tuple[str, str], list[str]] = {}
    for each in changed:
        text = f"{each.other}: {each.why}" if len(rule_sets) > 2 else each.why
        why.setdefault((each.tag, each.symbol), []).append(text)
    names = [rules.id for rules in rule_sets]
    cells = tuple(
        (
            tag,
            symbol,
            *(by[name].verdict_text if name in by else "no line" for name in names),
            "; ".join(why.get((tag, symbol), ())),
        )
        for (tag, symbol), by in found.items()
        if len({by[name].verdict if name in by else "" for name in names}) > 1
    )
    if not cells:
        return Paragraph(wording.NOTHING)
    heads = ("tag", "value", *names, "why")
    return Grid(heads, cells, (), tuple(range(len(heads) - 1, 1, -1)))


def _turning(turned: Sequence[TurnView]) -> Grid:
    return Grid(
        ("lines", "judged by", "verdict", "with one convention of", "becomes"),
        tuple(
            (
                f"{each.symbol} {wording.listed(each.tags, MOST_TAGS)}",
                each.rule_set,
                each.before,
                f"{each.other}: {each.convention}",
                each.after,
            )
            for each in turned
        ),
        wrap=(0, 3, 2, 4),
    )
