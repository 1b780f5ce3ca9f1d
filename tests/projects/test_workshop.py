"""The workshop: ground, roofs and a duct, every value against a sum by hand.

Formulas of ISO 13370 and ISO 6946 written out as on paper, from memory; the numbers are those of
the project file. No function of envcheck takes part in the sums.
"""

from __future__ import annotations

from collections.abc import Callable
from functools import cache
from math import log, pi
from pathlib import Path

import pytest

from envcheck import pipeline
from tests.solve.samples import assert_recomputes

WORKSHOP = Path(__file__).parents[2] / "projects" / "brannvik-workshop" / "workshop.yaml"
DOWN, ACROSS, GROUND = 0.17, 0.13, 0.04  # films, m2 K/W


@cache
def run() -> pipeline.Run:
    return pipeline.run(str(WORKSHOP))


def into_ground(soil: float, dimension: float, thickness: float) -> float:
    """U of a floor on the ground: one of two formulas by dt against B'."""
    if thickness < dimension:
        width = pi * dimension
        return 2 * soil / (width + thickness) * log(width / thickness + 1)
    return soil / (0.457 * dimension + thickness)


def walls(soil: float, z: float, d_w: float, d_t: float) -> float:
    smaller = min(d_w, d_t)
    return 2 * soil / (pi * z) * (1 + smaller / 2 / (smaller + z)) * log(z / d_w + 1)


def slab() -> float:
    b = 2 * 72 / 34
    d_t = 0.40 + 2.0 * (DOWN + 0.140 / 0.036 + 0.100 / 2.3 + GROUND)
    added = 2.0 * (0.080 / 0.036 - 0.080 / 2.0)
    psi = -2.0 / pi * (log(2 * 0.6 / d_t + 1) - log(2 * 0.6 / (d_t + added) + 1))
    return into_ground(2.0, b, d_t) + 2 * psi / b


def suspended() -> float:
    rest = 2 * DOWN + 0.012 / 0.13 + 0.022 / 0.13
    wool, wood, share = 0.195 / 0.035, 0.195 / 0.13, 45 / 600
    upper = 1 / (share / (rest + wood) + (1 - share) / (rest + wool))
    lower = rest + 1 / (share / wood + (1 - share) / wool)
    b = 2 * 36 / 20
    below = into_ground(2.0, b, 0.35 + 2.0 * (DOWN + GROUND))
    around = 2 * 0.45 * 1.5 / b + 1450 * 0.0015 * 4 * 0.05 / b
    return 1 / ((upper + lower) / 2 + 1 / (below + around))


def basement() -> tuple[float, float]:
    d_t = 0.40 + 2.0 * (DOWN + 0.140 / 0.036 + 0.200 / 2.3 + GROUND)
    d_w = 2.0 * (ACROSS + 0.120 / 0.036 + 0.250 / 2.3 + GROUND)
    return into_ground(2.0, 2 * 72 / 34, d_t + 2.2 / 2), walls(2.0, 2.2, d_w, d_t)


def unheated() -> float:
    above = 1 / (2 * DOWN + 0.160 / 0.035 + 0.160 / 2.3)
    d_t = 0.25 + 2.0 * (DOWN + 0.100 / 2.3 + GROUND)
    d_w = 2.0 * (ACROSS + 0.250 / 2.3 + GROUND)
    floor, wall = into_ground(2.0, 2 * 40 / 24, d_t + 1.8 / 2), walls(2.0, 1.8, d_w, d_t)
    out = 40 * floor + 1.8 * 24 * wall + 0.5 * 24 * 1.2 + 0.33 * 0.3 * 40 * (0.5 + 1.8)
    return 1 / (1 / above + 40 / out)


OUTDOORS = 1 / (4 + 4 * 5 + 0.9 * 4 * 5.67e-8 * 273.15**3)  # by a wind of 5 m/s
UP = 0.10


def inverted() -> float:
    insulation = 0.280 / 0.036
    total = OUTDOORS + insulation + 0.200 / 2.3 + UP
    return 1 / total + (0.01 + 1.2 * 0.75 * 0.04) * (insulation / total) ** 2


def drained() -> float:
    """Means of 1/R over each piece by sums of thin strips; the general triangle by a grid."""
    rest = OUTDOORS + 0.200 / 2.3 + UP
    n = 4000
    at = [(i + 0.5) / n for i in range(n)]

    def strips(least: float, greatest: float, density: Callable[[float], float]) -> float:
        parts = (density(x) / (rest + (least + (greatest - least) * x) / 0.036) for x in at)
        return sum(parts) / n

    corners = [(i + 0.5) / 400 for i in range(400)]
    weights = thin = 0.0
    for u in corners:  # a point of the triangle: middle corner by u (1 - v), thickest by u v
        for v in corners:
            depth = 0.140 + u * (1 - v) * 0.060 + u * v * 0.100
            weights += u
            thin += u / (rest + depth / 0.036)
    flow = 24 * strips(0.160, 0.240, lambda x: 1.0)
    flow += 6 * strips(0.140, 0.240, lambda x: 2 * (1 - x))
    flow += 6 * strips(0.140, 0.240, lambda x: 2 * x)
    return (flow + 4 * thin / weights) / 40


def boarded() -> float:
    wool, wood, share = 0.195 / 0.035, 0.195 / 0.13, 45 / 600

    def total(rest: float) -> float:
        upper = 1 / (share / (rest + wood) + (1 - share) / (rest + wool))
        return (upper + rest + 1 / (share / wood + (1 - share) / wool)) / 2

    inner = 2 * 0.012 / 0.13 + ACROSS
    space = 1 / (1.25 + 4 * 5.67e-8 * 283.15**3 / (2 / 0.9 - 1))
    closed = total(OUTDOORS + 0.022 / 0.13 + space + inner)
    return 1 / (0.6 * closed + 0.4 * total(ACROSS + inner))  # 900 of 500 to 1500 mm2/m


def duct() -> float:
    metre = OUTDOORS / (2 * pi * 0.502) + log(0.502 / 0.302) / (2 * pi * 0.035)
    metre += 0.002 / (2 * pi * 0.302) + log(0.302 / 0.3) / (2 * pi * 50) + ACROSS / (2 * pi * 0.3)
    return 1 / (metre * 2 * pi * 0.502)


FLOOR, WALL = basement()
HAND = {
    "G-G1": slab(),
    "F-F1": suspended(),
    "B-FL": FLOOR,
    "B-WA": WALL,
    "F-U1": unheated(),
    "R-R1": inverted(),
    "R-R2": drained(),
    "S-W1": boarded(),
    "Y-P1": duct(),
    "B-B2": (72 * FLOOR + 2.2 * 34 * WALL) / (72 + 2.2 * 34),
}


@pytest.mark.parametrize(("element", "by_hand"), HAND.items(), ids=HAND)
def test_value_is_the_sum_by_hand(element: str, by_hand: float) -> None:
    (line,) = [line for line in run().judged.lines if line.element == element]
    assert line.solved is not None
    assert line.solved.missing == ()
    assert line.solved.value == pytest.approx(by_hand, rel=1e-5 if element == "R-R2" else 1e-9)
    assert_recomputes(line.solved.steps)
    assert line.solved.steps[-1].value == pytest.approx(line.solved.value, rel=1e-12)


def test_every_line_is_within_its_limit() -> None:
    done = run()
    assert {line.element for line in done.judged.lines} == set(HAND)
    assert {line.verdict for line in done.judged.lines} == {"pass"}
    assert done.exit_status == 0
