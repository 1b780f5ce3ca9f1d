"""Lines judged together: area-weighted means, and sums as drawn against the table."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from decimal import Decimal
from math import fsum
from typing import NamedTuple

from envcheck import units
from envcheck.model.judged import Charge, Group, Part
from envcheck.model.project import Project
from envcheck.report import numbers, said, wording
from envcheck.report.inert import clean
from envcheck.report.parts import Pair
from envcheck.report.rows import Figure

NEAR = 0.006
"""No number farther than this from one of two decimals is rounded to it."""


class PartView(NamedTuple):
    """Elements of one assembly in a sum: amount times value, amount times limit."""

    assembly: str
    built_as: str
    elements: tuple[str, ...]
    symbol: str
    amount: Figure
    value: Figure
    limit: Figure
    drawn: Figure
    table: Figure
    difference: Figure
    """As drawn less by the table; more than 0 is over."""
    verdict_text: str
    """Their own, beside that of the group."""


class GroupView(NamedTuple):
    """A mean or a sum."""

    rule_set: str
    kind: str
    """``mean`` or ``trade_off``"""
    group: str
    clause: str
    title: str
    elected: bool
    state: str
    state_text: str
    sum: str
    drawn: Figure
    """A mean: its value; a sum: as drawn."""
    table: Figure
    """The limit, or the sum by the table."""
    worst: str
    cap: str
    rule: str
    waits: tuple[str, ...]
    left_out: tuple[Pair, ...]
    charges: tuple[str, ...]
    parts: tuple[PartView, ...]
    """Of a sum, the worst contributor first."""


def build(groups: Iterable[Group], project: Project, system: str) -> tuple[GroupView, ...]:
    """Write means and sums."""
    return tuple(
        (_mean if group.kind == "mean" else _sum)(_common(group, system), group, project, system)
        for group in groups
    )


def _common(group: Group, system: str) -> GroupView:
    """What both kinds say the same way."""
    clause = f" ({clean(group.clause)})" if group.clause else ""
    figure = Figure("", "")
    return GroupView(
        rule_set=clean(group.ruleset),
        kind=group.kind,
        group=clean(group.name),
        clause=clean(group.clause),
        title=said.group(group.kind, group.name) + clause,
        elected=group.elected,
        state=group.state,
        state_text="" if group.elected else wording.NOT_ELECTED,
        sum="",
        drawn=figure,
        table=figure,
        worst="",
        cap=clean(group.cap),
        rule=clean(group.rule),
        waits=tuple(map(clean, group.waits)),
        left_out=tuple(Pair(clean(tag), clean(why)) for tag, why in group.left_out),
        charges=tuple(_charge(charge, system) for charge in group.charges),
        parts=(),
    )


# --------------------------------------------------------------------------------------- means


def _mean(view: GroupView, group: Group, project: Project, system: str) -> GroupView:
    if not group.parts or group.waits:
        return view
    metric = group.parts[0].metric
    places, unit = numbers.decimals(metric, system), numbers.unit(metric, system)
    value = numbers.fixed(_shown(group.value, metric, system), places)
    worst = group.worst
    return view._replace(
        sum=f"{_weighted(group, system, value, places)} = {value} {unit}".rstrip(),
        drawn=Figure(value, unit),
        table=Figure(numbers.trimmed(_shown(worst.limit, metric, system), places), unit),
        worst=f"{clean(worst.element)} with {numbers.symbol(metric)} "
        + numbers.fixed(_shown(worst.value, metric, system), places),
    )


def _shown(value: float, metric: str, system: str) -> float:
    return numbers.in_system(value, numbers.quantity(metric), system)


def _weighted(group: Group, system: str, value: str, places: int) -> str:
    """Write sum(A U) / sum(A) with as few digits as give the printed mean."""
    text = ""
    for digits in (4, 6, 9):
        pairs = [
            (
                part.element,
                numbers.significant(_amount(part, system), max(digits, 6)),
                numbers.significant(_shown(part.value, part.metric, system), digits),
            )
            for part in group.parts
        ]
        total = sum(float(area) for _, area, _ in pairs)
        terms = " + ".join(f"{area} * {u} [{clean(tag)}]" for tag, area, u in pairs)
        text = f"({terms}) / {numbers.significant(total, 9)}"
        weighted = sum(float(area) * float(u) for _, area, u in pairs)
        if total and numbers.fixed(weighted / total, places) == value:
            break
    return text


def _amount(part: Part, system: str) -> float:
    quantity = "run" if part.metric == "F_factor" else "area"
    return numbers.in_system(part.amount, quantity, system)


# ---------------------------------------------------------------------------------- trade-offs


def _sum(view: GroupView, group: Group, project: Project, system: str) -> GroupView:
    unit = units.label("point_transmittance", system)
    drawn, table = (
        numbers.in_system(value, "point_transmittance", system)
        for value in (group.drawn, group.table)
    )
    first, second = numbers.two_sums(drawn, table)
    whole = "of the decided lines: " if group.waits else ""
    elected = wording.ELECTED if group.elected else wording.NOT_ELECTED
    return view._replace(
        state_text=f"{wording.GROUP_STATES[group.state]}; {elected}",
        sum=f"{whole}as drawn {first} / by the table {second} {unit}" if group.parts else "",
        drawn=Figure(first, unit),
        table=Figure(second, unit),
        worst=clean(group.worst.element) if group.parts else "",
        parts=_parts(group.parts, project, system),
    )


def _parts(parts: Sequence[Part], project: Project, system: str) -> tuple[PartView, ...]:
    """Parts of one assembly, value and limit together, the worst contributor first."""
    found: dict[tuple[str, str, float, float, str], list[Part]] = {}
    for part in parts:
        key = (part.assembly, part.metric, part.value, part.limit, part.verdict)
        found.setdefault(key, []).append(part)
    sums = [
        members[0]._replace(amount=fsum(part.amount for part in members))
        if len(members) > 1
        else members[0]
        for members in found.values()
    ]
    views = [
        (whole.table - whole.drawn, number, _part(whole, members, project, system))
        for number, (whole, members) in enumerate(zip(sums, found.values(), strict=True))
    ]
    return tuple(view for _, _, view in sorted(views, key=lambda each: each[:2]))


def _part(whole: Part, members: Sequence[Part], project: Project, system: str) -> PartView:
    assembly = project.assemblies.get(whole.assembly)
    unit, flow = numbers.unit(whole.metric, system), numbers.flow_unit(whole.metric, system)
    drawn, table = numbers.heat_flow(whole.drawn, system), numbers.heat_flow(whole.table, system)
    amount = numbers.trimmed(_amount(whole, system), 2)
    limit = clean(whole.printed)
    if numbers.system_of(whole.unit) != system:
        limit = _enough(whole.limit, amount, table, whole.metric, system)
    length = "run" if whole.metric == "F_factor" else "area"
    return PartView(
        assembly=clean(whole.assembly),
        built_as=clean(assembly.title) if assembly else "",
        elements=tuple(clean(part.element) for part in members),
        symbol=numbers.symbol(whole.metric),
        amount=Figure(amount, units.label(length, system)),
        value=Figure(_enough(whole.value, amount, drawn, whole.metric, system), unit),
        limit=Figure(limit, unit),
        drawn=Figure(drawn, flow),
        table=Figure(table, flow),
        difference=Figure(numbers.signed(float(Decimal(drawn) - Decimal(table)), 2), flow),
        verdict_text=wording.VERDICTS[whole.verdict],
    )


def _enough(value: float, amount: str, product: str, metric: str, system: str) -> str:
    """Write a value with as few digits as give the printed product."""
    shown, text = _shown(value, metric, system), ""
    times, wanted = float(amount), float(product)
    for digits in range(2, 13):
        text = numbers.significant(shown, digits)
        near = abs(float(text) * times - wanted) < NEAR
        if near and numbers.fixed(float(text) * times, 2) == product:
            return text
    return text


def _charge(charge: Charge, system: str) -> str:
    """Say what is charged for openings above their allowance."""
    area = f"{numbers.area(charge.excess, system)} {units.label('area', system)}"
    glazing, opaque = (
        numbers.significant(numbers.in_system(u, "u_factor", system), 5)
        for u in (charge.glazing, charge.opaque)
    )
    flow = numbers.in_system(charge.amount, "point_transmittance", system)
    text = f"{numbers.signed(flow, 2)} {units.label('point_transmittance', system)}"
    side, by = ("as drawn", "mean values")
    if charge.to == "table":
        side, by = ("by the table", "mean limits")
    ratio = wording.RATIOS.get(charge.ratio, wording.plain(charge.ratio))
    return (
        f"{ratio}: {area} above the allowance; {text} {side}, that area at the difference of "
        f"the {by} of openings {glazing} and of what they stand in {opaque}"
    )
