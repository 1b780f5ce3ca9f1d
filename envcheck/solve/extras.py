"""What a page about one subject shows beside its lines: details, surfaces, workmanship."""

from __future__ import annotations

from collections.abc import Iterable, Mapping

from envcheck.model.conventions import Conventions
from envcheck.model.details import Coldest, Extras, SolvedDetail
from envcheck.model.judged import Line
from envcheck.model.project import Project
from envcheck.model.solved import Setting
from envcheck.model.sure import Workmanship
from envcheck.solve.detail import NotSolved, solve_detail
from envcheck.solve.surface import NoSurface, coldest_of
from envcheck.solve.workmanship import workmanship


def extras(
    project: Project,
    conventions: Mapping[str, Conventions],
    lines: Iterable[Line],
    subject: str,
    levels: Mapping[str, Mapping[str, str]],
) -> Extras:
    """Solve it for the element, assembly or detail of that name.

    conventions: by rule set. levels: of workmanship, see ``workmanship``.
    """
    details: dict[str, SolvedDetail | str] = {}
    if subject in project.details:
        try:
            details[subject] = solve_detail(project.details[subject], surfaces=True)
        except NotSolved as why:
            details[subject] = str(why)
    surfaces: dict[tuple[str, Setting], Coldest | str] = {}
    dial: dict[tuple[str, Setting], tuple[Workmanship, ...]] = {}
    for line in lines:
        solved = line.solved
        if solved is None or subject not in (line.element, solved.assembly):
            continue
        assembly = project.assemblies[solved.assembly]
        done = (assembly.id, solved.setting) in surfaces
        if done or assembly.kind != "layers" or solved.setting.metric != "U_assembly":
            continue
        own = conventions[line.ruleset]
        try:
            found: Coldest | str = coldest_of(assembly, solved.setting, own)
        except NoSurface as why:
            found = str(why)
        surfaces[solved.assembly, solved.setting] = found
        dial[solved.assembly, solved.setting] = workmanship(assembly, solved.setting, own, levels)
    return Extras(details, surfaces, dial)
