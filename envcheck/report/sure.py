"""The page of ``envcheck sure``: which inputs a verdict hangs on, and which need documents."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from envcheck import units
from envcheck.model.project import Project
from envcheck.model.ruleset import RuleSet
from envcheck.model.sure import Input, Sureness
from envcheck.report import header, numbers, said, wording
from envcheck.report.answer import Answer
from envcheck.report.by_line import place
from envcheck.report.inert import clean
from envcheck.report.parts import Block, Entry, Grid, Items, Page, Paragraph, Section
from envcheck.report.view import ViewOptions, system_for

LEAD = (
    "Each stated number is moved within its stated range, else the band of its class or of its "
    "kind of evidence, to the end that works against the verdict: alone, and all together. With "
    "the inputs named here as stated, no other, nor all others together, turns the verdict. "
    "Information: no verdict changes by it."
)
NOT_VARIED = (
    "Not varied, and in need of a document, since the method gives no value between the rows of "
    "its table"
)
NONE = "No line asked for has a verdict."


def build(
    project: Project,
    rulesets: Mapping[str, RuleSet],
    found: Sequence[Sureness],
    options: ViewOptions,
) -> Answer:
    """Write what verdicts hang on as a page and as data."""
    system = system_for(project, rulesets, options)
    turning = [each for each in found if each.state == "turns"]
    blocks: list[Block] = [Paragraph(LEAD if found else NONE)]
    blocks += _together(project, found)
    sections = [Section("", tuple(blocks))]
    sections += [_section(project, each, system) for each in turning]
    bands = _bands(turning)
    sections += [Section("Bands", (Items(bands),))] if bands else []
    sections.append(Section("", (Paragraph(wording.DEFERRAL),)))
    page = Page(f"{header.title(project)}: how sure", tuple(sections))
    data: dict[str, object] = {"units": "SI", "lines": [_data(each) for each in found]}
    return Answer(page, data, _flat(found))


def _tags(project: Project, each: Sureness) -> str:
    return ", ".join(place(x.element, project.elements[x.element].sheet) for x in each.lines)


def _together(project: Project, found: Sequence[Sureness]) -> list[Block]:
    """Lines that nothing turns, and those to which none of this applies."""
    settled = [
        f"{_tags(project, each)}: {said.verdict_text(each.lines[0])}{_count(each)}"
        for each in found
        if each.state == "settled"
    ]
    without: dict[str, list[str]] = {}
    for each in found:
        if each.state == "without":
            names = [f"{x.element} ({numbers.symbol(x.metric)})" for x in each.lines]
            without.setdefault(each.why, []).extend(names)
    made: list[Block] = []
    if settled:
        made += [
            Paragraph("No input within its band turns these, nor all together:"),
            Items(tuple(Entry(clean(text)) for text in settled)),
        ]
    if without:
        texts = (f"{', '.join(names)}: {why}" for why, names in without.items())
        made.append(Items(tuple(Entry(clean(text)) for text in texts)))
    return made


def _count(each: Sureness) -> str:
    varied = sum(one.effect is not None for one in each.inputs)
    rest = len(each.inputs) - varied
    text = f" ({varied} {'input' if varied == 1 else 'inputs'}"
    if rest:
        text += f"; {rest} more choose the row of a table and need their documents"
    return f"{text})"


def _section(project: Project, each: Sureness, system: str) -> Section:
    line = each.lines[0]
    own = line.own or line.comparison
    assert own is not None and each.value is not None
    metric, quantity = line.metric, numbers.quantity(line.metric)
    letter, unit = numbers.symbol(metric), numbers.unit(metric, system)
    ends = [numbers.in_system(x or 0.0, quantity, system) for x in (each.low, each.high)]
    low, high = numbers.interval(ends[0], ends[1], numbers.decimals(metric, system))
    count, total = len(each.deciding), len(each.inputs)
    need = "only it needs a document" if count == 1 else "only they need documents"
    facts = (
        f"{said.verdict_text(line)}: {letter} {said.compared(own)} against "
        f"{said.limit_number(own)} {own.unit}; with every input at its ends {low} to {high} {unit}."
    )
    decided = f"Decided by {count if count != total else 'all'} of {total} inputs; {need}."
    blocks: list[Block] = [Paragraph(clean(facts)), Paragraph(decided)]
    blocks += [_grid(each, system), _documents(each)]
    rest = [one.what for one in each.inputs if one.effect is None]
    if rest:
        blocks.append(Paragraph(clean(f"{NOT_VARIED}: {'; '.join(rest)}.")))
    heading = f"{_tags(project, each)}: {each.assembly}, {project.assemblies[each.assembly].title}"
    return Section(clean(heading), tuple(blocks))


def _grid(each: Sureness, system: str) -> Grid:
    rows = tuple(_row(one, system) for one in each.deciding)
    heads = ("input", "stated", "band", "moves the value by", "alone turns it")
    return Grid(heads, rows, (1, 3), (0,))


def _row(one: Input, system: str) -> tuple[str, ...]:
    ends = (_number(x, one.quantity, system) for x in (one.low, one.high))
    effect = "" if one.effect is None else f"{numbers.signed(100.0 * one.effect, 1)} %"
    unit = "%" if one.quantity == "share" else units.label(one.quantity, system)
    return (
        clean(one.what),
        f"{_number(one.now, one.quantity, system)} {unit}".rstrip(),
        " to ".join(ends),
        effect,
        "yes" if one.alone else "no",
    )


def _documents(each: Sureness) -> Items:
    """What stands behind each deciding input now."""
    texts = []
    for one in each.deciding:
        known = one.source if one.source.startswith(one.evidence) else ""
        words = known or ", ".join(part for part in (one.evidence, one.source) if part)
        sheet = f" ({each.sheet})" if each.sheet else ""
        texts.append(f"{one.what}{sheet}: {words or 'as drawn'}")
    return Items(tuple(Entry(clean(text)) for text in texts))


def _number(value: float, quantity: str, system: str) -> str:
    if quantity == "share":
        return numbers.significant(100.0 * value, 4)
    return numbers.significant(numbers.in_system(value, quantity, system), 4)


def _bands(found: Sequence[Sureness]) -> tuple[Entry, ...]:
    """Where the bands of the deciding inputs come from, each once."""
    seen = {
        f"{one.basis}, {numbers.signed(100.0 * (one.low / one.now - 1.0), 0)} % to "
        f"{numbers.signed(100.0 * (one.high / one.now - 1.0), 0)} %, "
        f"{one.quantity.replace('_', ' ')}{f', {one.evidence}' if one.evidence else ''}: "
        f"{one.band_source}": None
        for each in found
        for one in each.deciding
    }
    return tuple(Entry(clean(text)) for text in seen)


def _data(each: Sureness) -> dict[str, object]:
    return {
        "assembly": each.assembly,
        "sheet": each.sheet,
        "lines": [
            {"rule_set": x.ruleset, "element": x.element, "metric": x.metric, "verdict": x.verdict}
            for x in each.lines
        ],
        "state": each.state,
        "why": each.why,
        "value": each.value,
        "low": each.low,
        "high": each.high,
        "inputs": [one._asdict() for one in each.inputs],
        "deciding": [one.what for one in each.deciding],
    }


def _flat(found: Sequence[Sureness]) -> Grid:
    """A row for each input of a line, numbers in SI."""
    heads = (
        "rule set", "element", "metric", "verdict", "assembly", "sheet", "input", "quantity",
        "stated", "low", "high", "basis", "effect", "turns it alone", "deciding", "evidence",
        "source",
    )  # fmt: skip
    rows = tuple(
        (
            line.ruleset, clean(line.element), line.metric, line.verdict, clean(each.assembly),
            clean(each.sheet), clean(one.what), one.quantity, repr(one.now), repr(one.low),
            repr(one.high), one.basis, "" if one.effect is None else repr(one.effect),
            "yes" if one.alone else "no", "yes" if one in each.deciding else "no", one.evidence,
            clean(one.source),
        )
        for each in found
        for line in each.lines
        for one in each.inputs
    )  # fmt: skip
    return Grid(heads, rows, (8, 9, 10, 12))
