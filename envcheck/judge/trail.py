"""The trail of a selection: which edition, row, condition and footnote, and why no other."""

from __future__ import annotations

from collections.abc import Mapping

from envcheck.judge.facts import Known, in_words
from envcheck.judge.selection import METRICS, Outcome
from envcheck.model.judged import Choice
from envcheck.model.patterns import in_words as category_in_words
from envcheck.model.project import Project
from envcheck.model.ruleset import Note, RuleSet


def editions(ruleset: RuleSet, project: Project) -> list[Choice]:
    """Date, edition and amendments."""
    tested = project.permit_application_date
    if tested is None:
        trail = [Choice("date", "not stated", "every amendment is taken as in force")]
    else:
        trail = [Choice("date", tested.isoformat(), "permit application date of the project")]
    for i, edition in enumerate(ruleset.chain):
        step = "edition" if i == 0 else "amendment"
        held = f"in force from {edition.effective_from}" if edition.effective_from else "undated"
        if edition.effective_until:
            held += f" until {edition.effective_until}"
        if not edition.in_force:
            held += "; not in force on that date, so left out"
        chosen = f"{edition.title}, {edition.edition}"
        trail.append(Choice(step, chosen, f"{edition.clause}: {held}" if edition.clause else held))
    return trail


def not_in_force(ruleset: RuleSet, project: Project) -> str:
    """Say why the edition does not hold on the date of the application."""
    base = ruleset.chain[0]
    until = f" until {base.effective_until}" if base.effective_until else ""
    return (
        f"{base.title}, {base.edition} is in force from {base.effective_from}{until}, not on "
        f"{project.permit_application_date}"
    )


def of_rows(
    outcomes: tuple[Outcome, ...], facts: Mapping[str, Known], ruleset: RuleSet
) -> list[Choice]:
    """Row, conditions, footnotes and path of each limit, and why no other row."""
    trail: list[Choice] = []
    for outcome in outcomes:
        limit = outcome.limit
        what = METRICS.get(outcome.metric, outcome.metric)
        if limit is None:
            among = dict.fromkeys(f'"{x.label}" {x.cell}' for x in outcome.candidates)
            open_ = f"; open between {' and '.join(among)}" if len(among) > 1 else ""
            trail.append(Choice("row", f"{what}: none", outcome.why + open_))
            continue
        covers = ", ".join(map(category_in_words, limit.categories))
        why = f'{limit.clause}, row "{limit.label}", covers {covers}; {what} {limit.cell}'
        if limit.replaced:
            why += f"; replaces {limit.replaced}"
        trail.append(Choice("row", limit.id, why))
        for condition in limit.when:
            fact = facts[condition.dimension]
            chosen = f"{condition.dimension.replace('_', ' ')} {in_words(fact)}"
            why = f"the row asks for {condition.text} ({fact.where})"
            trail.append(Choice("condition", chosen, why))
        if limit.path and ruleset.paths_clause:
            trail.append(
                Choice("path", limit.path, f"either path is enough ({ruleset.paths_clause})")
            )
        trail += _no_other(outcome, facts)
        trail += [Choice("footnote", f"[{n.mark}]", _note_in_words(n)) for n in limit.notes]
    return list(dict.fromkeys(trail))


NAMED = 3
"""Rows that are named where a trail says why no other row holds."""


def _no_other(outcome: Outcome, facts: Mapping[str, Known]) -> list[Choice]:
    """Why no other row gives the limit: each with the condition that is not met."""
    found = []
    for limit, against in outcome.ruled_out[:NAMED]:
        row = f'"{limit.label}" {limit.cell}'
        if against is None:
            found.append(f"{row} speaks of more than this category")
            continue
        name = against.dimension.replace("_", " ")
        is_ = in_words(facts[against.dimension])
        found.append(f"{row} asks for {name} {against.text}, which is {is_}")
    more = len(outcome.ruled_out) - NAMED
    if more > 0:
        found.append(f"{more} more rows do not hold either")
    what = METRICS.get(outcome.metric, outcome.metric)
    return [Choice("no other row", what, "; ".join(dict.fromkeys(found)))] if found else []


def _note_in_words(note: Note) -> str:
    return f"{note.text}: {note.did}" if note.did else note.text
