"""Alterations: whether enough is renewed, and whether the old value is bad enough, to ask for more.

A trigger asks how much of an element is renewed; a threshold asks how it was before. Where either
is not reached the element keeps its value, which is only reported.
"""

from __future__ import annotations

from envcheck.judge.compare import compare
from envcheck.model.metrics import METRICS
from envcheck.model.project import Element, Project
from envcheck.model.ruleset import Limit, RuleSet

QUANTITIES = {"U": "u_factor", "C": "u_factor", "F": "linear_transmittance"}
"""Key of a metric -> quantity of the value before the work."""


def by_trigger(element: Element, project: Project, ruleset: RuleSet) -> tuple[str, str] | None:
    """Verdict and reason where too little is renewed, or nobody says how much."""
    trigger = ruleset.trigger
    if trigger is None or project.scope != "alteration":
        return None
    share = element.renewed
    if share is None:
        return "not_decided", (
            f"missing: the share of {element.tag} that is renewed ({trigger.clause}), "
            f"on {element.sheet or 'its drawing'}"
        )
    if share <= trigger.share:
        return "no_requirement", (
            f"{share * 100:.3g} % renewed, not more than {trigger.share * 100:.3g} % "
            f"({trigger.clause}): reported only"
        )
    return None


def by_threshold(element: Element, limit: Limit, ruleset: RuleSet) -> tuple[str, str] | None:
    """Verdict and reason where the value before the work is good enough, or not stated."""
    threshold = limit.threshold
    if threshold is None:
        return None
    before = value_before(element, limit.metric)
    if before is None:
        return "not_decided", (
            f"missing: the value of {element.tag} before the work (key existing), on "
            f"{element.sheet or 'its drawing'}: the target {limit.cell} holds only where it was "
            f"worse than {limit.threshold_cell} ({limit.clause})"
        )
    was = compare(before, threshold, limit, ruleset)
    if was.within:
        return "no_requirement", (
            f"{was.compared:.{was.decimals}f} before the work, not worse than the threshold "
            f"{limit.threshold_cell} ({limit.clause}): it keeps its value, reported only"
        )
    return None


def value_before(element: Element, metric: str) -> float | None:
    """The stated value before the work as the metric has it, SI; None where it is another one."""
    stated = element.existing
    if stated is None or metric not in METRICS:
        return None
    known = METRICS[metric]
    if known.quantity == "resistance":
        return stated.value if stated.quantity == "resistance" else 1.0 / stated.value
    if stated.quantity == "resistance" and known.quantity == "u_factor":
        return 1.0 / stated.value
    return stated.value if stated.quantity == QUANTITIES.get(known.key) else None
