"""Drawn details: a flank that is not the assembly it names, a wrong length, a cut too near."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import length, percent, resistance, system
from envcheck.model.judged import CERTAIN, LIKELY, Finding
from envcheck.model.solved import Solved

if TYPE_CHECKING:
    from envcheck.model.details import Detail, SolvedDetail, SolvedFlank

DIFFERS = 0.02
"""Share by which the layers at a cut may differ from those of the assembly (no source)."""
UNEVEN = 0.03
"""Share by which the flow at a cut may differ from that of the layers alone (no source)."""
SAME_LENGTH = 1e-3
"""m"""


def _flanks(facts: Facts) -> Iterator[tuple[Detail, SolvedDetail, SolvedFlank]]:
    for name, solved in facts.details.items():
        for flank in solved.flanks:
            yield facts.project.details[name], solved, flank


def flank_differs(facts: Facts) -> Iterator[Finding]:
    """Hold the layers at each cut against the assembly that they stand for, films left out."""
    units = system(facts.project, facts.rulesets)
    for detail, _, flank in _flanks(facts):
        ends = _without_films(facts.solved.get(flank.assembly))
        if ends is None:
            continue
        least, most = ends
        if least * (1.0 - DIFFERS) <= flank.resistance <= most * (1.0 + DIFFERS):
            continue
        near = least if flank.resistance < least else most
        yield Finding(
            "flank-differs",
            "W",
            f"{detail.id} {flank.assembly}",
            detail.sheet,
            f"{resistance(flank.resistance, units)} of layers at the {flank.cut} cut, "
            f"{resistance(near, units)} in {flank.assembly} "
            f"({percent(flank.resistance / near - 1.0)})",
            "the detail shows another construction, or leaves out the framing; its psi is that of "
            "the drawing, what else differs is in neither value",
            f"the layers of {flank.assembly} at the {flank.cut} edge of the detail",
        )


def _without_films(solved: Solved | None) -> tuple[float, float] | None:
    """Least and most resistance of an assembly from surface to surface, m2 K/W."""
    if solved is None or solved.setting.metric != "U_assembly" or solved.clear is None:
        return None
    films = solved.setting.outside_film + solved.setting.inside_film
    ends = [solved.clear]
    if solved.low is not None and solved.high is not None:
        ends += [solved.low - solved.added + solved.unsure, solved.high - solved.added]
    return 1.0 / max(ends) - films, 1.0 / min(ends) - films


def flank_length(facts: Facts) -> Iterator[Finding]:
    """Lengths that are those of the other measuring basis."""
    units = system(facts.project, facts.rulesets)
    for detail, _, flank in _flanks(facts):
        outside = detail.measured == "outside"
        own, other = flank.face_outside, flank.face_inside
        own, other = (own, other) if outside else (other, own)
        if abs(flank.length - own) <= SAME_LENGTH or abs(flank.length - other) > SAME_LENGTH:
            continue
        face, wrong = ("outer", "inner") if outside else ("inner", "outer")
        yield Finding(
            "flank-length",
            "W",
            f"{detail.id} {flank.assembly}",
            detail.sheet,
            f"{length(flank.length, units)} at the {flank.cut} cut is as long as the {wrong} face; "
            f"the {face} face is {length(own, units)} long",
            f"the detail is measured {detail.measured}, and this length is not",
            f"the length of the {face} face, or 'measured' as it is",
        )


def cut_too_near(facts: Facts) -> Iterator[Finding]:
    """Cuts at which the heat flow still feels the junction."""
    for detail, _, flank in _flanks(facts):
        if abs(flank.even - 1.0) <= UNEVEN:
            continue
        yield Finding(
            "cut-too-near",
            "W",
            f"{detail.id} {flank.assembly}",
            detail.sheet,
            f"the heat flow at the {flank.cut} cut differs by {percent(flank.even - 1.0)} from "
            "that of the layers alone",
            "the cut lies too near to the junction: its adiabatic plane changes the flow",
            "a drawing that reaches further: 1 m, or three times the thickness of the assembly",
        )


CHECKS = (
    Check("flank-differs", "Detail shows another assembly", flank_differs, LIKELY),
    Check("flank-length", "Detail measured the other way", flank_length, LIKELY),
    Check("cut-too-near", "Cut too near to the junction", cut_too_near, CERTAIN),
)
