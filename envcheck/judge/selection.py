"""The limits selected for an element, or what stands in the way, with the trail."""

from __future__ import annotations

from collections.abc import Mapping
from types import MappingProxyType
from typing import NamedTuple

from envcheck.model import metrics
from envcheck.model.judged import Choice
from envcheck.model.patterns import in_words
from envcheck.model.ruleset import Condition, Limit

METRICS = {name: metric.words for name, metric in metrics.METRICS.items()}
"""Metrics in words."""
INSULATION = "insulation"
"""Path of labelled R-values, printed beside the value of the whole."""


class MissingFact(NamedTuple):
    """A fact that a condition asks for and that nobody states, or states in no known word."""

    name: str
    allowed: tuple[str, ...]
    """Allowed words; empty for a number."""
    unit: str
    meaning: str
    sheet: str
    """Drawing where the fact belongs, in words; may be empty."""
    found: str = ""
    """What is stated and cannot be used."""

    def __str__(self) -> str:
        wanted = " or ".join(self.allowed) if self.allowed else f"a number {self.unit}".strip()
        what = f"{self.name.replace('_', ' ')} ({wanted})"
        if self.found:
            return f"{what} is stated as {self.found}, which the rule set does not know"
        sheet = f"; it belongs on the {self.sheet}" if self.sheet else ""
        fact = f" (fact {self.name})" if "_" in self.name else ""
        return f"{what} is not stated{fact}{sheet}"


class Outcome(NamedTuple):
    """What the tables say for one metric and path."""

    metric: str
    path: str
    state: str
    """``found``, ``not_in_table``, ``missing_fact`` or ``two_rows``."""
    limit: Limit | None
    """The one limit, where it is found."""
    candidates: tuple[Limit, ...] = ()
    """Both of two rows, or the rows that the missing fact would choose between."""
    missing: tuple[MissingFact, ...] = ()
    why: str = ""
    """Why there is no limit, in words."""
    applies_to: str = "each_component"
    """What the limit holds for: two may hold at once, for each part and for the mean."""
    ruled_out: tuple[tuple[Limit, Condition | None], ...] = ()
    """Rows of the same kind that do not hold, each with the condition that is not met; None where
    it speaks of more than the category."""


class Selection(NamedTuple):
    """The limits for one category of element in one place, with the trail that led to them."""

    ruleset: str
    category: str
    zone: str
    """Printed zone; empty where it could not be found."""
    state: str
    """``selected``; or ``not_in_force``, ``zone_missing``, ``zone_unknown``, ``zone_ambiguous``,
    ``not_in_table``: then there are no outcomes and ``why`` says what is wrong."""
    why: str
    outcomes: tuple[Outcome, ...]
    trail: tuple[Choice, ...]
    by: Mapping[tuple[str, str], Outcome] = MappingProxyType({})
    """Outcomes by metric and path."""

    @property
    def metrics(self) -> tuple[str, ...]:
        """Metrics that make a line each: those of the insulation path stand in another's line."""
        return tuple(dict.fromkeys(metric for metric, _ in self.held))

    @property
    def held(self) -> tuple[tuple[str, str], ...]:
        """Metric and what it applies to, a line for each."""
        main = [o for o in self.outcomes if o.path != INSULATION or o.metric != "R_insulation"]
        return tuple(dict.fromkeys((o.metric, o.applies_to) for o in main or self.outcomes))

    def of_scope(self, metric: str, applies_to: str) -> Selection:
        """This selection without the limits of the metric that apply to something else."""
        kept = tuple(o for o in self.outcomes if o.metric != metric or o.applies_to == applies_to)
        if len(kept) == len(self.outcomes):
            return self
        by = {(o.metric, o.path): o for o in reversed(kept)}
        return self._replace(outcomes=kept, by=by)

    def outcome(self, metric: str, path: str = "") -> Outcome | None:
        """Outcome of a metric; without a path that of its main path."""
        if path:
            return self.by.get((metric, path))
        found = [o for o in self.outcomes if o.metric == metric]
        return min(found, key=lambda o: o.path == INSULATION, default=None)

    def limit(self, metric: str, path: str = "") -> Limit | None:
        """The limit of a metric, where one is found."""
        outcome = self.outcome(metric, path)
        return None if outcome is None else outcome.limit

    def verdict_of(self, metric: str, path: str = "") -> str:
        """Verdict that follows from having no limit; empty where there is one."""
        outcome = self.outcome(metric, path)
        if outcome is None and self.state == "selected":
            return "not_in_table"
        state = outcome.state if outcome is not None else self.state
        return {"found": "", "not_in_table": "not_in_table"}.get(state, "not_decided")

    def reason_of(self, metric: str, path: str = "") -> str:
        """Why there is no limit, in words; empty where there is one."""
        outcome = self.outcome(metric, path)
        if outcome is None:
            what = METRICS.get(metric, metric)
            return self.why or f"no row of the rule set gives {what} for {in_words(self.category)}"
        return outcome.why
