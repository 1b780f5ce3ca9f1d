"""Lines that are within their limit after rounding only."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.compare import rounded
from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import lines_by_assembly, tags
from envcheck.model.judged import CERTAIN, Finding, Line


def within_by_rounding(facts: Facts) -> Iterator[Finding]:
    """Passing lines whose unrounded value is over the limit."""
    for assembly, lines in lines_by_assembly(facts.lines, facts.project).items():
        groups: dict[tuple[str, str, float], list[Line]] = {}
        for line in lines:
            own = line.comparison
            if own is not None and own.by_rounding and line.verdict == "pass" and not line.group:
                cell = line.limit.id if line.limit is not None else ""
                groups.setdefault((line.ruleset, cell, own.value), []).append(line)
        for members in groups.values():
            yield _finding(facts, assembly, members)


def _finding(facts: Facts, assembly: str, lines: list[Line]) -> Finding:
    own = lines[0].comparison
    assert own is not None, "only compared lines are grouped"
    ruleset = facts.rulesets[lines[0].ruleset]
    clause = f" by {ruleset.rounding_clause}" if ruleset.rounding_clause else ""
    limit = f"{own.limit:.{own.decimals}f}"
    over = "over" if own.sense == "max" else "short of"
    return Finding(
        "within-by-rounding",
        "N",
        assembly,
        facts.project.assemblies[assembly].sheet,
        f"{tags(lines)}: {rounded(own.value, own.decimals + 2)} unrounded, {over} {limit}; "
        f"{rounded(own.compared, own.decimals)} as compared",
        f"rounded half-up{clause}"
        + ("" if ruleset.rounding_stated else ", which the rule set does not state"),
        "the code's rule of rounding, or a value that does not need it",
    )


CHECKS = (
    Check("within-by-rounding", "Within the limit by rounding only", within_by_rounding, CERTAIN),
)
