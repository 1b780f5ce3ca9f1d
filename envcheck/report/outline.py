"""The view as a page of headings and blocks, shared by the formats that people read.

What is decided stands first: table, reasons, open items, findings, the building. How it was judged
and what it rests on follows.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from typing import TYPE_CHECKING

from envcheck.report import by_line, main_table, several_rule_sets, wording
from envcheck.report.by_line import place
from envcheck.report.header import RuleSetView
from envcheck.report.items import FindingView, Item
from envcheck.report.parts import Block, Entry, Facts, Items, Page, Pair, Paragraph, Section
from envcheck.report.rows import Row
from envcheck.report.view import View

if TYPE_CHECKING:
    from envcheck.report.details import AssemblyView
    from envcheck.report.workings import Workings

SAID_BY_LINES = {
    "exception-without-evidence": "claimed by",
    "centre-of-glass": "centre of glass",
    "class-claimed": "leaves the way of counting open",
}
"""Finding -> words by which the reason of a line already says what the finding saw."""


def page(view: View) -> Page:
    """Lay the view out as sections: what decides first, what explains it after."""
    return Page(
        view.title,
        (
            *where(view),
            Section("", (Paragraph(view.summary),)),
            *tables(view),
            *why_over(view),
            *open_items(view),
            *beside_the_lines(view),
            *what_it_rests_on(view),
        ),
    )


def tables(view: View) -> tuple[Section, ...]:
    """Every line once, by rule set, and those on which rule sets differ."""
    several = len(view.rule_sets) > 1
    rows_of = _rows_of(view)
    return (
        *(
            main_table.section(rows_of[rules.id], rules, several, view.bounds)
            for rules in view.rule_sets
        ),
        *several_rule_sets.sections(view.rows, view.rule_sets, view.changes, view.turns),
    )


def why_over(view: View) -> tuple[Section, ...]:
    """Why lines are over their limits."""
    return _if_any("Why over the limit", by_line.over(_deciding(view), _told(view)))


def open_items(view: View) -> tuple[Section, ...]:
    """What waits for somebody; "none" where nothing does."""
    return (Section("Open items", (_open(view.open_items, _sheets(view)),)),)


def beside_the_lines(view: View) -> tuple[Section, ...]:
    """Claims, lines under sets that decide nothing, findings, lists to tick off, the building."""
    return (
        *_if_any("Claimed exceptions", _claims(view)),
        *_aside(_rows_of(view), view.rule_sets),
        *_findings(view.findings, _sheets(view), _deciding(view)),
        *(Section(each.heading, (each.grid,)) for each in view.schedules),
        *_building(view),
        *_trade_offs(view),
    )


def what_it_rests_on(view: View) -> tuple[Section, ...]:
    """Conventions, each line's limit and sum, assemblies, cautions, what is not judged, hashes."""
    several = len(view.rule_sets) > 1
    rows_of, told = _rows_of(view), _told(view)
    return (
        *_judged(view),
        *(
            Section(_heading("Line by line", rules, several), (_by_line(rows_of[rules.id], told),))
            for rules in view.rule_sets
        ),
        *(_assemblies(view.assemblies) if view.assemblies else ()),
        *_moisture(view),
        *_if_any("Assumed", _plain(view.assumptions)),
        *_if_any("Remarks", _plain(view.remarks)),
        Section("Cautions", (_cautions(view),)),
        Section("Not judged on this page", (_plain(view.not_judged or (wording.NOTHING,)),)),
        _close(view),
    )


def _trade_offs(view: View) -> tuple[Section, ...]:
    groups = [group for group in view.building.groups if group.kind == "trade_off"]
    if not groups:
        return ()
    from envcheck.report import trade_off

    return tuple(map(trade_off.section, groups))


def _rows_of(view: View) -> dict[str, list[Row]]:
    found: dict[str, list[Row]] = {rules.id: [] for rules in view.rule_sets}
    for row in view.rows:
        found.setdefault(row.rule_set, []).append(row)
    return found


def _deciding(view: View) -> list[Row]:
    return [row for row in view.rows if row.decides]


def _told(view: View) -> set[str]:
    """Assemblies of which a finding says how the verdict hangs on the method."""
    return {each.subject for each in view.findings if each.check == "hangs-on-method"}


def _sheets(view: View) -> dict[str, str]:
    return {row.tag: row.sheet for row in view.rows}


def _heading(words: str, rules: RuleSetView, several: bool) -> str:
    return f"{words}, {rules.id}" if several else words


def where(view: View) -> tuple[Section, ...]:
    """Place and rule sets: one line, or a line for each rule set."""
    if len(view.lead) == 1:
        return (Section("", (Paragraph(view.lead[0]),)),)
    return _if_any("", _plain(view.lead))


# ------------------------------------------------------------------- what waits for somebody


def _open(found: Iterable[Item], sheets: Mapping[str, str]) -> Items:
    entries = by_line.grouped(
        (_located(x.subject, x.sheet, sheets), x.what, x.lines) for x in found
    )
    return Items(entries, numbered=True) if entries else Items((Entry(wording.NOTHING),))


def _located(subject: str, sheet: str, sheets: Mapping[str, str]) -> str:
    """A subject with its sheet; of several elements each with its own."""
    names = subject.split(", ")
    if len(names) > 1 and all(name in sheets for name in names):
        return ", ".join(place(name, sheets[name]) for name in names)
    return place(subject, sheet)


def _claims(view: View) -> Items:
    """Claims that no open line speaks of."""
    spoken = {row.tag for row in view.rows if row.verdict == "official_decides"}
    left = [claim for claim in view.claims if claim.subject not in spoken]
    return Items(by_line.grouped((place(x.subject, x.sheet), x.what, x.lines) for x in left))


