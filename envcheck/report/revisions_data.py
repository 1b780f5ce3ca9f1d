"""What ``envcheck compare`` says as data: objects in SI, and one table in long form."""

from __future__ import annotations

from collections.abc import Iterator
from datetime import date

from envcheck import units
from envcheck.model.compared import Compared, Difference, LineChange
from envcheck.model.judged import Line
from envcheck.model.project import Project
from envcheck.report import numbers, rows, said
from envcheck.report.differences import Words
from envcheck.report.parts import Grid

HEADS = ("of", "name", "rule set", "part", "what", "before", "now", "unit", "caused by")


def data(files: tuple[Project, Project], compared: Compared, words: Words) -> dict[str, object]:
    """The comparison as objects; numbers SI, records by their words."""
    old, new = files
    return {
        "units": "SI",
        "before": _head(old),
        "now": _head(new),
        "unchanged_lines": compared.unchanged,
        "changed": [_change(change, words) for change in compared.changed],
        "added": [_line(line) for line in compared.added],
        "dropped": [_line(line) for line in compared.dropped],
        "renamed": [{"before": a, "now": b} for a, b in compared.renamed],
        "moved": [
            {"dropped": list(m.dropped), "gained": list(m.gained), "surface": m.surface,
             "area": m.area}
            for m in compared.moved
        ],
        "findings_settled": [{"check": f.check, "subject": f.subject} for f in compared.settled],
        "findings_new": [{"check": f.check, "subject": f.subject} for f in compared.new],
        "ratios": [
            {"name": each.name, "before": a and a.value, "now": b and b.value}
            for a, b in compared.ratios
            if (each := a or b) is not None
        ],
        "differences": [_difference(each, words) for each in compared.differences],
        "same": dict(compared.same),
    }  # fmt: skip


def _head(project: Project) -> dict[str, object]:
    return {
        "file": project.file,
        "title": project.title,
        "reference": project.reference,
        "sha256": project.sha256,
        "rule_sets": [choice.id for choice in project.rule_sets],
    }


def _line(line: Line) -> dict[str, object]:
    own = line.own or line.comparison
    return {
        "rule_set": line.ruleset,
        "element": line.element,
        "metric": line.metric,
        "category": line.category,
        "value": _si(line),
        "compared": own.compared if own else None,
        "limit": own.limit if own else None,
        "printed_unit": own.unit if own else "",
        "verdict": line.verdict,
    }


def _si(line: Line) -> float | None:
    solved, own = line.solved, line.own or line.comparison
    if solved is not None and solved.setting.metric == line.metric:
        return solved.value
    return None if own is None else units.to_si(own.value, own.unit) if own.unit else own.value


def _change(change: LineChange, words: Words) -> dict[str, object]:
    return {
        "element": change.after.element,
        "aspects": list(change.aspects),
        "before": _line(change.before),
        "now": _line(change.after),
        "causes": [_difference(each, words) for each in change.causes],
    }


def _difference(each: Difference, words: Words) -> dict[str, object]:
    return {
        "of": each.kind,
        "name": each.name,
        "where": list(each.where),
        "field": each.field,
        "what": each.what,
        "before": _plain(each.before, each, words),
        "now": _plain(each.after, each, words),
        "quantity": each.quantity,
    }


def _plain(value: object, each: Difference, words: Words) -> object:
    if isinstance(value, str | int | float) or value is None:
        return value
    return value.isoformat() if isinstance(value, date) else words.value(value, each)


# ---------------------------------------------------------------------------------------- table


def table(files: tuple[Project, Project], compared: Compared, words: Words) -> Grid:
    """A row for each thing that changed: on the lines first, then in what was read."""
    found = [*_of_lines(files, compared, words)]
    for each in compared.differences:
        before, now, unit = _cells(each, words)
        name, part = words.subject(each._replace(where=())), ", ".join(each.where)
        found.append((each.kind, name, "", part, words.field(each), before, now, unit, ""))
    return Grid(HEADS, tuple(found))


def _of_lines(
    files: tuple[Project, Project], compared: Compared, words: Words
) -> Iterator[tuple[str, ...]]:
    from envcheck.report.revisions import causes

    for change in compared.changed:
        a, b = change.before, change.after
        why = "; ".join(causes(change, words))
        lead = ("line", b.element, b.ruleset, numbers.symbol(b.metric))
        for aspect in change.aspects:
            yield (*lead, aspect, *_aspect(aspect, (a, b), files, words), why)
    for what, lines in (("added", compared.added), ("dropped", compared.dropped)):
        for line in lines:
            lead = ("line", line.element, line.ruleset, numbers.symbol(line.metric))
            verdict = said.verdict_text(line)
            cells = ("", verdict) if what == "added" else (verdict, "")
            yield (*lead, what, *cells, "", "")


def _aspect(
    aspect: str, lines: tuple[Line, Line], files: tuple[Project, Project], words: Words
) -> tuple[str, str, str]:
    """Before, now and unit of one aspect of a line."""
    metric = lines[1].metric
    elements = [file.elements.get(x.element) for file, x in zip(files, lines, strict=True)]
    match aspect:
        case "verdict":
            before, now = map(said.verdict_text, lines)
            return before, now, ""
        case "value":
            texts = [rows.value_of(line, words.system).text for line in lines]
            return texts[0], texts[1], numbers.unit(metric, words.system)
        case "limit":
            return said.limit_text(lines[0]), said.limit_text(lines[1]), ""
        case "category":
            a, b = (e.category if e else "" for e in elements)
            return (a, b, "") if a != b else (lines[0].category, lines[1].category, "")
        case "assembly":
            a, b = (e.assembly if e else "" for e in elements)
            return a, b, ""
        case "area":
            one, other = (rows.amount(e, words.system) for e in elements)
            return one.text, other.text, other.unit
        case "metric":
            return lines[0].metric, lines[1].metric, ""
        case "method":
            a, b = (x.solved.setting.method if x.solved else "" for x in lines)
            return a, b, ""
        case "claim":
            a, b = ("claimed" if x.with_exception else "not claimed" for x in lines)
            return a, b, ""
        case "why":
            a, b = ("; ".join(x.reasons) for x in lines)
            return a, b, ""
    return "", "", ""


def _cells(each: Difference, words: Words) -> tuple[str, str, str]:
    """Both sides with the unit apart where they are numbers of one quantity."""
    numeric = [
        x
        for x in (each.before, each.after)
        if isinstance(x, int | float) and not isinstance(x, bool)
    ]
    unit = ""
    if each.quantity and each.quantity not in ("share", "temperature") and numeric:
        unit = units.label(each.quantity, words.system)
    before, now = (
        "" if x is None else words.value(x, each).removesuffix(f" {unit}")
        for x in (each.before, each.after)
    )
    return before, now, unit
