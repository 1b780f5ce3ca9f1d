"""Editions and amendments against the date of the permit application."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.model.judged import Finding
from envcheck.model.project import Project
from envcheck.model.ruleset import Edition


def edition_superseded(facts: Facts) -> Iterator[Finding]:
    """A rule set outside its dates: to be settled for an edition that decides, else a note."""
    on = facts.project.permit_application_date
    if on is None:
        return
    for choice in facts.project.rule_sets:
        ruleset = facts.rulesets.get(choice.id)
        for number, edition in enumerate(ruleset.chain if ruleset is not None else ()):
            if edition.in_force:
                continue
            base = number == 0
            yield Finding(
                "edition-superseded",
                "E" if base and choice.decides else "N",
                edition.id,
                "",
                f"permit application of {on}; {_name(edition)} {_dates(edition, facts.project)}",
                _suggests(base, choice.decides),
                "the edition in force on that date, or the date of the application",
            )


def _name(edition: Edition) -> str:
    return " ".join(part for part in (edition.title, edition.edition) if part) or edition.id


def _dates(edition: Edition, project: Project) -> str:
    on, start = project.permit_application_date, edition.effective_from
    if on is not None and start is not None and on < start:
        return f"is in force only from {start}"
    if edition.effective_until is not None:
        return f"was in force until {edition.effective_until}"
    return "is not in force"


def _suggests(base: bool, decides: bool) -> str:
    if not base:
        return "the amendment is not applied"
    if decides:
        return "the limits are those of another edition than the one that applies"
    return "it is information only and decides nothing"


CHECKS = (
    Check("edition-superseded", "Edition or amendment outside its dates", edition_superseded),
)