def _aside(
    rows_of: Mapping[str, Sequence[Row]], rule_sets: Iterable[RuleSetView]
) -> tuple[Section, ...]:
    """Lines over or open under rule sets that decide nothing."""
    sections: list[Section] = []
    for rules in rule_sets:
        if not rules.decides:
            found = (
                (place(row.tag, row.sheet), row.verdict_text, row.reasons)
                for row in rows_of[rules.id]
                if row.open or row.verdict == "fail"
            )
            heading = f"Over or open under {rules.id}, which decides nothing"
            sections += _if_any(heading, Items(by_line.grouped(found)))
    return tuple(sections)


# ---------------------------------------------------------------------------------- findings


def _findings(
    found: Sequence[FindingView], sheets: Mapping[str, str], rows: Sequence[Row]
) -> tuple[Section, ...]:
    """A section for each severity, the graver first."""
    reasons: dict[str, str] = {}
    for row in rows:
        for name in (row.tag, row.assembly):
            reasons[name] = " ".join((reasons.get(name, ""), *row.reasons))
    sections: list[Section] = []
    for severity, words in wording.SEVERITIES.items():
        entries = by_line.grouped(
            _finding(each, sheets, reasons) for each in found if each.severity == severity
        )
        sections += _if_any(f"Findings {words}", Items(entries))
    return tuple(sections)


def _finding(
    each: FindingView, sheets: Mapping[str, str], reasons: Mapping[str, str]
) -> tuple[str, str, tuple[str, ...]]:
    names = each.subject.split(", ")
    words = SAID_BY_LINES.get(each.check)
    said = words is not None and all(words in reasons.get(name, "") for name in names)
    sure = f" ({each.sure})" if each.sure else ""
    lines = (
        f"suggests{sure}: {each.suggests}" if each.suggests else "",
        f"settles it: {each.settles}" if each.settles else "",
        f"answered by the project: {each.answered}" if each.answered else "",
    )
    where = _located(each.subject, each.sheet, sheets)
    seen = "as the open item says" if said else each.seen
    return where, f"{seen} [{each.check}]", tuple(filter(None, lines))


def _building(view: View) -> tuple[Section, ...]:
    entries = []
    for ratio in view.building.ratios:
        share = f"{ratio.name}: {ratio.sum}" if ratio.sum else ratio.name
        head = f"{share} ({ratio.cap}): {ratio.state}"
        entries.append(Entry(head, tuple(f"missing: {text}" for text in ratio.missing)))
    for mean in (group for group in view.building.groups if group.kind == "mean"):
        lines = (f"worst member {mean.worst}" if mean.worst else "", mean.cap, mean.state_text)
        waits = tuple(f"waits for {why}" for why in mean.waits)
        sums = (mean.sum,) if mean.sum else ()
        entries.append(Entry(mean.title, (*filter(None, lines), *waits), sums))
    for each in view.building.closings:
        entries.append(Entry(f"{place(each.surface, each.sheet)}: {each.sum}: {each.state}"))
    return _if_any("The building", Items(tuple(entries)))


# ------------------------------------------------------------------------- what it rests on


def _judged(view: View) -> tuple[Section, ...]:
    """How it was judged: the project, then each rule set with its conventions."""
    sections = [Section("How it was judged", (Facts(view.facts),))]
    for rules in view.rule_sets:
        conventions = tuple(
            Pair(each.topic, f"{each.counted} [{each.where}]") for each in rules.conventions
        )
        blocks: tuple[Block, ...] = (Facts((*rules.facts, *conventions)),)
        sections.append(Section(f"By rule set {rules.id}: {rules.title}", blocks))
    return tuple(sections)


def _by_line(rows: Iterable[Row], told: set[str]) -> Items:
    found = by_line.said_once(rows, told)
    return found if found.entries else Items((Entry(wording.NOTHING),))


def _plain(texts: Iterable[str]) -> Items:
    return Items(tuple(Entry(text) for text in texts))


def _if_any(heading: str, block: Items) -> tuple[Section, ...]:
    return (Section(heading, (block,)),) if block.entries else ()


def _assemblies(assemblies: Iterable[AssemblyView]) -> Iterable[Section]:
    """A section for each; workings that are letter by letter those of an earlier one are not said
    again."""
    from envcheck.report import assembly_page

    shown: dict[Workings, str] = {}
    for each in assemblies:
        first = shown.setdefault(each.workings, each.assembly) if each.workings else each.assembly
        blocks = assembly_page.blocks(each if first == each.assembly else _unworked(each))
        if first != each.assembly:
            blocks = (*blocks, Paragraph(f"Ladder and worksheet are those of {first}."))
        yield Section(f"Assembly {each.assembly}: {each.title}", blocks)


def _unworked(each: AssemblyView) -> AssemblyView:
    return each._replace(workings=None)


def _moisture(view: View) -> tuple[Section, ...]:
    if view.moisture is None:
        return ()
    from envcheck.report import moisture_page

    return moisture_page.sections(view.moisture)


def _cautions(view: View) -> Items:
    return Items(
        tuple(Entry(f"{each.heading}. {each.text}".strip(), each.reasons) for each in view.cautions)
    )


def _close(view: View) -> Section:
    pairs = (Pair("made by", view.tool), *(Pair(f"sha256 {h.label}", h.text) for h in view.hashes))
    if view.hashes:
        pairs = (*pairs, Pair("a hash", view.hash_note))
    return Section("", (Paragraph(view.deferral), Facts(pairs)))
