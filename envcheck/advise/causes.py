"""What changed on a line, and which differences of the two models it looks at."""

from __future__ import annotations

from collections.abc import Iterable, Iterator

from envcheck.advise.differences import QUANTITIES, same
from envcheck.advise.revisions import Revision
from envcheck.model.compared import Difference, LineChange
from envcheck.model.details import Detail
from envcheck.model.judged import Line
from envcheck.model.layers import Material
from envcheck.model.patterns import matches
from envcheck.units import to_si

SAID = frozenset(
    {"title", "sheet", "note", "share_from", "claimed_by", "reason", "prepared_by", "declared"}
)
"""Fields that say something to the reader and bear on no value."""
PAPERS = frozenset(
    {"source", "evidence", "standard", "document", "document_found", "evidence_found", "basis"}
)
"""Fields that say where a value comes from."""
OF_LIGHT = frozenset({"shgc", "visible_transmittance"})
OF_HEAT = frozenset({"u_factor", "resistance", "thickness", "conductivity"})
SETTING = (
    "method", "weight", "direction", "outside_film", "inside_film", "cladding_film",
    "framing_share", "refused",
)  # fmt: skip


def value(line: Line) -> float | None:
    """A line's own value, SI; None where none was found."""
    solved, own = line.solved, line.own or line.comparison
    if solved is not None and solved.setting.metric == line.metric:
        return solved.value
    return None if own is None else to_si(own.value, own.unit) if own.unit else own.value


class Finder:
    """Two revisions and what differs between them, to ask of each line what changed it."""

    def __init__(self, old: Revision, new: Revision, differences: Iterable[Difference]) -> None:
        self.old = old
        self.new = new
        self._by_kind: dict[str, list[Difference]] = {}
        for each in differences:
            if each.what != "renamed":
                self._by_kind.setdefault(each.kind, []).append(each)

    def change(self, a: Line, b: Line) -> LineChange:
        """What changed from one line to the other; without aspects where nothing did."""
        own = list(self._own(a, b))
        aspects = self._aspects(a, b, own)
        return LineChange(a, b, aspects, self._causes(a, b, aspects, own) if aspects else ())

    def _aspects(self, a: Line, b: Line, own: list[Difference]) -> tuple[str, ...]:
        one, other = self.old.project.elements, self.new.project.elements
        first, second = one.get(a.element), other.get(b.element)
        found = {
            "verdict": a.verdict != b.verdict,
            "value": not same(value(a), value(b)),
            "limit": other_limit(a, b),
            "metric": a.metric != b.metric,
            "category": a.category != b.category,
            "claim": bool(a.with_exception) != bool(b.with_exception),
            "method": _method(a) != _method(b),
            "why": a.open and b.open and a.verdict == b.verdict and a.reasons != b.reasons,
            "evidence": any(d.field in PAPERS for d in own),
        }
        if first is not None and second is not None:
            found["category"] |= first.category != second.category
            found["assembly"] = first.assembly != second.assembly
            amounts = ("net_area", "perimeter", "count")
            found["area"] = any(
                not same(getattr(first, name), getattr(second, name)) for name in amounts
            )
        return tuple(name for name, changed in found.items() if changed)

    # ---------------------------------------------------------------------------------- causes

    def _own(self, a: Line, b: Line) -> Iterator[Difference]:
        """Differences of the element itself, its assembly, materials, details and claims."""
        element = self.new.project.elements.get(b.element)
        if element is None:
            return
        kept = OF_HEAT if b.metric in ("SHGC", "VT") else OF_LIGHT
        for each in self._of("element", b.element):
            if each.field == "category" and a.category == b.category:
                yield each._replace(field="category_claimed")
            elif _bears(each):
                yield each
        before = self.old.project.elements[a.element]
        if before.assembly == element.assembly:
            parts = _parts(self.new, element.assembly) | _parts(self.old, element.assembly)
            for each in (
                *self._of("assembly", element.assembly),
                *(d for d in self._by_kind.get("material", ()) if ("material", d.name) in parts),
                *(d for d in self._by_kind.get("detail", ()) if ("detail", d.name) in parts),
            ):
                if _bears(each) and each.field not in kept:
                    yield each
        yield from (
            d
            for d in self._by_kind.get("exception", ())
            if d.name.partition(" ")[0] == b.element and _bears(d)
        )

    def _causes(
        self, a: Line, b: Line, aspects: tuple[str, ...], own: list[Difference]
    ) -> tuple[Difference, ...]:
        found = [*own, *self._openings(b, aspects), *self._facts(b), *self._site(a, b)]
        found += _settings(a, b)
        if a.category != b.category and not any(d.field == "category" for d in own):
            found.append(Difference("class", b.element, (), "", "changed", a.category, b.category))
        if {"limit", "method"} & set(aspects) or not found:
            found += self._rule_set(b)
        if "verdict" in aspects:
            found += self._ratios(a, b)
        if a.group != b.group or a.group_kind != b.group_kind or not found:
            found += self._group(a, b)
        return tuple(dict.fromkeys(found))

    def _of(self, kind: str, name: str) -> list[Difference]:
        return [each for each in self._by_kind.get(kind, ()) if each.name == name]

    def _openings(self, line: Line, aspects: tuple[str, ...]) -> Iterator[Difference]:
        """Openings of the element whose size or number changed, where its own area follows."""
        if "area" not in aspects:
            return
        for each in self._by_kind.get("element", ()):
            tag, sizes = each.name, ("net_area", "count", "")
            for side in (self.old.project.elements, self.new.project.elements):
                hosted = tag in side and side[tag].host == line.element
                element = self.new.project.elements[line.element]
                if hosted and each.field in sizes and element.gross_area is not None:
                    yield each
                    break

    def _facts(self, line: Line) -> Iterator[Difference]:
        """Facts of the project that a limit of the line's row asks for."""
        asked: set[str] = set()
        for side in (self.old, self.new):
            for ruleset in side.rulesets.values():
                for limit in ruleset.limits:
                    if any(matches(pattern, line.category) for pattern in limit.categories):
                        asked.update(when.dimension for when in limit.when)
        element = self.new.project.elements.get(line.element)
        stated = {fact.name for fact in element.facts} if element is not None else set()
        for each in self._by_kind.get("fact", ()):
            if each.name in asked and each.name not in stated and _bears(each):
                yield each

    def _site(self, a: Line, b: Line) -> Iterator[Difference]:
        if _step(a, "zone") != _step(b, "zone"):
            yield from (d for d in self._by_kind.get("site", ()) if _bears(d))
        if _step(a, "date") != _step(b, "date") and other_limit(a, b):
            dates = ("permit_application_date", "scope")
            yield from (d for d in self._by_kind.get("project", ()) if d.field in dates)

    def _rule_set(self, line: Line) -> list[Difference]:
        return [d for d in self._of("rule_set", line.ruleset) if d.field != "decides"]

    def _ratios(self, a: Line, b: Line) -> Iterator[Difference]:
        """Area ratios that closed the row, with the openings that changed them."""
        if "path_closed" not in (a.verdict, b.verdict):
            return
        before = {r.name: r for r in self.old.judged.ratios}
        for ratio in self.new.judged.ratios:
            other = before.get(ratio.name)
            if other is None or same(other.value, ratio.value) or ratio.passed == other.passed:
                continue
            yield Difference(
                "ratio", ratio.name, (), "", "changed", other.value, ratio.value, "share"
            )
            for each in self._by_kind.get("element", ()):
                if each.name in (*ratio.counted, *other.counted) and each.field in ("count", ""):
                    yield each

    def _group(self, a: Line, b: Line) -> Iterator[Difference]:
        """The mean or sum whose verdict the line carries, and members that changed it."""
        if not (a.group_kind or b.group_kind):
            return
        one = f"{a.group_kind} {a.group}".strip() or None
        other = f"{b.group_kind} {b.group}".strip() or None
        if one != other:
            yield Difference("group", b.element, (), "", "changed", one, other)
            return
        for group in self.new.judged.groups:
            if (group.kind, group.name) == (b.group_kind, b.group):
                tags = {part.element for part in group.parts}
                names = tags | {part.assembly for part in group.parts}
                for kind in ("element", "assembly"):
                    for each in self._by_kind.get(kind, ()):
                        if each.name in names and _bears(each):
                            yield each


