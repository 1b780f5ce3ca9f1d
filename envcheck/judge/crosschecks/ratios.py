"""Area ratios that a project states as a fact, against those of its surfaces."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.crosschecks.surfaces import surface_of
from envcheck.model.judged import CERTAIN, LIKELY, Finding, Ratio

WORDS = {
    "window_wall_ratio": ("windows to walls", "wall", "gross wall above grade"),
    "skylight_roof_ratio": ("skylights to roofs", "roof", "gross roof"),
}
"""Ratio -> its words, the kind of surface below the line, what stands below the line."""
SAME = 0.005
"""Share of area by which a stated ratio may miss the computed one."""


def ratio_differs(facts: Facts) -> Iterator[Finding]:
    """A stated ratio that the surfaces do not give, with the count that would give it."""
    stated = {fact.name: fact for fact in facts.project.facts}
    done: set[str] = set()
    for ratio in facts.ratios:
        fact = stated.get(ratio.name)
        if fact is None or ratio.missing or not ratio.denominator or ratio.name in done:
            continue
        done.add(ratio.name)
        if not isinstance(fact.value, float) or abs(fact.value - ratio.value) <= SAME:
            continue
        words, _, below = WORDS[ratio.name]
        slip = _slip(fact.value, ratio, facts)
        yield Finding(
            "ratio-differs",
            "E",
            words,
            fact.sheet,
            f"{fact.value * 100:.3g} % stated, {ratio.value * 100:.3g} % by the surfaces",
            slip or f"other areas were counted; by {ratio.clause} {below} stands below the line",
            f"the ratio of the openings to {below}, with the areas on the sheets",
            sure=LIKELY if slip else CERTAIN,
        )


def _slip(stated: float, ratio: Ratio, facts: Facts) -> str:
    """A wrong denominator or numerator that gives the stated ratio; empty where none does."""
    project = facts.project
    kind = WORDS[ratio.name][1]
    names = {s.name for s in project.surfaces.values() if s.kind == kind}
    below = sum(s.below_grade_area for s in project.surfaces.values() if s.kind == kind)
    every = sum(s.gross_area for s in project.surfaces.values() if s.kind == kind)
    doors = sum(
        element.net_area or 0.0
        for element in project.elements.values()
        if element.category.startswith("door.") and surface_of(element, project) in names
    )
    glass, wall = ratio.numerator, ratio.denominator
    slips = [
        ("the part below grade stands below the line", glass, wall + below),
        ("surfaces to other than outdoors stand below the line", glass, every),
        ("the net area stands below the line", glass, wall - glass),
        ("opaque doors were counted with the openings", glass + doors, wall),
    ]
    return next(
        (
            f"{words}: that gives {above / line * 100:.3g} %"
            for words, above, line in slips
            if line > 0 and abs(above / line - stated) <= SAME
        ),
        "",
    )


CHECKS = (
    Check(
        "ratio-differs",
        "Stated area ratio is not the computed one",
        ratio_differs,
        LIKELY,
    ),
)
