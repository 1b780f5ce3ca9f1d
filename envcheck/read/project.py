"""A project file to :class:`envcheck.model.project.Project`, or all of its problems at once."""

from __future__ import annotations

from collections.abc import Callable
from hashlib import sha256
from pathlib import Path as FilePath
from typing import Any, TypeVar

from envcheck.errors import InputError
from envcheck.model.names import Names
from envcheck.model.project import (
    Assembly,
    Element,
    Fact,
    Junction,
    Project,
    RuleSetChoice,
)
from envcheck.read.assemblies import read_assembly, read_material
from envcheck.read.context import Context
from envcheck.read.elements import (
    read_element,
    read_exception,
    read_facts,
    read_surface,
    with_openings,
)
from envcheck.read.files import read_bytes
from envcheck.read.schema import check_paths, quantities
from envcheck.read.schema_words import Path
from envcheck.read.site import read_answers, read_options, read_site
from envcheck.read.yaml_reader import Entry, read_yaml

_Thing = TypeVar("_Thing")
_NAMED = {"materials", "assemblies", "details", "surfaces", "elements", "junctions"}


def read_project(path: str, names: Names) -> Project:
    """Read a project file; ``-`` is standard input.

    Errors: InputError with every problem found, in order of line.
    """
    raw, shown, folder = read_bytes(path)
    return project_from_bytes(raw, shown, folder, names)


def project_from_bytes(raw: bytes, shown: str, folder: FilePath, names: Names) -> Project:
    """Read a project from the bytes of its file; ``folder`` is where its evidence lies."""
    data, problems = read_yaml(raw, shown)
    if data is None:
        raise InputError(problems)
    context = Context(shown, folder, names)
    context.problems += problems
    wrong = check_paths(data, "project", shown)
    told = {made.line for made in problems}
    context.problems += [made for _, made in wrong if made.line not in told]
    _check_refused(context, data, {path for path, _ in wrong})
    sections = _Sections(data, [path for path, _ in wrong])
    project = _build(context, sections, sha256(raw).hexdigest())
    if context.problems:
        raise InputError(context.problems)
    return project


def _check_refused(context: Context, data: Entry, wrong: set[Path]) -> None:
    """Read at least the quantities of what the schema refused, so that one round mends them."""
    if not wrong:
        return
    known = quantities("project")
    told = {made.line for made in context.problems if made.kind.id != "unknown-key"}
    for path in sorted(wrong, key=str):
        node: Any = data
        for step in path:
            try:
                node = node[step]
            except (LookupError, TypeError):
                node = None
        if isinstance(node, Entry):
            for key, value in node.items():
                if known.get(key) and isinstance(value, str) and node.lines[key] not in told:
                    context.number(node, key, known[key])


def _prune_layer(data: Entry, path: Path) -> Path:
    """Take a refused layer out, so that the rest of its assembly is still read.

    Gives the path of what must be left out besides: nothing, but for the assembly as a whole
    where something else in it is refused.
    """
    if path[:1] != ("assemblies",) or len(path) < 4 or path[2] != "layers":
        return path
    assembly = data["assemblies"][path[1]]
    assembly["layers"][path[3]] = None
    for key in ("fasteners", "voids", "inverted"):  # they name layers
        assembly.pop(key, None)
    return ()


class _Sections:
    """Top-level sections without the entries that the schema refused."""

    def __init__(self, data: Entry, wrong: list[Path]) -> None:
        self.data = data
        pruned = [_prune_layer(data, path) for path in wrong]
        self.wrong = {path[:depth] for path in pruned for depth in (1, 2)}

    def mapping(self, name: str) -> dict[str, Any]:
        """All entries of a section, sound or not, for what refers to them by name."""
        section = self.data.get(name)
        return section if isinstance(section, Entry) else {}

    def names(self, name: str) -> dict[str, Any]:
        """All entries that may be referred to; those of a misspelt section count as well."""
        if name in self.data or not self.wrong:
            return self.mapping(name)
        from difflib import get_close_matches  # only where something is wrong

        meant = get_close_matches(name, self.data, n=1)
        return self.mapping(meant[0]) if meant and meant[0] not in _NAMED - {name} else {}

    def each(self, name: str, make: Callable[[str, Entry], _Thing]) -> dict[str, _Thing]:
        """Make something of every sound entry of a section."""
        entries = self.mapping(name)
        return {key: make(key, e) for key, e in entries.items() if (name, key) not in self.wrong}

    def whole(self, name: str) -> Entry:
        """A section that is read as one; empty where it is missing or refused."""
        section = self.data.get(name)
        sound = isinstance(section, Entry) and (name,) not in self.wrong
        return section if sound and isinstance(section, Entry) else Entry(self.data.line)

    def items(self, name: str) -> list[tuple[int, Any]]:
        """The sound items of a list, with their lines."""
        section = self.data.get(name)
        if not isinstance(section, list):
            return []
        lines: list[int] = getattr(section, "lines", [])
        return [
            (line, item)
            for place, (line, item) in enumerate(zip(lines, section, strict=True))
            if (name, place) not in self.wrong
        ]


