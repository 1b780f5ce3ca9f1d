"""One element or assembly from drawing to verdict, every number repeatable by hand."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping
from typing import TYPE_CHECKING, NamedTuple

from envcheck.model.judged import Judged, Line
from envcheck.model.patterns import in_words
from envcheck.model.project import Assembly, Element, Fact, Project
from envcheck.model.ruleset import RuleSet
from envcheck.model.solved import Reasons, Solved
from envcheck.report import (
    assembly_page,
    comparison,
    details,
    header,
    junction,
    numbers,
    reasons,
    rows,
    said,
    tree,
    wording,
    workings,
    workmanship,
)
from envcheck.report import worksheet as sheet
from envcheck.report.answer import Answer
from envcheck.report.inert import clean
from envcheck.report.parts import Block, Entry, Facts, Grid, Items, Page, Pair, Paragraph, Section
from envcheck.report.rows import path_row
from envcheck.report.view import ViewOptions, system_for

if TYPE_CHECKING:
    from envcheck.model.details import Coldest, Extras
    from envcheck.model.sure import Workmanship


class AssemblyExplained(NamedTuple):
    """The numbers behind one solved assembly; those without a unit of their own are SI."""

    assembly: str
    metric: str
    method: str
    value: float | None
    low: float | None
    high: float | None
    missing: tuple[str, ...]
    worksheet: tuple[sheet.Line, ...]
    reasons: Reasons | None
    """Of the value by the prescribed method."""
    drawn: Reasons | None
    """Of the drawn section."""
    coldest: Coldest | None
    """Of its inside surface."""
    workmanship: tuple[Workmanship, ...]
    """What voids and compression would leave of its cavity insulation."""


Why = Callable[[Solved], Reasons | None]


def _unknown(solved: Solved) -> Reasons | None:
    return None


def subjects(project: Project) -> tuple[str, ...]:
    """Every tag, assembly and detail that can be explained."""
    return (*project.elements, *project.assemblies, *project.details)


def build(
    project: Project,
    rulesets: Mapping[str, RuleSet],
    judged: Judged,
    subject: str,
    options: ViewOptions | None = None,
    why: Why = _unknown,
    extras: Extras | None = None,
) -> Answer:
    """Explain the element or else the assembly or the detail of that name.

    why: gives the reasons behind a solved value. extras: surface temperatures and details solved
    for the page. Errors: KeyError for a name that is none of them.
    """
    options = options or ViewOptions()
    system = system_for(project, rulesets, options)
    if subject in project.elements:
        lines = [line for line in judged.lines if line.element == subject]
        sections = _element(project, project.elements[subject], lines, system)
    elif subject in project.assemblies or extras is None:
        assembly = project.assemblies[subject]
        lines = [line for line in judged.lines if line.solved and line.solved.assembly == subject]
        sections = [_drawn_assembly(assembly, lines)]
    else:
        lines, detail = [], project.details[subject]
        sections = junction.sections(detail, extras.details[subject], project.site, system)
    behind = []
    of_detail = extras.details.get(subject) if extras else None
    for solved in _distinct(lines):
        found = why(solved)
        sections += _solved(project, solved, lines, system, found)
        coldest = extras.surfaces.get((solved.assembly, solved.setting)) if extras else None
        dial = extras.workmanship.get((solved.assembly, solved.setting), ()) if extras else ()
        behind.append(_numbers(solved, system, found, coldest, dial))
        if coldest is not None:
            sections.append(junction.surface(coldest, project.site, system))
        sections += workmanship.sections(dial, system)
    for line in lines:
        sections += _held(line, rulesets, system)
    sections.append(Section("", (Paragraph(wording.DEFERRAL),)))
    heading = f"{header.title(project)}: {clean(subject)}"
    page = Page(heading, tuple(sections))
    solved_detail = None if isinstance(of_detail, str) else of_detail
    data: dict[str, object] = {
        "subject": clean(subject),
        "units": system,
        "assemblies": tuple(behind),
        "detail": solved_detail,
    }
    return Answer(page, data, _table(behind))


def _table(behind: Iterable[AssemblyExplained]) -> Grid:
    """Every step of every worksheet, a row each."""
    rows = tuple(
        (each.assembly, each.metric, line.symbol, line.title, line.formula, line.sum, line.result,
         line.unit, line.source)
        for each in behind
        for line in each.worksheet
    )  # fmt: skip
    heads = ("assembly", "metric", "symbol", "step", "formula", "sum", "result", "unit", "source")
    return Grid(heads, rows)


def _numbers(
    solved: Solved,
    system: str,
    found: Reasons | None,
    coldest: Coldest | str | None,
    dial: tuple[Workmanship, ...],
) -> AssemblyExplained:
    return AssemblyExplained(
        solved.assembly,
        solved.setting.metric,
        solved.setting.method,
        solved.value,
        solved.low,
        solved.high,
        solved.missing,
        sheet.write(solved.steps, system),
        found,
        solved.drawn,
        None if isinstance(coldest, str) else coldest,
        dial,
    )


def _distinct(lines: Iterable[Line]) -> list[Solved]:
    """The solved assemblies of the lines, each once."""
    found = {id(line.solved): line.solved for line in lines if line.solved is not None}
    return list(found.values())


def _element(project: Project, element: Element, lines: list[Line], system: str) -> list[Section]:
    assembly = project.assemblies.get(element.assembly)
    amount = rows.amount(element, system)
    pairs = [
        ("sheet", element.sheet),
        ("surface", element.surface),
        ("assembly", f"{assembly.id}: {assembly.title}" if assembly else element.assembly),
        ("category", _category(element, lines)),
        ("amount", f"{amount.text} {amount.unit}".strip()),
        ("adjoins", wording.plain(element.adjoins)),
        ("facing", element.facing),
        ("tilt", f"{element.tilt:g} degrees"),
        ("measured", element.measured),
        ("note", element.note),
        *((fact.name, _fact(fact)) for fact in element.facts),
    ]
    made = [Section("As drawn", (Facts(_pairs(pairs)),))]
    if not lines:
        made.append(Section("", (Paragraph("No line was judged for this element."),)))
    return made


def _fact(fact: Fact) -> str:
    value = ("no", "yes")[fact.value] if isinstance(fact.value, bool) else fact.value
    return f"{value} ({fact.sheet})" if fact.sheet else str(value)


def _category(element: Element, lines: Iterable[Line]) -> str:
    judged = dict.fromkeys(
        in_words(line.category) for line in lines if line.category != element.category
    )
    moved = f"; judged as {', '.join(judged)}" if judged else ""
    return in_words(element.category) + moved


def _pairs(pairs: Iterable[tuple[str, str]]) -> tuple[Pair, ...]:
    return tuple(Pair(clean(label), clean(text)) for label, text in pairs if text)


def _drawn_assembly(assembly: Assembly, lines: list[Line]) -> Section:
    pairs = _pairs((("sheet", assembly.sheet), ("title", assembly.title)))
    blocks: list[Block] = [Facts(pairs)]
    if not lines:
        blocks.append(
            Paragraph("No element that was judged uses this assembly; nothing is solved.")
        )
    return Section("As drawn", tuple(blocks))


def _solved(
    project: Project, solved: Solved, lines: list[Line], system: str, found: Reasons | None
) -> list[Section]:
    """Layers, reasons, worksheet, paths and temperatures of one solved assembly."""
    assembly = project.assemblies[solved.assembly]
    tags = dict.fromkeys(line.element for line in lines if line.solved is solved)
    view = details.assembly_view(assembly, solved, tags, system)
    made = [Section(f"Assembly {view.assembly}, {view.metric}", assembly_page.blocks(view))]
    made += _reasons(assembly, solved, view.method, system, found)
    if solved.steps:
        steps = workings.steps(sheet.write(solved.steps, system))
        made.append(Section("Worksheet", (Paragraph(workings.HOW), steps)))
    made += _temperatures(project, solved, system)
    return made


def _reasons(
    assembly: Assembly, solved: Solved, method: str, system: str, found: Reasons | None
) -> list[Section]:
    """Why the value is what it is, and why that of the drawn section is."""
    made = []
    u_factor = solved.value if solved.setting.metric == "U_assembly" else None
    added = 1.0 - solved.clear / solved.value if solved.clear and solved.value else 0.0
    if found is not None:
        parts = reasons.blocks(assembly, found, u_factor, system, solved.counted, added)
        made.append(Section(f"Why it is what it is, by {method}", parts))
    if solved.drawn is not None:
        heading = "Why it is what it is, in the drawn section"
        ends = (solved.low or 0.0) + (solved.high or 0.0) - 2.0 * solved.added
        parts = reasons.blocks(assembly, solved.drawn, ends / 2.0, system)
        made.append(Section(heading, parts))
    return [section for section in made if section.blocks]


def _temperatures(project: Project, solved: Solved, system: str) -> list[Section]:
    site = project.site
    if site.indoor_temperature is None or site.outdoor_temperature is None or solved.tree is None:
        return []
    if solved.setting.metric != "U_assembly":
        return []
    air = (site.outdoor_temperature, site.indoor_temperature)
    drawn = solved.drawn if solved.decided_by_bracket else None
    if drawn is not None:
        grids = [tree.face_temperatures(drawn.faces, *air, system)]
    else:
        grids = tree.temperatures(solved.tree, *air, system)
    outdoor, indoor = (numbers.temperature(value, system) for value in air)
    text = f"Steady, for outdoor air at {outdoor} and indoor air at {indoor}."
    if drawn is not None:
        text += " Of the drawn section; unlike its U-factor they are not bounded."
    return [Section("Temperatures at the interfaces", (Paragraph(text), *grids))]


def _held(line: Line, rulesets: Mapping[str, RuleSet], system: str) -> list[Section]:
    """Why this limit, the comparison, the verdict."""
    metric = wording.METRICS.get(line.metric, wording.plain(line.metric))
    heading = f"{clean(line.element)} held against {clean(line.ruleset)}: {metric}"
    trail = [said.choice(*step) for step in line.trail]
    source = said.limit_source(line.limit, line.ruleset)
    pairs = [*trail, ("limit", f"{said.limit_text(line)} [{source}]" if source else "")]
    blocks: list[Block] = [Facts(_pairs(pairs))] if any(text for _, text in pairs) else []
    sums = comparison.sums(line, rulesets.get(line.ruleset), system)
    if sums:
        blocks.append(Items((Entry("Comparison in the printed unit", (), sums),)))
    if line.low is not None and line.high is not None:
        ends = tuple(comparison.end(*pair) for pair in (("low", line.low), ("high", line.high)))
        blocks.append(Items((Entry("Bounds of the drawn model, compared likewise", (), ends),)))
    if line.paths:
        blocks.append(_paths(line))
    reasons = (*map(clean, line.reasons), *said.notes(line))
    blocks.append(Items((Entry(f"Verdict: {said.verdict_text(line)}", reasons),)))
    return [Section(heading, tuple(blocks))]


def _paths(line: Line) -> Grid:
    cells = tuple(path_row(each, line.metric) for each in line.paths)
    return Grid(("path", "state", "value", "limit", "why"), cells, (), (4, 2, 3))
