"""Vapour pressures, and condensation and drying at faces, against sums by hand and other means."""

from __future__ import annotations

import numpy as np
import psychrolib
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.optimize import lsq_linear

from envcheck.model.vapour import excess_at, saturation_pressure, saturation_temperature
from envcheck.solve.methods.iso13788_condensation import (
    month_of,
    parts_of,
    rate,
    starts,
    touching,
    year_from,
)

psychrolib.SetUnitSystem(psychrolib.SI)
DRY = ((0.0, 208.0), (10.0, 1500.0), (12.0, 1168.0))
DAMP = ((0.0, 208.0), (10.0, 300.0), (12.0, 1168.0))


@pytest.mark.parametrize("temperature", [-20.0, -10.0, -5.0, 0.0, 5.0, 10.0, 15.0, 20.0, 30.0])
def test_saturation_against_psychrolib(temperature: float) -> None:
    """The formulas of the standard and those of ASHRAE's handbook agree to 0.6 %."""
    expected = psychrolib.GetSatVapPres(temperature)
    assert saturation_pressure(temperature) == pytest.approx(expected, rel=6e-3)


@given(st.floats(-40.0, 60.0))
def test_temperature_of_saturation_is_the_inverse(temperature: float) -> None:
    back = saturation_temperature(saturation_pressure(temperature))
    assert back == pytest.approx(temperature, abs=1e-9)


def test_excess_falls_to_nothing_at_20_degrees() -> None:
    outdoors = [-10.0, 0.0, 5.0, 10.0, 20.0, 25.0]
    assert [excess_at(800.0, each) for each in outdoors] == [800.0, 800.0, 600.0, 400.0, 0.0, 0.0]


def test_thick_layers_are_cut() -> None:
    assert [parts_of(r) for r in (0.0, 0.25, 0.2501, 1.0, 3.34)] == [1, 1, 2, 4, 14]


def test_one_plane_by_hand() -> None:
    """2e-10 (868 / 2 - 92 / 10) = 8.496e-8 kg/(m2 s); in 60 days 0.44043 kg/m2."""
    (change,) = month_of(DAMP, {}, 60.0)
    assert (change.face, change.part, change.days) == (1, 1, 60.0)
    assert change.change == pytest.approx(8.496e-8 * 60 * 86400, rel=1e-12)
    assert change.change == pytest.approx(0.44043, abs=5e-6)
    assert month_of(DRY, {}, 60.0) == []


def test_a_wet_face_dries_to_both_sides_and_is_done_within_the_month() -> None:
    """2e-10 (-332 / 2 - 1292 / 10) = -5.904e-8 kg/(m2 s): 0.051 kg/m2 take 9.9979 days."""
    (change,) = month_of(DRY, {1: 0.051}, 31.0)
    assert change.days == pytest.approx(0.051 / (5.904e-8 * 86400), rel=1e-12)
    assert change.days == pytest.approx(9.9979, abs=5e-5)
    assert (change.after, change.change) == (0.0, pytest.approx(-0.051))
    (change,) = month_of(DRY, {1: 1.0}, 31.0)
    assert change.after == pytest.approx(1.0 - 5.904e-8 * 31 * 86400)


def test_where_one_of_two_faces_dries_the_other_goes_on_alone() -> None:
    points = ((0.0, 800.0), (1.0, 1000.0), (2.0, 900.0), (3.0, 800.0))
    found = month_of(points, {1: 0.01, 2: 0.5}, 31.0)
    first = 2e-10 * ((900 - 1000) / 1 - (1000 - 800) / 1)
    assert [(c.face, c.part) for c in found] == [(1, 1), (2, 1), (2, 2)]
    assert found[0].days == pytest.approx(0.01 / -first / 86400)
    alone = 2e-10 * ((800 - 900) / 1 - (900 - 800) / 2)
    assert found[2].change == pytest.approx(alone * 86400 * (31 - found[0].days))
    assert found[2].outer == points[0]


@st.composite
def profiles(draw: st.DrawFn) -> tuple[tuple[float, float], ...]:
    count = draw(st.integers(3, 9))
    steps = draw(st.lists(st.floats(0.05, 20.0), min_size=count, max_size=count))
    pressures = draw(st.lists(st.floats(200.0, 3000.0), min_size=count, max_size=count))
    return tuple(zip(np.cumsum(steps).tolist(), pressures, strict=True))


@given(profiles())
def test_profile_against_an_obstacle_problem(points: tuple[tuple[float, float], ...]) -> None:
    """The pressure line dissipates least below saturation: least squares with bounds."""
    sd, most = np.array(points).T
    weights = 1.0 / np.sqrt(np.diff(sd))
    slopes = np.diff(np.eye(len(sd)), axis=0) * weights[:, None]
    inner = slopes[:, 1:-1]
    ends = -slopes[:, [0, -1]] @ most[[0, -1]]
    solved = lsq_linear(inner, ends, bounds=(-np.inf, most[1:-1]), tol=1e-14).x
    line = touching(points)
    drawn = np.interp(sd, sd[line], most[line])
    assert drawn[1:-1] == pytest.approx(solved, abs=0.5)
    assert (drawn <= most + 1e-9 * most).all()


@given(profiles(), st.lists(st.floats(0.0, 2.0), min_size=7, max_size=7))
def test_water_is_kept(points: tuple[tuple[float, float], ...], held: list[float]) -> None:
    """What comes in at one surface less what leaves at the other is what collects; none is made."""
    inner = range(1, len(points) - 1)
    before = {face: amount for face, amount in zip(inner, held, strict=False) if amount > 0.0}
    changes = month_of(points, before, 30.0)
    after = dict(before)
    for change in changes:
        after[change.face] = after.get(change.face, 0.0) + change.change
        assert after[change.face] == pytest.approx(change.after, abs=1e-9)
        g = rate(change.outer, change.at, change.inner) * 86400 * change.days
        assert change.change == pytest.approx(g, abs=1e-12)
    assert all(amount >= -1e-9 for amount in after.values())
    parts: dict[int, float] = {}
    for change in changes:
        parts[change.part] = change.days
    assert sum(parts.values()) <= 30.0 + 1e-9


def test_the_count_starts_where_condensation_starts() -> None:
    assert starts([DRY] * 12) == []
    assert starts([DAMP] * 12) == [0]
    months = [DAMP] * 2 + [DRY] * 8 + [DAMP] * 2
    assert starts(months) == [10]
    year = year_from(10, months, [30.0] * 12)
    assert [month for month, _ in year][:3] == [10, 11, 0]
    gained, lost = 8.496e-8 * 30 * 86400, 5.904e-8 * 30 * 86400
    assert year[3][1][0].after == pytest.approx(4 * gained)
    assert year[4][1][0].after == pytest.approx(4 * gained - lost)
    assert 4 * gained < 8 * lost
    assert year[-1][1] == []