def _build(context: Context, sections: _Sections, digest: str) -> Project:
    entries, surfaces = sections.names("elements"), sections.names("surfaces")
    assemblies = sections.names("assemblies")
    context.own_ids = frozenset(sections.names("materials"))
    context.own = sections.each("materials", lambda n, e: read_material(context, n, e))
    if "details" in sections.data:
        _read_details(context, sections, assemblies)
    built = sections.each("assemblies", lambda n, e: read_assembly(context, n, e))
    elements = sections.each(
        "elements", lambda n, e: read_element(context, n, e, assemblies, surfaces)
    )
    if context.details:
        _check_measured(context, elements, built)
    facts = read_facts(sections.whole("facts"))
    head = sections.whole("project")
    return Project(
        file=context.file,
        title=head.get("title", ""),
        reference=head.get("reference", ""),
        prepared_by=head.get("prepared_by", ""),
        permit_application_date=context.date(head, "permit_application_date"),
        report_date=context.date(head, "report_date"),
        scope=head.get("scope", "new"),
        invented=head.get("invented", ""),
        units=head.get("units", ""),
        site=read_site(context, sections.whole("site")),
        facts=facts,
        rule_sets=_rule_sets(sections),
        materials={**context.own, **context.used},
        assemblies={name: _heated_as_stated(one, facts) for name, one in built.items()},
        details=context.details,
        surfaces=sections.each("surfaces", lambda n, e: read_surface(context, n, e, entries)),
        elements=with_openings(context, elements, entries),
        exceptions=tuple(
            read_exception(context, entry, entries) for _, entry in sections.items("exceptions")
        ),
        options=read_options(context, sections.whole("options")),
        junctions=_junctions(context, sections, built, elements),
        accepted=read_answers(context, [entry for _, entry in sections.items("answers")]),
        ranged=context.ranges,
        sha256=digest,
        lines=dict(sections.data.lines),
    )


def _read_details(context: Context, sections: _Sections, assemblies: dict[str, Any]) -> None:
    """Read the details before what refers to them."""
    from envcheck.read.details import read_detail

    context.detail_ids = frozenset(sections.names("details"))
    context.details = sections.each("details", lambda n, e: read_detail(context, n, e, assemblies))


def _junctions(
    context: Context,
    sections: _Sections,
    assemblies: dict[str, Assembly],
    elements: dict[str, Element],
) -> tuple[Junction, ...]:
    if "junctions" not in sections.data:
        return ()
    from envcheck.read.junctions import bridge_titles, read_junction

    titles = bridge_titles(assemblies.values(), elements.values())
    found = sections.each("junctions", lambda n, e: read_junction(context, n, e, titles))
    return tuple(found.values())


def _check_measured(
    context: Context, elements: dict[str, Element], assemblies: dict[str, Assembly]
) -> None:
    """A psi belongs to the dimensions that it was made for."""
    for element in elements.values():
        assembly = assemblies.get(element.assembly)
        for bridge in (*element.bridges, *(assembly.bridges if assembly is not None else ())):
            detail = bridge.detail
            if detail is not None and detail.measured != element.measured:
                context.add(
                    "detail-measured",
                    bridge.line,
                    found=f"element {element.tag!r} measured {element.measured}",
                    expected=f"{detail.measured}, like the detail {detail.id!r}",
                )


def _heated_as_stated(assembly: Assembly, facts: tuple[Fact, ...]) -> Assembly:
    """A slab that does not say whether it is heated takes the project's fact ``slab_heated``."""
    stated = next((fact.value for fact in facts if fact.name == "slab_heated"), None)
    if assembly.slab is None or assembly.slab.heated is not None or stated not in ("yes", "no"):
        return assembly
    return assembly._replace(slab=assembly.slab._replace(heated=stated == "yes"))


def _rule_sets(sections: _Sections) -> tuple[RuleSetChoice, ...]:
    return tuple(
        RuleSetChoice(item, True, line)
        if isinstance(item, str)
        else RuleSetChoice(
            item["id"], item.get("decides", True), line, item.get("path", "prescriptive")
        )
        for line, item in sections.items("rule_sets")
    )
