"""The page of ``envcheck remedy``: for each assembly what dominates, and what would cure it."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from envcheck import units
from envcheck.model.advised import Advice, Change, Refused, Structural
from envcheck.model.project import Project
from envcheck.model.ruleset import RuleSet
from envcheck.report import header, numbers, said, wording
from envcheck.report.answer import Answer
from envcheck.report.by_line import place
from envcheck.report.inert import clean
from envcheck.report.parts import Block, Entry, Grid, Items, Page, Paragraph, Section
from envcheck.report.view import ViewOptions, system_for
from envcheck.units import respell

LEVERS = {
    "thickness": "thickness",
    "taper": "thickness, least and greatest by as much",
    "conductivity": "conductivity",
    "label": "labelled R of the fill",
    "resistance": "R-value",
    "share": "framing share",
    "product": "U of the product",
    "glass": "U of the glazing",
    "spacing": "spacing",
    "density": "number",
    "psi": "psi",
    "chi": "chi",
}
BASES = {
    "limit": "the printed limit",
    "rounding": "it by rounding",
    "stock": "a stock size",
    "table": "the next row of a table",
}
CAUTION = (
    "Each change brings the computed value within the limit; check fire, structure and moisture "
    "first. Structural choices are stated as far as they would do thermally, not proposed."
)
NO_VALUE = "the prescribed method gives no value for another, and no row of its tables does it"
NO_CURE = "Nothing that is drawn brings it within its limit by itself."


def build(
    project: Project,
    rulesets: Mapping[str, RuleSet],
    advice: Sequence[Advice],
    options: ViewOptions,
) -> Answer:
    """Write the advice as a page and as data."""
    system = system_for(project, rulesets, options)
    sections = [_section(project, each, system) for each in advice]
    lead = Paragraph(CAUTION if advice else "No line is over its limit or too close to it.")
    page = Page(
        f"{header.title(project)}: remedies",
        (Section("", (lead,)), *sections, Section("", (Paragraph(wording.DEFERRAL),))),
    )
    data: dict[str, object] = {"units": "SI", "advice": [_data(each) for each in advice]}
    return Answer(page, data, _flat(advice))


def _flat(advice: Sequence[Advice]) -> Grid:
    """A row for each change, numbers SI."""
    heads = ("change", "assembly", "part", "lever", "quantity", "before [SI]", "after [SI]",
             "value after [SI]", "reaches", "beside it")  # fmt: skip
    return Grid(
        heads,
        tuple(
            (name, each.assembly, change.what, change.lever, change.quantity,
             repr(change.before), repr(change.after), repr(change.value), change.basis,
             "; ".join(change.breaks))
            for each in advice
            for name, change in zip(names(each), each.changes, strict=True)
        ),
    )  # fmt: skip


def names(advice: Advice) -> tuple[str, ...]:
    """Names by which the changes of an assembly are asked for: ``W3/1``."""
    return tuple(f"{advice.assembly}/{number}" for number in range(1, len(advice.changes) + 1))


def _section(project: Project, each: Advice, system: str) -> Section:
    assembly = project.assemblies[each.assembly]
    blocks: list[Block] = [Items(tuple(_over(project, each)))]
    if each.dominant:
        shares = ", ".join(f"{clean(t)} {numbers.percent(s)}" for t, s in each.dominant[:4])
        blocks.append(Paragraph(f"Of the resistance that counts: {shares}."))
    if each.changes:
        unit, metric = units.label("resistance", system), each.lines[0].metric
        blocks += [
            _table(each, system),
            Paragraph(f"R in {unit}; {numbers.symbol(metric)} in {numbers.unit(metric, system)}."),
        ]
        blocks += _costs(project, each)
        worse = {text: None for change in each.changes for text in change.breaks}
        if worse:
            blocks.append(Paragraph(f"Beside it: {clean('; '.join(worse))}."))
    else:
        blocks.append(Paragraph(NO_CURE))
    rest = [
        *_added(each, system),
        *(_refused(refused, each.lines[0].metric, system) for refused in each.refused),
        *(_structural(found, system) for found in each.structural),
    ]
    if rest:
        blocks.append(Items(tuple(map(Entry, rest))))
    return Section(f"{clean(assembly.id)}: {clean(assembly.title)}", tuple(blocks))


def _over(project: Project, each: Advice) -> list[Entry]:
    by_words: dict[str, list[str]] = {}
    for line in each.lines:
        element = project.elements[line.element]
        own = line.own or line.comparison
        figures = (
            f"{numbers.symbol(line.metric)} {said.compared(own)} against {said.limit_number(own)} "
            f"{own.unit}".rstrip()
            if own is not None
            else ""
        )
        words = f"{said.verdict_text(line)}: {figures}"
        by_words.setdefault(words, []).append(place(line.element, element.sheet))
    return [Entry(clean(f"{', '.join(tags)}: {words}")) for words, tags in by_words.items()]


def _table(each: Advice, system: str) -> Grid:
    metric = each.lines[0].metric
    rows = tuple(
        (
            name,
            clean(f"{change.what}: {LEVERS[change.lever]}"),
            figure(change.before, change.quantity, system, True),
            figure(change.after, change.quantity, system, change.after > change.before),
            _resistance(change.resistance, system),
            value_text(change.value, metric, system),
            BASES[change.basis],
        )
        for name, change in zip(names(each), each.changes, strict=True)
    )
    letter = numbers.symbol(metric)
    heads = ("change", "what", "drawn", "needed", "layer R", letter, "reaches")
    return Grid(heads, rows, (2, 3, 4, 5), (1, 6))


def _costs(project: Project, each: Advice) -> list[Block]:
    texts = [
        f"{name} {numbers.fixed(change.cost, 2)} {project.options.currency}".rstrip()
        for name, change in zip(names(each), each.changes, strict=True)
        if change.cost is not None
    ]
    if not texts:
        return []
    return [Paragraph(clean(f"Cost beyond the drawn size, all its elements: {'; '.join(texts)}."))]


def _resistance(value: float | None, system: str) -> str:
    if value is None:
        return "-"
    return numbers.fixed(numbers.in_system(value, "resistance", system), 2)


def value_text(value: float, metric: str, system: str) -> str:
    """A value of a metric, SI, in the units of the page and without them."""
    shown = numbers.in_system(value, numbers.quantity(metric), system)
    return numbers.fixed(shown, numbers.decimals(metric, system))


def figure(value: float, quantity: str, system: str, up: bool) -> str:
    """A number with its unit, to five digits, never short of what is needed."""
    shown = numbers.in_system(value, quantity, system)
    if quantity == "share":
        return f"{respell.number(100.0 * value, up)} %"
    return f"{respell.number(shown, up)} {units.label(quantity, system)}".rstrip()


def _added(each: Advice, system: str) -> list[str]:
    if each.added is None or each.added <= 0.0:
        return []
    shown = numbers.fixed(numbers.in_system(each.added, "resistance", system), 2)
    unit = units.label("resistance", system)
    return [f"insulation added to what is drawn, crossed by nothing, would take R {shown} {unit}"]


def _refused(refused: Refused, metric: str, system: str) -> str:
    if refused.why == "stated":
        return clean(
            f"{refused.what}: a figure that the product states; only another product helps"
        )
    what = f"{refused.what}, {LEVERS[refused.lever]}"
    if refused.best is None:
        return clean(f"{what}: {NO_VALUE}")
    best = f"{numbers.symbol(metric)} {value_text(refused.best, metric, system)}"
    return clean(f"{what}: not by this alone; at its best {best} {numbers.unit(metric, system)}")


def _structural(found: Structural, system: str) -> str:
    now = figure(found.now, found.quantity, system, True)
    most = figure(found.most, found.quantity, system, found.lever == "spacing")
    word = "from" if found.most > found.now and found.lever == "spacing" else "up to"
    return clean(f"{found.what}, {LEVERS[found.lever]}: {now} drawn; thermally, {word} {most}")


def _data(each: Advice) -> dict[str, object]:
    return {
        "assembly": each.assembly,
        "lines": [
            {"rule_set": x.ruleset, "element": x.element, "metric": x.metric, "verdict": x.verdict}
            for x in each.lines
        ],
        "dominant": [{"layer": title, "share": share} for title, share in each.dominant],
        "changes": [
            {"name": name, **_change(change)}
            for name, change in zip(names(each), each.changes, strict=True)
        ],
        "refused": [refused._asdict() for refused in each.refused],
        "structural": [found._asdict() for found in each.structural],
        "added": each.added,
    }


def _change(change: Change) -> dict[str, object]:
    verdicts = [
        {"rule_set": rule_set, "element": element, "verdict": verdict}
        for rule_set, element, verdict in change.verdicts
    ]
    edits = [edit._asdict() for edit in change.edits]
    return {**change._asdict(), "edits": edits, "verdicts": verdicts}
