"""Lines judged together: one mechanism for area-weighted means and for trade-offs.

Where the project elects a group, its members carry the group's verdict with their own comparison
beside; where it does not, the sum is information.
"""

from __future__ import annotations

from collections.abc import Sequence

from envcheck.judge.means import means
from envcheck.judge.sums import COMPARED, Taken
from envcheck.judge.tradeoff import trade_offs
from envcheck.model.judged import Group, Line, Ratio
from envcheck.model.project import Project, RuleSetChoice
from envcheck.model.ruleset import RuleSet


def take_groups(
    lines: Sequence[Line],
    project: Project,
    ruleset: RuleSet,
    choice: RuleSetChoice,
    measured: Sequence[Ratio],
) -> tuple[list[Line], list[Group]]:
    """Take every mean and sum of one rule set; give elected members the verdict of their group."""
    traded = trade_offs(lines, project, ruleset, choice, measured)
    spoken = {id(line) for taken in traded if taken.group.elected for line in taken.members}
    taken_all = [*means(lines, project, ruleset, choice, spoken), *traded]
    carried = {
        id(line): _carry(line, taken)
        for taken in taken_all
        if taken.group.elected
        for line in taken.members
        if line.verdict in COMPARED
    }
    return [carried.get(id(line), line) for line in lines], [taken.group for taken in taken_all]


def _carry(line: Line, taken: Taken) -> Line:
    """A member with the verdict of its group."""
    return line._replace(
        verdict=taken.group.state,
        own=line.comparison,
        comparison=taken.comparison or line.comparison,
        group=taken.group.name,
        group_kind=taken.group.kind,
        reasons=taken.reasons,
    )
