"""Two rule sets on one project: which lines differ and why, and which one convention turns one.

A rule set is judged again with a single convention of the other in place of its own; where that
alone gives a line another verdict, the convention turns it.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from typing import Any

from envcheck.judge.sums import by_itself
from envcheck.judge.words import method
from envcheck.model.judged import Comparison, Difference, Line, Turn
from envcheck.model.patterns import in_words
from envcheck.model.ruleset import Conventions, RuleSet, TableRow

CONVENTIONS = {
    "surface films": ("films", "film_set"),
    "framing share": ("framing_shares",),
    "ventilated cladding": ("cladding",),
    "method": ("methods",),
    "air spaces": ("air_spaces",),
    "fasteners": ("fasteners",),
    "tapered layers": ("tapered", "tapered_mean_within"),
    "crossed insulation": ("crossed_insulation",),
    "class test": ("class_tests",),
    "accepted evidence": ("accepted_evidence",),
    "coefficient tables": (),
}
"""Convention -> its fields; rounding stands in the rule set itself."""
TABLES = {
    "air spaces": ("air_spaces",),
    "method": ("cavity_factors", "effective_layers"),
    "coefficient tables": ("f_factors", "compressed_batts"),
}
"""Coefficient tables that go with a convention."""
KIN = {"U_product": "U_assembly"}
"""One quantity under two rows of a table."""


def swaps(ruleset: RuleSet, other: RuleSet) -> Iterator[tuple[str, RuleSet]]:
    """The rule set with one convention of the other, for each in which they differ."""
    own, others = ruleset.conventions, other.conventions
    for name, fields in CONVENTIONS.items():
        changed: dict[str, Any] = {
            field: getattr(others, field)
            for field in fields
            if getattr(others, field) != getattr(own, field)
        }
        tables = _tables(own, others, TABLES.get(name, ()))
        if changed or tables != own.tables:
            conventions = own._replace(**changed, tables=tables)
            yield name, ruleset._replace(conventions=conventions)
    if ruleset.compare != other.compare:
        yield "rounding", ruleset._replace(compare=other.compare)


def _tables(
    own: Conventions, others: Conventions, names: Iterable[str]
) -> Mapping[str, tuple[TableRow, ...]]:
    tables = dict(own.tables)
    for name in names:
        if others.tables.get(name, ()) != own.tables.get(name, ()):
            tables[name] = others.tables.get(name, ())
    return tables


def turned(
    lines: Iterable[Line], swapped: Iterable[Line], name: str, ruleset: str, other: str
) -> list[Turn]:
    """Lines to which one convention of the other rule set gives another verdict."""
    after = _by_line(swapped)
    return [
        Turn(ruleset, other, name, line.element, line.metric, line.verdict, new.verdict)
        for key, line in _by_line(lines).items()
        if (new := after.get(key)) is not None and new.verdict != line.verdict
    ]


def differing(lines: Iterable[Line], others: Iterable[Line]) -> list[Difference]:
    """Lines whose verdicts differ under the other rule set, and what differs in them."""
    found, there = _by_line(lines), _by_line(others)
    changes = []
    for key, line in found.items():
        other = there.get(key)
        if other is not None and other.verdict != line.verdict:
            changes.append(
                Difference(
                    line.ruleset, other.ruleset, line.element, line.metric,
                    line.verdict, other.verdict, _why(line, other),
                )
            )  # fmt: skip
    return changes


def _by_line(lines: Iterable[Line]) -> dict[tuple[str, str, str], Line]:
    """By element, quantity, and whether the limit holds at any point."""
    return {
        (line.element, KIN.get(line.metric, line.metric), "point" if by_itself(line) else ""): line
        for line in lines
    }


def _why(line: Line, other: Line) -> tuple[str, ...]:
    """What differs between two lines of one element, the class first."""
    found = []
    if line.category != other.category:
        found.append(f"judged as {in_words(other.category)} instead of {in_words(line.category)}")
    found += [*_limit(line, other), *_value(line, other), *_rounding(line, other)]
    for path in other.paths:
        before = next((p for p in line.paths if p.path == path.path), None)
        if path.path == "insulation" and (before is None or before.state != path.state):
            found.append(f"R-value path: {path.why}")
    if other.group_kind != line.group_kind or other.group:
        found += other.reasons[:1] if other.group_kind else line.reasons[:1]
    return tuple(dict.fromkeys(found or other.reasons[:1] or line.reasons[:1]))


def _limit(line: Line, other: Line) -> Iterator[str]:
    old, new = line.limit, other.limit
    if new is None:
        yield other.reasons[0] if other.reasons else "no limit found"
    elif old is None:
        yield f"limit {new.cell} instead of none ({new.clause})"
    elif (old.cell, old.unit) != (new.cell, new.unit):
        yield f"limit {new.cell} instead of {old.cell} ({new.clause})"


def _value(line: Line, other: Line) -> Iterator[str]:
    """Other films, method or share, and the value that follows."""
    old, new = line.solved, other.solved
    before, after = _own(line), _own(other)
    if old is None or new is None or before is None or after is None:
        return
    if before.unit == after.unit and abs(before.value - after.value) <= 1e-9 * abs(before.value):
        return
    one, two = old.setting, new.setting
    why = []
    if one.method != two.method:
        why.append(f"by {method(two.method)} instead of {method(one.method)}")
    films = (one.outside_film, one.inside_film, one.cladding_film)
    if films != (two.outside_film, two.inside_film, two.cladding_film):
        why.append("other surface films")
    if one.framing_share != two.framing_share:
        why.append("another framing share")
    places = max(before.decimals, after.decimals) + 1
    text = f"value {after.value:.{places}f} instead of {before.value:.{places}f}"
    yield f"{text}, {', '.join(why)}" if why else f"{text}, layers counted otherwise"


def _rounding(line: Line, other: Line) -> Iterator[str]:
    before, after = _own(line), _own(other)
    if before is None or after is None or before.limit != after.limit:
        return
    if before.value == after.value and before.compared != after.compared:
        yield f"compared as {after.compared:.6g} instead of {before.compared:.6g}"


def _own(line: Line) -> Comparison | None:
    return line.own or line.comparison
