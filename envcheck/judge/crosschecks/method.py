"""Verdicts that turn with the method of calculation."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.compare import rounded
from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import lines_by_assembly, method, tags
from envcheck.model.judged import CERTAIN, Comparison, Finding, Line


def hangs_on_method(facts: Facts) -> Iterator[Finding]:
    """Lines whose bracket and prescribed value fall on two sides of the limit."""
    for assembly, lines in lines_by_assembly(facts.lines, facts.project).items():
        groups: dict[tuple[str, str, str], list[Line]] = {}
        for line in lines:
            if "method" in line.flags and line.verdict in ("pass", "fail") and not _by_labels(line):
                cell = line.limit.id if line.limit is not None else ""
                value = str(line.solved.value if line.solved is not None else None)
                groups.setdefault((line.ruleset, cell, value), []).append(line)
        for members in groups.values():
            yield from _finding(facts, assembly, members)


def _by_labels(line: Line) -> bool:
    """The line passes by the R-value path, whatever its U-factor."""
    return any(path.path == "insulation" and path.state == "pass" for path in line.paths)


def _finding(facts: Facts, assembly: str, lines: list[Line]) -> Iterator[Finding]:
    first = lines[0]
    own, low, high, solved = first.own or first.comparison, first.low, first.high, first.solved
    if own is None or low is None or high is None or solved is None:
        return
    setting = solved.setting
    how = method(setting.method)
    refused = " or ".join(method(name) for name in setting.refused)
    calm = first.verdict == "pass"
    yield Finding(
        "hangs-on-method",
        "N" if calm else "W",
        assembly,
        facts.project.assemblies[assembly].sheet,
        f"{tags(lines)}: {_shown(own, own)} by {how}, {_state(own)} {_limit(first, own)}; "
        f"the drawn pieces lie between {_shown(low, own)} and {_shown(high, own)}, "
        f"{_side(low, high)}",
        (
            f"within its limit by {how}, the method of {setting.method_from}, which decides; "
            "another method may give another verdict"
            if calm
            else f"the verdict hangs on the method, here {how} ({setting.method_from})"
        )
        + (f"; {refused} not accepted" if refused else ""),
        "nothing, as long as that method stands"
        if calm
        else "the official's word on the method, or a construction that is within its limit by "
        "either",
    )


def _shown(comparison: Comparison, digits: Comparison) -> str:
    return str(rounded(comparison.value, digits.decimals + 1))


def _limit(line: Line, comparison: Comparison) -> str:
    terms = line.limit.alternatives if line.limit is not None else ()
    return terms[0][0].text if terms else f"{comparison.limit:g}"


def _state(comparison: Comparison) -> str:
    if comparison.within:
        return "within"
    return "over" if comparison.sense == "max" else "short of"


def _side(low: Comparison, high: Comparison) -> str:
    if low.within and high.within:
        return "within it"
    if not low.within and not high.within:
        return "beyond it"
    return "on both sides of it"


CHECKS = (Check("hangs-on-method", "Verdict hangs on the method", hangs_on_method, CERTAIN),)
