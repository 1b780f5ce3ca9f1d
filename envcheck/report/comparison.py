"""The last lines of a worksheet: rounding, limit, room left, in the printed unit."""

from __future__ import annotations

from envcheck.model.judged import Comparison, Line
from envcheck.model.ruleset import RuleSet
from envcheck.report import numbers, said, worksheet


def sums(line: Line, ruleset: RuleSet | None, system: str) -> tuple[str, ...]:
    """Write the comparison as sums that a calculator repeats; empty where none was made."""
    own = line.own or line.comparison
    if own is None:
        return ()
    value, converted = _value(line, own, system)
    compared, rounding = _rounded(value, own, ruleset)
    exact = numbers.significant(own.value, worksheet.OPERAND_DIGITS)
    judged, with_all_digits = _rounded(exact, own, ruleset)
    unrounded = compared == value
    if _holds(compared, own) != own.within or (not unrounded and compared != judged):
        value, converted = exact, f"{exact} with all digits carried"
        compared, rounding = judged, with_all_digits
    sign = ">=" if own.sense == "min" else "<="
    holds = "holds" if own.within else "does not hold"
    limit = said.limit_number(own)
    first, second = (value, limit) if own.sense == "min" else (limit, value)
    room = numbers.significant(float(first) - float(second), worksheet.RESULT_DIGITS)
    share = f" ({numbers.signed(100.0 * own.margin / own.limit, 1)} %)" if own.limit else ""
    return (
        *(
            [f"{numbers.symbol(line.metric)} = {converted} {own.unit}".rstrip()]
            if converted
            else []
        ),
        rounding,
        f"{compared} {sign} {limit} {own.unit}".rstrip() + f" {holds}",
        f"room left, unrounded: {first} - {second} = {room} {own.unit}".rstrip() + share,
    )


def end(name: str, bound: Comparison) -> str:
    """One end of the bracket held against the limit."""
    sign = ">=" if bound.sense == "min" else "<="
    holds = "holds" if bound.within else "does not hold"
    text = f"{said.compared(bound)} {sign} {said.limit_number(bound)} {bound.unit}".rstrip()
    return f"{name} bound: {text} {holds}"


def _rounded(value: str, own: Comparison, ruleset: RuleSet | None) -> tuple[str, str]:
    """The compared figure and the line that leads to it."""
    clause = f" ({ruleset.rounding_clause})" if ruleset and ruleset.rounding_clause else ""
    rule = ruleset.compare if ruleset else ""
    if rule == "unrounded":
        return value, f"compared unrounded: {value}{clause}"
    places = 2 if rule == "rounded_2dp" else own.decimals
    compared = numbers.fixed(float(value), places)
    noun = "decimal" if places == 1 else "decimals"
    return compared, f"{value} rounded half-up to {places} {noun}: {compared}{clause}"


def _value(line: Line, own: Comparison, system: str) -> tuple[str, str]:
    """The worksheet's result in the printed unit, and how it got there."""
    solved = line.solved
    if solved is None or not solved.steps or solved.setting.metric != line.metric:
        return numbers.significant(own.value, worksheet.RESULT_DIGITS), ""
    last = worksheet.write(solved.steps, system)[-1]
    printed = numbers.system_of(own.unit)
    value, how = last.result, ""
    if printed not in ("", system):
        quantity = numbers.quantity(line.metric)
        ratio = numbers.factor(quantity, system) / numbers.factor(quantity, printed)
        factor = numbers.significant(ratio, worksheet.OPERAND_DIGITS)
        value = numbers.significant(float(last.result) * float(factor), worksheet.RESULT_DIGITS)
        how = f"{last.result} * {factor} = {value}"
    return value, how


def _holds(compared: str, own: Comparison) -> bool:
    """Whether the printed figure meets the limit, as a reader would see it."""
    figure = float(compared)
    return figure >= own.limit if own.sense == "min" else figure <= own.limit
