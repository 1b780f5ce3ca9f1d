"""Cautions: what the figures say nothing about, in neutral words, with what triggered each."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import NamedTuple

from envcheck.model.judged import Judged
from envcheck.model.project import Project
from envcheck.model.ruleset import RuleSet
from envcheck.report.inert import clean
from envcheck.report.wording import listed, plain

TOPICS = {
    "moisture": (
        "Moisture",
        "More insulation, or insulation on another side, can change surface and interstitial "
        "temperatures and drying. Rain, air leakage, built-in water and vapour control are "
        "outside this report.",
    ),
    "solid_masonry": (
        "Solid masonry",
        "Insulating older masonry on the inside lowers its temperature and its drying; "
        "freeze-thaw, beam ends and embedded metal or timber need assessment by a qualified "
        "person.",
    ),
    "fire": (
        "Fire",
        "Combustible insulation, cavities and claddings are regulated separately (tests of the "
        "whole wall, thermal and ignition barriers, cavity barriers, height limits). A "
        "heat-transfer value says nothing about these.",
    ),
    "structure": (
        "Structure",
        "Thicker insulation, longer fasteners and ties, girts, brackets and roof build-ups affect "
        "loads, deflection, wind uplift, snow, drains, parapets and attachment. Have them checked.",
    ),
    "ground": (
        "Ground",
        "Exposed foundation insulation needs protection; frost, termites, drainage and radon are "
        "outside this report.",
    ),
    "electrical": (
        "Electrical and heat sources",
        "Keep the clearances required around recessed luminaires, flues, chimneys and other hot "
        "items, and combustion air; old open wiring may not be covered without inspection.",
    ),
    "hazardous": (
        "Hazardous materials",
        "Existing buildings may contain asbestos, vermiculite, lead, PCB, mould or animal waste. "
        "Do not disturb before assessment under local rules.",
    ),
    "workmanship": (
        "Workmanship",
        "Results assume that insulation fills its space without gaps or compression unless stated.",
    ),
    "steady_state": (
        "Steady state",
        "Values are for steady conditions; heat storage, sun, air leakage and equipment are not "
        "modelled.",
    ),
    "limits": (
        "Limits",
        "The limit tables may be incomplete or out of date. Check them against the official "
        "publication before relying on a result.",
    ),
}
"""Topic -> (heading, text), in the order of the page."""
ALWAYS = ("workmanship", "steady_state", "limits")
CONCEALED = ("wall.wood_frame", "wall.steel_frame", "roof.attic", "roof.rafter")
"""Categories whose cavities hold wiring and hot items, where an existing one is filled."""


class CautionText(NamedTuple):
    """One caution with what triggered it; no reasons where it always stands."""

    topic: str
    heading: str
    text: str
    reasons: tuple[str, ...]


def gather(
    project: Project, rulesets: Mapping[str, RuleSet], judged: Judged
) -> tuple[CautionText, ...]:
    """All cautions of a report, triggered ones first by topic, then those that always stand."""
    found: dict[str, dict[str, dict[str, None]]] = {topic: {} for topic in ALWAYS}
    for topic, reason, subject in _triggered(project, rulesets, judged):
        subjects = found.setdefault(topic, {}).setdefault(reason, {})
        if subject:
            subjects[subject] = None
    order = [*TOPICS, *(topic for topic in found if topic not in TOPICS)]
    return tuple(_written(topic, found[topic]) for topic in order if topic in found)


def _written(topic: str, reasons: Mapping[str, Mapping[str, None]]) -> CautionText:
    heading, text = TOPICS.get(topic, (plain(clean(topic)).capitalize(), ""))
    lines = (
        f"{listed(list(subjects))}: {reason}" if subjects else reason
        for reason, subjects in reasons.items()
    )
    return CautionText(topic, heading, text, tuple(clean(line) for line in lines))


def _triggered(
    project: Project, rulesets: Mapping[str, RuleSet], judged: Judged
) -> Iterable[tuple[str, str, str]]:
    """(topic, reason, assembly or element) of everything that the input triggers."""
    seen: set[int] = set()
    for line in judged.lines:
        if line.solved is not None and id(line.solved) not in seen:
            seen.add(id(line.solved))
            for caution in line.solved.cautions:
                name = line.solved.assembly
                yield caution.topic, caution.reason.removeprefix(f"{name}: "), name
    if project.scope in ("alteration", "change_of_use"):
        yield "hazardous", "the work is on an existing building", ""
        for element in project.elements.values():
            if element.category in CONCEALED:
                yield "electrical", "cavities of an existing building", element.tag
    for ruleset in rulesets.values():
        if ruleset.invented:
            yield "limits", f"{ruleset.id} is invented: its limits are no law anywhere", ""
        elif ruleset.status != "official":
            yield "limits", f"{ruleset.id} is not the official text", ""
