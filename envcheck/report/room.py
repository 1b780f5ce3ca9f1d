"""The page of ``envcheck room``: how far the numbers of an assembly may move."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence

from envcheck.model.project import Project
from envcheck.model.ruleset import RuleSet
from envcheck.model.sure import Bound, Room, Stuck
from envcheck.report import header, numbers, wording
from envcheck.report.advice import LEVERS, figure, value_text
from envcheck.report.answer import Answer
from envcheck.report.inert import clean
from envcheck.report.parts import Block, Entry, Grid, Items, Page, Paragraph, Section
from envcheck.report.view import ViewOptions, system_for

STRUCTURAL = {"spacing", "density", "psi", "chi"}
LEAD = (
    "How far each number may move by itself while the lines stay within their limit, by the "
    "prescribed method and the code's rounding. Spacing, fasteners, psi and chi thermally only: "
    "structure decides them. Nothing here is a proposal."
)
NONE = "No line asked for has a verdict."
STATES = {
    "bound": "",
    "table": "the last row of the table that passes",
    "any": "passes up to there, the farthest looked at",
    "other_path": "beyond it the R-value path still carries the line",
}
ENDLESS = {
    "thickness": "however thick",
    "taper": "however thick",
    "label": "whatever its label",
    "resistance": "whatever its R",
    "conductivity": "however little it conducts",
}


def build(
    project: Project,
    rulesets: Mapping[str, RuleSet],
    rooms: Sequence[Room],
    options: ViewOptions,
) -> Answer:
    """Write the bounds as a page and as data."""
    system = system_for(project, rulesets, options)
    sections = [made for each in rooms if (made := _section(project, each, system)).blocks]
    stated = _stated(rooms)
    lead = Section("", (Paragraph(LEAD if rooms else NONE), *stated))
    page = Page(
        f"{header.title(project)}: room",
        (lead, *sections, Section("", (Paragraph(wording.DEFERRAL),))),
    )
    data: dict[str, object] = {"units": "SI", "rooms": [_data(each) for each in rooms]}
    return Answer(page, data, _flat(rooms))


def _stated(rooms: Iterable[Room]) -> list[Block]:
    """Lines that have no bounds, those of one reason together."""
    by_why: dict[str, list[str]] = {}
    for each in rooms:
        for tag, metric, why in each.skipped:
            by_why.setdefault(why, []).append(f"{tag} ({numbers.symbol(metric)})")
    items = tuple(Entry(clean(f"{', '.join(names)}: {why}")) for why, names in by_why.items())
    return [Items(items)] if items else []


def _section(project: Project, each: Room, system: str) -> Section:
    assembly = project.assemblies[each.assembly]
    blocks: list[Block] = []
    if each.bounds:
        rows = tuple(_row(bound, system) for bound in each.bounds)
        blocks.append(Grid(("what", "drawn", "still passes", "first over"), rows, (1, 2), (0,)))
        notes = [note for bound in each.bounds if (note := _note(bound))]
        blocks += [Items(tuple(map(Entry, notes)))] if notes else []
    elif each.lines:
        tags = ", ".join(dict.fromkeys(line.element for line in each.lines))
        blocks.append(
            Paragraph(clean(f"{tags}: no number of it has another value by this method."))
        )
    metric = (each.lines or (None,))[0]
    name = metric.metric if metric is not None else "U_assembly"
    stuck = [Entry(_stuck(found, name, system)) for found in each.stuck]
    if stuck:
        blocks += [Paragraph("Not to be cured by insulation alone:"), Items(tuple(stuck))]
    return Section(f"{clean(assembly.id)}: {clean(assembly.title)}", tuple(blocks))


def _row(bound: Bound, system: str) -> tuple[str, ...]:
    most = figure(bound.most, bound.quantity, system, not bound.grows)
    return (
        _what(bound),
        figure(bound.now, bound.quantity, system, True),
        f"{'up to' if bound.grows else 'down to'} {most}",
        clean(bound.tag),
    )


def _what(bound: Bound) -> str:
    return clean(f"{bound.what}: {LEVERS[bound.lever]}")


def _note(bound: Bound) -> str:
    """What else is to be said of a bound; empty where nothing."""
    thermally = "thermally only" if bound.lever in STRUCTURAL else ""
    parts = [part for part in (thermally, STATES[bound.state]) if part]
    return f"{_what(bound)}: {'; '.join(parts)}" if parts else ""


def _stuck(found: Stuck, metric: str, system: str) -> str:
    letter, unit = numbers.symbol(metric), numbers.unit(metric, system)
    value, limit = (value_text(x, metric, system) for x in (found.value, found.limit))
    text = (
        f"{found.tag}: {found.what}, {ENDLESS[found.lever]}: {letter} stays above {value} {unit} "
        f"against {limit}"
    )
    if found.holds:
        text += f"; {numbers.percent(found.share)} of the heat then flows through {found.holds}"
    else:
        text += "; it counts nothing in the value"
    return clean(text)


def _data(each: Room) -> dict[str, object]:
    return {
        "assembly": each.assembly,
        "lines": [
            {"rule_set": x.ruleset, "element": x.element, "metric": x.metric} for x in each.lines
        ],
        "bounds": [
            {**bound._asdict(), "edits": [edit._asdict() for edit in bound.edits]}
            for bound in each.bounds
        ],
        "skipped": [
            {"element": tag, "metric": metric, "why": why} for tag, metric, why in each.skipped
        ],
        "stuck": [found._asdict() for found in each.stuck],
    }


def _flat(rooms: Sequence[Room]) -> Grid:
    """A row for each bound, numbers in SI."""
    heads = (
        "assembly",
        "lever",
        "what",
        "drawn",
        "still passes",
        "quantity",
        "first over",
        "state",
    )
    rows = tuple(
        (
            clean(each.assembly), bound.lever, clean(bound.what), repr(bound.now), repr(bound.most),
            bound.quantity, clean(bound.tag), bound.state,
        )
        for each in rooms
        for bound in each.bounds
    )  # fmt: skip
    return Grid(heads, rows, (3, 4))
