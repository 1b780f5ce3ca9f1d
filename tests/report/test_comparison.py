"""The comparison of a worksheet tells what was judged, under every rule of rounding."""

from __future__ import annotations

import pytest

from envcheck.model.judged import Line
from envcheck.model.ruleset import RuleSet
from envcheck.model.solved import Operand, Step
from envcheck.report.comparison import sums
from tests.changed import changed
from tests.report.fixture import JUDGED, RULESETS

LINE = next(line for line in JUDGED.lines if line.comparison is not None and line.solved)


def lines(value: float, limit: float, within: bool, compare: str) -> tuple[str, ...]:
    """The sums of a line whose exact value (W/(m2 K)) lies near its limit."""
    own = changed(
        LINE.comparison, value=value, limit=limit, within=within, unit="W/(m2 K)", decimals=2,
        margin=limit - value, compared=value, sense="max",
    )  # fmt: skip
    step = Step("U", "", "1 / {R}", (Operand("R", 1 / value, "resistance"),), value, "u_factor")
    solved = changed(LINE.solved, steps=(step,))
    line: Line = changed(LINE, comparison=own, own=None, solved=solved)
    ruleset: RuleSet = changed(next(iter(RULESETS.values())), compare=compare)
    return sums(line, ruleset, "SI")


@pytest.mark.parametrize(
    ("value", "within", "compare"),
    [
        (0.3000004, False, "unrounded"),
        (0.2999996, True, "unrounded"),
        (0.30499996, True, "rounded_2dp"),
        (0.30499996, True, "rounded_to_printed_decimals"),
        (0.305, False, "rounded_2dp"),
    ],
)
def test_the_printed_comparison_is_true(value: float, within: bool, compare: str) -> None:
    (relation,) = [line for line in lines(value, 0.30, within, compare) if "hold" in line]
    figure, limit = map(float, relation.split(" W/")[0].split(" <= "))
    assert (figure <= limit) == within == relation.endswith(" holds")
