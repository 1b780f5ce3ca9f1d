"""What a line asks of its assembly, and the value of a lever that just meets it."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from typing import NamedTuple

from envcheck.advise.bench import Bench
from envcheck.advise.levers import Lever
from envcheck.advise.roots import CLOSE, root
from envcheck.judge.compare import decimals_of, own_term
from envcheck.model.judged import Line
from envcheck.model.metrics import METRICS
from envcheck.units import to_si

LABELLED = ("cavity_factors", "effective_layers")
"""Tables with a row for each label."""
SHY = 1e-9
"""Share by which a solved value is moved to the safe side of a limit."""


NEAR = 1e-6
"""Relative width of a root where each value is a section solved in two dimensions to 1e-3."""
SHORT_OF_HALF = 0.999
"""Share of half the last printed place by which a value may lie above a limit; half is over it."""


class Target(NamedTuple):
    """A value that a line must not exceed, SI."""

    line: Line
    value: float


def targets_of(bench: Bench, lines: Iterable[Line], by_rounding: bool) -> tuple[Target, ...]:
    """Limits of the lines, SI, and the assembly's own solution each is held against.

    A total R-value that must be reached is a U-factor that must not be exceeded.
    """
    found = {}
    for line in lines:
        own = line.own or line.comparison or line.high
        if not has_target(line) or own is None or line.limit is None:
            continue
        places = decimals_of(own_term(line.limit), bench.rulesets[line.ruleset])
        ease = 0.0
        if by_rounding and places is not None:
            ease = 0.5 * 10.0**-places * SHORT_OF_HALF
        limit = own.limit + ease if own.sense == "max" else own.limit - ease
        value = to_si(limit, own.unit) if own.unit else limit
        if own.sense == "min":
            value = 1.0 / value
        found[id(line.solved), value] = Target(line, value)
    return tuple(found.values())


def has_target(line: Line) -> bool:
    """Whether a line holds a solved value against a limit that less heat flow would meet."""
    own = line.own or line.comparison or line.high
    if own is None or line.limit is None or line.solved is None:
        return False
    metric = METRICS[line.limit.metric]
    return bool(metric.solved_as) and (own.sense == "min") == metric.reciprocal


def labels_in_tables(bench: Bench, targets: Iterable[Target]) -> list[float]:
    """Labels for which the rule sets of the targets print a figure, m2 K/W, the least first."""
    found = {
        float(label)
        for ruleset in {target.line.ruleset for target in targets}
        for table in LABELLED
        for row in bench.rulesets[ruleset].conventions.tables.get(table, ())
        if (label := row.keys.get("label"))
    }
    return sorted(found)


class NoValue(Exception):
    """The method does not decide the changed assembly."""


def short_of(bench: Bench, lever: Lever, target: Target) -> Callable[[float], float]:
    """Resistance that an assembly lacks as a function of a lever: above 0 over the target.

    On R = 1/U, which is straight or nearly so in a thickness. Errors: NoValue, when it is called.
    """

    def short(x: float) -> float:
        value = bench.value(target.line, lever.applied(x))
        if value is None or value <= 0.0:
            raise NoValue
        return 1.0 / target.value - 1.0 / value

    return short


def met(short: Callable[[float], float], lever: Lever, far: float, target: Target) -> float:
    """Where a lever between its own value and a far one just meets a target, on the safe side.

    Of a bracket that decides no closer than makes sense of its own gap.
    """
    assert target.line.solved is not None
    close = NEAR if target.line.solved.decided_by_bracket else CLOSE
    found = root(short, lever.now, far, max(abs(lever.now), 1e-3), close)
    step = SHY * max(abs(found), 1e-6) * (1.0 if lever.more else -1.0)
    for _ in range(40):
        if short(found) <= 0.0:
            break
        found += step
        step *= 2.0
    return found
