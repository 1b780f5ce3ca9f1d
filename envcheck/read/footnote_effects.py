"""What footnotes do to the cells that carry them: one function for each kind of effect."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from decimal import Decimal

from envcheck.errors import Problem, one_of, problem
from envcheck.model.metrics import METRICS
from envcheck.model.patterns import matches
from envcheck.model.ruleset import Note, Term
from envcheck.read.cells import Cell, CellError, read_cell
from envcheck.read.condition_text import complement
from envcheck.read.footnotes import (
    NOT_HERE,
    Conditions,
    Footnote,
    Place,
    Reading,
    for_official,
    join,
    line_of,
)
from envcheck.read.table_entry import Table
from envcheck.read.table_meaning import listed_categories


def apply(
    footnote: Footnote, readings: list[Reading], place: Place, table: Table, problems: list[Problem]
) -> list[Reading]:
    """Give the readings of a cell with a footnote done to them."""
    stated = footnote.stated
    if not _concerns(footnote, place, table):
        return readings
    effect = str(stated["effect"])
    if footnote.steps:
        return _exchange(footnote, readings, place, problems, table)
    found: list[Reading] = []
    for reading in readings:
        for conditions in footnote.holding:
            when = join(reading.when, conditions)
            if when is not None:
                held = reading._replace(when=when)
                found.append(_done(effect, footnote, held, place, table, problems))
        unmet = effect == "require" and not for_official(stated)
        did = "what it requires is not met" if unmet else NOT_HERE
        note = Note(footnote.mark, effect, footnote.text, unmet, did)
        for conditions in footnote.others:
            when = join(reading.when, conditions)
            if when is not None:
                found.append(reading._replace(when=when, notes=(*reading.notes, note)))
    return found


def _concerns(footnote: Footnote, place: Place, table: Table) -> bool:
    """Whether a footnote of several cells concerns this one."""
    stated = footnote.stated
    metric = stated.get("metric") if stated["effect"] != "convert" else None
    if metric is not None and metric != place.grammar.metric:
        return False
    zones = stated.get("zones") or list(stated.get("by_zone") or ())
    if zones and place.zone not in zones:
        return False
    only = stated.get("only_for_cell")
    if only is not None and str(only) != place.printed:
        return False
    if stated.get("element"):
        wanted = listed_categories(table, stated["element"])
        return any(matches(w, c) or matches(c, w) for w in wanted for c in place.categories)
    return True


def _done(
    effect: str,
    footnote: Footnote,
    reading: Reading,
    place: Place,
    table: Table,
    problems: list[Problem],
) -> Reading:
    """One reading with the effect where it holds."""
    note = Note(footnote.mark, effect, footnote.text, False)
    if for_official(footnote.stated):
        return reading._replace(notes=(*reading.notes, note._replace(by_official=True)))
    act = _EFFECTS.get(effect)
    changed = act(footnote, reading, place, table, problems) if act is not None else None
    if changed is None:
        return reading._replace(notes=(*reading.notes, note))
    new, did = changed
    return new._replace(notes=(*reading.notes, note._replace(did=did)))


Changed = tuple[Reading, str] | None
Act = Callable[[Footnote, Reading, Place, Table, "list[Problem]"], Changed]


def _cell(
    footnote: Footnote, place: Place, text: str, table: Table, problems: list[Problem]
) -> Cell | None:
    """Read the figure that a footnote gives, as a cell of its place."""
    plus = tuple(map(str, footnote.stated.get("plus") or ())) or place.grammar.plus
    grammar = place.grammar._replace(plus=plus, slash="", slash_roles=())
    try:
        return read_cell(text, grammar)
    except CellError as error:
        fill = {"where": f"footnote [{footnote.mark}]", "expected": error.expected}
        line = line_of(table, footnote.mark)
        p = problem(error.kind, table.document.name, line, found=text, fix=error.fix, **fill)
        if p not in problems:
            problems.append(p)
        return None


def _figure(footnote: Footnote, place: Place, table: Table, problems: list[Problem]) -> Cell | None:
    by_zone = footnote.stated.get("by_zone") or {}
    return _cell(
        footnote, place, str(by_zone.get(place.zone, footnote.stated.get("cell"))), table, problems
    )


def _replace(f: Footnote, r: Reading, p: Place, t: Table, problems: list[Problem]) -> Changed:
    cell = _figure(f, p, t, problems)
    if cell is None:
        return None
    branch = cell.branches[0]
    new = r._replace(cell=cell.text, kind=branch.kind, alternatives=branch.alternatives)
    return new, f"{cell.text} instead of {r.cell}"


def _exempt(f: Footnote, r: Reading, p: Place, t: Table, problems: list[Problem]) -> Changed:
    new = r._replace(cell=f"NR [{f.mark}]", kind="no_requirement", alternatives=())
    return new, f"no requirement instead of {r.cell}"


def _alternative(f: Footnote, r: Reading, p: Place, t: Table, problems: list[Problem]) -> Changed:
    cell = _figure(f, p, t, problems) if r.kind == "number" else None
    if cell is None:
        return None
    new = r._replace(
        cell=f"{r.cell} or {cell.text}",
        alternatives=(*r.alternatives, *cell.branches[0].alternatives),
    )
    return new, f"{cell.text} also meets it"


def _arithmetic(
    f: Footnote, r: Reading, problems: list[Problem], table: Table, key: str, sign: str
) -> Changed:
    """Add to, or multiply, the figures of the row's own metric."""
    if r.kind != "number":
        return None
    typed = str(f.stated[key]).replace(",", ".")
    try:
        by = Decimal(typed)
    except ArithmeticError:
        by = Decimal("NaN")
    if not by.is_finite():
        line = line_of(table, f.mark)
        fill = {"found": typed, "expected": f"{key}: one number"}
        problems.append(problem("unreadable-figure", table.document.name, line, **fill))
        return None
    role = str(f.stated.get("to", ""))

    def changed(term: Term, place: int) -> Term:
        if term.metric or term.band or (role and term.role != role) or (sign == "+" and place):
            return term
        value = Decimal(term.text) + by if sign == "+" else Decimal(term.text) * by
        text = f"{value:f}"
        return term._replace(number=float(text), text=text)

    new = tuple(
        tuple(changed(term, 0 if role else i) for i, term in enumerate(alternative))
        for alternative in r.alternatives
    )
    figures = " or ".join(" + ".join(term.text for term in a) for a in new)
    words = f"{figures} ({r.cell} {'x' if sign == '*' else '+'} {typed})"
    return r._replace(cell=words, alternatives=new), words


