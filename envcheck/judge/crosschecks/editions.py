"""Editions and amendments against the date of the permit application."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.model.judged import CERTAIN, Finding
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


def date_missing(facts: Facts) -> Iterator[Finding]:
    """Without a date nobody knows which edition and which amendments apply."""
    if facts.project.permit_application_date is not None:
        return
    dated = [
        edition
        for choice in facts.project.rule_sets
        if choice.decides and choice.id in facts.rulesets
        for edition in facts.rulesets[choice.id].chain
        if edition.effective_from is not None or edition.effective_until is not None
    ]
    if dated:
        yield Finding(
            "permit-date-missing",
            "E",
            "project",
            "",
            f"no permit_application_date; {_name(dated[-1])} holds from "
            f"{dated[-1].effective_from or 'the start'}",
            "every amendment was taken as in force; another date may give other limits",
            "permit_application_date under project",
        )


CHECKS = (
    Check("permit-date-missing", "Date of the permit application missing", date_missing, CERTAIN),
    Check(
        "edition-superseded", "Edition or amendment outside its dates", edition_superseded, CERTAIN
    ),
)
