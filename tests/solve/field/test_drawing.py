"""Walls drawn as sections, and the narrow bracket in a whole run."""

from __future__ import annotations

from pathlib import Path

import pytest

from envcheck.model.layers import Layer
from envcheck.model.project import Bridge
from envcheck.model.solved import Solved
from envcheck.pipeline import run
from envcheck.solve.assembly import solve
from envcheck.solve.bracket import can_narrow, narrow
from envcheck.solve.field.drawing import NotDrawn, section_of
from tests.solve.drawn import PLAIN, wall_of
from tests.solve.samples import assembly, setting
from tests.solve.test_framed import CHEEK

ROOT = Path(__file__).parent.parent.parent.parent


def narrowed(*layers: Layer) -> Solved:
    whole = assembly(*layers)
    by = setting(method="two_dimensional")
    return narrow(whole, by, PLAIN, solve(whole, by, PLAIN))


def test_section_covers_the_bay() -> None:
    wall = wall_of(*CHEEK)
    drawn = section_of(wall)
    assert sum(drawn.widths) == pytest.approx(0.6)
    assert sum(drawn.depths) == pytest.approx(sum(layer.thickness for layer in wall.layers))


def test_homogeneous_walls_are_no_section() -> None:
    with pytest.raises(NotDrawn, match="homogeneous"):
        section_of(wall_of(*(layer for layer in CHEEK if layer.kind == "material")))


def test_a_decided_bracket_gives_its_high_end() -> None:
    found = narrowed(*CHEEK)
    assert found.value == found.high
    assert found.low is not None
    assert found.high is not None
    assert found.high / found.low - 1 < 1e-3
    assert "in two dimensions" in found.bracket_note


def test_a_closer_bound_takes_the_place_of_the_first() -> None:
    by = setting(method="two_dimensional")
    whole, first = assembly(*CHEEK), narrowed(*CHEEK)
    closer = narrow(whole, by, PLAIN, first, 1e-4)
    assert closer.value is not None
    assert closer.value <= first.high
    for steps in (closer.steps, closer.hand_check):
        (stated,) = [step for step in steps if step.symbol == "U_high"]
        assert stated.value == closer.value


def test_bridges_stay_added_where_the_value_is_not_known() -> None:
    """Hand sum: .1 W/K x 2 /m2 = .2 W/(m2 K) on both bounds, whatever else is missing."""
    known = Bridge("point", "brackets", 0.1, 2.0, True, "test", "test", 1)
    unsure = known._replace(title="anchors", evidence="assumed")
    by = setting(method="two_dimensional")
    plain = assembly(*CHEEK)
    bridged = plain._replace(bridges=(known, unsure))
    without = narrow(plain, by, PLAIN, solve(plain, by, PLAIN))
    found = narrow(bridged, by, PLAIN, solve(bridged, by, PLAIN))
    assert found.value is None
    assert found.low == pytest.approx(without.low + 0.2)
    assert found.high == pytest.approx(without.high + 0.2)


def test_demo_lines_that_hang_on_the_method() -> None:
    """The invented library at review, and the invented warehouse."""
    review = run(str(ROOT / "projects/quillhaven-library/review.yaml"))
    lines = {line.element: line for line in review.judged.lines if line.metric == "U_assembly"}
    brick, girts = lines["N-W1"], lines["S-W2"]
    # The factor table says .0647, over .060; the drawn section lies within it.
    assert brick.verdict == "fail"
    assert brick.high is not None
    assert brick.high.value == pytest.approx(0.0588, abs=5e-5)
    assert "method" in brick.flags
    # Girts through the outer insulation: over by the clause and in two dimensions.
    assert girts.verdict == "fail"
    assert girts.low is not None
    assert girts.low.value > 0.060
    assert "method" not in girts.flags
    cheek = run(str(ROOT / "projects/brannvik-warehouse/renovation.yaml")).judged.lines
    (line,) = [line for line in cheek if line.element == "D-S7"]
    assert line.verdict == "pass"
    assert line.comparison is not None
    assert line.comparison.value == pytest.approx(0.2732, abs=2e-4)


def test_what_psi_holds_open_is_not_drawn_again() -> None:
    by = setting(method="two_dimensional")
    whole = assembly(*CHEEK)
    wide = solve(whole, by, PLAIN)._replace(low=0.30, high=0.31)
    assert can_narrow(wide, 1e-3)
    assert not can_narrow(wide._replace(unsure=0.01), 1e-3)
