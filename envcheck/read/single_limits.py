"""Limits that stand in a clause instead of a table, and clauses that change limits of tables.

``single_limits`` and ``point_limits`` become limits like those of a sheet; ``exemptions`` with
conditions split the limits that they free; ``adjustments`` with factors change the design's value.
What only a person can decide (``check: reviewer``, or words alone) is a remark.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from typing import Any

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.metrics import METRICS
from envcheck.model.patterns import fits_any, matches
from envcheck.model.ruleset import Adjustment, Condition, Dimension, Limit, Note
from envcheck.read.cells import CellError, Grammar, read_cell
from envcheck.read.condition_text import complement, read_condition, read_period
from envcheck.read.footnotes import join
from envcheck.read.rule_documents import Document
from envcheck.read.rule_parts import written_out

WORDS = {
    "point_limits": "limits at any point",
    "single_limits": "single limits outside the tables",
    "thresholds": "thresholds",
    "adjustments": "adjustments of a value",
    "relaxations": "relaxations",
    "exemptions": "exemptions",
}
"""Keys of clauses beside the tables."""


class Clauses:
    """What the clauses of one document are read with."""

    def __init__(
        self,
        document: Document,
        dimensions: Mapping[str, Dimension],
        units: Mapping[str, str],
        categories: Sequence[str],
        problems: list[Problem],
    ) -> None:
        self.document = document
        self.dimensions = dimensions
        self.units = units
        self.categories = categories
        self.problems = problems

    def entries(self, key: str) -> Iterable[tuple[int, Mapping[str, Any]]]:
        """Entries of a key with their place."""
        return enumerate(self.document.get(key) or ())

    def elements(self, key: str, i: int, stated: Any) -> tuple[str, ...]:
        """Categories that an entry names."""
        own: Mapping[str, Any] = self.document.get("elements") or {}
        names = [stated] if isinstance(stated, str) else list(stated or ())
        found: list[str] = []
        for name in names:
            for category in written_out(own, name)[0]:
                if not fits_any(category, self.categories):
                    self._problem("unmapped-row", key, i, category, self.categories)
                found.append(category)
        return tuple(dict.fromkeys(found))

    def conditions(self, key: str, i: int, typed: Mapping[str, Any]) -> tuple[Condition, ...]:
        """Conditions of an entry."""
        found = []
        for name, text in typed.items():
            dimension = self.dimensions.get(name)
            if dimension is None:
                self._problem("undeclared-condition", key, i, name, self.dimensions)
                continue
            joined = "|".join(map(str, text)) if isinstance(text, list) else str(text)
            try:
                if dimension.kind == "date":
                    found.append(read_period(joined, name))
                else:
                    found.append(read_condition(joined, name, dimension.values, dimension.unit))
            except CellError as error:
                fill = {"expected": error.expected, "name": name, "where": repr(name)}
                kind = error.kind.replace("unknown-word", "unknown-condition-word")
                line = self.document.line(key, i)
                name_ = self.document.name
                self.problems.append(problem(kind, name_, line, found=joined, **fill))
        return tuple(found)

    def _problem(self, kind: str, key: str, i: int, found: str, known: Iterable[str]) -> None:
        line, fix = self.document.line(key, i), did_you_mean(found, known)
        fill = {"expected": one_of(known), "fix": fix, "where": key}
        self.problems.append(problem(kind, self.document.name, line, found=found, **fill))

    def limits(self, key: str) -> tuple[Limit, ...]:
        """Limits that entries with an element, a metric and a figure give."""
        found = []
        for i, stated in self.entries(key):
            limit = self._limit(key, i, stated) if is_figure(stated) else None
            if limit is not None:
                found.append(limit)
        return tuple(found)

    def _limit(self, key: str, i: int, stated: Mapping[str, Any]) -> Limit | None:
        metric = str(stated["metric"])
        known = METRICS.get(metric)
        if known is None:
            self._problem("unknown-metric", key, i, metric, METRICS)
            return None
        if known.key and known.key not in self.units:
            self._problem("missing-table-unit", key, i, metric, [f"units: {{{known.key}: ...}}"])
            return None
        sense = "max" if "max" in stated else "min"
        typed = str(stated[sense])
        try:
            branch = read_cell(typed, Grammar(metric, sense)).branches[0]
        except CellError as error:
            self._problem(error.kind, key, i, typed, [error.expected])
            return None
        zones = stated.get("zones") or ["*"]
        text, document = str(stated.get("text", "")), self.document
        notes = (Note("*", "info", text, True),) if stated.get("check") == "reviewer" else ()
        clause = str(stated.get("clause", ""))
        applies = str(stated.get("applies_to", SCOPES.get(key, "each_component")))
        when = self.conditions(key, i, stated.get("when") or {})
        words = ",".join(f"{c.dimension}={c.text}" for c in when)
        name = f"{document.id}/{clause}/{zones[0]}/{metric}"
        return Limit(
            f"{name}[{words}]" if words else name, document.id, key, clause, str(zones[0]), clause,
            str(stated.get("label") or clause), self.elements(key, i, stated["element"]), metric,
            sense, self.units.get(known.key, ""), typed, branch.kind, branch.alternatives, when,
            str(stated.get("path", "")), applies, notes, str(stated.get("src", "")),
            f"{document.id}/ruleset.yaml", document.line(key, i),
        )  # fmt: skip

    def exempt(self, limits: Iterable[Limit]) -> tuple[Limit, ...]:
        """Split off the cases that clauses free: exemptions, and thresholds not reached."""
        found = list(limits)
        for key in ("exemptions", "relaxations", "thresholds"):
            for i, stated in self.entries(key):
                if is_decided(key, stated):
                    found = self._freed(key, i, stated, found)
        return tuple(found)

    def _freed(
        self, key: str, i: int, stated: Mapping[str, Any], limits: list[Limit]
    ) -> list[Limit]:
        typed = stated.get("when") or {stated.get("dimension", ""): stated.get("applies_if", "")}
        conditions = self.conditions(key, i, typed)
        elements = self.elements(key, i, stated.get("element") or "*")
        if not conditions:
            return limits
        parts = [
            (*conditions[:n], other)
            for n, c in enumerate(conditions)
            for other in complement(c, self.dimensions[c.dimension])
        ]
        frees, keeps = [tuple(conditions)], parts
        if key == "thresholds":
            frees, keeps = keeps, frees
        clause = str(stated.get("clause", ""))
        found: list[Limit] = []
        for limit in limits:
            concerned = limit.metric == stated.get("metric", limit.metric) and any(
                matches(e, c) or matches(c, e) for e in elements for c in limit.categories
            )
            if not concerned or str(stated.get("table", limit.table)) != limit.table:
                found.append(limit)
                continue
            note = Note(clause, "exempt", str(stated.get("text", "")) or clause, False)
            free = limit._replace(
                cell=f"NR ({clause})",
                kind="no_requirement",
                alternatives=(),
                notes=(*limit.notes, note._replace(did=f"no requirement instead of {limit.cell}")),
            )
            found += [*_under(limit, keeps), *_under(free, frees)]
        return found

    def adjustments(self) -> tuple[Adjustment, ...]:
        """Factors on the design's own value."""
        found = []
        for i, stated in self.entries("adjustments"):
            for step in stated.get("factors") or ():
                at = ("adjustments", i, "factors")
                factor = self.document.figure(str(step["factor"]), "number", at, self.problems)
                when = self.conditions("adjustments", i, step.get("when") or {})
                clause, metric = str(stated.get("clause", "")), str(stated.get("of", ""))
                if factor is not None:
                    found.append(Adjustment(clause, metric, factor, when))
        return tuple(found)

    def remarks(self) -> list[str]:
        """Clauses that only a person can decide, by kind, with their words."""
        found = []
        for key, words in WORDS.items():
            left = [stated for _, stated in self.entries(key) if not is_decided(key, stated)]
            if left:
                said = "; ".join(_said(stated) for stated in left)
                found.append(f"{self.document.id}: {words} are left to the official: {said}")
        return found


