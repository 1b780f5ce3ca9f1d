"""Marks that a drawing shows and the file does not hold, and what they would change."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence

from envcheck.judge.building import area_weighted_mean
from envcheck.judge.compare import compare, own_term, rounded
from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.crosschecks.surfaces import surface_of
from envcheck.judge.readings import plain_resistance
from envcheck.judge.words import area, system, thermal
from envcheck.model.judged import CERTAIN, Finding, Line
from envcheck.model.project import Assembly, Element, Opening, Surface


def drawn_not_entered(facts: Facts) -> Iterator[Finding]:
    """Hold the marks of each surface against the elements entered on it."""
    project = facts.project
    on: dict[str, list[Element]] = {}
    for element in project.elements.values():
        on.setdefault(surface_of(element, project), []).append(element)
    lacks = {closing.surface: closing.missing for closing in facts.closings}
    for surface in project.surfaces.values():
        elements = on.get(surface.name, [])
        if not elements:
            continue
        open_marks = [
            (mark, entered)
            for mark in surface.shows
            for entered in [_entered(mark, elements)]
            if entered is not None and abs(entered - mark.count) > 1e-9
        ]
        for mark, entered in open_marks:
            lacking = lacks.get(surface.name, 0.0) if len(open_marks) == 1 else 0.0
            yield _finding(facts, surface, mark, entered, lacking)


def _entered(mark: Opening, elements: Sequence[Element]) -> float | None:
    """How many of a mark are entered; None where an element of it states no count."""
    found = [e for e in elements if mark.tag in (e.tag, e.assembly)]
    if any(element.count is None for element in found):
        return None
    return sum(element.count or 0.0 for element in found)


def _finding(
    facts: Facts, surface: Surface, mark: Opening, entered: float, lacking: float
) -> Finding:
    sheet = surface.sheet
    seen = f"{mark.tag}: shown {mark.count:g}{' on ' + sheet if sheet else ''}, "
    seen += f"entered {entered:g}" if entered else "no element entered"
    left_out = mark.count - entered
    suggests = "the element is left out" if not entered else "the count or the drawing is wrong"
    size, whence = _size(mark, left_out, lacking if not entered else 0.0)
    if size > 0:
        units = system(facts.project, facts.rulesets)
        suggests += f", {area(size, units)}{whence.format(surface=surface.name)}"
        effect = _effect(facts, surface, mark, size)
        suggests += f"; {effect}" if effect else ""
    return Finding(
        "drawn-not-entered",
        "E",
        f"{surface.name} {mark.tag}",
        sheet,
        seen,
        suggests,
        f"an element for {mark.tag}, or the count that the drawing shows",
    )


def _size(mark: Opening, left_out: float, lacking: float) -> tuple[float, str]:
    """Area left out, m2, and where it comes from; 0 where nobody can tell."""
    if mark.area is not None:
        return mark.area * left_out / mark.count, " by the drawing"
    if left_out > 0 and lacking > 1e-6:
        return lacking, " if it is what {surface} lacks"
    return 0.0, ""


def _effect(facts: Facts, surface: Surface, mark: Opening, size: float) -> str:
    """What the area-weighted mean with the mark's area would be, against the limit."""
    assembly = facts.project.assemblies.get(mark.tag)
    field = _field(facts, surface, mark, assembly) if assembly is not None else None
    if assembly is None or field is None:
        return ""
    own, element = field.solved, facts.project.elements[field.element]
    value = _u_factor(facts, assembly, field)
    if value is None or own is None or own.value is None or field.limit is None:
        return ""
    mean = area_weighted_mean([element.net_area or 0.0, size], [own.value, value])
    term = own_term(field.limit)
    ruleset = facts.rulesets[field.ruleset]
    together = compare(mean, term, field.limit, ruleset)
    alone = compare(own.value, term, field.limit, ruleset)
    digits = together.decimals + 1
    state = "within" if together.within else "over"
    joint = "although" if alone.within and not together.within else "and"
    return (
        f"with it the mean of {element.tag} is {rounded(together.value, digits)}, {state} "
        f"{term.text}, {joint} {element.tag} alone is {rounded(alone.value, digits)}"
    )


def _field(facts: Facts, surface: Surface, mark: Opening, assembly: Assembly) -> Line | None:
    """The one line on the surface that the mark would be averaged with.

    That of the element which the drawing cuts it from; else the only one under the same row of the
    table, on the same sheet of details, or at all.
    """
    elements, assemblies = facts.project.elements, facts.project.assemblies
    found = [
        line
        for line in facts.lines
        if thermal(line)
        and line.element in elements
        and elements[line.element].surface == surface.name
        and elements[line.element].net_area
        and _can_be_averaged(line)
    ]
    if mark.host:
        return next((line for line in found if line.element == mark.host), None)
    rows = _rows_of(assembly.id, facts.lines, {tag: e.assembly for tag, e in elements.items()})
    same = [line for line in found if line.limit is not None and line.limit.row in rows]
    if not same:
        stem = assembly.sheet.partition("/")[0]
        same = [
            line
            for line in found
            if stem and assemblies[elements[line.element].assembly].sheet.partition("/")[0] == stem
        ]
    return (same or found)[0] if len(same or found) == 1 else None


def _can_be_averaged(line: Line) -> bool:
    limit, solved = line.limit, line.solved
    return (
        line.metric == "U_assembly"
        and limit is not None
        and limit.kind == "number"
        and limit.metric == "U_assembly"
        and solved is not None
        and solved.value is not None
    )


def _rows_of(assembly: str, lines: Sequence[Line], assembly_of: Mapping[str, str]) -> set[str]:
    """Rows of the table under which the assembly is judged elsewhere."""
    return {
        line.limit.row
        for line in lines
        if line.limit is not None and assembly_of.get(line.element) == assembly
    }


def _u_factor(facts: Facts, assembly: Assembly, field: Line) -> float | None:
    """U of the mark between the films of the field beside it, W/(m2 K)."""
    values = [plain_resistance(layer) for layer in assembly.layers]
    if assembly.layers and None not in values and field.solved is not None:
        setting = field.solved.setting
        total = sum(value or 0.0 for value in values)
        total += setting.outside_film + setting.inside_film
        return 1.0 / total if total > 0 else None
    solved = facts.solved.get(assembly.id)
    return None if solved is None else solved.value


CHECKS = (
    Check("drawn-not-entered", "Mark on the drawing without element", drawn_not_entered, CERTAIN),
)
