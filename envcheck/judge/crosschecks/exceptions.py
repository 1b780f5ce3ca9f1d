"""Papers that are named and not there."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.model.judged import CERTAIN, Finding


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


def document_missing(facts: Facts) -> Iterator[Finding]:
    """A rating whose document is named like a file that is not in the project's folder."""
    for assembly in facts.project.assemblies.values():
        rated = assembly.rated
        if rated is None or rated.document_found:
            continue
        yield Finding(
            "document-not-found",
            "W",
            assembly.id,
            assembly.sheet,
            f"{rated.document} is named as evidence and is not in the project's folder",
            "the value cannot be traced to its paper",
            "the file, or the name of the paper as it is filed",
        )


CHECKS = (
    Check(
        "exception-without-evidence",
        "Exception claimed without evidence",
        without_evidence,
        CERTAIN,
    ),
    Check("document-not-found", "Evidence that is not in the folder", document_missing, CERTAIN),
)
