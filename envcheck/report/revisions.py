"""The page of ``envcheck compare``: what changed on the lines, what caused it, what differs."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import NamedTuple

from envcheck.model.compared import Compared, Difference, LineChange, Moved
from envcheck.model.judged import Finding, Group, Line, Ratio
from envcheck.model.project import Project
from envcheck.model.ruleset import RuleSet
from envcheck.report import numbers, rows, said, wording
from envcheck.report.answer import Answer
from envcheck.report.by_line import grouped, place
from envcheck.report.differences import KINDS, NONE, Words
from envcheck.report.header import title
from envcheck.report.inert import clean
from envcheck.report.parts import Block, Entry, Facts, Grid, Items, Page, Pair, Paragraph, Section
from envcheck.report.revisions_data import data, table
from envcheck.report.view import ViewOptions, system_for

UNTOLD = "nothing in the two project files tells it: the mean or sum that it stands in changed"
ALIKE = "The two say the same: no line, fact, area or layer differs."
ASPECTS = {"why": "what is missing", "claim": "claimed exception"}


class Side(NamedTuple):
    """One of the two: the project and its rule sets."""

    project: Project
    rulesets: Mapping[str, RuleSet]


def build(old: Side, new: Side, compared: Compared, options: ViewOptions) -> Answer:
    """Write what changed as a page, as data and as a table of one row per change."""
    system = system_for(new.project, new.rulesets, options)
    dimensions = {
        name: dimension
        for side in (old, new)
        for ruleset in side.rulesets.values()
        for name, dimension in ruleset.dimensions.items()
    }
    words = Words(system, dimensions)
    sections = (
        Section("", (_sides(old.project, new.project), Paragraph(_summary(compared)))),
        *_lines(new.project, compared, words),
        *_come_and_gone(old.project, new.project, compared, words),
        *_findings(compared),
        *_building(compared, words),
        *_differences(compared, words),
        Section("", (Paragraph(wording.DEFERRAL),)),
    )
    page = Page(_title(old.project, new.project), sections)
    files = (old.project, new.project)
    return Answer(page, data(files, compared, words), table(files, compared, words))


def _title(old: Project, new: Project) -> str:
    if old.title == new.title:
        return clean(f"{new.title}: two revisions compared")
    return clean(f"{old.title} and {new.title} compared")


def _sides(old: Project, new: Project) -> Facts:
    return Facts(
        tuple(
            Pair(label, clean(", ".join(filter(None, (title(p), p.file, _date(p))))))
            for label, p in (("before", old), ("now", new))
        )
    )


def _date(project: Project) -> str:
    return f"report date {project.report_date.isoformat()}" if project.report_date else ""


def _summary(compared: Compared) -> str:
    changed, same = len(compared.changed), compared.unchanged
    verdicts = sum("verdict" in change.aspects for change in compared.changed)
    before = changed + same + len(compared.dropped)
    now = changed + same + len(compared.added)
    text = (
        f"{wording.plural(before, 'line')} before, {now} now: {changed} changed ({verdicts} of "
        f"them their verdict), {same} unchanged, {len(compared.added)} added, "
        f"{len(compared.dropped)} dropped; {wording.plural(len(compared.settled), 'finding')} "
        f"settled, {len(compared.new)} new."
    )
    nothing = not (compared.changed or compared.differences or compared.added or compared.dropped)
    return f"{text} {ALIKE if nothing else wording.APPROVES_NOTHING}"


# ---------------------------------------------------------------------------------------- lines


def _lines(project: Project, compared: Compared, words: Words) -> list[Section]:
    if not compared.changed:
        return []
    ordered = sorted(compared.changed, key=_rank)
    entries = [
        (
            _place(project, change.after),
            f"{_which(project, change.after)}: {', '.join(map(_aspect, change.aspects))}",
            causes(change, words),
        )
        for change in ordered
    ]
    table = Paragraph(_units_note(ordered, words.system))
    return [
        Section("Lines that changed", (_grid(project, ordered, words.system), table)),
        Section("What caused it", (Items(grouped(entries)),)),
    ]


def _which(project: Project, line: Line) -> str:
    """The letter of a line, with its rule set where there are several."""
    letter = numbers.symbol(line.metric)
    return clean(f"{letter} by {line.ruleset}") if len(project.rule_sets) > 1 else letter


def _aspect(name: str) -> str:
    return ASPECTS.get(name, name)


def causes(change: LineChange, words: Words) -> tuple[str, ...]:
    """Sentences for the causes of a change."""
    own = frozenset({change.after.element})
    return tuple(words.sentence(each, own) for each in change.causes) or (UNTOLD,)


def _rank(change: LineChange) -> int:
    """Lines that became worse first, then those whose verdict changed, then the rest."""
    before, after = (_grade(line) for line in (change.before, change.after))
    return 0 if after > before else 1 if "verdict" in change.aspects else 2


def _grade(line: Line) -> int:
    return 2 if line.verdict == "fail" else 1 if line.open else 0


def _grid(project: Project, changes: Iterable[LineChange], system: str) -> Grid:
    found, tones = [], []
    several = len(project.rule_sets) > 1
    for change in changes:
        a, b = change.before, change.after
        element = project.elements.get(b.element)
        same_limit = "limit" not in change.aspects
        found.append(
            (
                clean(b.element),
                clean(element.sheet) if element else "",
                f"{numbers.symbol(b.metric)} {_value(a, system)}",
                _value(b, system),
                clean(said.against(b) if same_limit else _limits(a, b)),
                said.verdict_text(a),
                "the same" if a.verdict == b.verdict else said.verdict_text(b),
                *([clean(b.ruleset)] if several else []),
            )
        )
        tones.append("bad" if _grade(b) == 2 else "open" if b.open else "good")
    heads: tuple[str, ...] = (
        "tag",
        "sheet",
        "before",
        "now",
        "limit",
        "verdict before",
        "verdict now",
    )
    wrap: tuple[int, ...] = (5, 6, 4)
    if several:
        heads, wrap = (*heads, "rule set"), (5, 6, 7, 4)
    return Grid(heads, tuple(found), (2, 3, 4), wrap, tuple(tones))


def _limits(a: Line, b: Line) -> str:
    return f"{said.against(a) or NONE}, now {said.against(b) or NONE}"


def _value(line: Line, system: str) -> str:
    return rows.value_of(line, system).text or NONE


def _units_note(changes: Iterable[LineChange], system: str) -> str:
    found = dict.fromkeys(
        f"{numbers.symbol(c.after.metric)} in {unit}"
        for c in changes
        if (unit := numbers.unit(c.after.metric, system))
    )
    printed = {own.unit for c in changes if (own := c.after.own or c.after.comparison)}
    other = sorted(unit for unit in printed if numbers.system_of(unit) not in ("", system))
    limits = f"limits as printed, in {', '.join(other)}" if other else "limits as printed"
    return f"{'; '.join([*found, limits])}."


def _place(project: Project, line: Line) -> str:
    element = project.elements.get(line.element)
    return clean(place(line.element, element.sheet if element else ""))


# ------------------------------------------------------------------------------------- elements


def _come_and_gone(old: Project, new: Project, compared: Compared, words: Words) -> list[Section]:
    found: list[Entry] = []
    for line in compared.added:
        found.append(Entry(f"{_place(new, line)}: added, {_said(new, line, words)}"))
    for line in compared.dropped:
        found.append(Entry(f"{_place(old, line)}: dropped, {_said(old, line, words)}"))
    found += [Entry(clean(f"{a}: its tag is now {b}")) for a, b in compared.renamed]
    found += [Entry(_moved(each, words.system)) for each in compared.moved]
    return [Section("Lines added and dropped", (Items(tuple(found)),))] if found else []


def _said(project: Project, line: Line, words: Words) -> str:
    element = project.elements.get(line.element)
    what = words.amount(element) if element is not None else ""
    own, letter = line.own or line.comparison, numbers.symbol(line.metric)
    figures = f"{letter} {_value(line, words.system)}"
    if own is not None:
        figures = f"{letter} {said.compared(own)} against {said.against(line)} {own.unit}".rstrip()
    assembly = project.assemblies[element.assembly].title if element is not None else ""
    parts = (assembly, what, figures, said.verdict_text(line))
    return clean(", ".join(filter(None, parts)))


def _moved(each: Moved, system: str) -> str:
    from envcheck.report.differences import quantity

    gone, gained = ", ".join(each.dropped), ", ".join(each.gained)
    area = quantity(each.area, "area", system)
    return clean(f"{gone}: its {area} of {each.surface} went to {gained}")


# --------------------------------------------------------------------------- findings, building


def _findings(compared: Compared) -> list[Section]:
    return [
        Section(heading, (Items(_said_findings(findings)),))
        for heading, findings in (
            ("Findings that are new", compared.new),
            ("Findings that are settled", compared.settled),
        )
        if findings
    ]


def _said_findings(findings: Iterable[Finding]) -> tuple[Entry, ...]:
    return grouped(
        (
            place(clean(f.subject), clean(f.sheet)),
            clean(f"{wording.SEVERITIES.get(f.severity, f.severity)}, {f.title or f.check}"),
            (),
        )
        for f in findings
    )


def _building(compared: Compared, words: Words) -> list[Section]:
    found = [_ratio(a, b) for a, b in compared.ratios]
    found += [_group(a, b, words.system) for a, b in compared.groups]
    return [Section("Building", (Items(tuple(map(Entry, found))),))] if found else []


def _ratio(a: Ratio | None, b: Ratio | None) -> str:
    one = a or b
    assert one is not None
    name = wording.RATIOS.get(one.name, wording.plain(one.name))
    return clean(f"{name}: {_share(a)} -> {_share(b)}")


def _share(ratio: Ratio | None) -> str:
    if ratio is None or ratio.missing:
        return NONE
    cap = "" if ratio.most is None else f", cap {numbers.percent(ratio.most, 2)}"
    return f"{numbers.percent(ratio.value, 2)}{cap}{' passed' if ratio.passed else ''}"


def _group(a: Group | None, b: Group | None, system: str) -> str:
    one = b or a
    assert one is not None
    return f"{said.group(one.kind, one.name)}: {_sum(a, system)} -> {_sum(b, system)}"


def _sum(group: Group | None, system: str) -> str:
    if group is None:
        return NONE
    if not group.parts:
        return wording.GROUP_STATES[group.state]
    flow = numbers.flow_unit(group.parts[0].metric, system)
    shown = (
        numbers.in_system(x, "point_transmittance", system) for x in (group.drawn, group.table)
    )
    drawn, table = numbers.two_sums(*shown) if flow else ("", "")
    figures = f"{drawn} as drawn, {table} by the table {flow}, " if flow else ""
    return f"{figures}{wording.GROUP_STATES[group.state]}"


# ---------------------------------------------------------------------------------- differences


def _differences(compared: Compared, words: Words) -> list[Section]:
    """Everything that differs in what was read, by part of the file."""
    same = dict(compared.same)
    found = []
    for kind, heading in KINDS.items():
        own = [each for each in compared.differences if each.kind == kind]
        if own:
            alike = f" ({same[kind]} more are the same)" if same.get(kind) else ""
            blocks: tuple[Block, ...] = (_of_kind(own, words),)
            found.append(Section(f"What differs: {heading}{alike}", blocks))
    return found


def _of_kind(differences: Iterable[Difference], words: Words) -> Grid:
    table = tuple(
        (words.subject(d) or NONE, words.field(d), words.before(d), words.after(d))
        for d in map(_dashed, differences)
    )
    return Grid(("of", "what", "before", "now"), table, (), (3, 2, 0))


def _dashed(each: Difference) -> Difference:
    """A whole part that came or went: the other side is no part."""
    if each.field or each.what not in ("added", "dropped"):
        return each
    return each._replace(before=each.before or NONE, after=each.after or NONE)
