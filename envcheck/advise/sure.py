"""What a verdict hangs on: each stated number moved to the ends of its band, alone and together.

Alone: which end moves the value against the verdict, and whether it turns it. Together: all at that
end. The deciding inputs are the fewest, the strongest first, with which as stated all others
together no longer turn the verdict: only these need documents. Information, never a verdict.

The value of a network never falls where a conductivity rises (Rayleigh's monotonicity law), so that
the ends enclose what lies between; for shares, sizes and methods by coefficients that is assumed.
"""

from __future__ import annotations

from collections.abc import Sequence

from envcheck.advise.bench import Bench, lines_of
from envcheck.advise.inputs import Rows, Stated, inputs
from envcheck.advise.targets import has_target
from envcheck.judge.compare import compare, own_term
from envcheck.judge.values import of_metric
from envcheck.model.judged import Line
from envcheck.model.project import Assembly
from envcheck.model.sure import Input, Sureness

RAISING = {"conductivity": True, "resistance": False}
"""Quantities of which it is known whether more of them raises the heat flow."""


def sureness(
    bench: Bench, lines: Sequence[Line], wanted: Sequence[str], bands: Rows, classes: Rows
) -> tuple[Sureness, ...]:
    """What the verdicts of deciding lines hang on; lines of one value and limit are one entry.

    wanted: tags and assemblies; all where nothing is. bands, classes: rows of ``evidence_bands``
    and ``material_classes``.
    """
    alike: dict[tuple[object, ...], list[Line]] = {}
    for line in lines_of(bench.project, lines, wanted):
        if line.decides and line.verdict in ("pass", "fail", "too_close"):
            limit = line.limit.cell if line.limit is not None else ""
            name = bench.project.elements[line.element].assembly
            key = (name, line.metric, line.verdict, id(line.solved), line.ruleset, limit)
            alike.setdefault(key, []).append(line)
    found = []
    for own in alike.values():
        element = bench.project.elements[own[0].element]
        assembly = bench.project.assemblies[element.assembly]
        stated = inputs(assembly, bands, classes)
        found.append(_Case(bench, assembly, own, stated).told())
    return tuple(found)


class _Case:
    """Lines that share a value and a limit."""

    def __init__(
        self, bench: Bench, assembly: Assembly, lines: Sequence[Line], stated: Sequence[Stated]
    ) -> None:
        self.bench, self.assembly, self.lines, self.line = bench, assembly, tuple(lines), lines[0]
        self.stated = stated
        self.now = bench.value(self.line, assembly) if has_target(self.line) else None

    def told(self) -> Sureness:
        """The entry."""
        why = self._without()
        if why or self.now is None:
            return self._entry("without", why or "the method gives no value")
        self.within = self._within(self.now)
        worst = {place: self._end(each) for place, each in enumerate(self.stated)}
        ends = {place: end for place, (end, value) in worst.items() if value is not None}
        best = {
            place: each.low if ends[place] == each.high else each.high
            for place, each in enumerate(self.stated)
            if place in ends
        }
        against, with_it = self._all(ends), self._all(best)
        told = [self._input(each, *worst[place]) for place, each in enumerate(self.stated)]
        deciding = self._deciding(told, ends, against)
        low, high = sorted(x if x is not None else self.now for x in (against, with_it))
        state = "turns" if deciding else "settled"
        return self._entry(state, "", low, high, tuple(told), tuple(told[n] for n in deciding))

    def _entry(
        self,
        state: str,
        why: str,
        low: float | None = None,
        high: float | None = None,
        told: tuple[Input, ...] = (),
        deciding: tuple[Input, ...] = (),
    ) -> Sureness:
        return Sureness(
            self.assembly.id, self.assembly.sheet, self.lines, state, why, self.now, low, high,
            told, deciding,
        )  # fmt: skip

    def _without(self) -> str:
        """Why the inputs of the value do not decide; empty where they do."""
        own = self.line.own or self.line.comparison
        if not has_target(self.line) or own is None:
            return "a stated figure, or labels alone, are held against the limit"
        if self.line.group:
            return "the mean or sum that it stands in gives the verdict"
        if (self.line.verdict == "pass") != own.within and self.line.verdict != "too_close":
            return "another path than its value gives the verdict"
        return ""

    def _within(self, value: float) -> bool:
        limit = self.line.limit
        assert limit is not None
        ruleset = self.bench.rulesets[self.line.ruleset]
        return compare(of_metric(limit.metric, value), own_term(limit), limit, ruleset).within

    def _end(self, each: Stated) -> tuple[float, float | None]:
        """The end of a band that works against the verdict, and the value there."""
        raising = RAISING.get(each.quantity)
        if raising is not None:
            end = each.high if raising == self.within else each.low
            return end, self._value({each: end})
        tried = [(end, self._value({each: end})) for end in (each.low, each.high)]
        known = [(end, value) for end, value in tried if value is not None]
        if len(known) < len(tried):
            return each.high, None
        return (max if self.within else min)(known, key=lambda pair: pair[1])

    def _value(self, ends: dict[Stated, float]) -> float | None:
        assembly = self.assembly
        for each, end in ends.items():
            assembly = each.put(assembly, end)
        return self.bench.value(self.line, assembly)

    def _all(self, ends: dict[int, float]) -> float | None:
        return self._value({self.stated[place]: end for place, end in ends.items()})

    def _input(self, each: Stated, end: float, value: float | None) -> Input:
        assert self.now is not None
        effect = None if value is None else value / self.now - 1.0
        alone = value is not None and self._within(value) != self.within
        return Input(
            each.what, each.unit, each.now, each.low, each.high, each.basis, each.band_source,
            each.evidence, each.source, effect, alone,
        )  # fmt: skip

    def _deciding(
        self, told: Sequence[Input], ends: dict[int, float], against: float | None
    ) -> list[int]:
        """The fewest inputs, the strongest first, without which the others turn nothing."""
        if not self._turned(against):
            return []
        order = sorted(ends, key=lambda place: -abs(told[place].effect or 0.0))
        few, many = 1, len(order)
        while few < many:
            middle = (few + many) // 2
            rest = {place: ends[place] for place in order[middle:]}
            if self._turned(self._all(rest)):
                few = middle + 1
            else:
                many = middle
        return order[:few]

    def _turned(self, value: float | None) -> bool:
        return value is not None and self._within(value) != self.within