SCOPES = {"point_limits": "any_point"}
"""What the limits of a key hold for where an entry does not say."""


def is_figure(stated: Mapping[str, Any]) -> bool:
    """Whether an entry is a limit: an element, a metric and a figure."""
    return bool(stated.get("element") and stated.get("metric")) and (
        "max" in stated or "min" in stated
    )


def is_decided(key: str, stated: Mapping[str, Any]) -> bool:
    """Whether an entry is executed, rather than left to the official."""
    if key in ("single_limits", "point_limits"):
        return is_figure(stated)
    if stated.get("check") == "reviewer":
        return False
    if key == "adjustments":
        return bool(stated.get("factors"))
    return bool(stated.get("when") or (stated.get("dimension") and stated.get("applies_if")))


def _under(limit: Limit, sets: Iterable[tuple[Condition, ...]]) -> list[Limit]:
    found = []
    for conditions in sets:
        when = join(limit.when, conditions)
        if when is not None:
            words = ",".join(f"{c.dimension}={c.text}" for c in when)
            found.append(limit._replace(id=f"{limit.id.partition('[')[0]}[{words}]", when=when))
    return found


def _said(stated: Mapping[str, Any]) -> str:
    words = [str(stated[k]) for k in ("text", "of", "applies_if", "kind", "by") if stated.get(k)]
    clause = str(stated.get("clause", ""))
    return f"{clause} ({', '.join(words).replace('_', ' ')})" if words else clause
