"""Lists of the report: summary, open items, claims, findings, assumptions."""

from __future__ import annotations

from collections.abc import Iterable
from typing import NamedTuple

from envcheck.model.judged import Finding, Judged, Line
from envcheck.model.project import Project
from envcheck.report import wording
from envcheck.report.inert import clean
from envcheck.report.rows import Row


class Item(NamedTuple):
    """Something that waits for somebody, with where it belongs."""

    subject: str
    sheet: str
    what: str
    lines: tuple[str, ...]


class FindingView(NamedTuple):
    """What a cross-check saw, in words."""

    check: str
    severity: str
    severity_text: str
    subject: str
    sheet: str
    seen: str
    suggests: str
    settles: str
    answered: str
    sure: str


def summary(judged: Judged, only: tuple[str, ...] = (), total: int = 0) -> str:
    """Count the lines that decide and say what the report does not do.

    only, total: the tags that are shown, where not all are, and the number of all lines.
    """
    lines = [line for line in judged.lines if line.decides]
    over = sum(line.verdict == "fail" for line in lines)
    waiting = sum(line.open for line in lines)
    stop = sum(finding.unsettled for finding in judged.findings)
    shown = f" of {total} shown (only {clean(', '.join(only))})" if only else ""
    counts = f"{wording.plural(len(lines), 'line')}{shown}: {over} over their limit, {waiting} open"
    if stop:
        counts += f"; {wording.plural(stop, 'finding')} to be settled"
    return f"{counts}. {wording.APPROVES_NOTHING}"


def open_items(rows: Iterable[Row], judged: Judged) -> tuple[Item, ...]:
    """Open lines that decide with their reasons, then findings that must be settled by title."""
    found = [
        Item(row.tag, row.sheet, row.verdict_text, (*row.reasons, *row.notes))
        for row in rows
        if row.open and row.decides
    ]
    for finding in judged.findings:
        if finding.unsettled:
            title = clean(finding.title) or wording.plain(clean(finding.check).replace("-", " "))
            what = f"finding: {title[0].lower()}{title[1:]}"
            found.append(Item(clean(finding.subject), clean(finding.sheet), what, ()))
    return tuple(found)


def claims(project: Project) -> tuple[Item, ...]:
    """Exceptions that somebody claims: a claim is not a pass."""
    found = []
    for claim in project.exceptions:
        element = project.elements.get(claim.element)
        if not claim.evidence:
            evidence = "no evidence named"
        elif claim.evidence_found:
            evidence = f"evidence: {claim.evidence}"
        else:
            evidence = f"evidence named but not found: {claim.evidence}"
        lines = [
            f"claimed by {claim.claimed_by}" if claim.claimed_by else "nobody is named as claiming",
            claim.reason,
            evidence,
        ]
        found.append(
            Item(
                clean(claim.element),
                clean(element.sheet) if element else "",
                clean(f"exception of clause {claim.clause} claimed"),
                tuple(clean(line) for line in lines if line),
            )
        )
    return tuple(found)


def findings(found: Iterable[Finding]) -> tuple[FindingView, ...]:
    """Findings, the graver first, in order of finding within."""
    rank = {severity: number for number, severity in enumerate(wording.SEVERITIES)}
    return tuple(
        FindingView(
            check=clean(finding.check),
            severity=finding.severity,
            severity_text=wording.SEVERITIES.get(finding.severity, finding.severity),
            subject=clean(finding.subject),
            sheet=clean(finding.sheet),
            seen=clean(finding.seen),
            suggests=clean(finding.suggests),
            settles=clean(finding.settles),
            answered=clean(finding.answered),
            sure=finding.sure,
        )
        for finding in sorted(found, key=lambda f: rank.get(f.severity, len(rank)))
    )


def assumptions(lines: Iterable[Line]) -> tuple[str, ...]:
    """What the figures take for granted, each once, with the assemblies that it concerns."""
    found: dict[str, dict[str, None]] = {}
    seen: set[int] = set()
    for line in lines:
        if line.solved is None or id(line.solved) in seen:
            continue
        seen.add(id(line.solved))
        for text in line.solved.assumptions:
            found.setdefault(clean(text), {})[clean(line.solved.assembly)] = None
    return tuple(f"{wording.listed(list(who))}: {text}" for text, who in found.items())


def remarks(texts: Iterable[str]) -> tuple[str, ...]:
    """Remarks of the judge, each once."""
    return tuple(dict.fromkeys(map(clean, texts)))