def _bears(each: Difference) -> bool:
    """Whether a difference can bear on a value or a verdict."""
    return not ({each.field, *each.where} & SAID) or each.field in PAPERS


def other_limit(a: Line, b: Line) -> bool:
    """Whether two lines are held against another number, or another cell where one has none."""
    one, other = a.own or a.comparison, b.own or b.comparison
    if one is not None and other is not None:
        return not same((one.sense, one.limit, one.unit), (other.sense, other.limit, other.unit))
    x, y = a.limit, b.limit
    if x is None or y is None:
        return x is not y
    return (x.cell, x.unit, x.sense) != (y.cell, y.unit, y.sense)


def _method(line: Line) -> str:
    return line.solved.setting.method if line.solved is not None else ""


def _step(line: Line, step: str) -> list[str]:
    return [choice.chosen for choice in line.trail if choice.step == step]


def _settings(a: Line, b: Line) -> Iterator[Difference]:
    """How the rule set has the assembly solved, where that changed."""
    if a.solved is None or b.solved is None:
        return
    one, other = a.solved.setting, b.solved.setting
    for field in SETTING:
        x, y = getattr(one, field), getattr(other, field)
        if not same(x, y):
            quantity = "resistance" if field.endswith("film") else QUANTITIES.get(field, "")
            yield Difference("setting", "", (), field, "changed", x, y, quantity)


def _parts(side: Revision, assembly: str) -> set[tuple[str, str]]:
    """Ids of materials and details within an assembly."""
    found: set[tuple[str, str]] = set()
    _walk(side.project.assemblies.get(assembly), found)
    return found


def _walk(value: object, found: set[tuple[str, str]]) -> None:
    if isinstance(value, Material):
        found.add(("material", value.id))
    elif isinstance(value, Detail):
        found.add(("detail", value.id))
        _walk(value.rectangles, found)
    elif isinstance(value, tuple):
        for part in value:
            _walk(part, found)
