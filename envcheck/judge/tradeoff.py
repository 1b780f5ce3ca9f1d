"""The trade-off: sum of U A, C A and F P as drawn against the same sum by the table.

It is closed while a line in it is undecided. Where the project elects it, its lines carry the
verdict of the sum; else the sum is information.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from math import fsum

from envcheck.judge.charges import charges, uncounted
from envcheck.judge.facts import fact_of
from envcheck.judge.sums import COMPARED, HEAT_FLOW, OVER_R, Taken, by_itself, lacks, part
from envcheck.model.judged import Comparison, Group, Line, Part, Ratio
from envcheck.model.patterns import in_words, matches
from envcheck.model.project import Project, RuleSetChoice
from envcheck.model.ruleset import RuleSet, TradeOff
from envcheck.units import convert, label

TERMS = {
    "U_A": ("U_assembly", "U_product"),
    "C_A": ("C_factor",),
    "F_P": ("F_factor",),
    "A_over_R": OVER_R,
}
"""Term of a rule -> metrics whose lines it sums."""
SAME = 1e-12
"""Share by which two sums may differ and still be equal: binary noise."""


def elects(choice: RuleSetChoice) -> bool:
    """Whether the project asks for the trade-off of this rule set."""
    return choice.path == "trade_off"


def trade_offs(
    lines: Sequence[Line],
    project: Project,
    ruleset: RuleSet,
    choice: RuleSetChoice,
    measured: Sequence[Ratio],
) -> list[Taken]:
    """A sum for each class of spaces for which the code offers one."""
    rule = ruleset.tradeoff
    if rule is None or not rule.taken:
        return [_not_offered(lines, ruleset, choice)] if elects(choice) else []
    by_class: dict[str, list[Line]] = {name: [] for name in _classes(rule, ruleset)}
    unknown: list[Line] = []
    for line in lines:
        if line.metric in HEAT_FLOW and _belongs(line, rule) and not by_itself(line):
            name = _class(line, rule, project, ruleset)
            if name is None:
                unknown.append(line)
            elif name in by_class:
                by_class[name].append(line)
    held = {name: members for name, members in by_class.items() if members}
    if unknown and not held:
        held = {"": []}
    return [
        _sum(name, members, unknown, project, ruleset, choice, measured)
        for name, members in held.items()
    ]


def _classes(rule: TradeOff, ruleset: RuleSet) -> tuple[str, ...]:
    return rule.classes or (ruleset.dimensions[rule.per].values if rule.per else ("",))


def _class(line: Line, rule: TradeOff, project: Project, ruleset: RuleSet) -> str | None:
    """The word that parts the building, or None where nobody states it."""
    if not rule.per:
        return ""
    dimension = ruleset.dimensions[rule.per]
    known = fact_of(rule.per, project.elements[line.element], project, {}, dimension)
    word = str(known.value).casefold()
    return next((v for v in dimension.values if known.usable and v.casefold() == word), None)


def _belongs(line: Line, rule: TradeOff) -> bool:
    inside = not rule.rows or any(matches(pattern, line.category) for pattern in rule.rows)
    return inside and not any(matches(pattern, line.category) for pattern in rule.left_out)


def _sum(
    name: str,
    members: Sequence[Line],
    unknown: Sequence[Line],
    project: Project,
    ruleset: RuleSet,
    choice: RuleSetChoice,
    measured: Sequence[Ratio],
) -> Taken:
    rule = ruleset.tradeoff
    assert rule is not None
    summed = {metric for term in rule.terms for metric in TERMS[term]}
    left_out = tuple((line.element, why) for line in members if (why := _outside(line, summed)))
    inside = [line for line in members if not _outside(line, summed)]
    lacking = [(line, _open(line, project, rule)) for line in inside]
    parts = tuple(part(line, project) for line, why in lacking if not why)
    waits = [why for _, why in lacking if why]
    waits += [f"the {rule.per.replace('_', ' ')} of {line.element}" for line in unknown]
    categories = {line.element: line.category for line in inside}
    waits += uncounted(rule, parts, categories, measured)
    charged = charges(rule, parts, categories, measured)
    drawn = fsum((*(p.drawn for p in parts), *(c.amount for c in charged if c.to == "drawn")))
    table = fsum((*(p.table for p in parts), *(c.amount for c in charged if c.to == "table")))
    held = _held(drawn, table, ruleset.units)
    group = Group(
        kind="trade_off",
        name=name,
        ruleset=ruleset.id,
        decides=choice.decides,
        clause=rule.clause,
        elected=elects(choice),
        state=_state(rule, waits, parts, held),
        parts=parts,
        drawn=drawn,
        table=table,
        waits=tuple(dict.fromkeys(waits)),
        left_out=left_out,
        charges=tuple(charged),
        rule="; ".join(filter(None, (rule.rule, rule.say))),
    )
    carrying = tuple(line for line in (*inside, *unknown) if line.verdict in COMPARED)
    settled = held if group.state in COMPARED else None
    return Taken(group, carrying, settled, _reasons(group, rule))


def _outside(line: Line, summed: Iterable[str]) -> str:
    """Why a line has no place in the sum; empty where it has one, decided or not."""
    if line.verdict == "no_requirement":
        return line.reasons[0] if line.reasons else "no requirement"
    if line.metric == "R_insulation" or line.metric in summed:
        return ""
    return f"{line.metric.replace('_', ' ')} is no term of the sum"


def _open(line: Line, project: Project, rule: TradeOff) -> str:
    """What the sum waits for of one line; empty where it is decided.

    A row that an area cap closes is decided here where the rule charges what is above the cap.
    """
    if line.metric == "R_insulation":
        return f"a U-factor by the table for {line.element}, whose row asks for R-values"
    if line.verdict == "path_closed" and rule.charges and line.comparison is not None:
        line = line._replace(verdict="fail")
    return lacks(line, project)


def _held(drawn: float, table: float, units: str) -> Comparison:
    """The two sums, given in W/K, compared unrounded; equal sums are within."""
    unit = label("point_transmittance", units)
    shown, limit = convert(drawn, unit), convert(table, unit)
    within = drawn <= table + SAME * abs(table)
    return Comparison(shown, shown, limit, 0, unit, "max", within, False, limit - shown)


def _state(rule: TradeOff, waits: Sequence[str], parts: Sequence[Part], held: Comparison) -> str:
    if waits or not parts:
        return "not_decided"
    if rule.supported == "partly":
        return "official_decides"
    return "pass" if held.within else "fail"


def _reasons(group: Group, rule: TradeOff) -> tuple[str, ...]:
    spaces = f" for {in_words(group.name)} spaces" if group.name else ""
    by = f" by {group.clause}" if group.clause else ""
    if group.waits:
        more = f" and {len(group.waits) - 1} more" if len(group.waits) > 1 else ""
        return (f"the trade-off{by}{spaces} waits for {group.waits[0]}{more}",)
    if not group.parts:
        return (f"the trade-off{by}{spaces} has no line in it",)
    if group.state == "official_decides":
        return (f"the trade-off{by}{spaces} holds more than its sum: {rule.say or rule.rule}",)
    return (f"trade-off{by}{spaces}; worst contributor {group.worst.element}",)


def _not_offered(lines: Sequence[Line], ruleset: RuleSet, choice: RuleSetChoice) -> Taken:
    """The project elects a sum that the rule set does not offer, or that is not taken here."""
    offers = "is not computed here" if ruleset.tradeoff else "is not offered"
    why = f"the project elects a trade-off, which {offers} by {ruleset.title}"
    group = Group(
        "trade_off", "", ruleset.id, choice.decides, "", True, "not_decided", (), 0.0, 0.0, (why,)
    )
    members = tuple(
        line
        for line in lines
        if line.metric in HEAT_FLOW and line.verdict in COMPARED and not by_itself(line)
    )
    return Taken(group, members, None, (why,))