def _add(f: Footnote, r: Reading, p: Place, t: Table, problems: list[Problem]) -> Changed:
    return _arithmetic(f, r, problems, t, "add", "+")


def _scale(f: Footnote, r: Reading, p: Place, t: Table, problems: list[Problem]) -> Changed:
    return _arithmetic(f, r, problems, t, "factor", "*")


def _convert(f: Footnote, r: Reading, p: Place, t: Table, problems: list[Problem]) -> Changed:
    """Hold the figure as one of another metric: the one given, or one over the printed one."""
    name = str(f.stated["metric"])
    metric, line = METRICS.get(name), line_of(t, f.mark)
    if metric is None or (metric.key and metric.key not in t.units):
        known = [n for n, m in METRICS.items() if not m.key or m.key in t.units]
        fill = {"found": name, "expected": one_of(known), "where": f"footnote [{f.mark}]"}
        problems.append(problem("unknown-metric", t.document.name, line, **fill))
        return None
    if r.kind != "number":
        return None
    unit = t.units.get(metric.key, "")
    new = r._replace(metric=name, sense=metric.sense, unit=unit)
    if f.stated.get("cell") is not None:
        grammar = p.grammar._replace(metric=name, sense=metric.sense, plus=(), slash="")
        cell = _cell(f, p._replace(grammar=grammar), str(f.stated["cell"]), t, problems)
        if cell is None:
            return None
        alternatives = cell.branches[0].alternatives
        return new._replace(cell=cell.text, alternatives=alternatives), f"{name} {cell.text}"
    own = r.alternatives[0][0]
    if not own.number:
        return None
    text = f"{1 / Decimal(own.text):.4g}"
    term = Term(float(text), text)
    words = f"{text} (1 / {r.cell})"
    return new._replace(cell=words, alternatives=((term,),)), f"{name} {words}"


def _exchange(
    f: Footnote, readings: list[Reading], place: Place, problems: list[Problem], table: Table
) -> list[Reading]:
    """Another figure for each interval of a dimension; beyond them, the printed one."""
    found: list[Reading] = []
    rest: list[Conditions] = [()]
    for conditions, text in f.steps:
        cell = _cell(f, place, text, table, problems)
        if cell is None:
            return readings
        branch, note = cell.branches[0], Note(f.mark, "exchange", f.text, False)
        for r in readings:
            when = join(r.when, conditions)
            if when is not None:
                own = note._replace(did=f"{cell.text} instead of {r.cell}")
                found.append(
                    r._replace(
                        cell=cell.text,
                        kind=branch.kind,
                        alternatives=branch.alternatives,
                        when=when,
                        notes=(*r.notes, own),
                    )
                )
        without = [(c,) for x in conditions for c in complement(x, table.dimensions[x.dimension])]
        rest = [j for a in rest for b in without if (j := join(a, b)) is not None]
    for r in readings:
        own = Note(f.mark, "exchange", f.text, False, NOT_HERE)
        found += [
            r._replace(when=when, notes=(*r.notes, own))
            for conditions in rest
            if (when := join(r.when, conditions)) is not None
        ]
    return found


_EFFECTS: Mapping[str, Act] = {
    "replace": _replace,
    "exempt": _exempt,
    "alternative": _alternative,
    "add": _add,
    "scale": _scale,
    "convert": _convert,
}
"""What changes a reading; ``require``, ``define`` and ``info`` leave the figure as printed."""
