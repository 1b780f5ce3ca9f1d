"""Two project models held against each other, section by section of the file."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import replace
from typing import NamedTuple

from envcheck.advise.differences import by_name, label, of_records, of_tables, same
from envcheck.model.compared import Difference, Moved
from envcheck.model.judged import Judged
from envcheck.model.project import Element, Project
from envcheck.model.ruleset import Edition, RuleSet

CLOSES = 0.005
"""Share by which a dropped area may miss what others gained; drawings go to the inch."""
HEAD = (
    "title", "reference", "prepared_by", "permit_application_date", "report_date", "scope",
    "invented", "units",
)  # fmt: skip


class Revision(NamedTuple):
    """A project as read, its rule sets by id, and what was judged."""

    project: Project
    rulesets: Mapping[str, RuleSet]
    judged: Judged


# -------------------------------------------------------------------------------------- renamed


def renamed_assemblies(old: Project, new: Project) -> dict[str, str]:
    """Ids of assemblies that changed their id and nothing else."""
    gone = {k: v for k, v in old.assemblies.items() if k not in new.assemblies}
    come = {k: v for k, v in new.assemblies.items() if k not in old.assemblies}
    found: dict[str, str] = {}
    for name, assembly in gone.items():
        for other, twin in come.items():
            if other not in found.values() and same(assembly._replace(id=other), twin):
                found[name] = other
                break
    return found


def renamed_elements(old: Project, new: Project) -> dict[str, str]:
    """Tags of elements that changed their tag and at most their sheet and note."""
    gone = {k: v for k, v in old.elements.items() if k not in new.elements}
    come = {k: v for k, v in new.elements.items() if k not in old.elements}
    found: dict[str, str] = {}
    for tag, element in gone.items():
        for other, twin in come.items():
            if other not in found.values() and _same_piece(element, twin, gone):
                found[tag] = other
                break
    return found


def _same_piece(one: Element, other: Element, gone: Iterable[str]) -> bool:
    """Whether two elements differ at most in tag, sheet and note, and in a host that is gone."""
    host = other.host if one.host in gone else one.host
    kept = one._replace(tag=other.tag, sheet=other.sheet, note=other.note, host=host)
    return same(kept, other)


def translated(old: Project, assemblies: Mapping[str, str], tags: Mapping[str, str]) -> Project:
    """The old project with the ids and tags of the new one."""
    elements = {
        tags.get(tag, tag): element._replace(
            tag=tags.get(tag, tag),
            assembly=assemblies.get(element.assembly, element.assembly),
            host=tags.get(element.host, element.host),
        )
        for tag, element in old.elements.items()
    }
    return replace(
        old,
        assemblies={
            assemblies.get(name, name): each._replace(id=assemblies.get(name, name))
            for name, each in old.assemblies.items()
        },
        elements=elements,
        exceptions=tuple(
            claim._replace(element=tags.get(claim.element, claim.element))
            for claim in old.exceptions
        ),
    )


def moved(old: Project, new: Project) -> tuple[Moved, ...]:
    """Areas of dropped elements that others of the same surface took over exactly."""
    found = []
    surfaces = dict.fromkeys(e.surface for e in old.elements.values() if e.surface)
    for surface in surfaces:
        gone = {
            tag: area
            for tag, each in old.elements.items()
            if each.surface == surface and tag not in new.elements and (area := _area(each))
        }
        gained = {
            tag: rise
            for tag, each in new.elements.items()
            if each.surface == surface
            and (rise := _area(each) - _area(old.elements.get(tag))) > 1e-6
        }
        found += _taken_over(surface, gone, gained)
    return tuple(found)


def _taken_over(surface: str, gone: dict[str, float], gained: dict[str, float]) -> list[Moved]:
    found = []
    for tag, area in list(gone.items()):
        twin = next((t for t, rise in gained.items() if abs(rise - area) <= CLOSES * area), None)
        if twin is not None:
            found.append(Moved((tag,), (twin,), surface, area))
            del gone[tag], gained[twin]
    total = sum(gone.values())
    if gone and gained and abs(sum(gained.values()) - total) <= CLOSES * total:
        found.append(Moved(tuple(gone), tuple(gained), surface, total))
    return found


def _area(element: Element | None) -> float:
    if element is None:
        return 0.0
    return element.net_area if element.net_area is not None else element.gross_area or 0.0


# ------------------------------------------------------------------------------------- sections


def rule_set_pairs(old: Project, new: Project) -> dict[str, str]:
    """Which rule set of the new project stands for which of the old: by id, else by place."""
    ours, theirs = [c.id for c in old.rule_sets], [c.id for c in new.rule_sets]
    pairs = {name: name for name in ours if name in theirs}
    left = [name for name in ours if name not in pairs]
    pairs.update(zip(left, (name for name in theirs if name not in pairs), strict=False))
    return pairs


def of_projects(old: Revision, new: Revision, pairs: Mapping[str, str]) -> Iterator[Difference]:
    """Everything that differs in what was read, in the order of the file."""
    a, b = old.project, new.project
    for field in HEAD:
        one, other = getattr(a, field), getattr(b, field)
        if one != other:
            what = "added" if one in (None, "") else "dropped" if other in (None, "") else "changed"
            yield Difference("project", "", (), field, what, one, other)
    site = a.site._replace(by_criteria=(), measures=())
    yield from of_records("site", "", site, b.site._replace(by_criteria=(), measures=()))
    yield from _measures(a, b)
    yield from of_parts("fact", a.facts, b.facts)
    yield from _rule_sets(old, new, pairs)
    yield from of_tables("material", *_common(a.materials, b.materials))
    yield from of_tables("assembly", a.assemblies, b.assemblies)
    yield from of_tables("detail", a.details, b.details)
    yield from of_tables("surface", a.surfaces, b.surfaces)
    yield from of_tables("element", a.elements, b.elements)
    yield from _exceptions(a, b)
    yield from of_records("options", "", a.options, b.options)


def of_parts(kind: str, one: tuple[object, ...], other: tuple[object, ...]) -> Iterator[Difference]:
    """Records of a list by their names."""
    for a, b in by_name(one, other):
        if a is None or b is None:
            what = "added" if a is None else "dropped"
            yield Difference(kind, label(a or b), (), "", what, a, b)
        else:
            yield from of_records(kind, label(b), a, b)


def _measures(a: Project, b: Project) -> Iterator[Difference]:
    from envcheck.advise.differences import QUANTITIES

    one, other = dict(a.site.measures), dict(b.site.measures)
    for name in dict.fromkeys((*one, *other)):
        x, y = one.get(name), other.get(name)
        if not same(x, y):
            what = "added" if x is None else "dropped" if y is None else "changed"
            yield Difference("site", "", (), name, what, x, y, QUANTITIES.get(name, "degree_days"))


def _common(
    a: Mapping[str, object], b: Mapping[str, object]
) -> tuple[dict[str, object], dict[str, object]]:
    """Materials of both; what only one uses is seen in the layers that use it."""
    return {k: v for k, v in a.items() if k in b}, {k: v for k, v in b.items() if k in a}


def _exceptions(a: Project, b: Project) -> Iterator[Difference]:
    def keyed(project: Project) -> dict[str, object]:
        return {f"{claim.element} {claim.clause}": claim for claim in project.exceptions}

    yield from of_tables("exception", keyed(a), keyed(b))


def _rule_sets(old: Revision, new: Revision, pairs: Mapping[str, str]) -> Iterator[Difference]:
    mine = {c.id: c for c in old.project.rule_sets}
    theirs = {c.id: c for c in new.project.rule_sets}
    for name in mine:
        other = pairs.get(name)
        if other is None:
            yield Difference("rule_set", name, (), "", "dropped", name, None)
            continue
        if other != name:
            yield Difference("rule_set", other, (), "", "replaced", name, other)
        yield from of_records("rule_set", other, mine[name]._replace(id=other), theirs[other])
        if old.rulesets and new.rulesets:
            one, two = old.rulesets[name].chain, new.rulesets[other].chain
            yield from _editions(other, one, two)
    for name in theirs:
        if name not in pairs.values():
            yield Difference("rule_set", name, (), "", "added", None, name)


def _editions(
    ruleset: str, one: tuple[Edition, ...], other: tuple[Edition, ...]
) -> Iterator[Difference]:
    """Editions and amendments by id: which are there, in force, of the same text."""
    before, after = {e.id: e for e in one}, {e.id: e for e in other}
    for name in dict.fromkeys((*before, *after)):
        a, b = before.get(name), after.get(name)
        if a is None or b is None:
            what = "added" if a is None else "dropped"
            yield Difference("rule_set", ruleset, (name,), "", what, a, b)
            continue
        if a.in_force != b.in_force:
            yield Difference(
                "rule_set", ruleset, (name,), "in_force", "changed", a.in_force, b.in_force
            )
        if a.sha256 != b.sha256:
            yield Difference(
                "rule_set", ruleset, (name,), "files", "changed", a.sha256[:12], b.sha256[:12]
            )
        if a.edition != b.edition:
            yield Difference(
                "rule_set", ruleset, (name,), "edition", "changed", a.edition, b.edition
            )
