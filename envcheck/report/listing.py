"""Lists that are no report: materials and methods."""

from __future__ import annotations

from collections.abc import Iterable, Sequence

from envcheck import units
from envcheck.model.project import Material
from envcheck.report import numbers, plain_text
from envcheck.report.inert import clean
from envcheck.report.parts import Entry, Facts, Grid, Items, Page, Pair, Section


def materials(found: Sequence[Material], system: str, width: int) -> str:
    """A table of materials with their sources beneath, each source once."""
    sources = list(dict.fromkeys(material.source for material in found))
    rows = tuple(
        (
            clean(material.id),
            clean(material.title),
            material.material_class,
            numbers.conductivity(material.conductivity, system),
            _shown(material.density, "density", system),
            _shown(material.specific_heat, "specific_heat", system),
            str(sources.index(material.source) + 1),
        )
        for material in found
    )
    heads = (
        "id",
        "title",
        "class",
        f"k, {units.label('conductivity', system)}",
        units.label("density", system),
        units.label("specific_heat", system),
        "source",
    )
    grid = Grid(heads, rows, (3, 4, 5, 6), (1, 3, 5, 0))
    listed = Items(tuple(Entry(clean(source)) for source in sources), numbered=True)
    title = f"{len(found)} material" + "s" * (len(found) != 1)
    page = Page(title, (Section("", (grid,)), Section("Sources", (listed,))))
    return plain_text.write(page, width, False)


def _shown(value: float | None, quantity: str, system: str) -> str:
    if value is None:
        return ""
    return numbers.significant(numbers.in_system(value, quantity, system), 4)


def methods(rows: Iterable[tuple[str, str, str, str, str, bool]], width: int) -> str:
    """Methods as (name, title, formula, source, range, may be prescribed), one below the other."""
    sections = []
    for name, title, formula, source, valid, prescribable in rows:
        use = "may be prescribed by a rule set" if prescribable else "used by other methods"
        pairs = (
            ("formula", formula),
            ("source", source),
            ("valid for", valid),
            ("use", use),
        )
        facts = Facts(tuple(Pair(label, text) for label, text in pairs if text))
        sections.append(Section(f"{name}: {title}", (facts,)))
    return plain_text.write(Page("Calculation methods", tuple(sections)), width, False)
