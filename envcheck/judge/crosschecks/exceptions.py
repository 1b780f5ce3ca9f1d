"""Exceptions that are claimed on no paper."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.model.judged import Finding


def without_evidence(facts: Facts) -> Iterator[Finding]:
    """A claim that names no evidence, or a file that is not there."""
    for claim in facts.project.exceptions:
        if claim.evidence and claim.evidence_found:
            continue
        element = facts.project.elements.get(claim.element)
        where = f"{claim.evidence} is not in the project's folder"
        yield Finding(
            "exception-without-evidence",
            "E",
            claim.element,
            element.sheet if element is not None else "",
            f"exception of clause {claim.clause} claimed by {claim.claimed_by or 'nobody named'}: "
            + (where if claim.evidence else "no evidence is named"),
            "the official has nothing to decide the claim on",
            "the paper that shows the claim, or the element without the exception",
        )


CHECKS = (
    Check("exception-without-evidence", "Exception claimed without evidence", without_evidence),
)
