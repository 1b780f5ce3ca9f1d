"""Stated ranges: the interval encloses every choice, and is that of both ends."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.model.layers import MaterialLayer
from envcheck.model.project import Assembly, Fill, Member
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Solved
from envcheck.solve.assembly import solve
from envcheck.solve.bracket import narrow
from envcheck.solve.ranges import LEAST, MOST, at_end, stated, with_range
from tests.solve.samples import STEEL, WOOD, WOOL, XPS, assembly, framed, plane, setting
from tests.solve.samples import stated as stated_layer
from tests.solve.test_invariants import few
from tests.solve.test_why import CHANNEL

LOOSE = WOOL._replace(span=(0.034, 0.040))
BOARD = MaterialLayer("material", "board", 1, XPS, 0.04, (0.036, 0.044))
LINING = stated_layer("lining", 0.08)._replace(span=(0.05, 0.11))
WALL = assembly(
    BOARD, framed("studs", 0.14, Member(WOOD, 0.038, 0.4), Fill(material=LOOSE)), LINING
)


def by(method: str, of: Assembly) -> Solved:
    return solve(of, setting(method=method), Conventions())


def ranged(method: str, of: Assembly) -> Solved:
    return with_range(of, by(method, of), lambda changed: by(method, changed))


def test_ends_of_a_wall_in_series_by_hand() -> None:
    # R: films 0.17; 40 mm of k 0.04 with 0.035..0.05: 0.8 to 1.142857; 0.08 with 0.05..0.11.
    board = plane("board", XPS._replace(conductivity=0.04, span=(0.035, 0.05)), 0.04)
    found = ranged("series", assembly(board, LINING)).ranged
    assert found is not None and found.proven
    by_hand = (1 / (0.17 + 0.04 / 0.035 + 0.11), 1 / (0.17 + 0.8 + 0.05))
    assert (found.low, found.high) == pytest.approx(by_hand, rel=1e-12)
    assert [(i.quantity, i.title, i.low, i.high) for i in found.inputs] == [
        ("conductivity", "XPS", 0.035, 0.05),
        ("resistance", "lining", 0.05, 0.11),
    ]


@pytest.mark.parametrize("method", ["parallel_path", "isothermal_planes", "weighted"])
@few
@given(st.floats(0, 1), st.floats(0, 1), st.floats(0, 1))
def test_the_interval_holds_every_choice(method: str, a: float, b: float, c: float) -> None:
    found = ranged(method, WALL).ranged
    assert found is not None
    wool = WOOL._replace(conductivity=0.034 + 0.006 * a)
    chosen = assembly(
        plane("board", XPS, 0.036 + 0.008 * b),
        framed("studs", 0.14, Member(WOOD, 0.038, 0.4), Fill(material=wool)),
        stated_layer("lining", 0.05 + 0.06 * c),
    )
    value = by(method, chosen).value
    assert value is not None
    assert found.low * (1 - 1e-12) <= value <= found.high * (1 + 1e-12)


def test_without_ranges_the_solution_is_the_same_object() -> None:
    plain = assembly(plane("board", XPS, 0.04))
    solved = by("series", plain)
    assert with_range(plain, solved, lambda _: pytest.fail("solved again")) is solved


def test_both_ends_of_a_section_are_narrowed() -> None:
    steel = STEEL._replace(span=(45.0, 62.0))
    of = assembly(
        framed("studs", 0.092, Member(steel, 0.041, 0.406, CHANNEL), Fill(material=WOOL)),
        plane("inner", WOOD, 0.0127),
    )

    def bounded(one: Assembly) -> Solved:
        wide = by("two_dimensional", one)
        return narrow(one, wide.setting, Conventions(), wide, 1e-3)

    nominal = bounded(of)
    found = with_range(of, nominal, bounded).ranged
    assert found is not None and found.proven
    assert found.low == bounded(at_end(of, LEAST)).low
    assert found.high == bounded(at_end(of, MOST)).high
    assert nominal.low and nominal.high
    assert found.low < nominal.low < nominal.high < found.high
    assert found.high / found.low < 1.1


def test_a_thickness_in_a_section_is_not_called_proven() -> None:
    of = assembly(
        framed("studs", 0.092, Member(STEEL, 0.041, 0.406, CHANNEL), Fill(material=WOOL)), BOARD
    )
    found = ranged("two_dimensional", of).ranged
    assert found is not None and not found.proven
    assert ranged("isothermal_planes", of).ranged.proven


def test_an_end_that_has_no_value_leaves_the_whole_undecided() -> None:
    of = assembly(BOARD)

    def lost(changed: Assembly) -> Solved:
        return by("series", changed)._replace(value=None, missing=("a row of a table",))

    found = with_range(of, by("series", of), lost)
    assert found.value is None
    assert found.missing == (
        "a value at the end of the stated ranges with the least heat flow: a row of a table",
    )


def test_every_range_is_named_once_and_none_is_left_at_an_end() -> None:
    twice = assembly(plane("a", LOOSE, 0.1), plane("b", LOOSE, 0.1), BOARD)
    assert len(set(stated(twice))) == 2
    for end in (LEAST, MOST):
        assert not list(stated(at_end(twice, end)))
