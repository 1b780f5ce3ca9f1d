"""A sweep in blocks gives what the function gives at once."""

from __future__ import annotations

import numpy as np
import pytest

from envcheck.solve.network import parallel, plane_wall
from envcheck.solve.sweep import sweep


def wall(thickness: float, fill: float, member: float) -> float:
    paths = (plane_wall(thickness, fill), plane_wall(thickness, member))
    return 1.0 / (0.17 + parallel((0.75, 0.25), paths))


@pytest.mark.parametrize("block", [1, 7, 64, 10_000])
def test_blocks_change_nothing(block: int) -> None:
    rng = np.random.default_rng(3)
    numbers = [rng.uniform(0.02, 0.3, (13, 11)) for _ in range(3)]
    found = sweep(wall, *numbers, block=block)
    assert found.shape == (13, 11)
    assert (found == wall(*numbers)).all()


def test_shapes_broadcast_and_a_number_stands_for_all() -> None:
    thickness = np.array([[0.1], [0.2]])
    fills = np.array([0.03, 0.04, 0.05])
    found = sweep(wall, thickness, fills, 0.13, block=4)
    assert found.shape == (2, 3)
    assert found[1, 2] == wall(0.2, 0.05, 0.13)


def test_one_variant_is_one_number() -> None:
    assert float(sweep(wall, 0.1, 0.04, 0.13)) == wall(0.1, 0.04, 0.13)


def test_shapes_that_do_not_fit_are_refused() -> None:
    with pytest.raises(ValueError, match="broadcast"):
        sweep(wall, np.ones(2), np.ones(3), 0.13)
