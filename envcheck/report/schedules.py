"""Lists that a plan reviewer ticks off: corrections to answer, openings, ground, bridges, areas."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from typing import NamedTuple

from envcheck import units
from envcheck.model.judged import Finding, Judged, Line
from envcheck.model.layers import Bridge
from envcheck.model.patterns import in_words
from envcheck.model.project import Assembly, Element, Project, Slab
from envcheck.report import numbers, said, wording
from envcheck.report.by_line import place
from envcheck.report.inert import clean
from envcheck.report.parts import Grid
from envcheck.report.rows import Row, amount


class Schedule(NamedTuple):
    """One list, with a heading and a table of texts."""

    heading: str
    grid: Grid


OPENINGS = ("fenestration.", "door.")
GROUND = ("slab.", "wall.below_grade")


def build(
    project: Project, rows: Sequence[Row], judged: Judged, system: str
) -> tuple[Schedule, ...]:
    """Every list that has an entry; of the rule sets only those that decide."""
    deciding = [row for row in rows if row.decides]
    made = (
        corrections(project, judged),
        _openings(project, deciding),
        _ground(project, deciding, system),
        _bridges(project, system),
        _not_counted(project, system),
        _areas(project, deciding, system),
    )
    return tuple(each for each in made if each.grid.rows)


# -------------------------------------------------------------------------------- corrections


def corrections(project: Project, judged: Judged) -> Schedule:
    """What the drawings or papers must show before the lines are settled, each with room for an
    answer."""
    found: dict[tuple[str, str], dict[str, None]] = {}
    for line in judged.lines:
        if line.decides and (line.open or line.verdict == "fail"):
            found.setdefault((_to_show(line), _clause(line)), {})[_place(project, line)] = None
    for finding in judged.findings:
        if finding.unsettled and finding.settles:
            who = place(finding.subject, finding.sheet)
            found.setdefault((_settled_by(finding), ""), {})[who] = None
    rows = tuple(
        (str(number), clean(wording.listed(list(places), 24)), what, clause, "")
        for number, ((what, clause), places) in enumerate(found.items(), 1)
    )
    heads = ("no.", "where", "what to show", "clause", "answer")
    return Schedule("Corrections asked for", Grid(heads, rows, (0,), (2, 4, 1)))


def _place(project: Project, line: Line) -> str:
    element = project.elements.get(line.element)
    return place(line.element, element.sheet if element is not None else "")


def _to_show(line: Line) -> str:
    if line.verdict != "fail" or line.comparison is None:
        reasons = [text for text in line.reasons if not text.startswith("R-value path")]
        return clean("; ".join(reasons) or wording.VERDICTS[line.verdict])
    own = line.comparison
    letter = numbers.symbol(line.metric)
    word = "at least" if own.sense == "min" else "at most"
    unit = f" {own.unit}" if own.unit else ""
    return clean(
        f"{letter} {word} {said.limit_number(own)}{unit} ({said.compared(own)} as drawn), or a "
        "path of the code by which it is met"
    )


def _settled_by(finding: Finding) -> str:
    title = finding.title or finding.check.replace("-", " ")
    return clean(f"{finding.settles} ({title[0].lower()}{title[1:]})")


def _clause(line: Line) -> str:
    return clean(line.limit.clause or line.limit.table) if line.limit is not None else ""


# ----------------------------------------------------------------------------------- openings


def _openings(project: Project, rows: Iterable[Row]) -> Schedule:
    by_tag: dict[str, list[Row]] = {}
    for row in rows:
        element = project.elements.get(row.tag)
        if element is not None and element.category.startswith(OPENINGS):
            by_tag.setdefault(row.tag, []).append(row)
    heads = ("mark", "sheet", "built as", "area", "U", "SHGC", "VT", "basis", "verdict")
    table = tuple(
        _opening(project, project.elements[tag], of_tag) for tag, of_tag in by_tag.items()
    )
    return Schedule("Openings", Grid(heads, table, (3, 4, 5, 6), (2, 7, 8)))


def _opening(project: Project, element: Element, rows: Sequence[Row]) -> tuple[str, ...]:
    first = rows[0]
    values = {row.symbol: row.value.text for row in rows}
    return (
        first.tag,
        first.sheet,
        clean(f"{first.built_as}, {element.facing}" if element.facing else first.built_as),
        f"{first.amount.text} {first.amount.unit}".strip(),
        *(values.get(symbol, "") or "-" for symbol in ("U", "SHGC", "VT")),
        _basis(project.assemblies.get(element.assembly)),
        "; ".join(dict.fromkeys(row.verdict_text for row in rows)),
    )


def _basis(assembly: Assembly | None) -> str:
    if assembly is None:
        return ""
    if assembly.rated is None:
        return "computed"
    rated = assembly.rated
    parts = (wording.plain(rated.basis), rated.evidence, rated.standard)
    return clean(", ".join(filter(None, parts)))


# ------------------------------------------------------------------------------------- ground


def _ground(project: Project, rows: Iterable[Row], system: str) -> Schedule:
    table = []
    for row in rows:
        element = project.elements.get(row.tag)
        if element is None or not element.category.startswith(GROUND):
            continue
        assembly = project.assemblies.get(element.assembly)
        slab = assembly.slab if assembly is not None else None
        table.append(
            (
                row.tag,
                row.sheet,
                row.built_as,
                f"{row.amount.text} {row.amount.unit}".strip(),
                _slab(slab, system) if slab else _depths(element, system),
                f"{row.symbol} {row.value.text or '-'}",
                row.against or "-",
                row.verdict_text,
            )
        )
    heads = ("tag", "sheet", "built as", "amount", "insulated", "value", "limit", "verdict")
    return Schedule("On and below the ground", Grid(heads, tuple(table), (5, 6), (4, 2, 7)))


def _slab(slab: Slab, system: str) -> str:
    unit = units.label("resistance", system)
    heated = {None: "heated or not: not stated", True: "heated", False: "unheated"}[slab.heated]
    if slab.insulation == "none":
        return f"no insulation along the edge; {heated}"
    parts = [f"{slab.insulation}, R {numbers.resistance(slab.resistance, system)} {unit}"]
    if slab.extent:
        parts.append(f"for {_run(slab.extent, system)}")
    covered = {None: "", True: "top edge covered", False: "top edge bare"}[slab.top_edge_covered]
    return "; ".join(filter(None, (" ".join(parts), covered, heated)))


def _depths(element: Element, system: str) -> str:
    below, insulated = element.depth_below_grade, element.insulated_depth
    return "; ".join(
        (
            f"{_run(below, system)} below grade" if below is not None else "depth not stated",
            f"insulated {_run(insulated, system)}"
            if insulated is not None
            else "insulated depth not stated",
        )
    )


def _run(value: float, system: str) -> str:
    shown = numbers.trimmed(numbers.in_system(value, "run", system), 2)
    return f"{shown} {units.label('run', system)}"


# ------------------------------------------------------------------------------------ bridges


def _bridges(project: Project, system: str) -> Schedule:
    table = [
        _bridge(assembly.id, assembly.sheet, bridge, system)
        for assembly in project.assemblies.values()
        for bridge in assembly.bridges
    ]
    table += [
        _bridge(element.tag, element.sheet, bridge, system)
        for element in project.elements.values()
        for bridge in element.bridges
    ]
    heads = ("of", "sheet", "bridge", "value", "amount", "source")
    return Schedule("Linear and point bridges that count", Grid(heads, tuple(table), (3,), (5, 2)))


def _not_counted(project: Project, system: str) -> Schedule:
    """Kinds of junctions that the building has and no bridge counts."""
    table = tuple(
        (
            clean(junction.title),
            clean(junction.sheet),
            _run(junction.length, system) if junction.length is not None else "not stated",
            clean(junction.reason) or "none is stated",
        )
        for junction in project.junctions
        if not junction.counted_as
    )
    heads = ("junction", "sheet", "length", "reason")
    return Schedule("Bridges present and not counted", Grid(heads, table, (2,), (3, 0)))


def _bridge(owner: str, sheet: str, bridge: Bridge, system: str) -> tuple[str, ...]:
    linear = bridge.kind == "line"
    quantity = "linear_transmittance" if linear else "point_transmittance"
    letter = "psi" if linear else "chi"
    words = []
    if bridge.detail is not None:
        words.append(f"{letter} of the detail {bridge.detail.id}, in the worksheet")
    elif bridge.value == bridge.value:
        value = numbers.significant(numbers.in_system(bridge.value, quantity, system), 4)
        words.append(f"{letter} {value} {units.label(quantity, system)}")
    if bridge.drawn is not None:
        words.append("drawn")
    return tuple(
        map(
            clean,
            (
                owner,
                sheet,
                bridge.title,
                "; ".join(words),
                _amount(bridge, system),
                ", ".join(filter(None, (bridge.source, bridge.evidence))) or "no source",
            ),
        )
    )


def _amount(bridge: Bridge, system: str) -> str:
    amount = bridge.amount
    if bridge.kind == "line" and not bridge.per_area:
        return _run(amount, system)
    if not bridge.per_area:
        return numbers.trimmed(amount, 2)
    quantity = "per_length" if bridge.kind == "line" else "per_area"
    per = numbers.significant(numbers.in_system(amount, quantity, system), 4)
    return f"{per} {units.label(quantity, system)}"


# -------------------------------------------------------------------------------------- areas


def _areas(project: Project, rows: Iterable[Row], system: str) -> Schedule:
    """Areas by category, as the lines were judged."""
    judged = {row.tag: row.category for row in rows}
    sums: dict[str, list[str]] = {}
    for tag, category in judged.items():
        size = amount(project.elements.get(tag), system)
        if size.text and size.unit == units.label("area", system):
            sums.setdefault(category, []).append(size.text)
    unit = units.label("area", system)
    table = tuple(
        (clean(in_words(category)), str(len(texts)), numbers.total(texts))
        for category, texts in sums.items()
    )
    heads = ("judged as", "elements", f"net area, {unit}")
    return Schedule("Areas by category", Grid(heads, table, (1, 2), (0,)))
