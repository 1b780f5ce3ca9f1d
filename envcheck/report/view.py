"""The view: every word and every figure of a report, with nothing said of its layout.

All formats print this view, so that they cannot differ in a figure. ``build`` makes it; the same
input gives the same view, since nothing here asks for the clock or the environment.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import TYPE_CHECKING, NamedTuple

from envcheck import __version__
from envcheck.model.judged import Judged, Line
from envcheck.model.project import Project
from envcheck.model.ruleset import RuleSet
from envcheck.report import building, cautions, header, items, rows, several_rule_sets, wording
from envcheck.report.building import Building
from envcheck.report.cautions import CautionText
from envcheck.report.header import RuleSetView
from envcheck.report.items import FindingView, Item
from envcheck.report.parts import Pair
from envcheck.report.rows import Row
from envcheck.report.several_rule_sets import ChangeView, TurnView

if TYPE_CHECKING:
    from envcheck.model.moisture import Check
    from envcheck.report.details import AssemblyView
    from envcheck.report.moisture import CheckView
    from envcheck.report.schedules import Schedule


class ViewOptions(NamedTuple):
    """What the reader asks for."""

    units: str = ""
    """``SI``, ``IP`` or empty: the project's, else the rule set's."""
    date: str = ""
    """Date to print in place of the project's."""
    colour: bool = False
    width: int = 100
    """Characters a line of the text format may take."""
    details: bool = False
    """Assemblies with their layers, and lists to tick off."""
    workings: bool = False
    """Of each assembly also its ladder, paths and worksheet."""
    bounds: bool = False
    """A column with the bounds of the drawn model."""
    moisture: bool = False
    """The advisory moisture check."""
    only: tuple[str, ...] = ()
    """Patterns of the tags that are shown, where not all are ..."""
    total: int = 0
    """... and the number of all lines that decide."""


class View(NamedTuple):
    """A whole report."""

    title: str
    lead: tuple[str, ...]
    """Place, rule set, zone and status: one line for each rule set."""
    facts: tuple[Pair, ...]
    units: str
    rule_sets: tuple[RuleSetView, ...]
    summary: str
    rows: tuple[Row, ...]
    """Over the limit first, then open, then the rest; file order within; by rule set."""
    open_items: tuple[Item, ...]
    claims: tuple[Item, ...]
    findings: tuple[FindingView, ...]
    building: Building
    changes: tuple[ChangeView, ...]
    """Lines that differ between the first rule set and others."""
    turns: tuple[TurnView, ...]
    """Conventions that turn a verdict by themselves."""
    assumptions: tuple[str, ...]
    remarks: tuple[str, ...]
    assemblies: tuple[AssemblyView, ...]
    """Empty unless details are asked for."""
    schedules: tuple[Schedule, ...]
    """Likewise."""
    cautions: tuple[CautionText, ...]
    not_judged: tuple[str, ...]
    deferral: str
    tool: str
    hashes: tuple[Pair, ...]
    hash_note: str
    colour: bool
    width: int
    bounds: bool
    moisture: CheckView | None = None
    """None unless the check is asked for."""


def build(
    project: Project,
    rulesets: Mapping[str, RuleSet],
    judged: Judged,
    options: ViewOptions | None = None,
    moisture: Check | None = None,
) -> View:
    """Make the view of a check.

    ``rulesets`` by id, in the order in which they are judged; those that decide come first.
    ``moisture``: the advisory check, where it is asked for.
    Errors: none for judged input.
    """
    options = options or ViewOptions()
    system = system_for(project, rulesets, options)
    rulesets = dict(sorted(rulesets.items(), key=lambda pair: not header.decides(pair[1], project)))
    ordered = in_order(judged.lines, rulesets)
    made = rows.build(ordered, project, system, options.details, judged)
    findings = items.findings(judged.findings)
    assemblies, lists = _details(project, made, judged, system, options)
    return View(
        title=header.title(project),
        lead=header.lead(project, rulesets.values(), judged.lines),
        facts=header.facts(project, options.date),
        units=system,
        rule_sets=tuple(
            header.rule_set(each, judged.lines, project, system) for each in rulesets.values()
        ),
        summary=items.summary(judged, options.only, options.total),
        rows=made,
        open_items=items.open_items(made, judged),
        claims=items.claims(project),
        findings=findings,
        building=building.build(judged, project, system),
        changes=several_rule_sets.changes(judged.changes),
        turns=several_rule_sets.turns(judged.turns),
        assumptions=items.assumptions(judged.lines),
        remarks=items.remarks(judged.remarks),
        assemblies=assemblies,
        schedules=lists,
        cautions=cautions.gather(project, rulesets, judged),
        not_judged=header.not_judged(rulesets),
        deferral=wording.DEFERRAL,
        tool=f"envcheck {__version__}",
        hashes=header.hashes(project, rulesets),
        hash_note=wording.HASH_NOTE,
        colour=options.colour,
        width=options.width,
        bounds=options.bounds,
        moisture=_moisture(moisture, project, system, options.details),
    )


def _moisture(
    check: Check | None, project: Project, system: str, details: bool
) -> CheckView | None:
    if check is None:
        return None
    from envcheck.report import moisture  # only where it is asked for

    return moisture.build(check, project, system, details)


def _details(
    project: Project, made: tuple[Row, ...], judged: Judged, system: str, options: ViewOptions
) -> tuple[tuple[AssemblyView, ...], tuple[Schedule, ...]]:
    """Assemblies and lists to tick off, loaded only where they are asked for."""
    if not options.details:
        return (), ()
    from envcheck.report import details, schedules

    return (
        details.build(project, judged.lines, system, options.workings),
        schedules.build(project, made, judged, system),
    )


def system_for(project: Project, rulesets: Mapping[str, RuleSet], options: ViewOptions) -> str:
    """The unit system asked for: the option's, the project's, the first rule set's."""
    of_rules = next((ruleset.units for ruleset in rulesets.values()), "")
    return options.units or project.units or of_rules or "SI"


def in_order(lines: tuple[Line, ...], rulesets: Mapping[str, RuleSet]) -> list[Line]:
    """Lines by rule set; over the limit first, then open, then the rest; file order within."""
    place = {name: number for number, name in enumerate(rulesets)}

    def key(line: Line) -> tuple[int, int]:
        rank = 0 if line.verdict == "fail" else 1 if line.open else 2
        return place.get(line.ruleset, len(place)), rank

    return sorted(lines, key=key)
